import type { Condition, Fact } from './catalogue-types.js';

/** What a plan says about the facts that rules ask for; a missing key is a fact not settled. */
export type FactValues = Readonly<Partial<Record<Fact, boolean | number | readonly string[]>>>;

/** What a condition comes to; `open` where it hangs on a fact that the plan does not settle. */
type Answer = 'holds' | 'fails' | 'open';

function testAnswer(test: Condition, values: FactValues): Answer {
  if (test.fact === undefined) return 'holds';
  const value = values[test.fact];
  if (value === undefined) return 'open';
  const holds = ((): boolean => {
    if (typeof value === 'boolean') return value === (test.is ?? true);
    if (typeof value === 'number') {
      return (
        (test.above === undefined || value > test.above) &&
        (test.atLeast === undefined || value >= test.atLeast) &&
        (test.below === undefined || value < test.below)
      );
    }
    return test.anyOf === undefined
      ? value.length > 0
      : test.anyOf.some((wanted) => value.includes(wanted));
  })();
  return holds ? 'holds' : 'fails';
}

const opposite = { holds: 'fails', fails: 'holds', open: 'open' } as const;

function allOf(answers: readonly Answer[]): Answer {
  if (answers.includes('fails')) return 'fails';
  return answers.includes('open') ? 'open' : 'holds';
}

function conditionAnswer(condition: Condition, values: FactValues): Answer {
  if (condition.always === true) return 'holds';
  const parts = (list: readonly Condition[]) => list.map((part) => conditionAnswer(part, values));
  const any = (answers: readonly Answer[]): Answer =>
    opposite[allOf(answers.map((one) => opposite[one]))];
  return allOf([
    testAnswer(condition, values),
    ...parts(condition.all ?? []),
    ...(condition.any === undefined ? [] : [any(parts(condition.any))]),
    ...(condition.not === undefined ? [] : [opposite[conditionAnswer(condition.not, values)]]),
  ]);
}

/**
 * Whether a condition of a rule or caution applies to a plan. A condition that hangs on a fact not
 * settled applies: the unknown leans towards the duty.
 */
export function conditionHolds(condition: Condition, values: FactValues): boolean {
  return conditionAnswer(condition, values) !== 'fails';
}
