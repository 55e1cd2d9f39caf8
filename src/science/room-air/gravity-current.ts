import { inRange, type Range } from '../range.js';

/** Front Froude number of a shallow current under deep air [-]. */
export const FRONT_FROUDE = 1.19;

export const SECTOR_ANGLE: Range = {
  min: 0.1,
  max: 2 * Math.PI,
  unit: 'rad',
  name: 'Sector angle',
};

/**
 * Radius at the start of a dense volume as high as it is wide [m].
 *
 *   R0 = (2 V/theta)^(1/3)
 *
 * @param volumeM3 volume V [m3]
 * @param angleRad sector angle theta [rad], 0.1 to 2 pi (free), pi at a wall, pi/2 in a corner
 * @returns radius [m]
 * @throws {OutOfRange} outside the range above
 * Source: huppert-simpson-1980 (box model). Assumes: height equal to radius. Accuracy: not stated.
 * @example initialRadius(0.1, 2 * Math.PI) // 0.31692029
 */
export function initialRadius(volumeM3: number, angleRad: number): number {
  inRange(angleRad, SECTOR_ANGLE, '/angleRad');
  return ((2 * volumeM3) / angleRad) ** (1 / 3);
}

/**
 * Radius of a dense volume released at once, spreading over a floor [m].
 *
 *   R^2 = R0^2 + 2 Fr sqrt(2 g' V/theta) t
 *
 * @param volumeM3 volume V [m3]
 * @param gPrime   reduced gravity of the gas, air as reference [m/s2], 0 or more
 * @param t        time since the release [s], 0 or more
 * @param angleRad sector angle theta [rad], default free
 * @returns radius [m]
 * Source: huppert-simpson-1980 (box model). Assumes: deep still air, no mixing. Accuracy: not
 * stated.
 * @example frontRadiusAtOnce(0.1, 39.665123, 1) // 1.6657478
 */
export function frontRadiusAtOnce(
  volumeM3: number,
  gPrime: number,
  t: number,
  angleRad: number = 2 * Math.PI,
): number {
  const start = initialRadius(volumeM3, angleRad);
  return Math.sqrt(
    start ** 2 + 2 * FRONT_FROUDE * Math.sqrt((2 * gPrime * volumeM3) / angleRad) * t,
  );
}

/**
 * Radius of a dense gas that keeps flowing onto a floor [m].
 *
 *   R^2 = (4/3) Fr sqrt(2 g' q/theta) t^(3/2)
 *
 * @param flowM3PerS flow q [m3/s]
 * @param gPrime     reduced gravity of the gas, air as reference [m/s2], 0 or more
 * @param t          time since the start [s], 0 or more
 * @param angleRad   sector angle theta [rad], default free
 * @returns radius [m]
 * Source: huppert-simpson-1980 (box model). Assumes: deep still air, no mixing. Accuracy: not
 * stated.
 * @example frontRadiusContinuous(0.006, 5.0979142, 10) // 2.2250579
 */
export function frontRadiusContinuous(
  flowM3PerS: number,
  gPrime: number,
  t: number,
  angleRad: number = 2 * Math.PI,
): number {
  inRange(angleRad, SECTOR_ANGLE, '/angleRad');
  return Math.sqrt(
    (4 / 3) * FRONT_FROUDE * Math.sqrt((2 * gPrime * flowM3PerS) / angleRad) * t ** 1.5,
  );
}

/**
 * Time until a dense volume released at once has spread to a radius [s].
 *
 *   t = (R^2 - R0^2)/(2 Fr sqrt(2 g' V/theta))
 *
 * @param volumeM3 volume V [m3]
 * @param gPrime   reduced gravity of the gas, air as reference [m/s2], above 0
 * @param radiusM  radius R [m]
 * @param angleRad sector angle theta [rad], default free
 * @returns time [s], 0 when it starts beyond
 * Source: huppert-simpson-1980 (box model). Assumes: as frontRadiusAtOnce. Accuracy: not stated.
 * @example arrivalTimeAtOnce(0.1, 39.665123, 4.478) // 7.4607245
 */
export function arrivalTimeAtOnce(
  volumeM3: number,
  gPrime: number,
  radiusM: number,
  angleRad: number = 2 * Math.PI,
): number {
  const start = initialRadius(volumeM3, angleRad);
  const speed = 2 * FRONT_FROUDE * Math.sqrt((2 * gPrime * volumeM3) / angleRad);
  return Math.max(0, (radiusM ** 2 - start ** 2) / speed);
}

/**
 * Dilution by entrainment at the edge while a volume spreads [-].
 *
 *   V/V0 = (R/R0)^(2 alpha)
 *
 * @param radiusM  radius R [m]
 * @param startM   radius at the start R0 [m]
 * @param alpha    edge entrainment [-], 0 (bound) to 0.8
 * @returns volume over volume at the start [-]
 * Source: van-ulden-1984, coefficients from memory. Assumes: box model. Accuracy: alpha is known to
 * a factor of 2.
 */
export function edgeDilution(radiusM: number, startM: number, alpha: number): number {
  return (radiusM / startM) ** (2 * alpha);
}

/**
 * Front speed when a full-depth barrier is taken away [m/s].
 *
 *   0.5 sqrt(g' H)
 *
 * @param depthM depth H [m]
 * @param gPrime reduced gravity [m/s2]
 * @returns speed [m/s]
 * Source: shin-dalziel-linden-2004. Assumes: small density difference, no friction.
 * Accuracy: measured a few percent lower.
 * @example lockExchangeSpeed(2.1, 1.0195828) // 0.731629
 */
export function lockExchangeSpeed(depthM: number, gPrime: number): number {
  return 0.5 * Math.sqrt(gPrime * depthM);
}
