import { GRAVITY_M_PER_S2 } from './air-constants.js';

export interface TwoWayFlow {
  readonly outM3PerS: number;
  readonly inM3PerS: number;
}

/**
 * Two-way exchange through a doorway without net flow [m3/s each way], small density difference.
 *
 *   Q = (Cd/3) W sqrt(g' H^3)
 *
 * @param widthM  width W [m]
 * @param heightM height H [m]
 * @param gPrime  reduced gravity with the mean density [m/s2], 0 or more
 * @param dischargeCoefficient Cd [-]
 * @returns flow each way [m3/s]
 * Source: brown-solvason-1962. Assumes: one density on each side over the height, no wind.
 * Accuracy: 5 % up to a density ratio of 3 with the mean density in g'.
 * @example doorwayExchange(0.9, 2.1, 0.25, 0.6) // 0.27388702
 */
export function doorwayExchange(
  widthM: number,
  heightM: number,
  gPrime: number,
  dischargeCoefficient: number,
): number {
  return (dischargeCoefficient / 3) * widthM * Math.sqrt(gPrime * heightM ** 3);
}

/**
 * Neutral level of a doorway with equal volumes both ways [m above its sill].
 *
 *   h1/(H - h1) = (rho1/rho2)^(1/3), the dense side flows below h1
 *
 * @param heightM  height H [m]
 * @param denseKgPerM3 density of the heavier side [kg/m3, or any one unit]
 * @param lightKgPerM3 density of the lighter side [same unit]
 * @returns neutral level [m]
 * Source: own-room-air (hydrostatic orifice theory). Assumes: isothermal gases, no net flow.
 * Accuracy: exact for the orifice model.
 */
export function neutralLevel(heightM: number, denseKgPerM3: number, lightKgPerM3: number): number {
  const ratio = (denseKgPerM3 / lightKgPerM3) ** (1 / 3);
  return (heightM * ratio) / (1 + ratio);
}

/**
 * Two-way exchange through a doorway without net flow [m3/s each way], any densities.
 *
 *   Q = (2/3) Cd W sqrt(2 g (rho1 - rho2)/rho1) h1^(3/2)
 *
 * @param widthM  width W [m]
 * @param heightM height H [m]
 * @param denseKgPerM3 density of the heavier side [kg/m3, or any one unit]
 * @param lightKgPerM3 density of the lighter side [same unit]
 * @param dischargeCoefficient Cd [-]
 * @returns flow each way [m3/s]
 * Source: own-room-air (hydrostatic orifice theory). Assumes: as neutralLevel. Accuracy: exact for
 * the orifice model.
 */
export function exactDoorwayExchange(
  widthM: number,
  heightM: number,
  denseKgPerM3: number,
  lightKgPerM3: number,
  dischargeCoefficient: number,
): number {
  const dense = neutralLevel(heightM, denseKgPerM3, lightKgPerM3);
  const gPrime = (GRAVITY_M_PER_S2 * (denseKgPerM3 - lightKgPerM3)) / denseKgPerM3;
  return (2 / 3) * dischargeCoefficient * widthM * Math.sqrt(2 * gPrime) * dense ** 1.5;
}

/** Net flow at which all counterflow stops, over the free exchange [-]: 2 sqrt(2). */
const STOP_RATIO = 2 * Math.SQRT2;

/**
 * Both flows through an opening with a net flow imposed [m3/s], small density difference.
 *
 *   out = K (1 - e)^(3/2), in = K e^(3/2), K = 2 sqrt(2) Q_exchange, out - in = Q_net
 *
 * @param exchangeM3PerS free exchange each way [m3/s], 0 or more
 * @param netM3PerS      net flow out [m3/s]; negative: in
 * @returns both flows [m3/s]; pure one-way flow from 2.83 times the exchange on
 * Source: own-room-air (shift of the neutral level). Assumes: as doorwayExchange.
 * Accuracy: exact for the orifice model with small density difference.
 */
export function flowsWithNet(exchangeM3PerS: number, netM3PerS: number): TwoWayFlow {
  const most = STOP_RATIO * exchangeM3PerS;
  const net = Math.abs(netM3PerS);
  if (net >= most) {
    return netM3PerS >= 0 ? { outM3PerS: net, inM3PerS: 0 } : { outM3PerS: 0, inM3PerS: net };
  }
  // Newton on e in (0, 1/2]; the left side falls steadily with e, so it cannot run away.
  let e = 0.5 * (1 - net / most);
  for (let i = 0; i < 40; i++) {
    const above = Math.sqrt(1 - e);
    const below = Math.sqrt(e);
    const value = (1 - e) * above - e * below - net / most;
    const step = value / (1.5 * (above + below));
    e = Math.min(0.5, Math.max(0, e + step));
    if (Math.abs(step) < 1e-14) break;
  }
  const major = most * (1 - e) * Math.sqrt(1 - e);
  const minor = major - net;
  return netM3PerS >= 0
    ? { outM3PerS: major, inM3PerS: minor }
    : { outM3PerS: minor, inM3PerS: major };
}

/**
 * Net flow that stops all counterflow through a doorway [m3/s].
 *
 * @param exchangeM3PerS free exchange each way [m3/s]
 * @returns smallest such net flow [m3/s]
 * Source: own-room-air. Assumes: as flowsWithNet. Accuracy: as flowsWithNet.
 */
export function counterflowLimit(exchangeM3PerS: number): number {
  return STOP_RATIO * exchangeM3PerS;
}
