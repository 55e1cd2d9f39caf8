import { airMolarMass, type AirGasTable } from './air-gases.js';
import type { AirInput, AirRelease } from './air-input.js';
import {
  CARBON_DIOXIDE_OUTDOORS,
  OXYGEN_IN_DRY_AIR,
  REFERENCE_PRESSURE_PA,
  REFERENCE_TEMPERATURE_K,
} from './air-constants.js';
import { airGroups } from './air-groups.js';
import { closedEpisodes } from './episode-end.js';
import { releaseMolarMass, type ReleasePlan } from './release-flow.js';
import { idealMolarVolume } from './site-volume.js';
import { vapourPressure } from './water-vapour.js';
import { volumeCurve, type VolumeCurve } from './volume-curve.js';

/** What is followed through the spaces: oxygen, background carbon dioxide, gases by origin. */
export interface AirComponent {
  readonly gas: string;
  /** Key of the releases it comes from; undefined: held at the start, breathed out or outdoor. */
  readonly origin: string | undefined;
  /** Molar mass less that of air [kg/mol]; 0 for oxygen, which counts as air. */
  readonly excessKgPerMol: number;
  /** Fraction in outdoor air. */
  readonly outdoors: number;
}

export interface SpaceModel {
  readonly id: string;
  readonly curve: VolumeCurve;
  readonly temperatureK: number;
  /** Net volume brought to ambient temperature [m3]: amounts are kept in ambient volumes. */
  readonly capacityM3: number;
  /** Fractions at the start, one per component. */
  readonly initial: Float64Array;
}

/** The input with defaults filled in and names resolved to numbers. */
export interface AirModel {
  readonly input: AirInput;
  readonly spaces: readonly SpaceModel[];
  readonly indexOf: ReadonlyMap<string, number>;
  readonly components: readonly AirComponent[];
  readonly releases: readonly ReleasePlan[];
  /** By index of the release in the input: the key of its components. */
  readonly origins: ReadonlyMap<number, string>;
  /** Gas ids of the answer, in order. */
  readonly gases: readonly string[];
  readonly airKgPerMol: number;
  readonly molarVolumeM3: number;
  readonly vapourPressurePa: number;
  /** Ambient volume of a volume at 293.15 K and 101 325 Pa [-]. */
  readonly siteFactor: number;
  /** Times at which a flow may jump, 0 and the end included. */
  readonly edgesS: readonly number[];
}

/** Column of oxygen and of background carbon dioxide among the components. */
export const OXYGEN = 0;
export const BACKGROUND_CO2 = 1;

function releaseShares(release: AirRelease): Readonly<Record<string, number>> {
  if (release.composition) {
    const sum = Object.values(release.composition).reduce((total, share) => total + share, 0);
    return Object.fromEntries(
      Object.entries(release.composition)
        .filter(([, share]) => share > 0)
        .map(([gas, share]) => [gas, share / sum]),
    );
  }
  return { [release.gas ?? 'air']: 1 };
}

function releasePlan(
  release: AirRelease,
  index: number,
  space: number,
  gases: AirGasTable,
  airKgPerMol: number,
  molarVolumeM3: number,
): ReleasePlan {
  const shares = releaseShares(release);
  const molarMass = releaseMolarMass(shares, gases, airKgPerMol);
  const amountMol =
    release.amountMol ??
    (release.massKg !== undefined
      ? release.massKg / molarMass
      : (release.volumeM3 ?? 0) / molarVolumeM3);
  const startS = release.startS ?? 0;
  const duration = release.durationS ?? 0;
  const decaying = release.profile === 'decaying' && release.timeConstantS !== undefined;
  const endS = decaying && duration === 0 ? Infinity : startS + duration;
  return {
    index,
    space,
    episode: release.episode ?? release.id ?? `release ${String(index + 1)}`,
    totalM3: amountMol * molarVolumeM3,
    startS,
    endS,
    decayS: decaying ? release.timeConstantS : undefined,
    shares,
    molarMassKgPerMol: molarMass,
    source: release,
  };
}

function edgeTimes(input: AirInput, releases: readonly ReleasePlan[]): readonly number[] {
  const edges = new Set<number>([0, input.durationS]);
  const timed = [
    ...(input.openings ?? []),
    ...(input.airSystems ?? []),
    ...(input.infiltration ?? []),
    ...(input.transfers ?? []),
    ...(input.occupants ?? []),
  ];
  for (const one of timed) {
    if (one.fromS !== undefined) edges.add(one.fromS);
    if (one.toS !== undefined) edges.add(one.toS);
  }
  for (const release of releases) {
    edges.add(release.startS);
    if (Number.isFinite(release.endS)) edges.add(release.endS);
  }
  return [...edges].filter((t) => t >= 0 && t <= input.durationS).sort((a, b) => a - b);
}

/**
 * Which releases share their components: those of one closed episode, and all others together.
 *
 * Where a unit sends air round between groups of spaces that no opening joins, the groups are told
 * apart too: gas that comes only by the unit is mixed there and stands beside the bound.
 */
function releaseOrigins(
  input: AirInput,
  indexOf: ReadonlyMap<string, number>,
  releases: readonly ReleasePlan[],
): ReadonlyMap<number, string> {
  const closed = closedEpisodes(releases);
  const groups = airGroups(input, indexOf);
  const crosses = (input.airSystems ?? []).some(
    ({ recirculatedM3PerS = 0, serves = [] }) =>
      recirculatedM3PerS > 0 &&
      new Set(serves.map(({ space }) => groups[indexOf.get(space) ?? 0])).size > 1,
  );
  return new Map(
    releases.map(({ index, episode, space }) => [
      index,
      JSON.stringify([
        closed.has(episode) ? episode : null,
        crosses ? (groups[space] ?? null) : null,
      ]),
    ]),
  );
}

/** Oxygen at the start where the input names other gases only: air diluted by what was added. */
function initialFractions(
  initial: Readonly<Record<string, number>> & { readonly O2?: number },
  components: readonly AirComponent[],
): Float64Array {
  const fractions = Float64Array.from(components, (one) => one.outdoors);
  let added = 0;
  for (const [gas, value] of Object.entries(initial)) {
    if (gas === 'O2' || gas === 'air') continue;
    const column = components.findIndex((one) => one.gas === gas && one.origin === undefined);
    if (column < 0) continue;
    added += Math.max(0, value - (fractions[column] ?? 0));
    fractions[column] = value;
  }
  fractions[OXYGEN] = initial.O2 ?? OXYGEN_IN_DRY_AIR * Math.max(0, 1 - added);
  return fractions;
}

/**
 * The resolved model of one input.
 *
 * Amounts are kept as volumes at ambient temperature and pressure, so that a mole is the same
 * amount in every space; a space at another temperature holds accordingly more or less.
 */
export function airModel(input: AirInput, gases: AirGasTable): AirModel {
  const { ambient } = input;
  const airKgPerMol = airMolarMass(gases);
  const molarVolumeM3 = idealMolarVolume(ambient.temperatureK, ambient.pressurePa);
  const indexOf = new Map(input.spaces.map((space, index) => [space.id, index]));
  const releases = (input.releases ?? [])
    .map((release, index) =>
      releasePlan(
        release,
        index,
        indexOf.get(release.space) ?? 0,
        gases,
        airKgPerMol,
        molarVolumeM3,
      ),
    )
    .filter((plan) => plan.totalM3 > 0);
  const origins = releaseOrigins(input, indexOf, releases);
  const excess = (gas: string): number =>
    (gases[gas]?.molarMassKgPerMol ?? airKgPerMol) - airKgPerMol;
  const components: AirComponent[] = [
    { gas: 'O2', origin: undefined, excessKgPerMol: 0, outdoors: OXYGEN_IN_DRY_AIR },
    {
      gas: 'CO2',
      origin: undefined,
      excessKgPerMol: excess('CO2'),
      outdoors: ambient.carbonDioxideFraction ?? CARBON_DIOXIDE_OUTDOORS,
    },
  ];
  const add = (gas: string, origin: string | undefined): void => {
    if (gas === 'air' || components.some((one) => one.gas === gas && one.origin === origin)) {
      return;
    }
    components.push({ gas, origin, excessKgPerMol: excess(gas), outdoors: 0 });
  };
  for (const space of input.spaces) {
    for (const gas of Object.keys(space.initial ?? {})) if (gas !== 'O2') add(gas, undefined);
  }
  for (const release of releases) {
    for (const gas of Object.keys(release.shares)) add(gas, origins.get(release.index));
  }
  const spaces = input.spaces.map((space): SpaceModel => {
    const curve = volumeCurve(space);
    const temperatureK = space.temperatureK ?? ambient.temperatureK;
    return {
      id: space.id,
      curve,
      temperatureK,
      capacityM3: (curve.volumeM3 * ambient.temperatureK) / temperatureK,
      initial: initialFractions(space.initial ?? {}, components),
    };
  });
  const answered = new Set<string>(['CO2']);
  for (const [column, one] of components.entries()) if (column !== OXYGEN) answered.add(one.gas);
  return {
    input,
    spaces,
    indexOf,
    components,
    releases,
    origins,
    gases: [...answered].sort(),
    airKgPerMol,
    molarVolumeM3,
    vapourPressurePa: vapourPressure(ambient.temperatureK, ambient.relativeHumidity ?? 0.5),
    siteFactor:
      (ambient.temperatureK / REFERENCE_TEMPERATURE_K) *
      (REFERENCE_PRESSURE_PA / ambient.pressurePa),
    edgesS: edgeTimes(input, releases),
  };
}

/** The space at an index. */
export function spaceAt(model: AirModel, index: number): SpaceModel {
  const space = model.spaces[index];
  if (!space) throw new RangeError(`no space ${String(index)}`);
  return space;
}
