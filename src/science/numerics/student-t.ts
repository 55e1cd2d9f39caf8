import { bracketedRoot } from './root.js';

/** Natural logarithm of the gamma function [-], Lanczos series, for arguments above 0. */
function logGamma(x: number): number {
  const c = [
    76.18009172947146, -86.50532032941677, 24.01409824083091, -1.231739572450155,
    0.1208650973866179e-2, -0.5395239384953e-5,
  ];
  const t = x + 5.5;
  const series = c.reduce((sum, one, i) => sum + one / (x + 1 + i), 1.000000000190015);
  return (x + 0.5) * Math.log(t) - t + Math.log((2.5066282746310005 * series) / x);
}

/** Regularised incomplete beta function [-] by its continued fraction. */
function incompleteBeta(x: number, a: number, b: number): number {
  if (x <= 0) return 0;
  if (x >= 1) return 1;
  const front = Math.exp(
    logGamma(a + b) - logGamma(a) - logGamma(b) + a * Math.log(x) + b * Math.log(1 - x),
  );
  if (x > (a + 1) / (a + b + 2)) return 1 - incompleteBeta(1 - x, b, a);
  let c = 1;
  let d = 1 / (1 - ((a + b) * x) / (a + 1));
  let h = d;
  for (let m = 1; m < 300; m++) {
    const even = (m * (b - m) * x) / ((a + 2 * m - 1) * (a + 2 * m));
    d = 1 / (1 + even * d);
    c = 1 + even / c;
    h *= d * c;
    const odd = (-(a + m) * (a + b + m) * x) / ((a + 2 * m) * (a + 2 * m + 1));
    d = 1 / (1 + odd * d);
    c = 1 + odd / c;
    const change = d * c;
    h *= change;
    if (Math.abs(change - 1) < 1e-15) break;
  }
  return (front * h) / a;
}

/**
 * Quantile of Student's t [-].
 *
 *   t with probability P(T <= t) = p
 *
 * @param probability p [-], 0.5 to 0.9999
 * @param freedom     degrees of freedom [-], 1 or more
 * @returns quantile [-]
 * Source: abramowitz-stegun-1964, 26.5.8 and 26.7.1. Assumes: nothing. Accuracy: 1e-9.
 * @example studentQuantile(0.975, 11) // 2.2009851601
 */
export function studentQuantile(probability: number, freedom: number): number {
  const tail = (t: number): number =>
    0.5 * incompleteBeta(freedom / (freedom + t * t), freedom / 2, 0.5) - (1 - probability);
  return bracketedRoot(tail, 0, 1e4, 1e-11);
}
