import { InvalidInput } from '../../errors.js';

export interface AmountSearch {
  readonly low: number;
  readonly high: number;
  /** Width of the last bracket over its upper end; default 1e-3. */
  readonly relative?: number;
}

/**
 * Largest amount that still passes [unit of the amount], or undefined when none does.
 *
 * Halves the span between an amount that passes and one that does not, and answers the one that
 * passes: the answer always has been tried. An amount that passes at the upper end is answered as
 * it is.
 *
 * @param passes whether an amount is allowed; more gas never helps
 * @param search span searched and how fine
 * @returns an amount that passes, within the fineness of the largest
 * @throws {InvalidInput} when the span is empty
 * Source: own-room-air. Assumes: once an amount fails, every larger one fails. Accuracy: the
 * fineness given.
 */
export function largestAmount(
  passes: (amount: number) => boolean,
  search: AmountSearch,
): number | undefined {
  checkSpan(search);
  if (passes(search.high)) return search.high;
  if (!passes(search.low)) return undefined;
  return lastOf(passes, search.low, search.high, search.relative ?? 1e-3);
}

/**
 * Least amount that passes [unit of the amount], or undefined when none does: fresh air for a plan.
 *
 * @param passes whether an amount suffices; more air never harms
 * @param search span searched and how fine
 * @returns an amount that passes, within the fineness of the least
 * @throws {InvalidInput} when the span is empty
 * Source: own-room-air. Assumes: once an amount passes, every larger one passes. Accuracy: the
 * fineness given.
 */
export function leastAmount(
  passes: (amount: number) => boolean,
  search: AmountSearch,
): number | undefined {
  checkSpan(search);
  if (passes(search.low)) return search.low;
  if (!passes(search.high)) return undefined;
  return lastOf(passes, search.high, search.low, search.relative ?? 1e-3);
}

/**
 * Largest count that still passes [-], 0 when not even one does: shows of a day, one after another.
 *
 * @param passes whether a count is allowed; one more never helps
 * @param most   largest count asked about [-], a whole number
 * @returns whole number from 0 to `most` [-]
 * Source: own-room-air. Assumes: once a count fails, every larger one fails. Accuracy: exact.
 * @example largestCount((count) => count <= 5, 24) // 5
 */
export function largestCount(passes: (count: number) => boolean, most: number): number {
  let yes = 0;
  let no = most + 1;
  while (no - yes > 1) {
    const middle = Math.floor((yes + no) / 2);
    if (passes(middle)) yes = middle;
    else no = middle;
  }
  return yes;
}

function lastOf(
  passes: (amount: number) => boolean,
  good: number,
  bad: number,
  relative: number,
): number {
  let yes = good;
  let no = bad;
  while (Math.abs(yes - no) > relative * Math.max(yes, no)) {
    const middle = 0.5 * (yes + no);
    if (passes(middle)) yes = middle;
    else no = middle;
  }
  return yes;
}

function checkSpan({ low, high }: AmountSearch): void {
  if (low >= 0 && high > low && Number.isFinite(high)) return;
  throw new InvalidInput('The span to search is empty.', 'Give a low end below the high end.', [
    { path: '', problem: `from ${String(low)} to ${String(high)}` },
  ]);
}
