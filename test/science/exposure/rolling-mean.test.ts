import { describe, expect, it } from 'vitest';
import { highestRollingMean } from '../../../src/science/exposure/rolling-mean.js';

/** Area under a piecewise linear series up to a time, sample by sample. */
function areaTo(t: number, timesS: readonly number[], values: readonly number[]): number {
  let area = 0;
  for (const [i, from] of timesS.entries()) {
    const to = timesS[i + 1];
    const a = values[i] ?? 0;
    const b = values[i + 1] ?? 0;
    if (to === undefined || from >= t) break;
    const until = Math.min(t, to);
    const end = a + ((until - from) / (to - from)) * (b - a);
    area += 0.5 * (a + end) * (until - from);
  }
  return area;
}

/** A fixed sequence of numbers from 0 to 1 that repeats after a long while. */
function sequence(seed: number): () => number {
  let state = seed;
  return () => {
    state = (state * 16_807) % 2_147_483_647;
    return state / 2_147_483_647;
  };
}

describe('the highest moving average', () => {
  it('is the best of all windows that end or start on a sample, for 200 uneven series, to 1e-9', () => {
    for (let seed = 1; seed <= 200; seed += 1) {
      const next = sequence(seed * 7919);
      const timesS = [0];
      while (timesS.length < 40) timesS.push((timesS.at(-1) ?? 0) + 0.5 + 20 * next());
      const values = timesS.map(() => next());
      const windowS = 5 + 100 * next();
      const last = timesS.at(-1) ?? 0;
      const ends = timesS.flatMap((t) => [t, t + windowS]);
      const best = ends
        .filter((t) => t - windowS >= 0 && t <= last)
        .map((t) => (areaTo(t, timesS, values) - areaTo(t - windowS, timesS, values)) / windowS)
        .reduce((most, one) => Math.max(most, one));
      const found = highestRollingMean(timesS, values, windowS);
      expect(found.value).toBeCloseTo(best, 9);
      const there = areaTo(found.atS, timesS, values) - areaTo(found.atS - windowS, timesS, values);
      expect(there / windowS).toBeCloseTo(best, 9);
    }
  });

  it('is 1 over a window inside a plateau, and reports the first end of it', () => {
    const timesS = [0, 10, 20, 30, 40, 50];
    expect(highestRollingMean(timesS, [0, 1, 1, 1, 1, 0], 20)).toEqual({ value: 1, atS: 30 });
  });

  it('is one half under a triangle as wide as the window, whose area is half of its box', () => {
    expect(highestRollingMean([0, 100, 110, 120, 300], [0, 0, 1, 0, 0], 20).value).toBeCloseTo(
      0.5,
      12,
    );
  });
});
