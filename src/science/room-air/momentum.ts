import { GRAVITY_M_PER_S2 } from './air-constants.js';

/** A release of one gas from a round opening into still air. */
export interface GasJet {
  readonly flowM3PerS: number;
  readonly diameterM: number;
  readonly gasDensityKgPerM3: number;
  readonly airDensityKgPerM3: number;
}

function exitSpeed(jet: GasJet): number {
  return jet.flowM3PerS / ((Math.PI / 4) * jet.diameterM ** 2);
}

/**
 * Volume Richardson number of a release [-]: above 1 it stratifies, below it mixes a top layer.
 *
 *   g |rho_a - rho_0|/rho_0 V^(1/3)/U0^2
 *
 * @param jet      flow [m3/s], diameter [m], densities [kg/m3]
 * @param volumeM3 volume of the space V [m3]
 * @returns Richardson number [-]
 * Source: cleaver-marshall-linden-1994. Assumes: still air. Accuracy: a criterion of order 1.
 */
export function volumeRichardson(jet: GasJet, volumeM3: number): number {
  const contrast = Math.abs(jet.airDensityKgPerM3 - jet.gasDensityKgPerM3) / jet.gasDensityKgPerM3;
  return (GRAVITY_M_PER_S2 * contrast * Math.cbrt(volumeM3)) / exitSpeed(jet) ** 2;
}

/**
 * Distance within which momentum rules a buoyant jet [m].
 *
 *   L = M^(3/4)/B^(1/2), M = (rho_0/rho_a) q U0, B = q g |rho_a - rho_0|/rho_a
 *
 * @param jet flow [m3/s], diameter [m], densities [kg/m3]
 * @returns length [m]
 * Source: cleaver-marshall-linden-1994, jet length from memory. Assumes: still air. Accuracy: a
 * length scale.
 */
export function jetLength(jet: GasJet): number {
  const { flowM3PerS, gasDensityKgPerM3, airDensityKgPerM3 } = jet;
  const momentum = (gasDensityKgPerM3 / airDensityKgPerM3) * flowM3PerS * exitSpeed(jet);
  const buoyancy =
    (flowM3PerS * GRAVITY_M_PER_S2 * Math.abs(airDensityKgPerM3 - gasDensityKgPerM3)) /
    airDensityKgPerM3;
  return momentum ** 0.75 / Math.sqrt(buoyancy);
}

/**
 * Whether a release mixes by its momentum rather than lying as a layer.
 *
 * @param jet      flow [m3/s], diameter [m], densities [kg/m3]
 * @param volumeM3 volume of the space [m3]
 * @returns true when the volume Richardson number is below 1
 * Source: cleaver-marshall-linden-1994. Assumes: still air. Accuracy: a criterion of order 1.
 */
export function mixesByMomentum(jet: GasJet, volumeM3: number): boolean {
  return volumeRichardson(jet, volumeM3) < 1;
}
