import { describe, expect, it } from 'vitest';
import { freshAirDistribution } from '../../src/assessment/fresh-air-distribution.js';
import type { PhysicalFigure } from '../../src/assessment/plan-file.js';
import { distributionValue } from '../../src/science/room-air/input-distributions.js';

/** Width of the central nine tenths of the factor over its median [-]. */
function width(figure: PhysicalFigure): number {
  const { factor } = freshAirDistribution(figure);
  const at = (p: number) => distributionValue(factor, p);
  return (at(0.95) - at(0.05)) / at(0.5);
}
const decay = { value: 0.2, low: 0.16, high: 0.24, origin: 'measured' } as const;

describe('what the origin of a fresh air figure says about the air', () => {
  it('narrows from assumed over design to measured, and further with a tight interval', () => {
    const widths = [
      { value: 0.2, origin: 'assumed' } as const,
      { value: 0.2, origin: 'supplied' } as const,
      decay,
      { ...decay, low: 0.19, high: 0.21 },
    ].map(width);
    expect(widths).toEqual([...widths].sort((a, b) => b - a));
    expect(new Set(widths).size).toBe(4);
  });

  it('gives back the interval of a decay log as 2.5 and 97.5 percent points', () => {
    const { factor } = freshAirDistribution(decay);
    // 1.96 deviations on either side hold 95 % of a normal distribution, any table.
    expect(0.2 * distributionValue(factor, 0.025)).toBeCloseTo(0.16, 4);
    expect(0.2 * distributionValue(factor, 0.975)).toBeCloseTo(0.24, 4);
  });

  it('never believes a measurement better than 5 percent, and 10 percent without an interval', () => {
    const tight = freshAirDistribution({ ...decay, low: 0.1999, high: 0.2001 });
    expect(tight.factor).toMatchObject({ kind: 'normal', standardDeviation: 0.05 });
    const bare = freshAirDistribution({ value: 0.2, origin: 'measured', on: '2026-11-30' });
    expect(bare.factor).toMatchObject({ kind: 'normal', standardDeviation: 0.1 });
  });

  it('takes a bare number, a drawing and an old measurement for design figures', () => {
    const supplied = freshAirDistribution({ value: 0.2, origin: 'supplied' });
    expect(freshAirDistribution(0.2)).toEqual(supplied);
    expect(freshAirDistribution({ value: 0.2, origin: 'drawing' })).toEqual(supplied);
    expect(freshAirDistribution(decay, true)).toEqual(supplied);
    expect(distributionValue(supplied.factor, 0.5)).toBeCloseTo(0.8, 6);
  });

  it('does not sample what nobody knows: worst and best are both run', () => {
    expect(freshAirDistribution({ origin: 'unknown' }).atBothEnds).toBe(true);
    expect(freshAirDistribution({ origin: 'unknown', low: 0, high: 0.2 }).atBothEnds).toBe(true);
    expect(freshAirDistribution(decay).atBothEnds).toBe(false);
  });
});
