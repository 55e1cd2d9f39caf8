import { decisionOrder, type Answer, type CaseName, type DecisionWord } from './assessment.js';
import type { LevelName } from './levels.js';
import { fleeingFrom } from './slip-outcomes.js';
import type { AnswerOutcome, ZoneOutcome } from './zone-outcomes.js';

/** What the table looks at. All of it computed; nothing is decided elsewhere. */
export interface DecisionFacts {
  readonly planned: readonly ZoneOutcome[];
  readonly fansOff: readonly ZoneOutcome[];
  readonly worst: readonly WorstCase[];
  /** Refusals and releases without lawful authority, by act. */
  readonly refused: readonly {
    readonly act: string;
    readonly space: string;
    readonly reason: string;
  }[];
  /** Stores, lifts and vehicles whose straight displacement fails the limit. */
  readonly places: readonly PlaceFailure[];
  /** True when no figure the result rests on was measured, drawn or supplied. */
  readonly onlyAssumed: boolean;
  /** Zones with a meter that can see the quantity at that height. */
  readonly meterFits: (outcome: ZoneOutcome) => boolean;
  readonly escapeTimeS: number | null;
  /** Time to Never must be at least this many times the practised escape time. */
  readonly escapeTimeFactor: number;
  /** Acts whose gas stands behind an outcome at a moment. */
  readonly culprits: (outcome: ZoneOutcome, answer: Answer) => readonly string[];
}

export interface WorstCase {
  /** Acts whose slip it is: none for a container that no act uses. */
  readonly acts: readonly string[];
  readonly title: string;
  /** When the first gas of the slip comes out. */
  readonly startS: number;
  readonly outcomes: readonly ZoneOutcome[];
}

export interface PlaceFailure {
  /** Id of a space, or of a leg of transport. */
  readonly place: string;
  /** Every act that uses the container. */
  readonly acts: readonly string[];
  readonly reason: string;
}

/** One row that fired, and for whom. */
export interface Hit {
  readonly row: number;
  readonly word: DecisionWord;
  readonly acts: readonly string[];
  readonly outcome: ZoneOutcome | null;
  /** Where it is, when it is in a space of the venue. */
  readonly space: string | null;
  readonly answer: Answer;
  readonly level: LevelName;
  readonly caseName: CaseName;
  readonly reason: HitReason;
  readonly detail: string;
}

export type HitReason =
  | 'refused'
  | 'placeFails'
  | 'mixedPastAim'
  | 'layeredPastLimit'
  | 'layeredPastNever'
  | 'medianPastAim'
  | 'layeredPastAim'
  | 'noMeter'
  | 'boundPastLimit'
  | 'boundPastNever'
  | 'floorPastNever'
  | 'worstMixedPastLimit'
  | 'worstNeverTooSoon'
  | 'worstNeverInTime'
  | 'worstPastLimit'
  | 'fansOffPastNever'
  | 'fansOffPastLimit'
  | 'onlyAssumed';

export interface DecisionRow {
  readonly row: number;
  /** The test as printed in the workings. */
  readonly test: string;
  readonly hits: (facts: DecisionFacts) => readonly Hit[];
}

const answerOf = (outcome: ZoneOutcome, answer: Answer): AnswerOutcome | null =>
  outcome.answers[answer] ?? null;

const failsAt = (outcome: ZoneOutcome, answer: Answer, level: LevelName): boolean =>
  answerOf(outcome, answer)?.fails[level] ?? false;

/** The layered answer; where no layer model has run, the well-mixed one stands for it. */
const layeredOf = (outcome: ZoneOutcome): Answer => (outcome.answers.layered ? 'layered' : 'mixed');
const medianOf = (outcome: ZoneOutcome): Answer =>
  outcome.answers.layeredP50 ? 'layeredP50' : 'mixed';

/** Outcomes that every row judges: declared heights, and 0.2 m where toddlers are. */
const declared = (outcomes: readonly ZoneOutcome[]) =>
  outcomes.filter((outcome) => outcome.judgedFully);
const atFloor = (outcomes: readonly ZoneOutcome[]) =>
  outcomes.filter((outcome) => outcome.floorCheck);

function hit(
  row: number,
  word: DecisionWord,
  facts: DecisionFacts,
  outcome: ZoneOutcome,
  answer: Answer,
  level: LevelName,
  reason: HitReason,
  acts: readonly string[] = facts.culprits(outcome, answer),
): Hit {
  return {
    row,
    word,
    acts,
    outcome,
    space: outcome.group.space,
    answer,
    level,
    caseName: outcome.caseName,
    reason,
    detail: '',
  };
}

const worstDeclared = (facts: DecisionFacts) =>
  facts.worst.flatMap((one) => declared(one.outcomes).map((outcome) => ({ ...one, outcome })));

/** The rows of the table in their order. The worst word of all that fire is the decision. */
export const decisionRows: readonly DecisionRow[] = [
  {
    row: 1,
    test: 'refused, unlawful without authority, a person riding with cold stock, or a store, lift or vehicle whose mixed value fails the limit',
    hits: (facts) => [
      ...facts.refused.map(({ act, space, reason }): Hit => ({
        row: 1,
        word: 'noGo',
        acts: [act],
        outcome: null,
        space,
        answer: 'mixed',
        level: 'limit',
        caseName: 'planned',
        reason: 'refused',
        detail: reason,
      })),
      ...facts.places.map(({ place, acts, reason }): Hit => ({
        row: 1,
        word: 'noGo',
        acts,
        outcome: null,
        space: place,
        answer: 'mixed',
        level: 'limit',
        caseName: 'worstCredible',
        reason: 'placeFails',
        detail: reason,
      })),
    ],
  },
  {
    row: 2,
    // A short peak can pass never and still meet a limit that is a mean over 15 minutes.
    test: 'planned: mixed fails the aim, or layered fails the limit or never, or the layered median fails the aim, in an occupied zone',
    hits: (facts) =>
      declared(facts.planned).flatMap((outcome) => {
        if (failsAt(outcome, 'mixed', 'aim')) {
          return [hit(2, 'noGo', facts, outcome, 'mixed', 'aim', 'mixedPastAim')];
        }
        if (failsAt(outcome, layeredOf(outcome), 'limit')) {
          const answer = layeredOf(outcome);
          return [hit(2, 'noGo', facts, outcome, answer, 'limit', 'layeredPastLimit')];
        }
        if (failsAt(outcome, layeredOf(outcome), 'never')) {
          const answer = layeredOf(outcome);
          return [hit(2, 'noGo', facts, outcome, answer, 'never', 'layeredPastNever')];
        }
        if (failsAt(outcome, medianOf(outcome), 'aim')) {
          return [hit(2, 'noGo', facts, outcome, medianOf(outcome), 'aim', 'medianPastAim')];
        }
        return [];
      }),
  },
  {
    row: 3,
    test: 'planned: layered fails the aim but meets limit and never, and the median meets the aim',
    hits: (facts) =>
      declared(facts.planned)
        .filter(
          (outcome) =>
            failsAt(outcome, layeredOf(outcome), 'aim') &&
            !failsAt(outcome, layeredOf(outcome), 'limit') &&
            !failsAt(outcome, layeredOf(outcome), 'never') &&
            !failsAt(outcome, medianOf(outcome), 'aim') &&
            !failsAt(outcome, 'mixed', 'aim'),
        )
        .map((outcome) =>
          facts.meterFits(outcome)
            ? hit(3, 'goWithConditions', facts, outcome, 'layered', 'aim', 'layeredPastAim')
            : hit(3, 'noGo', facts, outcome, 'layered', 'aim', 'noMeter'),
        ),
  },
  {
    row: 4,
    // A layer between aim and limit earns the meter of row 3 and is not spared the bound.
    test: 'planned: layered meets the limit, the bound fails the limit',
    hits: (facts) =>
      declared(facts.planned)
        .filter((outcome) => !failsAt(outcome, layeredOf(outcome), 'limit'))
        .flatMap((outcome) => {
          if (failsAt(outcome, 'bound', 'never')) {
            return [hit(4, 'goWithConditions', facts, outcome, 'bound', 'never', 'boundPastNever')];
          }
          if (failsAt(outcome, 'bound', 'limit')) {
            return [hit(4, 'goWithConditions', facts, outcome, 'bound', 'limit', 'boundPastLimit')];
          }
          return [];
        }),
  },
  {
    row: 5,
    test: '0.2 m above a floor: layered or bound fails never, planned or worst credible',
    hits: (facts) =>
      [
        ...atFloor(facts.planned).map((outcome) => ({ outcome, acts: undefined })),
        ...facts.worst.flatMap((one) =>
          atFloor(one.outcomes).map((outcome) => ({ outcome, acts: one.acts })),
        ),
      ].flatMap(({ outcome, acts }) => {
        const failed = [layeredOf(outcome), 'bound' as const].find((answer) =>
          failsAt(outcome, answer, 'never'),
        );
        if (!failed) return [];
        return [
          hit(5, 'goWithConditions', facts, outcome, failed, 'never', 'floorPastNever', acts),
        ];
      }),
  },
  {
    row: 6,
    test: 'worst credible: mixed fails the limit in an occupied space',
    hits: (facts) =>
      worstDeclared(facts)
        .filter(({ outcome }) => failsAt(outcome, 'mixed', 'limit'))
        .map(({ outcome, acts }) =>
          hit(6, 'noGo', facts, outcome, 'mixed', 'limit', 'worstMixedPastLimit', acts),
        ),
  },
  {
    row: 7,
    test: 'worst credible: layered fails never at a declared height; compared with twice the practised escape time',
    hits: (facts) =>
      worstDeclared(facts)
        .filter(({ outcome }) => failsAt(outcome, layeredOf(outcome), 'never'))
        .flatMap(({ outcome, acts, startS }) => {
          const past = fleeingFrom(outcome, 'never', startS);
          if (past === null) return [];
          const inTime =
            facts.escapeTimeS !== null &&
            past - startS >= facts.escapeTimeFactor * facts.escapeTimeS;
          const answer = layeredOf(outcome);
          return [
            inTime
              ? hit(
                  7,
                  'goWithConditions',
                  facts,
                  outcome,
                  answer,
                  'never',
                  'worstNeverInTime',
                  acts,
                )
              : hit(7, 'noGo', facts, outcome, answer, 'never', 'worstNeverTooSoon', acts),
          ];
        }),
  },
  {
    row: 8,
    test: 'worst credible: layered fails only the limit, or the bound fails never only',
    hits: (facts) =>
      worstDeclared(facts)
        .filter(
          ({ outcome }) =>
            !failsAt(outcome, layeredOf(outcome), 'never') &&
            (failsAt(outcome, layeredOf(outcome), 'limit') || failsAt(outcome, 'bound', 'never')),
        )
        .map(({ outcome, acts }) => {
          const answer = failsAt(outcome, layeredOf(outcome), 'limit')
            ? layeredOf(outcome)
            : 'bound';
          const level = answer === 'bound' ? 'never' : 'limit';
          return hit(8, 'goWithConditions', facts, outcome, answer, level, 'worstPastLimit', acts);
        }),
  },
  {
    row: 9,
    test: 'planned with fans off: mixed fails never, or the limit',
    hits: (facts) =>
      declared(facts.fansOff).flatMap((outcome) => {
        if (failsAt(outcome, 'mixed', 'never')) {
          return [hit(9, 'noGo', facts, outcome, 'mixed', 'never', 'fansOffPastNever')];
        }
        if (failsAt(outcome, 'mixed', 'limit')) {
          return [hit(9, 'goWithConditions', facts, outcome, 'mixed', 'limit', 'fansOffPastLimit')];
        }
        return [];
      }),
  },
];

/** Rows 10 and 11 look at the whole and are settled after the others. */
export const rowsAboutKnowledge = [
  {
    row: 10,
    test: 'an input unknown or ranged: its credible worst and best give different words',
  },
  { row: 11, test: 'only assumed inputs, otherwise Go' },
  { row: 12, test: 'none of these' },
] as const;

/** The worse of two words. */
export function worseWord(a: DecisionWord, b: DecisionWord): DecisionWord {
  return decisionOrder.indexOf(a) >= decisionOrder.indexOf(b) ? a : b;
}

export function worstWord(words: readonly DecisionWord[]): DecisionWord {
  return words.reduce<DecisionWord>(worseWord, 'go');
}

/** Every hit of rows 1 to 9, and of row 11 where nothing else spoke. */
export function decisionHits(facts: DecisionFacts): readonly Hit[] {
  const hits = decisionRows.flatMap((row) => row.hits(facts));
  if (hits.length === 0 && facts.onlyAssumed) {
    return [
      {
        row: 11,
        word: 'goWithConditions',
        acts: [],
        outcome: null,
        space: null,
        answer: 'mixed',
        level: 'aim',
        caseName: 'planned',
        reason: 'onlyAssumed',
        detail: '',
      },
    ];
  }
  return hits;
}
