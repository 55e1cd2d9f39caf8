import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { linePoints } from '../../src/assessment/line-points.js';

const times = (count: number) => Array.from({ length: count }, (_, i) => i * 30);

describe('linePoints', () => {
  it('keeps two points of a straight line and the bend of a bent one', () => {
    expect(linePoints(times(50), [times(50)], 0.001)).toEqual([0, 49]);
    const bent = times(50).map((_, i) => Math.abs(i - 20));
    expect(linePoints(times(50), [bent], 0.001)).toEqual([0, 20, 49]);
  });

  it('keeps the lowest and highest point of every row', () => {
    const one = [0, 0, 5, 0, 0, 0];
    const other = [1, 1, 1, 1, -4, 1];
    const kept = linePoints(times(6), [one, other], 0.5);
    expect(kept).toContain(2);
    expect(kept).toContain(4);
  });

  it('leaves no point further from the drawn line than the tolerance, whatever the curve', () => {
    fc.assert(
      fc.property(fc.array(fc.double({ min: 0, max: 1, noNaN: true }), { minLength: 3 }), (row) => {
        const kept = linePoints(times(row.length), [row], 0.05);
        const tolerance = 0.05 * (Math.max(...row) - Math.min(...row)) + 1e-12;
        kept.slice(1).forEach((to, index) => {
          const from = kept[index] ?? 0;
          for (let i = from; i <= to; i++) {
            const share = (i - from) / (to - from);
            const drawn = (row[from] ?? 0) + share * ((row[to] ?? 0) - (row[from] ?? 0));
            expect(Math.abs(drawn - (row[i] ?? 0))).toBeLessThanOrEqual(tolerance);
          }
        });
      }),
      { seed: 4, numRuns: 200 },
    );
  });
});
