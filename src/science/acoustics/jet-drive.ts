/** How a jet-driven pipe takes to its jet. */
export type JetRegime = 'mayNotSpeak' | 'speaks' | 'mayOverblow' | 'overblows';

/**
 * Speed of the jet from a flue [m/s].
 *
 *   V = sqrt(2 P/rho)
 *
 * @param P  blowing pressure above the room [Pa]
 * @param rho  density of the gas blown [kg/m^3]
 * @returns  speed [m/s]
 * Source: ising-1971. Assumes: no loss. Accuracy: an upper estimate.
 * @example jetSpeed(500, 1.19886) // 28.8812
 */
export function jetSpeed(P: number, rho: number): number {
  return Math.sqrt((2 * P) / rho);
}

/**
 * Intonation number of a flue pipe [1].
 *
 *   I = (V/f) sqrt(D/H^3)
 *
 * @param V  jet speed [m/s]
 * @param f  frequency the pipe is to speak at [Hz]
 * @param D  thickness of the flue [m]
 * @param H  cut-up [m]
 * @returns  intonation number [1]; best drive at 2, overblows near 3
 * Source: ising-1971. Assumes: a plane jet. Accuracy: not stated.
 * @example intonationNumber(28.8812, 315, 0.0006, 0.01) // 2.24585
 */
export function intonationNumber(V: number, f: number, D: number, H: number): number {
  return (V / f) * Math.sqrt(D / H ** 3);
}

/** Best drive of a well-voiced pipe; assumed where the jet is not described. */
export const bestIntonation = 2;

/**
 * How a pipe takes to its jet at a given intonation number [regime].
 *
 *   below 1 weak or silent; to 2.7 it speaks; to 3 it may overblow; from 3 it overblows
 *
 * @param I  intonation number [1]
 * @returns  the regime [regime]
 * Source: ising-1971. Assumes: the lower limit 1 and the step at 2.7 are project judgements.
 * Accuracy: a guide; every pipe is voiced its own way.
 * @example jetRegime(2) // 'speaks'
 */
export function jetRegime(I: number): JetRegime {
  if (I < 1) return 'mayNotSpeak';
  if (I < 2.7) return 'speaks';
  return I < 3 ? 'mayOverblow' : 'overblows';
}

/**
 * Volume of gas that the flue passes [m^3/s].
 *
 *   Q = W D V
 *
 * @param W  width of the flue [m]
 * @param D  thickness of the flue [m]
 * @param V  jet speed [m/s]
 * @returns  flow [m^3/s]
 * Source: ising-1971. Assumes: no contraction of the jet (0.6 to 1 in practice).
 * Accuracy: an upper estimate.
 * @example flueFlow(0.02, 0.0006, 77.5234) // 0.00093028
 */
export function flueFlow(W: number, D: number, V: number): number {
  return W * D * V;
}
