/** A reading that clears when it is at or above a level (oxygen) or at or below it (a gas). */
export type ClearSide = 'atLeast' | 'atMost';

/**
 * Time from which a series stays clear of a level [s], or undefined when it does not within it.
 *
 *   last time outside, interpolated to the level
 *
 * @param timesS rising times [s]
 * @param values reading at those times [-]
 * @param level  level to be clear of [-]
 * @param side   atLeast for oxygen, atMost for a gas
 * @returns first time after which every value is clear [s]; the first time when all are
 * Source: own-room-air. Assumes: straight between the points. Accuracy: that of the interval.
 */
export function clearFrom(
  timesS: readonly number[],
  values: readonly number[],
  level: number,
  side: ClearSide,
): number | undefined {
  const sign = side === 'atLeast' ? 1 : -1;
  const margin = (i: number): number => sign * ((values[i] ?? 0) - level);
  let last = -1;
  for (let i = 0; i < timesS.length; i++) if (margin(i) < 0) last = i;
  if (last < 0) return timesS[0];
  const before = timesS[last];
  const after = timesS[last + 1];
  if (before === undefined || after === undefined) return undefined;
  const gap = margin(last + 1) - margin(last);
  return before + ((after - before) * -margin(last)) / gap;
}

/**
 * Time from the last release until a series stays clear of a level [s]: the hold before the next.
 *
 * @param timesS  rising times [s]
 * @param values  reading at those times [-]
 * @param level   level to be clear of [-]
 * @param side    atLeast for oxygen, atMost for a gas
 * @param sinceS  end of the last release [s]
 * @returns hold time [s], 0 when already clear; undefined when not clear within the series
 * Source: own-room-air. Assumes: as clearFrom. Accuracy: that of the interval.
 */
export function holdTime(
  timesS: readonly number[],
  values: readonly number[],
  level: number,
  side: ClearSide,
  sinceS: number,
): number | undefined {
  const clear = clearFrom(timesS, values, level, side);
  return clear === undefined ? undefined : Math.max(0, clear - sinceS);
}
