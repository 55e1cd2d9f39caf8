import { highestOf } from './gas-content.js';
import type { PlanFile } from './plan-file.js';

/** Spaces that share air with one: through openings that are not shut, transfers and air systems. */
export function sharingAir(plan: PlanFile, space: string): ReadonlySet<string> {
  const { openings = [], transfers = [], airSystems = [] } = plan.venue;
  const groups: readonly (readonly string[])[] = [
    ...openings
      .filter(({ openFraction }) => highestOf(openFraction) !== 0)
      .map(({ from, to }) => [from, to]),
    ...transfers.map(({ from, to }) => [from, to]),
    ...airSystems.map(({ serves = [] }) => serves.map((served) => served.space)),
  ];
  const reached = new Set([space]);
  let before = 0;
  while (before < reached.size) {
    before = reached.size;
    for (const group of groups) {
      const inside = group.filter((id) => id !== 'outside');
      if (inside.some((id) => reached.has(id))) inside.forEach((id) => reached.add(id));
    }
  }
  return reached;
}

/**
 * The part of a plan in which the gas of one space can be breathed: its spaces, their air, people and
 * acts. Of slips only those of the acts named; all of them where none are. Air that cannot mix with
 * that of the space is left out, which makes a question about one act quick.
 */
export function partialPlan(plan: PlanFile, space: string, acts: readonly string[]): PlanFile {
  const inside = sharingAir(plan, space);
  const audience = plan.event.audience.filter(({ zone }) => inside.has(zone.space));
  if (audience.length === 0) return plan;
  const isHere = (id: string) => id === 'outside' || inside.has(id);
  const isMeant = (act: PlanFile['acts'][number]) => acts.length === 0 || acts.includes(act.id);
  const used = new Set(
    plan.acts
      .filter(isMeant)
      .flatMap(({ releases }) => [...releases.planned, ...releases.worstCredible])
      .flatMap(({ stock }) => stock ?? []),
  );
  const { openings, transfers, airSystems, infiltration } = plan.venue;
  return {
    ...plan,
    event: { ...plan.event, audience },
    venue: {
      ...plan.venue,
      spaces: plan.venue.spaces.filter(({ id }) => inside.has(id)),
      ...(openings
        ? { openings: openings.filter(({ from, to }) => isHere(from) && isHere(to)) }
        : {}),
      ...(transfers
        ? { transfers: transfers.filter(({ from, to }) => isHere(from) && isHere(to)) }
        : {}),
      ...(airSystems
        ? {
            airSystems: airSystems.filter((system) =>
              system.space === undefined
                ? (system.serves?.some((served) => inside.has(served.space)) ?? false)
                : inside.has(system.space),
            ),
          }
        : {}),
      ...(infiltration
        ? { infiltration: infiltration.filter((row) => inside.has(row.space)) }
        : {}),
    },
    acts: plan.acts
      .filter((act) => inside.has(act.space))
      .map((act) =>
        isMeant(act) ? act : { ...act, releases: { ...act.releases, worstCredible: [] } },
      ),
    ...(plan.stock
      ? {
          stock: plan.stock
            .filter(({ place }) => inside.has(place) || place === 'outside')
            .map((item) =>
              acts.length === 0 || used.has(item.id) ? item : { ...item, open: false },
            ),
        }
      : {}),
  };
}
