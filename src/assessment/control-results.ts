import type { AssessmentData } from './assessment-data.js';
import type { ControlResult, HoldTime, LeastControls } from './assessment.js';
import type { Control } from './catalogue-types.js';
import { isCredited, planWithOnly, type ControlSources } from './controlled-plan.js';
import { controlWords, offeredWords } from './control-words.js';
import type { EvaluationContext } from './evaluation.js';
import { levelFigure } from './figures.js';
import { numberOfHit, zoneTitle } from './governing.js';
import { leastControls } from './least-controls.js';
import { offeredNumbers } from './offered-numbers.js';
import type { ChosenControl, PlanFile } from './plan-file.js';
import type { ResolvedPlan } from './resolved-plan.js';
import { quickly, standing } from './standing.js';
import { targetNumber, type TriedControls } from './suggested-controls.js';

/** What every row of controls is written from. */
export interface ControlContext {
  readonly filed: PlanFile;
  readonly resolved: ResolvedPlan;
  readonly holds: readonly HoldTime[];
  readonly data: AssessmentData;
  readonly sources: ControlSources;
  readonly evaluation: EvaluationContext;
}

const termsOf = (control: Control, credited: boolean): string => {
  if (!control.credit) return control.noCreditBecause ?? '';
  if (!credited) {
    return 'It changes nothing in this plan as stated: a number or a place is missing, or there is nothing for it to act on.';
  }
  return control.creditOnlyIf ?? '';
};

function rowOf(
  control: Control,
  choice: ChosenControl,
  credited: boolean,
  plan: PlanFile,
): Omit<ControlResult, 'chosen' | 'words' | 'before' | 'after' | 'rank' | 'wordAlone'> {
  return {
    id: control.id,
    title: control.title,
    level: control.level,
    act: choice.act ?? null,
    credited,
    terms: termsOf(control, credited),
    burden: control.burden,
    ...controlWords(control, choice, plan),
    choice,
  };
}

/** The controls that a plan has chosen, each worked out by itself on what it governs. */
export function chosenControls(
  chosen: readonly ChosenControl[],
  governing: TriedControls | null,
  { filed, sources, evaluation }: ControlContext,
): readonly ControlResult[] {
  const quick = { ...evaluation, answers: quickly(evaluation.answers) };
  return chosen.flatMap((choice): ControlResult[] => {
    const control = sources.controls.find(({ id }) => id === choice.control);
    if (!control) return [];
    const credited = isCredited(filed, choice, sources);
    const row = { ...rowOf(control, choice, credited, filed), chosen: true, rank: null };
    const words = choice.note ?? control.text;
    if (!credited || !governing)
      return [{ ...row, words, before: null, after: null, wordAlone: null }];
    const { subject, target, asFiled } = governing;
    const alone = standing(planWithOnly(filed, [choice], sources), subject, quick);
    return [
      {
        ...row,
        words,
        before: targetNumber(target, asFiled).figure,
        after: targetNumber(target, alone).figure,
        wordAlone: alone.word,
      },
    ];
  });
}

/** A control that moves the deciding number by less than this share is no suggestion. */
const leastEffect = 0.01;

/** What was tried and not chosen and does something, best first for each act or space. */
export function suggestedRows(
  found: readonly TriedControls[],
  { filed }: ControlContext,
): readonly ControlResult[] {
  return found.flatMap(({ subject, target, asFiled, tried }) => {
    const most = (1 - leastEffect) * targetNumber(target, asFiled).spent;
    return tried
      .filter(({ spent, word }) => spent <= most || word !== asFiled.word)
      .map(({ control, choice, word, before, after }, index) => ({
        ...rowOf(control, choice, true, filed),
        act: subject.act,
        chosen: false,
        words: control.text,
        before,
        after,
        rank: index + 1,
        wordAlone: word,
      }));
  });
}

/** What the demonstration of each act offers beyond what was chosen or tried. */
export function offeredControls(
  told: readonly ControlResult[],
  { filed, resolved, holds, data }: ControlContext,
): readonly ControlResult[] {
  return filed.acts.flatMap((act) => {
    const demonstration = data.catalogue.demonstrations.find(({ id }) => id === act.catalogueId);
    const settled = resolved.acts.find(({ id }) => id === act.id);
    const numbers = settled ? offeredNumbers(settled, resolved, holds) : {};
    return (demonstration?.controls ?? []).flatMap((row): ControlResult[] => {
      const control = data.catalogue.controls.find(({ id }) => id === row.control);
      const isTold = told.some(
        ({ id, act: of }) => id === row.control && (of === null || of === act.id),
      );
      if (!control || isTold) return [];
      const choice = { control: control.id, act: act.id };
      return [
        {
          ...rowOf(control, choice, false, filed),
          terms: control.credit ? (control.creditOnlyIf ?? '') : (control.noCreditBecause ?? ''),
          chosen: false,
          words: offeredWords(row.text, numbers),
          before: null,
          after: null,
          rank: null,
          wordAlone: null,
        },
      ];
    });
  });
}

/** The least set of controls for each act or space that a number refuses. */
export function leastControlSets(
  found: readonly TriedControls[],
  { filed, resolved, sources, evaluation }: ControlContext,
  nameOf: (gas: string) => string,
): readonly LeastControls[] {
  return found
    .filter(({ asFiled }) => asFiled.word === 'noGo')
    .map((tried): LeastControls => {
      const { subject, asFiled } = tried;
      const {
        chosen,
        standing: reached,
        isReached,
      } = leastControls(filed, tried, evaluation, sources);
      const title =
        resolved.acts.find(({ id }) => id === subject.act)?.title ??
        resolved.spaces.find(({ id }) => id === subject.space)?.title ??
        subject.space;
      const refusedNumbers = asFiled.hits.filter(
        ({ word, outcome }) => word === 'noGo' && outcome !== null,
      );
      return {
        act: subject.act,
        space: subject.space,
        title,
        isReached,
        wordAsFiled: asFiled.word,
        word: reached.word,
        burden: chosen.reduce((sum, { control }) => sum + control.burden, 0),
        controls: chosen.map(({ control, choice }) => ({
          title: control.title,
          burden: control.burden,
          ...controlWords(control, choice, filed),
          choice,
        })),
        numbers: refusedNumbers.flatMap((hit) => {
          const number = numberOfHit(hit, asFiled.evaluation, nameOf);
          if (!number || !hit.outcome) return [];
          return [
            {
              zone: number.zone,
              zoneTitle: zoneTitle(hit.outcome),
              quantity: number.quantity,
              answer: number.answer,
              caseName: number.caseName,
              before: number.figure,
              after: targetNumber(hit, reached).figure,
              limit: levelFigure(hit.outcome.level, hit.level),
            },
          ];
        }),
      };
    });
}
