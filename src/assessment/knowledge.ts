import type { DecidingQuestion, DecisionWord, Figure, FigureUnit } from './assessment.js';
import { worseWord, worstWord } from './decision-table.js';
import { evaluation, type Evaluation, type EvaluationContext } from './evaluation.js';
import { plainFigure } from './figures.js';
import type { PlanFile } from './plan-file.js';
import type { End, OpenFigure } from './plan-reader.js';

/** The word at both ends of what is not known, and what would settle it. */
export interface Knowledge {
  readonly word: DecisionWord;
  readonly hasUnknown: boolean;
  readonly wordAtWorst: DecisionWord;
  readonly wordAtBest: DecisionWord;
  /** The evaluation whose numbers are shown: at the cautious end. */
  readonly shown: Evaluation;
  readonly questions: readonly DecidingQuestion[];
}

/** Halvings when looking for the value that would suffice. */
const halvings = 5;
/** More questions than this are asked without a value that would suffice. */
const mostSearched = 4;

const unitOfSymbol: Readonly<Record<string, FigureUnit>> = {
  'm3/s': 'm3PerS',
  '1/h': 'perHour',
  m: 'm',
  m2: 'm2',
  m3: 'm3',
  s: 's',
  K: 'K',
  Pa: 'Pa',
  kg: 'kg',
  mol: 'mol',
  people: 'people',
  '': 'ratio',
};

const threeDigits = (value: number): string => String(Number(value.toPrecision(3)));

/** A value at three digits, moved towards the good end and never past it. */
function towards(value: number, good: number): number {
  if (value === 0 || value === good) return value;
  const step = 10 ** (Math.floor(Math.log10(Math.abs(value))) - 2);
  const steps = value / step;
  const moved = (good > value ? Math.ceil(steps - 1e-9) : Math.floor(steps + 1e-9)) * step;
  const tidy = Number(moved.toPrecision(3));
  return good > value ? Math.min(tidy, good) : Math.max(tidy, good);
}

/** The plan with one open figure replaced by a number. */
function withFigure(plan: PlanFile, path: string, value: number): PlanFile {
  const copy = structuredClone(plan) as unknown;
  const keys = path.split('/').slice(1);
  const last = keys.pop();
  let at = copy as Record<string, unknown>;
  for (const key of keys) at = at[key] as Record<string, unknown>;
  if (last !== undefined) at[last] = { value, origin: 'measured' };
  return copy as PlanFile;
}

/** The least answer that would be enough with everything else at its worst. */
function sufficing(figure: OpenFigure, isEnough: (value: number) => boolean): Figure {
  const [bad, good] =
    figure.worse === 'high' ? [figure.high, figure.low] : [figure.low, figure.high];
  let failing = bad;
  let enough = good;
  for (let i = 0; i < halvings; i += 1) {
    const middle = (failing + enough) / 2;
    if (isEnough(middle)) enough = middle;
    else failing = middle;
  }
  return plainFigure(towards(enough, good), unitOfSymbol[figure.unit] ?? 'ratio', {
    method: `${figure.name} that would be enough`,
    formula: 'halving between the worst and the best credible value, rounded to the safe side',
    source: 'own-derivation',
  });
}

function questionsOf(
  plan: PlanFile,
  context: EvaluationContext,
  open: readonly OpenFigure[],
  worst: Evaluation,
  wordAtBest: DecisionWord,
): readonly DecidingQuestion[] {
  const asked = (figure: OpenFigure, best: DecisionWord, suffices: Figure | null) => ({
    path: figure.path,
    question:
      `What is the ${figure.name}? Somewhere between ${threeDigits(figure.low)} and ${threeDigits(figure.high)} ${figure.unit} is assumed.`.replace(
        '  ',
        ' ',
      ),
    wordAtBest: best,
    wordAtWorst: worst.word,
    suffices,
  });
  const worstButFor = (figure: OpenFigure) => (path: string) =>
    path === figure.path ? 'best' : 'worst';
  const alone = open.flatMap((figure) => {
    const word = evaluation(plan, context, worstButFor(figure)).word;
    return word === worst.word ? [] : [{ figure, word }];
  });
  // No single answer settles it: all of them are needed together.
  if (alone.length === 0) return open.map((figure) => asked(figure, wordAtBest, null));
  return alone.map(({ figure, word }, index) =>
    asked(
      figure,
      word,
      index < mostSearched
        ? sufficing(
            figure,
            (value) =>
              evaluation(withFigure(plan, figure.path, value), context, () => 'worst').word ===
              word,
          )
        : null,
    ),
  );
}

/**
 * Row 10 of the table: runs the credible worst and best of everything left open. A figure that is
 * worse for one space at its low end and for the next at its high end is run at both.
 */
export function knowledge(
  plan: PlanFile,
  context: EvaluationContext,
  withQuestions: boolean,
): Knowledge {
  const atLow = evaluation(plan, context, () => 'worst');
  const open = [...atLow.reader.open.values()];
  if (open.length === 0) {
    return {
      word: atLow.word,
      hasUnknown: false,
      wordAtWorst: atLow.word,
      wordAtBest: atLow.word,
      shown: atLow,
      questions: [],
    };
  }
  const cutsBothWays = new Set(
    open.filter((figure) => figure.worse === 'either').map((figure) => figure.path),
  );
  const runs = (others: End): readonly Evaluation[] =>
    cutsBothWays.size === 0
      ? [evaluation(plan, context, () => others)]
      : (['worst', 'best'] as const).map((end) =>
          evaluation(plan, context, (path) => (cutsBothWays.has(path) ? end : others)),
        );
  const atWorst = runs('worst');
  const wordAtWorst = worstWord(atWorst.map((one) => one.word));
  const shown = atWorst.find((one) => one.word === wordAtWorst) ?? atLow;
  const bestWords = runs('best').map((one) => one.word);
  const wordAtBest = bestWords.reduce((best, word) =>
    worseWord(best, word) === best ? word : best,
  );
  const same = [...atWorst.map((one) => one.word), ...bestWords].every(
    (word) => word === wordAtWorst,
  );
  const hasUnknown = open.some((figure) => figure.kind === 'unknown');
  return {
    word: same ? worseWord(wordAtWorst, hasUnknown ? 'goWithConditions' : 'go') : 'notEnoughKnown',
    hasUnknown,
    wordAtWorst,
    wordAtBest,
    shown,
    questions: withQuestions && !same ? questionsOf(plan, context, open, shown, wordAtBest) : [],
  };
}
