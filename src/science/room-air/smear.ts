/** A layer thinner than this is not reported [m]. */
export const LEAST_REPORTED_M = 0.002;
/** Least smear above a layer [m]. */
export const LEAST_SMEAR_M = 0.3;

/**
 * Height above a layer within which a mouth still counts as inside it [m].
 *
 *   s = max(s0, sqrt(pi D t), depth while the first pass lasts)
 *
 * @param diffusivityM2PerS D [m2/s]
 * @param t        time since the release began [s]
 * @param leastM   least smear s0 [m], default 0.3
 * @param firstPassDepthM layer depth while the first pass lasts [m], default 0
 * @returns height [m]
 * Source: engineering-judgement (0.3 m; a thick interface agrees best with 34 draining tests).
 * Assumes: diffusion as the least mixing. Accuracy: judgement.
 * @example smearHeight(1.6e-5, 10000) // 0.70898154
 */
export function smearHeight(
  diffusivityM2PerS: number,
  t: number,
  leastM: number = LEAST_SMEAR_M,
  firstPassDepthM = 0,
): number {
  return Math.max(leastM, Math.sqrt(Math.PI * diffusivityM2PerS * Math.max(0, t)), firstPassDepthM);
}

/**
 * Gas fraction reported at a mouth from a two-layer answer [-].
 *
 *   max(xu, min(xl, bound)) where depth + smear reaches the mouth, else xu
 *
 * @param layerFraction fraction in the layer xl [-]
 * @param upperFraction fraction above it xu [-]
 * @param bound   inventory bound at the mouth [-]; 1 while the first pass lasts
 * @param depthM  layer depth at that place [m]
 * @param smearM  smear height [m]
 * @param mouthM  mouth above the floor [m]
 * @returns fraction [-]
 * Source: own-room-air (reporting at breathing height). Assumes: a level layer. Accuracy: judgement.
 */
export function reportedFraction(
  layerFraction: number,
  upperFraction: number,
  bound: number,
  depthM: number,
  smearM: number,
  mouthM: number,
): number {
  if (depthM + smearM < mouthM) return upperFraction;
  return Math.max(upperFraction, Math.min(layerFraction, bound));
}
