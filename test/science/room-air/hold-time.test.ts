import { describe, expect, it } from 'vitest';
import { clearFrom, holdTime } from '../../../src/science/room-air/hold-time.js';
import {
  clearDownTime,
  supplyControlledFraction,
} from '../../../src/science/room-air/well-mixed.js';
import { referenceRecords } from '../../support/reference-records.js';

const times = (endS: number, stepS: number): readonly number[] =>
  Array.from({ length: Math.round(endS / stepS) + 1 }, (_, i) => i * stepS);

/** Oxygen of the three-stage release of AC-W06 by chaining the closed form. */
function threeStageOxygen(t: number): number {
  const stages = [
    { fromS: 0, toS: 300, releaseM3PerS: 0.02 },
    { fromS: 300, toS: 600, releaseM3PerS: 0.005 },
    { fromS: 600, toS: 750, releaseM3PerS: 0.12 },
    { fromS: 750, toS: Infinity, releaseM3PerS: 0 },
  ];
  let gas = 0;
  for (const { fromS, toS, releaseM3PerS } of stages) {
    if (t <= fromS) break;
    gas = supplyControlledFraction(
      { volumeM3: 250, freshAirM3PerS: 0.15, releaseM3PerS, startFraction: gas },
      Math.min(t, toS) - fromS,
    );
  }
  return 0.2095 * (1 - gas);
}

describe('time until a series stays clear', () => {
  const timesS = times(1800, 5);
  const oxygen = timesS.map(threeStageOxygen);

  it('is the last crossing of 0.195 in the three-stage release of AC-W06', () => {
    const record = referenceRecords('air-checks.json', 'checks').find(({ id }) => id === 'AC-W06');
    const crossings = record?.expected.oxygen_crossing_times_s as readonly number[];
    // Straight between points 5 s apart: (5 s)^2/8 times curvature over slope is 0.002 s.
    expect(
      Math.abs((clearFrom(timesS, oxygen, 0.195, 'atLeast') ?? NaN) - (crossings[1] ?? 0)),
    ).toBeLessThan(0.01);
  });

  it('counts the hold from the end of the last release, and is 0 when that was clear already', () => {
    expect(holdTime(timesS, oxygen, 0.195, 'atLeast', 750)).toBeCloseTo(1120.77 - 750, 1);
    expect(holdTime(timesS, oxygen, 0.19, 'atLeast', 750)).toBe(0);
  });

  it('is the dilution time (V/Q) ln(x0/x1) for a gas that thins out', () => {
    const gas = timesS.map((t) => 0.03 * Math.exp((-0.25 * t) / 300));
    const exact = clearDownTime(300, 0.25, 0.03, 0.01);
    expect(holdTime(timesS, gas, 0.01, 'atMost', 0)).toBeCloseTo(exact, 1);
  });

  it('does not exist when the level is not met within the series', () => {
    const gas = timesS.map((t) => 0.03 * Math.exp((-0.25 * t) / 300));
    expect(holdTime(timesS, gas, 0.001, 'atMost', 0)).toBeUndefined();
  });

  it('takes the last return when a series is clear for a while and then not', () => {
    expect(clearFrom([0, 10, 20, 30, 40], [0.04, 0.01, 0.04, 0.02, 0], 0.03, 'atMost')).toBeCloseTo(
      25,
      12,
    );
  });
});
