import { inRange, type Range } from '../range.js';
import type { AirOccupants } from './air-input.js';

export const METABOLIC_RATE: Range = { min: 0.5, max: 10, unit: 'met', name: 'Metabolic rate' };

/** Carbon dioxide of a seated adult, 1.2 met [m3/s at 293.15 K, 101 325 Pa]. */
const SEATED_ADULT_CO2_M3_PER_S = 4.8e-6;
/** Volume of carbon dioxide breathed out per volume of oxygen taken up [-]. */
const RESPIRATORY_QUOTIENT = 0.85;
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

/** What people of one place breathe [m3/s at ambient conditions]. */
export interface BreathFlows {
  readonly carbonDioxide: number;
  /** Taken up. */
  readonly oxygen: number;
}

/**
 * Carbon dioxide that people breathe out and oxygen that they take up [m3/s at ambient conditions].
 *
 *   n s_c, n s_c/RQ
 *
 * @param one        people of a place: count, and their rate where it is stated
 * @param siteFactor ambient volume of a volume at 293.15 K and 101 325 Pa [-]
 * @returns both flows [m3/s]
 * @throws {OutOfRange} for a metabolic rate outside its range
 * Source: persily-de-jonge-2017. Assumes: as breathCarbonDioxide. Accuracy: +-25 % between people.
 */
export function breathFlows(one: AirOccupants, siteFactor: number): BreathFlows {
  const perPerson =
    one.carbonDioxideM3PerS ??
    (one.metabolicRateMet === undefined
      ? SEATED_ADULT_CO2_M3_PER_S
      : breathCarbonDioxide(one.metabolicRateMet));
  const carbonDioxide = one.count * perPerson * siteFactor;
  return {
    carbonDioxide,
    oxygen: carbonDioxide / (one.respiratoryQuotient ?? RESPIRATORY_QUOTIENT),
  };
}
