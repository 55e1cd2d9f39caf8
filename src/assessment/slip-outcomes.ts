import { connectedSpaces } from './act-attribution.js';
import { fails, type LevelName } from './levels.js';
import type { ResolvedPlan } from './resolved-plan.js';
import type { WorstRelease } from './worst-releases.js';
import type { ZoneOutcome } from './zone-outcomes.js';

/** The answer that judges a slip: layered where it is known, else mixed. */
export const judgingAnswer = ({ answers }: ZoneOutcome) => answers.layered ?? answers.mixed;

/**
 * What a slip can have done: zones that its gas reaches, for oxygen and for its own gases. What breath
 * or an act before it does there is not its doing.
 */
export function slipOutcomes(
  worst: WorstRelease & { readonly outcomes: readonly ZoneOutcome[] },
  { resolved }: { readonly resolved: ResolvedPlan },
): readonly ZoneOutcome[] {
  const gases = new Set(worst.placed.flatMap(({ release }) => Object.keys(release.composition)));
  const reached = new Set(
    worst.placed.flatMap(({ release }) => [...connectedSpaces(resolved, release.space)]),
  );
  return worst.outcomes.filter(
    (outcome) =>
      reached.has(outcome.group.space) &&
      (outcome.level.gas === null || gases.has(outcome.level.gas)) &&
      judgingAnswer(outcome) !== undefined,
  );
}

/** Index of the sample of a series at which a slip begins; -1 where none lies before it. */
const lastBefore = (timesS: readonly number[], startS: number): number =>
  timesS.findLastIndex((t) => t < startS);

/** When a level is passed after a slip [s after midnight]; none where it was passed before. */
export function passedAfter(
  outcome: ZoneOutcome,
  name: LevelName,
  startS: number,
): number | undefined {
  const { timesS, level } = outcome;
  const series = judgingAnswer(outcome)?.series ?? [];
  const isPast = (value: number | undefined) => value !== undefined && fails(level, name, value);
  if (isPast(series[lastBefore(timesS, startS)])) return undefined;
  const at = timesS.findIndex((t, i) => t >= startS && isPast(series[i]));
  const before = timesS[Math.max(0, at - 1)];
  // Somewhere between two samples: the earlier one is the cautious reading.
  return at < 0 || before === undefined ? undefined : Math.max(startS, before);
}

/**
 * From when on people have to flee a slip [s after midnight]: when it passes a level, or its start
 * where the level is past already by then, or is passed by a peak that no sample shows. Null where
 * the level was past only before the slip: that is the planned day, and judged there.
 */
export function fleeingFrom(outcome: ZoneOutcome, name: LevelName, startS: number): number | null {
  const { timesS, level } = outcome;
  const after = passedAfter(outcome, name, startS);
  if (after !== undefined) return after;
  const series = judgingAnswer(outcome)?.series ?? [];
  const isPast = (value: number | undefined) => value !== undefined && fails(level, name, value);
  const before = lastBefore(timesS, startS);
  if (isPast(series[before])) return startS;
  return series.slice(0, before + 1).some(isPast) ? null : startS;
}
