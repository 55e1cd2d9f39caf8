import type { Policy } from './catalogue-types.js';
import type { PlanFile } from './plan-file.js';
import type { ZoneOutcome } from './zone-outcomes.js';

/** A meter stands for a mouth height when it hangs within this of it [m]. */
const heightToleranceM = 0.4;

/**
 * Whether the plan lists a meter that can see the quantity of an outcome, in its space, at its
 * height. A wrong or unstated cell type, or an uncompensated infrared head at altitude, is no meter.
 */
export function meterFits(plan: PlanFile, outcome: ZoneOutcome, policy: Policy): boolean {
  const gas =
    outcome.level.quantity === 'oxygenFraction' || outcome.level.quantity === 'oxygenEnrichment'
      ? 'O2'
      : (outcome.level.gas ?? 'O2');
  const refused = new Set(
    policy.meters.filter((row) => row.gas === gas).flatMap((row) => row.refusedCells),
  );
  return (plan.meters ?? []).some((meter) => {
    const height = meter.heightM;
    return (
      meter.gas === gas &&
      meter.space === outcome.group.space &&
      height !== undefined &&
      Math.abs(height - outcome.heightM) <= heightToleranceM &&
      meter.cellType !== undefined &&
      meter.cellType !== 'unknown' &&
      !refused.has(meter.cellType)
    );
  });
}
