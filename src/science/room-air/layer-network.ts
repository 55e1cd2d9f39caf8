import { GRAVITY_M_PER_S2 } from './air-constants.js';
import { airMolarMass, diffusivityInAir, type AirGasTable } from './air-gases.js';
import { isActive } from './air-flows.js';
import type { AirOpening } from './air-input.js';
import { spaceAt, type AirModel } from './air-model.js';
import { coldExcess } from './cold-gas.js';
import { rectangularFloorExchange } from './floor-opening.js';
import { basinOf, type Basin, type LayerSide } from './layer-geometry.js';
import type { LowGrille } from './layer-flow.js';
import { plantFlows, servedShares } from './plant-flows.js';
import { RELEASE_MANNERS, DEFAULT_MANNER, type MannerTraits } from './release-manner.js';
import type { BoundRelease } from './zone-bound.js';

/** A time in which a gas on the floor is still cold, and what it then weighs more than air. */
interface ColdSpell {
  readonly fromS: number;
  readonly untilS: number;
  readonly excessKgPerMol: number;
}

/** What is followed in the layers: as in the mixed run, but without telling episodes apart. */
export interface LayerComponent {
  readonly gas: string;
  readonly isReleased: boolean;
  readonly excessKgPerMol: number;
  readonly outdoors: number;
  /** When it is still cold from its source, and its excess in a layer then. */
  readonly cold: readonly ColdSpell[];
}

export interface Layer {
  readonly space: number;
  readonly group: number;
  readonly side: LayerSide;
  readonly basin: Basin;
  /** Mean diffusivity of the gases that gather here [m2/s]. */
  readonly diffusivityM2PerS: number;
  /** Base (floor or ceiling) above the datum [m]. */
  readonly baseLevelM: number;
}

/** A release as the layers take it. */
export interface LayerSource {
  readonly plan: BoundRelease['plan'];
  /** Index of the layer that takes it, or -1: mixed into the upper air. */
  readonly layer: number;
  readonly manner: MannerTraits;
  /** A light gas that flows rises as a plume; the distance from its source to the base [m]. */
  readonly plumeRiseM: number | undefined;
  readonly gZero: number;
  /** Radius of the floor over that of the gas where it is let go at once; 1 where it flows [-]. */
  readonly radiusRatio: number;
  /** Most that first mixing may make of it: half of its space [-]. */
  readonly mostDilution: number;
  readonly airShare: number;
  readonly columns: readonly { readonly column: number; readonly share: number }[];
}

/** An edge over which layers of one side pass. */
export interface LayerWeir {
  readonly a: number;
  /** Layer index, or -1 for outdoors. */
  readonly b: number;
  readonly widthM: number;
  /** Sill above the base of each basin, along its own direction [m]. */
  readonly sillA: number;
  readonly sillB: number;
  /** Height of the opening that can face a layer, for the way outdoors [m]. */
  readonly heightM: number;
  readonly dischargeCoefficient: number;
  /** A hole in a floor between two zones of air: what pours through it is limited by its size. */
  readonly hole: FloorHole | undefined;
  readonly opening: AirOpening;
}

interface FloorHole {
  readonly areaM2: number;
  /** Exchange through it each way at a reduced gravity of 1 m/s2; it grows with its root [m3/s]. */
  readonly exchangeM3PerS: number;
  /** Whether the air of the lower space can leave by another way. */
  readonly hasOtherWay: boolean;
}

export interface LayerIntake {
  readonly space: number;
  readonly grille: LowGrille;
  readonly level: 'high' | 'low' | 'mixed';
  readonly outdoorM3PerS: number;
  readonly recirculatedM3PerS: number;
  readonly system: number;
}

export interface LayerSupply {
  readonly space: number;
  readonly level: 'high' | 'low' | 'mixed';
  readonly freshM3PerS: number;
  readonly recirculatedM3PerS: number;
  readonly system: number;
  /** The jet of the supply where it meets the layer on the floor. */
  readonly jet: { readonly radiusM: number; readonly speedMPerS: number } | undefined;
}

export interface LayerNetwork {
  readonly model: AirModel;
  readonly components: readonly LayerComponent[];
  /** Upper zone of each space; spaces in wide open connection share one. */
  readonly groupOf: readonly number[];
  readonly groupVolumesM3: readonly number[];
  readonly layers: readonly Layer[];
  /** By space: its layer on the floor and under the ceiling, -1 for none. */
  readonly floorLayerOf: readonly number[];
  readonly ceilingLayerOf: readonly number[];
  readonly sources: readonly LayerSource[];
  readonly weirs: readonly LayerWeir[];
  readonly airMolarMassKgPerMol: number;
  readonly outdoorMolarMassKgPerMol: number;
  /** By component: excess over the molar mass of air above the layers [kg/mol]. */
  readonly excessAbove: Float64Array;
  /** By component: fraction outdoors [-]. */
  readonly outdoor: Float64Array;
}

/** An opening of at least this area joins the upper air of both sides into one zone [m2]. */
const SHARED_AIR_M2 = 15;
/** A hole over at least this share of the lower floor makes it an open pit [-]. */
const OPEN_PIT_SHARE = 0.25;
/** Share of its space that first mixing may fill [-]. */
const MOST_FIRST_MIXING = 0.5;
/** A release at once is taken as lasting this long [s]: a current needs as long to form. */
const AT_ONCE_S = 5;

/** The model in which what is released at once comes within a few seconds. */
export function withoutPulses(model: AirModel): AirModel {
  const { durationS } = model.input;
  const releases = model.releases.map((plan) =>
    plan.endS <= plan.startS ? { ...plan, endS: plan.startS + AT_ONCE_S } : plan,
  );
  const edges = new Set(model.edgesS);
  for (const { endS } of releases) if (endS < durationS) edges.add(endS);
  return { ...model, releases, edgesS: [...edges].sort((a, b) => a - b) };
}

/**
 * Layers of a model: where gas can gather, what feeds each basin and over which edges it leaves.
 *
 * Only spaces that a layered release reaches have layers, one a side; the air above them is one
 * zone for all spaces joined by wide openings.
 */
export function layerNetwork(
  model: AirModel,
  gases: AirGasTable,
  releases: readonly BoundRelease[],
): LayerNetwork {
  const air = airMolarMass(gases);
  const components: LayerComponent[] = model.components.slice(0, 2).map((one) => ({
    gas: one.gas,
    isReleased: false,
    excessKgPerMol: one.excessKgPerMol,
    outdoors: one.outdoors,
    cold: [],
  }));
  for (const one of model.components.slice(2)) {
    if (components.some((known) => known.isReleased && known.gas === one.gas)) continue;
    components.push({
      gas: one.gas,
      isReleased: true,
      excessKgPerMol: one.excessKgPerMol,
      outdoors: 0,
      cold: coldSpells(model, releases, one.gas, one.excessKgPerMol, air),
    });
  }
  const groupOf = sharedAir(model);
  const groupCount = Math.max(...groupOf) + 1;
  const groupVolumesM3 = Array.from({ length: groupCount }, (_, g) =>
    model.spaces.reduce((sum, space, i) => (groupOf[i] === g ? sum + space.capacityM3 : sum), 0),
  );
  const layers: Layer[] = [];
  for (const side of ['floor', 'ceiling'] as const) {
    const own = releases.filter((release) => sideOf(model, release) === side);
    for (const [i, space] of model.spaces.entries()) {
      const here = own.filter((release) => Number.isFinite(release.reachS[i] ?? Infinity));
      if (here.length === 0) continue;
      const scale = space.capacityM3 / space.curve.volumeM3;
      layers.push({
        space: i,
        group: groupOf[i] ?? 0,
        side,
        basin: basinOf(space.curve, side, scale),
        diffusivityM2PerS: meanDiffusivity(here, gases),
        baseLevelM: space.curve.floorLevelM + (side === 'floor' ? 0 : space.curve.heightM),
      });
    }
  }
  const layerAt = (space: number, side: LayerSide): number =>
    layers.findIndex((layer) => layer.space === space && layer.side === side);
  const sources = releases.map((release): LayerSource => {
    const { plan } = release;
    const side = sideOf(model, release);
    const layer = side === undefined ? -1 : layerAt(plan.space, side);
    const manner = RELEASE_MANNERS[plan.source.manner ?? DEFAULT_MANNER];
    const atOnce = (plan.source.durationS ?? 0) === 0 && plan.decayS === undefined;
    const { capacityM3, curve } = spaceAt(model, plan.space);
    const { floorAreaM2 } = curve;
    const rise = curve.heightM - (plan.source.heightM ?? 0);
    return {
      plan,
      layer,
      manner,
      plumeRiseM: layer >= 0 && side === 'ceiling' && !atOnce ? rise : undefined,
      radiusRatio:
        atOnce && side === 'floor'
          ? Math.max(1, Math.sqrt(floorAreaM2 / Math.PI) / Math.cbrt(plan.totalM3 / Math.PI))
          : 1,
      mostDilution: Math.max(1, (MOST_FIRST_MIXING * capacityM3) / plan.totalM3),
      gZero: (GRAVITY_M_PER_S2 * Math.abs(plan.molarMassKgPerMol - air)) / air,
      airShare: (plan.shares as { readonly air?: number }).air ?? 0,
      columns: Object.entries(plan.shares)
        .filter(([gas]) => gas !== 'air')
        .map(([gas, share]) => ({
          column: components.findIndex((one) => one.isReleased && one.gas === gas),
          share,
        })),
    };
  });
  const outdoor = components.reduce((sum, one) => sum + one.excessKgPerMol * one.outdoors, air);
  return {
    model,
    components,
    groupOf,
    groupVolumesM3,
    layers,
    floorLayerOf: model.spaces.map((_, i) => layerAt(i, 'floor')),
    ceilingLayerOf: model.spaces.map((_, i) => layerAt(i, 'ceiling')),
    sources,
    weirs: layerWeirs(model, groupOf, layerAt),
    airMolarMassKgPerMol: air,
    outdoorMolarMassKgPerMol: outdoor,
    excessAbove: Float64Array.from(components, (one) => one.excessKgPerMol),
    outdoor: Float64Array.from(components, (one) => one.outdoors),
  };
}

/** Below room temperature by more than this, a source makes its gas heavy for a while [K]. */
const COLD_BY_K = 20;
/** Time in which floor and walls warm a cold layer [s]: some ten to twenty minutes. */
const WARMING_S = 900;

/** By how much a source is colder than its space [K]; 0 where it is not cold. */
function coldBy(model: AirModel, { plan }: BoundRelease): number {
  const roomK = spaceAt(model, plan.space).temperatureK;
  const by = roomK - (plan.source.temperatureK ?? roomK);
  return by > COLD_BY_K ? by : 0;
}

/** Where a release lies first; undefined: mixed with the air. */
function sideOf(model: AirModel, release: BoundRelease): LayerSide | undefined {
  if (!release.startsLayered) return undefined;
  if (release.gathering === 'above') return 'ceiling';
  // What is near neutral once warm still runs along the floor while it is cold.
  return release.gathering === 'below' || coldBy(model, release) > 0 ? 'floor' : undefined;
}

/** When the gas of cold sources on the floor is heavier than its molar mass says. */
function coldSpells(
  model: AirModel,
  releases: readonly BoundRelease[],
  gas: string,
  excessKgPerMol: number,
  air: number,
): readonly ColdSpell[] {
  return releases
    .filter((release) => sideOf(model, release) === 'floor' && coldBy(model, release) > 0)
    .filter(({ plan }) => gas in plan.shares && Number.isFinite(plan.endS))
    .map((release) => ({
      fromS: release.plan.startS,
      untilS: release.plan.endS + WARMING_S,
      excessKgPerMol:
        excessKgPerMol +
        coldExcess(
          gas,
          coldBy(model, release),
          spaceAt(model, release.plan.space).temperatureK,
          air,
        ),
    }));
}

function meanDiffusivity(releases: readonly BoundRelease[], gases: AirGasTable): number {
  let weight = 0;
  let sum = 0;
  for (const { plan } of releases) {
    for (const [gas, share] of Object.entries(plan.shares)) {
      if (gas === 'air') continue;
      weight += share * plan.totalM3;
      sum += share * plan.totalM3 * diffusivityInAir(gases, gas);
    }
  }
  return weight > 0 ? sum / weight : 0;
}

/** Zone number of each space: wide openings and open pits share their upper air. */
function sharedAir(model: AirModel): readonly number[] {
  const root = model.spaces.map((_, i) => i);
  const find = (i: number): number => {
    const parent = root[i] ?? i;
    return parent === i ? i : find(parent);
  };
  for (const opening of model.input.openings ?? []) {
    const a = model.indexOf.get(opening.from);
    const b = model.indexOf.get(opening.to);
    if (a === undefined || b === undefined) continue;
    const area = opening.widthM * opening.heightM * (opening.openFraction ?? 1);
    const always = (opening.fromS ?? 0) <= 0 && (opening.toS ?? Infinity) >= model.input.durationS;
    if (!always) continue;
    const lower = spaceAt(model, a).curve.floorLevelM < spaceAt(model, b).curve.floorLevelM ? a : b;
    const isPit =
      opening.kind === 'floorOpening' &&
      area >= OPEN_PIT_SHARE * spaceAt(model, lower).curve.floorAreaM2;
    if (isPit || (opening.kind !== 'floorOpening' && area >= SHARED_AIR_M2)) {
      root[find(a)] = find(b);
    }
  }
  const roots = [...new Set(model.spaces.map((_, i) => find(i)))];
  return model.spaces.map((_, i) => roots.indexOf(find(i)));
}

/** The hole through which a floor opening lets a layer pour; undefined for an open pit or a door. */
function holeOf(
  model: AirModel,
  groupOf: readonly number[],
  opening: AirOpening,
  inside: number,
  other: number | undefined,
): FloorHole | undefined {
  if (opening.kind !== 'floorOpening' || other === undefined) return undefined;
  if (groupOf[inside] === groupOf[other]) return undefined;
  const level = (space: number): number => spaceAt(model, space).curve.floorLevelM;
  const lower = spaceAt(model, level(inside) < level(other) ? inside : other).id;
  const hasOtherWay = (model.input.openings ?? []).some(
    (one) =>
      one !== opening && (one.openFraction ?? 1) > 0 && (one.from === lower || one.to === lower),
  );
  const widthM = opening.widthM * (opening.openFraction ?? 1);
  return {
    areaM2: widthM * opening.heightM,
    exchangeM3PerS: rectangularFloorExchange(widthM, opening.heightM, 1),
    hasOtherWay,
  };
}

function layerWeirs(
  model: AirModel,
  groupOf: readonly number[],
  layerAt: (space: number, side: LayerSide) => number,
): readonly LayerWeir[] {
  const weirs: LayerWeir[] = [];
  for (const opening of model.input.openings ?? []) {
    if ((opening.openFraction ?? 1) <= 0) continue;
    const a = model.indexOf.get(opening.from);
    const b = model.indexOf.get(opening.to);
    const share = opening.openFraction ?? 1;
    for (const side of ['floor', 'ceiling'] as const) {
      const inside = a ?? b;
      if (inside === undefined) continue;
      const other = a === undefined ? undefined : b;
      const first = layerAt(inside, side);
      const second = other === undefined ? -1 : layerAt(other, side);
      if (first < 0 || (other !== undefined && second < 0)) continue;
      const edge = edgeLevel(model, opening, side, inside, other);
      const fromBase = (space: number): number => {
        const { curve } = spaceAt(model, space);
        return side === 'floor'
          ? Math.max(0, edge - curve.floorLevelM)
          : Math.max(0, curve.floorLevelM + curve.heightM - edge);
      };
      weirs.push({
        a: first,
        b: second,
        widthM:
          opening.kind === 'floorOpening'
            ? 2 * share * (opening.widthM + opening.heightM)
            : share * opening.widthM,
        sillA: fromBase(inside),
        sillB: other === undefined ? 0 : fromBase(other),
        heightM: opening.heightM,
        hole: holeOf(model, groupOf, opening, inside, other),
        dischargeCoefficient: opening.dischargeCoefficient ?? 0.45,
        opening,
      });
    }
  }
  return weirs;
}

/** Level over which (under which, for light gas) the layer passes, above the datum [m]. */
function edgeLevel(
  model: AirModel,
  opening: AirOpening,
  side: LayerSide,
  inside: number,
  other: number | undefined,
): number {
  const floor = (space: number): number => spaceAt(model, space).curve.floorLevelM;
  if (opening.kind === 'floorOpening') {
    const plane = other === undefined ? floor(inside) : Math.max(floor(inside), floor(other));
    return opening.sillLevelM ?? plane;
  }
  const sill = opening.sillLevelM ?? floor(inside);
  return side === 'floor' ? sill : sill + opening.heightM;
}

/** The ways by which units take air from spaces and give it, between two edges. */
export function layerUnits(
  model: AirModel,
  t: number,
): { readonly intakes: readonly LayerIntake[]; readonly supplies: readonly LayerSupply[] } {
  const intakes: LayerIntake[] = [];
  const supplies: LayerSupply[] = [];
  for (const [index, system] of (model.input.airSystems ?? []).entries()) {
    if (!isActive(system, t)) continue;
    const { supplyM3PerS: supply, exhaustM3PerS: exhaust } = plantFlows(system);
    for (const { space, share } of servedShares(system)) {
      const at = model.indexOf.get(space) ?? 0;
      const recirculatedM3PerS = (system.recirculatedM3PerS ?? 0) * share;
      intakes.push({
        space: at,
        level: system.extractLevel ?? 'high',
        grille: {
          flowM3PerS: exhaust * share + recirculatedM3PerS,
          widthM: system.extractWidthM ?? 1,
          topM: system.extractTopM ?? 0.3,
        },
        outdoorM3PerS: exhaust * share,
        recirculatedM3PerS,
        system: index,
      });
      supplies.push({
        space: at,
        level: system.supplyLevel ?? 'high',
        freshM3PerS: supply * share,
        recirculatedM3PerS,
        system: index,
        jet: system.supplyJet,
      });
    }
  }
  return { intakes, supplies };
}
