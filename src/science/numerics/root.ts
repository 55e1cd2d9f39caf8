import { NotComputable } from '../../errors.js';

/**
 * Root of a function between two points where its sign differs [unit of the argument].
 *
 *   regula falsi with the Illinois step, falling back to halving
 *
 * @param f    continuous function
 * @param low  one end [unit of the argument]
 * @param high other end [unit of the argument]
 * @param tolerance widest bracket left [unit of the argument]
 * @returns an argument within the tolerance of a sign change
 * @throws {NotComputable} when both ends have the same sign
 * Source: dahlquist-bjorck-1974, section 6.4. Assumes: one sign change matters.
 * Accuracy: the tolerance given.
 */
export function bracketedRoot(
  f: (argument: number) => number,
  low: number,
  high: number,
  tolerance: number,
): number {
  let a = low;
  let b = high;
  let fa = f(a);
  let fb = f(b);
  if (fa === 0) return a;
  if (fb === 0) return b;
  if (fa > 0 === fb > 0) {
    throw new NotComputable(
      'No crossing lies between the two ends.',
      'Widen the span that is searched.',
      [{ path: '', problem: `same sign at ${String(low)} and ${String(high)}` }],
    );
  }
  for (let i = 0; i < 200 && Math.abs(b - a) > tolerance; i++) {
    // Every third step halves, so the bracket shrinks whatever the shape.
    const c = i % 3 === 2 ? (a + b) / 2 : b - (fb * (b - a)) / (fb - fa);
    const fc = f(c);
    if (fc === 0) return c;
    if (fc > 0 === fb > 0) fa /= 2;
    else {
      a = b;
      fa = fb;
    }
    b = c;
    fb = fc;
  }
  return b;
}
