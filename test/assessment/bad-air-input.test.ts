import { describe, expect, it } from 'vitest';
import { assess } from '../../src/assessment/assess.js';
import { airCalculator } from '../../src/assessment/calculators/air.js';
import { answer, type DoorError } from '../../src/assessment/calculators/door.js';
import type { PlanFile } from '../../src/assessment/plan-file.js';
import { InvalidInput } from '../../src/errors.js';
import type { AirInput } from '../../src/science/room-air/air-input.js';
import { data, fogAct, hall } from '../support/plans.js';

/** What cannot be meant is named with its place and what to do. Common practice, no source. */

const good: AirInput = {
  ambient: { temperatureK: 293.15, pressurePa: 101_325 },
  durationS: 600,
  outputIntervalS: 60,
  spaces: [
    { id: 'hall', floorAreaM2: 180, heightM: 6 },
    { id: 'pit', floorAreaM2: 40, heightM: 2.4, floorLevelM: -2.4 },
  ],
};
type Change = Partial<AirInput>;

function calculated(change: Change): { paths: string[]; problems: string; hint: string } {
  const { body, status, faults } = answer(airCalculator, { ...good, ...change }, data);
  expect(faults).toEqual([]);
  expect(status).toBe(2);
  const { details, hint } = (body as DoorError).error;
  return {
    paths: details.map(({ path }) => path),
    problems: details.map(({ problem }) => problem).join('; '),
    hint,
  };
}

const door = { from: 'hall', to: 'pit', kind: 'doorway', widthM: 1, heightM: 2 } as const;
const [hallSpace, pitSpace] = good.spaces;
if (!hallSpace || !pitSpace) throw new Error('no spaces');

const cases: readonly (readonly [string, Change, string, RegExp])[] = [
  [
    'an opening to a space that is not there',
    { openings: [{ ...door, to: 'loft' }] },
    '/openings/0/to',
    /names no space.*loft/,
  ],
  [
    'a release in a space that is not there',
    { releases: [{ space: 'loft', gas: 'He', volumeM3: 1 }] },
    '/releases/0/space',
    /names no space/,
  ],
  [
    'people in a space that is not there',
    { occupants: [{ space: 'loft', count: 2 }] },
    '/occupants/0/space',
    /names no space/,
  ],
  [
    'a plant that serves a space that is not there',
    { airSystems: [{ serves: [{ space: 'loft', share: 1 }], drive: 'supply' }] },
    '/airSystems/0/serves/0/space',
    /names no space/,
  ],
  [
    'a loop of transfers without outdoor air',
    {
      transfers: [
        { from: 'hall', to: 'pit', flowM3PerS: 0.1 },
        { from: 'pit', to: 'hall', flowM3PerS: 0.1 },
      ],
    },
    '/transfers/0',
    /loop between hall and pit, and none of it comes from outdoors/,
  ],
  [
    'air that comes from nowhere',
    {
      infiltration: [{ space: 'pit', airChangesPerHour: 1 }],
      transfers: [{ from: 'hall', to: 'pit', flowM3PerS: 0.1 }],
    },
    '/transfers/0/flowM3PerS',
    /without a balance: it gets 0 and gives 0\.1/,
  ],
  [
    'air that goes nowhere',
    {
      infiltration: [{ space: 'pit', airChangesPerHour: 1 }],
      transfers: [{ from: 'pit', to: 'hall', flowM3PerS: 0.1 }],
    },
    '/transfers/0/flowM3PerS',
    /without a balance: it gets 0\.1 and gives 0/,
  ],
  [
    'a volume more than 15 % away from its dimensions',
    { spaces: [{ ...hallSpace, volumeM3: 900 }, pitSpace] },
    '/spaces/0/volumeM3',
    /more than 15 % away from the shape \(1080 m3\)/,
  ],
  [
    'a doorway above the ceiling',
    { openings: [{ ...door, sillLevelM: -1 }] },
    '/openings/0/sillLevelM',
    /above the ceiling of pit/,
  ],
  [
    'a vent above the ceiling whose sill nobody gave',
    { openings: [{ ...door, to: 'outside', kind: 'vent', heightM: 7 }] },
    '/openings/0/heightM',
    /above the ceiling of hall/,
  ],
  [
    'a trap larger than the floor it lies in',
    { openings: [{ ...door, kind: 'floorOpening', widthM: 10, heightM: 5 }] },
    '/openings/0/widthM',
    /larger than the floor of pit/,
  ],
  [
    'two states of one door at the same time',
    {
      openings: [
        { ...door, id: 'D', sillLevelM: -2.4, toS: 300 },
        { ...door, id: 'D', sillLevelM: -2.4, fromS: 200, openFraction: 0 },
      ],
    },
    '/openings/1',
    /overlaps another time of D/,
  ],
  [
    'two speeds of one fan at the same time',
    {
      airSystems: [
        { id: 'F', space: 'hall', drive: 'supply', freshAirM3PerS: 0.1 },
        { id: 'F', space: 'hall', drive: 'supply', freshAirM3PerS: 0.3, fromS: 300 },
      ],
    },
    '/airSystems/1',
    /overlaps another time of F/,
  ],
  [
    'gaps given twice for the same time',
    {
      infiltration: [
        { space: 'hall', airChangesPerHour: 0.3 },
        { space: 'hall', airChangesPerHour: 0.5, fromS: 60 },
      ],
    },
    '/infiltration/1',
    /overlaps another entry/,
  ],
  [
    'a schedule that ends before it begins',
    { occupants: [{ space: 'hall', count: 5, fromS: 300, toS: 200 }] },
    '/occupants/0/toS',
    /not after fromS/,
  ],
  [
    'a mouth above the ceiling',
    { zones: [{ id: 'z', space: 'pit', heightM: 2.6 }] },
    '/zones/0/heightM',
    /above the ceiling/,
  ],
];

describe('bad input of the air calculator', () => {
  it('is none in the plain case, and door states one after the other are no overlap', () => {
    const { status } = answer(
      airCalculator,
      {
        ...good,
        openings: [
          { ...door, id: 'D', sillLevelM: -2.4, toS: 300 },
          { ...door, id: 'D', sillLevelM: -2.4, fromS: 300, openFraction: 0 },
        ],
        transfers: [
          { from: 'outside', to: 'pit', flowM3PerS: 0.1 },
          { from: 'pit', to: 'hall', flowM3PerS: 0.1 },
          { from: 'hall', to: 'outside', flowM3PerS: 0.1 },
        ],
      },
      data,
    );
    expect(status).toBe(0);
  });

  it.each(cases)('names %s with its path and what to do', (_, change, path, problem) => {
    const { paths, problems, hint } = calculated(change);
    expect(paths).toContain(path);
    expect(problems).toMatch(problem);
    expect(hint).not.toBe('');
  });

  it('names a space without floor area at its own key', () => {
    const { body, status } = answer(
      airCalculator,
      { ...good, spaces: [{ id: 'hall', heightM: 6 }] },
      data,
    );
    expect(status).toBe(2);
    expect(JSON.stringify((body as DoorError).error.details)).toContain('/spaces/0');
    const zero = answer(
      airCalculator,
      { ...good, spaces: [{ ...hallSpace, floorAreaM2: 0 }] },
      data,
    );
    expect(zero.status).not.toBe(0);
    expect((zero.body as DoorError).error.details[0]?.path).toBe('/spaces/0/floorAreaM2');
  });
});

function refused(plan: PlanFile): { paths: string[]; problems: string; hint: string } {
  let thrown: unknown;
  try {
    assess(plan, data);
  } catch (caught) {
    thrown = caught;
  }
  expect(thrown).toBeInstanceOf(InvalidInput);
  const { details, hint } = thrown as InvalidInput;
  return {
    paths: details.map(({ path }) => path),
    problems: details.map(({ problem }) => problem).join('; '),
    hint,
  };
}

const base = hall({ acts: [fogAct('hall', 1, 1)] });
const venue = (changes: Partial<PlanFile['venue']>): PlanFile => ({
  ...base,
  venue: { ...base.venue, ...changes },
});
const secondRoom = {
  id: 'foyer',
  floorAreaM2: { value: 50, origin: 'measured' },
  heightM: { value: 3, origin: 'measured' },
} as const;
const box = { id: 'box', title: 'Box', gas: 'CO2', form: 'dryIce', place: 'hall' } as const;
const fog = base.acts[0];
if (!fog) throw new Error('no act');
const drawing = (massKg: number): PlanFile['acts'][number] => ({
  ...fog,
  releases: { planned: [{ gas: 'CO2', massKg, durationS: 60, stock: 'box' }], worstCredible: [] },
});

const plans: readonly (readonly [string, PlanFile, string, RegExp])[] = [
  [
    'an act in a space that is not there',
    { ...base, acts: [{ ...fog, space: 'loft' }] },
    '/acts/0/space',
    /no space loft/,
  ],
  [
    'an audience in a space that is not there',
    {
      ...base,
      event: {
        ...base.event,
        audience: base.event.audience.map((group) => ({
          ...group,
          zone: { ...group.zone, space: 'loft' },
        })),
      },
    },
    '/event/audience/0/zone/space',
    /no space loft/,
  ],
  [
    'a release larger than its container',
    { ...base, acts: [drawing(6)], stock: [{ ...box, massKg: 5, count: 1 }] },
    '/acts/0/releases/planned/0',
    /lets out 1\.2 times what its container box holds/,
  ],
  [
    'an opening above the ceiling',
    venue({
      openings: [
        {
          from: 'hall',
          to: 'outside',
          kind: 'vent',
          widthM: { value: 1, origin: 'measured' },
          heightM: { value: 1, origin: 'measured' },
          sillLevelM: { value: 5.8, origin: 'measured' },
        },
      ],
    }),
    '/venue/openings/0/sillLevelM',
    /above the ceiling of hall/,
  ],
  [
    'a volume above what its dimensions hold by more than 15 %',
    venue({
      spaces: base.venue.spaces.map((space) => ({
        ...space,
        volumeM3: { value: 1300, origin: 'measured' },
      })),
    }),
    '/venue/spaces/0/volumeM3',
    /more than 15 % away from the shape/,
  ],
  [
    'two performances at the same time',
    {
      ...base,
      event: {
        ...base.event,
        performances: [
          { startsAt: '10:00', durationMin: 60 },
          { startsAt: '10:30', durationMin: 30 },
        ],
      },
    },
    '/event/performances/1/startsAt',
    /begins before performance 1 has ended/,
  ],
  [
    'two states of one door at the same time',
    venue({
      spaces: [...base.venue.spaces, secondRoom],
      openings: [
        { ...door, id: 'D', to: 'foyer', toS: 40_000 },
        { ...door, id: 'D', to: 'foyer', fromS: 39_000 },
      ],
    }),
    '/venue/openings/1',
    /overlaps another time of D/,
  ],
  [
    'a fan that stops before it starts',
    venue({
      airSystems: [
        { space: 'hall', drive: 'supply', freshAirM3PerS: 0.2, fromS: 50_000, toS: 40_000 },
      ],
    }),
    '/venue/airSystems/0/toS',
    /not after its start/,
  ],
  [
    'gaps given twice',
    venue({
      infiltration: [
        { space: 'hall', airChangesPerHour: 0.3 },
        { space: 'hall', airChangesPerHour: 0.7 },
      ],
    }),
    '/venue/infiltration/1',
    /gaps of hall twice/,
  ],
  [
    'a loop without outdoor air',
    venue({
      spaces: [...base.venue.spaces, secondRoom],
      infiltration: [
        { space: 'hall', airChangesPerHour: 0 },
        { space: 'foyer', airChangesPerHour: 0 },
      ],
      transfers: [
        { from: 'hall', to: 'foyer', flowM3PerS: 0.2 },
        { from: 'foyer', to: 'hall', flowM3PerS: 0.2 },
      ],
    }),
    '/venue/transfers/0',
    /none of it comes from outdoors/,
  ],
  [
    'an air balance that cannot close',
    venue({
      spaces: [...base.venue.spaces, secondRoom],
      infiltration: [
        { space: 'hall', airChangesPerHour: 0 },
        { space: 'foyer', airChangesPerHour: 0.5 },
      ],
      transfers: [{ from: 'hall', to: 'foyer', flowM3PerS: 0.2 }],
    }),
    '/venue/transfers/0/flowM3PerS',
    /without a balance/,
  ],
];

describe('bad input of the plan file', () => {
  it.each(plans)('names %s with its path and what to do', (_, plan, path, problem) => {
    const { paths, problems, hint } = refused(plan);
    expect(paths).toContain(path);
    expect(problems).toMatch(problem);
    expect(hint).not.toBe('');
  });

  it('takes a release that its container can hold at the ends of what is known', () => {
    const stock = { ...box, massKg: { value: 5, low: 4.5, high: 6.5 } };
    expect(() => assess({ ...base, acts: [drawing(6)], stock: [stock] }, data)).not.toThrow();
  });
});
