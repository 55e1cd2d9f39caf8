import { inRange, type Range } from '../range.js';

export const METABOLIC_RATE: Range = { min: 0.5, max: 10, unit: 'met', name: 'Metabolic rate' };

/** Carbon dioxide of a seated adult, 1.2 met [m3/s at 293.15 K, 101 325 Pa]. */
export const SEATED_ADULT_CO2_M3_PER_S = 4.8e-6;
/** Volume of carbon dioxide breathed out per volume of oxygen taken up [-]. */
export const RESPIRATORY_QUOTIENT = 0.85;
const SEATED_MET = 1.2;

/**
 * Carbon dioxide breathed out by an adult [m3/s at 293.15 K and 101 325 Pa].
 *
 *   4.8e-6 m3/s x met/1.2
 *
 * @param metabolicRateMet metabolic rate [met], 0.5 to 10
 * @returns flow per person [m3/s]
 * @throws {OutOfRange} outside the range above
 * Source: persily-de-jonge-2017, number from memory. Assumes: proportional to the metabolic rate.
 * Accuracy: +-25 % between people.
 * @example breathCarbonDioxide(1.2) // 4.8e-6
 */
export function breathCarbonDioxide(metabolicRateMet: number): number {
  inRange(metabolicRateMet, METABOLIC_RATE, '/metabolicRateMet');
  return (SEATED_ADULT_CO2_M3_PER_S * metabolicRateMet) / SEATED_MET;
}
