import type { AirGasTable } from '../../src/science/room-air/air-gases.js';
import type { AirInput } from '../../src/science/room-air/air-input.js';
import { FALLEN_HEIGHT_M } from '../../src/science/room-air/air-constants.js';
import { bandQuestion } from '../../src/science/room-air/air-band.js';
import { flowSegments } from '../../src/science/room-air/air-flows.js';
import { airModel } from '../../src/science/room-air/air-model.js';
import {
  layeredDraws,
  type DrawnMouth,
  type DrawnValues,
} from '../../src/science/room-air/layered-draws.js';
import { layeredBand, type Bands } from '../../src/science/room-air/layered-band.js';
import { mixedTrack } from '../../src/science/room-air/mixed-track.js';
import { spaceTrack } from '../../src/science/room-air/mixed-values.js';
import { uncertaintyDraws, type Draw } from '../../src/science/room-air/sampled-input.js';
import { boundMouth, boundReleases, boundTrack } from '../../src/science/room-air/zone-bound.js';

/** The band of a day: its draws, and where and when they are read. */
export interface SampledDay {
  readonly input: AirInput;
  readonly gases: AirGasTable;
  readonly gasIds: readonly string[];
  readonly draws: readonly Draw[];
  readonly mouths: readonly DrawnMouth[];
  readonly timesS: readonly number[];
}

/** A day made ready to be drawn; its draws may be shared out. */
export function sampledDay(input: AirInput, gases: AirGasTable, samples: number): SampledDay {
  const uncertainty = { samples, seed: 20261201 };
  const model = airModel(input, gases);
  const releases = boundReleases(model);
  const count = Math.floor(input.durationS / input.outputIntervalS);
  const timesS = Array.from({ length: count + 1 }, (_, i) => i * input.outputIntervalS);
  const track = mixedTrack(model, flowSegments(model, 'pushOut'), timesS, {
    displacement: 'pushOut',
    useMixingVolume: false,
    wantsSlopes: false,
    wantsBetween: false,
  });
  const runs = { displacement: 'pushOut' as const, tracks: [track] as const };
  const asked = (input.zones ?? []).flatMap(({ space, floorLevelM, heightM }) =>
    [heightM, FALLEN_HEIGHT_M].map((height) => {
      const at = model.indexOf.get(space) ?? 0;
      const mouth = boundMouth(model, releases, at, floorLevelM, height);
      return { mouth, floorLevelM, bound: boundTrack(model, runs, releases, mouth) };
    }),
  );
  const mixed = model.spaces.map((_, space) => spaceTrack(model, runs, space));
  const question = bandQuestion({ model, gases, asked, mixed, timesS }, uncertainty);
  const draws = uncertaintyDraws(uncertainty);
  return { input, gases, gasIds: model.gases, draws, ...question };
}

/** The answers of all draws of a day, or of a share of them. */
export function drawnDay({ input, gases, gasIds, draws, mouths, timesS }: SampledDay): DrawnValues {
  return layeredDraws(input, gases, draws, mouths, timesS, gasIds, input.thresholds ?? []);
}

/** The band from the answers of all shares, in the order of the draws. */
export function bandOfDay(
  { input, gasIds, draws, mouths, timesS }: SampledDay,
  parts: readonly DrawnValues[],
): Bands {
  return layeredBand(parts, draws, mouths, timesS.length, gasIds, input.thresholds ?? []);
}
