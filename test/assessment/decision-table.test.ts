import { describe, expect, it } from 'vitest';
import type { Answer, CaseName, DecisionWord } from '../../src/assessment/assessment.js';
import {
  decisionHits,
  worstWord,
  type DecisionFacts,
  type WorstCase,
} from '../../src/assessment/decision-table.js';
import type { JudgedLevel, LevelName } from '../../src/assessment/levels.js';
import type { AnswerOutcome, ZoneOutcome } from '../../src/assessment/zone-outcomes.js';

/** Every row of the decision table, fired and not fired by outcomes made for it. Common practice, no source. */

const at = (value: number) =>
  ({ value, statistic: 'peak', source: 'test', checked: 'judgement' }) as const;
const level: JudgedLevel = {
  quantity: 'CO2',
  title: 'Carbon dioxide',
  gas: 'CO2',
  failsWhen: 'above',
  scale: 1,
  aim: at(1),
  limit: at(2),
  never: at(3),
};

/** An answer that goes as far as a value: 1 is past nothing, 1.5 past aim, 2.5 limit, 3.5 never. */
function answer(value: number, neverAtS = 1000): AnswerOutcome {
  const failed = { aim: value > 1, limit: value > 2, never: value > 3 };
  return {
    value,
    atS: neverAtS,
    statistics: { peak: value },
    fails: failed,
    firstPast: failed.never ? { never: neverAtS } : {},
    series: [0, 0, 0, value],
  };
}

interface Made {
  readonly answers: Partial<Record<Answer, number>>;
  readonly floorCheck?: boolean;
  readonly toddler?: boolean;
  readonly neverAtS?: number;
  readonly caseName?: CaseName;
}

function outcome({
  answers,
  floorCheck = false,
  toddler = false,
  neverAtS,
  caseName,
}: Made): ZoneOutcome {
  return {
    zone: 'seats',
    group: {
      id: 'seats',
      title: 'Seats',
      space: 'hall',
      heightM: 1.1,
      floorLevelM: 0,
      count: 10,
      ageGroup: toddler ? 'toddler' : 'adult',
      kind: 'public',
      carbonDioxideM3PerS: 5e-6,
    },
    heightM: floorCheck ? 0.2 : 1.1,
    floorCheck,
    judgedFully: !floorCheck || toddler,
    caseName: caseName ?? 'planned',
    level,
    answers: Object.fromEntries(
      Object.entries(answers).map(([name, value]) => [name, answer(value, neverAtS)]),
    ),
    timesS: [0, 999, neverAtS ?? 1000, (neverAtS ?? 1000) + 30],
    oxygenPressurePa: {},
  };
}

const quiet: DecisionFacts = {
  planned: [],
  fansOff: [],
  worst: [],
  refused: [],
  places: [],
  onlyAssumed: false,
  meterFits: () => true,
  escapeTimeS: 120,
  escapeTimeFactor: 2,
  culprits: () => ['act'],
};

const worst = (made: Made): WorstCase => ({
  acts: ['act'],
  title: 'slip',
  startS: 1000,
  outcomes: [outcome({ ...made, caseName: 'worstCredible' })],
});

const fired = (facts: Partial<DecisionFacts>): readonly string[] =>
  decisionHits({ ...quiet, ...facts }).map(({ row, word }) => `${String(row)} ${word}`);
const word = (facts: Partial<DecisionFacts>): DecisionWord =>
  worstWord(decisionHits({ ...quiet, ...facts }).map((hit) => hit.word));

describe('the decision table, row by row', () => {
  it('says Go when no row fires', () => {
    const facts = {
      planned: [outcome({ answers: { mixed: 1, layered: 1, layeredP50: 1, bound: 1 } })],
    };
    expect(fired(facts)).toEqual([]);
    expect(word(facts)).toBe('go');
  });

  it('says No-go for a refusal and for a store, by row 1, and blames the act and the space', () => {
    const hits = decisionHits({
      ...quiet,
      refused: [{ act: 'voice', space: 'stage', reason: 'no' }],
      places: [{ place: 'store', acts: ['fog', 'boat'], reason: 'leak' }],
    });
    expect(hits.map(({ row, word: one, acts, space }) => ({ row, one, acts, space }))).toEqual([
      { row: 1, one: 'noGo', acts: ['voice'], space: 'stage' },
      { row: 1, one: 'noGo', acts: ['fog', 'boat'], space: 'store' },
    ]);
  });

  it.each([
    ['mixed fails the aim', { mixed: 1.5, layered: 1.5, layeredP50: 1 }],
    ['layered fails the limit', { mixed: 1, layered: 2.5, layeredP50: 1 }],
    ['the median fails the aim', { mixed: 1, layered: 1.5, layeredP50: 1.5 }],
  ])('says No-go by row 2 when %s on the planned day', (_, answers) => {
    expect(fired({ planned: [outcome({ answers })] })).toContain('2 noGo');
  });

  it('says No-go by row 2 when a peak passes never and the mean of the limit does not', () => {
    const made = outcome({ answers: { mixed: 1, layered: 1.5, layeredP50: 1 } });
    const { layered } = made.answers;
    if (!layered) throw new Error('made with a layer');
    const short = { ...layered, fails: { aim: true, limit: false, never: true } };
    const hits = decisionHits({
      ...quiet,
      planned: [{ ...made, answers: { ...made.answers, layered: short } }],
    });
    expect(hits.map((hit) => [hit.row, hit.word, hit.reason])).toEqual([
      [2, 'noGo', 'layeredPastNever'],
    ]);
  });

  it('asks for a meter by row 3 when only the upper end of the layer fails the aim', () => {
    const planned = [outcome({ answers: { mixed: 1, layered: 1.5, layeredP50: 1, bound: 1.5 } })];
    expect(fired({ planned })).toEqual(['3 goWithConditions']);
    expect(fired({ planned, meterFits: () => false })).toEqual(['3 noGo']);
  });

  it.each([
    ['limit', 2.5, 'boundPastLimit'],
    ['never', 3.5, 'boundPastNever'],
  ])('asks for a reading by row 4 when the bound fails the %s', (_, bound, reason) => {
    const hits = decisionHits({
      ...quiet,
      planned: [outcome({ answers: { mixed: 1, layered: 1, layeredP50: 1, bound } })],
    });
    expect(hits.map((hit) => [hit.row, hit.word, hit.reason])).toEqual([
      [4, 'goWithConditions', reason],
    ]);
  });

  it('does not spare the bound where the layer earns a meter already', () => {
    const planned = [outcome({ answers: { mixed: 1, layered: 1.5, layeredP50: 1, bound: 3.5 } })];
    expect(fired({ planned })).toEqual(['3 goWithConditions', '4 goWithConditions']);
  });

  it('never says No-go by row 5 alone, planned or worst credible', () => {
    const made: Made = {
      answers: { mixed: 3.5, layered: 3.5, layeredP50: 3.5, bound: 3.5 },
      floorCheck: true,
    };
    expect(
      fired({ planned: [outcome(made)], fansOff: [outcome(made)], worst: [worst(made)] }),
    ).toEqual(['5 goWithConditions', '5 goWithConditions']);
    const below: Made = { answers: { mixed: 2.5, layered: 2.5, bound: 2.9 }, floorCheck: true };
    expect(fired({ planned: [outcome(below)] })).toEqual([]);
  });

  it('judges 0.2 m against every level where toddlers are', () => {
    const made: Made = { answers: { mixed: 1.5 }, floorCheck: true, toddler: true };
    expect(fired({ planned: [outcome(made)] })).toContain('2 noGo');
  });

  it('says No-go by row 6 when the mixed worst case fails the limit, not when it fails the aim', () => {
    expect(fired({ worst: [worst({ answers: { mixed: 2.5 } })] })).toContain('6 noGo');
    expect(fired({ worst: [worst({ answers: { mixed: 1.5 } })] })).toEqual([]);
  });

  it('compares the time to Never with twice the practised escape time, by row 7', () => {
    const made = (neverAtS: number): Made => ({
      answers: { mixed: 1, layered: 3.5, bound: 1 },
      neverAtS,
    });
    expect(fired({ worst: [worst(made(1239))] })).toEqual(['7 noGo']);
    expect(fired({ worst: [worst(made(1240))] })).toEqual(['7 goWithConditions']);
    expect(fired({ worst: [worst(made(9999))], escapeTimeS: null })).toEqual(['7 noGo']);
  });

  /** Never lies at 3; the slip begins at 1000 s, and people need twice 120 s to be out. */
  const slipSeries = (timesS: readonly number[], series: readonly number[]): WorstCase => {
    const made = outcome({ answers: { mixed: 1, layered: 3.5, bound: 1 } });
    const { layered } = made.answers;
    if (!layered) throw new Error('made with a layer');
    return {
      ...worst({ answers: {} }),
      outcomes: [
        {
          ...made,
          caseName: 'worstCredible',
          timesS,
          answers: {
            ...made.answers,
            // What the whole window says first: long before the slip.
            layered: { ...layered, series, firstPast: { never: 100 } },
          },
        },
      ],
    };
  };

  it('counts the time to Never by row 7 from the slip, whatever an earlier show has done', () => {
    const times = [100, 130, 160, 990, 1020, 1300, 1330];
    expect(fired({ worst: [slipSeries(times, [0, 3.5, 0, 0, 0, 0, 3.5])] })).toEqual([
      '7 goWithConditions',
    ]);
    expect(fired({ worst: [slipSeries(times, [0, 3.5, 0, 0, 3.5, 3.5, 3.5])] })).toEqual([
      '7 noGo',
    ]);
  });

  it('leaves no time by row 7 where the level is past as the slip begins', () => {
    const times = [100, 990, 1020, 1330];
    expect(fired({ worst: [slipSeries(times, [0, 3.5, 3.5, 0])] })).toEqual(['7 noGo']);
  });

  it('does not blame a slip by row 7 for what the planned day did before it', () => {
    const times = [100, 130, 160, 990, 1020];
    expect(fired({ worst: [slipSeries(times, [0, 3.5, 0, 0, 0])] })).toEqual([]);
  });

  it('takes a peak of single draws that no sample shows as reached at once, by row 7', () => {
    const times = [100, 990, 1020];
    expect(fired({ worst: [slipSeries(times, [0, 0, 2.9])] })).toEqual(['7 noGo']);
  });

  it('asks for restraint by row 8 when the layer fails the limit only, or the bound fails never only', () => {
    expect(fired({ worst: [worst({ answers: { mixed: 1, layered: 2.5, bound: 2.5 } })] })).toEqual([
      '8 goWithConditions',
    ]);
    expect(fired({ worst: [worst({ answers: { mixed: 1, layered: 1, bound: 3.5 } })] })).toEqual([
      '8 goWithConditions',
    ]);
    expect(fired({ worst: [worst({ answers: { mixed: 1, layered: 1, bound: 2.9 } })] })).toEqual(
      [],
    );
  });

  it('says No-go or conditions by row 9 with fans off, as the mixed value fails never or the limit', () => {
    expect(fired({ fansOff: [outcome({ answers: { mixed: 3.5 } })] })).toEqual(['9 noGo']);
    expect(fired({ fansOff: [outcome({ answers: { mixed: 2.5 } })] })).toEqual([
      '9 goWithConditions',
    ]);
    expect(fired({ fansOff: [outcome({ answers: { mixed: 1.5 } })] })).toEqual([]);
  });

  it('asks for one reading by row 11 when everything is assumed and nothing else fires', () => {
    expect(fired({ onlyAssumed: true })).toEqual(['11 goWithConditions']);
    expect(fired({ onlyAssumed: true, fansOff: [outcome({ answers: { mixed: 3.5 } })] })).toEqual([
      '9 noGo',
    ]);
  });

  it('never gives a better word when an answer gets worse', () => {
    const steps = [1, 1.5, 2.5, 3.5];
    const order: readonly DecisionWord[] = ['go', 'goWithConditions', 'notEnoughKnown', 'noGo'];
    const names: readonly Answer[] = ['mixed', 'layered', 'layeredP50', 'bound'];
    const rank = (values: Partial<Record<Answer, number>>) => {
      // The layered answer is never below the mixed one, nor below its own median.
      const { mixed = 1, layeredP50 = 1, layered = 1 } = values;
      const answers = { ...values, layered: Math.max(mixed, layered, layeredP50) };
      return order.indexOf(
        word({ planned: [outcome({ answers })], worst: [worst({ answers })], fansOff: [] }),
      );
    };
    const check = (values: Partial<Record<Answer, number>>, rest: readonly Answer[]): void => {
      const [name, ...others] = rest;
      if (name === undefined) return;
      steps.forEach((step, index) => {
        const next = steps[index + 1];
        check({ ...values, [name]: step }, others);
        if (next !== undefined) {
          expect(rank({ ...values, [name]: next })).toBeGreaterThanOrEqual(
            rank({ ...values, [name]: step }),
          );
        }
      });
    };
    check({}, names);
  });

  it('names a level for every hit', () => {
    const levels: readonly LevelName[] = ['aim', 'limit', 'never'];
    const hits = decisionHits({ ...quiet, fansOff: [outcome({ answers: { mixed: 3.5 } })] });
    expect(hits.every((hit) => levels.includes(hit.level))).toBe(true);
  });
});
