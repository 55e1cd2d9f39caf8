import type { AirResult } from '../science/room-air/air-result.js';
import { actsBehind } from './act-attribution.js';
import type { AirAnswers } from './air-answers.js';
import {
  airCase,
  coldWindow,
  dayWindow,
  idleReleases,
  plannedReleases,
  worstWindow,
  type AirCase,
  type DayWindow,
  type PlacedRelease,
} from './air-case.js';
import type { DecisionWord, Refusal } from './assessment.js';
import type { FactValues } from './condition-holds.js';
import type { AssessmentData } from './assessment-data.js';
import type { RulePack } from './catalogue-types.js';
import {
  decisionHits,
  worstWord,
  type DecisionFacts,
  type Hit,
  type PlaceFailure,
} from './decision-table.js';
import { judgedLevels, type JudgedLevel } from './levels.js';
import { meterFits } from './meter-fits.js';
import { placeFailures } from './place-failures.js';
import type { PlanFile } from './plan-file.js';
import { planFacts, releasableGases } from './plan-facts.js';
import { planReader, type End, type PlanReader } from './plan-reader.js';
import { policyDefault } from './policy-rows.js';
import { planRefusals } from './refusals.js';
import { resolvedPlan } from './resolve.js';
import type { ResolvedGroup, ResolvedPlan } from './resolved-plan.js';
import { slipOutcomes } from './slip-outcomes.js';
import { worstReleases, type WorstRelease } from './worst-releases.js';
import { zoneOutcomes, type ZoneOutcome } from './zone-outcomes.js';

/** One thing that goes wrong, with the air that follows. */
export interface WorstCase extends WorstRelease {
  readonly air: AirCase;
  readonly result: AirResult;
  readonly outcomes: readonly ZoneOutcome[];
}

/**
 * Draws of the planned day: every run of the same plan takes the same. Enough for a 95 % quantile
 * between ranks 117 and 126 of 128; more would keep a person waiting for digits that nobody has.
 */
const sampling = { samples: 128, seed: 20 } as const;

/** A plan worked through once, at chosen ends of its open figures. */
export interface Evaluation {
  readonly plan: PlanFile;
  readonly reader: PlanReader;
  readonly resolved: ResolvedPlan;
  readonly dayAir: AirCase;
  /** Everything let out on the planned day, idle loss of cold stock included. */
  readonly dayReleases: readonly PlacedRelease[];
  readonly dayResult: AirResult;
  readonly planned: readonly ZoneOutcome[];
  readonly fansOff: readonly ZoneOutcome[];
  readonly worst: readonly WorstCase[];
  readonly places: readonly PlaceFailure[];
  readonly facts: FactValues;
  readonly refusals: readonly Refusal[];
  readonly hits: readonly Hit[];
  readonly word: DecisionWord;
  readonly levelsOf: (group: ResolvedGroup) => readonly JudgedLevel[];
}

function outcomesOf(
  air: AirCase,
  answers: AirAnswers,
  caseName: 'planned' | 'fansOff' | 'worstCredible',
  resolved: ResolvedPlan,
  levelsOf: Evaluation['levelsOf'],
): readonly ZoneOutcome[] {
  // With fans off the table looks at mixed air alone.
  const full = answers(air.input, caseName === 'fansOff' ? 'mixed' : 'full');
  const straight = answers(air.input, 'straight');
  return zoneOutcomes(air, full, straight, caseName, resolved.groups, levelsOf);
}

/** Of two runs of the same zones, outcome by outcome the one whose mixed value is worse. */
function worseOutcomes(
  one: readonly ZoneOutcome[],
  other: readonly ZoneOutcome[],
): readonly ZoneOutcome[] {
  return one.map((outcome, index) => {
    const second = other[index];
    const a = outcome.answers.mixed?.value;
    const b = second?.answers.mixed?.value;
    if (!second || a === undefined || b === undefined) return outcome;
    const isWorse = outcome.level.failsWhen === 'below' ? b < a : b > a;
    return isWorse ? second : outcome;
  });
}

/**
 * The planned day with nothing running, and where plant recirculates also with no fresh air in it.
 * Cold stock that stays is followed, still with nothing running, until it is all gas.
 */
function fansOffOutcomes(
  resolved: ResolvedPlan,
  releases: readonly PlacedRelease[],
  day: DayWindow,
  planned: readonly ZoneOutcome[],
  outcomes: (air: AirCase) => readonly ZoneOutcome[],
): readonly ZoneOutcome[] {
  const ofDay = fansOffDay(resolved, releases, day, planned, outcomes);
  const window = coldWindow(resolved, day);
  if (window.endS <= day.endS) return ofDay;
  const untilGone = [...idleReleases(resolved, window), ...plannedReleases(resolved)];
  return worseOutcomes(ofDay, outcomes(airCase(resolved, untilGone, window, 'fansOff'))).map(
    (outcome) => ({ ...outcome, caseName: 'fansOff' as const }),
  );
}

function fansOffDay(
  resolved: ResolvedPlan,
  releases: readonly PlacedRelease[],
  day: DayWindow,
  planned: readonly ZoneOutcome[],
  outcomes: (air: AirCase) => readonly ZoneOutcome[],
): readonly ZoneOutcome[] {
  if (resolved.airSystems.length === 0 && resolved.transfers.length === 0) {
    return planned.map((outcome) => ({ ...outcome, caseName: 'fansOff' as const }));
  }
  const still = outcomes(airCase(resolved, releases, day, 'fansOff'));
  const recirculates = resolved.airSystems.some((system) => system.recirculatedM3PerS > 0);
  return recirculates
    ? worseOutcomes(still, outcomes(airCase(resolved, releases, day, 'airReturned')))
    : still;
}

/** Whether everything the air depends on is assumed: nobody measured, drew or supplied a figure. */
function restsOnAssumptions(reader: PlanReader, resolved: ResolvedPlan): boolean {
  const spaces = new Set(resolved.acts.map((act) => act.space));
  const deciding = [...reader.origins].filter(([path]) => {
    const index = /^\/venue\/spaces\/(\d+)\/(volumeM3|floorAreaM2|heightM)$/.exec(path)?.[1];
    if (index !== undefined) return spaces.has(resolved.spaces[Number(index)]?.id ?? '');
    return path.startsWith('/venue/airSystems/') || path.includes('airChangesPerHour');
  });
  return deciding.every(([, origin]) => origin === 'assumed' || origin === 'unknown');
}

/** What an evaluation draws on besides the plan. */
export interface EvaluationContext {
  readonly data: AssessmentData;
  readonly pack: RulePack;
  readonly answers: AirAnswers;
}

/**
 * Works a plan through: planned day, planned day with fans off, every worst credible release, and
 * the table from numbers to a word.
 */
export function evaluation(
  plan: PlanFile,
  { data, pack, answers }: EvaluationContext,
  endOf: (path: string) => End,
): Evaluation {
  const { policy, commonRules, demonstrations } = data.catalogue;
  const reader = planReader(endOf);
  const resolved = resolvedPlan(plan, {
    reader,
    gases: data.gases,
    policy,
    controls: data.catalogue.controls,
  });
  const released = releasableGases(plan);
  const { houseRules, region } = plan.venue.site;
  const context = { policy, pack, common: commonRules, houseRules, region };
  const knowsGas = (gas: string) => gas in data.gases.species;
  const levels = {
    public: judgedLevels(context, released, 'public', knowsGas),
    crew: judgedLevels(context, released, 'crew', knowsGas),
  };
  const levelsOf = (group: ResolvedGroup) => levels[group.kind];

  const day = dayWindow(resolved);
  const idle = idleReleases(resolved, day);
  const dayReleases = [...idle, ...plannedReleases(resolved)];
  const plannedAir = airCase(resolved, dayReleases, day, 'planned');
  const dayAir = { ...plannedAir, input: { ...plannedAir.input, uncertainty: sampling } };
  const dayResult = answers(dayAir.input, 'full');
  const planned = outcomesOf(dayAir, answers, 'planned', resolved, levelsOf);
  const fansOff = fansOffOutcomes(resolved, dayReleases, day, planned, (air) =>
    outcomesOf(air, answers, 'fansOff', resolved, levelsOf),
  );

  const worst = worstReleases(resolved, policy).map((one) => {
    // The show stops at the slip: what was let out before it is in the air, its own act included.
    const before = dayReleases.filter(({ startS }) => startS < one.startS);
    const window = worstWindow(day, one.startS);
    const air = airCase(resolved, [...before, ...one.placed], window, 'planned');
    const outcomes = outcomesOf(air, answers, 'worstCredible', resolved, levelsOf);
    return { ...one, air, result: answers(air.input, 'full'), outcomes };
  });

  const places = placeFailures(plan, resolved, levels.crew);
  const facts = planFacts(plan, resolved);
  const refusals = planRefusals(plan, {
    policy,
    pack,
    demonstrations,
    gases: data.gases,
    facts,
  });
  const spaceOf = (act: string) => resolved.acts.find((one) => one.id === act)?.space ?? '';
  const decisionFacts: DecisionFacts = {
    planned,
    fansOff,
    worst: worst.map((one) => ({ ...one, outcomes: slipOutcomes(one, { resolved }) })),
    refused: refusals.map(({ act, reason }) => ({ act, space: spaceOf(act), reason })),
    places,
    onlyAssumed: restsOnAssumptions(reader, resolved),
    meterFits: (outcome) => meterFits(plan, outcome, policy, facts),
    escapeTimeS: resolved.escapeTimeS,
    escapeTimeFactor: policyDefault(policy, 'escapeTimeFactor').value,
    culprits: (outcome, answer) =>
      actsBehind(outcome, outcome.answers[answer]?.atS ?? 0, dayReleases, resolved),
  };
  const hits = decisionHits(decisionFacts);
  return {
    plan,
    reader,
    resolved,
    dayAir,
    dayReleases,
    dayResult,
    planned,
    fansOff,
    worst,
    places,
    facts,
    refusals,
    hits,
    word: worstWord(hits.map((hit) => hit.word)),
    levelsOf,
  };
}
