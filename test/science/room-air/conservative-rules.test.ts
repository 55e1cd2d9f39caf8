import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { AirInput } from '../../../src/science/room-air/air-input.js';
import { airModel } from '../../../src/science/room-air/air-model.js';
import type { HeightAir } from '../../../src/science/room-air/air-result.js';
import { airRun } from '../../../src/science/room-air/air-run.js';
import { bodyHeatShare } from '../../../src/science/room-air/body-heat.js';
import { fogDensityRatio } from '../../../src/science/room-air/fog-density.js';
import { adverseLayers } from '../../../src/science/room-air/layer-parameters.js';
import { streamClearance, streamFraction } from '../../../src/science/room-air/local-flow.js';
import { cleanAirReading, fastestApproach } from '../../../src/science/room-air/meter-alarm.js';
import {
  doorForce,
  gapAreaOfInfiltration,
  leakyPressureRise,
  sealedPressureRise,
} from '../../../src/science/room-air/pressure-rise.js';
import { boundReleases } from '../../../src/science/room-air/zone-bound.js';
import { checkGases, checkInput } from '../../support/air-fixture.js';

/**
 * The conservative rules, one by one (own derivation and judgement: sections 4.3, 4.6 and 10 of the
 * air models). Rules that need a plan, not a room, stand in test/assessment.
 */

type Parts = Parameters<typeof checkInput>[0];

/** Bound only: the last value of a gas at a mouth, fans off and nobody breathing. */
function bounded(parts: Omit<Parts, 'durationS'> & { durationS?: number }): AirInput {
  return checkInput({ durationS: 7200, outputIntervalS: 600, ...parts });
}

function run(input: AirInput) {
  return airRun(input, checkGases, { layered: false });
}

function last(height: HeightAir | undefined, gas: string): number {
  return height?.bound.gasFraction[gas]?.at(-1) ?? Number.NaN;
}

/** A room of 63 m2 and 3 m with one release and mouths by their height in decimetres. */
function room(
  releases: Omit<NonNullable<AirInput['releases']>[number], 'space'>[],
  more: Partial<Parts> = {},
): ReturnType<typeof run>['zones'] {
  return run(
    bounded({
      spaces: [{ id: 'room', floorAreaM2: 63, heightM: 3 }],
      releases: releases.map((release) => ({ space: 'room', ...release })),
      zones: [5, 11, 17, 25].map((height) => ({
        id: `z${String(height)}`,
        space: 'room',
        heightM: height / 10,
      })),
      ...more,
    }),
  ).zones;
}

describe('the conservative rules of the air models', () => {
  it('Rule 2: a mouth in a stream meets min(1, 2 q/Q_p), neither the layer nor the bound', () => {
    // Dry ice poured at 5.5 L/s: Morton, Taylor and Turner flow with C 0.131 (printed digits: 1 %).
    const q = 0.0055;
    for (const z of [0.5, 1, 2]) {
      const flow = 0.131 * Math.cbrt(5.098 * q) * z ** (5 / 3);
      expect(streamFraction(q, 5.098, z) / Math.min(1, (2 * q) / flow)).toBeCloseTo(1, 2);
    }
    // At the source, and for a gas that does not move by itself, all of it.
    expect(streamFraction(q, 5.098, 0)).toBe(1);
    expect(streamFraction(q, 0, 1)).toBe(1);
    expect(streamFraction(0, 5.098, 1)).toBe(0);
    // Well above the bound of the room at that height: the room is no answer in a stream.
    const z11 = room([{ gas: 'CO2', volumeM3: 0.33, durationS: 60 }]).z11;
    expect(streamFraction(q, 5.098, 0.5)).toBeGreaterThan(10 * last(z11, 'CO2'));
    // Nobody comes nearer than 0.3 m, and further out twice the top-hat radius (6/5) 0.11 z.
    expect(streamClearance(0.5)).toBe(0.3);
    expect(streamClearance(3)).toBeCloseTo(2 * 1.2 * 0.11 * 3, 12);
  });

  it('Rule 3: whoever stands in a weak layer breathes a share of it at any height', () => {
    // 3 % of carbon dioxide has g' = 0.153 m/s2.
    expect(bodyHeatShare(5.098 * 0.0299, 0.2, 1.1)).toBeGreaterThan(0);
    expect(bodyHeatShare(5.098 * 0.0301, 0.2, 1.1)).toBe(0);
    // Laminar free convection on a wall gathers as z^(3/4) (Squire and Eckert): 1/16 of the way, 1/8.
    expect(bodyHeatShare(0.1, 0.1, 1.6)).toBeCloseTo(1 / 8, 12);
    expect(bodyHeatShare(0.1, 1.8, 1.6)).toBe(1);
    const mouths = (dilution: number) => {
      const result = airRun(
        checkInput({
          durationS: 120,
          outputIntervalS: 60,
          spaces: [{ id: 'room', floorAreaM2: 63, heightM: 3 }],
          releases: [{ space: 'room', gas: 'CO2', volumeM3: 0.4, durationS: 60 }],
          layers: { sourceDilution: dilution },
          zones: [{ id: 'standing', space: 'room', heightM: 1.7 }],
        }),
        checkGases,
      );
      return {
        layer: result.spaces.room?.layered?.floorLayer.gasFraction.CO2?.[1] ?? Number.NaN,
        depth: result.spaces.room?.layered?.floorLayerDepthM[1] ?? Number.NaN,
        mouth: result.zones.standing?.layered?.gasFraction.CO2?.[1] ?? Number.NaN,
      };
    };
    const weak = mouths(40);
    // The mouth is far above layer and smear, and yet it breathes of the layer.
    expect(weak.depth + 0.3).toBeLessThan(1.5);
    expect(weak.layer).toBeGreaterThan(0.01);
    const share = (weak.depth / 1.7) ** 0.75;
    expect(weak.mouth / weak.layer).toBeGreaterThan(share);
    expect(weak.mouth / weak.layer).toBeLessThan(share + 0.1);
    const strong = mouths(8);
    expect(strong.layer).toBeGreaterThan(0.05);
    expect(strong.mouth).toBeLessThan(0.2 * strong.layer);
  });

  it('Rule 4: a gas near the density of air counts as a slab of 0.3 m at every mouth', () => {
    const slab = 2 / (0.3 * 63);
    const warm = room([{ gas: 'N2', volumeM3: 2 }]);
    for (const mouth of [warm.z5, warm.z11, warm.z17, warm.z25]) {
      expect(mouth && 0.2095 * (1 - slab)).toBeCloseTo(
        mouth?.bound.oxygenFraction.at(-1) ?? Number.NaN,
        9,
      );
    }
    // Clearly heavy and clearly light gas thins out away from its side instead.
    const heavy = room([{ gas: 'CO2', volumeM3: 2 }]);
    expect(last(heavy.z25, 'CO2') - 420e-6).toBeLessThan(0.2 * slab);
  });

  it('Rule 4: cold nitrogen is a slab because it turns neutral, and no less than dense below 0.3 m', () => {
    const cold = room([{ gas: 'N2', volumeM3: 2, temperatureK: 90, manner: 'spill' }]);
    expect(last(cold.z11, 'N2')).toBeCloseTo(2 / (0.3 * 63), 9);
    // At 0.2 m the cold layer itself is the greater danger.
    expect(last(cold.z11?.at02M, 'N2')).toBeCloseTo(2 / (0.2 * 63), 9);
  });

  it('Rule 4: water vapour makes warm fog light: neutral near 74 degC, near 50 degC half condensed', () => {
    // Within 1 % of neutral at 74 degC; 7 % at 50 degC ("near").
    const at = (celsius: number, condensed: number, pressurePa = 101_325) =>
      fogDensityRatio(0.0440095, 0.02896, 273.15 + celsius, 293.15, pressurePa, condensed);
    expect(Math.abs(at(74, 0) - 1)).toBeLessThan(0.01);
    expect(at(78, 0)).toBeLessThan(0.95);
    expect(Math.abs(at(50, 0.5) - 1)).toBeLessThan(0.07);
    const gathering = (temperatureK: number, pressurePa = 101_325) =>
      boundReleases(
        airModel(
          {
            ...bounded({
              spaces: [{ id: 'room', floorAreaM2: 63, heightM: 3 }],
              releases: [{ space: 'room', gas: 'CO2', massKg: 1, manner: 'fog', temperatureK }],
            }),
            ambient: { temperatureK: 293.15, pressurePa },
          },
          checkGases,
        ),
      )[0]?.gathering;
    expect(gathering(293.15)).toBe('below');
    expect(gathering(313.15)).toBe('below');
    expect(gathering(323.15)).toBe('slab');
    expect(gathering(353.15)).toBe('slab');
    // In thin air there is more vapour: 47 degC is enough at 76.6 kPa.
    expect(gathering(320.15)).toBe('below');
    expect(gathering(320.15, 76_600)).toBe('slab');
  });

  it('Rule 5: the bounds of several gases add up at a mouth, from below and from above', () => {
    const both = room([
      { gas: 'CO2', volumeM3: 1, episode: 'show' },
      { gas: 'Ar', volumeM3: 1, episode: 'show' },
      { gas: 'He', volumeM3: 3, episode: 'show' },
    ]);
    for (const [mouth, z] of [
      [both.z5, 0.5],
      [both.z17, 1.7],
    ] as const) {
      const sum = 2 / (63 * z) + 3 / (63 * (3 - z));
      expect(mouth?.bound.oxygenFraction.at(-1)).toBeCloseTo(0.2095 * (1 - sum), 6);
    }
  });

  it('Rule 6: gas in a pocket counts in that pocket alone, under the ceiling and inside a kerb', () => {
    const { zones } = run(
      bounded({
        spaces: [
          {
            id: 'hall',
            floorAreaM2: 180,
            heightM: 4,
            pockets: [
              { id: 'bay', areaM2: 10, depthM: 0.5, at: 'high' },
              { id: 'other', areaM2: 10, depthM: 0.5, at: 'high' },
              { id: 'kerbed', areaM2: 4, depthM: 0.3, at: 'low' },
            ],
          },
        ],
        releases: [
          { space: 'hall', gas: 'He', volumeM3: 0.24, episode: 'show' },
          { space: 'hall', gas: 'SF6', volumeM3: 0.05, episode: 'show' },
        ],
        zones: [
          { id: 'bay', space: 'hall', floorLevelM: 2.5, heightM: 1.500001 },
          { id: 'kerb', space: 'hall', floorLevelM: -0.3, heightM: 1 },
        ],
      }),
    );
    expect(last(zones.bay, 'He')).toBeCloseTo(0.24 / (10 * 0.5), 5);
    expect(last(zones.kerb, 'SF6')).toBeCloseTo(0.05 / (4 * 0.3), 9);
    expect(last(zones.kerb?.at02M, 'SF6')).toBeCloseTo(0.05 / (4 * 0.2), 9);
  });

  it('Rule 8: pulses of one episode add up without removal; a closed one is mixed background', () => {
    const pulses = (second: string) =>
      room(
        [
          { gas: 'SF6', volumeM3: 0.1, startS: 0, episode: 'first' },
          { gas: 'SF6', volumeM3: 0.1, startS: 3600, episode: second },
        ],
        {
          // Ten air changes an hour: removal that the bound does not credit.
          airSystems: [{ space: 'room', drive: 'supply', freshAirM3PerS: 0.525 }],
        },
      ).z11;
    expect(last(pulses('first'), 'SF6')).toBeCloseTo(0.2 / (63 * 1.1), 9);
    // A reading has closed the first: what is left of it, about e^-20, is background.
    expect(last(pulses('second'), 'SF6')).toBeCloseTo(0.1 / (63 * 1.1), 9);
  });

  it('Rule 9: a room behind an open door counts all the gas in its own bound, a shut one none', () => {
    const two = (openFraction: number) =>
      run(
        bounded({
          spaces: [
            { id: 'stage', floorAreaM2: 100, heightM: 5 },
            { id: 'under', floorAreaM2: 20, heightM: 2.2, floorLevelM: -2.4 },
          ],
          openings: [
            {
              from: 'stage',
              to: 'under',
              kind: 'floorOpening',
              widthM: 1,
              heightM: 1,
              sillLevelM: 0,
              openFraction,
            },
          ],
          releases: [{ space: 'stage', gas: 'SF6', volumeM3: 1 }],
          zones: [
            { id: 'stage', space: 'stage', heightM: 1.5 },
            { id: 'under', space: 'under', heightM: 1.5 },
          ],
        }),
      ).zones;
    const open = two(1);
    expect(last(open.under, 'SF6')).toBeCloseTo(1 / (20 * 1.5), 9);
    expect(last(open.stage, 'SF6')).toBeCloseTo(1 / (100 * 1.5), 9);
    expect(last(two(0).under, 'SF6')).toBe(0);
  });

  it('Rule 9: the run without mixing lets the surplus leave once from above and once from the layer', () => {
    const surplus = new Set(adverseLayers({}, true, true).map((one) => one.surplusFromLayer));
    expect([...surplus].sort()).toEqual([0, 1]);
  });

  it('Rule 10: a sealed room rises by p G, a leaky one by 0.5 rho (Q/(Cd A))^2, and a door feels it', () => {
    // 9.1 m3 in 384 m3: 2.4 kPa, 4.8 kN on 2 m2 (printed digits).
    const sealed = sealedPressureRise(9.1, 384, 101_325);
    expect(sealed).toBeCloseTo(2400, -2);
    expect(doorForce(sealed, 2)).toBeCloseTo(4800, -2);
    // Gaps that pass the stated air change at 4 Pa pass four times the flow at 64 Pa.
    const area = gapAreaOfInfiltration(0.02);
    expect(leakyPressureRise(0.02, area)).toBeCloseTo(4, 9);
    expect(leakyPressureRise(0.08, area)).toBeCloseTo(64, 9);
    expect(() => doorForce(50, 0)).toThrow('Door area');
  });

  it('Rule 12: clean humid air reads 20.7 % at 20 degC and 50 %, and the rate is that towards the limit', () => {
    expect(cleanAirReading(293.15, 101_325, 0.5)).toBeCloseTo(0.207, 3);
    expect(cleanAirReading(293.15, 101_325, 0)).toBe(0.2095);
    const times = [0, 10, 20, 30];
    expect(fastestApproach(times, [0.2, 0.19, 0.2, 0.2], 'below')).toBeCloseTo(1e-3, 12);
    expect(fastestApproach(times, [0.01, 0.005, 0.02, 0.02], 'above')).toBeCloseTo(1.5e-3, 12);
    expect(fastestApproach(times, [0.2, 0.2, 0.2, 0.2], 'below')).toBe(0);
  });

  it('Rule 13: mixing, walking, rising gas and a low extract earn nothing in the bound', () => {
    fc.assert(
      fc.property(
        fc.double({ min: 0, max: 0.05, noNaN: true }),
        fc.double({ min: 0, max: 0.02, noNaN: true }),
        fc.double({ min: 0, max: 0.5, noNaN: true }),
        fc.double({ min: 1, max: 10, noNaN: true }),
        (turbulence, walking, extract, dilution) => {
          const one = (input: Partial<Parts>) =>
            room(
              [
                { gas: 'SF6', volumeM3: 0.2, episode: 'show' },
                { gas: 'He', volumeM3: 0.2, episode: 'show' },
              ],
              input,
            );
          const plain = one({});
          const helped = one({
            airSystems: [
              {
                space: 'room',
                drive: 'extract',
                freshAirM3PerS: extract,
                extractLevel: 'low',
                extractTopM: 0.3,
              },
            ],
            layers: {
              turbulenceVelocityMPerS: turbulence,
              walkingExchangeMPerS: walking,
              sourceDilution: dilution,
            },
          });
          for (const id of ['z5', 'z11', 'z17', 'z25'] as const) {
            for (const gas of ['SF6', 'He']) {
              expect(last(helped[id], gas)).toBeCloseTo(last(plain[id], gas), 12);
            }
          }
          // Helium is not counted away from the floor: the mixed answer stands there at least.
          const floor = plain.z5?.at02M;
          const mixed = floor?.mixed.gasFraction.He?.at(-1) ?? Number.NaN;
          expect(last(floor, 'He')).toBeGreaterThanOrEqual(mixed);
        },
      ),
      { numRuns: 20, seed: 4711 },
    );
  });
});
