import { siteVolumeFactor } from '../science/room-air/site-volume.js';
import { actsUsing } from './act-attribution.js';
import type { PlaceFailure } from './decision-table.js';
import { fails, type JudgedLevel } from './levels.js';
import type { PlanFile } from './plan-file.js';
import type { ResolvedPlan, ResolvedStock } from './resolved-plan.js';

const freshOxygen = 0.2095;
const referenceMolarVolumeM3 = 0.0240551;

type Leg = NonNullable<PlanFile['transport']>[number];

/**
 * Gas of one container at the site over the air volume of a closed place [-]: the straight
 * displacement that judges stores, lifts and vehicles.
 */
function displacedShare(item: ResolvedStock, volumeM3: number, plan: ResolvedPlan): number {
  const { temperatureK, pressurePa } = plan.site;
  const gasM3 =
    item.amountMol * referenceMolarVolumeM3 * siteVolumeFactor(temperatureK, pressurePa);
  return Math.min(1, gasM3 / volumeM3);
}

/** What a level judges, once a share of the air has given way to the content of a container. */
function valueAfter(
  level: JudgedLevel,
  share: number,
  item: ResolvedStock,
  plan: ResolvedPlan,
): number {
  const part = (gas: string) => share * (item.composition[gas] ?? 0);
  if (level.gas === null) return freshOxygen * (1 - share) + part('O2');
  // Carbon dioxide is judged as a total: outdoor air holds some already.
  const background = level.gas === 'CO2' ? plan.site.carbonDioxideFraction * (1 - share) : 0;
  return (background + part(level.gas)) / level.scale;
}

function failureIn(
  item: ResolvedStock,
  title: string,
  place: string,
  volumeM3: number,
  plan: ResolvedPlan,
  levels: readonly JudgedLevel[],
): PlaceFailure | null {
  const share = displacedShare(item, volumeM3, plan);
  const failed = levels.find((level) =>
    fails(level, 'limit', valueAfter(level, share, item, plan)),
  );
  if (!failed) return null;
  return {
    place,
    acts: actsUsing(plan, item.id),
    reason: `${item.title} let go in ${title} would pass the limit for ${failed.title.toLowerCase()}.`,
  };
}

/** Stock in spaces in which it is no worst credible release of its own: closed, or with nobody named. */
function storeFailures(
  resolved: ResolvedPlan,
  levels: readonly JudgedLevel[],
): readonly PlaceFailure[] {
  return resolved.stock.flatMap((item) => {
    const space = resolved.spaces.find((candidate) => candidate.id === item.place);
    const isJudgedByZones =
      item.open && resolved.groups.some((group) => group.space === item.place);
    if (!space || isJudgedByZones) return [];
    return failureIn(item, space.title, space.id, space.volumeM3, resolved, levels) ?? [];
  });
}

function legFailures(
  leg: Leg,
  resolved: ResolvedPlan,
  levels: readonly JudgedLevel[],
): readonly PlaceFailure[] {
  // A vehicle has a driver, and a lift a rider, until the plan says that nobody is in it.
  const ridesAlong = leg.kind !== 'hand' && (leg.people ?? 1) > 0 && leg.sealedBulkhead !== true;
  if (!ridesAlong) return [];
  const air = leg.airVolumeM3;
  const volumeM3 = typeof air === 'number' ? air : (air?.low ?? air?.value);
  return leg.load.flatMap((id): readonly PlaceFailure[] => {
    const item = resolved.stock.find((candidate) => candidate.id === id);
    if (!item) return [];
    const failure = (reason: string): readonly PlaceFailure[] => [
      { place: leg.id, acts: actsUsing(resolved, id), reason },
    ];
    if (item.form === 'dryIce' || item.form === 'cryogen') {
      return failure(`${item.title} and a person in ${leg.title}: nobody rides with cold stock.`);
    }
    if (volumeM3 === undefined || volumeM3 <= 0) {
      return failure(`${leg.title}: the air volume that load and people share is not known.`);
    }
    const found = failureIn(item, leg.title, leg.id, volumeM3, resolved, levels);
    return found ? [found] : [];
  });
}

/** Stores, lifts with people and vehicles in which a container let go would fail the limit. */
export function placeFailures(
  plan: PlanFile,
  resolved: ResolvedPlan,
  levels: readonly JudgedLevel[],
): readonly PlaceFailure[] {
  return [
    ...storeFailures(resolved, levels),
    ...(plan.transport ?? []).flatMap((leg) => legFailures(leg, resolved, levels)),
  ];
}
