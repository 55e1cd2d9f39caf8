import type { Policy } from './catalogue-types.js';
import { conditionHolds, type FactValues } from './condition-holds.js';
import type { PlanFile } from './plan-file.js';
import type { ZoneOutcome } from './zone-outcomes.js';

/** A meter stands for a mouth height when it hangs within this of it [m]: the smear of a layer. */
const heightToleranceM = 0.3;
/** From here a head that nobody compensated is off by more than a twentieth [m]. */
const compensateFromM = 500;
/** Cells whose reading does not follow the air pressure. */
const indifferentToPressure: ReadonlySet<string> = new Set(['capillary', 'catalytic']);

type Meter = NonNullable<PlanFile['meters']>[number];

/** Whether a meter can show the limit of an outcome at all: over-range is no reading. */
function reachesLimit(meter: Meter, { level }: ZoneOutcome): boolean {
  const range = meter.rangeFraction;
  const shown = typeof range === 'object' ? (range.low ?? range.value) : range;
  return shown === undefined || shown >= level.limit.value * level.scale;
}

/**
 * The meters of a plan that can see the quantity of an outcome, in its space, at its height. A wrong
 * or unstated cell type, a range that ends before the limit, or a head not compensated at altitude,
 * is no meter.
 */
export function fittingMeters(
  plan: PlanFile,
  outcome: ZoneOutcome,
  policy: Policy,
  facts: FactValues,
): readonly Meter[] {
  const gas =
    outcome.level.quantity === 'oxygenFraction' || outcome.level.quantity === 'oxygenEnrichment'
      ? 'O2'
      : (outcome.level.gas ?? 'O2');
  const rows = policy.meters.filter((row) => row.gas === gas && conditionHolds(row.when, facts));
  const refused = new Set(rows.flatMap((row) => row.refusedCells));
  // A gas for which the policy knows no meter has no right one.
  const isAccepted = (cell: string) =>
    rows.length > 0 && rows.every((row) => row.acceptedCells.includes(cell));
  const { altitudeM } = facts;
  const isHigh = typeof altitudeM !== 'number' || altitudeM >= compensateFromM;
  return (plan.meters ?? []).filter((meter) => {
    const { heightM, cellType } = meter;
    return (
      meter.gas === gas &&
      meter.space === outcome.group.space &&
      heightM !== undefined &&
      Math.abs(heightM - outcome.heightM) <= heightToleranceM &&
      cellType !== undefined &&
      cellType !== 'unknown' &&
      isAccepted(cellType) &&
      !refused.has(cellType) &&
      reachesLimit(meter, outcome) &&
      !(isHigh && !indifferentToPressure.has(cellType) && meter.altitudeCompensated !== true)
    );
  });
}

/** Whether the plan lists a meter that stands for an outcome. */
export function meterFits(
  plan: PlanFile,
  outcome: ZoneOutcome,
  policy: Policy,
  facts: FactValues,
): boolean {
  return fittingMeters(plan, outcome, policy, facts).length > 0;
}
