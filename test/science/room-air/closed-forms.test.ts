import { describe, expect, it } from 'vitest';
import { leakyPressureRise } from '../../../src/science/room-air/pressure-rise.js';
import { localFlowFraction } from '../../../src/science/room-air/local-flow.js';
import { supplyControlledFraction } from '../../../src/science/room-air/well-mixed.js';
import { referenceRecords } from '../../support/reference-records.js';

function expectedOf(id: string): Readonly<Record<string, unknown>> {
  const record = referenceRecords('air-checks.json', 'checks').find((one) => one.id === id);
  if (!record) throw new Error(`no record ${id}`);
  return record.expected;
}

describe('closed forms of one space', () => {
  it('a supplied room meets AC-W01 while the gas flows, and after it with the release at zero', () => {
    const room = { volumeM3: 300, freshAirM3PerS: 0.25 };
    const expected = expectedOf('AC-W01');
    const first = supplyControlledFraction({ ...room, releaseM3PerS: 0.01 }, 600);
    const later = supplyControlledFraction(
      { ...room, releaseM3PerS: 0, startFraction: first },
      1200,
    );
    // Tolerance of the record: 1e-6 relative.
    expect(Math.abs(first / Number(expected.gas_fraction_t1) - 1)).toBeLessThan(1e-6);
    expect(Math.abs(later / Number(expected.gas_fraction_t2) - 1)).toBeLessThan(1e-6);
  });

  it('air through gaps builds up the pressure of the smoke-control formula Q = 0.839 A dp^0.5', () => {
    // Klote and Milke, smoke control by pressurisation, coefficient 0.65 and 1.2 kg/m3 (from
    // memory); three digits in 0.839, so 0.2 % in the pressure.
    for (const dp of [12.5, 25, 50]) {
      const flow = 0.839 * 0.01 * Math.sqrt(dp);
      expect(Math.abs(leakyPressureRise(flow, 0.01, 1.2, 0.65) / dp - 1)).toBeLessThan(0.002);
    }
  });

  it('the axis of a plume of normal-curve profiles holds twice the mean fraction of its flow', () => {
    // Morton, Taylor and Turner 1956: velocity and fraction both proportional to exp(-r2/b2). The
    // flows are summed over rings; 1e-6 is the error of the sum.
    const axisFraction = 0.3;
    const width = 0.2;
    const ring = width / 1000;
    let release = 0;
    let plume = 0;
    for (let r = ring / 2; r < 6 * width; r += ring) {
      const profile = Math.exp(-((r / width) ** 2));
      const flow = profile * 2 * Math.PI * r * ring;
      plume += flow;
      release += axisFraction * profile * flow;
    }
    expect(Math.abs(localFlowFraction(release, plume) / axisFraction - 1)).toBeLessThan(1e-6);
  });

  it('a plume that carries less than twice the release counts as pure gas', () => {
    expect(localFlowFraction(0.004, 0.0079)).toBe(1);
    expect(localFlowFraction(0.004, 0.016)).toBeCloseTo(0.5, 12);
  });
});
