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

/** Weights of the slopes in the state at the end of a step, with their place in the step [-]. */
export const STEP_WEIGHTS = [
  [35 / 384, 0],
  [500 / 1113, 3 / 10],
  [125 / 192, 4 / 5],
  [-2187 / 6784, 8 / 9],
  [11 / 84, 1],
] as const;

/** Work space of a span of steps; reused from span to span. */
export interface RungeKuttaWork {
  /** State before the step last tried. */
  readonly before: Float64Array;
  /** State after it. */
  readonly after: Float64Array;
  /** Slopes at the seven stages: the first at the start, the last at the end. */
  readonly slopes: readonly [
    Float64Array,
    Float64Array,
    Float64Array,
    Float64Array,
    Float64Array,
    Float64Array,
    Float64Array,
  ];
}

/** Work space for a state of a length. */
export function rungeKuttaWork(length: number): RungeKuttaWork {
  const row = (): Float64Array => new Float64Array(length);
  return {
    before: row(),
    after: row(),
    slopes: [row(), row(), row(), row(), row(), row(), row()],
  };
}

/** How a span is stepped through. */
export interface SpanOptions {
  readonly relative: number;
  /** Absolute tolerance of each entry [unit of the state]. */
  readonly absolute: Float64Array;
  /** First step to try [s]; what the last span ended with is a good guess. */
  readonly firstStepS: number;
  /** Told of every step before it is tried. */
  onTry?(t: number, h: number): void;
  /** Longest step from here [s], asked after every derivative at the start of a step. */
  longestStepS(): number;
}

/**
 * Steps through a span by the embedded Runge-Kutta pair 5(4) of Dormand and Prince; `work.before`
 * holds the state at the start, and the state at the end when it returns [unit of the state].
 *
 * @param f      derivative
 * @param work   work space with the state at the start
 * @param t0     start [s]
 * @param t1     end [s], not before the start
 * @param options tolerances and step limits
 * @param onStep called after each accepted step while `work` holds both of its ends
 * @returns step the error would have allowed at the end [s]
 * @throws {NotComputable} when the step shrinks to nothing
 * Source: dormand-prince-1980, table 2. Assumes: a smooth derivative inside the span (break the
 * span where it jumps). Accuracy: local error per step within the tolerances.
 */
export function stepThrough(
  f: Derivative,
  work: RungeKuttaWork,
  t0: number,
  t1: number,
  options: SpanOptions,
  onStep: (t0: number, t1: number) => void,
): number {
  const { before: y, after: z, slopes } = work;
  const [k1, k2, k3, k4, k5, k6, k7] = slopes;
  const { relative, absolute } = options;
  const n = y.length;
  let t = t0;
  if (t1 <= t0) return options.firstStepS;
  f(t, y, k1);
  let step = Math.min(options.firstStepS, options.longestStepS());
  for (let count = 0; t < t1; count++) {
    if (count > MAX_STEPS || !(step >= 1e-12 * Math.max(1, Math.abs(t)))) {
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
    const last = t + step * (1 + 1e-9) >= t1;
    const h = last ? t1 - t : step;
    options.onTry?.(t, h);
    for (let i = 0; i < n; i++) z[i] = (y[i] ?? 0) + h * (1 / 5) * (k1[i] ?? 0);
    f(t + h / 5, z, k2);
    for (let i = 0; i < n; i++) {
      z[i] = (y[i] ?? 0) + h * ((3 / 40) * (k1[i] ?? 0) + (9 / 40) * (k2[i] ?? 0));
    }
    f(t + (3 / 10) * h, z, k3);
    for (let i = 0; i < n; i++) {
      z[i] =
        (y[i] ?? 0) +
        h * ((44 / 45) * (k1[i] ?? 0) - (56 / 15) * (k2[i] ?? 0) + (32 / 9) * (k3[i] ?? 0));
    }
    f(t + (4 / 5) * h, z, k4);
    for (let i = 0; i < n; i++) {
      z[i] =
        (y[i] ?? 0) +
        h *
          ((19372 / 6561) * (k1[i] ?? 0) -
            (25360 / 2187) * (k2[i] ?? 0) +
            (64448 / 6561) * (k3[i] ?? 0) -
            (212 / 729) * (k4[i] ?? 0));
    }
    f(t + (8 / 9) * h, z, k5);
    for (let i = 0; i < n; i++) {
      z[i] =
        (y[i] ?? 0) +
        h *
          ((9017 / 3168) * (k1[i] ?? 0) -
            (355 / 33) * (k2[i] ?? 0) +
            (46732 / 5247) * (k3[i] ?? 0) +
            (49 / 176) * (k4[i] ?? 0) -
            (5103 / 18656) * (k5[i] ?? 0));
    }
    f(t + h, z, k6);
    for (let i = 0; i < n; i++) {
      z[i] =
        (y[i] ?? 0) +
        h *
          ((35 / 384) * (k1[i] ?? 0) +
            (500 / 1113) * (k3[i] ?? 0) +
            (125 / 192) * (k4[i] ?? 0) -
            (2187 / 6784) * (k5[i] ?? 0) +
            (11 / 84) * (k6[i] ?? 0));
    }
    f(t + h, z, k7);
    let worst = 0;
    for (let i = 0; i < n; i++) {
      // Fifth-order weights less the embedded fourth-order ones.
      const error =
        (71 / 57600) * (k1[i] ?? 0) -
        (71 / 16695) * (k3[i] ?? 0) +
        (71 / 1920) * (k4[i] ?? 0) -
        (17253 / 339200) * (k5[i] ?? 0) +
        (22 / 525) * (k6[i] ?? 0) -
        (1 / 40) * (k7[i] ?? 0);
      const a = Math.abs(y[i] ?? 0);
      const b = Math.abs(z[i] ?? 0);
      const scale = (absolute[i] ?? 0) + relative * (a > b ? a : b);
      const ratio = Math.abs(h * error) / scale;
      if (!(ratio <= worst)) worst = ratio;
    }
    const factor = worst > 0 ? 0.9 * worst ** -0.2 : 5;
    const change = Math.min(5, Math.max(0.2, factor));
    if (worst <= 1) {
      const next = last ? t1 : t + h;
      onStep(t, next);
      t = next;
      y.set(z);
      k1.set(k7);
      // A last step cut short by the end says little about what would have been possible.
      step = Math.max(last ? step : 0, h * change);
      if (last) return step;
      step = Math.min(step, options.longestStepS());
    } else step = h * change;
  }
  return step;
}

/** Weights of the fourth-order interpolant on the slopes of a step. */
const DENSE = [
  -12715105075 / 11282082432,
  0,
  87487479700 / 32700410799,
  -10690763975 / 1880347072,
  701980252875 / 199316789632,
  -1453857185 / 822651844,
  69997945 / 29380423,
] as const;

/**
 * Coefficients of the fourth-order interpolant of the step that a work space holds, five per entry.
 *
 * @param work work space just after an accepted step
 * @param h    length of the step [s]
 * @param out  written: five per entry, for `denseValue`
 * Source: hairer-norsett-wanner-1993, II.6 (continuous extension of the pair). Assumes: nothing
 * more. Accuracy: fourth order in the step.
 */
export function writeDense(work: RungeKuttaWork, h: number, out: Float64Array): void {
  const { before: y, after: z, slopes } = work;
  const [k1, , k3, k4, k5, k6, k7] = slopes;
  for (let i = 0, at = 0; at < out.length; i++, at += 5) {
    const start = y[i] ?? 0;
    const change = (z[i] ?? 0) - start;
    const bend = h * (k1[i] ?? 0) - change;
    out[at] = start;
    out[at + 1] = change;
    out[at + 2] = bend;
    out[at + 3] = change - h * (k7[i] ?? 0) - bend;
    out[at + 4] =
      h *
      (DENSE[0] * (k1[i] ?? 0) +
        DENSE[2] * (k3[i] ?? 0) +
        DENSE[3] * (k4[i] ?? 0) +
        DENSE[4] * (k5[i] ?? 0) +
        DENSE[5] * (k6[i] ?? 0) +
        DENSE[6] * (k7[i] ?? 0));
  }
}

/**
 * Entry of the interpolant at a share of the step [unit of the state].
 *
 *   y0 + s (r2 + (1 - s) (r3 + s (r4 + (1 - s) r5)))
 *
 * @param dense coefficients of `writeDense` [unit of the state]
 * @param entry entry of the state [-], from 0
 * @param share time since the start of the step over its length s [-]
 * @returns the entry [unit of the state]
 * Source: hairer-norsett-wanner-1993, II.6. Assumes: s from 0 to 1. Accuracy: as writeDense.
 */
export function denseValue(dense: Float64Array, entry: number, share: number): number {
  const at = 5 * entry;
  const rest = 1 - share;
  return (
    (dense[at] ?? 0) +
    share *
      ((dense[at + 1] ?? 0) +
        rest *
          ((dense[at + 2] ?? 0) + share * ((dense[at + 3] ?? 0) + rest * (dense[at + 4] ?? 0))))
  );
}

/**
 * Slope of the interpolant at a share of the step, times its length [unit of the state].
 *
 * @param dense coefficients of `writeDense` [unit of the state]
 * @param entry entry of the state [-], from 0
 * @param share time since the start of the step over its length [-]
 * @returns slope of the entry times the length of the step [unit of the state]
 * Source: hairer-norsett-wanner-1993, II.6. Assumes: share from 0 to 1. Accuracy: third order.
 */
export function denseSlope(dense: Float64Array, entry: number, share: number): number {
  const at = 5 * entry;
  const [r2, r3, r4, r5] = [
    dense[at + 1] ?? 0,
    dense[at + 2] ?? 0,
    dense[at + 3] ?? 0,
    dense[at + 4] ?? 0,
  ];
  const rest = 1 - share;
  return (
    r2 +
    (rest - share) * r3 +
    share * (2 * rest - share) * r4 +
    2 * share * rest * (rest - share) * r5
  );
}

/**
 * State at the end of a span, by the embedded Runge-Kutta pair 5(4) of Dormand and Prince [unit of
 * the state].
 *
 * @param f   derivative
 * @param y0  state at the start; left untouched
 * @param t0  start [s]
 * @param t1  end [s], not before the start
 * @param options tolerances and the longest step
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
): Float64Array {
  const work = rungeKuttaWork(y0.length);
  work.before.set(y0);
  const span = {
    relative: options.relative,
    absolute: new Float64Array(y0.length).fill(options.absolute),
    firstStepS: Math.min(options.maxStepS, (t1 - t0) / 10),
    longestStepS: () => options.maxStepS,
  };
  stepThrough(f, work, t0, t1, span, () => undefined);
  return work.before;
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
