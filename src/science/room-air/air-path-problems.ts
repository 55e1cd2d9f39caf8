import type { ErrorDetail } from '../../errors.js';
import type { AirInput } from './air-input.js';

/** Flows closer than this count as equal [m3/s]. */
const SAME_FLOW_M3_PER_S = 1e-9;

type AirPaths = Pick<AirInput, 'spaces' | 'openings' | 'airSystems' | 'infiltration' | 'transfers'>;

/** Spaces that have a way for air besides transfers: an opening, a plant, or gaps. */
function spacesWithOwnAir(input: AirPaths): ReadonlySet<string> {
  const found = new Set<string>();
  for (const { from, to } of input.openings ?? []) found.add(from).add(to);
  for (const system of input.airSystems ?? []) {
    for (const { space } of system.serves ?? []) found.add(space);
    if (system.space !== undefined) found.add(system.space);
  }
  // No figure is no knowledge: such gaps may be there.
  for (const { space, airChangesPerHour } of input.infiltration ?? []) {
    if (!(airChangesPerHour <= 0)) found.add(space);
  }
  return found;
}

/** Spaces from which a walk along the transfers comes back to its start. */
function spacesInLoop(transfers: NonNullable<AirInput['transfers']>): ReadonlySet<string> {
  const next = new Map<string, Set<string>>();
  for (const { from, to } of transfers) next.set(from, (next.get(from) ?? new Set()).add(to));
  const reachable = (start: string): ReadonlySet<string> => {
    const seen = new Set<string>();
    const queue = [...(next.get(start) ?? [])];
    for (let at = queue.pop(); at !== undefined; at = queue.pop()) {
      if (seen.has(at)) continue;
      seen.add(at);
      queue.push(...(next.get(at) ?? []));
    }
    return seen;
  };
  return new Set([...next.keys()].filter((space) => reachable(space).has(space)));
}

/**
 * Transfers whose air can come from nowhere or go nowhere: a space that gives more than it gets and
 * has no other way for air, and air that goes round between spaces none of which has any outdoor air.
 */
export function airPathProblems(input: AirPaths): readonly ErrorDetail[] {
  const found: ErrorDetail[] = [];
  const transfers = (input.transfers ?? []).filter((one) => one.flowM3PerS > 0);
  if (transfers.length === 0) return found;
  const own = spacesWithOwnAir(input);
  const indexOf = (of: (one: (typeof transfers)[number]) => boolean): number =>
    (input.transfers ?? []).findIndex((one) => one.flowM3PerS > 0 && of(one));
  for (const { id } of input.spaces) {
    if (own.has(id)) continue;
    const sum = (side: 'from' | 'to'): number =>
      transfers.reduce((total, one) => total + (one[side] === id ? one.flowM3PerS : 0), 0);
    const [given, got] = [sum('from'), sum('to')];
    if (Math.abs(given - got) <= SAME_FLOW_M3_PER_S) continue;
    const at = indexOf((one) => one.from === id || one.to === id);
    found.push({
      path: `/transfers/${String(at)}/flowM3PerS`,
      problem: `leaves the air of ${id} without a balance: it gets ${String(got)} and gives ${String(given)} m3/s and has no other way for air; add the opening, plant or gaps that make up the difference`,
    });
  }
  const looped = spacesInLoop(transfers);
  const outdoors = new Set<string>([...own, 'outside']);
  let grows = true;
  while (grows) {
    grows = false;
    for (const { from, to } of transfers) {
      if (!outdoors.has(from) || outdoors.has(to)) continue;
      outdoors.add(to);
      grows = true;
    }
  }
  const shut = [...looped].filter((space) => !outdoors.has(space));
  if (shut.length > 0) {
    const at = indexOf((one) => shut.includes(one.from) && shut.includes(one.to));
    found.push({
      path: `/transfers/${String(at)}`,
      problem: `moves air in a loop between ${shut.join(' and ')}, and none of it comes from outdoors; add what lets outdoor air in, or leave the loop out`,
    });
  }
  return found;
}
