/** Least-squares line y = a + b x with what is needed to judge it. */
export interface StraightLine {
  readonly intercept: number;
  readonly slope: number;
  readonly slopeStandardError: number;
  readonly rSquared: number;
  readonly residuals: readonly number[];
  /** Correlation of each residual with the one before [-]. */
  readonly serialCorrelation: number;
}

/**
 * Straight line through points by least squares [units of y].
 *
 *   b = Sxy/Sxx, se(b) = sqrt(sum r^2/(n - 2)/Sxx), r1 = sum r_i r_(i-1)/sum r_i^2
 *
 * @param x abscissae, at least three different ones
 * @param y ordinates, as many
 * @returns line, standard error of the slope, r squared, residuals, serial correlation
 * Source: astm-e741 (ordinary least squares). Assumes: independent errors of equal size.
 * Accuracy: rounding.
 */
export function straightLine(x: readonly number[], y: readonly number[]): StraightLine {
  const n = x.length;
  const meanX = x.reduce((sum, one) => sum + one, 0) / n;
  const meanY = y.reduce((sum, one) => sum + one, 0) / n;
  let sxx = 0;
  let sxy = 0;
  let syy = 0;
  for (const [i, xi] of x.entries()) {
    const dx = xi - meanX;
    const dy = (y[i] ?? 0) - meanY;
    sxx += dx * dx;
    sxy += dx * dy;
    syy += dy * dy;
  }
  const slope = sxy / sxx;
  const residuals = x.map((xi, i) => (y[i] ?? 0) - meanY - slope * (xi - meanX));
  const squares = residuals.reduce((sum, r) => sum + r * r, 0);
  const lagged = residuals.reduce(
    (sum, r, i) => (i > 0 ? sum + r * (residuals[i - 1] ?? 0) : 0),
    0,
  );
  return {
    intercept: meanY - slope * meanX,
    slope,
    slopeStandardError: Math.sqrt(squares / (n - 2) / sxx),
    rSquared: syy > 0 ? 1 - squares / syy : 1,
    residuals,
    serialCorrelation: squares > 0 ? lagged / squares : 0,
  };
}
