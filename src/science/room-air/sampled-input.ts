import { latinHypercube } from '../numerics/latin-hypercube.js';
import type { AirInput, AirOpening, AirSystem, AirUncertainty, Distribution } from './air-input.js';
import {
  DEFAULT_DISTRIBUTIONS,
  distributionValue,
  SAMPLED_INPUTS,
  type SampledInput,
} from './input-distributions.js';
import { usualLayers, type LayerParameters } from './layer-parameters.js';
import { volumeCurve } from './volume-curve.js';

/** One draw of everything that is uncertain. */
export interface Draw extends Readonly<Record<SampledInput, number>> {
  /** Probability at which each was drawn, for what has a distribution of its own. */
  readonly probabilities: Readonly<Record<SampledInput, number>>;
}

/** The draws of a run: the same seed gives the same draws. */
export function uncertaintyDraws(uncertainty: AirUncertainty): readonly Draw[] {
  const distributions = { ...DEFAULT_DISTRIBUTIONS, ...uncertainty.distributions };
  return latinHypercube(uncertainty.samples, SAMPLED_INPUTS.length, uncertainty.seed).map(
    (row): Draw => {
      const each = (of: (name: SampledInput, probability: number) => number) =>
        Object.fromEntries(
          SAMPLED_INPUTS.map((name, axis) => [name, of(name, row[axis] ?? 0.5)]),
        ) as Record<SampledInput, number>;
      return {
        ...each((name, probability) => distributionValue(distributions[name], probability)),
        probabilities: each((_, probability) => probability),
      };
    },
  );
}

/** Factor drawn for one thing: from a distribution of its own, at the probability all have. */
function drawn(draw: Draw, name: SampledInput, own: Distribution | undefined): number {
  const value = own ? distributionValue(own, draw.probabilities[name]) : draw[name];
  return Math.max(0, value);
}

function scaledSystem(system: AirSystem, draw: Draw): AirSystem {
  const factor = drawn(draw, 'freshAirFactor', system.flowFactor);
  return {
    ...system,
    ...(system.freshAirM3PerS === undefined
      ? {}
      : { freshAirM3PerS: system.freshAirM3PerS * factor }),
    ...(system.supplyM3PerS === undefined ? {} : { supplyM3PerS: system.supplyM3PerS * factor }),
    ...(system.extractM3PerS === undefined ? {} : { extractM3PerS: system.extractM3PerS * factor }),
    effectiveness:
      system.effectiveness === undefined || system.isEffectivenessUsual
        ? draw.mixingFactor
        : system.effectiveness,
  };
}

function scaledOpening(opening: AirOpening, draw: Draw): AirOpening {
  if (opening.dischargeCoefficient !== undefined) return opening;
  const isOutward = opening.from === 'outside' || opening.to === 'outside';
  return {
    ...opening,
    dischargeCoefficient: isOutward ? draw.removalCoefficient : draw.spreadCoefficient,
  };
}

/** Share of the variance of breath that all people of a place have in common [-]: a GSD of 1.10. */
const COMMON_BREATH = (Math.log(1.1) / Math.log(1.25)) ** 2;

/**
 * How much a crowd breathes over the median, where one person breathes so much [-].
 *
 * What differs from person to person averages out in a crowd; what they have in common (what they do,
 * how warm it is, how well the rate is known) does not.
 */
function crowdFactor(person: number, count: number): number {
  const share = COMMON_BREATH + (1 - COMMON_BREATH) / Math.max(1, count);
  return person ** Math.sqrt(share);
}

/** The input as one draw has it. */
export function sampledInput(input: AirInput, draw: Draw): AirInput {
  const amount = Math.max(0, draw.releaseFactor);
  const isOwn = input.uncertainty?.distributions?.breathFactor !== undefined;
  return {
    ...input,
    airSystems: (input.airSystems ?? []).map((system) => scaledSystem(system, draw)),
    openings: (input.openings ?? []).map((opening) => scaledOpening(opening, draw)),
    spaces: input.spaces.map((space) => ({
      ...space,
      volumeM3: volumeCurve(space).volumeM3 * drawn(draw, 'freeVolumeFactor', space.volumeFactor),
    })),
    infiltration: (input.infiltration ?? []).map((one) => ({
      ...one,
      airChangesPerHour: one.airChangesPerHour * drawn(draw, 'infiltrationFactor', one.factor),
    })),
    releases: (input.releases ?? []).map((release) => ({
      ...release,
      ...(release.amountMol === undefined ? {} : { amountMol: release.amountMol * amount }),
      ...(release.massKg === undefined ? {} : { massKg: release.massKg * amount }),
      ...(release.volumeM3 === undefined ? {} : { volumeM3: release.volumeM3 * amount }),
      ...(release.durationS === undefined
        ? {}
        : { durationS: release.durationS * draw.durationFactor }),
    })),
    occupants: (input.occupants ?? []).map((one) => {
      const factor = isOwn ? draw.breathFactor : crowdFactor(draw.breathFactor, one.count);
      if (one.carbonDioxideM3PerS === undefined) return { ...one, count: one.count * factor };
      return { ...one, carbonDioxideM3PerS: one.carbonDioxideM3PerS * factor };
    }),
  };
}

/** The layer parameters of one draw; what the input fixes stays fixed. */
export function sampledLayers(input: AirInput, draw: Draw): LayerParameters {
  const overrides = input.layers ?? {};
  const usual = usualLayers(overrides);
  return {
    ...usual,
    sourceDilution: overrides.sourceDilution ?? draw.sourceDilution,
    turbulenceMPerS: overrides.turbulenceVelocityMPerS ?? draw.turbulenceVelocityMPerS,
    fallEntrainment: overrides.fallEntrainment ?? draw.fallEntrainment,
    edgeEntrainment:
      overrides.edgeEntrainment ??
      (overrides.sourceDilution === undefined ? draw.edgeEntrainment : 0),
    smearM: overrides.smearHeightM ?? draw.smearHeightM,
    plumeConstant: draw.plumeConstant,
  };
}
