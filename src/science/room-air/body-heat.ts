/** Reduced gravity below which body heat lifts a layer to the mouth [m/s2]: 3 % carbon dioxide. */
export const BODY_HEAT_GRAVITY = 0.153;
/** A layer shallower than this over the floor of a person lifts nothing to the mouth [m]. */
export const BODY_HEAT_DEPTH_M = 0.05;

/**
 * Whether a standing or sitting person breathes the layer whatever the mouth height.
 *
 *   g' < 0.153 m/s2 and the layer lies at least 5 cm deep over the own floor
 *
 * @param gPrime reduced gravity of the layer, air as reference [m/s2]
 * @param depthM depth of the layer over the floor of the person [m]
 * @returns true when the warm air round the body carries layer gas to the mouth
 * Source: engineering-judgement (rule on body heat). Assumes: a person at rest. Accuracy:
 * judgement.
 * @example liftsToMouth(0.1, 0.3) // true
 */
export function liftsToMouth(gPrime: number, depthM: number): boolean {
  return gPrime > 0 && gPrime < BODY_HEAT_GRAVITY && depthM >= BODY_HEAT_DEPTH_M;
}
