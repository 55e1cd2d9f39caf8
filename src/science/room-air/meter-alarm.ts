import { OXYGEN_IN_DRY_AIR } from './air-constants.js';
import { vapourPressure } from './water-vapour.js';

/** What the display of a gas meter does with the true value. */
export interface MeterTraits {
  /** Time to 90 % of a step [s]. */
  readonly responseTimeS: number;
  readonly alarmLevel: number;
  readonly side: 'below' | 'above';
}

/**
 * Time at which a meter gives its alarm [s], or undefined when it does not within the series.
 *
 *   dr/dt = (x - r)/tau, tau = t90/ln 10
 *
 * @param timesS rising times [s]
 * @param values true reading at the place of the meter [-]
 * @param meter  response time [s], alarm level [-] and side
 * @returns time of the alarm [s]
 * Source: own-room-air (first-order lag from the stated t90). Assumes: straight between points, the
 * meter starts settled. Accuracy: that of t90.
 */
export function alarmTime(
  timesS: readonly number[],
  values: readonly number[],
  meter: MeterTraits,
): number | undefined {
  const tau = Math.max(meter.responseTimeS, 1e-3) / Math.LN10;
  const sign = meter.side === 'below' ? -1 : 1;
  let shown = values[0] ?? 0;
  const past = (value: number): boolean => sign * (value - meter.alarmLevel) > 0;
  if (past(shown)) return timesS[0];
  for (let i = 1; i < timesS.length; i++) {
    const start = timesS[i - 1] ?? 0;
    const span = (timesS[i] ?? 0) - start;
    const from = values[i - 1] ?? 0;
    const slope = ((values[i] ?? 0) - from) / span;
    const begin = shown;
    // Exact answer of the lag to a straight line.
    const display = (s: number): number =>
      from + slope * (s - tau) + (begin - from + slope * tau) * Math.exp(-s / tau);
    shown = display(span);
    if (past(shown)) {
      let low = 0;
      let high = span;
      while (high - low > 1e-3) {
        const middle = 0.5 * (low + high);
        if (past(display(middle))) high = middle;
        else low = middle;
      }
      return start + high;
    }
  }
  return undefined;
}

/**
 * Number at which to act on a reading [-].
 *
 *   limit - (accuracy + drift + cross effect + t90 x expected rate of change), towards safety
 *
 * @param limit    limit of the decision [-]
 * @param side     below for oxygen (act above the limit), above for a gas (act below it)
 * @param doubts   accuracy, drift and cross effect of the meter [-]
 * @param responseTimeS t90 [s]
 * @param ratePerS expected rate of change [1/s], its size
 * @returns reading at which to act [-]
 * Source: engineering-judgement (rule on meters). Assumes: doubts add up. Accuracy: judgement.
 * @example actionReading(0.195, 'below', [0.003, 0.002], 20, 1e-5) // 0.2002
 */
export function actionReading(
  limit: number,
  side: 'below' | 'above',
  doubts: readonly number[],
  responseTimeS: number,
  ratePerS: number,
): number {
  const margin =
    doubts.reduce((sum, one) => sum + Math.abs(one), 0) + responseTimeS * Math.abs(ratePerS);
  return side === 'below' ? limit + margin : limit - margin;
}

/**
 * What a right oxygen meter shows in clean air of the place [-]: the baseline of every reading.
 *
 *   0.2095 (1 - pv/p)
 *
 * @param temperatureK     temperature [K]
 * @param pressurePa       site pressure p [Pa], above the vapour pressure
 * @param relativeHumidity relative humidity [-], 0 to 1
 * @returns oxygen fraction of the humid air [-]
 * Source: wmo-8 (vapour pressure pv), iso-2533 (dry air). Assumes: outdoor air. Accuracy: 1e-4.
 * @example cleanAirReading(293.15, 101325, 0.5) // 0.2071
 */
export function cleanAirReading(
  temperatureK: number,
  pressurePa: number,
  relativeHumidity: number,
): number {
  return OXYGEN_IN_DRY_AIR * (1 - vapourPressure(temperatureK, relativeHumidity) / pressurePa);
}

/**
 * Fastest approach of a series to its limit [1/s].
 *
 *   max over the intervals of the change towards the limit per second, at least 0
 *
 * @param timesS rising times [s]
 * @param values true fraction at those times [-], as many as times
 * @param side   below for oxygen (falls towards its limit), above for a gas
 * @returns rate [1/s], 0 where it never moves that way
 * Source: own-derivation. Assumes: straight between the points. Accuracy: that of the interval.
 * @example fastestApproach([0, 10, 20], [0.2095, 0.2085, 0.209], 'below') // 0.0001
 */
export function fastestApproach(
  timesS: readonly number[],
  values: readonly number[],
  side: 'below' | 'above',
): number {
  const sign = side === 'below' ? -1 : 1;
  let fastest = 0;
  for (let i = 1; i < timesS.length; i++) {
    const span = (timesS[i] ?? 0) - (timesS[i - 1] ?? 0);
    if (span <= 0) continue;
    fastest = Math.max(fastest, (sign * ((values[i] ?? 0) - (values[i - 1] ?? 0))) / span);
  }
  return fastest;
}
