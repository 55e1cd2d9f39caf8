import { inRange, type Range } from '../range.js';
import {
  MOLAR_GAS_CONSTANT,
  REFERENCE_PRESSURE_PA,
  REFERENCE_TEMPERATURE_K,
} from './air-constants.js';

export const SITE_TEMPERATURE: Range = {
  min: 223.15,
  max: 343.15,
  unit: 'K',
  name: 'Air temperature',
};
export const SITE_PRESSURE: Range = {
  min: 40_000,
  max: 120_000,
  unit: 'Pa',
  name: 'Site pressure',
};

/**
 * Volume at the site over volume at 293.15 K and 101 325 Pa [-].
 *
 *   (T/293.15 K) (101 325 Pa/p)
 *
 * @param temperatureK warmest temperature of the zone [K], 223.15 to 343.15
 * @param pressurePa   site pressure [Pa], 40 000 to 120 000
 * @returns factor [-]
 * @throws {OutOfRange} outside the ranges above
 * Source: ideal-gas. Assumes: ideal gas. Accuracy: better than 1 % for room gases.
 * @example siteVolumeFactor(289.15, 76600) // 1.3047315
 */
export function siteVolumeFactor(temperatureK: number, pressurePa: number): number {
  inRange(temperatureK, SITE_TEMPERATURE, '/temperatureK');
  inRange(pressurePa, SITE_PRESSURE, '/pressurePa');
  return (temperatureK / REFERENCE_TEMPERATURE_K) * (REFERENCE_PRESSURE_PA / pressurePa);
}

/**
 * Volume of one mole of ideal gas [m3/mol].
 *
 *   R T/p
 *
 * @param temperatureK temperature [K], 223.15 to 343.15
 * @param pressurePa   pressure [Pa], 40 000 to 120 000
 * @returns molar volume [m3/mol]
 * @throws {OutOfRange} outside the ranges above
 * Source: ideal-gas. Assumes: ideal gas. Accuracy: better than 1 % for room gases.
 * @example idealMolarVolume(293.15, 101325) // 0.02405511687
 */
export function idealMolarVolume(temperatureK: number, pressurePa: number): number {
  inRange(temperatureK, SITE_TEMPERATURE, '/temperatureK');
  inRange(pressurePa, SITE_PRESSURE, '/pressurePa');
  return (MOLAR_GAS_CONSTANT * temperatureK) / pressurePa;
}
