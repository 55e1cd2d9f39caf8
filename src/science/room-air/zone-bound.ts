import { GRAVITY_M_PER_S2 } from './air-constants.js';
import { OXYGEN, spaceAt, type AirModel } from './air-model.js';
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
  return model.releases.map((plan) => {
    const reachS = reachTimes(model, plan);
    const ambientK = model.input.ambient.temperatureK;
    const warmest = model.spaces.reduce(
      (most, space, i) =>
        Number.isFinite(reachS[i] ?? Infinity) ? Math.max(most, space.temperatureK) : most,
      model.spaces[plan.space]?.temperatureK ?? ambientK,
    );
    const roomK = model.spaces[plan.space]?.temperatureK ?? ambientK;
    const warmRatio = plan.molarMassKgPerMol / model.airKgPerMol;
    const stages = densityStages(model, plan, roomK);
    const manner = plan.source.manner ?? DEFAULT_MANNER;
    const volumeM3 = model.spaces[plan.space]?.curve.volumeM3 ?? 1;
    return {
      plan,
      reachS,
      gathering: gatheringOf(stages),
      isHeavyAtFirst: Math.max(...stages) > NEUTRAL_DENSITY_RATIO.max,
      isLightAtFirst: Math.min(...stages) < NEUTRAL_DENSITY_RATIO.min,
      warmFactor: warmest / ambientK,
      gPrime: GRAVITY_M_PER_S2 * Math.max(0, warmRatio - 1),
      startsLayered: startsAsLayer(manner, jetOf(model, plan, roomK), volumeM3),
    };
  });
}

/** Floor covered by the current of a release [m2], free spreading. */
function coveredArea(release: BoundRelease, t: number): number {
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
export function firstPassEnd(release: BoundRelease, floorAreaM2: number): number {
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

function hasFirstPass(release: BoundRelease): boolean {
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
      release.plan.space === space ? firstPassEnd(release, curve.floorAreaM2) : release.plan.startS,
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

/**
 * Episodes whose gas is bounded and not taken as mixed, at a time in a space.
 *
 * An episode is over once another that reaches the space has started after its own last release.
 */
function isCurrent(
  releases: readonly BoundRelease[],
  episode: string,
  space: number,
  t: number,
): boolean {
  let end = -Infinity;
  let started = false;
  for (const { plan, reachS } of releases) {
    if (plan.episode !== episode || (reachS[space] ?? Infinity) > t) continue;
    started = true;
    end = Math.max(end, Math.min(plan.endS, t));
  }
  if (!started) return false;
  return !releases.some(
    ({ plan, reachS }) =>
      plan.episode !== episode &&
      plan.startS > firstStart(releases, episode) &&
      plan.startS <= t &&
      Math.max(plan.startS, reachS[space] ?? Infinity) <= t &&
      plan.startS >= end &&
      firstStart(releases, plan.episode) >= end,
  );
}

function firstStart(releases: readonly BoundRelease[], episode: string): number {
  return releases.reduce(
    (first, { plan }) => (plan.episode === episode ? Math.min(first, plan.startS) : first),
    Infinity,
  );
}

/**
 * The bound at a mouth: mixed background plus the inventory bound of the current episode [-].
 *
 *   gas: mixed of what is not current + sum of the bounds, at most 1
 *   oxygen: oxygen of the background x (1 - sum of the bounds), at least 0
 *
 * @param model     resolved input
 * @param releases  all releases
 * @param mouth     mouth
 * @param t         time [s]
 * @param fractions well-mixed fraction of each component in the space of the mouth
 * @param out       written: oxygen, then each gas of the model
 */
export function writeZoneBound(
  model: AirModel,
  releases: readonly BoundRelease[],
  mouth: BoundMouth,
  t: number,
  fractions: Float64Array,
  out: Float64Array,
): void {
  const current = new Set(
    model.episodes.filter((episode) => isCurrent(releases, episode, mouth.space, t)),
  );
  const byGas = new Float64Array(model.gases.length);
  let sum = 0;
  let oxygenBound = 0;
  for (const [index, release] of releases.entries()) {
    if (!current.has(release.plan.episode)) continue;
    const bound = releaseBound(release, mouth, mouth.firstPassEndS[index] ?? 0, t);
    if (bound === 0) continue;
    for (const [gas, share] of Object.entries(release.plan.shares)) {
      if (gas === 'air') continue;
      if (gas === 'O2') oxygenBound += bound * share;
      else sum += bound * share;
      const at = model.gases.indexOf(gas);
      if (at >= 0) byGas[at] = (byGas[at] ?? 0) + bound * share;
    }
  }
  let currentMixed = 0;
  let currentOxygen = 0;
  const mixed = new Float64Array(model.gases.length);
  const background = new Float64Array(model.gases.length);
  for (const [k, one] of model.components.entries()) {
    if (k === OXYGEN) continue;
    const x = fractions[k] ?? 0;
    const at = model.gases.indexOf(one.gas);
    mixed[at] = (mixed[at] ?? 0) + x;
    if (one.episode !== undefined && current.has(one.episode)) {
      currentMixed += x;
      if (one.gas === 'O2') currentOxygen += x;
    } else background[at] = (background[at] ?? 0) + x;
  }
  const oxygen = fractions[OXYGEN] ?? 0;
  const left = 1 - currentMixed;
  const before = left > 1e-9 ? Math.max(0, oxygen - currentOxygen) / left : 0;
  out[0] = Math.min(oxygen, before * Math.max(0, 1 - Math.min(1, sum)));
  for (const [at, gas] of model.gases.entries()) {
    if (gas === 'O2') {
      const enriched = Math.min(1, oxygenBound);
      out[at + 1] = Math.max(oxygen, before * (1 - enriched) + enriched);
    } else {
      out[at + 1] = Math.min(1, Math.max(mixed[at] ?? 0, (background[at] ?? 0) + (byGas[at] ?? 0)));
    }
  }
}
