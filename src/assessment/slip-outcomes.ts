import { connectedSpaces } from './act-attribution.js';
import type { Evaluation, WorstCase } from './evaluation.js';
import { fails, type LevelName } from './levels.js';
import type { ZoneOutcome } from './zone-outcomes.js';

/** The answer that judges a slip: layered where it is known, else mixed. */
export const judgingAnswer = ({ answers }: ZoneOutcome) => answers.layered ?? answers.mixed;

/**
 * What a slip can have done: zones that its gas reaches, for oxygen and for its own gases. What breath
 * or an act before it does there is not its doing.
 */
export function slipOutcomes(worst: WorstCase, { resolved }: Evaluation): readonly ZoneOutcome[] {
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

/** When a level is passed after a slip [s after midnight]; none where it was passed before. */
export function passedAfter(
  outcome: ZoneOutcome,
  name: LevelName,
  startS: number,
): number | undefined {
  const { timesS, level } = outcome;
  const series = judgingAnswer(outcome)?.series ?? [];
  const isPast = (value: number | undefined) => value !== undefined && fails(level, name, value);
  if (isPast(series[timesS.findLastIndex((t) => t < startS)])) return undefined;
  const at = timesS.findIndex((t, i) => t >= startS && isPast(series[i]));
  const before = timesS[Math.max(0, at - 1)];
  // Somewhere between two samples: the earlier one is the cautious reading.
  return at < 0 || before === undefined ? undefined : Math.max(startS, before);
}
