import type { VolumeCurve } from './volume-curve.js';

/** Which way a layer lies: on the floor, or mirrored under the ceiling. */
export type LayerSide = 'floor' | 'ceiling';

/** Volume curve of one basin, counted from its own base. */
export interface Basin {
  readonly riseM: number;
  readonly areaM2: number;
  /** Further areas that join at levels above the base, rising. */
  readonly steps: readonly { readonly areaM2: number; readonly levelM: number }[];
}

/** The basin on the floor or under the ceiling of a space; areas are net. */
export function basinOf(curve: VolumeCurve, side: LayerSide, scale: number): Basin {
  const share = curve.freeShare * scale;
  if (side === 'ceiling') {
    return { riseM: 0, areaM2: curve.floorAreaM2 * share, steps: [] };
  }
  const [lowest, ...higher] = curve.floors;
  return {
    riseM: curve.riseM,
    areaM2: (curve.riseM > 0 ? curve.floorAreaM2 : (lowest?.areaM2 ?? 0)) * share,
    steps: higher.map((step) => ({ areaM2: step.areaM2 * share, levelM: step.levelM })),
  };
}

/**
 * Level of a volume above the base of its basin [m].
 *
 *   rake of rise r: sqrt(2 r V/A) up to r, then V/A + r/2; else V = sum of A_i (level - level_i)
 *
 * @param basin    basin on the floor or under the ceiling
 * @param volumeM3 volume that lies in it [m3], 0 or more
 * @returns level [m], 0 or more; it may pass the rim of an open pit
 * Source: own-room-air (geometry of the basin). Assumes: level surface, areas net. Accuracy: exact.
 * @example basinLevel({ riseM: 0, areaM2: 2, steps: [{ areaM2: 8, levelM: 0.5 }] }, 6) // 1
 */
export function basinLevel(basin: Basin, volumeM3: number): number {
  if (volumeM3 <= 0) return 0;
  if (basin.riseM > 0) {
    const level = Math.sqrt((2 * basin.riseM * volumeM3) / basin.areaM2);
    return level <= basin.riseM ? level : volumeM3 / basin.areaM2 + basin.riseM / 2;
  }
  let area = basin.areaM2;
  let moment = 0;
  let level = volumeM3 / area;
  for (const step of basin.steps) {
    if (level <= step.levelM) return level;
    area += step.areaM2;
    moment += step.areaM2 * step.levelM;
    level = (volumeM3 + moment) / area;
  }
  return level;
}

/**
 * Plan area of a basin at a level [m2].
 *
 *   rake of rise r: A min(1, level/r); else the sum of the areas that lie below the level
 *
 * @param basin  basin on the floor or under the ceiling
 * @param levelM level above its base [m], 0 or more
 * @returns area [m2]
 * Source: own-room-air (geometry of the basin). Assumes: level surface, areas net. Accuracy: exact.
 * @example basinArea({ riseM: 2, areaM2: 100, steps: [] }, 0.5) // 25
 */
export function basinArea(basin: Basin, levelM: number): number {
  if (basin.riseM > 0) return basin.areaM2 * Math.min(1, levelM / basin.riseM);
  let area = basin.areaM2;
  for (const step of basin.steps) if (levelM > step.levelM) area += step.areaM2;
  return area;
}
