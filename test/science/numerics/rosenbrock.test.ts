import { describe, expect, it } from 'vitest';
import { stiffState } from '../../../src/science/numerics/rosenbrock.js';

const options = { relative: 1e-8, absolute: 1e-11, maxStepS: 100 };

describe('linearly implicit integration', () => {
  it('solves the stiff reaction problem of Robertson to four digits of its published answer', () => {
    // Hairer and Wanner 1996, section IV.1, problem ROBER: y at t = 40 is 0.7158, 9.185e-6, 0.2842.
    const y = stiffState(
      (_, s, out) => {
        const [a = 0, b = 0, c = 0] = s;
        const toA = -0.04 * a + 1e4 * b * c;
        const toC = 3e7 * b * b;
        out[0] = toA;
        out[1] = -toA - toC;
        out[2] = toC;
      },
      Float64Array.of(1, 0, 0),
      0,
      40,
      options,
    );
    expect(y[0]).toBeCloseTo(0.7158, 4);
    expect(y[1]).toBeCloseTo(9.185e-6, 8);
    expect(y[2]).toBeCloseTo(0.2842, 4);
    expect((y[0] ?? 0) + (y[1] ?? 0) + (y[2] ?? 0)).toBeCloseTo(1, 12);
  });

  it('follows the exact answer of a fast and a slow decay within its tolerance', () => {
    const y = stiffState(
      (_, s, out) => {
        out[0] = -500 * ((s[0] ?? 0) - (s[1] ?? 0));
        out[1] = -0.1 * (s[1] ?? 0);
      },
      Float64Array.of(2, 1),
      0,
      10,
      options,
    );
    expect(y[1]).toBeCloseTo(Math.exp(-1), 7);
    expect(y[0]).toBeCloseTo((500 / 499.9) * Math.exp(-1), 7);
  });
});
