import { inRange, type Range } from '../range.js';

export const upstreamPressureRange: Range = {
  min: 1000,
  max: 30_000_000,
  unit: 'Pa',
  name: 'absolute pressure before the opening',
};
export const upstreamTemperatureRange: Range = {
  min: 50,
  max: 500,
  unit: 'K',
  name: 'temperature before the opening',
};
export const openingAreaRange: Range = { min: 1e-12, max: 1, unit: 'm2', name: 'opening area' };
export const dischargeRange: Range = { min: 0.05, max: 1, unit: '', name: 'discharge coefficient' };
export const gammaRange: Range = {
  min: 1.02,
  max: 1.7,
  unit: '',
  name: 'ratio of heat capacities',
};

const gasConstant = 8.314462618;

/** A gas escaping through an opening. */
export interface Orifice {
  readonly areaM2: number;
  readonly dischargeCoefficient: number;
  readonly heatCapacityRatio: number;
  readonly molarMassKgPerMol: number;
}

/**
 * Pressure ratio, inside over outside, above which flow through an opening is choked [1].
 *
 *   ((gamma + 1)/2)^(gamma/(gamma - 1))
 *
 * @param gamma  ratio of heat capacities [1], 1.02 to 1.7
 * @returns  critical pressure ratio [1]
 * @throws {OutOfRange} outside the range above
 * Source: isentropic-nozzle. Assumes: ideal gas. Accuracy: exact for it.
 * @example criticalPressureRatio(5 / 3) // 2.0528
 */
export function criticalPressureRatio(gamma: number): number {
  inRange(gamma, gammaRange, '/heatCapacityRatio');
  return ((gamma + 1) / 2) ** (gamma / (gamma - 1));
}

/**
 * Speed that carries choked flow, referred to the state before the opening [m/s].
 *
 *   c* = sqrt(gamma R T/M) (2/(gamma + 1))^((gamma + 1)/(2 (gamma - 1)))
 *
 * @param orifice  gas of the opening: ratio of heat capacities [1], molar mass [kg/mol]
 * @param T  temperature before the opening [K], 50 to 500
 * @returns  speed [m/s]
 * @throws {OutOfRange} outside the range above
 * Source: isentropic-nozzle. Assumes: ideal gas. Accuracy: exact for it.
 */
export function chokedSpeed(orifice: Orifice, T: number): number {
  inRange(T, upstreamTemperatureRange, '/temperatureK');
  const { heatCapacityRatio: gamma, molarMassKgPerMol: M } = orifice;
  inRange(gamma, gammaRange, '/heatCapacityRatio');
  return (
    Math.sqrt((gamma * gasConstant * T) / M) *
    (2 / (gamma + 1)) ** ((gamma + 1) / (2 * (gamma - 1)))
  );
}

/**
 * Mass flow of a gas through an opening, choked or not [kg/s].
 *
 *   choked: Cd a p/(Rs T) c*
 *   else:   Cd a p sqrt(2 gamma/((gamma - 1) Rs T) (r^(2/gamma) - r^((gamma + 1)/gamma))), r = pa/p
 *
 * For small differences the second form becomes Cd a sqrt(2 rho dp).
 *
 * @param orifice  area [m^2] 1e-12 to 1, coefficient [1], ratio of heat capacities [1], molar mass [kg/mol]
 * @param p  absolute pressure before the opening [Pa], 1000 to 3e7
 * @param T  temperature before the opening [K], 50 to 500
 * @param outside  absolute pressure behind the opening [Pa], above 0
 * @returns  mass flow [kg/s]; 0 where the outside pressure is not lower
 * @throws {OutOfRange} outside the ranges above
 * Source: isentropic-nozzle. Assumes: ideal gas, no friction before the opening.
 * Accuracy: 20 %: the hole is never known better.
 */
export function orificeMassFlow(orifice: Orifice, p: number, T: number, outside: number): number {
  inRange(p, upstreamPressureRange, '/pressurePa');
  inRange(orifice.areaM2, openingAreaRange, '/areaM2');
  inRange(orifice.dischargeCoefficient, dischargeRange, '/dischargeCoefficient');
  const { heatCapacityRatio: gamma, molarMassKgPerMol: M } = orifice;
  const c = chokedSpeed(orifice, T);
  if (!(outside < p)) return 0;
  const RsT = (gasConstant * T) / M;
  const factor = orifice.dischargeCoefficient * orifice.areaM2 * p;
  if (p / outside >= criticalPressureRatio(gamma)) return (factor / RsT) * c;
  const r = outside / p;
  const head = r ** (2 / gamma) - r ** ((gamma + 1) / gamma);
  return factor * Math.sqrt(((2 * gamma) / ((gamma - 1) * RsT)) * head);
}
