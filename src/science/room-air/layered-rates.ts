import { GRAVITY_M_PER_S2, MOLAR_GAS_CONSTANT } from './air-constants.js';
import { isActive, type FlowSegment } from './air-flows.js';
import type { AirModel } from './air-model.js';
import { flowsWithNet } from './doorway.js';
import { rectangularFloorExchange } from './floor-opening.js';
import { basinArea, basinLevel } from './layer-geometry.js';
import { grilleIntake, turbulentExchange, WEIR_CONSTANT } from './layer-flow.js';
import { layerUnits, type LayerNetwork, type LayerWeir } from './layer-network.js';
import type { LayerParameters } from './layer-parameters.js';
import {
  breathCarbonDioxide,
  RESPIRATORY_QUOTIENT,
  SEATED_ADULT_CO2_M3_PER_S,
} from './occupant.js';
import { LINE_PLUME_CONSTANT } from './plume.js';
import { releaseFlow } from './release-flow.js';
import { verticalOpeningFlows } from './vertical-openings.js';

/**
 * Where no layer lies, a film of the air above stands for it [m]: the equations then have no
 * beginning and no end of a layer. It is a thousandth of the least depth that is reported.
 */
export const FILM_DEPTH_M = 1e-6;
/** Depth below which a layer counts as this deep for the smear [m]. */
const LEAST_SMEAR_DEPTH_M = 1e-3;
/** Depth over which what is drawn from a thin layer fades, and over which mouths enter it [m]. */
const RAMP_M = 0.05;

/**
 * Where everything lies in the state of the layers.
 *
 * Per layer its volume and the amounts of the components; per upper zone the amounts; then what
 * went outdoors and what came in. Volumes and amounts in m3 at ambient conditions.
 */
export interface LayerLayout {
  readonly k: number;
  readonly layers: number;
  readonly groups: number;
  readonly size: number;
}

/** Layout of the state for a network: its counts and the length of the state. */
export function layerLayout(network: LayerNetwork): LayerLayout {
  const k = network.components.length;
  const layers = network.layers.length;
  const groups = network.groupVolumesM3.length;
  return { k, layers, groups, size: layers * (k + 1) + (groups + 2) * k };
}

/**
 * Offset of the amounts of a zone in the state [-].
 *
 *   layers first (volume, then amounts), then upper zones, outdoors out, outdoors in
 *
 * @param layout counts of layers, upper zones and components
 * @param zone   index of the zone [-]: layers, upper zones, then the two of outdoors
 * @returns index of its first component in the state [-]
 * Source: own-derivation. Assumes: the layout of the same network. Accuracy: exact.
 */
export function zoneOffset(layout: LayerLayout, zone: number): number {
  return zone < layout.layers
    ? zone * (layout.k + 1) + 1
    : layout.layers * (layout.k + 1) + (zone - layout.layers) * layout.k;
}

/** Volumes, fractions and molar masses of all zones at one state. */
export interface ZoneState {
  readonly volumes: Float64Array;
  readonly fractions: Float64Array;
  readonly molarMasses: Float64Array;
}

/** Work space of the size that a layout needs, all zeros, for readZones to fill. */
export function emptyZoneState(layout: LayerLayout): ZoneState {
  const zones = layout.layers + layout.groups;
  return {
    volumes: new Float64Array(zones),
    fractions: new Float64Array(zones * layout.k),
    molarMasses: new Float64Array(zones),
  };
}

/** Reads a state into volumes, fractions and molar masses. */
export function readZones(
  network: LayerNetwork,
  layout: LayerLayout,
  state: Float64Array,
  into: ZoneState,
): void {
  const { k, layers, groups } = layout;
  const { volumes, fractions, molarMasses } = into;
  for (let g = 0; g < groups; g++) volumes[layers + g] = network.groupVolumesM3[g] ?? 0;
  for (let l = 0; l < layers; l++) {
    const volume = state[l * (k + 1)] ?? 0;
    volumes[l] = volume;
    const g = layers + (network.layers[l]?.group ?? 0);
    volumes[g] = (volumes[g] ?? 0) - volume;
  }
  for (let z = layers + groups - 1; z >= 0; z--) {
    const offset = zoneOffset(layout, z);
    const volume = volumes[z] ?? 0;
    let molar = network.airMolarMassKgPerMol;
    for (let c = 0; c < k; c++) {
      const x = volume > 0 ? (state[offset + c] ?? 0) / volume : 0;
      fractions[z * k + c] = x;
      molar += x * (network.components[c]?.excessKgPerMol ?? 0);
    }
    molarMasses[z] = molar;
  }
}

/** What the rates of one segment read: everything that does not change inside it. */
export interface LayerSegment {
  readonly flows: FlowSegment;
  readonly units: ReturnType<typeof layerUnits>;
  readonly weirs: readonly LayerWeir[];
  readonly transfers: readonly { readonly from: number; readonly to: number; flow: number }[];
  readonly breath: readonly {
    readonly space: number;
    readonly heightM: number | undefined;
    readonly carbonDioxide: number;
    readonly oxygen: number;
  }[];
  /** Infiltration into each space [m3/s]. */
  readonly infiltration: Float64Array;
}

/** What the rates of the layers need of one flow segment, schedules taken at its middle. */
export function layerSegment(network: LayerNetwork, flows: FlowSegment): LayerSegment {
  const { model } = network;
  const t = 0.5 * (flows.fromS + flows.toS);
  const units = layerUnits(model, t);
  const infiltration = Float64Array.from(flows.freshM3PerS);
  for (const supply of units.supplies) {
    infiltration[supply.space] = (infiltration[supply.space] ?? 0) - supply.freshM3PerS;
  }
  const place = (id: string): number => (id === 'outside' ? -1 : (model.indexOf.get(id) ?? -1));
  const transfers = (model.input.transfers ?? [])
    .filter((one) => isActive(one, t))
    .map((one) => ({ from: place(one.from), to: place(one.to), flow: one.flowM3PerS }));
  for (const { from, to, flow } of transfers) {
    if (from < 0 && to >= 0) infiltration[to] = (infiltration[to] ?? 0) - flow;
  }
  const breath = (model.input.occupants ?? [])
    .filter((one) => isActive(one, t))
    .map((one) => {
      const perPerson =
        one.carbonDioxideM3PerS ??
        (one.metabolicRateMet === undefined
          ? SEATED_ADULT_CO2_M3_PER_S
          : breathCarbonDioxide(one.metabolicRateMet));
      const carbonDioxide = one.count * perPerson * model.siteFactor;
      return {
        space: place(one.space),
        heightM: one.heightM,
        carbonDioxide,
        oxygen: carbonDioxide / (one.respiratoryQuotient ?? RESPIRATORY_QUOTIENT),
      };
    });
  return {
    flows,
    units,
    weirs: network.weirs.filter((weir) => isActive(weir.opening, t)),
    transfers,
    breath,
    infiltration: infiltration.map((flow) => Math.max(0, flow)),
  };
}

/**
 * Rates of the two-layer model: writes d(state)/dt.
 *
 *   dVl/dt  = D q + E + F + I + Sl - L - O - sg S + Pl (sc - so)
 *   dnkl/dt = qk + [(D-1) q + E + F] xku + X (xku - xkl) + I xkI + Sl ck - (L + O + sg S) xkl + Pl bk
 *   dnku/dt = the same with the other sign, and outdoor air, units, people, neighbours
 *
 * @param network layers and upper zones
 * @param segment flows between two edges
 * @param parameters what the run assumes
 * @param joined spaces that have become one mixed zone
 * @returns a derivative for the integration
 * Source: own-room-air (recommended layer model), robins-2001 for the exchange. Assumes: level
 * layers, one temperature in the density differences of layers. Accuracy: scenario spread, never
 * one number.
 */
export function layerRates(
  network: LayerNetwork,
  segment: LayerSegment,
  parameters: LayerParameters,
  joined: ReadonlySet<number>,
): (t: number, state: Float64Array, out: Float64Array) => void {
  const layout = layerLayout(network);
  const { k, layers, groups } = layout;
  const { model, components } = network;
  const n = model.spaces.length;
  const zones = emptyZoneState(layout);
  const { volumes, fractions, molarMasses } = zones;
  const OUT = layers + groups;
  const IN = OUT + 1;
  const offsets = Array.from({ length: IN + 1 }, (_, z) => zoneOffset(layout, z));
  const air = network.airMolarMassKgPerMol;
  const net = new Float64Array(n);
  const pressure = new Float64Array(n);
  const depths = new Float64Array(layers);
  const outdoors = Float64Array.from(components, (one) => one.outdoors);
  const upperOf = (space: number): number => layers + (network.groupOf[space] ?? 0);
  const layerOf = (space: number, side: 'floor' | 'ceiling'): number =>
    joined.has(space)
      ? -1
      : network.layers.findIndex((layer) => layer.space === space && layer.side === side);
  let floorLayer: number[] = [];
  let ceilingLayer: number[] = [];
  let joinedCount = -1;
  const systemCount = (model.input.airSystems ?? []).length;
  const systemAmounts = new Float64Array(systemCount * k);
  const systemFlows = new Float64Array(systemCount);
  const pressures = segment.flows.pressures;
  let rates = new Float64Array(layout.size);

  const addTo = (at: number, value: number): void => {
    rates[at] = (rates[at] ?? 0) + value;
  };
  const volumeRate = (zone: number, flow: number): void => {
    if (zone < layers) addTo(zone * (k + 1), flow);
  };
  const move = (from: number, to: number, flow: number): void => {
    if (flow <= 0 || from === to) return;
    const a = offsets[from] ?? 0;
    const b = offsets[to] ?? 0;
    for (let c = 0; c < k; c++) {
      const moved = flow * (fractions[from * k + c] ?? 0);
      rates[a + c] = (rates[a + c] ?? 0) - moved;
      rates[b + c] = (rates[b + c] ?? 0) + moved;
    }
    volumeRate(from, -flow);
    volumeRate(to, flow);
  };
  const breatheOutdoors = (to: number, flow: number): void => {
    if (flow <= 0) return;
    const b = offsets[to] ?? 0;
    const i = offsets[IN] ?? 0;
    for (let c = 0; c < k; c++) {
      const moved = flow * (outdoors[c] ?? 0);
      if (moved === 0) continue;
      addTo(b + c, moved);
      addTo(i + c, moved);
    }
    volumeRate(to, flow);
  };
  /** Excess of a layer's molar mass over an upper zone's, along the side of the layer. */
  const excess = (layer: number, upper: number): number => {
    const sign = network.layers[layer]?.side === 'ceiling' ? -1 : 1;
    return Math.max(0, sign * ((molarMasses[layer] ?? air) - (molarMasses[upper] ?? air)));
  };
  /** 0 for a film, 1 from twice its depth on. */
  const presence = (layer: number): number => {
    const film = FILM_DEPTH_M * (network.layers[layer]?.basin.areaM2 ?? 1);
    return Math.min(1, Math.max(0, (volumes[layer] ?? 0) / film - 1));
  };
  /** Air that leaves a space without a unit: from above, or by choice from the floor layer. */
  const leave = (space: number, to: number, flow: number): void => {
    if (flow <= 0) return;
    const layer = floorLayer[space] ?? -1;
    let low = 0;
    if (layer >= 0 && parameters.surplusFromLayer > 0) {
      low = flow * parameters.surplusFromLayer * Math.min(1, (depths[layer] ?? 0) / RAMP_M);
      move(layer, to, low);
    }
    move(upperOf(space), to, flow - low);
  };

  const active = network.sources.filter(
    ({ plan }) => plan.startS <= segment.flows.fromS && plan.endS >= segment.flows.toS,
  );
  const addReleases = (t: number): void => {
    for (const source of active) {
      const { plan } = source;
      const q = releaseFlow(plan, Math.min(t, justBefore(plan.endS)));
      const upper = upperOf(plan.space);
      const layer = source.layer >= 0 && !joined.has(plan.space) ? source.layer : -1;
      const to = layer >= 0 ? layer : upper;
      const base = offsets[to] ?? 0;
      const into = offsets[IN] ?? 0;
      for (const { column, share } of source.columns) {
        addTo(base + column, q * share);
        addTo(into + column, q * share);
        if (components[column]?.gas === 'O2') {
          addTo(base, q * share);
          addTo(into, q * share);
        }
      }
      const airShare = source.airShare;
      if (airShare > 0) {
        breatheOutdoors(to, q * airShare);
        volumeRate(to, q * (1 - airShare));
      } else volumeRate(to, q);
      if (layer < 0 || q <= 0) continue;
      const rise =
        source.plumeRiseM === undefined ? undefined : source.plumeRiseM - (depths[layer] ?? 0);
      const entrained =
        rise === undefined
          ? ((parameters.sourceDilution ?? source.mannerDilution) - 1) * q
          : parameters.plumeConstant * Math.cbrt(source.gZero * q) * Math.max(0, rise) ** (5 / 3);
      move(upper, layer, entrained);
    }
  };

  const addMixing = (): void => {
    for (let l = 0; l < layers; l++) {
      const layer = network.layers[l];
      if (!layer || joined.has(layer.space)) continue;
      const upper = layers + layer.group;
      const depth = depths[l] ?? 0;
      const area = basinArea(layer.basin, depth);
      const mean = (volumes[l] ?? 0) / area;
      if (parameters.diffusion > 0) {
        const smear =
          (area * Math.PI * layer.diffusivityM2PerS) / (2 * Math.max(mean, LEAST_SMEAR_DEPTH_M));
        move(upper, l, smear * presence(l));
      }
      const gPrime = (GRAVITY_M_PER_S2 * excess(l, upper)) / air;
      // A film thinner than a millimetre has nothing to exchange yet; the ramp keeps it tame.
      const exchange =
        area *
        Math.min(1, mean / LEAST_SMEAR_DEPTH_M) *
        (turbulentExchange(parameters.turbulenceMPerS, gPrime, mean) + parameters.walkingMPerS);
      move(upper, l, exchange);
      move(l, upper, exchange);
    }
  };

  const addWeirs = (): void => {
    for (const weir of segment.weirs) {
      const first = network.layers[weir.a];
      if (!first) continue;
      if (weir.b < 0) {
        const head = Math.min((depths[weir.a] ?? 0) - weir.sillA, weir.heightM);
        if (head <= 0 || joined.has(first.space)) continue;
        const sign = first.side === 'ceiling' ? -1 : 1;
        const outside = network.outdoorMolarMassKgPerMol;
        const difference = Math.max(0, sign * ((molarMasses[weir.a] ?? air) - outside));
        const gPrime = (GRAVITY_M_PER_S2 * difference) / air;
        const flow =
          (weir.dischargeCoefficient / 3) *
          weir.widthM *
          smoothRoot(gPrime) *
          head ** 1.5 *
          presence(weir.a);
        // What leaves through the lower part of an opening comes back as air through the rest.
        move(weir.a, OUT, flow);
        breatheOutdoors(layers + first.group, flow);
        continue;
      }
      const second = network.layers[weir.b];
      if (!second) continue;
      const headA = joined.has(first.space) ? 0 : (depths[weir.a] ?? 0) - weir.sillA;
      const headB = joined.has(second.space) ? 0 : (depths[weir.b] ?? 0) - weir.sillB;
      const upperA = layers + first.group;
      const upperB = layers + second.group;
      const own = (layer: number, upper: number, head: number): number => {
        if (head <= 0) return 0;
        const gravity = (GRAVITY_M_PER_S2 * excess(layer, upper)) / (molarMasses[layer] ?? air);
        return smoothRoot(gravity) * head ** 1.5 * presence(layer);
      };
      const flow =
        WEIR_CONSTANT * weir.widthM * (own(weir.a, upperB, headA) - own(weir.b, upperA, headB));
      if (flow === 0) continue;
      const donor = flow > 0 ? weir.a : weir.b;
      const receiver = flow > 0 ? weir.b : weir.a;
      const donorUpper = flow > 0 ? upperA : upperB;
      const receiverUpper = flow > 0 ? upperB : upperA;
      const sill = flow > 0 ? weir.sillB : weir.sillA;
      const receiverSpace = (flow > 0 ? second : first).space;
      const target = joined.has(receiverSpace) ? receiverUpper : receiver;
      const size = Math.abs(flow);
      move(donor, target, size);
      if (donorUpper !== receiverUpper) move(receiverUpper, donorUpper, size);
      const fall = sill - (depths[receiver] ?? 0);
      if (fall > 0 && target === receiver) {
        const gPrime = (GRAVITY_M_PER_S2 * excess(donor, receiverUpper)) / air;
        const plume =
          LINE_PLUME_CONSTANT * Math.cbrt((gPrime * size) / weir.widthM) * weir.widthM * fall;
        move(receiverUpper, receiver, parameters.fallEntrainment * Math.max(0, plume - size));
      }
    }
  };

  const addUnits = (): void => {
    systemAmounts.fill(0);
    systemFlows.fill(0);
    for (const intake of segment.units.intakes) {
      const total = intake.grille.flowM3PerS;
      if (total <= 0) continue;
      const upper = upperOf(intake.space);
      const layer =
        intake.level === 'low'
          ? (floorLayer[intake.space] ?? -1)
          : intake.level === 'high'
            ? (ceilingLayer[intake.space] ?? -1)
            : -1;
      let fromLayer = 0;
      if (layer >= 0) {
        const gravity = (GRAVITY_M_PER_S2 * excess(layer, upper)) / (molarMasses[layer] ?? air);
        fromLayer = grilleIntake(intake.grille, gravity, depths[layer] ?? 0) * presence(layer);
      }
      const outdoorShare = intake.outdoorM3PerS / total;
      const parts = [
        { zone: layer, flow: fromLayer },
        { zone: upper, flow: total - fromLayer },
      ];
      for (const { zone, flow } of parts) {
        if (zone < 0 || flow <= 0) continue;
        move(zone, OUT, flow * outdoorShare);
        const around = flow * (1 - outdoorShare);
        if (around <= 0) continue;
        for (let c = 0; c < k; c++) {
          const amount = around * (fractions[zone * k + c] ?? 0);
          const at = intake.system * k + c;
          systemAmounts[at] = (systemAmounts[at] ?? 0) + amount;
          addTo((offsets[zone] ?? 0) + c, -amount);
        }
        volumeRate(zone, -around);
        systemFlows[intake.system] = (systemFlows[intake.system] ?? 0) + around;
      }
    }
    for (const supply of segment.units.supplies) {
      const layer = floorLayer[supply.space] ?? -1;
      const to =
        supply.level === 'low' && layer >= 0 && presence(layer) >= 1
          ? layer
          : upperOf(supply.space);
      breatheOutdoors(to, supply.freshM3PerS);
      const around = systemFlows[supply.system] ?? 0;
      if (around <= 0 || supply.recirculatedM3PerS <= 0) continue;
      const share = supply.recirculatedM3PerS / around;
      for (let c = 0; c < k; c++) {
        addTo((offsets[to] ?? 0) + c, share * (systemAmounts[supply.system * k + c] ?? 0));
      }
      volumeRate(to, supply.recirculatedM3PerS);
    }
  };

  const addPeople = (): void => {
    for (const one of segment.breath) {
      const layer = floorLayer[one.space] ?? -1;
      const inside =
        layer >= 0 && one.heightM !== undefined
          ? Math.min(1, Math.max(0, ((depths[layer] ?? 0) - one.heightM) / RAMP_M))
          : 0;
      const parts = [
        { zone: layer, share: inside },
        { zone: upperOf(one.space), share: 1 - inside },
      ];
      for (const { zone, share } of parts) {
        if (zone < 0 || share <= 0) continue;
        const base = offsets[zone] ?? 0;
        addTo(base + 1, share * one.carbonDioxide);
        addTo(base, -share * one.oxygen);
        volumeRate(zone, share * (one.carbonDioxide - one.oxygen));
      }
      addTo((offsets[IN] ?? 0) + 1, one.carbonDioxide);
      addTo(offsets[OUT] ?? 0, one.oxygen);
    }
  };

  const addNeighbours = (t: number): void => {
    net.set(segment.flows.net);
    for (const release of segment.flows.decaying) {
      net[release.space] = (net[release.space] ?? 0) + releaseFlow(release, t);
    }
    for (let i = 0; i < n; i++) {
      let value = 0;
      for (let j = 0; j < n; j++) value += (pressures[i * n + j] ?? 0) * (net[j] ?? 0);
      pressure[i] = value;
      const leak = value * (segment.flows.leakM2[i] ?? 0);
      if (leak > 0) leave(i, OUT, leak);
      else breatheOutdoors(upperOf(i), -leak);
      breatheOutdoors(upperOf(i), segment.infiltration[i] ?? 0);
    }
    for (const { from, to, flow } of segment.transfers) {
      if (from >= 0) leave(from, to >= 0 ? upperOf(to) : OUT, flow);
      else if (to >= 0) breatheOutdoors(upperOf(to), flow);
    }
    for (const link of segment.flows.links) {
      const { a, b } = link;
      const through = link.conductanceM2 * ((pressure[a] ?? 0) - (pressure[b] ?? 0));
      if (a < n && b < n && upperOf(a) === upperOf(b)) continue;
      const densityA = upperDensity(model, molarMasses[a < n ? upperOf(a) : -1], a, network);
      const densityB = upperDensity(model, molarMasses[b < n ? upperOf(b) : -1], b, network);
      let aToB: number;
      let bToA: number;
      if (link.floorHole) {
        const gPrime = (2 * GRAVITY_M_PER_S2 * (densityA - densityB)) / (densityA + densityB);
        const { widthM, lengthM } = link.floorHole;
        const flows = flowsWithNet(rectangularFloorExchange(widthM, lengthM, gPrime), through);
        aToB = flows.outM3PerS;
        bToA = flows.inM3PerS;
      } else {
        const flows = verticalOpeningFlows(link.vertical, densityA, densityB, through);
        aToB = flows.aToBM3PerS;
        bToA = flows.bToAM3PerS;
      }
      pass(a, b, aToB);
      pass(b, a, bToA);
    }
  };
  const pass = (from: number, to: number, flow: number): void => {
    if (from >= n) breatheOutdoors(upperOf(to), flow);
    else leave(from, to >= n ? OUT : upperOf(to), flow);
  };

  return (t, state, out) => {
    rates = out as Float64Array<ArrayBuffer>;
    rates.fill(0);
    if (joined.size !== joinedCount) {
      joinedCount = joined.size;
      floorLayer = model.spaces.map((_, i) => layerOf(i, 'floor'));
      ceilingLayer = model.spaces.map((_, i) => layerOf(i, 'ceiling'));
    }
    readZones(network, layout, state, zones);
    for (let l = 0; l < layers; l++) {
      const basin = network.layers[l]?.basin;
      depths[l] = basin ? basinLevel(basin, volumes[l] ?? 0) : 0;
    }
    addReleases(t);
    addMixing();
    addWeirs();
    addUnits();
    addPeople();
    addNeighbours(t);
  };
}

function upperDensity(
  model: AirModel,
  molar: number | undefined,
  space: number,
  network: LayerNetwork,
): number {
  const { pressurePa, temperatureK } = model.input.ambient;
  const at = model.spaces[space]?.temperatureK ?? temperatureK;
  return ((molar ?? network.outdoorMolarMassKgPerMol) * pressurePa) / (MOLAR_GAS_CONSTANT * at);
}

function justBefore(t: number): number {
  return Number.isFinite(t) ? t * (1 - 1e-15) - 1e-12 : t;
}

/** Reduced gravity below which its root is made smooth [m/s2]: 0.2 ppm of carbon dioxide. */
const SMOOTH_BELOW = 1e-5;

/** Square root that ends in a smooth slope, so that flows fade and do not chatter. */
function smoothRoot(gravity: number): number {
  if (gravity >= SMOOTH_BELOW) return Math.sqrt(gravity);
  const share = gravity / SMOOTH_BELOW;
  return Math.sqrt(SMOOTH_BELOW) * share * (1.5 - 0.5 * share);
}
