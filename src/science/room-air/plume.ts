/** Top-hat entrainment of a round plume [-]: usual value. Source: morton-taylor-turner-1956. */
export const PLUME_ENTRAINMENT = 0.11;
/** Flow of a line plume over B_w^(1/3) z [-], (2 x 0.16)^(2/3). Source: akhter-kaye-2020. */
export const LINE_PLUME_CONSTANT = 0.32 ** (2 / 3);

/**
 * Constant of the flow in a round plume [-].
 *
 *   C = (6 a/5) (9 a/10)^(1/3) pi^(2/3)
 *
 * @param entrainment top-hat entrainment a [-], 0.10 to 0.13
 * @returns C in Q = C B^(1/3) z^(5/3) [-]
 * Source: morton-taylor-turner-1956. Assumes: small density difference. Accuracy: 0.115 to 0.164
 * over the range of a.
 * @example plumeConstant(0.11) // 0.1309842
 */
export function plumeConstant(entrainment: number = PLUME_ENTRAINMENT): number {
  return ((6 * entrainment) / 5) * ((9 * entrainment) / 10) ** (1 / 3) * Math.PI ** (2 / 3);
}

/**
 * Volume flow in a round plume [m3/s].
 *
 *   Q = C B^(1/3) z^(5/3)
 *
 * @param buoyancyFlux B = g0 q [m4/s3], 0 or more
 * @param riseM        height above the (virtual) source z [m], 0 or more
 * @param constant     C [-]
 * @returns flow [m3/s]
 * Source: morton-taylor-turner-1956. Assumes: still air, free of walls, small density difference.
 * Accuracy: that of C; helium is only indicative below about 10 (q^2/g0)^(1/5).
 */
export function plumeFlow(buoyancyFlux: number, riseM: number, constant: number): number {
  return constant * Math.cbrt(buoyancyFlux) * Math.max(0, riseM) ** (5 / 3);
}

/**
 * Mean gas fraction in a plume [-].
 *
 *   q/Q_p, at most 1
 *
 * @param releaseM3PerS release q [m3/s]
 * @param plumeM3PerS   flow of the plume Q_p [m3/s], above 0
 * @returns fraction [-]
 * Source: morton-taylor-turner-1956. Assumes: Q_p much larger than q. Accuracy: that of the plume.
 */
export function plumeFraction(releaseM3PerS: number, plumeM3PerS: number): number {
  return Math.min(1, releaseM3PerS / plumeM3PerS);
}

/**
 * Volume flow of a line plume, all its width [m3/s].
 *
 *   Q = 0.468 (B/W)^(1/3) W z
 *
 * @param buoyancyFlux B of the whole line [m4/s3], 0 or more
 * @param widthM       length of the line W [m], above 0
 * @param riseM        distance from the source z [m], 0 or more
 * @returns flow [m3/s]
 * Source: akhter-kaye-2020. Assumes: free on both sides; against a wall 0.63 of it. Accuracy: not
 * stated.
 */
export function linePlumeFlow(buoyancyFlux: number, widthM: number, riseM: number): number {
  return LINE_PLUME_CONSTANT * Math.cbrt(buoyancyFlux / widthM) * widthM * Math.max(0, riseM);
}
