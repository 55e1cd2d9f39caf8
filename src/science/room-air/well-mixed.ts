/**
 * Textbook closed forms of one well-mixed space. The network run solves the same balance for any
 * number of spaces; these are its limits and the sums a person does on paper.
 */

/** One space with fresh air and a release, all at constant flow. */
export interface MixedSpace {
  readonly volumeM3: number;
  readonly freshAirM3PerS: number;
  readonly releaseM3PerS: number;
  /** Fraction at the start [-]. */
  readonly startFraction?: number;
}

/**
 * Gas fraction of a space whose supply is fixed [-]; the release adds to the outflow.
 *
 *   x = xs + (x0 - xs) exp(-(Q + q) t/V), xs = q/(Q + q)
 *
 * @param space volume V [m3], fresh supply Q [m3/s], release q [m3/s], start x0 [-]
 * @param t     time [s], 0 or more
 * @returns fraction [-]
 * Source: own-room-air (V dx/dt = q - (Q + q) x). Assumes: well mixed, constant pressure and
 * temperature, gas-free supply. Accuracy: exact.
 * @example supplyControlledFraction({ volumeM3: 300, freshAirM3PerS: 0.25, releaseM3PerS: 0.01 }, 600) // 0.015595364
 */
export function supplyControlledFraction(space: MixedSpace, t: number): number {
  const out = space.freshAirM3PerS + space.releaseM3PerS;
  return relaxedFraction(space, t, out);
}

/**
 * Gas fraction of a space whose extract is fixed [-]; make-up air gives way to the release.
 *
 *   as supplyControlledFraction with outflow max(Qe, q)
 *
 * @param space volume V [m3], extract Qe [m3/s], release q [m3/s], start x0 [-]
 * @param t     time [s], 0 or more
 * @returns fraction [-]; tends to 1 when the release is more than the extract
 * Source: own-room-air (outflow = max(extract, supply + release)). Assumes: as above.
 * Accuracy: exact.
 */
export function extractControlledFraction(space: MixedSpace, t: number): number {
  return relaxedFraction(space, t, Math.max(space.freshAirM3PerS, space.releaseM3PerS));
}

/**
 * Gas fraction by the small-release form [-]: the outflow is the fresh air alone.
 *
 *   x = min(1, q/Q + (x0 - q/Q) exp(-Q t/V))
 *
 * @param space volume V [m3], fresh air Q [m3/s], release q [m3/s], start x0 [-]
 * @param t     time [s], 0 or more
 * @returns fraction [-], capped at 1; too high by the factor 1 + q/Q when steady
 * Source: own-room-air. Assumes: q small against Q. Accuracy: safe side; 5 % for q/Q below 0.05.
 */
export function smallReleaseFraction(space: MixedSpace, t: number): number {
  const { volumeM3, freshAirM3PerS, releaseM3PerS } = space;
  const start = space.startFraction ?? 0;
  if (freshAirM3PerS <= 0) return Math.min(1, start + (releaseM3PerS * t) / volumeM3);
  return Math.min(1, relaxedFraction(space, t, freshAirM3PerS));
}

function relaxedFraction(space: MixedSpace, t: number, outM3PerS: number): number {
  const start = space.startFraction ?? 0;
  if (outM3PerS <= 0) return start;
  const steady = space.releaseM3PerS / outM3PerS;
  return steady + (start - steady) * Math.exp((-outM3PerS * t) / space.volumeM3);
}

/**
 * Gas fraction from a release that dies away [-], small-release form.
 *
 *   x = (q0/V) (exp(-t/tau) - exp(-Q t/V))/(Q/V - 1/tau)
 *
 * @param space volume V [m3], fresh air Q [m3/s], first release q0 [m3/s]
 * @param decayS decay time tau of the release [s], above 0
 * @param t     time [s], 0 or more
 * @returns fraction [-], capped at 1
 * Source: own-room-air. Assumes: q small against Q, clean start. Accuracy: safe side.
 */
export function decayingReleaseFraction(space: MixedSpace, decayS: number, t: number): number {
  const rate = space.freshAirM3PerS / space.volumeM3;
  const difference = rate - 1 / decayS;
  const first = space.releaseM3PerS / space.volumeM3;
  if (Math.abs(difference) < 1e-12) return Math.min(1, first * t * Math.exp(-rate * t));
  return Math.min(1, (first * (Math.exp(-t / decayS) - Math.exp(-rate * t))) / difference);
}

/**
 * Time at which a release that dies away gives the largest fraction [s], small-release form.
 *
 *   t = ln(lambda tau)/(lambda - 1/tau), lambda = Q/V
 *
 * @param airChangePerS air change lambda [1/s], above 0
 * @param decayS        decay time tau of the release [s], above 0
 * @returns time [s]
 * Source: own-room-air. Assumes: as decayingReleaseFraction. Accuracy: exact for that form.
 * @example decayingReleasePeakTime(0.0005, 120) // 359.15881
 */
export function decayingReleasePeakTime(airChangePerS: number, decayS: number): number {
  const product = airChangePerS * decayS;
  if (Math.abs(product - 1) < 1e-9) return decayS;
  return Math.log(product) / (airChangePerS - 1 / decayS);
}

/**
 * Time to thin a gas out to a level [s].
 *
 *   t = (V/Q) ln((c0 - cb)/(c1 - cb))
 *
 * @param volumeM3       volume V [m3]
 * @param freshAirM3PerS outdoor air Q [m3/s], above 0
 * @param startFraction  fraction at the start c0 [-]
 * @param endFraction    fraction to reach c1 [-], above the background
 * @param background     fraction in the incoming air cb [-], default 0
 * @returns time [s]; 0 when already there; Infinity when it cannot be reached
 * Source: own-room-air. Assumes: well mixed, nothing released or breathed. Accuracy: exact.
 * @example clearDownTime(300, 0.25, 0.03, 0.005) // 2150.1113631
 */
export function clearDownTime(
  volumeM3: number,
  freshAirM3PerS: number,
  startFraction: number,
  endFraction: number,
  background = 0,
): number {
  if (startFraction <= endFraction) return 0;
  if (endFraction <= background || freshAirM3PerS <= 0) return Infinity;
  return (
    (volumeM3 / freshAirM3PerS) *
    Math.log((startFraction - background) / (endFraction - background))
  );
}
