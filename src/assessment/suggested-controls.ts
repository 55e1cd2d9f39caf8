import type { DecisionWord, Figure } from './assessment.js';
import { controlCandidates, type CandidateFacts } from './control-candidates.js';
import type { Control } from './catalogue-types.js';
import { isCredited, planWithOnly, type ControlSources } from './controlled-plan.js';
import type { Hit } from './decision-table.js';
import type { EvaluationContext } from './evaluation.js';
import { statisticFigure } from './figures.js';
import { gravestNumber } from './governing.js';
import { sharingAir } from './partial-plan.js';
import type { ChosenControl, PlanFile } from './plan-file.js';
import { spentShare } from './spent-share.js';
import { quickly, standing, type Standing, type Subject } from './standing.js';
import type { ZoneOutcome } from './zone-outcomes.js';

/** One control tried by itself on one subject. */
export interface TriedControl {
  readonly control: Control;
  readonly choice: ChosenControl;
  readonly word: DecisionWord;
  readonly before: Figure | null;
  /** Null where nobody is left in the zone. */
  readonly after: Figure | null;
  /** The governing number with it, from fresh air (0) to its level (1); 0 where nobody is left. */
  readonly spent: number;
  readonly standing: Standing;
}

export interface TriedControls {
  readonly subject: Subject;
  readonly asFiled: Standing;
  /** The number that decides the subject as filed. */
  readonly target: Hit;
  /** Best first. */
  readonly tried: readonly TriedControl[];
}

/** The outcome of a standing that answers to a hit of another: same zone, height, quantity and case. */
function sameOutcome(target: Hit, { evaluation }: Standing): ZoneOutcome | null {
  const { outcome, caseName, answer, level } = target;
  if (!outcome) return null;
  const pool =
    caseName === 'planned'
      ? evaluation.planned
      : caseName === 'fansOff'
        ? evaluation.fansOff
        : evaluation.worst.flatMap(({ outcomes }) => outcomes);
  return pool
    .filter(
      (one) =>
        one.zone === outcome.zone &&
        one.floorCheck === outcome.floorCheck &&
        one.level.quantity === outcome.level.quantity,
    )
    .reduce<ZoneOutcome | null>(
      (worst, one) =>
        worst === null || spentShare(one, answer, level) > spentShare(worst, answer, level)
          ? one
          : worst,
      null,
    );
}

/** The number of a target in a standing, beside how far it has gone. */
export function targetNumber(
  target: Hit,
  found: Standing,
): { readonly figure: Figure | null; readonly spent: number } {
  const outcome = sameOutcome(target, found);
  if (!outcome) return { figure: null, spent: 0 };
  return {
    figure: statisticFigure(outcome, target.answer, target.level, found.evaluation.resolved),
    spent: spentShare(outcome, target.answer, target.level),
  };
}

/**
 * Every control that could help a subject, each tried by itself on the plan as filed, ranked by what
 * it does to the number that decides there. Null where no number decides.
 */
export function suggestedControls(
  filed: PlanFile,
  subject: Subject,
  facts: Pick<CandidateFacts, 'otherGases' | 'enoughShare'>,
  context: EvaluationContext,
  sources: ControlSources,
): TriedControls | null {
  const quick: EvaluationContext = { ...context, answers: quickly(context.answers) };
  const asFiled = standing(filed, subject, quick);
  const target = gravestNumber(asFiled.hits);
  // What is refused for another reason than its numbers no control of the air brings back.
  const isRefused = asFiled.hits.some(({ reason }) => reason === 'refused');
  if (target?.word !== asFiled.word || isRefused) {
    return null;
  }
  const before = targetNumber(target, asFiled);
  const candidates = controlCandidates(sources.controls, {
    ...facts,
    plan: filed,
    subject,
    hits: asFiled.hits.filter(({ word }) => word === target.word),
    gases: sources.gases,
    spaces: sharingAir(filed, subject.space),
  });
  const tried = candidates.flatMap(({ control, choice }): TriedControl[] => {
    if (!isCredited(filed, choice, sources)) return [];
    const found = standing(planWithOnly(filed, [choice], sources), subject, quick);
    const { figure, spent } = targetNumber(target, found);
    return [
      {
        control,
        choice,
        word: found.word,
        before: before.figure,
        after: figure,
        spent,
        standing: found,
      },
    ];
  });
  return {
    subject,
    asFiled,
    target,
    tried: tried.toSorted(
      (one, other) => one.spent - other.spent || one.control.burden - other.control.burden,
    ),
  };
}
