import { inRange, type Range } from '../range.js';

const positiveTemperature: Range = { min: 1, max: 5000, unit: 'K', name: 'temperature' };
const positivePressure: Range = { min: 1, max: 1e8, unit: 'Pa', name: 'absolute pressure' };

/** R of the SI of 2019, for the places that have no gas library at hand. */
const gasConstant = 8.314462618;

/**
 * Molar volume of an ideal gas [m^3/mol].
 *
 *   V = R T/p
 *
 * @param T  temperature [K], 1 to 5000
 * @param p  absolute pressure [Pa], 1 to 1e8
 * @returns  molar volume [m^3/mol]
 * @throws {OutOfRange} outside the ranges above
 * Source: si-2019. Assumes: ideal gas. Accuracy: within 1 - Z, that is 0.1 % for permanent gases
 * and 1 to 4 % for carbon dioxide, sulfur hexafluoride and heavier ones at room conditions.
 * @example molarVolumeM3PerMol(293.15, 101325) // 0.0240551
 */
export function molarVolumeM3PerMol(T: number, p: number): number {
  inRange(T, positiveTemperature, '/temperatureK');
  inRange(p, positivePressure, '/pressurePa');
  return (gasConstant * T) / p;
}
