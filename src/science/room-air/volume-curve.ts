import type { AirPocket, AirSpace } from './air-input.js';

/** The net volume of one space by level; levels z in metres above its lowest floor. */
export interface VolumeCurve {
  readonly floorAreaM2: number;
  readonly heightM: number;
  /** Level of the lowest floor above the venue's datum. */
  readonly floorLevelM: number;
  readonly riseM: number;
  /** Floors by rising level above the lowest floor; one for a level or raked floor. */
  readonly floors: readonly { readonly areaM2: number; readonly levelM: number }[];
  readonly pockets: readonly AirPocket[];
  /** Net over gross volume, at most 1. */
  readonly freeShare: number;
  /** Net volume, pockets included. */
  readonly volumeM3: number;
}

/** Gross volume below a level, without pockets [m3]. */
function grossBelow(curve: Omit<VolumeCurve, 'freeShare' | 'volumeM3'>, z: number): number {
  const level = Math.min(Math.max(z, 0), curve.heightM);
  if (curve.riseM > 0) {
    return level <= curve.riseM
      ? (curve.floorAreaM2 * level * level) / (2 * curve.riseM)
      : curve.floorAreaM2 * (level - curve.riseM / 2);
  }
  return curve.floors.reduce(
    (sum, floor) => sum + floor.areaM2 * Math.max(0, level - floor.levelM),
    0,
  );
}

/**
 * Volume curve of a space [m3 against m].
 *
 * @param space floor area, height, rise or steps, pockets, measured free volume
 * @returns the curve; a measured volume scales it evenly, never upwards
 * Source: own-room-air (section on the volume curve: prism, rake, step). Assumes: vertical walls,
 * flat ceiling, furniture spread evenly. Accuracy: that of the dimensions.
 */
export function volumeCurve(space: AirSpace): VolumeCurve {
  const steps = [...(space.steps ?? [])].sort((a, b) => a.levelM - b.levelM);
  const lowest = steps[0]?.levelM ?? space.floorLevelM ?? 0;
  const pockets = space.pockets ?? [];
  const shape = {
    floorAreaM2: space.floorAreaM2,
    heightM: space.heightM,
    floorLevelM: lowest,
    riseM: steps.length > 0 ? 0 : (space.floorRiseM ?? 0),
    floors:
      steps.length > 0
        ? steps.map((step) => ({ areaM2: step.areaM2, levelM: step.levelM - lowest }))
        : [{ areaM2: space.floorAreaM2, levelM: 0 }],
    pockets,
  };
  const gross =
    grossBelow(shape, space.heightM) +
    pockets.reduce((sum, pocket) => sum + pocket.areaM2 * pocket.depthM, 0);
  const net = space.volumeM3 ?? gross;
  return { ...shape, freeShare: Math.min(1, net / gross), volumeM3: net };
}

/**
 * Net volume of a space below a level [m3].
 *
 *   prism A z; rake A z^2/(2 R) up to the rise R, A (z - R/2) above; steps sum of A_k (z - z_k)
 *
 * @param curve volume curve
 * @param z     level above the lowest floor [m]
 * @returns net volume below [m3], without pockets below the floor
 * Source: own-room-air. Assumes: as the curve. Accuracy: that of the dimensions.
 */
export function volumeBelow(curve: VolumeCurve, z: number): number {
  return curve.freeShare * grossBelow(curve, z);
}

/**
 * Net volume of a space above a level [m3], up to its highest pocket.
 *
 * @param curve volume curve
 * @param z     level above the lowest floor [m]
 * @returns net volume above [m3]; high pockets count with the part above z
 * Source: own-room-air. Assumes: as the curve. Accuracy: that of the dimensions.
 */
export function volumeAbove(curve: VolumeCurve, z: number): number {
  const room = grossBelow(curve, curve.heightM) - grossBelow(curve, z);
  const pockets = curve.pockets
    .filter((pocket) => pocket.at === 'high')
    .reduce(
      (sum, pocket) =>
        sum +
        pocket.areaM2 * Math.min(pocket.depthM, Math.max(0, curve.heightM + pocket.depthM - z)),
      0,
    );
  return curve.freeShare * (room + pockets);
}

/**
 * Level reached by a volume lying on the lowest floor [m above the lowest floor].
 *
 *   inverse of the volume below
 *
 * @param curve   volume curve
 * @param volumeM3 volume that lies there [m3], 0 or more
 * @returns level [m], at most the ceiling
 * Source: own-room-air. Assumes: as the curve. Accuracy: that of the dimensions.
 */
export function layerLevel(curve: VolumeCurve, volumeM3: number): number {
  const volume = volumeM3 / curve.freeShare;
  if (volume >= grossBelow(curve, curve.heightM)) return curve.heightM;
  if (curve.riseM > 0) {
    const inRake = Math.sqrt((2 * curve.riseM * volume) / curve.floorAreaM2);
    return inRake <= curve.riseM ? inRake : volume / curve.floorAreaM2 + curve.riseM / 2;
  }
  let area = 0;
  let moment = 0;
  let level = 0;
  for (const [index, floor] of curve.floors.entries()) {
    area += floor.areaM2;
    moment += floor.areaM2 * floor.levelM;
    level = (volume + moment) / area;
    const next = curve.floors[index + 1];
    if (!next || level <= next.levelM) return level;
  }
  return level;
}

/**
 * Plan area at a level [m2], the slope of the volume below.
 *
 * @param curve volume curve
 * @param z     level above the lowest floor [m]
 * @returns net plan area [m2]
 * Source: own-room-air. Assumes: as the curve. Accuracy: that of the dimensions.
 */
export function planArea(curve: VolumeCurve, z: number): number {
  if (curve.riseM > 0) {
    return curve.freeShare * curve.floorAreaM2 * Math.min(1, Math.max(0, z) / curve.riseM);
  }
  return (
    curve.freeShare *
    curve.floors.reduce((sum, floor) => sum + (z >= floor.levelM ? floor.areaM2 : 0), 0)
  );
}

/**
 * Net volume of a mouth's own basin below the mouth [m3]: the figure that the bound divides by.
 *
 * The own floor alone always holds less than the same with lower basins added, so it gives the
 * larger fraction; a kerb, a cover or a slow drain may keep gas there.
 *
 * @param curve       volume curve of the space
 * @param floorLevelM floor under the person, above the datum [m]
 * @param heightM     mouth above that floor [m]
 * @returns net volume [m3]
 * Source: own-room-air (which basins count). Assumes: as the curve. Accuracy: that of the
 * dimensions.
 */
export function ownVolumeBelow(curve: VolumeCurve, floorLevelM: number, heightM: number): number {
  const floor = floorLevelM - curve.floorLevelM;
  const lowPocket = curve.pockets.find(
    (pocket) => pocket.at === 'low' && floor < -1e-6 && floor + pocket.depthM > -1e-6,
  );
  if (lowPocket) return curve.freeShare * lowPocket.areaM2 * Math.min(heightM, lowPocket.depthM);
  if (curve.riseM > 0) return volumeBelow(curve, floor + heightM);
  const own = curve.floors.filter((step) => Math.abs(step.levelM - floor) < 0.05);
  const area = own.reduce((sum, step) => sum + step.areaM2, 0);
  // A floor that is none of the steps (a platform): the steps below it, up to the mouth.
  if (area === 0) return volumeBelow(curve, floor + heightM);
  const next = curve.floors.find((step) => step.levelM > floor + 0.05);
  const alone = area * heightM;
  // In a pit the mouth above the rim still counts its own floor alone.
  return curve.freeShare * (next ? alone : Math.min(alone, area * curve.heightM));
}

/**
 * Net volume of a mouth's own basin above the mouth [m3]: the mirrored figure for light gas.
 *
 * @param curve       volume curve of the space
 * @param floorLevelM floor under the person, above the datum [m]
 * @param heightM     mouth above that floor [m]
 * @returns net volume [m3]; inside a high pocket that pocket alone
 * Source: own-room-air. Assumes: as the curve. Accuracy: that of the dimensions.
 */
export function ownVolumeAbove(curve: VolumeCurve, floorLevelM: number, heightM: number): number {
  const z = floorLevelM - curve.floorLevelM + heightM;
  const pocket = curve.pockets.find((one) => one.at === 'high' && z > curve.heightM);
  if (pocket) {
    return curve.freeShare * pocket.areaM2 * Math.max(0, curve.heightM + pocket.depthM - z);
  }
  return volumeAbove(curve, z);
}
