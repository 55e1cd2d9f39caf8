import { InvalidInput, OutOfRange } from '../../errors.js';
import { inRange, type Range } from '../range.js';
import { containerState } from './container-density.js';
import type { Composition, GasId, GasLibrary } from './gas-library.js';
import { mixtureState } from './mixture-state.js';
import { molarMassKgPerMol } from './molar-mass.js';
import { vapourPressure } from './vapour-pressure.js';

export const waterVolumeRange: Range = { min: 1e-6, max: 100, unit: 'm3', name: 'water volume' };
export const containerMassRange: Range = { min: 0, max: 100_000, unit: 'kg', name: 'mass' };
export const containerPressureRange: Range = {
  min: 50_000,
  max: 30_000_000,
  unit: 'Pa',
  name: 'absolute pressure in the container',
};

/** Up to this share of the vapour pressure the residual gas is surely gas alone. */
const residualShare = 0.9;

/** Where the released gas is counted. */
export interface RoomConditions {
  readonly temperatureK: number;
  readonly pressurePa: number;
}

/** A gas under pressure in a container of known water volume. */
export interface PressurisedContainer {
  readonly composition: Composition;
  readonly waterVolumeM3: number;
  readonly pressurePa: number;
  readonly temperatureK: number;
}

export interface ContainerContent {
  readonly amountMol: number;
  readonly massKg: number;
  readonly volumeAtRoomM3: number;
  /** Null where the content was weighed: then no pressure entered. */
  readonly compressibilityFactor: number | null;
}

function refuseImplausiblePressure(p: number): void {
  if (!Number.isFinite(p) || p >= containerPressureRange.min) return;
  const { min, max } = containerPressureRange;
  const hint =
    p > 0 && p <= 1000
      ? 'The figure looks like bar. Give pascal, absolute: 200 bar gauge is 2.01e7 Pa.'
      : 'The figure looks like a gauge reading. Give the absolute pressure: gauge plus room pressure; a cylinder at 0 bar gauge still stands at room pressure.';
  throw new OutOfRange(
    `absolute pressure in the container ${String(p)} Pa lies below room pressure.`,
    hint,
    [{ path: '/pressurePa', problem: `outside ${String(min)} to ${String(max)} Pa` }],
  );
}

/** Refuses a pressure that says nothing about the content: liquid may be present. */
function refuseLiquefied(library: GasLibrary, id: GasId, T: number, p: number, alone: boolean) {
  const gas = library.species[id];
  if (gas === undefined || gas.container?.contentBy !== 'mass') return;
  const byWeight = 'Weigh the container, subtract the tare, and give massKg instead of a pressure.';
  if (!alone) {
    throw new InvalidInput(
      `The content of a compressed mixture with ${gas.name} does not follow from its pressure here.`,
      byWeight,
      [{ path: '/composition', problem: `${id} is liquefied under pressure` }],
    );
  }
  const span = gas.vapourPressure;
  if (span === undefined || T > span.temperatureMaxK) {
    throw new InvalidInput(
      `${gas.name} is close to or above its critical temperature of ${gas.critical.temperatureK.toFixed(1)} K: its pressure does not tell the content.`,
      byWeight,
      [{ path: '/pressurePa', problem: 'near-critical gas' }],
    );
  }
  const limit = residualShare * vapourPressure(gas, T);
  if (p > limit) {
    throw new InvalidInput(
      `${gas.name} is liquid in its cylinder: while liquid remains the gauge shows only the vapour pressure, whatever the content.`,
      byWeight,
      [
        {
          path: '/pressurePa',
          problem: `above ${limit.toPrecision(3)} Pa, nine tenths of the vapour pressure`,
        },
      ],
    );
  }
}

/**
 * Volume of an amount of gas at room conditions [m^3].
 *
 *   V = n/rho(T, p), rho from the virial equation
 *
 * @param library  gas data [data]
 * @param composition  mole fractions by gas id or `air` [1]
 * @param amountMol  amount [mol], not negative
 * @param room  temperature [K] 263.15 to 318.15 and absolute pressure [Pa] 60 000 to 110 000
 * @returns  volume [m^3]
 * @throws {OutOfRange} outside the ranges above
 * Source: virial-fits. Assumes: dry gas, warmed to the room. Accuracy: 0.03 %.
 * @example volumeAtRoom(library, { CO2: 1 }, 22.7224, { temperatureK: 293.15, pressurePa: 101325 }) // 0.5437
 */
export function volumeAtRoom(
  library: GasLibrary,
  composition: Composition,
  amountMol: number,
  room: RoomConditions,
): number {
  return amountMol / mixtureState(library, { composition, ...room }).amountDensityMolPerM3;
}

/** Molar volume of the gas inside, once its pressure tells the content [m^3/mol]. */
function molarVolumeInside(library: GasLibrary, container: PressurisedContainer): number {
  const { composition, waterVolumeM3, pressurePa: p, temperatureK: T } = container;
  inRange(waterVolumeM3, waterVolumeRange, '/waterVolumeM3');
  refuseImplausiblePressure(p);
  inRange(p, containerPressureRange, '/pressurePa');
  const parts = Object.entries(composition).filter(([, fraction]) => fraction > 0);
  let molarVolume = 0;
  for (const [id, fraction] of parts) {
    refuseLiquefied(library, id, T, p, parts.length === 1);
    molarVolume += fraction / containerState(library, id, T, p).amountDensityMolPerM3;
  }
  return molarVolume;
}

/**
 * Content of a container of compressed gas from its pressure [mol, kg, m^3].
 *
 *   n = V rho(T, p); a mixture adds the volumes of its parts: 1/rho = sum x_i/rho_i(T, p)
 *
 * @param library  gas data [data]
 * @param container  composition [1], water volume [m^3] 1e-6 to 100, absolute pressure [Pa] up to
 *   3e7, temperature of the gas [K] 253.15 to 323.15
 * @param room  temperature [K] and absolute pressure [Pa] where the gas is counted
 * @returns  amount [mol], mass [kg], volume at room conditions [m^3], compressibility factor [1]
 * @throws {OutOfRange} outside the ranges, or a pressure that looks like gauge or bar
 * @throws {InvalidInput} for a gas that is or may be liquid inside: give its mass
 * Source: density-series. Assumes: gas at the temperature given, one phase.
 * Accuracy: 0.03 % for one gas; about 1 % for mixtures (air from its parts: 0.2 %).
 */
export function contentByPressure(
  library: GasLibrary,
  container: PressurisedContainer,
  room: RoomConditions,
): ContainerContent {
  const { composition, waterVolumeM3, pressurePa, temperatureK } = container;
  const molarMass = molarMassKgPerMol(library, composition);
  const molarVolume = molarVolumeInside(library, container);
  const amountMol = waterVolumeM3 / molarVolume;
  return {
    amountMol,
    massKg: amountMol * molarMass,
    volumeAtRoomM3: volumeAtRoom(library, composition, amountMol, room),
    compressibilityFactor:
      (pressurePa * molarVolume) / (library.gasConstant.jPerMolK * temperatureK),
  };
}

/**
 * Content of a weighed container, or of dry ice or a liquid by its mass [mol, kg, m^3].
 *
 *   n = m/M
 *
 * @param library  gas data [data]
 * @param composition  mole fractions by gas id or `air` [1]
 * @param massKg  weight less tare [kg], 0 to 100 000
 * @param room  temperature [K] and absolute pressure [Pa] where the gas is counted
 * @returns  amount [mol], mass [kg], volume at room conditions [m^3]; no compressibility factor
 * @throws {OutOfRange} outside the ranges above
 * Source: virial-fits. Assumes: all of it becomes gas at room temperature.
 * Accuracy: that of the balance; 0.03 % for the volume.
 * @example contentByMass(library, { CO2: 1 }, 1, { temperatureK: 293.15, pressurePa: 101325 }).volumeAtRoomM3 // 0.5437
 */
export function contentByMass(
  library: GasLibrary,
  composition: Composition,
  massKg: number,
  room: RoomConditions,
): ContainerContent {
  inRange(massKg, containerMassRange, '/massKg');
  const amountMol = massKg / molarMassKgPerMol(library, composition);
  return {
    amountMol,
    massKg,
    volumeAtRoomM3: volumeAtRoom(library, composition, amountMol, room),
    compressibilityFactor: null,
  };
}

/**
 * Content to plan a fault with: the larger of the ideal gas and the gas model [mol].
 *
 *   n = max(p V/(R T), V rho(T, p))
 *
 * @param library  gas data [data]
 * @param container  composition [1], water volume [m^3], absolute pressure [Pa], temperature [K]
 * @returns  amount [mol]
 * @throws {OutOfRange} outside the ranges of `contentByPressure`
 * @throws {InvalidInput} for a gas that is or may be liquid inside: give its mass
 * Source: density-series. Assumes: caution, because a gauge and a fill are not exact.
 * Accuracy: never below either figure.
 * @example planningContentMol(library, { composition: { Ar: 1 }, waterVolumeM3: 0.05, pressurePa: 2e7, temperatureK: 293.15 }) // 434
 */
export function planningContentMol(library: GasLibrary, container: PressurisedContainer): number {
  // Checked here, because the sum over the parts does not see an unknown or missing one.
  molarMassKgPerMol(library, container.composition);
  const { pressurePa, waterVolumeM3, temperatureK } = container;
  const amountMol = waterVolumeM3 / molarVolumeInside(library, container);
  const ideal = (pressurePa * waterVolumeM3) / (library.gasConstant.jPerMolK * temperatureK);
  return Math.max(ideal, amountMol);
}

/**
 * Amount released from a container between two readings of its gauge [mol].
 *
 *   n = V (rho(T1, p1) - rho(T2, p2))
 *
 * @param library  gas data [data]
 * @param before  the container before: composition [1], water volume [m^3], pressure [Pa], temperature [K]
 * @param after  absolute pressure [Pa] and temperature [K] after, settled to the room
 * @returns  amount released [mol]; negative where the readings contradict a release
 * @throws {OutOfRange} outside the ranges of `contentByPressure`
 * @throws {InvalidInput} for a gas that is or may be liquid inside: weigh it
 * Source: density-series. Assumes: both temperatures are the gas's own.
 * Accuracy: that of the gauge; a small act needs weighing instead.
 * @example amountByPressureDrop(library, { composition: { He: 1 }, waterVolumeM3: 0.01, pressurePa: 2e7, temperatureK: 293.15 }, { pressurePa: 1.95e7, temperatureK: 293.15 }) // 1.7
 */
export function amountByPressureDrop(
  library: GasLibrary,
  before: PressurisedContainer,
  after: RoomConditions,
): number {
  molarMassKgPerMol(library, before.composition);
  const { waterVolumeM3 } = before;
  return (
    waterVolumeM3 / molarVolumeInside(library, before) -
    waterVolumeM3 / molarVolumeInside(library, { ...before, ...after })
  );
}

/**
 * Amount released from a container between two weighings [mol].
 *
 *   n = (m1 - m2)/M
 *
 * @param library  gas data [data]
 * @param composition  mole fractions by gas id or `air` [1]
 * @param massBeforeKg  weight before, with or without tare [kg]
 * @param massAfterKg  weight after, the same way [kg]
 * @returns  amount released [mol]; negative where the readings contradict a release
 * @throws {OutOfRange} outside 0 to 100 000 kg
 * Source: iupac-atomic-weights. Assumes: nothing but this gas left. Accuracy: the balance's.
 * @example amountByWeighing(library, { CO2: 1 }, 20, 19) // 22.722
 */
export function amountByWeighing(
  library: GasLibrary,
  composition: Composition,
  massBeforeKg: number,
  massAfterKg: number,
): number {
  inRange(massBeforeKg, containerMassRange, '/massBeforeKg');
  inRange(massAfterKg, containerMassRange, '/massAfterKg');
  return (massBeforeKg - massAfterKg) / molarMassKgPerMol(library, composition);
}
