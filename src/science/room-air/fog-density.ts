import { MOLAR_GAS_CONSTANT } from './air-constants.js';
import { vapourPressure } from './water-vapour.js';

/** Molar mass of water [kg/mol]. Source: iupac-atomic-weights. */
const WATER_KG_PER_MOL = 0.018015;
/** Heat given up by a mole of water that condenses near 60 degC [J/mol], from memory. */
const CONDENSATION_J_PER_MOL = 42_500;

/**
 * Density of a gas saturated over warm water, over that of the room air [-].
 *
 *   M_mix T_room/(M_air T), where a share c of the vapour has condensed and warmed the rest
 *
 * @param gasKgPerMol   molar mass of the dry gas [kg/mol], above 0
 * @param airKgPerMol   molar mass of the room air [kg/mol], above 0
 * @param waterK        temperature of the water [K], 273.15 up to boiling
 * @param roomK         temperature of the room [K], above 0
 * @param pressurePa    site pressure [Pa], above 0
 * @param condensedShare share of the vapour that has condensed c [-], 0 to 1
 * @param heatCapacityJPerMolK molar heat capacity of the gas [J/(mol K)], default 35
 * @returns density ratio [-]; at boiling and above that of steam
 * Source: own-room-air (rule on near-neutral gas); wmo-8 (vapour). Assumes: droplets fall out, no
 * room air mixed in. Accuracy: 3 %.
 * @example fogDensityRatio(0.0440095, 0.02896, 347.15, 293.15, 101325, 0) // 1.0041643
 */
export function fogDensityRatio(
  gasKgPerMol: number,
  airKgPerMol: number,
  waterK: number,
  roomK: number,
  pressurePa: number,
  condensedShare: number,
  heatCapacityJPerMolK = 35,
): number {
  const vapour = Math.min(1, vapourPressure(waterK, 1) / pressurePa);
  const left = vapour * (1 - condensedShare);
  const gas = 1 - vapour;
  const total = gas + left;
  if (total <= 0) return 0;
  const molarMass = (gas * gasKgPerMol + left * WATER_KG_PER_MOL) / total;
  const heatCapacity = gas * heatCapacityJPerMolK + left * 4 * MOLAR_GAS_CONSTANT;
  const warmerK = (vapour * condensedShare * CONDENSATION_J_PER_MOL) / heatCapacity;
  return (molarMass * roomK) / (airKgPerMol * (waterK + warmerK));
}
