import { describe, expect, it } from 'vitest';
import { planFindings } from '../../src/assessment/findings.js';
import type { HoldTime } from '../../src/assessment/assessment.js';
import { holdFindings } from '../../src/assessment/plausibility-findings.js';
import type { PlanFile } from '../../src/assessment/plan-file.js';
import { planReader } from '../../src/assessment/plan-reader.js';
import { resolvedPlan } from '../../src/assessment/resolve.js';
import { data, fogAct, hall } from '../support/plans.js';

/** Warnings worth giving: common practice, no source. Each fires on its plan and not on the plain one. */

const { policy, controls } = data.catalogue;

function resolve(plan: PlanFile) {
  return resolvedPlan(plan, {
    reader: planReader(() => 'stated'),
    gases: data.gases,
    policy,
    controls,
  });
}
const findings = (plan: PlanFile) => planFindings(plan, resolve(plan), policy);
const codes = (plan: PlanFile): readonly string[] => findings(plan).map(({ code }) => code);

const base = hall({ acts: [fogAct('hall', 1, 5)] });
const [space] = base.venue.spaces;
const [group] = base.event.audience;
const [act] = base.acts;
if (!space || !group || !act) throw new Error('the plain plan is empty');

const venue = (changes: Partial<PlanFile['venue']>): PlanFile => ({
  ...base,
  venue: { ...base.venue, ...changes },
});
const inSpace = (changes: Partial<typeof space>): PlanFile =>
  venue({ spaces: [{ ...space, ...changes }] });
const people = (changes: Partial<typeof group>): PlanFile => ({
  ...base,
  event: { ...base.event, audience: [{ ...group, ...changes }] },
});
type System = NonNullable<PlanFile['venue']['airSystems']>[number];
const plant = (changes: Partial<System>): PlanFile =>
  venue({
    airSystems: [
      {
        space: 'hall',
        drive: 'supply',
        freshAirM3PerS: { value: 0.4, origin: 'measured' },
        extractLevel: 'high',
        ...changes,
      },
    ],
  });
type Stock = NonNullable<PlanFile['stock']>[number];
const stocked = (item: Omit<Stock, 'id' | 'title' | 'place'> & Partial<Stock>): PlanFile => ({
  ...base,
  stock: [{ id: 'item', title: 'Item', place: 'hall', ...item }],
});
const shows = (performances: PlanFile['event']['performances']): PlanFile => ({
  ...base,
  event: { ...base.event, performances },
});
const letting = (
  planned: PlanFile['acts'][number]['releases']['planned'],
  more: Partial<PlanFile> = {},
): PlanFile => ({
  ...base,
  ...more,
  acts: [{ ...act, releases: { planned, worstCredible: act.releases.worstCredible } }],
});
const helium = { gas: 'He', form: 'compressed', waterVolumeM3: 0.01 } as const;
const box = { gas: 'CO2', form: 'dryIce', massKg: 5 } as const;

const warnings: readonly (readonly [string, string, PlanFile])[] = [
  ['a free volume 15 % under its dimensions', 'volume-mismatch', inSpace({ volumeM3: 900 })],
  ['a net volume above the gross one', 'volume-above-gross', inSpace({ volumeM3: 1100 })],
  ['under 2 m3 a person', 'crowded', people({ count: 600 })],
  ['over 60 m3 a person', 'roomy', people({ count: 10 })],
  ['over 20 total air changes', 'much-air', plant({ recirculatedM3PerS: 6 })],
  [
    'over 12 outdoor air changes',
    'much-outdoor-air',
    plant({ freshAirM3PerS: { value: 4, origin: 'measured' } }),
  ],
  [
    'outdoor air alone without evidence',
    'all-outdoor-air',
    plant({ freshAirM3PerS: { value: 0.4, origin: 'assumed' } }),
  ],
  [
    'a flow that only the design knows',
    'design-flow',
    plant({ freshAirM3PerS: { value: 0.4, origin: 'drawing' } }),
  ],
  ['a flow stated for when it is off', 'flow-while-off', plant({ fromS: 20_000, toS: 40_000 })],
  [
    'an extract of unknown level',
    'extract-level',
    venue({
      airSystems: [
        { space: 'hall', drive: 'supply', freshAirM3PerS: { value: 0.4, origin: 'measured' } },
      ],
    }),
  ],
  [
    'a store with more than one air change and no fan',
    'airy-low-room',
    venue({
      spaces: [{ ...space, kind: 'store' }],
      infiltration: [{ space: 'hall', airChangesPerHour: 2 }],
    }),
  ],
  [
    'a release above what is brought',
    'more-than-stock',
    letting([{ gas: 'CO2', massKg: 5.05, durationS: 60, stock: 'item' }], stocked(box)),
  ],
  [
    'a day above what is brought',
    'day-above-stock',
    letting([{ gas: 'CO2', massKg: 3, durationS: 60, stock: 'item' }], {
      ...stocked(box),
      event: {
        ...base.event,
        performances: [
          { startsAt: '10:00', durationMin: 60 },
          { startsAt: '14:00', durationMin: 60 },
        ],
      },
    }),
  ],
  [
    'a worst case below the planned one',
    'worst-below-planned',
    hall({ acts: [fogAct('hall', 5, 1)] }),
  ],
  [
    'a worst case below the open container',
    'worst-below-container',
    letting(
      [{ gas: 'CO2', massKg: 1, durationS: 60, stock: 'item' }],
      stocked({ ...box, massKg: 20 }),
    ),
  ],
  [
    'carbon dioxide by its pressure',
    'liquefied-by-pressure',
    stocked({ gas: 'CO2', form: 'compressed', waterVolumeM3: 0.01, pressurePa: 3e6 }),
  ],
  ['helium above 2.7 m3 in 10 L', 'overfull-cylinder', stocked({ ...helium, amountMol: 125 })],
  [
    'ordinary balloons above 15 L',
    'large-balloons',
    stocked({ gas: 'He', form: 'balloon', amountMol: 0.8, count: 20 }),
  ],
  [
    'more gas than the balloons hold',
    'balloon-gas',
    {
      ...letting(
        [{ gas: 'He', volumeM3: 0.5, durationS: 60 }],
        stocked({ gas: 'He', form: 'balloon', amountMol: 0.5, count: 20 }),
      ),
      acts: [
        {
          ...act,
          catalogueId: 'balloon-decor',
          releases: { planned: [{ gas: 'He', volumeM3: 0.5, durationS: 60 }], worstCredible: [] },
        },
      ],
    },
  ],
  ['a box losing under 0.3 % an hour', 'idle-loss', stocked({ ...box, idleLossPerHour: 0.001 })],
  ['a box losing over 10 % an hour', 'idle-loss', stocked({ ...box, idleLossPerHour: 0.2 })],
  [
    'a vessel losing under 0.3 % a day',
    'cryogen-loss',
    stocked({ gas: 'N2', form: 'cryogen', massKg: 8, idleLossPerHour: 0.0001 }),
  ],
  ['over 50 kg of dry ice in a room', 'much-cold-stock', stocked({ ...box, massKg: 60 })],
  [
    'over 50 L of liquid nitrogen in a room',
    'much-cold-stock',
    stocked({ gas: 'N2', form: 'cryogen', massKg: 42 }),
  ],
  [
    'children with no mouth below 0.7 m',
    'children-not-on-floor',
    people({ ageGroup: 'child', zone: { space: 'hall', heightM: 1.15 } }),
  ],
  [
    'repeats without time between',
    'no-time-between',
    shows([
      { startsAt: '10:00', durationMin: 60 },
      { startsAt: '11:00', durationMin: 60 },
    ]),
  ],
  [
    'altitude and pressure 3 kPa apart',
    'altitude-pressure',
    venue({ site: { ...base.venue.site, altitudeM: 0, pressurePa: 97_000 } }),
  ],
  [
    'a room below 5 degC',
    'room-temperature',
    venue({ site: { ...base.venue.site, temperatureK: 275 } }),
  ],
  ['a group of nobody', 'nobody', people({ count: 0 })],
  ['minors held to crew levels', 'minors-as-crew', people({ kind: 'crew', ageGroup: 'teenager' })],
  ['carbon dioxide and oxygen meters alone', 'no-carbon-dioxide-meter', base],
  [
    'fuel gas without its meter',
    'no-fuel-meter',
    letting([{ gas: 'CH4', volumeM3: 0.006, durationS: 60 }]),
  ],
  [
    'a carbon dioxide meter of unknown range',
    'meter-range',
    { ...base, meters: [{ id: 'm', gas: 'CO2', cellType: 'infrared' }] },
  ],
];

/** A plan that gives no reason to ask. */
const plain: PlanFile = {
  ...plant({}),
  stock: [{ id: 'item', title: 'Item', place: 'hall', ...box }],
  meters: [{ id: 'm', gas: 'CO2', cellType: 'infrared', rangeFraction: 0.05 }],
};

describe('plausibility warnings', () => {
  it('are none for the plain plan', () => {
    expect(codes(plain)).toEqual([]);
  });

  it.each(warnings)('question %s (%s), with a place and words', (_, code, plan) => {
    const found = findings(plan).filter((finding) => finding.code === code);
    expect(found.length).toBeGreaterThan(0);
    expect(found[0]?.path).toMatch(/^\//);
    expect(found[0]?.text.length).toBeGreaterThan(20);
    if (code !== 'no-carbon-dioxide-meter') expect(codes(plain)).not.toContain(code);
  });

  it('question a wait that is longer than the gap of the timetable, and one that never ends', () => {
    const resolved = resolve(
      shows([
        { startsAt: '10:00', durationMin: 60 },
        { startsAt: '11:30', durationMin: 60 },
      ]),
    );
    const hold = (timeS: number | null): HoldTime => ({
      space: 'hall',
      spaceTitle: 'Hall',
      quantity: 'CO2',
      toLevel: figure(0.0015),
      time: timeS === null ? null : figure(timeS),
      words: '',
    });
    const figure = (value: number) => ({
      value,
      unit: 's' as const,
      method: '',
      formula: '',
      inputs: [],
      source: '',
      range: '',
    });
    expect(holdFindings([hold(1700)], resolved)).toEqual([]);
    expect(holdFindings([hold(1900)], resolved)[0]?.text).toContain('shortest gap of 30 min');
    expect(holdFindings([hold(null)], resolved)).toHaveLength(1);
    expect(holdFindings([hold(null)], resolve(base))).toEqual([]);
  });

  it('refuse a filling pressure above 300 bar outright', () => {
    expect(() => resolve(stocked({ ...helium, pressurePa: 3.1e7 }))).toThrow('Filling pressure');
  });
});
