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

  const cumulated = new Float64Array(count);
  for (let i = 1; i < count; i += 1)
    cumulated[i] = (cumulated[i - 1] ?? 0) + slice(timesS, values, i);
  const areaUpTo = (t: number, low: number): number => {
    const from = at(timesS, low);
    const width = at(timesS, low + 1) - from;
    const area = cumulated[low] ?? 0;
    if (!(width > 0)) return area;
    const value = at(values, low) + ((t - from) / width) * (at(values, low + 1) - at(values, low));
    return area + ((at(values, low) + value) / 2) * (t - from);
  };

  // The mean is extreme where one edge of the window meets a sample: both edges only ever move on.
  let best: WindowedMean = { value: -Infinity, atS: last };
  let start = 0;
  let end = 0;
  let nextStart = 0;
  let nextEnd = 0;
  for (;;) {
    const byStart = at(timesS, nextStart) + windowS;
    const byEnd = nextEnd < count ? at(timesS, nextEnd) : Infinity;
    const endS = Math.min(byStart, byEnd);
    if (!(endS <= last)) return best;
    if (byStart <= endS) nextStart += 1;
    if (byEnd <= endS) nextEnd += 1;
    const startS = endS - windowS;
    if (startS < first) continue;
    while (start + 2 < count && at(timesS, start + 1) <= startS) start += 1;
    while (end + 2 < count && at(timesS, end + 1) <= endS) end += 1;
    const value = (areaUpTo(endS, end) - areaUpTo(startS, start)) / windowS;
    if (value > best.value) best = { value, atS: endS };
  }
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
