import type { AirModel } from './air-model.js';
import type { ReleasePlan } from './release-flow.js';

/**
 * Earliest time at which the gas of a release can be in each space [s]; Infinity: never.
 *
 * Gas passes openings while they are open, and transfers while they run. Air that a unit sends
 * round arrives mixed and does not gather again, so units do not count here.
 */
export function reachTimes(model: AirModel, release: ReleasePlan): Float64Array {
  const reach = new Float64Array(model.spaces.length).fill(Infinity);
  reach[release.space] = release.startS;
  const { openings = [], transfers = [] } = model.input;
  const paths = [
    ...openings
      .filter((one) => (one.openFraction ?? 1) > 0)
      .flatMap((one) => [one, { ...one, from: one.to, to: one.from }]),
    ...transfers.filter((one) => one.flowM3PerS > 0),
  ].map((one) => ({
    from: model.indexOf.get(one.from),
    to: model.indexOf.get(one.to),
    opensS: one.fromS ?? 0,
    shutsS: one.toS ?? Infinity,
  }));
  let changed = true;
  while (changed) {
    changed = false;
    for (const { from, to, opensS, shutsS } of paths) {
      if (from === undefined || to === undefined) continue;
      const arrival = Math.max(reach[from] ?? Infinity, opensS);
      if (arrival < shutsS && arrival < (reach[to] ?? Infinity)) {
        reach[to] = arrival;
        changed = true;
      }
    }
  }
  return reach;
}
