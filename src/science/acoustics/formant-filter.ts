/** y[n] = A x[n] + B y[n-1] + C y[n-2]. */
export interface ResonatorCoefficients {
  readonly A: number;
  readonly B: number;
  readonly C: number;
}

/**
 * Coefficients of a digital formant resonator with unit gain at zero frequency [1].
 *
 *   C = -exp(-2 pi BW/fs);  B = 2 exp(-pi BW/fs) cos(2 pi F/fs);  A = 1 - B - C
 *
 * @param F  centre frequency [Hz]
 * @param BW  bandwidth [Hz]
 * @param fs  sampling rate [Hz]
 * @returns  coefficients [1]
 * Source: klatt-1980. Assumes: F below half the sampling rate. Accuracy: exact.
 * @example formantResonator(730, 60, 44100).B // 1.980708
 */
export function formantResonator(F: number, BW: number, fs: number): ResonatorCoefficients {
  const C = -Math.exp((-2 * Math.PI * BW) / fs);
  const B = 2 * Math.exp((-Math.PI * BW) / fs) * Math.cos((2 * Math.PI * F) / fs);
  return { A: 1 - B - C, B, C };
}

/**
 * A signal passed through one formant resonator [same as the signal].
 *
 * @param signal  samples [1]
 * @param coefficients  of `formantResonator` [1]
 * @returns  filtered samples [1]
 * Source: klatt-1980. Assumes: silence before the first sample. Accuracy: rounding.
 */
export function resonated(signal: Float64Array, { A, B, C }: ResonatorCoefficients): Float64Array {
  let before = 0;
  let last = 0;
  return signal.map((sample) => {
    const now = A * sample + B * last + C * before;
    before = last;
    last = now;
    return now;
  });
}
