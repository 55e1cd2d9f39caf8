import type { Distribution } from '../science/room-air/air-input.js';
import type { PhysicalFigure } from './plan-file.js';

/** What is known of a fresh air figure, as a factor on its stated value. */
export interface FreshAirDistribution {
  /** Factor on the value as the plan file states it: neither credited in part nor taken at an end. */
  readonly factor: Distribution;
  /** True where nothing is known: the run is made at the credible worst and best, not sampled. */
  readonly atBothEnds: boolean;
  readonly why: string;
  readonly source: string;
}

/** Half the width of a 95 % interval in standard deviations. */
const halfWidth = 1.96;
/** Volume and mixing are never known better than this [-]. */
const leastDeviation = 0.05;

const design: FreshAirDistribution = {
  factor: { kind: 'lognormal', median: 0.8, geometricDeviation: 1.35 },
  atBothEnds: false,
  why: 'a design or supplied figure: plant often delivers less than it was drawn for',
  source: 'engineering-judgement',
};

const assumed: FreshAirDistribution = {
  factor: { kind: 'lognormal', median: 0.7, geometricDeviation: 1.6 },
  atBothEnds: false,
  why: 'an assumed figure: nobody has looked, so lower and wider than a design figure',
  source: 'engineering-judgement',
};

const unknown: FreshAirDistribution = {
  factor: { kind: 'fixed', value: 1 },
  atBothEnds: true,
  why: 'not known: run at the credible worst and at the best',
  source: 'engineering-judgement',
};

/**
 * How the origin of a fresh air figure turns into a distribution: what was measured is narrow, what
 * was assumed is wide.
 *
 * With an interval, as a decay log gives it, a measured figure is normal with the deviation of the
 * interval, at least 5 %; measured otherwise 10 % (judgement). A design or supplied figure is
 * lognormal, median 0.8, geometric deviation 1.35; an assumed one 0.7 and 1.6 (judgement).
 *
 * @param figure the figure of the plan file; a bare number counts as supplied
 * @param isOld  whether a measurement has outlived what it was made for: then it is a design figure
 */
export function freshAirDistribution(figure: PhysicalFigure, isOld = false): FreshAirDistribution {
  if (typeof figure === 'number') return design;
  const { value, low, high, origin = 'supplied' } = figure;
  if (origin === 'unknown' || value === undefined) return unknown;
  if (origin === 'assumed') return assumed;
  if (origin !== 'measured' || isOld) return design;
  const hasInterval = low !== undefined && high !== undefined && high > low && value > 0;
  const deviation = hasInterval ? (high - low) / (2 * halfWidth) / value : 0.1;
  return {
    factor: {
      kind: 'normal',
      mean: 1,
      standardDeviation: Math.max(leastDeviation, deviation),
    },
    atBothEnds: false,
    why: hasInterval
      ? 'measured, with the deviation of its 95 % interval, at least 5 %'
      : 'measured, no interval given: 10 %',
    source: hasInterval ? 'astm-e741' : 'engineering-judgement',
  };
}

/** The same distribution of a factor that counts from another value: all of it times a number. */
export function scaledDistribution(one: Distribution, by: number): Distribution {
  switch (one.kind) {
    case 'fixed':
      return { ...one, value: one.value * by };
    case 'uniform':
    case 'logUniform':
      return { ...one, low: one.low * by, high: one.high * by };
    case 'normal':
      return { ...one, mean: one.mean * by, standardDeviation: one.standardDeviation * by };
    case 'lognormal':
      return { ...one, median: one.median * by };
    case 'triangular':
      return { ...one, low: one.low * by, mode: one.mode * by, high: one.high * by };
  }
}
