import { describe, expect, it } from 'vitest';
import { sortedQuantile } from '../../../src/science/numerics/quantile.js';

describe('quantile of a sorted list (Hyndman and Fan 1996, definition 7: h = (n - 1) p + 1)', () => {
  it('lies at rank h, a fraction of the way to the next: 1.9 of ten squares at 10 %', () => {
    // h = 1.9 of 1, 4, 9 ... 100: 1 + 0.9 x 3 = 3.7, worked by hand.
    const squares = Array.from({ length: 10 }, (_, i) => (i + 1) ** 2);
    expect(sortedQuantile(squares, 0.1)).toBeCloseTo(3.7, 12);
  });

  it('gives the ends at 0 and 1, and the only value of a list of one at any probability', () => {
    expect(sortedQuantile([2, 3, 7], 0)).toBe(2);
    expect(sortedQuantile([2, 3, 7], 1)).toBe(7);
    expect(sortedQuantile([5], 0.3)).toBe(5);
  });
});
