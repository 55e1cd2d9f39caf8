import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { assess } from '../../src/assessment/assess.js';
import { decisionOrder, type Assessment } from '../../src/assessment/assessment.js';
import { assessmentSchema } from '../../src/assessment/assessment-schema.js';
import type { PlanAct, PlanFile } from '../../src/assessment/plan-file.js';
import { schemaProblems } from '../../src/assessment/schema-check.js';
import { data, fogAct, hall } from '../support/plans.js';

/** What must hold of any plan, whatever the numbers. Common practice, no source. */

const rank = (assessment: Assessment) => decisionOrder.indexOf(assessment.decision.asFiled);
const judged = (plan: PlanFile) => assess(plan, data);
const rows = (assessment: Assessment) =>
  assessment.decisionTable.filter(({ fired }) => fired).map(({ row }) => row);

const measured = (value: number) => ({ value, origin: 'measured' as const });
function room(acts: PlanFile['acts'], changes: Partial<PlanFile> = {}): PlanFile {
  return hall({ acts, ...changes });
}

const cylinder = {
  id: 'argon',
  title: 'Argon 50 L',
  gas: 'Ar',
  form: 'compressed' as const,
  waterVolumeM3: 0.05,
  pressurePa: 20_000_000,
  place: 'hall',
};

const inhaling = (inhaled: NonNullable<PlanAct['inhaled']>[number]): PlanAct => ({
  id: 'voice',
  title: 'Changed voice',
  space: 'hall',
  minute: 5,
  releases: { planned: [], worstCredible: [] },
  inhaled: [inhaled],
});
const breathable = {
  by: 'presenter',
  from: 'limpBag',
  composition: { He: 0.79, O2: 0.21 },
  certified: true,
  analysedOxygenFraction: { value: 0.21, origin: 'measured' },
  trainedNamedAdult: true,
} as const;

describe('a refused inhalation', () => {
  it.each([
    ['a volunteer with balloon helium', { by: 'volunteer', from: 'balloon', gas: 'He' }],
    ['a child', { ...breathable, by: 'minor' }],
    ['a cylinder', { ...breathable, from: 'pressurised' }],
    ['a mask', { ...breathable, from: 'mask' }],
    ['a mixture poor in oxygen', { ...breathable, composition: { He: 0.85, O2: 0.15 } }],
    [
      'an analysis that nobody made',
      { ...breathable, analysedOxygenFraction: { value: 0.21, origin: 'assumed' } },
    ],
    [
      'a range that leaves the limits',
      {
        ...breathable,
        analysedOxygenFraction: { value: 0.21, low: 0.2, high: 0.22, origin: 'measured' },
      },
    ],
    ['xenon', { ...breathable, composition: { Xe: 0.79, O2: 0.21 } }],
    ['a fluorinated gas', { ...breathable, composition: { R134a: 0.79, O2: 0.21 } }],
    [
      'a gas that nobody named',
      {
        by: 'presenter',
        from: 'limpBag',
        certified: true,
        analysedOxygenFraction: 0.21,
        trainedNamedAdult: true,
      },
    ],
  ] as const)('of %s says No-go and the alternative, and no dose or time', (_, inhaled) => {
    const result = judged(room([inhaling(inhaled)]));
    expect(result.decision.asFiled).toBe('noGo');
    expect(result.acts[0]?.decision.asFiled).toBe('noGo');
    expect(result.spaces[0]?.decision.asFiled).toBe('noGo');
    const [refusal] = result.refusals;
    expect(refusal?.alternative.length).toBeGreaterThan(10);
    expect(JSON.stringify(result.refusals)).not.toMatch(/\d+ ?(s|sec|min|breath)/i);
    const told = JSON.stringify(result);
    const dose =
      /useful consciousness|(one|two|\d+)( or \w+)? breaths?\b|(seconds?|minutes?|\d s) (to|until|before) (collaps|unconsc|faint)/i;
    expect(dose.exec(told)?.[0] ?? null).toBeNull();
  });

  it('is no refusal for a certified mixture and a named, trained adult with a limp bag', () => {
    expect(judged(room([inhaling(breathable)])).refusals).toEqual([]);
  });

  it('stands where the catalogue says that a person breathes and the plan does not say how', () => {
    const { inhaled: _left, ...act } = inhaling(breathable);
    const result = judged(room([{ ...act, catalogueId: 'breathable-mixture-voice' }]));
    expect(result.refusals).toHaveLength(1);
  });
});

describe('worst credible releases', () => {
  it('count the earlier showings of their own act', () => {
    const twice = (starts: readonly string[]) => {
      const base = room([fogAct('hall', 3, 3)]);
      const performances = starts.map((startsAt) => ({ startsAt, durationMin: 45 }));
      return judged({ ...base, event: { ...base.event, performances } });
    };
    const highest = (result: Assessment) =>
      result.zones[0]?.quantities.find(
        (one) => one.quantity === 'CO2' && one.caseName === 'worstCredible',
      )?.answers.mixed?.value ?? 0;
    expect(highest(twice(['18:00', '19:00']))).toBeGreaterThan(highest(twice(['19:00'])) + 0.0005);
  });

  it('are the whole open container, even where the act states a smaller slip from it', () => {
    const act: PlanAct = {
      id: 'bag',
      title: 'Bag',
      space: 'hall',
      minute: 5,
      releases: {
        planned: [{ gas: 'Ar', volumeM3: 0.02, durationS: 30, stock: 'argon' }],
        worstCredible: [{ gas: 'Ar', volumeM3: 0.02, stock: 'argon' }],
      },
    };
    const result = judged(room([act], { stock: [cylinder] }));
    const volumes = result.acts[0]?.worstCredible.map(({ volume }) => volume.value) ?? [];
    // 50 L at 200 bar hold about 10 m3.
    expect(Math.max(...volumes)).toBeGreaterThan(9.8);
  });

  it('are a store where nobody is named in the space of an open container', () => {
    const base = room([]);
    const store = { id: 'store', title: 'Store', floorAreaM2: measured(6), heightM: measured(2.4) };
    const plan: PlanFile = {
      ...base,
      venue: { ...base.venue, spaces: [...base.venue.spaces, store] },
      stock: [{ ...cylinder, place: 'store' }],
    };
    expect(rows(judged(plan))).toContain(1);
    expect(judged(plan).spaces[1]?.decision.asFiled).toBe('noGo');
  });

  it('fail an oxygen cylinder in a store by enrichment', () => {
    const base = room([]);
    const store = {
      id: 'store',
      title: 'Store',
      floorAreaM2: measured(20),
      heightM: measured(2.5),
    };
    const plan: PlanFile = {
      ...base,
      venue: { ...base.venue, spaces: [...base.venue.spaces, store] },
      stock: [{ ...cylinder, gas: 'O2', place: 'store', open: false }],
    };
    expect(rows(judged(plan))).toContain(1);
  });

  it('refuse a person in a lift or a car with cold stock, and take an unstated head count as one', () => {
    const box = {
      id: 'box',
      title: 'Box',
      gas: 'CO2',
      form: 'dryIce' as const,
      massKg: 5,
      place: 'outside',
    };
    const leg = { id: 'ride', title: 'Ride', load: ['box'], airVolumeM3: 500 };
    const plan = (kind: 'lift' | 'car' | 'hand', people?: number): PlanFile =>
      room([], {
        stock: [box],
        transport: [{ ...leg, kind, ...(people === undefined ? {} : { people }) }],
      });
    expect(rows(judged(plan('lift')))).toContain(1);
    expect(rows(judged(plan('car')))).toContain(1);
    expect(rows(judged(plan('lift', 0)))).not.toContain(1);
    expect(rows(judged(plan('hand', 2)))).not.toContain(1);
  });
});

describe('the planned day', () => {
  it('counts what a box of dry ice gives off with its lid on', () => {
    const box = {
      id: 'box',
      title: 'Box',
      gas: 'CO2',
      form: 'dryIce' as const,
      massKg: 40,
      place: 'hall',
      open: false,
      fromS: 36_000,
    };
    const without = judged(room([]));
    const with40 = judged(room([], { stock: [box] }));
    const mixed = (result: Assessment) =>
      result.zones[0]?.quantities.find(
        (one) => one.quantity === 'CO2' && one.caseName === 'planned',
      )?.answers.mixed?.value ?? 0;
    expect(mixed(with40)).toBeGreaterThan(mixed(without) + 2e-4);
  });

  it('credits 0.7 of an air flow that nobody measured, and says so', () => {
    const flow = (origin: 'measured' | 'drawing') => {
      const base = room([fogAct('hall', 2, 2)]);
      return judged({
        ...base,
        venue: {
          ...base.venue,
          airSystems: [
            {
              space: 'hall',
              drive: 'supply',
              freshAirM3PerS: { value: 0.5, origin },
              extractLevel: 'high',
            },
          ],
        },
      });
    };
    expect(flow('measured').spaces[0]?.freshAir.value).toBeCloseTo(0.5, 9);
    expect(flow('drawing').spaces[0]?.freshAir.value).toBeCloseTo(0.35, 9);
    expect(
      flow('drawing')
        .assumptions.map(({ text }) => text)
        .join(),
    ).toContain('delivered share');
    expect(rank(flow('drawing'))).toBeGreaterThanOrEqual(rank(flow('measured')));
  });
});

describe('the word never improves', () => {
  it('when gas is added, air is removed, or a measured figure is only assumed', () => {
    fc.assert(
      fc.property(
        fc.double({ min: 0.2, max: 8, noNaN: true }),
        fc.double({ min: 1, max: 2, noNaN: true }),
        fc.double({ min: 0, max: 1.5, noNaN: true }),
        (kg, factor, changes) => {
          const plan = (mass: number, air: number, origin: 'measured' | 'assumed'): PlanFile => {
            const base = room([fogAct('hall', mass, mass)]);
            return {
              ...base,
              venue: {
                ...base.venue,
                infiltration: [{ space: 'hall', airChangesPerHour: { value: air, origin } }],
                spaces: base.venue.spaces.map((space) => ({
                  ...space,
                  floorAreaM2: { value: 180, origin },
                  heightM: { value: 6, origin },
                  volumeM3: { value: 1080, origin },
                })),
              },
            };
          };
          const now = rank(judged(plan(kg, changes, 'measured')));
          expect(rank(judged(plan(kg * factor, changes, 'measured')))).toBeGreaterThanOrEqual(now);
          expect(rank(judged(plan(kg, changes / factor, 'measured')))).toBeGreaterThanOrEqual(now);
          expect(rank(judged(plan(kg, changes, 'assumed')))).toBeGreaterThanOrEqual(now);
        },
      ),
      { numRuns: 6, seed: 20 },
    );
  });
});

describe('what is not known', () => {
  it('is said of a size without a range, with the way out', () => {
    const base = room([]);
    const plan: PlanFile = {
      ...base,
      venue: {
        ...base.venue,
        spaces: [{ id: 'hall', floorAreaM2: { origin: 'unknown' }, heightM: measured(6) }],
      },
    };
    expect(() => judged(plan)).toThrow(/floor area .* has no credible range/);
  });

  it('is filled from the kind of room, and has to be confirmed', () => {
    const base = room([]);
    const plan: PlanFile = {
      ...base,
      venue: {
        ...base.venue,
        spaces: [
          {
            id: 'hall',
            kind: 'school-hall',
            floorAreaM2: { origin: 'unknown' },
            heightM: measured(6),
          },
        ],
      },
    };
    expect(rank(judged(plan))).toBeGreaterThanOrEqual(decisionOrder.indexOf('goWithConditions'));
  });
});

describe('the assessment as a document', () => {
  const plan = room([fogAct('hall', 1, 5)], { stock: [cylinder] });

  it('fits its schema', () => {
    expect(schemaProblems(assessmentSchema, JSON.parse(JSON.stringify(judged(plan))))).toEqual([]);
  });

  it('is the same twice, to the byte, and its hash changes with any input', () => {
    const first = judged(plan);
    expect(JSON.stringify(judged(structuredClone(plan)))).toBe(JSON.stringify(first));
    const other: readonly PlanFile[] = [
      { ...plan, revision: 'B' },
      { ...plan, event: { ...plan.event, title: 'Another evening' } },
      room([fogAct('hall', 1.001, 5)], { stock: [cylinder] }),
    ];
    const hashes = new Set([first, ...other.map(judged)].map(({ inputHash }) => inputHash));
    expect(hashes.size).toBe(4);
  });

  it('prints fresh-air oxygen pressure wet, below the dry one', () => {
    const { freshAirOxygenPressure } = judged(plan).site;
    // 0.2095 x (101 325 - 1 166) Pa at 20 degrees C and 50 %.
    expect(freshAirOxygenPressure.value).toBeCloseTo(20_983, -1);
  });
});
