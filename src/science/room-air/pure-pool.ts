import type { AirModel } from './air-model.js';
import { layerLevel } from './volume-curve.js';
import { releasedVolume } from './release-flow.js';
import type { BoundRelease } from './zone-bound.js';

/**
 * Depth of all dense gas lying pure and undisturbed on the lowest floor of each space [m].
 *
 *   zeta from Vb(zeta) = Vg
 *
 * Every space that the gas can reach counts all of it. Shown, never judged.
 *
 * @param model    resolved input
 * @param releases all releases
 * @returns depth above the lowest floor, one per space [m]
 * Source: own-room-air (pure pool). Assumes: no mixing and no removal. Accuracy: a limiting case.
 */
export function purePoolDepths(
  model: AirModel,
  releases: readonly BoundRelease[],
): readonly number[] {
  const end = model.input.durationS;
  return model.spaces.map((space, i) => {
    const gas = releases.reduce(
      (sum, release) =>
        release.gathering !== 'above' && (release.reachS[i] ?? Infinity) <= end
          ? sum + releasedVolume(release.plan, end) * release.warmFactor
          : sum,
      0,
    );
    return gas > 0 ? layerLevel(space.curve, gas) : 0;
  });
}
