import { InvalidInput } from '../errors.js';
import { airGasTable } from '../science/room-air/air-gases.js';
import { oxygenPartialPressure, vapourPressure } from '../science/room-air/water-vapour.js';
import { airAnswers } from './air-answers.js';
import type {
  ActResult,
  Assessment,
  Condition,
  DayEvent,
  DecisionPair,
  DecisionWord,
  ReleaseLine,
  StatedAssumption,
} from './assessment.js';
import type { AssessmentData } from './assessment-data.js';
import type { Control, RulePack } from './catalogue-types.js';
import { conditionsOf } from './conditions.js';
import { requireContainers } from './container-problems.js';
import {
  chosenControls,
  leastControlSets,
  offeredControls,
  suggestedRows,
  type ControlContext,
} from './control-results.js';
import { controlSubjects, enoughShare } from './control-subjects.js';
import { controlWords } from './control-words.js';
import { controlledPlan, filedPlan, isCredited, type ControlSources } from './controlled-plan.js';
import {
  decisionRows,
  rowsAboutKnowledge,
  worseWord,
  worstWord,
  type Hit,
} from './decision-table.js';
import type { Evaluation } from './evaluation.js';
import { freshAirOf, plainFigure, sourceText } from './figures.js';
import { planFindings } from './findings.js';
import { governingOf, gravestHit, zoneTitle } from './governing.js';
import { driverResults, samplingOf } from './driver-results.js';
import { holdTimes } from './hold-times.js';
import { atNineDigits, canonicalHash } from './input-hash.js';
import { knowledge, type Knowledge } from './knowledge.js';
import { largestAmounts } from './largest-amounts.js';
import { planFileSchema, type ChosenControl, type PlanFile } from './plan-file.js';
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
import { sensitivityRows } from './sensitivity.js';
import { soundResults } from './sound-results.js';
import { suggestedControls } from './suggested-controls.js';
import { zoneResults } from './zone-results.js';

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

/** Chosen controls that the numbers with controls rest on. */
function creditedControls(plan: PlanFile, filed: PlanFile, sources: ControlSources) {
  return (plan.controls ?? []).flatMap((chosen) => {
    const control = sources.controls.find((candidate) => candidate.id === chosen.control);
    return control && isCredited(filed, chosen, sources) ? [{ control, chosen }] : [];
  });
}

/** A control as a condition: what is done, and what must be shown before it counts. */
function controlText(control: Control, chosen: ChosenControl, plan: PlanFile): string {
  const { steps } = controlWords(control, chosen, plan);
  const done = steps.length > 1 ? steps.map((step, i) => `${String(i + 1)}. ${step}`) : steps;
  return [`${control.title}:`, ...done, control.creditOnlyIf, chosen.note]
    .filter((part) => part !== undefined)
    .join(' ');
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
  const sources: ControlSources = { controls: data.catalogue.controls, gases: data.gases };
  const filed = filedPlan(plan, sources);
  const credited = creditedControls(plan, filed, sources);
  const asFiled = knowledge(filed, context, true);
  const controlled =
    credited.length === 0 ? asFiled : knowledge(controlledPlan(plan, sources), context, false);
  const { shown } = asFiled;
  const { resolved, reader } = shown;

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
    text: controlText(control, chosen, filed),
    checklistLine: controlWords(control, chosen, filed).checklistLine,
    blocksStart: true,
  }));
  const largest = largestAmounts(shown, answers);
  const controlContext: ControlContext = {
    filed,
    resolved,
    holds,
    data,
    sources,
    evaluation: context,
  };
  const tried = controlSubjects(shown).flatMap((subject) => {
    const catalogueId = plan.acts.find(({ id }) => id === subject.act)?.catalogueId;
    const released = resolved.acts
      .filter(({ id }) => id === subject.act)
      .flatMap((act) => act.planned.flatMap(({ composition }) => Object.keys(composition)));
    const facts = {
      enoughShare: enoughShare(subject.act, sound, largest),
      otherGases: (
        data.catalogue.demonstrations.find(({ id }) => id === catalogueId)?.gases ?? []
      ).filter((gas) => !released.includes(gas)),
    };
    return suggestedControls(filed, subject, facts, context, sources) ?? [];
  });
  const told = [
    ...chosenControls(plan.controls ?? [], tried[0] ?? null, controlContext),
    ...suggestedRows(tried, controlContext),
  ];
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
    largestAmounts: largest,
    holdTimes: holds,
    questionsThatDecide: asFiled.questions,
    controls: [...told, ...offeredControls(told, controlContext)],
    leastControls: leastControlSets(tried, controlContext, nameOf),
    sensitivity: sensitivityRows(filed, credited, context, sources, nameOf),
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
