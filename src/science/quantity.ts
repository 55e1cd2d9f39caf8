import { InvalidInput } from '../errors.js';
import { molarVolumeM3PerMol } from './gases/molar-volume.js';

/*
 * The only file with conversion factors. Each unit states its dimension and its size in SI; exact
 * by definition unless a comment says otherwise.
 */
export type Dimension =
  'length' | 'area' | 'volume' | 'mass' | 'pressure' | 'temperature' | 'flow' | 'time' | 'fraction';

interface Unit {
  readonly dimension: Dimension;
  readonly size: number;
  /** Added after scaling; only temperatures have one. */
  readonly zero?: number;
}

const foot = 0.3048;
const poundKg = 0.45359237;
const standardGravity = 9.80665;

export const units = {
  m: { dimension: 'length', size: 1 },
  cm: { dimension: 'length', size: 0.01 },
  mm: { dimension: 'length', size: 0.001 },
  in: { dimension: 'length', size: foot / 12 },
  ft: { dimension: 'length', size: foot },
  m2: { dimension: 'area', size: 1 },
  ft2: { dimension: 'area', size: foot ** 2 },
  m3: { dimension: 'volume', size: 1 },
  L: { dimension: 'volume', size: 1e-3 },
  mL: { dimension: 'volume', size: 1e-6 },
  ft3: { dimension: 'volume', size: foot ** 3 },
  'US gal': { dimension: 'volume', size: 231 * (foot / 12) ** 3 },
  kg: { dimension: 'mass', size: 1 },
  g: { dimension: 'mass', size: 1e-3 },
  lb: { dimension: 'mass', size: poundKg },
  oz: { dimension: 'mass', size: poundKg / 16 },
  Pa: { dimension: 'pressure', size: 1 },
  hPa: { dimension: 'pressure', size: 100 },
  kPa: { dimension: 'pressure', size: 1000 },
  mbar: { dimension: 'pressure', size: 100 },
  bar: { dimension: 'pressure', size: 1e5 },
  MPa: { dimension: 'pressure', size: 1e6 },
  atm: { dimension: 'pressure', size: 101_325 },
  psi: { dimension: 'pressure', size: (poundKg * standardGravity) / (foot / 12) ** 2 },
  // Conventional millimetre of mercury and centimetre of water.
  mmHg: { dimension: 'pressure', size: 133.322387415 },
  cmH2O: { dimension: 'pressure', size: 98.0665 },
  K: { dimension: 'temperature', size: 1 },
  '°C': { dimension: 'temperature', size: 1, zero: 273.15 },
  '°F': { dimension: 'temperature', size: 5 / 9, zero: 273.15 - 32 * (5 / 9) },
  'm3/s': { dimension: 'flow', size: 1 },
  'm3/h': { dimension: 'flow', size: 1 / 3600 },
  'L/s': { dimension: 'flow', size: 1e-3 },
  'L/min': { dimension: 'flow', size: 1e-3 / 60 },
  cfm: { dimension: 'flow', size: foot ** 3 / 60 },
  scfh: { dimension: 'flow', size: foot ** 3 / 3600 },
  s: { dimension: 'time', size: 1 },
  min: { dimension: 'time', size: 60 },
  h: { dimension: 'time', size: 3600 },
  '1': { dimension: 'fraction', size: 1 },
  '%': { dimension: 'fraction', size: 0.01 },
  ppm: { dimension: 'fraction', size: 1e-6 },
} as const satisfies Record<string, Unit>;

export type UnitName = keyof typeof units;

/**
 * A quantity in SI from the user's unit [SI].
 *
 * @param value  the number in the unit given [unit]
 * @param unit  name of the unit [name]
 * @returns  the value in metre, kilogram, second, kelvin, pascal [SI]
 * Source: si-2019. Assumes: pressures of one kind, gauge or absolute. Accuracy: exact.
 * @example inSi(68, '°F') // 293.15
 * @example inSi(1, 'ft3') // 0.0283168
 */
export function inSi(value: number, unit: UnitName): number {
  const { size, zero }: Unit = units[unit];
  return value * size + (zero ?? 0);
}

/**
 * A quantity in the user's unit from SI [unit].
 *
 * @param value  the number in SI [SI]
 * @param unit  name of the unit [name]
 * @returns  the value in that unit [unit]
 * Source: si-2019. Assumes: pressures of one kind, gauge or absolute. Accuracy: exact.
 * @example fromSi(101325, 'psi') // 14.696
 */
export function fromSi(value: number, unit: UnitName): number {
  const { size, zero }: Unit = units[unit];
  return (value - (zero ?? 0)) / size;
}

/** Conditions at which trade volumes of gas are counted. */
export const volumeBases = {
  /** Standard cubic foot of the gas trade: 70 °F, 1 atm (common practice, no source). */
  scf: { unit: 'ft3', temperature: [70, '°F'], pressure: [1, 'atm'] },
  /** Standard cubic foot at 60 °F, as some industries count. */
  scf60: { unit: 'ft3', temperature: [60, '°F'], pressure: [1, 'atm'] },
  /** Normal cubic metre: 0 °C, 1 atm. */
  Nm3: { unit: 'm3', temperature: [0, '°C'], pressure: [1, 'atm'] },
  NL: { unit: 'L', temperature: [0, '°C'], pressure: [1, 'atm'] },
  /** Standard cubic metre at 15 °C, 1 atm. */
  Sm3: { unit: 'm3', temperature: [15, '°C'], pressure: [1, 'atm'] },
  /** Cubic metre of European cylinder labels: 15 °C, 1 bar (common practice, no source). */
  'm3 at 15 °C, 1 bar': { unit: 'm3', temperature: [15, '°C'], pressure: [1, 'bar'] },
} as const satisfies Record<
  string,
  {
    readonly unit: UnitName;
    readonly temperature: readonly [number, UnitName];
    readonly pressure: readonly [number, UnitName];
  }
>;

export type VolumeBase = keyof typeof volumeBases;

/**
 * Amount of gas behind a trade volume with its stated base [mol].
 *
 *   n = V p0/(R T0)
 *
 * @param value  the number of trade units [base unit]
 * @param base  the base, such as `scf` or `Nm3` [name]
 * @returns  amount [mol]
 * @throws {InvalidInput} for a negative or non-finite number
 * Source: si-2019. Assumes: the trade counts the gas as ideal at its base.
 * Accuracy: as that custom: 0.1 % for permanent gases, 1 % for CO2 and SF6.
 * @example amountOfTradeVolume(1, 'Nm3') // 44.615
 * @example 1000 * amountOfTradeVolume(1, 'scf') * molarVolumeM3PerMol(293.15, 101325) // 28.2
 */
export function amountOfTradeVolume(value: number, base: VolumeBase): number {
  if (!Number.isFinite(value) || value < 0) {
    throw new InvalidInput(
      `A volume of ${String(value)} ${base} is none.`,
      'Give a number that is zero or more.',
      [{ path: '/volume', problem: 'is negative or not a number' }],
    );
  }
  const { unit, temperature, pressure } = volumeBases[base];
  const T0 = inSi(temperature[0], temperature[1]);
  const p0 = inSi(pressure[0], pressure[1]);
  return inSi(value, unit) / molarVolumeM3PerMol(T0, p0);
}

/**
 * Absolute pressure from a gauge reading [Pa].
 *
 *   p = p_gauge + p_room
 *
 * @param gaugePa  gauge pressure [Pa], not negative
 * @param roomPa  absolute pressure of the room [Pa]
 * @returns  absolute pressure [Pa]
 * @throws {InvalidInput} for a negative or non-finite gauge reading
 * Source: geometry. Assumes: the gauge reads zero in the room. Accuracy: that of the gauge.
 * @example absolutePressure(20e6, 101325) // 20101325
 */
export function absolutePressure(gaugePa: number, roomPa: number): number {
  if (!Number.isFinite(gaugePa) || gaugePa < 0) {
    throw new InvalidInput(
      `A gauge pressure of ${String(gaugePa)} Pa is none.`,
      'Give a gauge reading of zero or more.',
      [{ path: '/gaugePa', problem: 'is negative or not a number' }],
    );
  }
  return gaugePa + roomPa;
}
