import { normalQuantile } from '../numerics/normal-quantile.js';
import type { Distribution } from './air-input.js';

/**
 * Value of a distribution at a probability [unit of the distribution].
 *
 *   inverse of the cumulative distribution
 *
 * @param one distribution
 * @param p   probability [-], 0 to 1
 * @returns value [unit of the distribution]
 * Source: own-derivation (normal quantile: acklam-2003). Assumes: nothing. Accuracy: exact; 1e-9
 * relative in the normal quantile.
 * @example distributionValue({ kind: 'triangular', low: 0, mode: 1, high: 2 }, 0.125) // 0.5
 */
export function distributionValue(one: Distribution, p: number): number {
  switch (one.kind) {
    case 'fixed':
      return one.value;
    case 'uniform':
      return one.low + p * (one.high - one.low);
    case 'logUniform':
      return one.low * (one.high / one.low) ** p;
    case 'normal':
      return one.mean + one.standardDeviation * normalQuantile(p);
    case 'lognormal':
      return one.median * one.geometricDeviation ** normalQuantile(p);
    case 'triangular': {
      const { low, mode, high } = one;
      const share = (mode - low) / (high - low);
      return p < share
        ? low + Math.sqrt(p * (high - low) * (mode - low))
        : high - Math.sqrt((1 - p) * (high - low) * (high - mode));
    }
  }
}

/** What is sampled, each with its distribution and where it comes from. */
export const SAMPLED_INPUTS = [
  'freshAirFactor',
  'infiltrationFactor',
  'mixingFactor',
  'removalCoefficient',
  'spreadCoefficient',
  'plumeConstant',
  'releaseFactor',
  'durationFactor',
  'sourceDilution',
  'turbulenceVelocityMPerS',
  'fallEntrainment',
  'edgeEntrainment',
  'smearHeightM',
  'breathFactor',
  'freeVolumeFactor',
] as const;

export type SampledInput = (typeof SAMPLED_INPUTS)[number];

/** Default distributions; source engineering-judgement unless said. */
export const DEFAULT_DISTRIBUTIONS: Readonly<Record<SampledInput, Distribution>> = {
  // Design value only; a measured rate is given its own, narrower normal distribution.
  freshAirFactor: { kind: 'lognormal', median: 0.8, geometricDeviation: 1.35 },
  infiltrationFactor: { kind: 'lognormal', median: 1, geometricDeviation: 2 },
  mixingFactor: { kind: 'triangular', low: 0.3, mode: 0.8, high: 1 },
  removalCoefficient: { kind: 'triangular', low: 0.35, mode: 0.45, high: 0.55 },
  spreadCoefficient: { kind: 'triangular', low: 0.6, mode: 0.75, high: 0.85 },
  plumeConstant: { kind: 'uniform', low: 0.115, high: 0.164 },
  releaseFactor: { kind: 'normal', mean: 1, standardDeviation: 0.02 },
  durationFactor: { kind: 'lognormal', median: 1, geometricDeviation: 1.5 },
  sourceDilution: { kind: 'logUniform', low: 1, high: 10 },
  turbulenceVelocityMPerS: { kind: 'lognormal', median: 0.01, geometricDeviation: 1.8 },
  fallEntrainment: { kind: 'logUniform', low: 0.03, high: 1 },
  edgeEntrainment: { kind: 'uniform', low: 0, high: 0.8 },
  smearHeightM: { kind: 'uniform', low: 0.1, high: 0.5 },
  breathFactor: { kind: 'lognormal', median: 1, geometricDeviation: 1.25 },
  // People, seats and scenery are seldom taken off in full.
  freeVolumeFactor: { kind: 'uniform', low: 0.92, high: 1 },
};
