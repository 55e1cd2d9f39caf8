import {
  actionReading,
  cleanAirReading,
  fastestApproach,
} from '../science/room-air/meter-alarm.js';
import type { Policy } from './catalogue-types.js';
import { conditionHolds, type FactValues } from './condition-holds.js';
import { fittingMeters } from './meter-fits.js';
import type { PhysicalFigure, PlanFile } from './plan-file.js';
import type { ResolvedSite } from './resolved-plan.js';
import type { ZoneOutcome } from './zone-outcomes.js';

/** A gas for which the policy knows no meter: a tenth of the limit, and a minute [-, s]. */
const unknownMeter = { shareOfLimit: 0.1, responseTimeS: 60 } as const;

/** The number at which people act on a meter. */
export interface StopReading {
  /** As the meter shows it [-]; null where no reading this side of clean air would come in time. */
  readonly value: number | null;
  /** What the meter shows in clean air of the place [-]. */
  readonly cleanAir: number;
}

/** The cautious end of what a plan says of a meter. */
const worstOf = (figure: PhysicalFigure | undefined): number | undefined =>
  typeof figure === 'object' ? (figure.high ?? figure.value) : figure;

/** The largest of what several rows say, or of the meter that is there where it says so itself. */
const largest = (values: readonly (number | undefined)[]): number | undefined => {
  const known = values.filter((value) => value !== undefined);
  return known.length > 0 ? Math.max(...known) : undefined;
};

/**
 * The reading at which a zone acts: the limit moved towards clean air by accuracy, drift, cross
 * effect, and by what the air still does while the meter answers. Taken from the meter that hangs
 * there as far as the plan tells, else from a usual one of the policy.
 */
export function stopReading(
  plan: PlanFile,
  outcome: ZoneOutcome,
  policy: Policy,
  facts: FactValues,
  site: ResolvedSite,
): StopReading {
  const { level } = outcome;
  const gas = level.gas ?? 'O2';
  const side = level.failsWhen;
  const rows = policy.meters.filter((row) => row.gas === gas && conditionHolds(row.when, facts));
  const limit = level.limit.value * level.scale;
  // Of several that fit the least good one: nobody can say which is read.
  const hung = fittingMeters(plan, outcome, policy, facts);
  const doubt = (
    own: (meter: (typeof hung)[number]) => PhysicalFigure | undefined,
    usual: (row: (typeof rows)[number]) => number | undefined,
    missing: number,
  ): number => {
    const standard = largest(rows.map(usual)) ?? missing;
    return largest(hung.map((meter) => worstOf(own(meter)) ?? standard)) ?? standard;
  };
  const known = rows.length > 0;
  const answer = outcome.answers.layered ?? outcome.answers.mixed;
  const ratePerS = level.scale * fastestApproach(outcome.timesS, answer?.series ?? [], side);
  const value = actionReading(
    limit,
    side,
    [
      doubt(
        (meter) => meter.accuracyFraction,
        (row) => row.accuracy,
        known ? 0 : unknownMeter.shareOfLimit * limit,
      ),
      doubt(
        (meter) => meter.driftFraction,
        (row) => row.drift,
        0,
      ),
      doubt(
        (meter) => meter.crossEffectFraction,
        (row) => row.crossEffect,
        0,
      ),
    ],
    doubt(
      (meter) => meter.responseTimeS,
      (row) => row.responseTimeS,
      unknownMeter.responseTimeS,
    ),
    ratePerS,
  );
  const cleanAir =
    gas === 'O2'
      ? cleanAirReading(site.temperatureK, site.pressurePa, site.relativeHumidity)
      : gas === 'CO2'
        ? site.carbonDioxideFraction
        : 0;
  const isPast = side === 'below' ? value >= cleanAir : value <= cleanAir;
  return { value: isPast ? null : value, cleanAir };
}
