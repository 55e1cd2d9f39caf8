import { plumeConstant, plumeFlow, PLUME_ENTRAINMENT } from './plume.js';

/** The axis of a plume over its top-hat mean [-]. */
const AXIS_FACTOR = 2;
/** Nearest that anybody comes to the axis of a stream [m]: the reach of a pour. */
export const STREAM_CLEARANCE_M = 0.3;

/**
 * Largest gas fraction that a mouth inside a plume, jet or fall may meet [-].
 *
 *   min(1, 2 q/Q_p): the axis is about twice the mean
 *
 * @param releaseM3PerS release q [m3/s]
 * @param plumeM3PerS   flow at that distance Q_p [m3/s], above 0
 * @returns fraction [-]
 * Source: engineering-judgement (rule on local flow). Assumes: as plumeFraction. Accuracy:
 * judgement.
 * @example localFlowFraction(0.004, 0.016) // 0.5
 */
export function localFlowFraction(releaseM3PerS: number, plumeM3PerS: number): number {
  return Math.min(1, (AXIS_FACTOR * releaseM3PerS) / plumeM3PerS);
}

/**
 * Gas fraction on the axis of gas rising or sinking from a small source [-].
 *
 *   min(1, 2 q/Q_p), Q_p = C (g0 q)^(1/3) z^(5/3)
 *
 * @param releaseM3PerS release q [m3/s], 0 or more
 * @param gZero         reduced gravity of the pure gas g0, its size [m/s2], 0 or more
 * @param distanceM     distance from the source along the rise or fall z [m]
 * @returns fraction [-]; 1 at the source itself and for a gas that neither rises nor sinks
 * Source: morton-taylor-turner-1956 (flow); engineering-judgement (factor 2). Assumes: still air,
 * free of walls. Accuracy: that of C; near the source the flow is only indicative, and capped at 1.
 * @example streamFraction(0.0055, 5.098, 1) // 0.27643070
 */
export function streamFraction(releaseM3PerS: number, gZero: number, distanceM: number): number {
  if (releaseM3PerS <= 0) return 0;
  const flow = plumeFlow(gZero * releaseM3PerS, distanceM, plumeConstant());
  return flow > 0 ? localFlowFraction(releaseM3PerS, flow) : 1;
}

/**
 * Distance from the axis of a plume or fall within which a mouth counts as inside it [m].
 *
 *   max(0.3 m, 2 b), b = (6 a/5) z: twice the top-hat radius
 *
 * @param distanceM distance from the source along the rise or fall z [m], 0 or more
 * @returns distance [m]
 * Source: morton-taylor-turner-1956 (radius); engineering-judgement (twice, at least 0.3 m).
 * Assumes: still air. Accuracy: judgement; draughts bend a plume.
 * @example streamClearance(2) // 0.528
 */
export function streamClearance(distanceM: number): number {
  return Math.max(STREAM_CLEARANCE_M, ((2 * 6 * PLUME_ENTRAINMENT) / 5) * Math.max(0, distanceM));
}
