import type { Policy } from './catalogue-types.js';
import type { PlacedRelease } from './air-case.js';
import { episodeAt } from './air-case.js';
import { policyDefault } from './policy-rows.js';
import type { ResolvedAct, ResolvedPlan, ResolvedRelease, ResolvedStock } from './resolved-plan.js';

/** One thing that can go wrong, when, and what it lets out. */
export interface WorstRelease {
  readonly act: string | null;
  readonly title: string;
  readonly startS: number;
  readonly placed: readonly PlacedRelease[];
}

/** The content of a container let go at once; dry ice as a whole box tipped into warm water. */
function containerRelease(item: ResolvedStock, policy: Policy): ResolvedRelease {
  const isDryIce = item.form === 'dryIce';
  return {
    act: `stock:${item.id}`,
    title: item.title,
    space: item.place,
    composition: item.composition,
    amountMol: item.amountMol,
    massKg: item.massKg,
    startS: 0,
    durationS: isDryIce ? policyDefault(policy, 'dryIceFaultDurationS').value : 0,
    profile: 'steady',
    timeConstantS: null,
    heightM: null,
    temperatureK: null,
    manner: isDryIce ? 'fog' : item.form === 'cryogen' ? 'spill' : 'jet',
    burned: false,
    episode: null,
    stock: item.id,
  };
}

/** Stated faults of an act: each row is one slip; rows that share an episode happen together. */
function slipsOf(act: ResolvedAct): readonly (readonly ResolvedRelease[])[] {
  const slips = new Map<string, ResolvedRelease[]>();
  act.worstCredible
    .filter((release) => release.amountMol > 0)
    .forEach((release, index) => {
      const key = release.episode ?? `row ${String(index)}`;
      slips.set(key, [...(slips.get(key) ?? []), release]);
    });
  return [...slips.values()];
}

/**
 * The worst credible releases of a plan: what each act states, and every container that stands open
 * or connected in a space, its whole content. Each is placed in the last performance that day, when
 * the air already carries what the day has left in it.
 */
export function worstReleases(plan: ResolvedPlan, policy: Policy): readonly WorstRelease[] {
  const lastShow = plan.performances.reduce((latest, one) =>
    one.startS > latest.startS ? one : latest,
  );
  const ofActs = plan.acts.flatMap((act) =>
    slipsOf(act).map((slip): WorstRelease => {
      const startS = Math.max(...act.startsS);
      return {
        act: act.id,
        title: slip.map((release) => release.title).join('; '),
        startS,
        placed: slip.map((release) => ({
          release,
          startS: startS + release.startS,
          episode: episodeAt(plan, startS),
        })),
      };
    }),
  );
  const stated = new Set(
    plan.acts.flatMap((act) => act.worstCredible.map((release) => release.stock)),
  );
  const spaces = new Set(plan.spaces.map((space) => space.id));
  const ofStock = plan.stock
    .filter((item) => item.open && spaces.has(item.place) && !stated.has(item.id))
    .map((item): WorstRelease => {
      const user = plan.acts.find((act) => act.planned.some((one) => one.stock === item.id));
      const presentS = Math.min(item.toS ?? Infinity, lastShow.endS);
      const startS = Math.max(item.fromS ?? 0, Math.min(lastShow.startS + 60, presentS));
      return {
        act: user?.id ?? null,
        title: item.title,
        startS,
        placed: [
          { release: containerRelease(item, policy), startS, episode: episodeAt(plan, startS) },
        ],
      };
    });
  return [...ofActs, ...ofStock];
}
