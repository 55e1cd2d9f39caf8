import { GRAVITY_M_PER_S2 } from './air-constants.js';

/** One opening in a wall, as the pressure difference sees it. */
export interface VerticalOpening {
  readonly sillM: number;
  readonly heightM: number;
  /** Width times open fraction times discharge coefficient [m]. */
  readonly effectiveWidthM: number;
}

/** Flows between two sides a and b, each in volume of its own side. */
export interface SidesFlow {
  readonly aToBM3PerS: number;
  readonly bToAM3PerS: number;
}

/**
 * Relative density difference (some 4 ppm of carbon dioxide) below which the exchange falls off
 * linearly instead of by the root. A hard stop there would switch the flow on and off for ever.
 */
const SMALL_DIFFERENCE = 1e-6;

/** Integral over a span of sqrt(2 |dp|) for a pressure difference linear in height. */
function speedIntegral(lowDp: number, highDp: number, spanM: number): number {
  if (spanM <= 0) return 0;
  if (Math.abs(highDp - lowDp) < 1e-12 * (lowDp + highDp)) return spanM * Math.sqrt(2 * lowDp);
  return ((2 / 3) * Math.SQRT2 * spanM * (highDp ** 1.5 - lowDp ** 1.5)) / (highDp - lowDp);
}

function flowsAt(
  openings: readonly VerticalOpening[],
  densityA: number,
  densityB: number,
  pressure0: number,
  slope: number,
): { aToB: number; bToA: number } {
  let aToB = 0;
  let bToA = 0;
  for (const opening of openings) {
    const low = pressure0 - slope * opening.sillM;
    const high = low - slope * opening.heightM;
    const width = opening.effectiveWidthM;
    if (low >= 0 && high >= 0) {
      aToB += (width * speedIntegral(low, high, opening.heightM)) / Math.sqrt(densityA);
    } else if (low <= 0 && high <= 0) {
      bToA += (width * speedIntegral(-low, -high, opening.heightM)) / Math.sqrt(densityB);
    } else {
      const share = Math.abs(low) / (Math.abs(low) + Math.abs(high));
      const below = speedIntegral(0, Math.abs(low), share * opening.heightM);
      const above = speedIntegral(0, Math.abs(high), (1 - share) * opening.heightM);
      if (low > 0) {
        aToB += (width * below) / Math.sqrt(densityA);
        bToA += (width * above) / Math.sqrt(densityB);
      } else {
        bToA += (width * below) / Math.sqrt(densityB);
        aToB += (width * above) / Math.sqrt(densityA);
      }
    }
  }
  return { aToB, bToA };
}

/**
 * Flows both ways through all wall openings between two sides [m3/s].
 *
 *   dp(z) = dp0 - g (rho_a - rho_b) z;  Q = Cd W integral sqrt(2 |dp|/rho_upstream) dz;
 *   dp0 from: flow a to b less flow b to a = net flow
 *
 * One doorway gives the exact exchange of neutralLevel; a high and a low vent give displacement.
 *
 * @param openings openings between the two sides
 * @param densityA density of side a [kg/m3]
 * @param densityB density of side b [kg/m3]
 * @param netM3PerS net volume flow from a to b [m3/s]
 * @returns both flows [m3/s]
 * Source: own-room-air (hydrostatic orifice theory). Assumes: one density on each side, no wind,
 * flow set up. Accuracy: that of the discharge coefficient.
 */
export function verticalOpeningFlows(
  openings: readonly VerticalOpening[],
  densityA: number,
  densityB: number,
  netM3PerS: number,
): SidesFlow {
  const area = openings.reduce((sum, one) => sum + one.effectiveWidthM * one.heightM, 0);
  const oneWay = { aToBM3PerS: Math.max(0, netM3PerS), bToAM3PerS: Math.max(0, -netM3PerS) };
  if (area <= 0) return oneWay;
  const sum = densityA + densityB;
  const difference = (densityA - densityB) / sum;
  if (Math.abs(difference) < SMALL_DIFFERENCE) {
    if (difference === 0) return oneWay;
    const half = 0.5 * sum * SMALL_DIFFERENCE * Math.sign(difference);
    const flows = differingSides(openings, area, 0.5 * sum + half, 0.5 * sum - half, netM3PerS);
    const exchange =
      (Math.min(flows.aToBM3PerS, flows.bToAM3PerS) * Math.abs(difference)) / SMALL_DIFFERENCE;
    return {
      aToBM3PerS: oneWay.aToBM3PerS + exchange,
      bToAM3PerS: oneWay.bToAM3PerS + exchange,
    };
  }
  return differingSides(openings, area, densityA, densityB, netM3PerS);
}

/**
 * Both flows through one opening: `major` from the dense side, `minor` from the light one.
 *
 *   k_d h^(3/2) - k_l (H - h)^(3/2) = net,  k = (2/3) Cd W sqrt(2 g (rho_d - rho_l)/rho_upstream)
 *
 * h is the neutral level above the sill; Newton's method inside a bracket finds it.
 */
function oneOpening(
  opening: VerticalOpening,
  dense: number,
  light: number,
  net: number,
): { major: number; minor: number } {
  const H = opening.heightM;
  const k = (2 / 3) * opening.effectiveWidthM * Math.sqrt(2 * GRAVITY_M_PER_S2 * (dense - light));
  const kDense = k / Math.sqrt(dense);
  const kLight = k / Math.sqrt(light);
  const whole = H * Math.sqrt(H);
  if (net >= kDense * whole) return { major: net, minor: 0 };
  if (-net >= kLight * whole) return { major: 0, minor: -net };
  let low = 0;
  let high = H;
  let h = 0.5 * H;
  for (let i = 0; i < 60; i++) {
    const rootBelow = Math.sqrt(h);
    const rootAbove = Math.sqrt(H - h);
    const excess = kDense * h * rootBelow - kLight * (H - h) * rootAbove - net;
    if (excess > 0) high = h;
    else low = h;
    let next = h - excess / (1.5 * (kDense * rootBelow + kLight * rootAbove));
    if (!(next > low && next < high)) next = 0.5 * (low + high);
    const change = Math.abs(next - h);
    h = next;
    if (change <= 1e-14 * H) break;
  }
  // The net flow is kept exactly; what the search left over goes to the smaller stream.
  if (net >= 0) {
    const major = Math.max(net, kDense * h * Math.sqrt(h));
    return { major, minor: major - net };
  }
  const minor = Math.max(-net, kLight * (H - h) * Math.sqrt(H - h));
  return { major: minor + net, minor };
}

/** The balance of pressures for two sides whose densities differ for certain. */
function differingSides(
  openings: readonly VerticalOpening[],
  area: number,
  densityA: number,
  densityB: number,
  netM3PerS: number,
): SidesFlow {
  const [only] = openings;
  if (only && openings.length === 1) {
    if (densityA >= densityB) {
      const { major, minor } = oneOpening(only, densityA, densityB, netM3PerS);
      return { aToBM3PerS: major, bToAM3PerS: minor };
    }
    const { major, minor } = oneOpening(only, densityB, densityA, -netM3PerS);
    return { aToBM3PerS: minor, bToAM3PerS: major };
  }
  const slope = GRAVITY_M_PER_S2 * (densityA - densityB);
  const bottom = Math.min(...openings.map((one) => one.sillM));
  const top = Math.max(...openings.map((one) => one.sillM + one.heightM));
  // Between these two pressures lies any balance whose net flow is not beyond pure one-way flow.
  const push = (netM3PerS / area) ** 2 * Math.max(densityA, densityB);
  let low = Math.min(slope * bottom, slope * top) - push;
  let high = Math.max(slope * bottom, slope * top) + push;
  let pressure = 0.5 * (low + high);
  let flows = flowsAt(openings, densityA, densityB, pressure, slope);
  const target = 1e-12 * (Math.abs(netM3PerS) + flows.aToB + flows.bToA);
  let lowValue = Number.NaN;
  let highValue = Number.NaN;
  for (let i = 0; i < 100; i++) {
    const value = flows.aToB - flows.bToA - netM3PerS;
    if (Math.abs(value) <= target) break;
    if (value > 0) {
      high = pressure;
      highValue = value;
      if (Number.isFinite(lowValue) && i % 2 === 1) lowValue /= 2;
    } else {
      low = pressure;
      lowValue = value;
      if (Number.isFinite(highValue) && i % 2 === 1) highValue /= 2;
    }
    if (high - low <= 1e-14 * (Math.abs(high) + Math.abs(low))) break;
    const secant = low - (lowValue * (high - low)) / (highValue - lowValue);
    pressure = secant > low && secant < high && i % 3 !== 2 ? secant : 0.5 * (low + high);
    flows = flowsAt(openings, densityA, densityB, pressure, slope);
  }
  // The net flow is kept exactly; what the search left over goes to the larger stream.
  const aToB = flows.aToB;
  return netM3PerS >= 0
    ? { aToBM3PerS: Math.max(aToB, netM3PerS), bToAM3PerS: Math.max(aToB - netM3PerS, 0) }
    : {
        aToBM3PerS: Math.max(flows.bToA + netM3PerS, 0),
        bToAM3PerS: Math.max(flows.bToA, -netM3PerS),
      };
}
