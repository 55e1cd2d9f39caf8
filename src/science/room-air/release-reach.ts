import type { AirModel } from './air-model.js';

/** A way from one space into another, open for some time. */
interface GasPath {
  readonly from: number;
  readonly to: number;
  readonly opensS: number;
  readonly shutsS: number;
}

function gasPaths({ input, indexOf }: AirModel): readonly GasPath[] {
  const { openings = [], transfers = [] } = input;
  return [
    ...openings
      .filter((one) => (one.openFraction ?? 1) > 0)
      .flatMap((one) => [one, { ...one, from: one.to, to: one.from }]),
    ...transfers.filter((one) => one.flowM3PerS > 0),
  ].flatMap((one): GasPath[] => {
    const from = indexOf.get(one.from);
    const to = indexOf.get(one.to);
    if (from === undefined || to === undefined) return [];
    return [{ from, to, opensS: one.fromS ?? 0, shutsS: one.toS ?? Infinity }];
  });
}

/**
 * Earliest time at which the gas of each release can be in each space [s]; Infinity: never.
 *
 * Gas passes openings while they are open, and transfers while they run. Air that a unit sends
 * round arrives mixed and does not gather again, so units do not count here.
 *
 * @param model resolved input
 * @returns one array by space for each release of the model, in their order
 */
export function reachTimes(model: AirModel): readonly Float64Array[] {
  const paths = gasPaths(model);
  const n = model.spaces.length;
  return model.releases.map(({ space, startS }) => {
    const reach = new Float64Array(n).fill(Infinity);
    reach[space] = startS;
    let changed = true;
    while (changed) {
      changed = false;
      for (const { from, to, opensS, shutsS } of paths) {
        const arrival = Math.max(reach[from] ?? Infinity, opensS);
        if (arrival < shutsS && arrival < (reach[to] ?? Infinity)) {
          reach[to] = arrival;
          changed = true;
        }
      }
    }
    return reach;
  });
}
