import type { AirInput } from './air-input.js';

/**
 * Group of each space: spaces that an opening or a transfer joins at any time share one.
 *
 * @param input   openings and transfers
 * @param indexOf index of each space
 * @returns index of a member that stands for the group, by space
 */
export function airGroups(
  input: Pick<AirInput, 'openings' | 'transfers'>,
  indexOf: ReadonlyMap<string, number>,
): Int32Array {
  const group = Int32Array.from({ length: indexOf.size }, (_, i) => i);
  const root = (i: number): number => {
    let at = i;
    while (group[at] !== at) at = group[at] ?? at;
    return at;
  };
  const paths = [
    ...(input.openings ?? []).filter((one) => (one.openFraction ?? 1) > 0),
    ...(input.transfers ?? []).filter((one) => one.flowM3PerS > 0),
  ];
  for (const one of paths) {
    const from = indexOf.get(one.from);
    const to = indexOf.get(one.to);
    if (from !== undefined && to !== undefined) group[root(from)] = root(to);
  }
  return group.map((_, i) => root(i));
}
