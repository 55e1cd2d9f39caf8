import { describe, expect, it } from 'vitest';
import type { AirInput } from '../../../src/science/room-air/air-input.js';
import { airRun } from '../../../src/science/room-air/air-run.js';
import {
  pushOutFraction,
  straightDisplacementFraction,
  straightDisplacementOxygen,
} from '../../../src/science/room-air/displacement.js';
import { inventoryBound } from '../../../src/science/room-air/inventory-bound.js';
import { siteVolumeFactor } from '../../../src/science/room-air/site-volume.js';
import { checkGases, checkInput } from '../../support/air-fixture.js';

/**
 * Days and stores of the three invented venues, and two demonstration cases of the air models (own
 * derivation): 5 % on simple sums, 15 % on time-stepped figures, as their author suggests.
 */
const SUM = 0.05;
const STEPPED = 0.15;

function within(value: number | undefined, printed: number, share: number): void {
  expect(Math.abs((value ?? Number.NaN) / printed - 1)).toBeLessThan(share);
}

type Parts = Pick<AirInput, 'ambient' | 'durationS'> & Partial<AirInput>;
const litresPerHour = (value: number): number => value / 1000 / 3600;

/** One mixed space of a volume, its carbon dioxide in ppm by the second. */
function mixed(volumeM3: number, parts: Parts): (atS: number, gas?: string) => number {
  const outputIntervalS = parts.outputIntervalS ?? 60;
  const result = airRun(
    { ...parts, outputIntervalS, spaces: [{ id: 'a', floorAreaM2: volumeM3 / 4, heightM: 4 }] },
    checkGases,
    { layered: false },
  );
  return (atS, gas = 'CO2') =>
    1e6 *
    (result.spaces.a?.mixed.gasFraction[gas]?.[Math.round(atS / outputIntervalS)] ?? Number.NaN);
}

const fresh = (m3PerS: number): Partial<AirInput> =>
  m3PerS > 0 ? { airSystems: [{ space: 'a', drive: 'supply', freshAirM3PerS: m3PerS }] } : {};
const people = (
  rows: readonly (readonly [number, number])[],
  fromS = 0,
  toS?: number,
): NonNullable<AirInput['occupants']> =>
  rows.map(([count, litres]) => ({
    space: 'a',
    count,
    carbonDioxideM3PerS: litresPerHour(litres),
    fromS,
    ...(toS === undefined ? {} : { toS }),
  }));

describe('a hall on a school matinee day, four shows', () => {
  const ambient = { temperatureK: 294.15, pressurePa: 100_800, relativeHumidity: 0.5 };
  // From 07:30: shows at 09:45, 11:15, 13:00, 14:30, 50 min each, doors 10 min before.
  const starts = [135, 225, 330, 420].map((minutes) => minutes * 60);
  const day = (flow: number) => {
    const co2 = mixed(3870, {
      ambient,
      durationS: 8.5 * 3600,
      ...fresh(flow),
      ...(flow > 0 ? {} : { infiltration: [{ space: 'a', airChangesPerHour: 0.15 }] }),
      occupants: starts.flatMap((at) =>
        people(
          [
            [288, 13],
            [32, 19],
            [9, 23.5],
          ],
          at - 600,
          at + 3000,
        ),
      ),
      releases: starts.flatMap((at) =>
        [
          { volumeM3: 0.02, startS: at + 480, durationS: 40 },
          { volumeM3: 0.012, startS: at + 960 },
          { massKg: 0.1, startS: at + 1200, durationS: 180 },
          { massKg: 6, startS: at + 2040, durationS: 240 },
        ].map((release) => ({ space: 'a', gas: 'CO2', ...release })),
      ),
    });
    return { starts: starts.map((at) => co2(at)), ends: starts.map((at) => co2(at + 3000)) };
  };

  it('has 0.68 outdoor changes an hour and meets every end and start of the normal mode', () => {
    within((0.735 * 3600) / 3870, 0.68, SUM);
    const { starts: begun, ends } = day(0.735);
    for (const [i, printed] of [2010, 2620, 2710, 2870].entries())
      within(ends[i], printed, STEPPED);
    for (const [i, printed] of [610, 1680, 1830, 2120].entries())
      within(begun[i], printed, STEPPED);
  });

  it('ends at 1460 to 1510 ppm and starts at 590 to 890 ppm on outdoor air alone', () => {
    const { starts: begun, ends } = day(2.2);
    within(Math.min(...ends), 1460, STEPPED);
    within(Math.max(...ends), 1510, STEPPED);
    within(Math.min(...begun), 590, STEPPED);
    within(Math.max(...begun), 890, STEPPED);
  });

  it('ends the fourth show near 6200 ppm with the fans off', () => {
    within(day(0).ends[3], 6200, STEPPED);
  });

  it('holds +2850 ppm, 12.0 % (11.3 %) in the pit and a bound of 25 % after a whole 20 kg box', () => {
    const box = (20 / 0.0440095) * ((8.314462618 * 294.15) / 100_800);
    within(box, 11, SUM);
    within(1e6 * pushOutFraction(box, 3870), 2850, SUM);
    within(straightDisplacementFraction(box, 92.2), 0.12, SUM);
    within(pushOutFraction(box, 92.2), 0.113, SUM);
    within(inventoryBound(box, 38.4 * 1.15), 0.25, SUM);
  });

  it('takes 2.8 % (2.7 %) in the trap room, and 3.1 % at the mats once the open pit is full', () => {
    const fog = (6 / 0.0440095) * ((8.314462618 * 294.15) / 100_800);
    within(straightDisplacementFraction(fog, 120), 0.028, SUM);
    within(pushOutFraction(fog, 120), 0.027, SUM);
    // Rake of 3 m over 22 m x 16 m, net 2570 of 2675 m3, and the pit below it.
    const below = (2570 / 2675) * ((22 * 16 * 0.5 ** 2) / 6);
    within(below, 14, SUM);
    within(inventoryBound(fog, below + 92.2), 0.031, SUM);
  });

  it('lets the rope store head for 4.5 % (4.3 %), the lift for no oxygen at all (6.0 %)', () => {
    const factor = siteVolumeFactor(291.15, 100_800);
    // 40 kg at 1.2 % an hour in 29 m3 with 0.2 changes an hour.
    const flow = (0.48 * 0.547 * factor) / 3600;
    within(flow * 3600, 0.262, SUM);
    const store = (durationS: number) =>
      mixed(29, {
        ambient: { ...ambient, temperatureK: 291.15 },
        durationS,
        outputIntervalS: durationS,
        infiltration: [{ space: 'a', airChangesPerHour: 0.2 }],
        releases: [{ space: 'a', gas: 'CO2', massKg: (0.48 * durationS) / 3600, durationS }],
      })(durationS) / 1e6;
    within(flow / ((0.2 * 29) / 3600), 0.045, SUM);
    within(store(100 * 3600), 0.043, SUM);
    const lift = (20 / 0.0440095) * ((8.314462618 * 294.15) / 100_800);
    expect(straightDisplacementOxygen(lift, 8.8)).toBe(0);
    within(0.2095 * (1 - pushOutFraction(lift, 8.8)), 0.06, SUM);
    within(pushOutFraction(lift, 8.8), 0.71, SUM);
    within(straightDisplacementOxygen(9.1 * factor, 880), 0.207, 0.005);
  });
});

describe('a gallery with six sessions', () => {
  const ambient = { temperatureK: 294.15, pressurePa: 100_800, relativeHumidity: 0.5 };
  const starts = [180, 215, 270, 305, 380, 415].map((minutes) => minutes * 60);
  const ends = (flow: number): readonly number[] => {
    const co2 = mixed(800, {
      ambient,
      durationS: 8 * 3600,
      ...fresh(flow),
      occupants: starts.flatMap((at) =>
        people(
          [
            [45, 13],
            [5, 19],
            [3, 23.5],
          ],
          at,
          at + 1500,
        ),
      ),
      releases: starts.flatMap((at) => [
        { space: 'a', gas: 'CO2', massKg: 0.4, startS: at + 480, durationS: 720 },
        { space: 'a', gas: 'CO2', volumeM3: 0.04, startS: at + 1200, durationS: 180 },
      ]),
    });
    return starts.map((at) => co2(at + 1500));
  };

  it('ends its sessions at 1040 rising to 1790 ppm; at 850 to 920 ppm on outdoor air alone', () => {
    // 60 % of 1.10 m3/s, a quarter of it from outdoors.
    const normal = ends(0.6 * 0.25 * 1.1);
    within(normal[0], 1040, STEPPED);
    within(Math.max(...normal), 1790, STEPPED);
    const outdoor = ends(0.6 * 1.1);
    within(Math.min(...outdoor), 850, STEPPED);
    within(Math.max(...outdoor), 920, STEPPED);
  });

  it('adds 326 ppm of carbon dioxide and 150 ppm of SF6 a session; bound of SF6 1270 ppm', () => {
    const added = 0.4 * 0.551 + 0.04;
    within(added, 0.26, SUM);
    within((1e6 * added) / 800, 326, SUM);
    within((1e6 * 0.12) / 800, 150, SUM);
    within((6 * 1e6 * 0.12) / 800, 900, SUM);
    within(1e6 * inventoryBound(0.12, (198 * 0.5 * 800) / 831.6), 1270, SUM);
    within(1e6 * inventoryBound(0.4 * 0.551, 198 * 0.6), 1900, SUM);
  });
});

describe('the windowless classroom, sums and door', () => {
  const site = (kg: number): number => (kg / 0.0440095) * ((8.314462618 * 295.15) / 99_900);
  const acts = site(2) + 0.06;

  it('lets out 1.18 m3, +8780 ppm if nothing leaves; bound at 0.5 m 3.4 % and 4.7 %', () => {
    within(site(1), 0.558, SUM);
    within(acts, 1.18, SUM);
    within((1e6 * acts) / 134, 8780, SUM);
    const below = (134 / 141.7) * 52.48 * 0.5;
    within(inventoryBound(site(1.5), below), 0.034, SUM);
    within(inventoryBound(acts, below), 0.047, SUM);
    within(site(1.5) / (52.48 * 0.9 * (134 / 141.7)), 0.019, SUM);
  });

  it('stays above 6000 ppm even if the door saw outdoor air: 6700 at 0.10, 6200 at 0.13 m3/s', () => {
    for (const [flow, printed] of [
      [0.1, 6700],
      [0.13, 6200],
    ] as const) {
      const co2 = mixed(134, {
        ambient: { temperatureK: 295.15, pressurePa: 99_900 },
        durationS: 3300,
        ...fresh(flow),
        occupants: people(
          [
            [27, 13],
            [3, 19],
            [2, 23.5],
          ],
          600,
        ),
        releases: [
          { volumeM3: 0.02, startS: 900, durationS: 40 },
          { massKg: 0.1, startS: 1320, durationS: 180 },
          { massKg: 1.5, startS: 1680, durationS: 600 },
          { massKg: 0.4, startS: 2400, durationS: 600 },
          { volumeM3: 0.04, startS: 3000, durationS: 180 },
        ].map((release) => ({ space: 'a', gas: 'CO2', ...release })),
      });
      const peak = Math.max(...Array.from({ length: 56 }, (_, minute) => co2(60 * minute)));
      within(peak, printed, STEPPED);
    }
  });

  it('finds +2.1 % for all 5 kg, 10.5 % (9.9 %) and 3.5 % (3.4 %) in the cupboard', () => {
    within(straightDisplacementFraction(site(5), 134), 0.021, SUM);
    within(straightDisplacementFraction(site(1.5), 8), 0.105, SUM);
    within(pushOutFraction(site(1.5), 8), 0.099, SUM);
    within(straightDisplacementFraction(site(0.5), 8), 0.035, SUM);
    within(pushOutFraction(site(0.5), 8), 0.034, SUM);
    const factor = siteVolumeFactor(295.15, 99_900);
    within(straightDisplacementOxygen(1.8 * factor, 134), 0.206, 0.005);
    for (const [content, straight, pushed] of [
      [1.8, 0.161, 0.166],
      [1.97, 0.156, 0.162],
    ] as const) {
      within(straightDisplacementOxygen(content * factor, 8), straight, SUM);
      within(0.2095 * (1 - pushOutFraction(content * factor, 8)), pushed, SUM);
    }
  });

  it('finds 1.5 % in the car on recirculation, 0.1 % with the fan on fresh air', () => {
    const car = (changes: number): number =>
      mixed(3, {
        ambient: { temperatureK: 295.15, pressurePa: 99_900 },
        durationS: 36_000,
        infiltration: [{ space: 'a', airChangesPerHour: changes }],
        occupants: people([[2, 19]]),
        // 5 kg losing 2.5 % an hour.
        releases: [{ space: 'a', gas: 'CO2', massKg: 1.25, durationS: 36_000 }],
      })(36_000) / 1e6;
    within(car(2.5), 0.015, STEPPED);
    // One printed digit: 0.1 % means 0.05 to 0.15 %.
    expect(car(40)).toBeGreaterThan(0.0005);
    expect(car(40)).toBeLessThan(0.0015);
  });
});

describe('tent and arena at 2300 m', () => {
  const arena = { temperatureK: 289.15, pressurePa: 76_600, relativeHumidity: 0.5 };
  const tent = { ...arena, temperatureK: 282.15 };
  const perKg = (kelvin: number): number => (8.314462618 * kelvin) / 76_600 / 0.0440095;
  const perLitre = (kelvin: number): number =>
    ((0.807 / 0.0280134) * 8.314462618 * kelvin) / 76_600;

  it('makes 0.713 and 0.696 m3 of a kilogram, 0.904 and 0.882 m3 of a litre', () => {
    within(perKg(289.15), 0.713, SUM);
    within(perKg(282.15), 0.696, SUM);
    within(perLitre(289.15), 0.904, SUM);
    within(perLitre(282.15), 0.882, SUM);
  });

  it('raises the tent by 472 ppm of fog and 1190 ppm of breath, the arena by 4190 ppm in the end', () => {
    within((1e6 * 2 * perKg(282.15)) / 2950, 472, SUM);
    const breath = mixed(2950, {
      ambient: tent,
      durationS: 360_000,
      outputIntervalS: 3600,
      infiltration: [{ space: 'a', airChangesPerHour: 1.5 }],
      occupants: people([
        [40, 13],
        [180, 19],
        [8, 23.5],
      ]),
    });
    within(breath(360_000) - 420, 1190, SUM);
    const house = mixed(32_500, {
      ambient: arena,
      durationS: 720_000,
      outputIntervalS: 600,
      ...fresh(3),
      occupants: people([
        [1770, 19],
        [30, 13],
        [22, 23.5],
      ]),
    });
    within(house(720_000) - 420, 4190, SUM);
    // "About one third of the rise" by the end of 70 minutes.
    within((house(4200) - 420) / 4190, 1 / 3, STEPPED);
  });

  it('finds 20.6 % after the cloud, 5.0 % (9.8 %) in the store tent, 0.2 % under the roof', () => {
    within(straightDisplacementOxygen(10 * perLitre(289.15), 590), 0.206, 0.005);
    within(straightDisplacementOxygen(50 * perLitre(282.15), 58), 0.05, SUM);
    within(0.2095 * (1 - pushOutFraction(50 * perLitre(282.15), 58)), 0.098, SUM);
    within(straightDisplacementFraction(4.8, 2400), 0.002, SUM);
    within((12 * perKg(289.15)) / 590, 0.0146, SUM);
  });

  it('lets 60 kg in the store tent head for +5760 ppm, and the van for 1.6, 0.4 and 0.1 %', () => {
    const idle = (
      volumeM3: number,
      changes: number,
      ambient: AirInput['ambient'],
      riders: number,
    ) =>
      mixed(volumeM3, {
        ambient,
        durationS: 360_000,
        outputIntervalS: 3600,
        infiltration: [{ space: 'a', airChangesPerHour: changes }],
        ...(riders > 0 ? { occupants: people([[riders, 19]]) } : {}),
        releases: [{ space: 'a', gas: 'CO2', massKg: 0.72 * 100, durationS: 360_000 }],
      })(360_000);
    within(idle(58, 1.5, tent, 0) - 420, 5760, SUM);
    within(idle(13, 2.5, arena, 0) - 420, 16_000, SUM);
    within(idle(13, 2.5, arena, 2), 18_000, SUM);
    within(idle(13, 10, arena, 0) - 420, 4000, SUM);
    within(idle(13, 40, arena, 0) - 420, 1000, SUM);
  });

  it('shows 3800 ppm for a true 5000 ppm on a head that nobody compensated', () => {
    within((5000 * 76_600) / 101_325, 3800, SUM);
  });
});

describe('demonstration cases of the air models, mixed, bound and first pass', () => {
  it('a tipped tank: 11.5, 5.8 and 2.4 % at 1, 2 and 5 s at 0.2 m, then 0.79, 0.29 and 0.14 %', () => {
    const { zones, spaces } = airRun(
      checkInput({
        durationS: 60,
        outputIntervalS: 1,
        spaces: [{ id: 'room', floorAreaM2: 63, heightM: 3 }],
        releases: [{ space: 'room', gas: 'SF6', volumeM3: 0.1 }],
        zones: [
          { id: 'mats', space: 'room', heightM: 0.55 },
          { id: 'seats', space: 'room', heightM: 1.1 },
        ],
      }),
      checkGases,
      { layered: false },
    );
    // Printed digits: 2 %.
    const floor = zones.mats?.at02M.bound.gasFraction.SF6;
    for (const [at, printed] of [
      [1, 0.115],
      [2, 0.058],
      [5, 0.024],
      [60, 0.0079],
    ] as const) {
      within(floor?.[at], printed, 0.02);
    }
    within(zones.mats?.bound.gasFraction.SF6?.[60], 0.0029, 0.02);
    within(zones.seats?.bound.gasFraction.SF6?.[60], 0.0014, 0.04);
    within(spaces.room?.mixed.gasFraction.SF6?.[60], 0.00053, 0.02);
    within(0.2095 - (spaces.room?.mixed.oxygenFraction[60] ?? 0), 0.00011, 0.02);
    within(spaces.room?.purePoolDepthM, 0.0016, 0.02);
  });

  it('10 L a minute go on: 0.16 % mixed in the end, bound of 2.4 % at 0.2 m after 30 min', () => {
    const { zones, spaces } = airRun(
      checkInput({
        durationS: 36_000,
        outputIntervalS: 1800,
        spaces: [{ id: 'room', floorAreaM2: 63, heightM: 3 }],
        infiltration: [{ space: 'room', airChangesPerHour: 2 }],
        releases: [{ space: 'room', gas: 'SF6', volumeM3: 6, durationS: 36_000 }],
        zones: [{ id: 'mats', space: 'room', heightM: 0.55 }],
      }),
      checkGases,
      { layered: false },
    );
    within(spaces.room?.mixed.gasFraction.SF6?.at(-1), 0.0016, 0.02);
    within(zones.mats?.at02M.bound.gasFraction.SF6?.[1], 0.024, 0.02);
  });

  it('helium hall: 2.4 % (2.3 %), 2.3, 1.6 and 1.2 % with one vent, bound 19 and 9.5 % under the ceiling', () => {
    within(straightDisplacementFraction(9.1, 384), 0.024, 0.02);
    within(straightDisplacementOxygen(9.1, 384), 0.2045, 0.002);
    const hall = (openings: NonNullable<AirInput['openings']>) =>
      airRun(
        checkInput({
          durationS: 7200,
          outputIntervalS: 600,
          spaces: [{ id: 'hall', floorAreaM2: 96, heightM: 4 }],
          openings,
          releases: [{ space: 'hall', gas: 'He', volumeM3: 9.1, durationS: 300, heightM: 1 }],
          zones: [
            { id: 'half', space: 'hall', heightM: 3.5 },
            { id: 'one', space: 'hall', heightM: 3 },
          ],
        }),
        checkGases,
        { layered: false },
      );
    const shut = hall([]);
    within(shut.spaces.hall?.mixed.gasFraction.He?.[1], 0.023, 0.02);
    within(shut.zones.half?.bound.gasFraction.He?.at(-1), 0.19, 0.02);
    within(shut.zones.half?.bound.oxygenFraction.at(-1), 0.169, 0.01);
    within(shut.zones.one?.bound.gasFraction.He?.at(-1), 0.095, 0.02);
    within(shut.zones.one?.bound.oxygenFraction.at(-1), 0.189, 0.01);
    const vent = hall([
      {
        from: 'hall',
        to: 'outside',
        kind: 'vent',
        widthM: 2,
        heightM: 0.5,
        sillLevelM: 3.5,
        dischargeCoefficient: 0.45,
      },
    ]).spaces.hall?.mixed.gasFraction.He;
    // The printed figures are the closed form from 2.37 % at 5 min, nothing lost while it flows;
    // (x^-1/2 + c t/2)^-2 with c = (0.45/3) 2 m (8.454 x 0.5^3)^1/2/384 m3. Two digits: 4 %.
    const c = (0.15 * 2 * Math.sqrt(8.454 * 0.5 ** 3)) / 384;
    for (const [step, printed] of [
      [1, 0.023],
      [6, 0.016],
      [12, 0.012],
    ] as const) {
      const closed = ((9.1 / 384) ** -0.5 + (c * (600 * step - 300)) / 2) ** -2;
      within(closed, printed, 0.04);
      // What leaves by the vent during the 5 min is counted here: some 4 % lower.
      within(vent?.[step], closed, 0.05);
      expect(vent?.[step]).toBeLessThan(closed);
    }
  });
});
