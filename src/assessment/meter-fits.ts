import type { Policy } from './catalogue-types.js';
import { conditionHolds, type FactValues } from './condition-holds.js';
import type { PlanFile } from './plan-file.js';
import type { ZoneOutcome } from './zone-outcomes.js';

/** A meter stands for a mouth height when it hangs within this of it [m]: the smear of a layer. */
const heightToleranceM = 0.3;
/** From here an infrared head that nobody compensated reads low by more than a twentieth [m]. */
const compensateFromM = 500;

/**
 * Whether the plan lists a meter that can see the quantity of an outcome, in its space, at its
 * height. A wrong or unstated cell type, or an uncompensated infrared head at altitude, is no meter.
 */
export function meterFits(
  plan: PlanFile,
  outcome: ZoneOutcome,
  policy: Policy,
  facts: FactValues,
): boolean {
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
  return (plan.meters ?? []).some((meter) => {
    const height = meter.heightM;
    return (
      meter.gas === gas &&
      meter.space === outcome.group.space &&
      height !== undefined &&
      Math.abs(height - outcome.heightM) <= heightToleranceM &&
      meter.cellType !== undefined &&
      meter.cellType !== 'unknown' &&
      isAccepted(meter.cellType) &&
      !refused.has(meter.cellType) &&
      !(isHigh && meter.cellType === 'infrared' && meter.altitudeCompensated !== true)
    );
  });
}
