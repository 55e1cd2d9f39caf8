import type { PlacedRelease } from './air-case.js';
import type { ResolvedPlan } from './resolved-plan.js';
import type { ZoneOutcome } from './zone-outcomes.js';

/** An act with a smaller share of the gas than this is not named as its cause. */
const smallestShare = 0.1;

/** Acts that let gas out of a container, planned or by a slip. */
export function actsUsing(plan: ResolvedPlan, stock: string): readonly string[] {
  return plan.acts
    .filter((act) => [...act.planned, ...act.worstCredible].some((one) => one.stock === stock))
    .map((act) => act.id);
}

/** Spaces that air can reach from each other, by openings, transfers or a shared air system. */
export function connectedSpaces(plan: ResolvedPlan, from: string): ReadonlySet<string> {
  const links = new Map<string, Set<string>>();
  const link = (a: string, b: string) => {
    if (a === 'outside' || b === 'outside' || a === b) return;
    links.set(a, (links.get(a) ?? new Set()).add(b));
    links.set(b, (links.get(b) ?? new Set()).add(a));
  };
  for (const opening of plan.openings) link(opening.from, opening.to);
  for (const transfer of plan.transfers) link(transfer.from, transfer.to);
  for (const system of plan.airSystems) {
    if (system.recirculatedM3PerS === 0) continue;
    for (const one of system.serves)
      for (const other of system.serves) link(one.space, other.space);
  }
  const reached = new Set([from]);
  const queue = [from];
  for (let space = queue.pop(); space !== undefined; space = queue.pop()) {
    for (const next of links.get(space) ?? []) {
      if (reached.has(next)) continue;
      reached.add(next);
      queue.push(next);
    }
  }
  return reached;
}

function amountOf(placed: PlacedRelease, outcome: ZoneOutcome): number {
  const { composition, amountMol } = placed.release;
  if (outcome.level.gas !== null) return amountMol * (composition[outcome.level.gas] ?? 0);
  return amountMol * (1 - (composition.O2 ?? 0) - (composition.air ?? 0));
}

/**
 * Acts whose gas stands behind a result: those that let the gas out before the moment of the worst
 * value, in the same space, or failing that in any space from which air can come.
 */
export function actsBehind(
  outcome: ZoneOutcome,
  atS: number,
  placed: readonly PlacedRelease[],
  plan: ResolvedPlan,
): readonly string[] {
  const before = placed.filter((one) => one.startS <= atS + 1 && amountOf(one, outcome) > 0);
  const here = before.filter((one) => one.release.space === outcome.group.space);
  const connected = connectedSpaces(plan, outcome.group.space);
  const relevant =
    here.length > 0 ? here : before.filter((one) => connected.has(one.release.space));
  const byAct = new Map<string, number>();
  for (const one of relevant) {
    byAct.set(one.release.act, (byAct.get(one.release.act) ?? 0) + amountOf(one, outcome));
  }
  const total = [...byAct.values()].reduce((sum, amount) => sum + amount, 0);
  const named = [...byAct]
    .filter(([, amount]) => amount >= smallestShare * total)
    .flatMap(([act]) => (act.startsWith('stock:') ? actsUsing(plan, act.slice(6)) : [act]));
  return [...new Set(named)];
}
