import type { AirGasTable } from '../science/room-air/air-gases.js';
import type { AssessmentData } from './assessment-data.js';
import type { DecidingQuestion, DecisionWord } from './assessment.js';
import type { RulePack } from './catalogue-types.js';
import { worseWord } from './decision-table.js';
import { evaluation, type Evaluation } from './evaluation.js';
import { plainFigure } from './figures.js';
import type { PlanFile } from './plan-file.js';
import type { OpenFigure } from './plan-reader.js';

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
const halvings = 7;

function question(
  figure: OpenFigure,
  worst: Evaluation,
  evaluate: (endOf: (path: string) => number | 'worst' | 'best') => DecisionWord,
): DecidingQuestion | null {
  const aloneBest = evaluate((path) => (path === figure.path ? 'best' : 'worst'));
  if (aloneBest === worst.word) return null;
  const [bad, good] =
    figure.worse === 'low' ? [figure.low, figure.high] : [figure.high, figure.low];
  let failing = bad;
  let sufficing = good;
  for (let i = 0; i < halvings; i += 1) {
    const middle = (failing + sufficing) / 2;
    const word = evaluate((path) => (path === figure.path ? middle : 'worst'));
    if (word === aloneBest) sufficing = middle;
    else failing = middle;
  }
  return {
    path: figure.path,
    question: `What is the ${figure.name}? Somewhere between ${String(figure.low)} and ${String(figure.high)} ${figure.unit} is assumed.`,
    wordAtBest: aloneBest,
    wordAtWorst: worst.word,
    suffices: plainFigure(sufficing, figure.unit === 'm3/s' ? 'm3PerS' : 'ratio', {
      method: `${figure.name} that would be enough, in ${figure.unit === '' ? 'its own unit' : figure.unit}`,
      formula: 'halving between the worst and the best credible value',
      source: 'own-derivation',
    }),
  };
}

/** The plan with one open figure replaced by a number. */
function withFigure(plan: PlanFile, path: string, value: number): PlanFile {
  const copy = structuredClone(plan) as unknown;
  const keys = path.split('/').slice(1);
  const last = keys.pop();
  let at = copy as Record<string, unknown>;
  for (const key of keys) at = at[key] as Record<string, unknown>;
  if (last !== undefined) at[last] = { value, origin: 'supplied' };
  return copy as PlanFile;
}

/** Row 10 of the table: runs the credible worst and best of everything left open. */
export function knowledge(
  plan: PlanFile,
  data: AssessmentData,
  pack: RulePack,
  gases: AirGasTable,
  withQuestions: boolean,
): Knowledge {
  const worst = evaluation(plan, data, pack, gases, () => 'worst');
  const open = [...worst.reader.open.values()];
  const unknown = open.filter((figure) => figure.kind === 'unknown');
  if (open.length === 0) {
    return {
      word: worst.word,
      hasUnknown: false,
      wordAtWorst: worst.word,
      wordAtBest: worst.word,
      shown: worst,
      questions: [],
    };
  }
  const best = evaluation(plan, data, pack, gases, () => 'best');
  const same = best.word === worst.word;
  const atBestConditions: DecisionWord =
    unknown.length > 0 ? worseWord(worst.word, 'goWithConditions') : worst.word;
  const evaluate = (endOf: (path: string) => number | 'worst' | 'best'): DecisionWord => {
    const fixed = open.find((figure) => typeof endOf(figure.path) === 'number');
    const value = fixed ? endOf(fixed.path) : null;
    const changed = fixed && typeof value === 'number' ? withFigure(plan, fixed.path, value) : plan;
    return evaluation(changed, data, pack, gases, (path) => {
      const end = endOf(path);
      return end === 'best' ? 'best' : 'worst';
    }).word;
  };
  return {
    word: same ? atBestConditions : 'notEnoughKnown',
    hasUnknown: unknown.length > 0,
    wordAtWorst: worst.word,
    wordAtBest: best.word,
    shown: worst,
    questions:
      withQuestions && !same
        ? open.flatMap((figure) => question(figure, worst, evaluate) ?? [])
        : [],
  };
}
