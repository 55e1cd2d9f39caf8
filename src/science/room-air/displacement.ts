import { OXYGEN_IN_DRY_AIR } from './air-constants.js';

/**
 * Gas fraction after a release at once with mixture pushed out [-].
 *
 *   1 - (1 - x0) exp(-Vg/V)
 *
 * @param gasM3    released volume Vg [m3], 0 or more
 * @param volumeM3 net volume V [m3], above 0
 * @param startFraction fraction before x0 [-], default 0
 * @returns fraction [-]
 * Source: own-room-air. Assumes: mixed while it is released, constant pressure. Accuracy: exact.
 * @example pushOutFraction(9.1, 384) // 0.023419326
 */
export function pushOutFraction(gasM3: number, volumeM3: number, startFraction = 0): number {
  return startFraction - (1 - startFraction) * Math.expm1(-gasM3 / volumeM3);
}

/**
 * Gas fraction when the gas only replaces air [-]: straight displacement.
 *
 *   min(1, Vg/V)
 *
 * @param gasM3    released volume Vg [m3], 0 or more
 * @param volumeM3 net volume V [m3], above 0
 * @returns fraction [-]
 * Source: own-room-air. Assumes: air alone leaves. Accuracy: upper limit of a mixed space.
 * @example straightDisplacementFraction(9.1, 384) // 0.023697917
 */
export function straightDisplacementFraction(gasM3: number, volumeM3: number): number {
  return Math.min(1, gasM3 / volumeM3);
}

/**
 * Oxygen when the gas only replaces air [-]: the form that decides for faults.
 *
 *   y max(0, 1 - Vg/V)
 *
 * @param gasM3    released volume Vg [m3], 0 or more
 * @param volumeM3 net volume V [m3], above 0
 * @param oxygenBefore oxygen before the release y [-], default dry outdoor air
 * @returns oxygen fraction [-]
 * Source: own-room-air. Assumes: an inert gas, air alone leaves. Accuracy: lower limit of a mixed
 * space.
 * @example straightDisplacementOxygen(9.1, 384) // 0.20453529
 */
export function straightDisplacementOxygen(
  gasM3: number,
  volumeM3: number,
  oxygenBefore: number = OXYGEN_IN_DRY_AIR,
): number {
  return oxygenBefore * (1 - straightDisplacementFraction(gasM3, volumeM3));
}

/**
 * Gas fraction in a rigid sealed space [-].
 *
 *   G/(1 + G), G = Vg/V
 *
 * @param gasM3    released volume Vg at the pressure before [m3], 0 or more
 * @param volumeM3 net volume V [m3], above 0
 * @returns fraction [-]
 * Source: own-room-air. Assumes: nothing leaves, constant temperature. Accuracy: exact.
 * @example sealedFraction(9.1, 384) // 0.023149326
 */
export function sealedFraction(gasM3: number, volumeM3: number): number {
  return gasM3 / (volumeM3 + gasM3);
}
