import type { Condition, Fact } from './catalogue-types.js';

/** What a plan says about the facts that rules ask for; a missing key is a fact not settled. */
export type FactValues = Readonly<Partial<Record<Fact, boolean | number | readonly string[]>>>;

function testHolds(test: Condition, values: FactValues): boolean {
  if (test.fact === undefined) return true;
  const value = values[test.fact];
  // The unknown leans towards the duty.
  if (value === undefined) return true;
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
}

/** Whether a condition of a rule or caution holds for a plan. */
export function conditionHolds(condition: Condition, values: FactValues): boolean {
  if (condition.always === true) return true;
  return (
    testHolds(condition, values) &&
    (condition.all ?? []).every((part) => conditionHolds(part, values)) &&
    (condition.any === undefined || condition.any.some((part) => conditionHolds(part, values))) &&
    (condition.not === undefined || !conditionHolds(condition.not, values))
  );
}
