import { NotComputable } from '../../errors.js';

const MAX_SQUARINGS = 60;
/** Norm up to which the series is summed directly. */
const SERIES_NORM = 0.5;

/** Product of two square row-major matrices [-]. */
export function matrixProduct(a: Float64Array, b: Float64Array, n: number): Float64Array {
  const c = new Float64Array(n * n);
  for (let i = 0; i < n; i++) {
    for (let k = 0; k < n; k++) {
      const aik = a[i * n + k] ?? 0;
      if (aik === 0) continue;
      for (let j = 0; j < n; j++) {
        c[i * n + j] = (c[i * n + j] ?? 0) + aik * (b[k * n + j] ?? 0);
      }
    }
  }
  return c;
}

/** What one exact step of dy/dt = A y + b needs: y(t) = propagator y(0) + integral b. */
export interface ExponentialStep {
  readonly propagator: Float64Array;
  readonly integral: Float64Array;
}

/**
 * Exponential of a square matrix times a time [-], and its integral over that time [s].
 *
 *   exp(A t) = e^(-m t) (sum_k ((A + m I) t/2^s)^k / k!)^(2^s),  m = largest -A_ii
 *   integral: sum_k (A t/2^s)^k t/2^s/(k + 1)!, doubled by I(2 h) = I(h) + exp(A h) I(h)
 *
 * The shift m makes every term of a compartment matrix (off-diagonals not below 0) not below 0, so
 * nothing cancels: the propagator has no negative entry and keeps the column sums to rounding.
 *
 * @param a row-major entries [1/s]
 * @param n rows
 * @param t time [s], 0 or more
 * @returns both matrices, row-major
 * @throws {NotComputable} when an entry is not finite, or the norm is beyond 1e17
 * Source: higham-2008, scaling and squaring. Assumes: nothing about A; positivity needs a
 * compartment matrix. Accuracy: rounding, about n 2^s 1e-16.
 */
export function exponentialStep(a: Float64Array, n: number, t: number): ExponentialStep {
  let shift = 0;
  for (let i = 0; i < n; i++) shift = Math.max(shift, -(a[i * n + i] ?? 0));
  let norm = 0;
  for (let j = 0; j < n; j++) {
    let column = 0;
    for (let i = 0; i < n; i++) column += Math.abs(a[i * n + j] ?? 0);
    norm = Math.max(norm, column + shift);
  }
  norm *= t;
  if (!Number.isFinite(norm)) throw notFinite();
  const squarings = norm > SERIES_NORM ? Math.ceil(Math.log2(norm / SERIES_NORM)) : 0;
  if (squarings > MAX_SQUARINGS) throw notFinite();
  const h = t / 2 ** squarings;
  const plain = new Float64Array(n * n);
  for (let i = 0; i < n * n; i++) plain[i] = (a[i] ?? 0) * h;
  const shifted = Float64Array.from(plain);
  for (let i = 0; i < n; i++) shifted[i * n + i] = (shifted[i * n + i] ?? 0) + shift * h;
  const terms = seriesTerms(norm / 2 ** squarings);
  // Horner form of both series: I + x/1 (I + x/2 (I + x/3 (...))).
  let propagator = identity(n);
  let integral = identity(n);
  for (let k = terms; k >= 1; k--) {
    propagator = identityPlus(matrixProduct(shifted, propagator, n), n, 1 / k);
    integral = identityPlus(matrixProduct(plain, integral, n), n, 1 / (k + 1));
  }
  const scale = Math.exp(-shift * h);
  for (let i = 0; i < n * n; i++) {
    propagator[i] = (propagator[i] ?? 0) * scale;
    integral[i] = (integral[i] ?? 0) * h;
  }
  for (let s = 0; s < squarings; s++) {
    const later = matrixProduct(propagator, integral, n);
    for (let i = 0; i < n * n; i++) integral[i] = (integral[i] ?? 0) + (later[i] ?? 0);
    propagator = matrixProduct(propagator, propagator, n);
  }
  return { propagator, integral };
}

/** Terms after which norm^k/k! is below rounding. */
function seriesTerms(norm: number): number {
  let term = 1;
  for (let k = 1; k < 20; k++) {
    term *= norm / k;
    if (term < 1e-18) return k;
  }
  return 20;
}

function identityPlus(m: Float64Array, n: number, factor: number): Float64Array {
  for (let i = 0; i < n * n; i++) m[i] = (m[i] ?? 0) * factor;
  for (let i = 0; i < n; i++) m[i * n + i] = (m[i * n + i] ?? 0) + 1;
  return m;
}

function identity(n: number): Float64Array {
  const m = new Float64Array(n * n);
  for (let i = 0; i < n; i++) m[i * n + i] = 1;
  return m;
}

function notFinite(): NotComputable {
  return new NotComputable(
    'The air balance has an entry too large to solve.',
    'Look for a flow that is out of all proportion to the volume of its space.',
    [{ path: '', problem: 'matrix exponential beyond its range' }],
  );
}
