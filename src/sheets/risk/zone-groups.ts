import type { ZoneQuantity, ZoneResult } from '../../assessment/assessment.js';

/** Zones of one space and height whose every number is the same, told once. */
export interface ZoneGroup {
  readonly zones: readonly ZoneResult[];
  readonly first: ZoneResult;
  readonly quantities: readonly ZoneQuantity[];
}

const keyOf = (zone: ZoneResult): string =>
  JSON.stringify([
    zone.space,
    zone.heightM,
    zone.floorLevelM,
    zone.quantities.map((entry) => [
      entry.quantity,
      entry.caseName,
      Object.entries(entry.answers).map(([answer, figure]) => [answer, figure.value]),
      Object.values(entry.levels).map((level) => level?.value ?? null),
      entry.standing,
    ]),
  ]);

/** The zones at declared heights, those with equal numbers together, in their order. */
export function zoneGroups(zones: readonly ZoneResult[]): ZoneGroup[] {
  const groups = new Map<string, ZoneResult[]>();
  for (const zone of zones) {
    if (zone.kind === 'floorLevelCheck' || zone.quantities.length === 0) continue;
    const key = keyOf(zone);
    groups.set(key, [...(groups.get(key) ?? []), zone]);
  }
  return [...groups.values()].flatMap((all) => {
    const [first] = all;
    return first === undefined ? [] : [{ zones: all, first, quantities: first.quantities }];
  });
}

const standings: readonly ZoneQuantity['standing'][] = [
  'meets aim',
  'meets limit',
  'below limit',
  'past never',
];

/** The standing furthest from the aim. */
export const gravestStanding = (quantities: readonly ZoneQuantity[]): ZoneQuantity['standing'] =>
  standings.findLast((standing) => quantities.some((entry) => entry.standing === standing)) ??
  'meets aim';

/** The standing further from the aim. */
const worseStanding = (
  one: ZoneQuantity['standing'],
  other: ZoneQuantity['standing'],
): ZoneQuantity['standing'] => (standings.indexOf(one) > standings.indexOf(other) ? one : other);

/** The worse of two numbers of one quantity: low oxygen, much of anything else. */
const isWorse = (quantity: string, one: number, than: number): boolean =>
  isLowBad(quantity) ? one < than : one > than;

export const isLowBad = (quantity: string): boolean =>
  quantity === 'oxygenFraction' || quantity === 'oxygen';

/** For each space the worst of its checks 0.2 m above the floor, answer by answer. */
export function floorChecks(zones: readonly ZoneResult[]): ZoneGroup[] {
  const spaces = new Map<string, ZoneResult[]>();
  for (const zone of zones) {
    if (zone.kind !== 'floorLevelCheck' || zone.quantities.length === 0) continue;
    spaces.set(zone.space, [...(spaces.get(zone.space) ?? []), zone]);
  }
  return [...spaces.values()].flatMap((all) => {
    const [first] = all;
    if (first === undefined) return [];
    const worst = new Map<string, ZoneQuantity>();
    for (const entry of all.flatMap((zone) => zone.quantities)) {
      const key = `${entry.caseName} ${entry.quantity}`;
      const known = worst.get(key);
      worst.set(key, known === undefined ? entry : worseOf(known, entry));
    }
    return [{ zones: all, first, quantities: [...worst.values()] }];
  });
}

function worseOf(one: ZoneQuantity, other: ZoneQuantity): ZoneQuantity {
  const answers = { ...one.answers };
  for (const answer of ['mixed', 'layered', 'layeredP50', 'bound'] as const) {
    const [mine, theirs] = [one.answers[answer], other.answers[answer]];
    if (theirs === undefined) continue;
    if (mine === undefined || isWorse(one.quantity, theirs.value, mine.value)) {
      answers[answer] = theirs;
    }
  }
  const pressures = [one.partialPressure, other.partialPressure].flatMap((figure) => figure ?? []);
  const [lowest] = pressures.toSorted((a, b) => a.value - b.value);
  return {
    ...one,
    answers,
    ...(lowest === undefined ? {} : { partialPressure: lowest }),
    standing: worseStanding(one.standing, other.standing),
  };
}
