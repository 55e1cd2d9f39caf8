import { describe, expect, it } from 'vitest';
import type { AirInput, AirRelease } from '../../../src/science/room-air/air-input.js';
import { airRun } from '../../../src/science/room-air/air-run.js';
import { checkGases, checkInput } from '../../support/air-fixture.js';

/*
 * Conservative rule 8: the gas of an episode adds up over pulses, acts and shows without removal
 * until a reading meets the hold criterion. One room of 20 m2 and 3 m, mouth at 1 m: 20 m3 of air
 * below it, so that each 0.2 m3 of argon adds 1 % to the bound (inventory bound Vg/Vb).
 */

const argon = (startS: number, rest: Partial<AirRelease> = {}): AirRelease => ({
  space: 'room',
  gas: 'Ar',
  volumeM3: 0.2,
  startS,
  manner: 'gentle',
  ...rest,
});

const room = (releases: readonly AirRelease[], rest: Partial<AirInput> = {}): AirInput => ({
  ...checkInput({
    durationS: 7200,
    outputIntervalS: 600,
    spaces: [{ id: 'room', floorAreaM2: 20, heightM: 3 }],
    airSystems: [{ space: 'room', drive: 'balanced', supplyM3PerS: 0.05, extractM3PerS: 0.05 }],
    releases,
    zones: [{ id: 'seat', space: 'room', heightM: 1 }],
  }),
  ...rest,
});

function boundAt(input: AirInput, t: number) {
  const { timesS, zones } = airRun(input, checkGases, { layered: false });
  const at = timesS.indexOf(t);
  const series = zones.seat;
  return {
    bound: series?.bound.gasFraction.Ar?.[at] ?? Number.NaN,
    mixed: series?.mixed.gasFraction.Ar?.[at] ?? Number.NaN,
  };
}

describe('an episode ends by a reading alone', () => {
  it('adds up releases without an episode: two of 0.2 m3 are bounded by 2 % until the end', () => {
    const input = room([argon(0), argon(3600)]);
    expect(boundAt(input, 3000).bound).toBeCloseTo(0.01, 12);
    expect(boundAt(input, 4200).bound).toBeCloseTo(0.02, 12);
    expect(boundAt(input, 7200).bound).toBeCloseTo(0.02, 12);
  });

  it('does not take an id for an episode: the same two with ids are bounded by 2 % as well', () => {
    const input = room([argon(0, { id: 'first' }), argon(3600, { id: 'second' })]);
    expect(boundAt(input, 4200).bound).toBeCloseTo(0.02, 12);
  });

  it('closes a named episode when a later named one begins: its gas is mixed background then', () => {
    const input = room([argon(0, { episode: 'early' }), argon(3600, { episode: 'late' })]);
    const alone = boundAt(room([argon(0)]), 4200).mixed;
    expect(boundAt(input, 3000).bound).toBeCloseTo(0.01, 12);
    // The second pulse pushes out a part of the background: 0.2 m3 of 60 m3.
    expect(boundAt(input, 4200).bound).toBeCloseTo(0.01 + alone * Math.exp(-0.2 / 60), 6);
  });

  it('keeps a named episode open while a later one is not named: both count, 2 %', () => {
    expect(boundAt(room([argon(0, { episode: 'early' }), argon(3600)]), 4200).bound).toBeCloseTo(
      0.02,
      12,
    );
    expect(boundAt(room([argon(0), argon(3600, { episode: 'late' })]), 4200).bound).toBeCloseTo(
      0.02,
      12,
    );
  });

  it('keeps a named episode open that still lets gas out when the next begins: 2 % in the end', () => {
    const long = argon(0, { episode: 'early', durationS: 5400 });
    const input = room([long, argon(3600, { episode: 'late' })]);
    // At 4200 s 0.2 m3 x 4200/5400 of the long one are out.
    expect(boundAt(input, 4200).bound).toBeCloseTo(0.01 * (4200 / 5400) + 0.01, 12);
    expect(boundAt(input, 7200).bound).toBeCloseTo(0.02, 12);
  });

  it('counts all gas of one name together, 2 % of two releases', () => {
    const input = room([argon(0, { episode: 'day' }), argon(3600, { episode: 'day' })]);
    expect(boundAt(input, 4200).bound).toBeCloseTo(0.02, 12);
  });

  it('adds gas that only a unit brings from another room as mixed background to the bound', () => {
    const shared = room([argon(0), argon(0, { space: 'far', volumeM3: 3 })], {
      spaces: [
        { id: 'room', floorAreaM2: 20, heightM: 3 },
        { id: 'far', floorAreaM2: 20, heightM: 3 },
      ],
      airSystems: [
        {
          serves: [
            { space: 'room', share: 0.5 },
            { space: 'far', share: 0.5 },
          ],
          drive: 'supply',
          freshAirM3PerS: 0,
          recirculatedM3PerS: 0.4,
        },
      ],
    });
    const fromFar = room([argon(0, { space: 'far', volumeM3: 3 })], {
      spaces: shared.spaces,
      ...(shared.airSystems ? { airSystems: shared.airSystems } : {}),
    });
    const brought = boundAt(fromFar, 3600);
    expect(brought.bound).toBeCloseTo(brought.mixed, 12);
    expect(brought.mixed).toBeGreaterThan(0.02);
    expect(boundAt(shared, 3600).bound).toBeGreaterThan(0.01 + 0.99 * brought.mixed);
  });
});
