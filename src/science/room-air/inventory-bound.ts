/** Depth over which a gas that is neither clearly heavy nor light is gathered [m]. */
export const SLAB_DEPTH_M = 0.3;
/** Density ratios to air between which a gas counts as neither heavy nor light [-]. */
export const NEUTRAL_DENSITY_RATIO = { min: 0.95, max: 1.05 } as const;
/** Head of a spreading current over its mean depth [-]. */
const HEAD_FACTOR = 2;

/**
 * Largest gas fraction at a mouth whatever the mixing [-].
 *
 *   x <= min(1, Vg/Vb); light gas Vg/Va; gas in a pocket Vg/V_pocket
 *
 * @param gasM3    gas released so far into all connected space, nothing taken off [m3]
 * @param volumeM3 net volume between the floor (light gas: ceiling) and the mouth [m3]
 * @returns fraction [-], 1 where there is no volume
 * Source: own-room-air (x(z) V_below(z) is at most the gas, for a profile that does not increase
 * away from the floor). Assumes: level, stably ordered, horizontally uniform layer over the true
 * floor curve. Accuracy: a bound, exact for a layer that just reaches the mouth.
 * @example inventoryBound(3.28, 22) // 0.14909091
 */
export function inventoryBound(gasM3: number, volumeM3: number): number {
  if (gasM3 <= 0) return 0;
  return volumeM3 <= gasM3 ? 1 : gasM3 / volumeM3;
}

/**
 * Largest gas fraction at any height of a gas near the density of air [-].
 *
 *   x <= min(1, Vg/(0.3 m x A))
 *
 * @param gasM3  gas released so far [m3]
 * @param areaM2 plan area A [m2]
 * @returns fraction [-]
 * Source: engineering-judgement (slab rule). Assumes: a slab 0.3 m deep at the mouth.
 * Accuracy: judgement.
 * @example slabBound(3, 96) // 0.10416667
 */
export function slabBound(gasM3: number, areaM2: number): number {
  return inventoryBound(gasM3, SLAB_DEPTH_M * areaM2);
}

/**
 * Largest gas fraction at a mouth while a dense current first crosses the floor [-].
 *
 *   x <= min(1, 2 Vg(t)/(A_cov(t) z))
 *
 * @param gasM3     gas released so far [m3]
 * @param coveredM2 floor covered so far [m2]
 * @param heightM   mouth above the floor [m]
 * @returns fraction [-]
 * Source: engineering-judgement (factor 2 for the deep head). Assumes: box-model spread.
 * Accuracy: judgement.
 * @example firstPassBound(0.1, 8.7170264, 0.2) // 0.11471802
 */
export function firstPassBound(gasM3: number, coveredM2: number, heightM: number): number {
  return inventoryBound(HEAD_FACTOR * gasM3, coveredM2 * heightM);
}

/** Where a released gas gathers. */
export type Gathering = 'below' | 'above' | 'slab';

/**
 * Where a gas gathers, from its density over that of air on its way from the source to the room.
 *
 *   below if every stage is above 1.05, above if every stage is below 0.95, else slab
 *
 * @param stages density ratios to room air [-], from the source to room temperature, water vapour
 *   included; at least one
 * @returns below, above or slab; neutral at any stage between them is a slab, which no height
 *   escapes
 * Source: engineering-judgement (slab rule). Assumes: the ratio moves evenly between the stages.
 * Accuracy: judgement.
 * @example gatheringOf([3.67, 0.967]) // 'slab'
 */
export function gatheringOf(stages: readonly number[]): Gathering {
  if (Math.min(...stages) > NEUTRAL_DENSITY_RATIO.max) return 'below';
  if (Math.max(...stages) < NEUTRAL_DENSITY_RATIO.min) return 'above';
  return 'slab';
}
