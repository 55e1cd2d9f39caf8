import { describe, expect, it } from 'vitest';
import { assess } from '../../src/assessment/assess.js';
import {
  filedPlan,
  isModelled,
  planWith,
  planWithOnly,
} from '../../src/assessment/controlled-plan.js';
import { controlWords } from '../../src/assessment/control-words.js';
import { evaluation } from '../../src/assessment/evaluation.js';
import type { ChosenControl, PlanFile } from '../../src/assessment/plan-file.js';
import { contextFor, hallWithPit, sources } from '../support/controls.js';
import { data, fogAct, hall } from '../support/plans.js';

/** What controls do to a plan and to its numbers. Common practice, no source, where none is named. */

const plan = hallWithPit(3, 10);
const withOnly = (...chosen: readonly ChosenControl[]) => planWithOnly(plan, chosen, sources);

/** Carbon dioxide of the planned day at a group: its highest mixed or layered value. */
function carbonDioxide(of: PlanFile, zone: string, answer: 'mixed' | 'layered' | 'bound'): number {
  const { planned } = evaluation(of, contextFor(of, 'quick'), () => 'worst');
  const found = planned.find(
    (one) => one.zone === zone && !one.floorCheck && one.level.quantity === 'CO2',
  );
  const value = found?.answers[answer]?.value;
  if (value === undefined) throw new Error(`nothing computed for ${zone}`);
  return value;
}

describe('the catalogue of controls', () => {
  it('lets every control with credit change the model, and says of every other why not', () => {
    const { controls } = data.catalogue;
    expect(controls.filter(({ credit, effect }) => credit && !isModelled(effect))).toEqual([]);
    const silent = controls.filter(({ credit, noCreditBecause }) => !credit && !noCreditBecause);
    expect(silent).toEqual([]);
  });

  it.each(data.catalogue.controls.map((control) => [control.id, control] as const))(
    '%s becomes steps and a line without an open slot or a brace',
    (_, control) => {
      const values = Object.fromEntries(
        control.parameters.map(({ key, default: usual, high }) => [key, usual ?? high ?? 1]),
      );
      const { steps, checklistLine } = controlWords(
        control,
        { control: control.id, act: 'fog', space: 'hall', group: 'mats', gas: 'Ar', values },
        plan,
      );
      expect([...steps, checklistLine].join(' ')).not.toMatch(/[{}…]|undefined|NaN/);
      expect(steps.length).toBeGreaterThan(0);
    },
  );
});

describe('what a control changes in the plan', () => {
  const fogOf = (of: PlanFile) => of.acts[0]?.releases;

  it('is nothing where it names no place, no number or nothing that is there', () => {
    for (const chosen of [
      { control: 'cap-what-enters', act: 'fog' },
      { control: 'mixing-fan', space: 'hall' },
      { control: 'nobody-below' },
      { control: 'another-gas', act: 'fog', gas: 'Ar' },
      { control: 'cover-pit', space: 'hall-two' },
      { control: 'valve-shut-between', act: 'fog' },
      { control: 'no-such-control' },
    ]) {
      expect(planWith(plan, chosen, sources)).toBe(plan);
    }
  });

  it('is the amount of a smaller portion, of parts, or of what is captured', () => {
    expect(
      fogOf(withOnly({ control: 'less-gas', act: 'fog', value: 0.5 }))?.planned[0]?.massKg,
    ).toBe(1.5);
    const captured = withOnly({ control: 'hose-outdoors', act: 'fog', value: 0.9 });
    expect(fogOf(captured)?.planned[0]?.massKg).toBeCloseTo(0.3, 12);
    const split = fogOf(withOnly({ control: 'split-release', act: 'fog' }))?.planned ?? [];
    expect(split.map(({ massKg, startS, durationS }) => [massKg, startS, durationS])).toEqual([
      [1.5, 0, 300],
      [1.5, 300, 300],
    ]);
    // Never more than nine tenths, whatever the plan claims.
    const greedy = withOnly({ control: 'hose-outdoors', act: 'fog', value: 1 });
    expect(fogOf(greedy)?.planned[0]?.massKg).toBeCloseTo(0.3, 12);
  });

  it('is the cap on slips and stock in kilograms and in cubic metres', () => {
    const kg = withOnly({ control: 'cap-what-enters', act: 'fog', value: 4 });
    expect(fogOf(kg)?.worstCredible[0]?.massKg).toBeCloseTo(4, 9);
    expect(kg.stock?.[0]?.massKg).toBeCloseTo(4, 9);
    // 1 kg of carbon dioxide is 0.547 m3 at 20 degrees C and 101.325 kPa (trade practice, 2.6).
    const volume = withOnly({ control: 'cap-what-enters', act: 'fog', values: { capM3: 0.547 } });
    expect(fogOf(volume)?.worstCredible[0]?.massKg).toBeCloseTo(1, 2);
  });

  it('is the gas, at the same amount of substance, where it does not come out cold', () => {
    const bag: PlanFile = {
      ...plan,
      acts: [
        {
          ...fogAct('hall', 0, 0),
          releases: {
            planned: [{ gas: 'SF6', massKg: 1.4605, durationS: 60, manner: 'gentle' }],
            worstCredible: [],
          },
        },
      ],
    };
    const swapped = planWith(bag, { control: 'another-gas', act: 'fog', gas: 'Ar' }, sources);
    expect(swapped.acts[0]?.releases.planned[0]?.gas).toBe('Ar');
    // 10 mol: SF6 146.05 g/mol, Ar 39.95 g/mol (IUPAC atomic weights).
    expect(swapped.acts[0]?.releases.planned[0]?.massKg).toBeCloseTo(0.3995, 3);
  });

  it('is where people are, and who is left', () => {
    const groupsOf = (of: PlanFile) =>
      Object.fromEntries(of.event.audience.map(({ id, zone }) => [id, zone]));
    expect(groupsOf(withOnly({ control: 'nobody-below', space: 'pit' })).players).toBeUndefined();
    const back = groupsOf(withOnly({ control: 'moved-back', group: 'mats', value: 0.6 }));
    expect(back.mats).toMatchObject({ heightM: 0.5, floorLevelM: 0.6 });
    expect(back.seats).toEqual(plan.event.audience[0]?.zone);
    // A rake of 2 m ends there.
    const far = groupsOf(withOnly({ control: 'moved-back', group: 'mats', value: 5 }));
    expect(far.mats).toMatchObject({ floorLevelM: 2 });
    expect(groupsOf(withOnly({ control: 'chairs-not-floor' })).mats?.heightM).toBe(1.1);
    const fewer = withOnly({ control: 'headcount-cap', value: 30 });
    expect(fewer.event.audience.map(({ count }) => count)).toEqual([20, 10, 3]);
  });

  it('is the time between houses, unless the day would not hold it', () => {
    const shows = (holdS: number) =>
      withOnly({ control: 'hold-between-shows', value: holdS }).event.performances.map(
        ({ startsAt }) => startsAt,
      );
    expect(shows(3600)).toEqual(['18:00', '19:40']);
    expect(shows(600)).toEqual(['18:00', '19:00']);
    const late: PlanFile = {
      ...plan,
      event: {
        ...plan.event,
        performances: [
          { startsAt: '22:00', durationMin: 60 },
          { startsAt: '23:10', durationMin: 30 },
        ],
      },
    };
    const kept = planWith(late, { control: 'hold-between-shows', value: 7200 }, sources);
    expect(kept.event.performances[1]?.startsAt).toBe('23:10');
  });

  it('is the leak of a cover, with nobody below it', () => {
    const covered = withOnly({ control: 'cover-pit', space: 'pit', value: 0.15 });
    expect(covered.venue.openings?.[0]?.openFraction).toBe(0.15);
    expect(covered.event.audience.map(({ id }) => id)).toEqual(['seats', 'mats']);
  });

  it('is the people in a lift, the place of stock and what a store is aired by', () => {
    expect(withOnly({ control: 'lift-alone' }).transport?.[0]?.people).toBe(0);
    const outside = withOnly({ control: 'stock-outdoors', space: 'hall' });
    expect(outside.stock?.[0]).toMatchObject({ place: 'outside', open: false });
    const store = withOnly({ control: 'ventilated-store', space: 'pit', value: 3 });
    expect(store.venue.infiltration?.find(({ space }) => space === 'pit')).toEqual({
      space: 'pit',
      airChangesPerHour: { value: 3, origin: 'measured' },
    });
  });

  it('is the kerb that gas has to rise over, up to its height', () => {
    const base = withOnly({ control: 'kerb-or-tray', space: 'hall', value: 0.2 });
    const [mouth, door] = base.venue.openings ?? [];
    expect(mouth?.sillLevelM).toBe(0.2);
    // What falls into the pit from above does not care for a kerb down there.
    const below = withOnly({ control: 'kerb-or-tray', space: 'pit', value: 0.2 });
    expect(below.venue.openings?.[0]).toEqual(plan.venue.openings?.[0]);
    expect(door).toMatchObject({ sillLevelM: 0.2 });
    expect(door?.heightM).toBeCloseTo(1.9, 9);
  });
});

describe('what a control does to the numbers', () => {
  it('draws gas out of the pit by its own extract, more where it was measured', () => {
    const before = carbonDioxide(plan, 'players', 'layered');
    const usual = carbonDioxide(
      withOnly({ control: 'pit-extract', space: 'pit' }),
      'players',
      'layered',
    );
    const stated = carbonDioxide(
      withOnly({ control: 'pit-extract', space: 'pit', value: 0.15 }),
      'players',
      'layered',
    );
    expect(usual).toBeLessThan(0.9 * before);
    // A flow that nobody measured is credited by 0.7.
    expect(stated).toBeLessThan(usual);
  });

  it('clears the room by outdoor air only, and by what is stated of it', () => {
    const mixed = (chosen: ChosenControl) => carbonDioxide(withOnly(chosen), 'seats', 'mixed');
    const before = carbonDioxide(plan, 'seats', 'mixed');
    const outdoor = mixed({ control: 'all-outdoor-air', space: 'hall' });
    expect(outdoor).toBeLessThan(before);
    expect(mixed({ control: 'all-outdoor-air', space: 'hall', value: 2 })).toBeLessThan(outdoor);
  });

  it('airs the house between shows by doors that stay shut during them', () => {
    expect(
      carbonDioxide(withOnly({ control: 'doors-between-shows', space: 'hall' }), 'seats', 'mixed'),
    ).toBeLessThan(carbonDioxide(plan, 'seats', 'mixed'));
  });

  it('stirs by a fan only what is measured, and removes nothing by it', () => {
    const stirred = withOnly({ control: 'mixing-fan', space: 'hall', value: 3 });
    expect(carbonDioxide(stirred, 'mats', 'layered')).toBeLessThan(
      carbonDioxide(plan, 'mats', 'layered'),
    );
    expect(carbonDioxide(stirred, 'seats', 'mixed')).toBeGreaterThan(
      0.99 * carbonDioxide(plan, 'seats', 'mixed'),
    );
  });

  it('counts gas by the house where a reading stands between, and not as filed', () => {
    // Six hours and one person: the air is clear again when the second house is let in.
    const base = hall({ acts: [fogAct('hall', 2, 2)] });
    const read: PlanFile = {
      ...base,
      event: {
        ...base.event,
        performances: [
          { startsAt: '10:00', durationMin: 40 },
          { startsAt: '16:00', durationMin: 40 },
        ],
        audience: base.event.audience.map((group) => ({ ...group, count: 1 })),
      },
      controls: [{ control: 'reading-before-entry' }],
    };
    expect(filedPlan(read, sources).controls).toEqual([]);
    // At the end of the day the bound as filed still holds the gas of both houses.
    const atEnd = (of: PlanFile) => {
      const { planned } = evaluation(of, contextFor(of, 'quick'), () => 'worst');
      const seats = planned.find((one) => one.zone === 'seats' && one.level.quantity === 'CO2');
      return seats?.answers.bound?.series.at(-1) ?? Number.NaN;
    };
    expect(atEnd(read)).toBeLessThan(0.8 * atEnd(filedPlan(read, sources)));
  });
});

describe('controls in an assessment', () => {
  const chosen: readonly ChosenControl[] = [
    { control: 'pit-extract', space: 'pit', value: 0.15 },
    { control: 'nobody-below', space: 'pit' },
    { control: 'trained-holder' },
  ];
  const result = assess({ ...plan, controls: [...chosen] }, data);
  const [extract, empty, holder] = result.controls;

  it('are worked out each by itself, and a condition earns nothing and says why', () => {
    expect(extract).toMatchObject({ id: 'pit-extract', chosen: true, credited: true });
    expect(empty).toMatchObject({ id: 'nobody-below', chosen: true, credited: true });
    expect(extract?.before).toEqual(empty?.before);
    expect(extract?.after?.value).not.toBe(empty?.after?.value);
    expect(holder).toMatchObject({ credited: false, before: null, after: null });
    expect(holder?.terms).toMatch(/nobody knows/);
  });

  it('become conditions with their numbers filled in', () => {
    const texts = result.conditions.map(({ text }) => text).join('\n');
    expect(texts).toContain('Have the extract of Pit switched on before the cue: 150');
    const lines = result.conditions.map(({ checklistLine }) => checklistLine);
    expect(lines).toContain('Pit: empty and locked, key with the stage manager');
    expect(JSON.stringify([result.conditions, result.controls])).not.toMatch(/\{[a-z][A-Za-z]*\}/);
  });

  it('are suggested in the order of what they do to the deciding number, no gas among them', () => {
    const ranked = result.controls.filter(({ rank, act }) => rank !== null && act === 'fog');
    expect(ranked.map(({ rank }) => rank)).toEqual(ranked.map((_, index) => index + 1));
    expect(ranked.map(({ id }) => id)).toContain('recording-instead');
    expect(ranked.map(({ id }) => id)).toContain('less-gas');
    const after = ranked.flatMap((one) => one.after?.value ?? []);
    expect(after).toEqual(after.toSorted((a, b) => a - b));
    const [first] = ranked;
    expect(first?.before?.value).toBeGreaterThan(first?.after?.value ?? 0);
  });
});

describe('use less', () => {
  it('goes down to the smallest audible amount where the act makes sound', () => {
    const base = hall();
    const pipe: PlanFile['acts'][number] = {
      id: 'pipe',
      title: 'Pipe in a bag',
      space: 'hall',
      minute: 10,
      releases: {
        planned: [{ gas: 'SF6', volumeM3: 6, durationS: 60, manner: 'gentle', heightM: 0.2 }],
        worstCredible: [],
      },
      writtenAuthority: true,
      recovery: true,
      sound: [
        {
          instrument: 'tube',
          frequencyInAirHz: 440,
          lengthM: 0.39,
          radiusM: 0.02,
          gas: 'SF6',
          bagVolumeM3: 6,
        },
      ],
    };
    const result = assess({ ...base, acts: [pipe] }, data);
    const less = result.controls.find(({ id, rank }) => id === 'less-gas' && rank !== null);
    const amounts = result.sound[0]?.smallestAudible.flatMap(({ amount }) => amount?.value ?? []);
    const least = Math.min(...(amounts ?? []));
    expect(least).toBeGreaterThan(0);
    // The control takes no share below a twentieth.
    expect(less?.choice.values?.amountShare).toBeCloseTo(
      least / (result.sound[0]?.amount?.value ?? 0),
      6,
    );
  });
});
