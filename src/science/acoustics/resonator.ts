import { bracketedRoot } from '../numerics/root.js';

/** A cylindrical column: its body and the corrections of its open ends. */
export interface Column {
  readonly lengthM: number;
  /** One entry for each open end; two make an open pipe, one a stopped pipe. */
  readonly endCorrectionsM: readonly number[];
}

/** A bottle: volume and neck, with the corrections of the neck's inner and outer end. */
export interface Bottle {
  readonly volumeM3: number;
  readonly neckLengthM: number;
  readonly neckRadiusM: number;
  readonly innerCorrectionM: number;
  readonly outerCorrectionM: number;
}

/**
 * Resonance of a column wholly inside its gas [Hz].
 *
 *   both ends open: f_n = n c/(2 (L + d1 + d2)); one end: f_n = (2n - 1) c/(4 (L + d))
 *
 * @param column  length and end corrections [m]
 * @param c  speed of sound [m/s]
 * @param n  which resonance, from 1 [1]
 * @returns  frequency [Hz]
 * Source: levine-schwinger-1948. Assumes: k a below about 0.3, no wall friction.
 * Accuracy: that of the end corrections.
 * @example columnResonance({ lengthM: 0.5, endCorrectionsM: [0.0091995, 0.0091995] }, 343.871, 1) // 331.666
 * @example columnResonance({ lengthM: 0.25, endCorrectionsM: [0.0091995] }, 135.177, 2) // 391.138
 */
export function columnResonance(column: Column, c: number, n: number): number {
  const ends = column.endCorrectionsM;
  const effective = column.lengthM + ends.reduce((sum, d) => sum + d, 0);
  return ends.length === 2 ? (n * c) / (2 * effective) : ((2 * n - 1) * c) / (4 * effective);
}

/**
 * First resonance of a column of one gas whose open ends see another [Hz].
 *
 *   k L + sum of atan(k d_i rho_out/rho_in) = pi (two open ends) or pi/2 (one), k = 2 pi f/c_in
 *
 * The moving mass beyond an end is outside gas; its weight shortens or lengthens the correction.
 *
 * @param column  length and end corrections [m]
 * @param c  speed of sound inside [m/s]
 * @param densityRatio  outside over inside density [1]
 * @returns  frequency [Hz]
 * Source: outside-gas-mass. Assumes: a sharp boundary in the plane of the ends.
 * Accuracy: a bound: gas blown out of the ends moves the truth towards the immersed value.
 * @example filledColumnResonance({ lengthM: 0.5, endCorrectionsM: [0.0091995, 0.0091995] }, 1007.43, 7.205) // 802.1
 */
export function filledColumnResonance(column: Column, c: number, densityRatio: number): number {
  const { lengthM, endCorrectionsM } = column;
  const target = endCorrectionsM.length === 2 ? Math.PI : Math.PI / 2;
  const phase = (k: number) =>
    endCorrectionsM.reduce((sum, d) => sum + Math.atan(k * d * densityRatio), k * lengthM) - target;
  const highest = target / lengthM;
  const k = bracketedRoot(phase, 0, highest, 1e-13 * highest);
  return (k * c) / (2 * Math.PI);
}

/**
 * Resonance of a Helmholtz resonator, the outer end of its neck in another gas or not [Hz].
 *
 *   f = (c/2 pi) sqrt(S/(V (l + d_in + d_out rho_out/rho_in))), S = pi r^2
 *
 * @param bottle  volume [m^3], neck length, radius and corrections [m]
 * @param c  speed of sound inside [m/s]
 * @param densityRatio  outside over inside density [1]; 1 when wholly immersed
 * @returns  frequency [Hz]
 * Source: helmholtz-resonator. Assumes: every size small against the wavelength.
 * Accuracy: a few percent for real bottles, whose shoulders are not flat.
 * @example bottleResonance({ volumeM3: 0.00075, neckLengthM: 0.07, neckRadiusM: 0.0095, innerCorrectionM: 0.0078052, outerCorrectionM: 0.00582635 }, 343.87, 1) // 116.358
 */
export function bottleResonance(bottle: Bottle, c: number, densityRatio: number): number {
  const neck =
    bottle.neckLengthM + bottle.innerCorrectionM + bottle.outerCorrectionM * densityRatio;
  const area = Math.PI * bottle.neckRadiusM ** 2;
  return (c / (2 * Math.PI)) * Math.sqrt(area / (bottle.volumeM3 * neck));
}
