/** Reduced gravity below which body heat lifts a layer to the mouth [m/s2]: 3 % carbon dioxide. */
export const BODY_HEAT_GRAVITY = 0.153;

/** The warm air along a body gathers with height to this power while it is laminar [-]. */
const BOUNDARY_LAYER_POWER = 0.75;

/**
 * Share of what a person above a weak layer breathes that comes out of the layer [-].
 *
 *   (h/z)^(3/4) for g' < 0.153 m/s2, else 0; 1 once the layer reaches the mouth
 *
 * The warm air that rises along a body gathers from the floor up, as Q proportional to z^(3/4) in a
 * laminar boundary layer. What passes the mouth at z has gathered over the whole way, so the part out
 * of a layer of depth h is Q(h)/Q(z). Turbulent air (power 6/5) and a plume (5/3) give less.
 *
 * @param gPrime reduced gravity of the layer, air as reference [m/s2]
 * @param depthM depth of the layer over the floor of the person h [m]
 * @param mouthM mouth above that floor z [m], above 0
 * @returns share [-], 0 to 1
 * Source: squire-eckert-1951 (laminar free convection on a vertical wall). Assumes: a person at rest;
 * heat that a heavier layer would hold down lifts a weak one (threshold: engineering judgement).
 * Accuracy: errs high; walking mixes more air in.
 * @example bodyHeatShare(0.1, 0.17, 1.1) // 0.246485955
 */
export function bodyHeatShare(gPrime: number, depthM: number, mouthM: number): number {
  if (gPrime <= 0 || gPrime >= BODY_HEAT_GRAVITY || depthM <= 0) return 0;
  return Math.min(1, depthM / mouthM) ** BOUNDARY_LAYER_POWER;
}
