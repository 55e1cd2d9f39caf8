import type { AirAnswers } from './air-answers.js';
import type { AirCase } from './air-case.js';
import type { Evaluation } from './evaluation.js';
import type { ResolvedPlan } from './resolved-plan.js';
import { zoneOutcomes, type ZoneOutcome } from './zone-outcomes.js';

/**
 * The first zone asked about that misses an aim in well-mixed air when a day is run another way than planned, or
 * null: the quick judgement with which amounts, flows and counts are searched.
 */
export function mixedAimFailure(
  { levelsOf }: Evaluation,
  plan: ResolvedPlan,
  air: AirCase,
  answers: AirAnswers,
  isAsked: (outcome: ZoneOutcome) => boolean,
): ZoneOutcome | null {
  const straight = answers(air.input, 'straight');
  const outcomes = zoneOutcomes(air, straight, straight, 'planned', plan.groups, levelsOf);
  return (
    outcomes.find(
      (outcome) =>
        outcome.judgedFully && isAsked(outcome) && (outcome.answers.mixed?.fails.aim ?? false),
    ) ?? null
  );
}
