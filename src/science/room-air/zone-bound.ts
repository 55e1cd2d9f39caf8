import { GRAVITY_M_PER_S2 } from './air-constants.js';
import { OXYGEN, spaceAt, type AirModel } from './air-model.js';
import type { FlatTrack } from './answer-track.js';
import { episodeEndsS } from './episode-end.js';
import { frontRadiusAtOnce, frontRadiusContinuous } from './gravity-current.js';
import { fogDensityRatio } from './fog-density.js';
import {
  firstPassBound,
  gatheringOf,
  inventoryBound,
  NEUTRAL_DENSITY_RATIO,
  slabBound,
  type Gathering,
} from './inventory-bound.js';
import type { GasJet } from './momentum.js';
import { DEFAULT_MANNER, startsAsLayer } from './release-manner.js';
import { releasedVolume, releaseFlow, type ReleasePlan } from './release-flow.js';
import {
  keepWorse,
  runFractions,
  worseOf,
  writeFractions,
  type MixedRuns,
} from './mixed-values.js';
import { reachTimes } from './release-reach.js';
import { ownVolumeAbove, ownVolumeBelow } from './volume-curve.js';

/** A release as the bound sees it. */
export interface BoundRelease {
  readonly plan: ReleasePlan;
  readonly reachS: Float64Array;
  readonly gathering: Gathering;
  /** Clearly heavier, or lighter, than air at some stage: a slab may then lie there first. */
  readonly isHeavyAtFirst: boolean;
  readonly isLightAtFirst: boolean;
  /** Volume at the warmest reached space over volume at ambient [-]. */
  readonly warmFactor: number;
  readonly gPrime: number;
  readonly startsLayered: boolean;
  /** End of its first pass in the space where it is let out [s]. */
  readonly passEndS: number;
  /** From when on a later episode has closed it, by space; undefined: never. */
  readonly endsS: Float64Array | undefined;
  /** Share of each gas, air left out: index among the gases of the model, fraction. */
  readonly gases: readonly (readonly [gas: number, share: number])[];
}

/** Earliest moment at which the first-pass bound is asked [s]: before, it is still the source. */
export const FIRST_PASS_FROM_S = 1;

/** Temperature of a fog source over water from which its gas may be near neutral [K]. */
const WARM_FOG_K = 323.15;
/** Shares of the water vapour that may have condensed by the time the fog spreads [-]. */
const FOG_CONDENSED = [0, 0.5] as const;

/** Density ratios to room air of a release, from its source to room temperature [-]. */
function densityStages(model: AirModel, plan: ReleasePlan, roomK: number): readonly number[] {
  const warm = plan.molarMassKgPerMol / model.airKgPerMol;
  const sourceK = plan.source.temperatureK ?? roomK;
  const stages = [(warm * roomK) / sourceK, warm];
  if (plan.source.manner !== 'fog' || sourceK <= roomK) return stages;
  // Warm fog carries water vapour, which can make even carbon dioxide as light as air.
  const moist = FOG_CONDENSED.map((share) =>
    fogDensityRatio(
      plan.molarMassKgPerMol,
      model.airKgPerMol,
      sourceK,
      roomK,
      model.input.ambient.pressurePa,
      share,
    ),
  );
  return sourceK >= WARM_FOG_K ? [...stages, ...moist, 1] : [...stages, ...moist];
}

/** The nozzle of a jet, where it is known and gas flows. */
function jetOf(model: AirModel, plan: ReleasePlan, roomK: number): GasJet | undefined {
  const { outletDiameterM, temperatureK } = plan.source;
  const flowM3PerS = releaseFlow(plan, plan.startS);
  if (outletDiameterM === undefined || flowM3PerS <= 0) return undefined;
  const airDensityKgPerM3 = model.airKgPerMol / model.molarVolumeM3;
  const warm = plan.molarMassKgPerMol / model.airKgPerMol;
  return {
    flowM3PerS,
    diameterM: outletDiameterM,
    gasDensityKgPerM3: (airDensityKgPerM3 * warm * roomK) / (temperatureK ?? roomK),
    airDensityKgPerM3,
  };
}

/** All releases with the spaces they reach and how they gather. */
export function boundReleases(model: AirModel): readonly BoundRelease[] {
  const reach = reachTimes(model);
  const ends = episodeEndsS(
    model.releases.map((plan, i) => ({ plan, reachS: reach[i] ?? new Float64Array(0) })),
    model.spaces.length,
  );
  return model.releases.map((plan, i) => {
    const reachS = reach[i] ?? new Float64Array(0);
    const ambientK = model.input.ambient.temperatureK;
    const warmest = model.spaces.reduce(
      (most, space, at) =>
        Number.isFinite(reachS[at] ?? Infinity) ? Math.max(most, space.temperatureK) : most,
      model.spaces[plan.space]?.temperatureK ?? ambientK,
    );
    const roomK = model.spaces[plan.space]?.temperatureK ?? ambientK;
    const warmRatio = plan.molarMassKgPerMol / model.airKgPerMol;
    const stages = densityStages(model, plan, roomK);
    const manner = plan.source.manner ?? DEFAULT_MANNER;
    const volumeM3 = model.spaces[plan.space]?.curve.volumeM3 ?? 1;
    const spreading: Spreading = {
      plan,
      gathering: gatheringOf(stages),
      warmFactor: warmest / ambientK,
      gPrime: GRAVITY_M_PER_S2 * Math.max(0, warmRatio - 1),
      startsLayered: startsAsLayer(manner, jetOf(model, plan, roomK), volumeM3),
    };
    return {
      ...spreading,
      reachS,
      isHeavyAtFirst: Math.max(...stages) > NEUTRAL_DENSITY_RATIO.max,
      isLightAtFirst: Math.min(...stages) < NEUTRAL_DENSITY_RATIO.min,
      passEndS: firstPassEnd(spreading, spaceAt(model, plan.space).curve.floorAreaM2),
      endsS: ends.get(plan.episode),
      gases: Object.entries(plan.shares).flatMap(([gas, share]) => {
        const at = model.gases.indexOf(gas);
        return at < 0 ? [] : [[at, share] as const];
      }),
    };
  });
}

/** What the spreading of a release over a floor depends on. */
type Spreading = Pick<
  BoundRelease,
  'plan' | 'gathering' | 'warmFactor' | 'gPrime' | 'startsLayered'
>;

/** Floor covered by the current of a release [m2], free spreading. */
function coveredArea(release: Spreading, t: number): number {
  const { plan, warmFactor, gPrime } = release;
  const since = t - plan.startS;
  const gas = releasedVolume(plan, t) * warmFactor;
  const radius =
    plan.endS <= plan.startS
      ? frontRadiusAtOnce(gas, gPrime, since)
      : frontRadiusContinuous(gas / Math.max(since, 1e-9), gPrime, since);
  return Math.PI * radius ** 2;
}

/**
 * End of the first pass of a release over the floor [s].
 *
 *   start + 2 t, t from the area of the front, pi r(t)^2, reaching the floor area
 *
 * @param release    release with its manner and reduced gravity
 * @param floorAreaM2 floor of the space [m2], above 0
 * @returns time by which the floor is covered and the run-up at the walls is back [s]; the start
 *   of the release when it does not spread as a dense current
 * Source: own-room-air (front after huppert-simpson-1980; twice is engineering judgement).
 * Assumes: round front, still air, no entrainment. Accuracy: judgement.
 */
export function firstPassEnd(release: Spreading, floorAreaM2: number): number {
  const { plan } = release;
  if (!hasFirstPass(release)) return plan.startS;
  let low = 0;
  let high = 1;
  while (coveredArea(release, plan.startS + high) < floorAreaM2 && high < 3600) high *= 2;
  for (let i = 0; i < 30; i++) {
    const middle = 0.5 * (low + high);
    if (coveredArea(release, plan.startS + middle) < floorAreaM2) low = middle;
    else high = middle;
  }
  return plan.startS + 2 * high;
}

function hasFirstPass(release: Spreading): boolean {
  return release.gathering === 'below' && release.startsLayered && release.gPrime > 0;
}

/** One mouth of one zone, ready to be asked. */
export interface BoundMouth {
  readonly space: number;
  readonly heightM: number;
  readonly belowM3: number;
  readonly aboveM3: number;
  readonly floorAreaM2: number;
  /** By release: end of its first pass in this space. */
  readonly firstPassEndS: readonly number[];
}

/** A mouth with the volumes below and above it [m3] and the first passes of each release [s]. */
export function boundMouth(
  model: AirModel,
  releases: readonly BoundRelease[],
  space: number,
  floorLevelM: number | undefined,
  heightM: number,
): BoundMouth {
  const { curve } = spaceAt(model, space);
  const floor = floorLevelM ?? curve.floorLevelM;
  return {
    space,
    heightM,
    belowM3: ownVolumeBelow(curve, floor, heightM),
    aboveM3: ownVolumeAbove(curve, floor, heightM),
    floorAreaM2: curve.floorAreaM2,
    firstPassEndS: releases.map((release) =>
      release.plan.space === space ? release.passEndS : release.plan.startS,
    ),
  };
}

/** Bound fraction of one release at a mouth [-], its whole mixture. */
function releaseBound(
  release: BoundRelease,
  mouth: BoundMouth,
  firstPassEndS: number,
  t: number,
): number {
  if (t < (release.reachS[mouth.space] ?? Infinity)) return 0;
  const gas = releasedVolume(release.plan, t) * release.warmFactor;
  switch (release.gathering) {
    case 'slab':
      // Below 0.3 m, on a rake or in a pit the cold stage lies shallower than the slab.
      return Math.max(
        slabBound(gas, mouth.floorAreaM2),
        release.isHeavyAtFirst ? inventoryBound(gas, mouth.belowM3) : 0,
        release.isLightAtFirst ? inventoryBound(gas, mouth.aboveM3) : 0,
      );
    case 'above':
      return inventoryBound(gas, mouth.aboveM3);
    case 'below': {
      const settled = inventoryBound(gas, mouth.belowM3);
      const since = t - release.plan.startS;
      if (t >= firstPassEndS || since < FIRST_PASS_FROM_S) return settled;
      const covered = Math.min(mouth.floorAreaM2, coveredArea(release, t));
      return Math.max(settled, firstPassBound(gas, covered, mouth.heightM));
    }
  }
}

/** Adds the bound of one release to the sums by gas. */
function addBound(release: BoundRelease, bound: number, byGas: Float64Array): void {
  for (const [gas, share] of release.gases) byGas[gas] = (byGas[gas] ?? 0) + bound * share;
}

const isClosed = (release: BoundRelease, space: number, t: number): boolean =>
  release.endsS !== undefined && t >= (release.endsS[space] ?? Infinity);

/**
 * Sums of the bounds of all gas that no reading has closed, by gas of the model [-].
 *
 * @param releases all releases
 * @param mouth    mouth
 * @param t        time [s]
 * @param byGas    written; not capped
 */
function writeBoundSums(
  releases: readonly BoundRelease[],
  mouth: BoundMouth,
  t: number,
  byGas: Float64Array,
): void {
  byGas.fill(0);
  for (const [index, release] of releases.entries()) {
    if (isClosed(release, mouth.space, t)) continue;
    addBound(release, releaseBound(release, mouth, mouth.firstPassEndS[index] ?? 0, t), byGas);
  }
}

/**
 * The same sums at all nodes of a run, in one pass.
 *
 * A release that is over and has settled does not change any more: it is added once to a sum that is
 * kept. Only what flows, spreads or has yet to come is asked at every node.
 */
function boundSums(
  releases: readonly BoundRelease[],
  mouth: BoundMouth,
  timesS: Float64Array,
  gases: number,
): Float64Array {
  const { space, firstPassEndS } = mouth;
  const coming = [...releases.keys()]
    .filter((index) => (releases[index]?.reachS[space] ?? Infinity) < Infinity)
    .sort((a, b) => (releases[a]?.reachS[space] ?? 0) - (releases[b]?.reachS[space] ?? 0));
  const settled = new Float64Array(gases);
  const now = new Float64Array(gases);
  // Closed episodes leave the kept sum again, so theirs are not put there.
  let active: number[] = [];
  let next = 0;
  const sums = new Float64Array(timesS.length * gases);
  for (let node = 0; node < timesS.length; node++) {
    const t = timesS[node] ?? 0;
    for (; next < coming.length; next++) {
      const index = coming[next] ?? 0;
      if ((releases[index]?.reachS[space] ?? Infinity) > t) break;
      active.push(index);
    }
    now.set(settled);
    let ended = false;
    for (const index of active) {
      const release = releases[index];
      if (!release) continue;
      const passEndS = firstPassEndS[index] ?? 0;
      if (isClosed(release, space, t)) {
        ended = true;
        continue;
      }
      const bound = releaseBound(release, mouth, passEndS, t);
      addBound(release, bound, now);
      if (release.endsS || t < release.plan.endS || t < passEndS) continue;
      addBound(release, bound, settled);
      ended = true;
    }
    if (ended) {
      active = active.filter((index) => {
        const release = releases[index];
        if (!release || isClosed(release, space, t)) return false;
        return (
          release.endsS !== undefined || t < release.plan.endS || t < (firstPassEndS[index] ?? 0)
        );
      });
    }
    sums.set(now, node * gases);
  }
  return sums;
}

/** For each component, when its gas in a space is bounded instead of mixed [s]: from, until. */
function boundedSpans(
  model: AirModel,
  releases: readonly BoundRelease[],
  space: number,
): readonly (readonly [fromS: number, untilS: number])[] {
  const spans = new Map<string, [number, number]>();
  for (const { plan, reachS, endsS } of releases) {
    const origin = model.origins.get(plan.index) ?? '';
    const from = reachS[space] ?? Infinity;
    const known = spans.get(origin);
    if (known) known[0] = Math.min(known[0], from);
    else spans.set(origin, [from, endsS?.[space] ?? Infinity]);
  }
  return model.components.map(
    (one) => (one.origin === undefined ? undefined : spans.get(one.origin)) ?? [Infinity, Infinity],
  );
}

/**
 * Bound from the mixed fractions and the sums of the bounds [-].
 *
 *   gas: mixed of what is not bounded + sum of the bounds, at most 1
 *   oxygen: oxygen of the background x (1 - sum of the bounds), at least 0
 *
 * @param model    resolved input
 * @param bounded  by component: whether its gas is bounded
 * @param fractions well-mixed fraction of each component in the space of the mouth
 * @param byGas    sums of the bounds, from `sumsAt` on
 * @param out      written: oxygen, then each gas of the model
 */
function writeBound(
  model: AirModel,
  bounded: Uint8Array,
  fractions: Float64Array,
  byGas: Float64Array,
  sumsAt: number,
  work: BoundWork,
  out: Float64Array,
): void {
  const { columns, oxygenGas, mixed, background } = work;
  const gases = model.gases.length;
  mixed.fill(0);
  background.fill(0);
  let boundedMixed = 0;
  let boundedOxygen = 0;
  for (let k = 0; k < columns.length; k++) {
    if (k === OXYGEN) continue;
    const x = fractions[k] ?? 0;
    const at = columns[k] ?? 0;
    mixed[at] = (mixed[at] ?? 0) + x;
    if (bounded[k] === 1) {
      boundedMixed += x;
      if (at === oxygenGas) boundedOxygen += x;
    } else background[at] = (background[at] ?? 0) + x;
  }
  let sum = 0;
  for (let g = 0; g < gases; g++) if (g !== oxygenGas) sum += byGas[sumsAt + g] ?? 0;
  const oxygen = fractions[OXYGEN] ?? 0;
  const left = 1 - boundedMixed;
  const before = left > 1e-9 ? Math.max(0, oxygen - boundedOxygen) / left : 0;
  out[0] = Math.min(oxygen, before * Math.max(0, 1 - Math.min(1, sum)));
  for (let g = 0; g < gases; g++) {
    const most = byGas[sumsAt + g] ?? 0;
    if (g === oxygenGas) {
      const enriched = Math.min(1, most);
      out[g + 1] = Math.max(oxygen, before * (1 - enriched) + enriched);
    } else {
      out[g + 1] = Math.min(1, Math.max(mixed[g] ?? 0, (background[g] ?? 0) + most));
    }
  }
}

interface BoundWork {
  /** Gas of each component; oxygen as a gas, or -1. */
  readonly columns: Int32Array;
  readonly oxygenGas: number;
  readonly mixed: Float64Array;
  readonly background: Float64Array;
}

function boundWork(model: AirModel): BoundWork {
  return {
    columns: Int32Array.from(model.components, (one) => model.gases.indexOf(one.gas)),
    oxygenGas: model.gases.indexOf('O2'),
    mixed: new Float64Array(model.gases.length),
    background: new Float64Array(model.gases.length),
  };
}

/** At the end of a piece nothing of the next one has been released yet. */
const justBefore = (t: number): number => t - 1e-9 * Math.max(1, t);

/**
 * The bound at a mouth over the whole time: mixed background plus the inventory bound of all gas
 * that no reading has closed [-]; the worse of all runs.
 *
 * @param model    resolved input
 * @param runs     well-mixed runs
 * @param releases all releases
 * @param mouth    mouth
 * @returns oxygen, then each gas of the model, at the nodes of the runs
 */
export function boundTrack(
  model: AirModel,
  runs: MixedRuns,
  releases: readonly BoundRelease[],
  mouth: BoundMouth,
): FlatTrack {
  const { displacement, tracks } = runs;
  const [first] = tracks;
  const { timesS, firstNode } = first;
  const n = model.spaces.length;
  const m = model.components.length;
  const { space } = mouth;
  const gases = model.gases.length;
  const width = gases + 1;
  const spans = boundedSpans(model, releases, space);
  const work = boundWork(model);
  const askedS = Float64Array.from(timesS);
  for (let piece = 1; piece + 1 < firstNode.length; piece++) {
    const end = (firstNode[piece] ?? 0) - 1;
    askedS[end] = justBefore(askedS[end] ?? 0);
  }
  const sums = boundSums(releases, mouth, askedS, gases);
  const values = new Float64Array(timesS.length * width);
  const fractions = new Float64Array(m);
  const row = new Float64Array(width);
  const bounded = new Uint8Array(m);
  const setBounded = (t: number): void => {
    for (let k = 0; k < m; k++) {
      const span = spans[k];
      bounded[k] = span && t >= span[0] && t < span[1] ? 1 : 0;
    }
  };
  for (let piece = 0; piece + 1 < firstNode.length; piece++) {
    const until = firstNode[piece + 1] ?? 0;
    for (let node = firstNode[piece] ?? 0; node < until; node++) {
      setBounded(askedS[node] ?? 0);
      const offset = (node * n + space) * m;
      for (const track of tracks) {
        const capacity = track.capacities[piece]?.[space] ?? 1;
        writeFractions(model, track.amounts, offset, capacity, displacement, fractions);
        writeBound(model, bounded, fractions, sums, node * gases, work, row);
        if (track === first) values.set(row, node * width);
        else keepWorse(row, values, node * width, width);
      }
    }
  }
  const byGas = new Float64Array(gases);
  return {
    timesS,
    firstNode,
    width,
    values,
    slopes: undefined,
    valuesAt: (piece, t) => {
      setBounded(t);
      writeBoundSums(releases, mouth, t, byGas);
      return runFractions(model, runs, piece, space, t)
        .map((one): Float64Array => {
          const found = new Float64Array(width);
          writeBound(model, bounded, one, byGas, 0, work, found);
          return found;
        })
        .reduce(worseOf);
    },
  };
}
