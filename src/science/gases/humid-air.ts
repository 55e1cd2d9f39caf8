import { inRange } from '../range.js';
import type { GasLibrary } from './gas-library.js';
import { relativeHumidityRange, roomPressure, roomTemperature } from './ranges.js';

/** Polynomial of T over its first power of T, plus the last coefficient times ln T. */
function exponent(coefficients: readonly number[], T: number, firstPower: number): number {
  const last = coefficients.length - 1;
  let sum = 0;
  for (let index = last - 1; index >= 0; index -= 1) sum = sum * T + (coefficients[index] ?? 0);
  return sum / firstPower + (coefficients[last] ?? 0) * Math.log(T);
}

/**
 * Saturation vapour pressure over liquid, also supercooled, water [Pa].
 *
 *   ln e = g0/T^2 + g1/T + g2 + g3 T + g4 T^2 + g5 T^3 + g6 T^4 + g7 ln T
 *
 * @param library  gas data [data]
 * @param T  temperature [K], 263.15 to 318.15
 * @returns  saturation vapour pressure [Pa]
 * @throws {OutOfRange} outside the range above
 * Source: hardy-1998. Assumes: ITS-90, pure water.
 * Accuracy: 0.006 % at 0 to 45 degC and 0.03 % at -10 degC against IAPWS-95.
 * @example waterSaturationPressure(library, 293.15) // 2339.3
 */
export function waterSaturationPressure(library: GasLibrary, T: number): number {
  inRange(T, roomTemperature, '/temperatureK');
  return Math.exp(exponent(library.humidAir.saturationPressureWater.coefficients, T, T * T));
}

/**
 * Saturation vapour pressure over ice [Pa].
 *
 *   ln e = k0/T + k1 + k2 T + k3 T^2 + k4 T^3 + k5 ln T
 *
 * @param library  gas data [data]
 * @param T  temperature [K], 173.15 to 273.15
 * @returns  saturation vapour pressure [Pa]
 * @throws {OutOfRange} outside the range above
 * Source: hardy-1998. Assumes: ITS-90, plane ice.
 * Accuracy: not stated; frost forms at this pressure, humidity is reckoned over liquid water.
 * @example iceSaturationPressure(library, 263.15) // 259.9
 */
export function iceSaturationPressure(library: GasLibrary, T: number): number {
  const { coefficients, temperatureMinK, temperatureMaxK } = library.humidAir.saturationPressureIce;
  inRange(
    T,
    { min: temperatureMinK, max: temperatureMaxK, unit: 'K', name: 'temperature of ice' },
    '/temperatureK',
  );
  return Math.exp(exponent(coefficients, T, T));
}

/**
 * Enhancement factor of saturated vapour by the presence of air [1].
 *
 *   f = alpha + beta p + gamma t^2, t in degC
 *
 * @param library  gas data [data]
 * @param T  temperature [K], 263.15 to 318.15
 * @param p  absolute pressure [Pa], 60 000 to 110 000
 * @returns  enhancement factor [1]
 * @throws {OutOfRange} outside the ranges above
 * Source: cipm-2007. Assumes: air. Accuracy: better than 1e-3 over the whole range.
 * @example enhancementFactor(library, 300, 100000) // 1.004164
 */
export function enhancementFactor(library: GasLibrary, T: number, p: number): number {
  inRange(T, roomTemperature, '/temperatureK');
  inRange(p, roomPressure, '/pressurePa');
  const { alpha, betaPerPa, gammaPerC2 } = library.humidAir.enhancementFactor;
  const t = T - 273.15;
  return alpha + betaPerPa * p + gammaPerC2 * t * t;
}

/**
 * Mole fraction of water vapour in humid air [1].
 *
 *   x = RH f(T, p) e(T)/p
 *
 * @param library  gas data [data]
 * @param T  temperature [K], 263.15 to 318.15
 * @param p  absolute pressure [Pa], 60 000 to 110 000
 * @param RH  relative humidity over liquid water [1], 0 to 1
 * @returns  mole fraction of water [1]
 * @throws {OutOfRange} outside the ranges above
 * Source: cipm-2007. Assumes: humidity over liquid water also below 0 degC, as is the convention.
 * Accuracy: that of its two factors.
 * @example waterFractionOfAir(library, 300, 100000, 0.5) // 0.0177578
 */
export function waterFractionOfAir(library: GasLibrary, T: number, p: number, RH: number): number {
  inRange(RH, relativeHumidityRange, '/relativeHumidity');
  if (RH === 0) return 0;
  return (RH * enhancementFactor(library, T, p) * waterSaturationPressure(library, T)) / p;
}
