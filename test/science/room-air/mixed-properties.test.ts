import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { AirInput, AirOpening } from '../../../src/science/room-air/air-input.js';
import type { AirResult } from '../../../src/science/room-air/air-result.js';
import { airRun } from '../../../src/science/room-air/air-run.js';
import { checkGases } from '../../support/air-fixture.js';

/** Mixed and bound alone: the layers have properties of their own. */
const mixedRun = (input: AirInput) => airRun(input, checkGases, { layered: false });

const SEED = 20261201;
const ids = ['a', 'b', 'c', 'd'] as const;
const gasIds = ['He', 'Ar', 'CO2', 'SF6', 'N2'] as const;

/** Random networks: one to four spaces, doors, fans, transfers, people, one to three releases. */
const networks: fc.Arbitrary<AirInput> = fc
  .record({
    count: fc.integer({ min: 1, max: 4 }),
    areas: fc.array(fc.double({ min: 8, max: 300, noNaN: true }), { minLength: 4, maxLength: 4 }),
    warmer: fc.array(fc.double({ min: -3, max: 3, noNaN: true }), { minLength: 4, maxLength: 4 }),
    doors: fc.array(
      fc.record({
        a: fc.nat(3),
        b: fc.nat(4),
        width: fc.double({ min: 0.05, max: 2, noNaN: true }),
        kind: fc.constantFrom('doorway', 'floorOpening'),
        fromS: fc.constantFrom(0, 300),
      }),
      { maxLength: 3 },
    ),
    fans: fc.array(
      fc.record({
        at: fc.nat(3),
        flow: fc.double({ min: 0, max: 0.5, noNaN: true }),
        around: fc.double({ min: 0, max: 0.5, noNaN: true }),
        drive: fc.constantFrom('supply', 'extract'),
      }),
      { maxLength: 3 },
    ),
    releases: fc.array(
      fc.record({
        at: fc.nat(3),
        gas: fc.constantFrom(...gasIds),
        volume: fc.double({ min: 0.001, max: 12, noNaN: true }),
        startS: fc.constantFrom(0, 200, 600),
        durationS: fc.constantFrom(0, 120, 900),
        decaying: fc.boolean(),
      }),
      { minLength: 1, maxLength: 3 },
    ),
    people: fc.nat(30),
  })
  .map(({ count, areas, warmer, doors, fans, releases, people }): AirInput => {
    const place = (k: number): string => ids[k % count] ?? 'a';
    const openings = doors
      .map((door): AirOpening => ({
        from: place(door.a),
        to: door.b === 4 ? 'outside' : place(door.b),
        kind: door.kind === 'doorway' || door.b === 4 ? 'doorway' : 'floorOpening',
        widthM: door.width,
        heightM: 2,
        sillLevelM: 0,
        fromS: door.fromS,
      }))
      .filter((door) => door.from !== door.to);
    return {
      ambient: { temperatureK: 293.15, pressurePa: 98_000 },
      durationS: 1800,
      outputIntervalS: 100,
      spaces: ids.slice(0, count).map((id, k) => ({
        id,
        floorAreaM2: areas[k] ?? 20,
        heightM: 3,
        temperatureK: 293.15 + (warmer[k] ?? 0),
      })),
      openings,
      airSystems: fans.map((fan) => ({
        space: place(fan.at),
        drive: fan.drive === 'supply' ? ('supply' as const) : ('extract' as const),
        freshAirM3PerS: fan.flow,
        recirculatedM3PerS: fan.around,
      })),
      infiltration: ids.slice(0, count).map((id) => ({ space: id, airChangesPerHour: 0.2 })),
      releases: releases.map((release) => ({
        space: place(release.at),
        gas: release.gas,
        volumeM3: release.volume,
        startS: release.startS,
        durationS: release.durationS,
        ...(release.decaying && release.durationS > 0
          ? { profile: 'decaying' as const, timeConstantS: 100 }
          : {}),
      })),
      occupants: [{ space: 'a', count: people }],
      zones: ids.slice(0, count).map((id) => ({ id, space: id, heightM: 1.1 })),
    };
  });

function leastOxygen(result: AirResult): number {
  return Math.min(...Object.values(result.zones).map((zone) => zone.minimum.mixed.oxygenFraction));
}

function everySeries(result: AirResult) {
  return Object.values(result.zones).flatMap((zone) => [
    zone.mixed,
    zone.bound,
    zone.at02M.mixed,
    zone.at02M.bound,
  ]);
}

function property(check: (input: AirInput) => void, runs: number): void {
  fc.assert(fc.property(networks, check), { seed: SEED, numRuns: runs });
}

describe('well-mixed networks, seed 20261201', () => {
  it('keeps every gas to 1e-9 of what came in', () => {
    property((input) => {
      for (const balance of Object.values(mixedRun(input).balance)) {
        expect(balance.relativeError).toBeLessThan(1e-9);
      }
    }, 150);
  });

  it('holds as much released gas as was released less what left', () => {
    property((input) => {
      const { balance } = mixedRun(input);
      const molar = (8.314462618 * 293.15) / 98_000;
      for (const gas of ['He', 'Ar', 'SF6', 'N2']) {
        const released = (input.releases ?? [])
          .filter((one) => one.gas === gas)
          .reduce((sum, one) => sum + (one.volumeM3 ?? 0), 0);
        const entry = balance[gas];
        if (!entry) continue;
        // A decay that is cut off by the end of the run has released less.
        const left = entry.heldMol + entry.outMol;
        expect(left).toBeLessThanOrEqual((released / molar) * (1 + 1e-9));
        expect(left).toBeGreaterThan(0);
      }
    }, 60);
  });

  it('gives fractions between 0 and 1 and no more oxygen than outdoors', () => {
    property((input) => {
      for (const series of everySeries(mixedRun(input))) {
        for (const value of series.oxygenFraction) {
          expect(value).toBeGreaterThanOrEqual(0);
          expect(value).toBeLessThanOrEqual(0.2095 * (1 + 1e-9));
        }
        for (const values of Object.values(series.gasFraction)) {
          for (const value of values) {
            expect(value).toBeGreaterThanOrEqual(0);
            expect(value).toBeLessThanOrEqual(1);
          }
        }
      }
    }, 100);
  });

  it('never lets the bound show less gas or more oxygen than the mixed answer', () => {
    property((input) => {
      for (const zone of Object.values(mixedRun(input).zones)) {
        for (const height of [zone, zone.at02M]) {
          for (const [i, oxygen] of height.bound.oxygenFraction.entries()) {
            expect(oxygen).toBeLessThanOrEqual((height.mixed.oxygenFraction[i] ?? 0) + 1e-12);
          }
          for (const [gas, values] of Object.entries(height.bound.gasFraction)) {
            for (const [i, value] of values.entries()) {
              expect(value).toBeGreaterThanOrEqual(
                (height.mixed.gasFraction[gas]?.[i] ?? 0) - 1e-12,
              );
            }
          }
        }
      }
    }, 60);
  });

  it('never lowers oxygen by more outdoor air into a single space', () => {
    property((input) => {
      const alone = { ...input, spaces: input.spaces.slice(0, 1), openings: [] };
      const one: AirInput = {
        ...alone,
        infiltration: (input.infiltration ?? []).slice(0, 1),
        airSystems: (input.airSystems ?? []).map((system) => ({ ...system, space: 'a' })),
        releases: (input.releases ?? []).map((release) => ({ ...release, space: 'a' })),
        zones: (input.zones ?? []).slice(0, 1),
      };
      const more: AirInput = {
        ...one,
        airSystems: [
          ...(one.airSystems ?? []),
          { space: 'a', drive: 'balanced', supplyM3PerS: 0.2, extractM3PerS: 0.2 },
        ],
      };
      expect(leastOxygen(mixedRun(more))).toBeGreaterThanOrEqual(leastOxygen(mixedRun(one)) - 1e-9);
    }, 60);
  });

  it('never raises oxygen by more gas where flows do not depend on the gas', () => {
    property((input) => {
      const still = { ...input, openings: [] };
      const more: AirInput = {
        ...still,
        releases: (input.releases ?? []).map((release) => ({
          ...release,
          volumeM3: 1.3 * (release.volumeM3 ?? 0),
        })),
      };
      expect(leastOxygen(mixedRun(more))).toBeLessThanOrEqual(leastOxygen(mixedRun(still)) + 1e-9);
    }, 60);
  });

  it('answers the same at the same times whatever the output interval', () => {
    property((input) => {
      const coarse = mixedRun(input);
      const fine = mixedRun({ ...input, outputIntervalS: 50 });
      for (const [id, space] of Object.entries(coarse.spaces)) {
        for (const [i, value] of space.mixed.oxygenFraction.entries()) {
          const other = fine.spaces[id]?.mixed.oxygenFraction[2 * i] ?? 0;
          // The interpolation between accepted steps is good to about 1e-7.
          expect(Math.abs(value - other)).toBeLessThan(1e-7);
        }
      }
    }, 40);
  });

  it('answers a mirrored pair of rooms alike', () => {
    const pair = (source: 'a' | 'b'): AirInput => ({
      ambient: { temperatureK: 293.15, pressurePa: 101_325 },
      durationS: 1200,
      outputIntervalS: 60,
      spaces: [
        { id: 'a', floorAreaM2: 40, heightM: 3 },
        { id: 'b', floorAreaM2: 40, heightM: 3 },
      ],
      openings: [{ from: 'a', to: 'b', kind: 'doorway', widthM: 0.9, heightM: 2, sillLevelM: 0 }],
      releases: [{ space: source, gas: 'SF6', volumeM3: 2, durationS: 300 }],
      zones: [
        { id: 'a', space: 'a', heightM: 1.1 },
        { id: 'b', space: 'b', heightM: 1.1 },
      ],
    });
    const left = mixedRun(pair('a'));
    const right = mixedRun(pair('b'));
    for (const [i, value] of (left.spaces.a?.mixed.gasFraction.SF6 ?? []).entries()) {
      expect(right.spaces.b?.mixed.gasFraction.SF6?.[i]).toBeCloseTo(value, 12);
    }
  });
});
