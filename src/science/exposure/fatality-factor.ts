import { inRange, type Range } from '../range.js';

export const oxygenPressureRange: Range = {
  name: 'oxygen pressure',
  unit: 'Pa',
  min: 0,
  max: 110_000,
};

const pascalPerMmHg = 133.322;
const certainMmHg = 65;
const noEffectMmHg = 135;

/**
 * Chance that a person dies once an oxygen-deficiency event has happened [-].
 *
 *   F = 10^((65 - pO2)/10), pO2 in mmHg; 1 at or below 65, 0 above 135
 *
 * A laboratory method for comparing designs; it certifies nothing and judges no plan.
 *
 * @param oxygenPressurePa lowest oxygen pressure reached [Pa], 0 to 110 000
 * @returns chance [-]
 * @throws {OutOfRange} outside the range
 * Source: odh-method. Assumes: the lowest value reached, not a mean. Accuracy: a convention.
 * @example fatalityFactor(13332.2) // 0.000316
 */
export function fatalityFactor(oxygenPressurePa: number): number {
  const mmHg = inRange(oxygenPressurePa, oxygenPressureRange, '/oxygenPressurePa') / pascalPerMmHg;
  if (mmHg > noEffectMmHg + 1e-9) return 0;
  return Math.min(1, 10 ** ((certainMmHg - mmHg) / 10));
}
