import type { Policy } from './catalogue-types.js';
import type { PlacedRelease } from './air-case.js';
import { actsUsing } from './act-attribution.js';
import { episodeAt } from './air-case.js';
import { policyDefault } from './policy-rows.js';
import type { ResolvedAct, ResolvedPlan, ResolvedRelease, ResolvedStock } from './resolved-plan.js';

/** One thing that can go wrong, when, and what it lets out. */
export interface WorstRelease {
  /** Acts whose slip it is, or that use the container. */
  readonly acts: readonly string[];
  readonly title: string;
  /** When its first gas comes out. */
  readonly startS: number;
  readonly placed: readonly PlacedRelease[];
}

function faultManner(form: string): ResolvedRelease['manner'] {
  if (form === 'dryIce') return 'fog';
  if (form === 'cryogen') return 'spill';
  return form === 'compressed' || form === 'liquefied' ? 'jet' : 'burst';
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
    manner: faultManner(item.form),
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

/** Stated slips of this share of a container stand for the whole of it. */
const wholeContainer = 0.999;

/**
 * The worst credible releases of a plan: what each act states, and every container that stands open
 * or connected in a space, its whole content. A stated slip that lets out less than the container
 * holds stands beside the container, not in its place. Each is put in the last performance that day,
 * when the air already carries what the day has left in it.
 */
export function worstReleases(plan: ResolvedPlan, policy: Policy): readonly WorstRelease[] {
  const lastShow = plan.performances.reduce((latest, one) =>
    one.startS > latest.startS ? one : latest,
  );
  const ofActs = plan.acts.flatMap((act) =>
    slipsOf(act).map((slip): WorstRelease => {
      const actStartS = Math.max(...act.startsS);
      return {
        acts: [act.id],
        title: slip.map((release) => release.title).join('; '),
        startS: actStartS + Math.min(...slip.map((release) => release.startS)),
        placed: slip.map((release) => ({
          release,
          startS: actStartS + release.startS,
          episode: episodeAt(plan, actStartS),
        })),
      };
    }),
  );
  const isStated = (item: ResolvedStock) =>
    plan.acts.some((act) =>
      act.worstCredible.some(
        (release) =>
          release.stock === item.id &&
          release.space === item.place &&
          release.amountMol >= wholeContainer * item.amountMol,
      ),
    );
  const spaces = new Set(plan.spaces.map((space) => space.id));
  const ofStock = plan.stock
    .filter((item) => item.open && spaces.has(item.place) && !isStated(item))
    .map((item): WorstRelease => {
      const presentS = Math.min(item.toS ?? Infinity, lastShow.endS);
      const startS = Math.max(item.fromS ?? 0, Math.min(lastShow.startS + 60, presentS));
      return {
        acts: actsUsing(plan, item.id),
        title: item.title,
        startS,
        placed: [
          { release: containerRelease(item, policy), startS, episode: episodeAt(plan, startS) },
        ],
      };
    });
  return [...ofActs, ...ofStock];
}
