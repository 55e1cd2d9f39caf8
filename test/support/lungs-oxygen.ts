/*
 * Lung and blood oxygen, for checking published cases only. The product shows none of this: it
 * refuses what may not be breathed and gives no times, counts or saturations.
 */

/** Partial pressures in mmHg throughout, as in the sources. */
export const waterVapourMmHg = 47;

/** Standard atmosphere below 11 km [mmHg]. */
export function barometricMmHg(altitudeM: number): number {
  return 760 * (1 - 2.25577e-5 * altitudeM) ** 5.25588;
}

export function inspiredOxygenMmHg(fraction: number, barometric: number): number {
  return fraction * (barometric - waterVapourMmHg);
}

/** Full alveolar gas equation. */
export function alveolarOxygenMmHg(
  fraction: number,
  barometric: number,
  carbonDioxideMmHg: number,
  respiratoryQuotient: number,
): number {
  return (
    inspiredOxygenMmHg(fraction, barometric) -
    carbonDioxideMmHg * (fraction + (1 - fraction) / respiratoryQuotient)
  );
}

/** Severinghaus 1979, equation 1 [%]. */
export function saturationPercent(oxygenMmHg: number): number {
  return 100 / (23_400 / (oxygenMmHg ** 3 + 150 * oxygenMmHg) + 1);
}

/** Share of the old lung gas left after one breath into a well-mixed lung [1]. */
export function washout(restL: number, deadSpaceL: number, inspiredL: number): number {
  return (restL + deadSpaceL) / (restL + inspiredL);
}

/** Oxygen uptake from standard conditions to those in the body [L/min]. */
export function uptakeInBody(standardLPerMin: number, barometric: number): number {
  return standardLPerMin * (760 / (barometric - waterVapourMmHg)) * (310.15 / 273.15);
}
