import { airRun } from '../../src/science/room-air/air-run.js';
import { sampledInput, uncertaintyDraws } from '../../src/science/room-air/sampled-input.js';
import type { AirGasTable } from '../../src/science/room-air/air-gases.js';
import type { AirInput } from '../../src/science/room-air/air-input.js';

/** Some of the draws of one day. */
export interface SampledShare {
  readonly input: AirInput;
  readonly gases: AirGasTable;
  readonly layered: boolean;
  readonly first: number;
  readonly count: number;
  readonly samples: number;
}

/** Least oxygen over all zones and over some of the draws of a day; a number that needs them all. */
export function sampledDay({ input, gases, layered, first, count, samples }: SampledShare): number {
  const draws = uncertaintyDraws({ samples, seed: 20261201 }).slice(first, first + count);
  return draws.reduce((least, draw) => {
    const { zones } = airRun(sampledInput(input, draw), gases, { layered });
    return Object.values(zones).reduce(
      (most, { minimum }) =>
        Math.min(
          most,
          minimum.mixed.oxygenFraction,
          (minimum.layered ?? minimum.mixed).oxygenFraction,
        ),
      least,
    );
  }, 1);
}
