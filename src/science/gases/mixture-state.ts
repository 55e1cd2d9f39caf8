import { inRange } from '../range.js';
import type { Composition, GasLibrary } from './gas-library.js';
import { waterFractionOfAir } from './humid-air.js';
import { dryAirMolarMass, dryAirVirial, mixtureTerms } from './mixture-terms.js';
import { roomPressure, roomTemperature } from './ranges.js';

export interface MixtureInput {
  readonly composition: Composition;
  readonly temperatureK: number;
  readonly pressurePa: number;
  /** Of the air share, over liquid water; 0 when left out. */
  readonly relativeHumidity?: number;
}

export interface MixtureState {
  readonly molarMassKgPerMol: number;
  readonly densityKgPerM3: number;
  /** At frequencies where vibration keeps up, as in all audible sound. */
  readonly speedOfSoundMPerS: number;
  /** Ideal cp/cv, the gamma of the acoustic formulas. */
  readonly heatCapacityRatio: number;
  readonly compressibilityFactor: number;
  /** On the dry basis. */
  readonly oxygenFraction: number;
  readonly waterFraction: number;
  /** Against dry air at the same temperature and pressure. */
  readonly densityRelativeToAir: number;
  readonly amountDensityMolPerM3: number;
  readonly secondVirialM3PerMol: number;
  /** sqrt(gamma R T/M): the limit at no pressure. */
  readonly idealSpeedOfSoundMPerS: number;
}

/** rho of p = rho R T (1 + B rho), in the form that stays stable for B near 0 [mol/m^3]. */
function amountDensity(b: number, RT: number, p: number): number {
  const ideal = p / RT;
  return (2 * ideal) / (1 + Math.sqrt(1 + 4 * b * ideal));
}

/**
 * Density, speed of sound and their companions of any gas mixture in a room [kg/m^3, m/s, ...].
 *
 *   rho = 2 p/(R T)/(1 + sqrt(1 + 4 B p/(R T)));  Z = 1 + B rho
 *   cv/R = cp/R - 1 - rho (2 T B' + T^2 B'')
 *   w^2 = (R T/M)[1 + 2 B rho + (1 + (B + T B') rho)^2/(cv/R)]
 *
 * @param library  gas data [data]
 * @param input  composition [1], temperature [K] 263.15 to 318.15, absolute pressure [Pa] 60 000
 *   to 110 000, relative humidity of the air share [1] 0 to 1
 * @returns  the state; every key carries its unit [SI]
 * @throws {OutOfRange} outside the ranges above
 * @throws {InvalidInput} for an unknown gas, or fractions that do not sum to one
 * Source: virial-sound-speed. Assumes: equilibrium of vibration; no condensation.
 * Accuracy: 0.03 % in both against the reference equations, 0.01 % for the common gases.
 * @example mixtureState(library, { composition: { He: 1 }, temperatureK: 300, pressurePa: 100000 }).speedOfSoundMPerS // 1019.580
 */
export function mixtureState(library: GasLibrary, input: MixtureInput): MixtureState {
  const T = inRange(input.temperatureK, roomTemperature, '/temperatureK');
  const p = inRange(input.pressurePa, roomPressure, '/pressurePa');
  const waterOfAir = waterFractionOfAir(library, T, p, input.relativeHumidity ?? 0);
  const terms = mixtureTerms(library, input.composition, T, waterOfAir);
  const { b, tb1, t2b2, heatCapacity: cp, molarMassKgPerMol: M } = terms;
  const RT = library.gasConstant.jPerMolK * T;
  const rho = amountDensity(b, RT, p);
  const airKgPerM3 = amountDensity(dryAirVirial(library, T), RT, p) * dryAirMolarMass(library);
  const cv = cp - 1 - rho * (2 * tb1 + t2b2);
  const slope = 1 + (b + tb1) * rho;
  const gamma = cp / (cp - 1);
  return {
    molarMassKgPerMol: M,
    densityKgPerM3: rho * M,
    speedOfSoundMPerS: Math.sqrt((RT / M) * (1 + 2 * b * rho + (slope * slope) / cv)),
    heatCapacityRatio: gamma,
    compressibilityFactor: 1 + b * rho,
    oxygenFraction:
      terms.oxygenFraction === 0 ? 0 : terms.oxygenFraction / (1 - terms.waterFraction),
    waterFraction: terms.waterFraction,
    densityRelativeToAir: (rho * M) / airKgPerM3,
    amountDensityMolPerM3: rho,
    secondVirialM3PerMol: b,
    idealSpeedOfSoundMPerS: Math.sqrt((gamma * RT) / M),
  };
}
