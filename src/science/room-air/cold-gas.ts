/** Molar heat capacity at constant pressure of air, and of gases that differ from it [J/(mol K)]. */
const HEAT_OF_AIR = 29.1;
const HEAT_OF_GAS: Readonly<Record<string, number>> = { CO2: 35 };

/**
 * What a cold gas weighs more in a thin mixture than its molar mass says [kg/mol].
 *
 *   M_air (cp/cp_air) dT/T: T_mix from the molar heat balance, to first order in the fraction
 *
 * @param gas      gas id; one that is not listed has the heat capacity of air
 * @param coldByK  room temperature less that of the source [K], 0 or more
 * @param roomK    room temperature [K], above 0
 * @param airKgPerMol molar mass of air [kg/mol]
 * @returns additional excess over the molar mass of air [kg/mol]
 * Source: own-room-air (cold gas: density from the molar heat balance). Assumes: adiabatic mixing,
 * small fraction. Accuracy: 5 % of the excess up to a fraction of 0.2; floor and walls warm the layer
 * within minutes.
 * @example coldExcess('N2', 215.65, 293.15, 0.02896) // 0.0213038513
 */
export function coldExcess(
  gas: string,
  coldByK: number,
  roomK: number,
  airKgPerMol: number,
): number {
  const heat = HEAT_OF_GAS[gas] ?? HEAT_OF_AIR;
  return (airKgPerMol * (heat / HEAT_OF_AIR) * coldByK) / roomK;
}
