import { bracketedRoot } from '../numerics/root.js';
import { doorwayExchange, flowsWithNet } from './doorway.js';

/**
 * Effective area of an upper and a lower vent [m2].
 *
 *   A* = Cd a1 a2/sqrt((a1^2 + a2^2)/2)
 *
 * @param upperM2 upper vent a1 [m2]
 * @param lowerM2 lower vent a2 [m2]
 * @param dischargeCoefficient Cd of both [-]
 * @returns effective area [m2], for Q = A* sqrt(g' h)
 * Source: linden-lane-serff-smeed-1990. Assumes: sharp edges, no wind. Accuracy: that of Cd.
 * @example effectiveVentArea(0.4, 0.25, 0.6) // 0.17988761
 */
export function effectiveVentArea(
  upperM2: number,
  lowerM2: number,
  dischargeCoefficient: number,
): number {
  return (dischargeCoefficient * upperM2 * lowerM2) / Math.sqrt((upperM2 ** 2 + lowerM2 ** 2) / 2);
}

/**
 * Displacement flow through two vents [m3/s].
 *
 *   Q = A* sqrt(g' h)
 *
 * @param effectiveAreaM2 A* [m2]
 * @param gPrime  reduced gravity of the layer [m/s2], 0 or more
 * @param depthM  layer between its edge and the far vent h [m], 0 or more
 * @returns flow [m3/s]
 * Source: linden-lane-serff-smeed-1990. Assumes: small density difference, no wind. Accuracy: that
 * of Cd.
 * @example displacementFlow(0.17988761, 0.42270734, 2.5) // 0.18492309
 */
export function displacementFlow(effectiveAreaM2: number, gPrime: number, depthM: number): number {
  return effectiveAreaM2 * Math.sqrt(Math.max(0, gPrime * depthM));
}

/** A wall vent as the only opening of a mixed space. */
export interface SingleVent {
  readonly widthM: number;
  readonly heightM: number;
  readonly dischargeCoefficient: number;
  /** Reduced gravity of the pure gas, its size [m/s2]. */
  readonly gasGPrime: number;
}

function pureExchange(vent: SingleVent): number {
  return doorwayExchange(vent.widthM, vent.heightM, vent.gasGPrime, vent.dischargeCoefficient);
}

/**
 * Steady gas fraction of a mixed space with one vent [-], simple balance.
 *
 *   q = Q_exchange x, x = (3 q/(Cd W sqrt(g0 H^3)))^(2/3)
 *
 * @param vent          the vent and the gas
 * @param releaseM3PerS release q [m3/s]
 * @returns fraction [-], at most 1
 * Source: linden-lane-serff-smeed-1990. Assumes: mixed, no net flow through the vent. Accuracy:
 * that of Cd; use the exact form when q is not small against the exchange.
 */
export function singleVentFraction(vent: SingleVent, releaseM3PerS: number): number {
  return Math.min(1, (releaseM3PerS / pureExchange(vent)) ** (2 / 3));
}

/**
 * Steady gas fraction of a mixed space with one vent [-], with the net outflow.
 *
 *   out(x) x = q, out - in = q, small density difference
 *
 * @param vent          the vent and the gas
 * @param releaseM3PerS release q [m3/s]
 * @returns fraction [-]; 1 when the release keeps all air out
 * Source: own-room-air (shift of the neutral level). Assumes: mixed. Accuracy: that of Cd.
 */
export function singleVentFractionWithNet(vent: SingleVent, releaseM3PerS: number): number {
  const surplus = (x: number): number =>
    flowsWithNet(pureExchange(vent) * Math.sqrt(x), releaseM3PerS).outM3PerS * x - releaseM3PerS;
  return surplus(1) <= 0 ? 1 : bracketedRoot(surplus, 0, 1, 1e-13);
}

/**
 * Constant of the decay through one vent [1/s].
 *
 *   c = (Cd/3) W sqrt(g0 H^3)/V in dx/dt = -c x^(3/2)
 *
 * @param vent     the vent and the gas
 * @param volumeM3 volume of the space V [m3]
 * @returns constant [1/s]
 * Source: linden-lane-serff-smeed-1990. Assumes: mixed, no release. Accuracy: measured 1 to 5 %.
 */
export function singleVentDecayConstant(vent: SingleVent, volumeM3: number): number {
  return pureExchange(vent) / volumeM3;
}

/**
 * Gas fraction of a mixed space while one vent empties it [-]: a slow algebraic tail.
 *
 *   x = (x0^(-1/2) + c t/2)^(-2)
 *
 * @param startFraction x0 [-], above 0
 * @param constantPerS  c [1/s]
 * @param t             time [s]
 * @returns fraction [-]
 * Source: own-room-air. Assumes: as singleVentDecayConstant. Accuracy: exact for that law.
 */
export function ventDecayFraction(startFraction: number, constantPerS: number, t: number): number {
  return (startFraction ** -0.5 + (constantPerS * t) / 2) ** -2;
}
