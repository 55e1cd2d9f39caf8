import { describe, expect, it } from 'vitest';
import { airRun } from '../../../src/science/room-air/air-run.js';
import { checkGases, checkInput } from '../../support/air-fixture.js';

/** Numbers of the demonstration cases of the air models; printed digits, so 2 % of each. */
function near(value: number | undefined, printed: number, share = 0.02): void {
  expect(Math.abs((value ?? Number.NaN) / printed - 1)).toBeLessThan(share);
}

describe('demonstration cases of the two-layer model (own derivation, second program)', () => {
  it('a helium hall without vent: 1.23 m at 7.7 % after 5 min, adverse 8.1 % that stays', () => {
    const result = airRun(
      checkInput({
        durationS: 1800,
        outputIntervalS: 300,
        spaces: [{ id: 'hall', floorAreaM2: 96, heightM: 4 }],
        releases: [{ space: 'hall', gas: 'He', volumeM3: 9.1, durationS: 300, heightM: 1 }],
        zones: [{ id: 'catwalk', space: 'hall', heightM: 3.2 }],
      }),
      checkGases,
    );
    const layers = result.spaces.hall?.layered;
    near(layers?.ceilingLayerDepthM[1], 1.23);
    near(layers?.ceilingLayer.gasFraction.He?.[1], 0.077);
    near(layers?.ceilingLayerDepthM[6], 1.36);
    near(layers?.ceilingLayer.gasFraction.He?.[6], 0.07);
    const adverse = result.zones.catwalk?.layered?.adverse;
    near(adverse?.gasFraction.He?.[1], 0.081);
    near(adverse?.gasFraction.He?.[6], 0.081);
    near(adverse?.oxygenFraction[1], 0.192, 0.005);
    near(result.spaces.hall?.mixed.gasFraction.He?.[1], 0.0234);
  });

  it('a tipped tank of 100 L: 10 cm at 1.2 % after 5 min, 24 cm at 0.24 % after 30 min', () => {
    const result = airRun(
      checkInput({
        durationS: 3000,
        outputIntervalS: 60,
        spaces: [{ id: 'room', floorAreaM2: 63, heightM: 3 }],
        infiltration: [{ space: 'room', airChangesPerHour: 2 }],
        // Edge entrainment 0.6 has diluted it 24 times when the floor is covered.
        layers: { sourceDilution: 24 },
        releases: [{ space: 'room', gas: 'SF6', volumeM3: 0.1 }],
        zones: [{ id: 'mats', space: 'room', heightM: 0.55 }],
      }),
      checkGases,
    );
    const layers = result.spaces.room?.layered;
    const fraction = layers?.floorLayer.gasFraction.SF6;
    near(layers?.floorLayerDepthM[5], 0.1, 0.07);
    near(fraction?.[5], 0.012, 0.03);
    near(layers?.floorLayerDepthM[30], 0.24, 0.02);
    near(fraction?.[30], 0.0024, 0.03);
    expect(fraction?.[47]).toBeLessThan(0.001);
    expect(fraction?.[40]).toBeGreaterThan(0.001);
    near(result.zones.mats?.bound.gasFraction.SF6?.at(-1), 0.0029, 0.01);
    near(result.spaces.room?.purePoolDepthM, 0.0016, 0.01);
  });
});

describe('band of the layered answer', () => {
  const input = checkInput({
    durationS: 1800,
    outputIntervalS: 300,
    spaces: [{ id: 'room', floorAreaM2: 63, heightM: 3 }],
    airSystems: [{ space: 'room', drive: 'supply', freshAirM3PerS: 0.05 }],
    releases: [{ space: 'room', gas: 'CO2', volumeM3: 0.5, durationS: 300, manner: 'fog' }],
    zones: [{ id: 'mats', space: 'room', heightM: 0.5 }],
  });
  const uncertain = { ...input, uncertainty: { samples: 64, seed: 7 } };

  it('lies in order and inside the bound, and is the same for the same seed', () => {
    const first = airRun(uncertain, checkGases);
    const layered = first.zones.mats?.layered;
    const bound = first.zones.mats?.bound.gasFraction.CO2;
    for (const [i, middle] of (layered?.p50?.gasFraction.CO2 ?? []).entries()) {
      const low = layered?.p05?.gasFraction.CO2?.[i] ?? Number.NaN;
      const high = layered?.p95?.gasFraction.CO2?.[i] ?? Number.NaN;
      expect(low).toBeLessThanOrEqual(middle);
      expect(middle).toBeLessThanOrEqual(high);
      // A weak layer is breathed at any height, so only the layer itself limits it.
      expect(high).toBeLessThanOrEqual(Math.max(bound?.[i] ?? 0, 0.03) + 1e-6);
    }
    expect(airRun(uncertain, checkGases)).toEqual(first);
    expect(first.drivers?.length).toBeGreaterThan(0);
  });

  it('is narrower where the fresh air was measured', () => {
    const mixedOnly = (freshAirFactor: 'measured' | 'assumed') =>
      airRun(
        {
          ...uncertain,
          releases: [{ space: 'room', gas: 'CO2', volumeM3: 0.5, durationS: 300, manner: 'jet' }],
          uncertainty: {
            samples: 128,
            seed: 7,
            distributions: {
              mixingFactor: { kind: 'fixed', value: 1 },
              ...(freshAirFactor === 'measured'
                ? { freshAirFactor: { kind: 'normal', mean: 1, standardDeviation: 0.05 } }
                : {}),
            },
          },
        },
        checkGases,
      ).zones.mats?.layered;
    const width = (band: ReturnType<typeof mixedOnly>): number =>
      (band?.p95?.gasFraction.CO2?.at(-1) ?? 0) - (band?.p05?.gasFraction.CO2?.at(-1) ?? 0);
    expect(width(mixedOnly('measured'))).toBeLessThan(0.5 * width(mixedOnly('assumed')));
  });
});
