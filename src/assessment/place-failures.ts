import { siteVolumeFactor } from '../science/room-air/site-volume.js';
import type { PlanFile } from './plan-file.js';
import type { PlaceFailure } from './decision-table.js';
import type { JudgedLevel } from './levels.js';
import type { ResolvedPlan, ResolvedStock } from './resolved-plan.js';

const freshOxygen = 0.2095;
const referenceMolarVolumeM3 = 0.0240551;

/**
 * Gas of one container at the site over the air volume of a closed place [-]: the straight
 * displacement that judges stores, lifts and vehicles.
 */
function displacedShare(item: ResolvedStock, volumeM3: number, plan: ResolvedPlan): number {
  const { temperatureK, pressurePa } = plan.site;
  const gasM3 =
    item.amountMol * referenceMolarVolumeM3 * siteVolumeFactor(temperatureK, pressurePa);
  return gasM3 / volumeM3;
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
  const oxygen = freshOxygen * Math.max(0, 1 - share * (1 - (item.composition.O2 ?? 0)));
  for (const level of levels) {
    const value =
      level.quantity === 'oxygenFraction'
        ? oxygen
        : level.gas === null
          ? null
          : (Math.min(1, share) * (item.composition[level.gas] ?? 0)) / level.scale;
    if (value === null) continue;
    const failed =
      level.failsWhen === 'below' ? value < level.limit.value : value > level.limit.value;
    if (!failed) continue;
    return {
      place,
      act: plan.acts.find((act) => act.planned.some((one) => one.stock === item.id))?.id ?? null,
      reason: `${item.title} let go in ${title} would pass the limit for ${level.title.toLowerCase()}.`,
    };
  }
  return null;
}

/** Spaces nobody may occupy with stock in them, lifts with people and vehicles, where a leak fails. */
export function placeFailures(
  plan: PlanFile,
  resolved: ResolvedPlan,
  levels: readonly JudgedLevel[],
): readonly PlaceFailure[] {
  const failures: PlaceFailure[] = [];
  for (const item of resolved.stock) {
    const space = resolved.spaces.find((candidate) => candidate.id === item.place);
    // An open container in an occupied space is a worst credible release of its own.
    if (!space || (item.open && space.occupied)) continue;
    const failure = failureIn(item, space.title, space.id, space.volumeM3, resolved, levels);
    if (failure) failures.push(failure);
  }
  for (const leg of plan.transport ?? []) {
    if ((leg.people ?? 0) === 0 || leg.sealedBulkhead === true) continue;
    const air = leg.airVolumeM3;
    const volumeM3 = typeof air === 'number' ? air : (air?.low ?? air?.value);
    for (const id of leg.load) {
      const item = resolved.stock.find((candidate) => candidate.id === id);
      if (!item) continue;
      const cold = item.form === 'dryIce' || item.form === 'cryogen';
      if (cold && leg.kind === 'lift') {
        failures.push({
          place: leg.id,
          act: null,
          reason: `${item.title} and a person in ${leg.title}: nobody rides with cold stock.`,
        });
      } else if (volumeM3 === undefined) {
        failures.push({
          place: leg.id,
          act: null,
          reason: `${leg.title}: the air volume that load and people share is not known.`,
        });
      } else {
        const failure = failureIn(item, leg.title, leg.id, volumeM3, resolved, levels);
        if (failure) failures.push(failure);
      }
    }
  }
  return failures;
}
