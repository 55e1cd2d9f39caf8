import { NotComputable } from '../../errors.js';
import type { AcceptedStep, Derivative, RungeKuttaOptions } from './runge-kutta.js';

const GAMMA = 0.435866521508459;
/** Stage arguments, rows of alpha. */
const ALPHA = [
  [],
  [0.871733043016918],
  [0.844570600153694, -0.112990642364842],
  [0, 0, 1],
] as const;
/** Off-diagonal rows of gamma. */
const COUPLING = [
  [],
  [-0.871733043016918],
  [-0.903380570130441, 0.0541806723880953],
  [0.242123807060954, -1.22325058390451, 0.545260255335102],
] as const;
const WEIGHTS = [0.242123807060954, -1.22325058390451, 1.5452602553351, 0.435866521508459] as const;
const EMBEDDED = [0.378109031458194, -0.0960422922124232, 0.5, 0.21793326075423] as const;
const TIMES = [0, 0.871733043016918, 0.731579957788852, 1] as const;

const MAX_STEPS = 40_000;
/** First step tried [s]: a layer may be born at the start of the span. */
const FIRST_STEP_S = 1e-3;
/** Accepted steps after which the slopes matrix is taken afresh. */
const MATRIX_LIFE = 12;
/** A step shorter than this meets something fast: the matrix is then taken afresh every step [s]. */
const SHORT_STEP_S = 1;

/**
 * State at the end of a span of a stiff balance, by a linearly implicit method of order 3 [unit of
 * the state].
 *
 *   (I - h gamma J) k_i = h f(y + sum alpha_ij k_j) + h J sum gamma_ij k_j
 *
 * The matrix J need not be exact, so it is kept over several steps.
 *
 * @param f   derivative
 * @param y0  state at the start; left untouched
 * @param t0  start [s]
 * @param t1  end [s], not before the start
 * @param options tolerances and the longest step
 * @param onStep called after each accepted step; a state it returns takes the place of the new one
 * @returns state at t1
 * @throws {NotComputable} when the step shrinks to nothing
 * Source: rang-angermann-2005, method ROS34PW2. Assumes: a smooth derivative inside the span.
 * Accuracy: local error per step within the tolerances.
 */
export function stiffState(
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
  const k = Array.from({ length: 4 }, () => new Float64Array(n));
  const stage = (i: number): Float64Array => k[i] as unknown as Float64Array;
  const jacobian = new Float64Array(n * n);
  const factors = new Float64Array(n * n);
  const pivots = new Int32Array(n);
  const trial = new Float64Array(n);
  const sum = new Float64Array(n);
  let slope = new Float64Array(n);
  let t = t0;
  let step = Math.min(options.maxStepS, (t1 - t0) / 100, FIRST_STEP_S);
  let factored = 0;
  let age = Infinity;
  f(t, y, slope);
  for (let count = 0; t < t1; count++) {
    if (count > MAX_STEPS || step < 1e-13 * Math.max(1, Math.abs(t))) {
      throw new NotComputable(
        'The time integration did not get through.',
        'Shorten the span or look for a flow that is out of proportion.',
        [{ path: '', problem: `stopped at ${String(t)} s` }],
      );
    }
    const last = t + step * (1 + 1e-9) >= t1;
    const h = last ? t1 - t : step;
    if (age >= (h < SHORT_STEP_S ? 1 : MATRIX_LIFE)) {
      writeJacobian(f, t, y, slope, jacobian, options.absolute, trial, sum);
      age = 0;
      factored = 0;
    }
    if (factored !== h) {
      for (let i = 0; i < n * n; i++) factors[i] = -h * GAMMA * (jacobian[i] ?? 0);
      for (let i = 0; i < n; i++) factors[i * n + i] = (factors[i * n + i] ?? 0) + 1;
      factorise(factors, pivots, n);
      factored = h;
    }
    for (let s = 0; s < 4; s++) {
      const own = stage(s);
      const arguments_ = ALPHA[s] ?? [];
      const coupling = COUPLING[s] ?? [];
      if (s === 0) own.set(slope);
      else {
        trial.set(y);
        for (let j = 0; j < s; j++) addScaled(trial, stage(j), arguments_[j] ?? 0);
        f(t + (TIMES[s] ?? 0) * h, trial, own);
      }
      sum.fill(0);
      for (let j = 0; j < s; j++) addScaled(sum, stage(j), coupling[j] ?? 0);
      for (let i = 0; i < n; i++) {
        let value = own[i] ?? 0;
        if (s > 0) for (let j = 0; j < n; j++) value += (jacobian[i * n + j] ?? 0) * (sum[j] ?? 0);
        trial[i] = h * value;
      }
      solveFactored(factors, pivots, trial, n);
      own.set(trial);
    }
    let worst = 0;
    const next = Float64Array.from(y);
    for (let s = 0; s < 4; s++) addScaled(next, stage(s), WEIGHTS[s] ?? 0);
    for (let i = 0; i < n; i++) {
      let error = 0;
      for (let s = 0; s < 4; s++) {
        error += ((WEIGHTS[s] ?? 0) - (EMBEDDED[s] ?? 0)) * (stage(s)[i] ?? 0);
      }
      const scale =
        options.absolute + options.relative * Math.max(Math.abs(y[i] ?? 0), Math.abs(next[i] ?? 0));
      worst = Math.max(worst, Math.abs(error) / scale);
    }
    if (!Number.isFinite(worst)) worst = 1e6;
    const factor = Math.min(4, Math.max(0.2, 0.9 * Math.max(worst, 1e-9) ** (-1 / 3)));
    if (worst <= 1) {
      const end = last ? t1 : t + h;
      const ending = new Float64Array(n);
      f(end, next, ending);
      const replaced = onStep?.({ t0: t, t1: end, y0: y, y1: next, f0: slope, f1: ending });
      t = end;
      slope = ending;
      y = next;
      age++;
      if (replaced) {
        y = Float64Array.from(replaced);
        slope = new Float64Array(n);
        f(t, y, slope);
        age = Infinity;
      }
      // A step that barely changes keeps its factors.
      if (!last) step = Math.min(options.maxStepS, factor > 1.3 || factor < 1 ? h * factor : h);
    } else {
      step = h * Math.min(0.7, factor);
      if (age > 0) age = Infinity;
    }
  }
  return y;
}

function addScaled(to: Float64Array, from: Float64Array, factor: number): void {
  if (factor === 0) return;
  for (let i = 0; i < to.length; i++) to[i] = (to[i] ?? 0) + factor * (from[i] ?? 0);
}

/** Forward differences, column by column. */
function writeJacobian(
  f: Derivative,
  t: number,
  y: Float64Array,
  slope: Float64Array,
  out: Float64Array,
  absolute: number,
  moved: Float64Array,
  shifted: Float64Array,
): void {
  const n = y.length;
  for (let j = 0; j < n; j++) {
    const value = y[j] ?? 0;
    const change = Math.max(1e-7 * Math.abs(value), 1e-2 * absolute);
    moved.set(y);
    moved[j] = value + change;
    f(t, moved, shifted);
    for (let i = 0; i < n; i++) out[i * n + j] = ((shifted[i] ?? 0) - (slope[i] ?? 0)) / change;
  }
}

/** Triangular factors in place, with row exchange. */
function factorise(a: Float64Array, pivots: Int32Array, n: number): void {
  for (let c = 0; c < n; c++) {
    let best = c;
    for (let i = c + 1; i < n; i++) {
      if (Math.abs(a[i * n + c] ?? 0) > Math.abs(a[best * n + c] ?? 0)) best = i;
    }
    pivots[c] = best;
    if (best !== c) {
      for (let j = 0; j < n; j++) {
        const held = a[c * n + j] ?? 0;
        a[c * n + j] = a[best * n + j] ?? 0;
        a[best * n + j] = held;
      }
    }
    const head = a[c * n + c] ?? 1;
    for (let i = c + 1; i < n; i++) {
      const value = a[i * n + c] ?? 0;
      if (value === 0) continue;
      const factor = value / head;
      a[i * n + c] = factor;
      for (let j = c + 1; j < n; j++)
        a[i * n + j] = (a[i * n + j] ?? 0) - factor * (a[c * n + j] ?? 0);
    }
  }
}

function solveFactored(a: Float64Array, pivots: Int32Array, b: Float64Array, n: number): void {
  for (let c = 0; c < n; c++) {
    const best = pivots[c] ?? c;
    if (best !== c) {
      const held = b[c] ?? 0;
      b[c] = b[best] ?? 0;
      b[best] = held;
    }
  }
  for (let i = 1; i < n; i++) {
    let value = b[i] ?? 0;
    for (let j = 0; j < i; j++) value -= (a[i * n + j] ?? 0) * (b[j] ?? 0);
    b[i] = value;
  }
  for (let i = n - 1; i >= 0; i--) {
    let value = b[i] ?? 0;
    for (let j = i + 1; j < n; j++) value -= (a[i * n + j] ?? 0) * (b[j] ?? 0);
    b[i] = value / (a[i * n + i] ?? 1);
  }
}
