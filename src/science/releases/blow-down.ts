import { inRange, type Range } from '../range.js';
import { chokedSpeed, criticalPressureRatio, type Orifice } from './orifice-flow.js';

export const vesselVolumeRange: Range = { min: 1e-6, max: 100, unit: 'm3', name: 'vessel volume' };

/** A vessel emptying through an opening, as it stands at the start. */
export interface BlowDown {
  readonly orifice: Orifice;
  readonly vesselVolumeM3: number;
  readonly pressurePa: number;
  readonly temperatureK: number;
}

export interface BlowDownState {
  readonly pressurePa: number;
  readonly temperatureK: number;
  /** Of the mass at the start [1]. */
  readonly massLeft: number;
}

/**
 * Time constant of a choked blow-down [s].
 *
 *   tau = V/(Cd a c*)
 *
 * @param start  vessel volume [m^3] 1e-6 to 100, opening, absolute pressure [Pa], temperature [K]
 * @returns  time constant [s]
 * @throws {OutOfRange} outside the ranges of volume, opening and temperature
 * Source: isentropic-nozzle. Assumes: ideal gas. Accuracy: 20 %, that of the hole.
 */
export function blowDownTimeConstant(start: BlowDown): number {
  inRange(start.vesselVolumeM3, vesselVolumeRange, '/vesselVolumeM3');
  const { areaM2, dischargeCoefficient } = start.orifice;
  return (
    start.vesselVolumeM3 /
    (dischargeCoefficient * areaM2 * chokedSpeed(start.orifice, start.temperatureK))
  );
}

/**
 * State of a vessel during a choked blow-down, its gas held at its temperature [Pa, K, 1].
 *
 *   p = p0 exp(-t/tau)
 *
 * @param start  the vessel at the start [m^3, Pa, K]
 * @param t  time since then [s], not negative
 * @returns  pressure [Pa], temperature [K], mass left [1]
 * @throws {OutOfRange} outside the ranges of the start
 * Source: isentropic-nozzle. Assumes: the wall keeps the gas warm; one end of the bracket.
 * Accuracy: with the adiabatic state it encloses the truth.
 */
export function isothermalBlowDown(start: BlowDown, t: number): BlowDownState {
  const massLeft = Math.exp(-t / blowDownTimeConstant(start));
  return {
    pressurePa: start.pressurePa * massLeft,
    temperatureK: start.temperatureK,
    massLeft,
  };
}

/**
 * State of a vessel during a choked blow-down without heat from its wall [Pa, K, 1].
 *
 *   b = 1 + (gamma - 1) t/(2 tau);  p = p0 b^(-2 gamma/(gamma - 1));  m = m0 b^(-2/(gamma - 1));
 *   T = T0/b^2
 *
 * @param start  the vessel at the start [m^3, Pa, K]
 * @param t  time since then [s], not negative
 * @returns  pressure [Pa], temperature [K], mass left [1]
 * @throws {OutOfRange} outside the ranges of the start
 * Source: isentropic-nozzle. Assumes: no heat from the wall; the other end of the bracket.
 * Accuracy: with the isothermal state it encloses the truth.
 */
export function adiabaticBlowDown(start: BlowDown, t: number): BlowDownState {
  const gamma = start.orifice.heatCapacityRatio;
  const b = 1 + ((gamma - 1) * t) / (2 * blowDownTimeConstant(start));
  return {
    pressurePa: start.pressurePa * b ** ((-2 * gamma) / (gamma - 1)),
    temperatureK: start.temperatureK / (b * b),
    massLeft: b ** (-2 / (gamma - 1)),
  };
}

/** When the flow stops being choked, by both ends of the bracket [s]. */
export interface ChokedTimes {
  readonly isothermalS: number;
  readonly adiabaticS: number;
}

/**
 * Times until a blow-down is no longer choked [s].
 *
 *   isothermal: tau ln(p0/pc);  adiabatic: (2 tau/(gamma - 1))((p0/pc)^((gamma - 1)/(2 gamma)) - 1)
 *
 * @param start  the vessel at the start [m^3, Pa, K]
 * @param outside  absolute pressure outside [Pa]
 * @returns  both times [s]; 0 where it is not choked to begin with
 * @throws {OutOfRange} outside the ranges of the start
 * Source: isentropic-nozzle. Assumes: ideal gas. Accuracy: 20 %, that of the hole.
 */
export function chokedTimes(start: BlowDown, outside: number): ChokedTimes {
  const gamma = start.orifice.heatCapacityRatio;
  const ratio = start.pressurePa / (outside * criticalPressureRatio(gamma));
  if (ratio <= 1) return { isothermalS: 0, adiabaticS: 0 };
  const tau = blowDownTimeConstant(start);
  return {
    isothermalS: tau * Math.log(ratio),
    adiabaticS: ((2 * tau) / (gamma - 1)) * (ratio ** ((gamma - 1) / (2 * gamma)) - 1),
  };
}
