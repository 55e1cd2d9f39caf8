import { connectedSpaces } from './act-attribution.js';
import type { AirAnswers } from './air-answers.js';
import { airCase, type AirCase } from './air-case.js';
import type { Answer, LargestAmount } from './assessment.js';
import type { Evaluation } from './evaluation.js';
import { plainFigure } from './figures.js';
import type { LevelName } from './levels.js';
import type { ResolvedAct } from './resolved-plan.js';
import { spentShare } from './spent-share.js';
import { zoneOutcomes, type ZoneOutcome } from './zone-outcomes.js';

/** An act is never scaled up beyond this many times what is planned. */
const largestFactor = 100;
/** Halvings of the whole answer, once the mixed one has given a first guess. */
const halvings = 4;
/** Whole answers asked to confirm what the search found, each time for half as much. */
const confirmations = 4;
/** Corrections of the guess by the mixed answer alone. */
const corrections = 2;

/** The tests of row 2 that an outcome fails, each as answer and level. */
function failedTests({ answers }: ZoneOutcome): readonly (readonly [Answer, LevelName])[] {
  const tests = [
    ['mixed', 'aim'],
    ['layered', 'limit'],
    ['layered', 'never'],
    ['layeredP50', 'aim'],
  ] as const;
  return tests.filter(([answer, level]) => answers[answer]?.fails[level] ?? false);
}

/**
 * Of the outcomes, in spaces that the gas of an act can reach, that fail row 2 of the table the one
 * that is furthest past its level.
 */
const failingIn =
  (reached: ReadonlySet<string>) =>
  (outcomes: readonly ZoneOutcome[]): ZoneOutcome | null =>
    outcomes
      .filter(({ judgedFully, group }) => judgedFully && reached.has(group.space))
      .flatMap((outcome) =>
        failedTests(outcome).map(([answer, level]) => ({
          outcome,
          spent: spentShare(outcome, answer, level),
        })),
      )
      .reduce<{ outcome: ZoneOutcome; spent: number } | null>(
        (worst, one) => (worst === null || one.spent > worst.spent ? one : worst),
        null,
      )?.outcome ?? null;

/**
 * Where the aim would be met exactly, were the mixed answer a straight line through two amounts [-].
 * Straight displacement is linear in the amount up to where the worst moment changes.
 */
function lineCrossing(
  at: readonly [number, readonly ZoneOutcome[]],
  to: readonly [number, readonly ZoneOutcome[]],
  reached: ReadonlySet<string>,
): number {
  const [from, first] = at;
  const [until, second] = to;
  return first.reduce((least, outcome, index) => {
    const { level, judgedFully } = outcome;
    const { statistic, value: aim } = level.aim;
    const a = outcome.answers.mixed?.statistics[statistic];
    const b = second[index]?.answers.mixed?.statistics[statistic];
    if (!judgedFully || !reached.has(outcome.group.space)) return least;
    if (a === undefined || b === undefined) return least;
    const slope = (b - a) / (until - from);
    const worsens = level.failsWhen === 'below' ? slope < 0 : slope > 0;
    return worsens ? Math.min(least, from + (aim - a) / slope) : least;
  }, Infinity);
}

/** Three significant digits, downwards: a printed largest amount is never above the true one. */
function roundedDown(value: number): number {
  if (value <= 0) return 0;
  // Beyond nine digits lies the noise of binary fractions, which must not cost a whole step.
  const settled = Number(value.toPrecision(9));
  const step = 10 ** (Math.floor(Math.log10(settled)) - 2);
  return Number((Math.floor(settled / step + 1e-6) * step).toPrecision(3));
}

interface Search {
  readonly factor: number;
  readonly blocker: ZoneOutcome | null;
  readonly failsWithoutAct: boolean;
  /** True where the bound fails the limit and no layer was worked out. */
  readonly restsOnMixedAir: boolean;
}

function search(evaluation: Evaluation, act: string, answers: AirAnswers): Search {
  const { resolved, dayAir, dayReleases, levelsOf, planned } = evaluation;
  const caseAt = (factor: number): AirCase => {
    const releases = dayReleases.map((placed) =>
      placed.release.act === act
        ? {
            ...placed,
            release: { ...placed.release, amountMol: placed.release.amountMol * factor },
          }
        : placed,
    );
    // No gas at all is no release; the air model takes amounts above nothing.
    const some = releases.filter((placed) => placed.release.amountMol > 0);
    return airCase(resolved, some, dayAir.window, 'planned');
  };
  const outcomesAt = (factor: number, form: 'full' | 'quick' | 'straight') => {
    const air = caseAt(factor);
    const straight = answers(air.input, 'straight');
    const full = form === 'straight' ? straight : answers(air.input, form);
    return zoneOutcomes(air, full, straight, 'planned', resolved.groups, levelsOf);
  };

  const sources = dayReleases.filter((placed) => placed.release.act === act);
  const reached = new Set(
    sources.flatMap(({ release }) => [...connectedSpaces(resolved, release.space)]),
  );
  const failing = failingIn(reached);
  const withoutAct = failing(outcomesAt(0, 'quick'));
  if (withoutAct)
    return { factor: 0, blocker: withoutAct, failsWithoutAct: true, restsOnMixedAir: false };

  // Where no layer was worked out and the bound fails the limit already, mixed air alone never
  // speaks for more than what is planned.
  const restsOnMixedAir = planned.some(
    ({ judgedFully, group, answers: found }) =>
      judgedFully &&
      reached.has(group.space) &&
      !found.layered &&
      (found.bound?.fails.limit ?? false),
  );
  const most = restsOnMixedAir ? 1 : largestFactor;
  const none = outcomesAt(0, 'straight');
  let guess = Math.min(most, lineCrossing([0, none], [1, planned], reached));
  for (let i = 0; i < corrections; i += 1) {
    const there = outcomesAt(guess, 'straight');
    const passes = !there.some(
      ({ judgedFully, group, answers: found }) =>
        judgedFully && reached.has(group.space) && (found.mixed?.fails.aim ?? false),
    );
    if (passes) break;
    const corrected = lineCrossing([0, none], [guess, there], reached);
    guess = Math.min(0.999 * guess, corrected);
  }

  const plannedBlocker = failing(planned);
  let low = plannedBlocker ? 0 : 1;
  let high = Math.max(low, guess);
  let blocker = failing(outcomesAt(high, 'quick')) ?? failing(outcomesAt(high, 'full'));
  if (!blocker) {
    const isWhole = high >= most;
    return {
      factor: high,
      blocker: isWhole
        ? null
        : (failing(outcomesAt(high * 1.01 + 1e-9, 'straight')) ?? plannedBlocker),
      failsWithoutAct: false,
      restsOnMixedAir,
    };
  }
  for (let i = 0; i < halvings; i += 1) {
    const middle = (low + high) / 2;
    const failed = failing(outcomesAt(middle, 'quick'));
    if (failed) {
      high = middle;
      blocker = failed;
    } else low = middle;
  }
  // What the usual layered run passes must pass those without any mixing too.
  for (let i = 0; i < confirmations && low > 0; i += 1) {
    const failed = failing(outcomesAt(low, 'full'));
    if (!failed) return { factor: low, blocker, failsWithoutAct: false, restsOnMixedAir };
    blocker = failed;
    low = i + 1 < confirmations ? low / 2 : 0;
  }
  return { factor: low, blocker, failsWithoutAct: false, restsOnMixedAir };
}

/**
 * The largest amount of each act that still passes row 2 of the table, the other acts as planned.
 *
 * A first guess comes from the mixed answer, which is a straight line in the amount; the usual layered
 * run then halves the way to what passes, and the runs without any mixing confirm it. Gas added never helps, so what passes at an
 * amount passes below it.
 */
export function largestAmounts(
  evaluation: Evaluation,
  answers: AirAnswers,
): readonly LargestAmount[] {
  const { resolved } = evaluation;
  const letsGasOut = (act: ResolvedAct) =>
    act.planned.some((release) => !release.burned && release.amountMol > 0);
  return resolved.acts.filter(letsGasOut).map((act): LargestAmount => {
    const { factor, blocker, failsWithoutAct, restsOnMixedAir } = search(
      evaluation,
      act.id,
      answers,
    );
    const released = act.planned.filter((release) => !release.burned);
    const massKg = released.reduce((sum, release) => sum + release.massKg, 0);
    const mol = released.reduce((sum, release) => sum + release.amountMol, 0);
    const words = {
      method: 'largest amount that passes row 2, other acts as planned; rounded down',
      formula: 'planned amount times the largest factor that meets aim and limit',
      source: 'own-derivation',
      range: restsOnMixedAir
        ? 'mixed air only; the bound fails the limit where gas can lie, so no more than planned is offered'
        : blocker
          ? 'for this room, these people and this air only'
          : 'no failure found up to 100 times the planned amount',
      inputs: [{ name: 'factor on the planned amount', value: factor, unit: '' }],
    };
    const gasNames = new Set(released.flatMap((release) => Object.keys(release.composition)));
    const level = blocker?.level.title;
    return {
      act: act.id,
      gas: [...gasNames].join(', '),
      zone: blocker?.group.title ?? '',
      limitedBy:
        level === undefined
          ? restsOnMixedAir
            ? 'what is planned; the bound fails the limit'
            : 'no level reached'
          : failsWithoutAct
            ? `${level}: fails without this act already`
            : level,
      mass: plainFigure(roundedDown(massKg * factor), 'kg', words),
      volume: plainFigure(
        roundedDown(mol * factor * resolved.site.molarVolumeM3PerMol),
        'm3',
        words,
      ),
      planned: plainFigure(massKg, 'kg', {
        method: 'as planned for one showing',
        formula: 'sum of the planned releases of the act',
        source: 'plan',
      }),
    };
  });
}
