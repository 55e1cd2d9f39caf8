import { standardPressure } from '../atmosphere.js';
import { inRange, type Range } from '../range.js';

export const oxygenFractionRange: Range = {
  name: 'oxygen fraction',
  unit: '',
  min: 0,
  max: 1,
};
export const exposurePressureRange: Range = {
  name: 'site pressure',
  unit: 'Pa',
  min: 50_000,
  max: 110_000,
};

/** Water vapour of air in the windpipe, saturated at body temperature [Pa]. */
const bodyVapourPa = 6280;

/**
 * Oxygen pressure of dry air [Pa].
 *
 *   pO2 = F p
 *
 * @param fraction   oxygen fraction, dry [-], 0 to 1
 * @param pressurePa site pressure [Pa], 50 000 to 110 000
 * @returns partial pressure [Pa]
 * @throws {OutOfRange} outside the ranges
 * Source: ideal-gas. Assumes: dry air. Accuracy: exact for an ideal gas.
 * @example dryOxygenPressure(0.2095, 101325) // 21228
 */
export function dryOxygenPressure(fraction: number, pressurePa: number): number {
  return (
    inRange(fraction, oxygenFractionRange, '/fraction') *
    inRange(pressurePa, exposurePressureRange, '/pressurePa')
  );
}

/**
 * Oxygen pressure of breathed-in air, moist in the windpipe [Pa].
 *
 *   PiO2 = F (p - 6280 Pa)
 *
 * @param fraction   oxygen fraction, dry [-], 0 to 1
 * @param pressurePa site pressure [Pa], 50 000 to 110 000
 * @returns partial pressure [Pa]
 * @throws {OutOfRange} outside the ranges
 * Source: ideal-gas. Assumes: air saturated at body temperature. Accuracy: 0.2 kPa.
 * @example inspiredOxygenPressure(0.21, 90000) // 17581
 */
export function inspiredOxygenPressure(fraction: number, pressurePa: number): number {
  return (
    inRange(fraction, oxygenFractionRange, '/fraction') *
    (inRange(pressurePa, exposurePressureRange, '/pressurePa') - bodyVapourPa)
  );
}

/**
 * Oxygen fraction that has the same oxygen pressure at sea level [-].
 *
 *   Feq = F p/101325
 *
 * @param fraction   oxygen fraction, dry [-], 0 to 1
 * @param pressurePa site pressure [Pa], 50 000 to 110 000
 * @returns fraction at sea level [-]
 * @throws {OutOfRange} outside the ranges
 * Source: iso-2533. Assumes: dry air. Accuracy: exact for an ideal gas.
 * @example seaLevelEquivalent(0.2, 79495) // 0.1569
 */
export function seaLevelEquivalent(fraction: number, pressurePa: number): number {
  return dryOxygenPressure(fraction, pressurePa) / standardPressure(0);
}
