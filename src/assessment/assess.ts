import { InvalidInput } from '../errors.js';
import { airGasTable } from '../science/room-air/air-gases.js';
import type {
  ActResult,
  Assessment,
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
import { controlledPlan, isCredited } from './controlled-plan.js';
import {
  decisionRows,
  rowsAboutKnowledge,
  worseWord,
  worstWord,
  type Hit,
} from './decision-table.js';
import type { Evaluation } from './evaluation.js';
import { freshAirOf, levelFigure, outcomeFigure, plainFigure } from './figures.js';
import { planFindings } from './findings.js';
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
import { soundResults } from './sound-results.js';
import { zoneResults } from './zone-results.js';

export type { AssessmentData } from './assessment-data.js';

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

function gravestHit(hits: readonly Hit[]): Hit | null {
  const order = ['go', 'goWithConditions', 'notEnoughKnown', 'noGo'];
  return hits.reduce<Hit | null>((gravest, hit) => {
    if (!gravest) return hit;
    return order.indexOf(hit.word) > order.indexOf(gravest.word) ? hit : gravest;
  }, null);
}

function governingOf(evaluation: Evaluation, nameOf: (gas: string) => string): Governing | null {
  const { resolved, hits, planned } = evaluation;
  const hit = gravestHit(hits.filter((candidate) => candidate.outcome !== null));
  if (hit?.outcome) {
    const figure =
      outcomeFigure(hit.outcome, hit.answer, resolved) ??
      outcomeFigure(hit.outcome, 'mixed', resolved);
    const limit = levelFigure(hit.outcome.level, hit.level);
    if (!figure) return null;
    return {
      zone: hit.outcome.zone,
      zoneTitle: hit.outcome.floorCheck
        ? `${hit.outcome.group.title}, 0.2 m above the floor`
        : hit.outcome.group.title,
      quantity: quantityWords(hit.outcome.level, nameOf),
      answer: hit.answer,
      caseName: hit.caseName,
      figure,
      limit,
      row: hit.row,
      reason: hitReason(hit, figure, limit),
    };
  }
  // Nothing fails: the number that comes closest to its aim is the one to watch.
  const closest = planned
    .filter((outcome) => !outcome.floorCheck && outcome.answers.mixed)
    .map((outcome) => {
      const value = outcome.answers.mixed?.value ?? 0;
      const fresh = outcome.level.failsWhen === 'below' ? 0.2095 : 0;
      const aim = outcome.level.aim.value;
      return { outcome, used: Math.abs(value - fresh) / Math.abs(aim - fresh) };
    })
    .sort((a, b) => b.used - a.used)[0]?.outcome;
  const figure = closest ? outcomeFigure(closest, 'mixed', resolved) : null;
  if (!closest || !figure) return null;
  return {
    zone: closest.zone,
    zoneTitle: closest.group.title,
    quantity: quantityWords(closest.level, nameOf),
    answer: 'mixed',
    caseName: 'planned',
    figure,
    limit: levelFigure(closest.level, 'aim'),
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
      .filter((one) => one.act === act.id)
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
    const found = pool.find(
      (outcome) =>
        outcome.zone === target.zone &&
        outcome.floorCheck === target.floorCheck &&
        outcome.level.quantity === target.level.quantity,
    );
    return found ? outcomeFigure(found, hit.answer, known.shown.resolved) : null;
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
        words: one.note ?? control.text,
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
          words: row.text,
          before: null,
          after: null,
        },
      ];
    });
  });
  return [...chosen, ...offered];
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
    source: row.source,
  }));
}

function climateOf(evaluation: Evaluation, pack: RulePack): Assessment['climate'] {
  const { resolved, worst } = evaluation;
  const potential = (gas: string) => pack.warmingPotentials.find((row) => row.gas === gas) ?? null;
  const sum = (releases: readonly ResolvedRelease[], times: number) =>
    releases.reduce((total, release) => {
      const gases = Object.keys(release.composition);
      const only = gases.length === 1 ? gases[0] : undefined;
      const row = only === undefined ? null : potential(only);
      return total + (row ? row.kgCo2ePerKg * release.massKg * times : 0);
    }, 0);
  const planned = resolved.acts.reduce(
    (total, act) => total + sum(act.planned, act.startsS.length),
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
  const title = (hit: Hit) => hit.outcome?.group.title ?? hit.detail;
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
  const pack = packOf(plan, data);
  const gases = airGasTable(data.gases);
  const nameOf = (gas: string) => data.gases.species[gas]?.name.toLowerCase() ?? gas;

  const asFiled = knowledge(plan, data, pack, gases, true);
  const withControls = controlledPlan(plan, data.catalogue.controls);
  const controlled =
    withControls === plan ? asFiled : knowledge(withControls, data, pack, gases, false);
  const { shown } = asFiled;
  const { resolved, reader } = shown;

  const decision: DecisionPair = { asFiled: asFiled.word, withControls: controlled.word };
  const governing = governingOf(shown, nameOf);
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
    source: 'standard-atmosphere',
  };
  const unknownConditions = [...reader.open.values()]
    .filter((figure) => figure.kind === 'unknown')
    .map((figure) => ({ figure, space: statedPlace(figure.path, plan) }));

  const conditions = conditionsOf(controlled.shown.hits, {
    quantity: (hit) => (hit.outcome ? quantityWords(hit.outcome.level, nameOf) : ''),
    space: spaceTitle,
  });
  const confirmations =
    decision.withControls === 'goWithConditions'
      ? unknownConditions.map(({ figure, space }, index) => ({
          number: conditions.length + index + 1,
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
    conditions: [...conditions, ...confirmations],
    findings: planFindings(plan, resolved, data.catalogue.policy),
    refusals: shown.refusals,
    zones: zoneResults(shown, nameOf),
    sound,
    largestAmounts: largestAmounts(shown, gases),
    holdTimes: holdTimes(resolved, shown.dayAir, shown.dayResult, gases, data.catalogue.policy),
    questionsThatDecide: asFiled.questions,
    controls: controlResults(asFiled, controlled, data),
    rulesCited: rulesCited(pack, facts),
    cautions: cautionsFor(data.catalogue.cautions, facts),
    assumptions: assumptionsOf(shown),
    events: dayEvents(shown),
    section: sectionView(shown, 'highest well-mixed value of the planned day'),
    site: {
      pressure: plainFigure(resolved.site.pressurePa, 'Pa', siteWords),
      temperature: plainFigure(resolved.site.temperatureK, 'K', {
        ...siteWords,
        formula: 'as stated, or the default of the policy',
      }),
      altitude: plainFigure(resolved.site.altitudeM, 'm', siteWords),
      freshAirOxygenPressure: plainFigure(0.2095 * resolved.site.pressurePa, 'Pa', {
        ...siteWords,
        formula: 'p(O2) = 0.2095 p, dry',
      }),
    },
    carriage: null,
    climate: climateOf(shown, pack),
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

const hitsIn = (hits: readonly Hit[], space: string): readonly Hit[] =>
  hits.filter((hit) => hit.outcome?.group.space === space);

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
