import type { ZoneResult } from './assessment.js';
import type { ResolvedPlan, ResolvedRelease } from './resolved-plan.js';

/** Above the rim, and along a pour, a face still counts as inside [m]. */
export const VESSEL_REACH_M = 0.3;

/** What is printed instead of a number: no model of a room holds inside its source. */
export const KEEP_FACES_OUT =
  'not computed: keep faces out. Inside an open tank, tub, box or flask, up to 0.3 m above its rim and within 0.3 m along any pour, a breath may be all gas; a leaning face counts as inside.';

/** Oxygen between these makes a mixture air to breathe, whatever vessel it is in [-]. */
const breathable = { low: 0.205, high: 0.235 } as const;

/** A burst and a jet leave no vessel behind that gas lies in; what burns is not there any more. */
const comesFromVessel = (release: ResolvedRelease): boolean => {
  const oxygen = release.composition.O2 ?? 0;
  return (
    release.amountMol > 0 &&
    !release.burned &&
    release.manner !== 'jet' &&
    release.manner !== 'burst' &&
    !(oxygen >= breathable.low && oxygen <= breathable.high) &&
    Object.keys(release.composition).some((gas) => gas !== 'air')
  );
};

/** Every open vessel of a plan as a zone without a number: one for each act, one for each cold box. */
export function openVessels(plan: ResolvedPlan): readonly ZoneResult[] {
  const spaceOf = (id: string) => plan.spaces.find((space) => space.id === id);
  const vessel = (id: string, title: string, space: string, rimM: number): ZoneResult => ({
    id: `${id}@vessel`,
    title,
    space,
    spaceTitle: spaceOf(space)?.title ?? space,
    heightM: rimM + VESSEL_REACH_M,
    floorLevelM: spaceOf(space)?.floorLevelM ?? 0,
    kind: 'crew',
    count: null,
    quantities: [],
    series: [],
    notComputed: KEEP_FACES_OUT,
  });
  const ofActs = plan.acts.flatMap((act) => {
    const open = act.planned.filter(comesFromVessel);
    const [first] = open;
    if (!first) return [];
    const rimM = Math.max(...open.map((release) => release.heightM ?? 0));
    return [vessel(act.id, `At the open vessel of ${act.title}`, first.space, rimM)];
  });
  const ofStock = plan.stock
    .filter(
      (item) =>
        (item.form === 'dryIce' || item.form === 'cryogen') &&
        item.open &&
        spaceOf(item.place) !== undefined,
    )
    .map((item) => vessel(`stock-${item.id}`, `At ${item.title}`, item.place, 0));
  return [...ofActs, ...ofStock];
}
