import { InvalidInput } from '../../errors.js';

/** A mean and the end of the window in which it was reached. */
export interface WindowedMean {
  readonly value: number;
  readonly atS: number;
}

/**
 * Highest moving average of a series [unit of the series].
 *
 *   max over t of (1/w) integral from t-w to t of x dt, x piecewise linear
 *
 * A series shorter than the window is averaged over its own length, which never gives less.
 *
 * @param timesS  times of the samples [s], rising, at least one
 * @param values  samples [unit of the series], as many as times
 * @param windowS length of the window [s], above 0
 * @returns the highest mean [unit of the series] and the end of its window [s]
 * @throws {InvalidInput} when the lists do not fit each other or the window is not positive
 * Source: own-derivation (trapezium rule, exact for a piecewise linear series).
 * Assumes: linear between samples. Accuracy: exact for that; windows end on samples or start on one.
 */
export function highestRollingMean(
  timesS: readonly number[],
  values: readonly number[],
  windowS: number,
): WindowedMean {
  const count = timesS.length;
  const first = timesS[0];
  const last = timesS[count - 1];
  if (first === undefined || last === undefined || values.length !== count || !(windowS > 0)) {
    throw new InvalidInput(
      'A moving average needs as many values as times, and a positive window.',
      'Give one value for each time and a window in seconds.',
      [{ path: '/values', problem: `${String(values.length)} values for ${String(count)} times` }],
    );
  }
  if (count === 1 || last - first <= windowS) {
    const area = integral(timesS, values);
    const length = last - first;
    return { value: length > 0 ? area / length : (values[0] ?? 0), atS: last };
  }

  const cumulated: number[] = [0];
  for (let i = 1; i < count; i += 1)
    cumulated.push(at(cumulated, i - 1) + slice(timesS, values, i));

  // The mean is extreme where one edge of the window meets a sample.
  let best: WindowedMean = { value: -Infinity, atS: last };
  const consider = (endS: number) => {
    const startS = endS - windowS;
    if (startS < first || endS > last) return;
    const value =
      (areaUpTo(endS, timesS, values, cumulated) - areaUpTo(startS, timesS, values, cumulated)) /
      windowS;
    if (value > best.value) best = { value, atS: endS };
  };
  for (const t of timesS) {
    consider(t);
    consider(t + windowS);
  }
  return best;
}

const at = (list: readonly number[], i: number): number => list[i] ?? 0;

function slice(timesS: readonly number[], values: readonly number[], i: number): number {
  return ((at(values, i - 1) + at(values, i)) / 2) * (at(timesS, i) - at(timesS, i - 1));
}

function integral(timesS: readonly number[], values: readonly number[]): number {
  let area = 0;
  for (let i = 1; i < timesS.length; i += 1) area += slice(timesS, values, i);
  return area;
}

function areaUpTo(
  t: number,
  timesS: readonly number[],
  values: readonly number[],
  cumulated: readonly number[],
): number {
  let low = 0;
  let high = timesS.length - 1;
  while (high - low > 1) {
    const middle = (low + high) >> 1;
    if (at(timesS, middle) <= t) low = middle;
    else high = middle;
  }
  const width = at(timesS, high) - at(timesS, low);
  if (width <= 0) return at(cumulated, high);
  const share = (t - at(timesS, low)) / width;
  const value = at(values, low) + share * (at(values, high) - at(values, low));
  return at(cumulated, low) + ((at(values, low) + value) / 2) * (t - at(timesS, low));
}
