import {
  doorForce,
  gapAreaOfInfiltration,
  leakyPressureRise,
  sealedPressureRise,
} from '../science/room-air/pressure-rise.js';
import type { Finding } from './assessment.js';
import type { Policy } from './catalogue-types.js';
import type { ResolvedPlan, ResolvedRelease, ResolvedSpace } from './resolved-plan.js';
import { worstReleases } from './worst-releases.js';

/** From this rise on a door is hard to open [Pa]: 100 N on a leaf of 2 m2. */
const worthALinePa = 50;
/** Leaf of a door that nobody described [m2]. */
const usualDoorM2 = 2;
/** Time in which the content of a broken-off valve or a spill comes out at first [s]. */
const atOnceS = 15;
const molarGasConstant = 8.314462618;

/** Free area through which a space can let air out [m2]: gaps, and openings that stand open. */
function reliefArea(plan: ResolvedPlan, space: ResolvedSpace): number {
  const changes = plan.infiltration.find((row) => row.space === space.id)?.airChangesPerHour ?? 0;
  const open = plan.openings
    .filter((one) => one.from === space.id || one.to === space.id)
    .reduce((sum, one) => sum + one.widthM * one.heightM * one.openFraction, 0);
  return gapAreaOfInfiltration((changes * space.volumeM3) / 3600) + open;
}

function doorOf(plan: ResolvedPlan, space: ResolvedSpace): number {
  const doors = plan.openings.filter(
    (one) => one.kind === 'doorway' && (one.from === space.id || one.to === space.id),
  );
  return doors.length > 0 ? Math.max(...doors.map((one) => one.widthM * one.heightM)) : usualDoorM2;
}

/** Rise of pressure while a release comes out [Pa]: never more than a sealed room would hold. */
function riseOf(release: ResolvedRelease, space: ResolvedSpace, plan: ResolvedPlan): number {
  const { pressurePa, molarVolumeM3PerMol, temperatureK } = plan.site;
  const gasM3 = release.amountMol * molarVolumeM3PerMol;
  const sealed = sealedPressureRise(gasM3, space.volumeM3, pressurePa);
  const area = reliefArea(plan, space);
  if (area <= 0) return sealed;
  const flow = gasM3 / Math.max(release.durationS, atOnceS);
  const density = (0.02896 * pressurePa) / (molarGasConstant * temperatureK);
  return Math.min(sealed, leakyPressureRise(flow, area, density));
}

/**
 * Spaces so tight that what is let out presses on their doors: the rise of pressure, the force on
 * the door, and the duty to give relief.
 */
export function pressureFindings(plan: ResolvedPlan, policy: Policy): readonly Finding[] {
  const releases = [
    ...plan.acts.flatMap((act) => act.planned.filter((one) => !one.burned)),
    ...worstReleases(plan, policy).flatMap((one) => one.placed.map(({ release }) => release)),
  ];
  return plan.spaces.flatMap((space, index): Finding[] => {
    const worst = releases
      .filter((release) => release.space === space.id)
      .map((release) => ({ release, pa: riseOf(release, space, plan) }))
      .sort((one, other) => other.pa - one.pa)[0];
    if (!worst || worst.pa < worthALinePa) return [];
    const door = doorOf(plan, space);
    const pressure = String(Number(worst.pa.toPrecision(2)));
    const force = String(Number(doorForce(worst.pa, Math.max(0.1, door)).toPrecision(2)));
    return [
      {
        code: 'pressure-rise',
        kind: 'danger',
        path: `/venue/spaces/${String(index)}`,
        text: `${space.title} is nearly airtight: ${worst.release.title} can raise the pressure by ${pressure} Pa, ${force} N on a door of ${door.toFixed(1)} m2. Give it an opening for relief, and try that the door opens against it.`,
      },
    ];
  });
}
