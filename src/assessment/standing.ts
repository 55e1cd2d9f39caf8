import type { AirAnswers } from './air-answers.js';
import type { DecisionWord } from './assessment.js';
import { worstWord, type Hit } from './decision-table.js';
import { evaluation, type Evaluation, type EvaluationContext } from './evaluation.js';
import { partialPlan } from './partial-plan.js';
import type { PlanFile } from './plan-file.js';

/**
 * The air model for a comparison: one layered run in place of the draws and of the runs without
 * mixing. Both sides of a comparison are taken so, and what comes of it is confirmed in full.
 */
export const quickly =
  (answers: AirAnswers): AirAnswers =>
  (input, form) => {
    if (form !== 'full') return answers(input, form);
    const { uncertainty: _left, ...rest } = input;
    return answers(rest, 'quick');
  };

/** What is asked about: an act, or a space for which no act is to blame. */
export interface Subject {
  readonly act: string | null;
  readonly space: string;
}

/** How one act, or one space, stands in a plan at its cautious end. */
export interface Standing {
  readonly word: DecisionWord;
  readonly hits: readonly Hit[];
  readonly evaluation: Evaluation;
}

/** Works out the part of a plan that one subject can concern, and picks what it is to blame for. */
export function standing(plan: PlanFile, subject: Subject, context: EvaluationContext): Standing {
  const { act, space } = subject;
  const part = partialPlan(plan, space, act === null ? [] : [act]);
  const found = evaluation(part, context, () => 'worst');
  const hits = found.hits.filter((hit) =>
    act === null ? hit.space === space : hit.acts.includes(act),
  );
  return { word: worstWord(hits.map(({ word }) => word)), hits, evaluation: found };
}
