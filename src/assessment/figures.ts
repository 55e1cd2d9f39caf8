import { sources, type Source } from '../science/sources.js';
import type { Answer, Figure, FigureInput, FigureUnit } from './assessment.js';
import type { JudgedLevel, LevelName } from './levels.js';
import type { ResolvedPlan } from './resolved-plan.js';
import type { ZoneOutcome } from './zone-outcomes.js';

/** How an answer is reached: printed wherever one of its figures is opened. */
const methods = {
  mixed: {
    method: 'well-mixed air, straight displacement',
    formula:
      'oxygen = 0.2095 x max(0, 1 - gas volume / air volume), fresh air and breath followed in time',
    source: 'displacement-guidance',
    range:
      'air stirred through the whole space; reads low near a source and above or below a layer',
  },
  layered: {
    method: 'two-layer model, upper end of the band (or well-mixed, if worse)',
    formula: 'layer volume and gas amounts in time, with entrainment, smear, overflow and extract',
    source: 'own-room-air',
    range: 'level layers in a closed space; not inside a jet, a pour or an open vessel',
  },
  layeredP50: {
    method: 'two-layer model, median of the band',
    formula: 'layer volume and gas amounts in time, with entrainment, smear, overflow and extract',
    source: 'own-room-air',
    range: 'level layers in a closed space; not inside a jet, a pour or an open vessel',
  },
  bound: {
    method: 'inventory bound on top of the mixed background',
    formula:
      'gas fraction at the mouth <= gas volume let out / free volume below the mouth (light gas: above it)',
    source: 'own-room-air',
    range:
      'any amount of mixing, level layer over the true floor; not inside a jet, a pour or an open vessel',
  },
} as const satisfies Record<Answer, Pick<Figure, 'method' | 'formula' | 'source' | 'range'>>;

/** A source as people read it: the title behind a key of the bibliography, or the words themselves. */
export function sourceText(source: string): string {
  const known = (sources as Readonly<Record<string, Source | undefined>>)[source];
  return known ? known.title : (plainSources[source] ?? source);
}

const plainSources: Readonly<Record<string, string | undefined>> = {
  plan: 'stated in the plan',
  policy: 'policy of this planner',
  judgement: 'judgement of this planner',
  'plan-default': 'default of this planner where the plan is silent',
};

/** The unit in which a judged quantity is told; too much oxygen is rounded up like any gas. */
export function unitOf(level: JudgedLevel): FigureUnit {
  return level.failsWhen === 'below' ? 'oxygenFraction' : 'gasFraction';
}

function roomInputs(outcome: ZoneOutcome, plan: ResolvedPlan): readonly FigureInput[] {
  const space = plan.spaces.find((candidate) => candidate.id === outcome.group.space);
  const infiltration = plan.infiltration.find((row) => row.space === outcome.group.space);
  const fresh = freshAirOf(plan, outcome.group.space);
  return [
    { name: 'space', value: space?.title ?? outcome.group.space, unit: '' },
    { name: 'free volume', value: space?.volumeM3 ?? 0, unit: 'm3' },
    { name: 'plan area', value: space?.floorAreaM2 ?? 0, unit: 'm2' },
    { name: 'fresh air by air systems', value: fresh, unit: 'm3/s' },
    { name: 'infiltration', value: infiltration?.airChangesPerHour ?? 0, unit: '1/h' },
    { name: 'mouth above floor', value: outcome.heightM, unit: 'm' },
    { name: 'site temperature', value: plan.site.temperatureK, unit: 'K' },
    { name: 'site pressure', value: plan.site.pressurePa, unit: 'Pa' },
  ];
}

/** Outdoor air that the air systems of a plan bring to one space [m3/s]. */
export function freshAirOf(plan: ResolvedPlan, space: string): number {
  return plan.airSystems.reduce((sum, system) => {
    const share = system.serves.find((served) => served.space === space)?.share ?? 0;
    const flow = system.drive === 'balanced' ? (system.supplyM3PerS ?? 0) : system.freshAirM3PerS;
    return sum + share * flow;
  }, 0);
}

/** The worst value of one answer in one zone, or null where that answer was not computed. */
export function outcomeFigure(
  outcome: ZoneOutcome,
  answer: Answer,
  plan: ResolvedPlan,
): Figure | null {
  const found = outcome.answers[answer];
  if (!found) return null;
  return {
    value: found.value * outcome.level.scale,
    unit: unitOf(outcome.level),
    ...methods[answer],
    source: sourceText(methods[answer].source),
    inputs: roomInputs(outcome, plan),
  };
}

/** A statistic of an answer, such as the worst 15-minute mean. */
export function statisticFigure(
  outcome: ZoneOutcome,
  answer: Answer,
  name: LevelName,
  plan: ResolvedPlan,
): Figure | null {
  const { statistic } = outcome.level[name];
  const value = outcome.answers[answer]?.statistics[statistic];
  const base = outcomeFigure(outcome, answer, plan);
  if (value === undefined || !base) return null;
  return {
    ...base,
    value: value * outcome.level.scale,
    method: `${base.method}; ${statisticWords[statistic]}`,
  };
}

/** A level as a figure, with the source that set it. */
export function levelFigure(level: JudgedLevel, name: LevelName): Figure {
  const row = level[name];
  return {
    value: row.value * level.scale,
    unit: unitOf(level),
    method: statisticWords[row.statistic],
    formula: 'the strictest of policy, rule pack and house rules',
    inputs: [{ name: 'checked', value: row.checked, unit: '' }],
    source: row.source,
    range: 'as stated by its source',
  };
}

const statisticWords = {
  minimum: 'lowest value',
  peak: 'highest value',
  mean1Min: 'highest mean over 1 minute',
  mean15Min: 'highest mean over 15 minutes',
  meanShow: 'highest mean over the show, an hour at most',
} as const satisfies Record<JudgedLevel['aim']['statistic'], string>;

/** A figure that needs no more than its own words. */
export function plainFigure(
  value: number,
  unit: FigureUnit,
  words: {
    readonly method: string;
    readonly formula: string;
    readonly source: string;
    readonly range?: string;
    readonly inputs?: readonly FigureInput[];
  },
): Figure {
  return {
    value,
    unit,
    method: words.method,
    formula: words.formula,
    inputs: words.inputs ?? [],
    source: sourceText(words.source),
    range: words.range ?? 'no limit beyond that of its inputs',
  };
}
