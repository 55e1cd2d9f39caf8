/**
 * Power passed from one gas to another at normal incidence [dB].
 *
 *   10 log10(4 Z1 Z2/(Z1 + Z2)^2), Z = rho c
 *
 * @param Z1  characteristic impedance of the first gas [Pa s/m]
 * @param Z2  characteristic impedance of the second gas [Pa s/m]
 * @returns  level change [dB], never positive
 * Source: driven-source-level. Assumes: plane waves, sharp boundary, no film. Accuracy: exact.
 * @example boundaryTransmission(167.629, 412.255) // -0.851
 */
export function boundaryTransmission(Z1: number, Z2: number): number {
  return 10 * Math.log10((4 * Z1 * Z2) / (Z1 + Z2) ** 2);
}

/**
 * Change of radiated power of a small vibrating source moved from air into a gas [dB].
 *
 *   monopole: 10 log10((rho/c)_gas/(rho/c)_air); dipole: the same with rho/c^3
 *
 * @param kind  monopole (breathing) or dipole (to and fro: bell, fork) [name]
 * @param gas  density [kg/m^3] and speed of sound [m/s] of the gas
 * @param air  density [kg/m^3] and speed of sound [m/s] of the air
 * @returns  level change [dB]
 * Source: driven-source-level. Assumes: same surface velocity and frequency, size small against
 * the wavelength. Accuracy: exact under these; says nothing about pipes, whose level is not predicted.
 * @example drivenSourceLevel('monopole', { rho: 0.166393, c: 1007.43 }, { rho: 1.19886, c: 343.871 }) // -13.24
 */
export function drivenSourceLevel(
  kind: 'monopole' | 'dipole',
  gas: { readonly rho: number; readonly c: number },
  air: { readonly rho: number; readonly c: number },
): number {
  const power = kind === 'monopole' ? 1 : 3;
  return 10 * Math.log10((gas.rho / air.rho) * (air.c / gas.c) ** power);
}

/**
 * Weighting A of a frequency [dB].
 *
 *   20 log10(12194^2 f^4/((f^2 + 20.6^2) sqrt((f^2 + 107.7^2)(f^2 + 737.9^2)) (f^2 + 12194^2))) + 2
 *
 * @param f  frequency [Hz], above 0
 * @returns  weighting [dB]
 * Source: a-weighting-iec-61672. Assumes: nothing more. Accuracy: 0.05 dB.
 * @example aWeighting(145) // -14.38
 */
export function aWeighting(f: number): number {
  const f2 = f * f;
  const gain =
    (12_194 ** 2 * f2 * f2) /
    ((f2 + 20.6 ** 2) * Math.sqrt((f2 + 107.7 ** 2) * (f2 + 737.9 ** 2)) * (f2 + 12_194 ** 2));
  return 20 * Math.log10(gain) + 2;
}
