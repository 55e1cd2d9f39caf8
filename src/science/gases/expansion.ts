import { InvalidInput } from '../../errors.js';
import { inRange, type Range } from '../range.js';
import { volumeAtRoom, type RoomConditions } from './container-content.js';
import type { GasId, GasLibrary } from './gas-library.js';
import { knownGas } from './known-gas.js';

export const balloonDiameterRange: Range = {
  min: 0.01,
  max: 20,
  unit: 'm',
  name: 'inflated diameter',
};
export const liquidVolumeRange: Range = { min: 0, max: 100, unit: 'm3', name: 'liquid volume' };

/**
 * Gas volume at room conditions of a cryogenic liquid at its boiling point [m^3].
 *
 *   V = V_liquid rho_liquid/M/rho(T, p)
 *
 * @param library  gas data [data]
 * @param gas  a gas with a liquid at room pressure [id]
 * @param liquidVolumeM3  volume of liquid [m^3], 0 to 100
 * @param room  temperature [K] and absolute pressure [Pa] where the gas is counted
 * @returns  gas volume [m^3]
 * @throws {OutOfRange} outside the ranges above
 * @throws {InvalidInput} for a gas without liquid at room pressure: go by mass
 * Source: saturation-states. Assumes: liquid at its normal boiling point, all of it evaporates.
 * Accuracy: 0.1 %.
 * @example liquidGasVolume(library, 'N2', 0.001, { temperatureK: 293.15, pressurePa: 101325 }) // 0.692
 */
export function liquidGasVolume(
  library: GasLibrary,
  gas: GasId,
  liquidVolumeM3: number,
  room: RoomConditions,
): number {
  inRange(liquidVolumeM3, liquidVolumeRange, '/liquidVolumeM3');
  const species = knownGas(library, gas, '/gas');
  const density = species.phase.liquidDensityAtBoilingKgPerM3;
  if (density === undefined) {
    throw new InvalidInput(
      `${species.name} has no liquid at room pressure.`,
      'Reckon from its mass.',
      [{ path: '/gas', problem: 'sublimes' }],
    );
  }
  const amountMol = (liquidVolumeM3 * density) / species.molarMass.molarMassKgPerMol;
  return volumeAtRoom(library, { [gas]: 1 }, amountMol, room);
}

/**
 * Volume of a round balloon from its inflated diameter [m^3].
 *
 *   V = pi d^3/6
 *
 * @param diameterM  inflated diameter [m], 0.01 to 20
 * @returns  volume [m^3]; the 1 to 2 % of over-pressure inside are left out
 * @throws {OutOfRange} outside the range above
 * Source: geometry. Assumes: a sphere; a pear shape holds less.
 * Accuracy: a tenth of the diameter is a third of the volume.
 * @example balloonVolume(0.2794) // 0.01142
 */
export function balloonVolume(diameterM: number): number {
  inRange(diameterM, balloonDiameterRange, '/diameterM');
  return (Math.PI / 6) * diameterM ** 3;
}
