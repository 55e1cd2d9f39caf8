import { InvalidInput } from '../errors.js';
import { airGasTable } from '../science/room-air/air-gases.js';
import { oxygenPartialPressure, vapourPressure } from '../science/room-air/water-vapour.js';
import { airAnswers } from './air-answers.js';
import type {
  ActResult,
  Assessment,
  Condition,
  ControlResult,
  DayEvent,
  DecisionPair,
  DecisionWord,
  Figure,
  Governing,
  ReleaseLine,
  StatedAssumption,
} from './assessment.js';
import type { AssessmentData } from './assessment-data.js';
import type { RulePack } from './catalogue-types.js';
import { conditionsOf, hitReason } from './conditions.js';
import { requireContainers } from './container-problems.js';
import { controlledPlan, isCredited } from './controlled-plan.js';
import {
  decisionRows,
  rowsAboutKnowledge,
  worseWord,
  worstWord,
  type Hit,
} from './decision-table.js';
import type { Evaluation } from './evaluation.js';
import { freshAirOf, levelFigure, statisticFigure, plainFigure, sourceText } from './figures.js';
import { planFindings } from './findings.js';
import { driverResults, samplingOf } from './driver-results.js';
import { holdTimes } from './hold-times.js';
import { atNineDigits, canonicalHash } from './input-hash.js';
import { knowledge, type Knowledge } from './knowledge.js';
import { largestAmounts } from './largest-amounts.js';
import { planFileSchema, type PlanFile } from './plan-file.js';
import { requireReferences } from './plan-references.js';
import { quantityWords } from './quantity-words.js';
import type { ResolvedRelease } from './resolved-plan.js';
import { cautionsFor, rulesCited } from './rules-cited.js';
import { fitting } from './schema-check.js';
import { sectionView } from './section-view.js';
import { escapeFindings } from './escape-findings.js';
import { leastFreshAir } from './least-fresh-air.js';
import { meterFindings } from './meter-findings.js';
import { repeatsPerDay } from './repeats-per-day.js';
import { exposureFindings } from './exposure-findings.js';
import { holdFindings } from './plausibility-findings.js';
import { pressureFindings } from './pressure-findings.js';
import { streamFindings } from './stream-findings.js';
import { stopReading } from './stop-reading.js';
import { spentShare } from './spent-share.js';
import { soundResults } from './sound-results.js';
import { zoneResults } from './zone-results.js';
import type { ZoneOutcome } from './zone-outcomes.js';

export type { AssessmentData } from './assessment-data.js';

const freshOxygen = 0.2095;

/** The rule pack that a plan names, or the international one where it names none. */
function packOf(plan: PlanFile, data: AssessmentData): RulePack {
  const wanted = plan.venue.site.rulePack ?? 'international';
  const pack = data.catalogue.rulePacks.find((candidate) => candidate.id === wanted);
  if (!pack) {
    const known = data.catalogue.rulePacks.map((candidate) => candidate.id).join(', ');
    throw new InvalidInput(`There is no rule pack ${wanted}.`, `Choose one of ${known}.`, [
      { path: '/venue/site/rulePack', problem: `must be one of ${known}` },
    ]);
  }
  return pack;
}

/**
 * A plan file, checked for shape and for references that lead nowhere.
 *
 * @throws {InvalidInput} naming every place that is wrong
 */
export function checkedPlan(value: unknown, data: AssessmentData): PlanFile {
  const plan = fitting(planFileSchema, value, 'plan file');
  requireReferences(plan, data.gases);
  return plan;
}

const wordOfHits = (hits: readonly Hit[]): DecisionWord => worstWord(hits.map((hit) => hit.word));

/** The word of a part, given that the whole may not be better than what is known allows. */
function partWord(hits: readonly Hit[], known: Knowledge): DecisionWord {
  const word = wordOfHits(hits);
  return known.hasUnknown ? worseWord(word, 'goWithConditions') : word;
}

/** The gravest hit; of several with the same word and row the one furthest past its level. */
function gravestHit(hits: readonly Hit[]): Hit | null {
  const spent = (hit: Hit) => (hit.outcome ? spentShare(hit.outcome, hit.answer, hit.level) : 0);
  return hits.reduce<Hit | null>((gravest, hit) => {
    if (!gravest) return hit;
    if (hit.word !== gravest.word) {
      return worseWord(hit.word, gravest.word) === hit.word ? hit : gravest;
    }
    return hit.row === gravest.row && spent(hit) > spent(gravest) ? hit : gravest;
  }, null);
}

/** The number nearest to its aim on the planned day: the one to watch where nothing fails. */
function closestToAim(
  { planned, resolved }: Evaluation,
  nameOf: (gas: string) => string,
): Omit<Governing, 'row' | 'reason'> | null {
  const closest = planned
    .filter((outcome) => outcome.judgedFully && outcome.answers.mixed)
    .map((outcome) => ({ outcome, spent: spentShare(outcome, 'mixed', 'aim') }))
    .sort((one, other) => other.spent - one.spent)[0]?.outcome;
  const figure = closest ? statisticFigure(closest, 'mixed', 'aim', resolved) : null;
  if (!closest || !figure) return null;
  return {
    zone: closest.zone,
    zoneTitle: zoneTitle(closest),
    quantity: quantityWords(closest.level, nameOf),
    answer: 'mixed',
    caseName: 'planned',
    figure,
    limit: levelFigure(closest.level, 'aim'),
  };
}

const zoneTitle = ({ floorCheck, group }: ZoneOutcome): string =>
  floorCheck ? `${group.title}, 0.2 m above the floor` : group.title;

function governingOf(known: Knowledge, nameOf: (gas: string) => string): Governing | null {
  const { resolved, hits } = known.shown;
  // A number says more than a refusal of the same gravity, and refusals stand on their own.
  const gravest = gravestHit(hits);
  const numbered = gravestHit(hits.filter((one) => one.outcome !== null));
  const hit = numbered?.word === gravest?.word ? numbered : gravest;
  if (hit?.outcome) {
    const answer = hit.outcome.answers[hit.answer] ? hit.answer : 'mixed';
    const figure = statisticFigure(hit.outcome, answer, hit.level, resolved);
    const limit = levelFigure(hit.outcome.level, hit.level);
    if (!figure) return null;
    return {
      zone: hit.outcome.zone,
      zoneTitle: zoneTitle(hit.outcome),
      quantity: quantityWords(hit.outcome.level, nameOf),
      answer,
      caseName: hit.caseName,
      figure,
      limit,
      row: hit.row,
      reason: hitReason({ ...hit, answer }, figure, limit),
    };
  }
  const closest = closestToAim(known.shown, nameOf);
  if (!closest) return null;
  // What decides is no number of a zone: the number nearest to its aim stands beside the reason.
  if (hit) return { ...closest, row: hit.row, reason: hitReason(hit, null, null) };
  if (known.word !== 'go') {
    return { ...closest, row: 10, reason: 'a figure that nobody knows has to be confirmed' };
  }
  return {
    ...closest,
    row: 12,
    reason: 'every level is met; this number comes closest to its aim',
  };
}

function releaseLine(release: ResolvedRelease, molarVolumeM3PerMol: number): ReleaseLine {
  const words = {
    method: 'as stated in the plan',
    formula: 'mass = amount times molar mass; volume at site pressure and temperature',
    source: 'ideal-gas',
  };
  return {
    title: release.title,
    gas: Object.keys(release.composition).join(', '),
    mass: plainFigure(release.massKg, 'kg', words),
    volume: plainFigure(release.amountMol * molarVolumeM3PerMol, 'm3', words),
    durationS: release.durationS,
  };
}

function actResults(
  asFiled: Knowledge,
  controlled: Knowledge,
  data: AssessmentData,
): readonly ActResult[] {
  const { resolved, hits, plan, worst } = asFiled.shown;
  return resolved.acts.map((act): ActResult => {
    const ofAct = (all: readonly Hit[]) => all.filter((hit) => hit.acts.includes(act.id));
    const demonstration = data.catalogue.demonstrations.find(
      (candidate) => candidate.id === plan.acts.find((stated) => stated.id === act.id)?.catalogueId,
    );
    const cautions = (demonstration?.cautions ?? []).flatMap((id) => {
      const caution = data.catalogue.cautions.find((candidate) => candidate.id === id);
      return caution ? [caution.text] : [];
    });
    const ownWorst = worst
      .filter((one) => one.acts.includes(act.id))
      .flatMap((one) => one.placed.map((placed) => placed.release));
    const line = (release: ResolvedRelease) =>
      releaseLine(release, resolved.site.molarVolumeM3PerMol);
    return {
      id: act.id,
      title: act.title,
      space: act.space,
      spaceTitle: resolved.spaces.find((space) => space.id === act.space)?.title ?? act.space,
      decision: {
        asFiled: partWord(ofAct(hits), asFiled),
        withControls: partWord(ofAct(controlled.shown.hits), controlled),
      },
      planned: act.planned.map(line),
      worstCredible: ownWorst.map(line),
      cautions,
    };
  });
}

/** Words of a control before its numbers are chosen: an open slot is told as such. */
const withoutSlots = (words: string): string =>
  words.replaceAll(/\{[A-Za-z]+\}/g, 'the agreed number of');

function controlResults(
  asFiled: Knowledge,
  controlled: Knowledge,
  data: AssessmentData,
): readonly ControlResult[] {
  const { plan } = asFiled.shown;
  const number = (known: Knowledge): Figure | null => {
    const hit = gravestHit(asFiled.shown.hits.filter((candidate) => candidate.outcome !== null));
    if (!hit?.outcome) return null;
    const target = hit.outcome;
    const pool =
      target.caseName === 'worstCredible'
        ? known.shown.worst.flatMap((one) => one.outcomes)
        : target.caseName === 'fansOff'
          ? known.shown.fansOff
          : known.shown.planned;
    // Of several slips the one that leaves this zone worst off.
    const found = pool
      .filter(
        (outcome) =>
          outcome.zone === target.zone &&
          outcome.floorCheck === target.floorCheck &&
          outcome.level.quantity === target.level.quantity,
      )
      .sort(
        (one, other) =>
          spentShare(other, hit.answer, hit.level) - spentShare(one, hit.answer, hit.level),
      )[0];
    return found ? statisticFigure(found, hit.answer, hit.level, known.shown.resolved) : null;
  };
  const before = number(asFiled);
  const after = number(controlled);
  const chosen = (plan.controls ?? []).flatMap((one): ControlResult[] => {
    const control = data.catalogue.controls.find((candidate) => candidate.id === one.control);
    if (!control) return [];
    const credited = isCredited(control);
    return [
      {
        id: control.id,
        title: control.title,
        level: control.level,
        act: one.act ?? null,
        chosen: true,
        credited,
        words: one.note ?? withoutSlots(control.text),
        before: credited ? before : null,
        after: credited ? after : null,
      },
    ];
  });
  const offered = plan.acts.flatMap((act) => {
    const demonstration = data.catalogue.demonstrations.find(
      (candidate) => candidate.id === act.catalogueId,
    );
    return (demonstration?.controls ?? []).flatMap((row): ControlResult[] => {
      const control = data.catalogue.controls.find((candidate) => candidate.id === row.control);
      const isChosen = chosen.some(
        (one) => one.id === row.control && (one.act === null || one.act === act.id),
      );
      if (!control || isChosen) return [];
      return [
        {
          id: control.id,
          title: control.title,
          level: control.level,
          act: act.id,
          chosen: false,
          credited: false,
          words: withoutSlots(row.text),
          before: null,
          after: null,
        },
      ];
    });
  });
  return [...chosen, ...offered];
}

/** Chosen controls that the numbers with controls rest on. */
function creditedControls(plan: PlanFile, data: AssessmentData) {
  return (plan.controls ?? []).flatMap((chosen) => {
    const control = data.catalogue.controls.find((candidate) => candidate.id === chosen.control);
    return control && isCredited(control) ? [{ control, chosen }] : [];
  });
}

function dayEvents({ resolved }: Evaluation): readonly DayEvent[] {
  const shows = resolved.performances.map((performance, index) => ({
    atS: performance.startS,
    untilS: performance.endS,
    title: `Performance ${String(index + 1)}`,
    act: null,
  }));
  const acts = resolved.acts.flatMap((act) =>
    act.startsS.map((atS) => ({ atS, untilS: atS + act.durationS, title: act.title, act: act.id })),
  );
  return [...shows, ...acts].sort((a, b) => a.atS - b.atS);
}

function assumptionsOf({ reader }: Evaluation): readonly StatedAssumption[] {
  return [...reader.assumed.values()].map((row) => ({
    path: row.path,
    text:
      `${row.name} ${String(Number(row.value.toPrecision(4)))} ${row.unit}`.trim() + `: ${row.why}`,
    figure: null,
    origin: row.origin,
    source: sourceText(row.source),
  }));
}

function climateOf(
  evaluation: Evaluation,
  pack: RulePack,
  gases: AssessmentData['gases'],
): Assessment['climate'] {
  const { resolved, worst } = evaluation;
  const potential = (gas: string) => pack.warmingPotentials.find((row) => row.gas === gas) ?? null;
  const equivalent = (release: ResolvedRelease): number => {
    const parts = Object.entries(release.composition).map(([gas, share]) => ({
      gas,
      kg: share * (gases.species[gas]?.molarMass.molarMassKgPerMol ?? 0),
    }));
    const whole = parts.reduce((total, part) => total + part.kg, 0);
    if (whole === 0) return 0;
    return parts.reduce(
      (total, { gas, kg }) =>
        total + (potential(gas)?.kgCo2ePerKg ?? 0) * release.massKg * (kg / whole),
      0,
    );
  };
  const sum = (releases: readonly ResolvedRelease[], times: number) =>
    releases.reduce((total, release) => total + equivalent(release) * times, 0);
  const planned = resolved.acts.reduce(
    (total, act) =>
      total +
      sum(
        act.planned.filter((release) => !release.burned),
        act.startsS.length,
      ),
    0,
  );
  const lost = Math.max(
    0,
    ...worst.map((one) =>
      sum(
        one.placed.map((placed) => placed.release),
        1,
      ),
    ),
  );
  const first = pack.warmingPotentials[0];
  if (!first || planned + lost === 0) return null;
  const words = {
    method: 'carbon dioxide equivalent over 100 years',
    formula: 'mass times global warming potential, summed',
    source: first.instrument,
  };
  return {
    instrument: `${first.instrument}, ${first.edition}`,
    planned: plainFigure(planned, 'kgCO2e', words),
    worstCredible: plainFigure(lost, 'kgCO2e', words),
  };
}

function tableOf(hits: readonly Hit[], known: Knowledge): Assessment['decisionTable'] {
  const title = (hit: Hit) => (hit.outcome ? zoneTitle(hit.outcome) : hit.detail);
  const rows = decisionRows.map(({ row, test }) => {
    const fired = hits.filter((hit) => hit.row === row);
    return {
      row,
      test,
      word: fired.length > 0 ? wordOfHits(fired) : null,
      fired: fired.length > 0,
      where: [...new Set(fired.map(title))].join('; '),
    };
  });
  const differs = known.wordAtBest !== known.wordAtWorst;
  const last = rowsAboutKnowledge.map(({ row, test }) => {
    const fired =
      row === 10
        ? differs || known.hasUnknown
        : row === 11
          ? hits.some((hit) => hit.row === 11)
          : hits.length === 0 && !known.hasUnknown;
    const word = row === 10 ? known.word : row === 11 ? 'goWithConditions' : 'go';
    return { row, test, word: fired ? word : null, fired, where: '' } as const;
  });
  return [...rows, ...last];
}

/**
 * One plan judged: numbers, bounds, levels, the word, and what it rests on.
 *
 * Pure: the same plan, data and engine give the same value to the last digit.
 *
 * @throws {InvalidInput | OutOfRange} naming what in the plan cannot be used
 */
export function assess(plan: PlanFile, data: AssessmentData): Assessment {
  requireReferences(plan, data.gases);
  requireContainers(plan, {
    gases: data.gases,
    policy: data.catalogue.policy,
    controls: data.catalogue.controls,
  });
  const pack = packOf(plan, data);
  const nameOf = (gas: string) => data.gases.species[gas]?.name.toLowerCase() ?? gas;

  const answers = airAnswers(airGasTable(data.gases));
  const context = { data, pack, answers };
  const asFiled = knowledge(plan, context, true);
  const withControls = controlledPlan(plan, data.catalogue.controls);
  const controlled = withControls === plan ? asFiled : knowledge(withControls, context, false);
  const { shown } = asFiled;
  const { resolved, reader } = shown;

  const credited = creditedControls(plan, data);
  // What a control earned holds only while the control does: it is a condition of the word.
  const decision: DecisionPair = {
    asFiled: asFiled.word,
    withControls:
      asFiled.word !== 'go' && credited.length > 0
        ? worseWord(controlled.word, 'goWithConditions')
        : controlled.word,
  };
  const governing = governingOf(asFiled, nameOf);
  const lowest = Math.min(
    1,
    ...shown.planned
      .filter((outcome) => outcome.level.quantity === 'oxygenFraction' && !outcome.floorCheck)
      .map((outcome) => outcome.answers.mixed?.value ?? 1),
  );
  const facts = {
    ...shown.facts,
    lowestOxygenFraction: lowest,
    residualRisk: decision.withControls !== 'go',
  };
  const sound = soundResults(plan, {
    gases: data.gases,
    policy: data.catalogue.policy,
    site: resolved.site,
    reader,
  });
  const spaceTitle = (id: string) => resolved.spaces.find((space) => space.id === id)?.title ?? id;
  const siteWords = {
    method: 'as stated, or the standard atmosphere at the altitude',
    formula: 'p = 101325 (1 - 2.25577e-5 h)^5.25588',
    source: 'iso-2533',
  };
  const unknownConditions = [...reader.open.values()]
    .filter((figure) => figure.kind === 'unknown')
    .map((figure) => ({ figure, space: statedPlace(figure.path, plan) }));

  const holds = holdTimes(shown, answers, data.catalogue.policy);
  const conditions = conditionsOf(controlled.shown.hits, {
    quantity: (hit) => (hit.outcome ? quantityWords(hit.outcome.level, nameOf) : ''),
    space: spaceTitle,
    stop: (hit) =>
      hit.outcome
        ? stopReading(
            controlled.shown.plan,
            hit.outcome,
            data.catalogue.policy,
            controlled.shown.facts,
            controlled.shown.resolved.site,
          )
        : null,
  });
  const controlConditions = credited.map(({ control, chosen }, index): Condition => ({
    number: conditions.length + index + 1,
    row: governing?.row ?? 12,
    act: chosen.act ?? null,
    zone: null,
    text: `${control.title}${chosen.space === undefined ? '' : ` (${spaceTitle(chosen.space)})`}: ${chosen.note ?? control.text}`,
    checklistLine: `${control.title}${chosen.space === undefined ? '' : `, ${spaceTitle(chosen.space)}`}: in place`,
    blocksStart: true,
  }));
  const confirmations =
    decision.withControls === 'goWithConditions'
      ? unknownConditions.map(({ figure, space }, index) => ({
          number: conditions.length + controlConditions.length + index + 1,
          row: 10,
          act: null,
          zone: null,
          text: `Confirm the ${figure.name}${space} before the day; it was not known when this was judged.`,
          checklistLine: `${figure.name}${space} confirmed`,
          blocksStart: true,
        }))
      : [];

  const assessment: Assessment = {
    title: plan.event.title,
    date: plan.event.date ?? null,
    venueTitle: plan.venue.title,
    revision: plan.revision ?? 'A',
    preparedBy: plan.preparedBy ?? '',
    decision,
    governing,
    acts: actResults(asFiled, controlled, data),
    spaces: resolved.spaces.map((space) => ({
      id: space.id,
      title: space.title,
      decision: {
        asFiled: partWord(hitsIn(shown.hits, space.id), asFiled),
        withControls: partWord(hitsIn(controlled.shown.hits, space.id), controlled),
      },
      volume: plainFigure(space.volumeM3, 'm3', {
        method: 'free volume used',
        formula: 'as measured, or area times height less furniture',
        source: 'plan',
      }),
      freshAir: plainFigure(freshAirOf(resolved, space.id), 'm3PerS', {
        method: 'outdoor air credited to this space',
        formula: 'share of each air system times its outdoor air',
        source: 'plan',
      }),
    })),
    conditions: [...conditions, ...controlConditions, ...confirmations],
    findings: [
      ...planFindings(plan, resolved, data.catalogue.policy),
      ...streamFindings(resolved),
      ...pressureFindings(resolved, data.catalogue.policy),
      ...exposureFindings(shown.planned, resolved, pack, nameOf),
      ...holdFindings(holds, resolved),
      ...escapeFindings(shown, data.catalogue.policy, nameOf),
      ...meterFindings(shown, data.catalogue.policy, nameOf),
      ...leastFreshAir(shown, answers, nameOf),
      ...repeatsPerDay(shown, answers, nameOf),
    ],
    refusals: shown.refusals,
    zones: zoneResults(shown, nameOf),
    sound,
    largestAmounts: largestAmounts(shown, answers),
    holdTimes: holds,
    questionsThatDecide: asFiled.questions,
    controls: controlResults(asFiled, controlled, data),
    rulesCited: rulesCited(pack, facts),
    cautions: cautionsFor(data.catalogue.cautions, facts),
    assumptions: assumptionsOf(shown),
    events: dayEvents(shown),
    section: sectionView(shown, drawnMoment(shown), 'when the planned day is at its worst', nameOf),
    drivers: driverResults(shown),
    sampling: samplingOf(shown),
    site: {
      pressure: plainFigure(resolved.site.pressurePa, 'Pa', siteWords),
      temperature: plainFigure(resolved.site.temperatureK, 'K', {
        ...siteWords,
        formula: 'as stated, or the default of the policy',
      }),
      altitude: plainFigure(resolved.site.altitudeM, 'm', siteWords),
      freshAirOxygenPressure: plainFigure(
        oxygenPartialPressure(
          freshOxygen,
          0,
          resolved.site.pressurePa,
          vapourPressure(resolved.site.temperatureK, resolved.site.relativeHumidity),
        ),
        'Pa',
        { ...siteWords, formula: 'p(O2) = 0.2095 (p - water vapour), wet' },
      ),
    },
    carriage: null,
    climate: climateOf(shown, pack, data.gases),
    decisionTable: tableOf(shown.hits, asFiled),
    engineVersion: data.engineVersion,
    inputHash: canonicalHash({
      plan,
      rulePack: pack,
      policy: data.catalogue.policy,
      engineVersion: data.engineVersion,
    }),
  };
  return atNineDigits(assessment);
}

/** The moment of the planned day worth drawing: of the gravest hit, else of the closest number. */
function drawnMoment({ hits, planned, dayAir }: Evaluation): number {
  const hit = gravestHit(hits.filter((one) => one.outcome?.caseName === 'planned'));
  const outcome = hit?.outcome ?? planned[0];
  const answer = hit?.answer ?? 'mixed';
  return outcome?.answers[answer]?.atS ?? outcome?.answers.mixed?.atS ?? dayAir.window.startS;
}

const hitsIn = (hits: readonly Hit[], space: string): readonly Hit[] =>
  hits.filter((hit) => hit.space === space);

/** " of (space)" where a path lies within a space of the venue, else nothing. */
function statedPlace(path: string, plan: PlanFile): string {
  const space = /^\/venue\/spaces\/(\d+)\//.exec(path)?.[1];
  if (space !== undefined) {
    const found = plan.venue.spaces[Number(space)];
    return found ? ` of ${found.title ?? found.id}` : '';
  }
  const system = /^\/venue\/airSystems\/(\d+)\//.exec(path)?.[1];
  if (system !== undefined) {
    const found = plan.venue.airSystems?.[Number(system)];
    return found ? ` of ${found.title ?? found.id ?? 'the air system'}` : '';
  }
  const infiltration = /^\/venue\/infiltration\/(\d+)\//.exec(path)?.[1];
  if (infiltration !== undefined) {
    const found = plan.venue.infiltration?.[Number(infiltration)];
    return found ? ` of ${found.space}` : '';
  }
  return '';
}
