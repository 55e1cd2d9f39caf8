import { inRange, type Range } from '../range.js';

/** Pressure at which the gaps of a room pass what is stated as its air change [Pa]. */
export const LEAKAGE_REFERENCE_PA = 4;

export const DOOR_AREA: Range = { min: 0.1, max: 30, unit: 'm2', name: 'Door area' };

/**
 * Pressure rise in a rigid sealed space [Pa].
 *
 *   p Vg/V
 *
 * @param gasM3    released volume Vg at the pressure before [m3], 0 or more
 * @param volumeM3 net volume V [m3], above 0
 * @param pressurePa pressure before p [Pa]
 * @returns rise [Pa]
 * Source: ideal-gas. Assumes: nothing leaves, constant temperature. Accuracy: exact.
 * @example sealedPressureRise(9.1, 384, 101325) // 2401.1914
 */
export function sealedPressureRise(gasM3: number, volumeM3: number, pressurePa: number): number {
  return (pressurePa * gasM3) / volumeM3;
}

/**
 * Pressure rise while air leaves a space through gaps [Pa].
 *
 *   0.5 rho (Q/(Cd A))^2
 *
 * @param outflowM3PerS flow through the gaps Q [m3/s]
 * @param gapAreaM2     area of the gaps A [m2], above 0
 * @param densityKgPerM3 density of the air rho [kg/m3], default 1.204
 * @param dischargeCoefficient Cd [-], default 0.6
 * @returns rise [Pa]
 * Source: own-room-air. Assumes: orifice flow. Accuracy: that of the gap area.
 * @example leakyPressureRise(0.67, 0.01) // 7507
 */
export function leakyPressureRise(
  outflowM3PerS: number,
  gapAreaM2: number,
  densityKgPerM3 = 1.204,
  dischargeCoefficient = 0.6,
): number {
  return 0.5 * densityKgPerM3 * (outflowM3PerS / (dischargeCoefficient * gapAreaM2)) ** 2;
}

/**
 * Area of the gaps of a space from its air change with fans off [m2].
 *
 *   A = Q/(Cd sqrt(2 dp/rho)), dp = 4 Pa
 *
 * @param infiltrationM3PerS air that comes in with fans off Q [m3/s], 0 or more
 * @param densityKgPerM3     density of the air rho [kg/m3], default 1.204
 * @param dischargeCoefficient Cd [-], default 0.6
 * @returns area [m2]
 * Source: engineering-judgement (effective leakage area at 4 Pa). Assumes: the stated air change is
 * driven by 4 Pa; on a still day it is less and the gaps are larger. Accuracy: a factor 2.
 * @example gapAreaOfInfiltration(0.02) // 0.012931
 */
export function gapAreaOfInfiltration(
  infiltrationM3PerS: number,
  densityKgPerM3 = 1.204,
  dischargeCoefficient = 0.6,
): number {
  return (
    infiltrationM3PerS /
    (dischargeCoefficient * Math.sqrt((2 * LEAKAGE_REFERENCE_PA) / densityKgPerM3))
  );
}

/**
 * Force of a pressure difference on a door [N].
 *
 *   F = dp A
 *
 * @param pressurePa pressure difference dp [Pa], 0 or more
 * @param doorAreaM2 area of the leaf A [m2], 0.1 to 30
 * @returns force on the whole leaf [N]; half of it has to be overcome at the handle
 * @throws {OutOfRange} outside the range above
 * Source: own-derivation. Assumes: the same pressure over the leaf. Accuracy: exact.
 * @example doorForce(2401, 2) // 4802
 */
export function doorForce(pressurePa: number, doorAreaM2: number): number {
  inRange(doorAreaM2, DOOR_AREA, '/doorAreaM2');
  return pressurePa * doorAreaM2;
}
