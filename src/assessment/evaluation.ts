import { InvalidInput } from '../errors.js';
import type { AirGasTable } from '../science/room-air/air-gases.js';
import type { AirResult } from '../science/room-air/air-result.js';
import { airRun } from '../science/room-air/air-run.js';
import { actsBehind } from './act-attribution.js';
import { airCase, dayWindow, plannedReleases, worstWindow, type AirCase } from './air-case.js';
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
import { worstReleases, type WorstRelease } from './worst-releases.js';
import { zoneOutcomes, type ZoneOutcome } from './zone-outcomes.js';

/** A plan worked through once, at chosen ends of its open figures. */
export interface Evaluation {
  readonly plan: PlanFile;
  readonly reader: PlanReader;
  readonly resolved: ResolvedPlan;
  readonly dayAir: AirCase;
  readonly dayResult: AirResult;
  readonly planned: readonly ZoneOutcome[];
  readonly fansOff: readonly ZoneOutcome[];
  readonly worst: readonly (WorstRelease & { readonly outcomes: readonly ZoneOutcome[] })[];
  readonly places: readonly PlaceFailure[];
  readonly facts: FactValues;
  readonly refusals: readonly Refusal[];
  readonly hits: readonly Hit[];
  readonly word: DecisionWord;
  readonly levelsOf: (group: ResolvedGroup) => readonly JudgedLevel[];
}

/** The air model on one case; what it refuses is told with the place in the plan. */
function airAnswer(air: AirCase, gases: AirGasTable, displacement?: 'straight'): AirResult {
  try {
    return airRun(air.input, gases, displacement ? { displacement } : {});
  } catch (thrown) {
    if (!(thrown instanceof InvalidInput)) throw thrown;
    const details = thrown.details.map(({ path, problem }) => ({ path: `/venue${path}`, problem }));
    const [first] = details;
    throw new InvalidInput(
      first
        ? `The venue does not hold together at ${first.path}: ${first.problem}.`
        : thrown.message,
      thrown.hint,
      details,
    );
  }
}

function outcomesOf(
  air: AirCase,
  exact: AirResult,
  gases: AirGasTable,
  caseName: 'planned' | 'fansOff' | 'worstCredible',
  resolved: ResolvedPlan,
  levelsOf: Evaluation['levelsOf'],
): readonly ZoneOutcome[] {
  const straight = airAnswer(air, gases, 'straight');
  return zoneOutcomes(air, exact, straight, caseName, resolved.groups, levelsOf);
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

/**
 * Works a plan through: planned day, planned day with fans off, every worst credible release, and
 * the table from numbers to a word.
 */
export function evaluation(
  plan: PlanFile,
  data: AssessmentData,
  pack: RulePack,
  gases: AirGasTable,
  endOf: (path: string) => End,
): Evaluation {
  const { policy, commonRules } = data.catalogue;
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
  const levels = {
    public: judgedLevels(context, released, 'public'),
    crew: judgedLevels(context, released, 'crew'),
  };
  const levelsOf = (group: ResolvedGroup) => levels[group.kind];

  const day = dayWindow(resolved);
  const dayReleases = plannedReleases(resolved);
  const dayAir = airCase(resolved, dayReleases, day, false);
  const dayResult = airAnswer(dayAir, gases);
  const planned = outcomesOf(dayAir, dayResult, gases, 'planned', resolved, levelsOf);

  const hasFans = resolved.airSystems.length > 0;
  const stillAir = airCase(resolved, dayReleases, day, true);
  const fansOff = hasFans
    ? outcomesOf(stillAir, airAnswer(stillAir, gases), gases, 'fansOff', resolved, levelsOf)
    : planned.map((outcome) => ({ ...outcome, caseName: 'fansOff' as const }));

  const worst = worstReleases(resolved, policy).map((one) => {
    const before = dayReleases.filter(
      ({ release, startS }) => startS < one.startS && release.act !== one.act,
    );
    const air = airCase(resolved, [...before, ...one.placed], worstWindow(day, one.startS), false);
    const outcomes = outcomesOf(
      air,
      airAnswer(air, gases),
      gases,
      'worstCredible',
      resolved,
      levelsOf,
    );
    return { ...one, outcomes };
  });

  const places = placeFailures(plan, resolved, levels.crew);
  const facts = planFacts(plan, resolved);
  const refusals = planRefusals(plan, policy, pack, facts);
  const decisionFacts: DecisionFacts = {
    planned,
    fansOff,
    worst,
    refused: refusals.map(({ act, reason }) => ({ act, reason })),
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
