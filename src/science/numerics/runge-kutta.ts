import { NotComputable } from '../../errors.js';

/** Writes dy/dt into `out`. */
export type Derivative = (t: number, y: Float64Array, out: Float64Array) => void;

export interface RungeKuttaOptions {
  readonly relative: number;
  readonly absolute: number;
  readonly maxStepS: number;
}

/** One accepted step: states and slopes at both ends, enough for cubic interpolation. */
export interface AcceptedStep {
  readonly t0: number;
  readonly t1: number;
  readonly y0: Float64Array;
  readonly y1: Float64Array;
  readonly f0: Float64Array;
  readonly f1: Float64Array;
}

const MAX_STEPS = 200_000;

const A = [
  [],
  [1 / 5],
  [3 / 40, 9 / 40],
  [44 / 45, -56 / 15, 32 / 9],
  [19372 / 6561, -25360 / 2187, 64448 / 6561, -212 / 729],
  [9017 / 3168, -355 / 33, 46732 / 5247, 49 / 176, -5103 / 18656],
  [35 / 384, 0, 500 / 1113, 125 / 192, -2187 / 6784, 11 / 84],
] as const;
const C = [0, 1 / 5, 3 / 10, 4 / 5, 8 / 9, 1, 1] as const;
/** Fifth-order weights less the embedded fourth-order ones. */
const ERROR = [71 / 57600, 0, -71 / 16695, 71 / 1920, -17253 / 339200, 22 / 525, -1 / 40] as const;

/**
 * State at the end of a span, by the embedded Runge-Kutta pair 5(4) of Dormand and Prince [unit of
 * the state].
 *
 * @param f   derivative
 * @param y0  state at the start; left untouched
 * @param t0  start [s]
 * @param t1  end [s], not before the start
 * @param options tolerances and the longest step
 * @param onStep called after each accepted step; a state it returns takes the place of the new one
 * @returns state at t1
 * @throws {NotComputable} when the step shrinks to nothing
 * Source: dormand-prince-1980, table 2. Assumes: a smooth derivative inside the span (break the
 * span where it jumps). Accuracy: local error per step within the tolerances.
 */
export function integratedState(
  f: Derivative,
  y0: Float64Array,
  t0: number,
  t1: number,
  options: RungeKuttaOptions,
  onStep?: (step: AcceptedStep) => Float64Array | undefined,
): Float64Array {
  const n = y0.length;
  let y = Float64Array.from(y0);
  if (t1 <= t0) return y;
  const k = Array.from({ length: 7 }, () => new Float64Array(n));
  const slope = (i: number): Float64Array => k[i] as unknown as Float64Array;
  const trial = new Float64Array(n);
  let t = t0;
  let step = Math.min(options.maxStepS, (t1 - t0) / 10);
  f(t, y, slope(0));
  for (let count = 0; t < t1; count++) {
    if (count > MAX_STEPS || step < 1e-12 * Math.max(1, Math.abs(t))) {
      throw new NotComputable(
        'The time integration did not get through.',
        'Shorten the span or look for a flow that is out of proportion.',
        [
          {
            path: '',
            problem: `stopped at ${String(t)} s after ${String(count)} steps, step ${String(step)} s`,
          },
        ],
      );
    }
    const last = t + step >= t1 * (1 - 1e-15) && t + step * (1 + 1e-9) >= t1;
    const h = last ? t1 - t : step;
    for (let stage = 1; stage < 7; stage++) {
      const row = A[stage] ?? [];
      trial.set(y);
      for (let j = 0; j < row.length; j++) {
        const weight = h * (row[j] ?? 0);
        if (weight === 0) continue;
        const kj = slope(j);
        for (let i = 0; i < n; i++) trial[i] = (trial[i] ?? 0) + weight * (kj[i] ?? 0);
      }
      f(t + (C[stage] ?? 0) * h, trial, slope(stage));
    }
    // The seventh stage was evaluated at the new state, which `trial` still holds.
    let worst = 0;
    for (let i = 0; i < n; i++) {
      let error = 0;
      for (let j = 0; j < 7; j++) error += (ERROR[j] ?? 0) * (slope(j)[i] ?? 0);
      const scale =
        options.absolute +
        options.relative * Math.max(Math.abs(y[i] ?? 0), Math.abs(trial[i] ?? 0));
      worst = Math.max(worst, Math.abs(h * error) / scale);
    }
    if (worst <= 1) {
      const next = Float64Array.from(trial);
      const t1Step = last ? t1 : t + h;
      const replaced = onStep?.({
        t0: t,
        t1: t1Step,
        y0: y,
        y1: next,
        f0: Float64Array.from(slope(0)),
        f1: Float64Array.from(slope(6)),
      });
      t = t1Step;
      if (replaced) {
        y = Float64Array.from(replaced);
        f(t, y, slope(0));
      } else {
        y = next;
        slope(0).set(slope(6));
      }
    }
    const factor = worst > 0 ? 0.9 * worst ** -0.2 : 5;
    const base = last && worst <= 1 ? step : h;
    step = Math.min(options.maxStepS, base * Math.min(5, Math.max(0.2, factor)));
  }
  return y;
}

/**
 * Cubic through both ends of a step with both slopes [unit of the state].
 *
 * @param step one accepted step
 * @param index entry of the state [-], from 0
 * @param t    time inside the step [s]
 * @returns the entry at t [unit of the state]
 * Source: hairer-norsett-wanner-1993, II.6 (Hermite interpolation). Assumes: t inside the step.
 * Accuracy: fourth order in the step.
 */
export function hermiteValue(step: AcceptedStep, index: number, t: number): number {
  const h = step.t1 - step.t0;
  const s = h > 0 ? (t - step.t0) / h : 0;
  const y0 = step.y0[index] ?? 0;
  const y1 = step.y1[index] ?? 0;
  const f0 = step.f0[index] ?? 0;
  const f1 = step.f1[index] ?? 0;
  const change = y1 - y0;
  return y0 + s * change + s * (1 - s) * ((1 - 2 * s) * -change + (1 - s) * h * f0 - s * h * f1);
}
