import { NotComputable } from '../../errors.js';

/**
 * Solution of A x = b for several right-hand sides, by elimination with row pivoting [-].
 *
 * @param matrix row-major n by n; left untouched
 * @param right  row-major n by columns; left untouched
 * @param n      rows
 * @param columns right-hand sides
 * @returns row-major n by columns
 * @throws {NotComputable} when the matrix is singular
 * Source: golub-van-loan-2013, algorithm 3.4.1. Assumes: a well-conditioned matrix.
 * Accuracy: rounding times the condition number.
 */
export function linearSolution(
  matrix: Float64Array,
  right: Float64Array,
  n: number,
  columns: number,
): Float64Array {
  const a = Float64Array.from(matrix);
  const b = Float64Array.from(right);
  for (let k = 0; k < n; k++) {
    let pivot = k;
    for (let i = k + 1; i < n; i++) {
      if (Math.abs(a[i * n + k] ?? 0) > Math.abs(a[pivot * n + k] ?? 0)) pivot = i;
    }
    const head = a[pivot * n + k] ?? 0;
    if (head === 0 || !Number.isFinite(head)) {
      throw new NotComputable(
        'A set of balances has no single solution.',
        'Look for two descriptions of the same path, or a space that nothing connects.',
        [{ path: '', problem: 'singular matrix' }],
      );
    }
    if (pivot !== k) {
      swapRows(a, n, pivot, k);
      swapRows(b, columns, pivot, k);
    }
    for (let i = k + 1; i < n; i++) {
      const factor = (a[i * n + k] ?? 0) / head;
      if (factor === 0) continue;
      for (let j = k; j < n; j++) a[i * n + j] = (a[i * n + j] ?? 0) - factor * (a[k * n + j] ?? 0);
      for (let j = 0; j < columns; j++) {
        b[i * columns + j] = (b[i * columns + j] ?? 0) - factor * (b[k * columns + j] ?? 0);
      }
    }
  }
  for (let k = n - 1; k >= 0; k--) {
    const head = a[k * n + k] ?? 1;
    for (let j = 0; j < columns; j++) {
      let value = b[k * columns + j] ?? 0;
      for (let i = k + 1; i < n; i++) value -= (a[k * n + i] ?? 0) * (b[i * columns + j] ?? 0);
      b[k * columns + j] = value / head;
    }
  }
  return b;
}

function swapRows(m: Float64Array, width: number, i: number, k: number): void {
  for (let j = 0; j < width; j++) {
    const held = m[i * width + j] ?? 0;
    m[i * width + j] = m[k * width + j] ?? 0;
    m[k * width + j] = held;
  }
}
