import type {
  Answer,
  CaseName,
  Crossing,
  ZoneQuantity,
  ZoneResult,
  ZoneSeries,
} from './assessment.js';
import type { Evaluation } from './evaluation.js';
import { levelFigure, outcomeFigure, plainFigure } from './figures.js';
import type { LevelName } from './levels.js';
import { openVessels } from './open-vessels.js';
import { quantityWords } from './quantity-words.js';
import type { ResolvedPlan } from './resolved-plan.js';
import type { ZoneOutcome } from './zone-outcomes.js';

const answers: readonly Answer[] = ['mixed', 'layered', 'layeredP50', 'bound'];
const levelNames: readonly LevelName[] = ['aim', 'limit', 'never'];

function standingOf(outcome: ZoneOutcome): ZoneQuantity['standing'] {
  const judged = [outcome.answers.mixed, outcome.answers.layered];
  const failed = (name: LevelName) => judged.some((answer) => answer?.fails[name] ?? false);
  if (failed('never')) return 'past never';
  if (failed('limit')) return 'below limit';
  if (failed('aim')) return 'meets limit';
  return 'meets aim';
}

function crossingsOf(outcome: ZoneOutcome): readonly Crossing[] {
  return answers.flatMap((answer) =>
    levelNames.flatMap((level): Crossing[] => {
      const atS = outcome.answers[answer]?.firstPast[level];
      if (atS === undefined) return [];
      return [
        {
          level,
          answer,
          at: plainFigure(atS, 's', {
            method: 'first passing of the level by the momentary value',
            formula: 'earliest output time before the level is passed, after midnight',
            source: 'own-derivation',
          }),
        },
      ];
    }),
  );
}

function zoneQuantity(
  outcome: ZoneOutcome,
  plan: ResolvedPlan,
  nameOf: (gas: string) => string,
): ZoneQuantity {
  const figures = answers.flatMap((answer) => {
    const figure = outcomeFigure(outcome, answer, plan);
    return figure ? [[answer, figure] as const] : [];
  });
  const pressure = outcome.oxygenPressurePa.mixed;
  return {
    quantity: outcome.level.quantity,
    quantityTitle: quantityWords(outcome.level, nameOf),
    caseName: outcome.caseName,
    answers: Object.fromEntries(figures),
    ...(pressure === undefined
      ? {}
      : {
          partialPressure: plainFigure(pressure, 'Pa', {
            method: 'partial pressure of oxygen, well mixed, wet',
            formula: 'p(O2) = fraction x (site pressure - water vapour)',
            source: 'ideal-gas',
            inputs: [{ name: 'site pressure', value: plan.site.pressurePa, unit: 'Pa' }],
          }),
        }),
    levels: {
      aim: levelFigure(outcome.level, 'aim'),
      limit: levelFigure(outcome.level, 'limit'),
      never: levelFigure(outcome.level, 'never'),
    },
    standing: standingOf(outcome),
    crossings: crossingsOf(outcome),
  };
}

function seriesOf(outcome: ZoneOutcome): readonly ZoneSeries[] {
  return answers.flatMap((answer): ZoneSeries[] => {
    const found = outcome.answers[answer];
    if (!found) return [];
    const { scale } = outcome.level;
    return [
      {
        caseName: outcome.caseName,
        quantity: outcome.level.quantity,
        answer,
        timesS: outcome.timesS,
        values: scale === 1 ? found.series : found.series.map((value) => value * scale),
      },
    ];
  });
}

/** Of several worst cases the one that leaves a zone worst off for a quantity. */
function worstOf(outcomes: readonly ZoneOutcome[]): readonly ZoneOutcome[] {
  const worst = new Map<string, ZoneOutcome>();
  for (const outcome of outcomes) {
    const key = `${outcome.zone} ${outcome.level.quantity} ${String(outcome.floorCheck)}`;
    const known = worst.get(key);
    const value = outcome.answers.mixed?.value;
    const other = known?.answers.mixed?.value;
    const isWorse =
      value === undefined || other === undefined
        ? !known
        : outcome.level.failsWhen === 'below'
          ? value < other
          : value > other;
    if (isWorse) worst.set(key, outcome);
  }
  return [...worst.values()];
}

/** Every breathing zone with its quantities, cases and curves; 0.2 m beside the declared height. */
export function zoneResults(
  evaluation: Evaluation,
  nameOf: (gas: string) => string,
): readonly ZoneResult[] {
  const { resolved } = evaluation;
  const worst = worstOf(evaluation.worst.flatMap((one) => one.outcomes));
  const all = [...evaluation.planned, ...worst, ...evaluation.fansOff];
  const ofGroups = resolved.groups.flatMap((group) => {
    const spaceTitle =
      resolved.spaces.find((space) => space.id === group.space)?.title ?? group.space;
    const result = (floorCheck: boolean): ZoneResult => {
      const own = all.filter(
        (outcome) => outcome.zone === group.id && outcome.floorCheck === floorCheck,
      );
      const shown: readonly CaseName[] = floorCheck
        ? ['planned', 'worstCredible']
        : ['planned', 'worstCredible', 'fansOff'];
      return {
        id: floorCheck ? `${group.id}@0.2` : group.id,
        title: floorCheck ? `${group.title}: 0.2 m above the floor` : group.title,
        space: group.space,
        spaceTitle,
        heightM: floorCheck ? 0.2 : group.heightM,
        floorLevelM: group.floorLevelM,
        kind: floorCheck ? 'floorLevelCheck' : group.kind,
        count: floorCheck
          ? null
          : plainFigure(group.count, 'people', {
              method: 'as stated in the plan',
              formula: 'head count',
              source: 'plan',
            }),
        quantities: own
          .filter((outcome) => shown.includes(outcome.caseName))
          .map((outcome) => zoneQuantity(outcome, resolved, nameOf)),
        series: own.filter((outcome) => outcome.caseName === 'planned').flatMap(seriesOf),
        notComputed: null,
      };
    };
    return [result(false), result(true)];
  });
  return [...ofGroups, ...openVessels(resolved)];
}
