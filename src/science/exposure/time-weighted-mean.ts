import { InvalidInput } from '../../errors.js';

/** One stretch of a working day at a steady level. */
export interface ExposurePeriod {
  readonly hours: number;
  /** Level during the period [any unit]. */
  readonly level: number;
}

/**
 * Time-weighted mean of a working day [unit of the levels].
 *
 *   E = (C1 T1 + C2 T2 + ... + Cn Tn)/8
 *
 * @param periods stretches of the day with their level [h, unit of the levels], each above 0 h
 * @returns mean over eight hours [unit of the levels]; a shorter day counts as clean for the rest
 * @throws {InvalidInput} when a period has no length or a level below 0
 * Source: own-derivation (weighted mean; the form of 29 CFR 1910.1000(d)(1)(i)).
 * Assumes: no exposure outside the periods; a longer day is still divided by eight.
 * Accuracy: exact for the levels given.
 */
export function eightHourMean(periods: readonly ExposurePeriod[]): number {
  const bad = periods.findIndex(({ hours, level }) => !(hours > 0) || !(level >= 0));
  if (bad >= 0) {
    throw new InvalidInput(
      'A period of the day needs a length above 0 h and a level of 0 or more.',
      'Leave out periods without length.',
      [{ path: `/periods/${String(bad)}`, problem: 'has no length, or a level below 0' }],
    );
  }
  return periods.reduce((sum, { hours, level }) => sum + hours * level, 0) / 8;
}
