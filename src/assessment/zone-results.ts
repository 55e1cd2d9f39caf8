import type {
  Answer,
  CaseName,
  Crossing,
  Reading,
  ZoneQuantity,
  ZoneResult,
  ZoneSeries,
} from './assessment.js';
import type { Evaluation } from './evaluation.js';
import { levelFigure, outcomeFigure, plainFigure } from './figures.js';
import { linePoints } from './line-points.js';
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
    readings: readingsOf(outcome),
  };
}

/** The answers where one of them is at its worst, or just past a level. */
function readingsOf({ answers: found, timesS, level }: ZoneOutcome): readonly Reading[] {
  const rows = new Map<number, { atS: number; why: Reading['why'][number][] }>();
  const note = (index: number, atS: number, why: Reading['why'][number]) => {
    const row = rows.get(index) ?? { atS, why: [] };
    rows.set(index, { atS: Math.min(row.atS, atS), why: [...row.why, why] });
  };
  for (const answer of answers) {
    const one = found[answer];
    if (!one) continue;
    note(closestTo(timesS, one.atS), one.atS, { answer, what: 'worst' });
    for (const name of levelNames) {
      const atS = one.firstPast[name];
      if (atS === undefined) continue;
      // A level is told at the output time before it is passed; the values are those after it.
      const next = Math.min(closestTo(timesS, atS) + 1, timesS.length - 1);
      note(next, atS, { answer, what: name });
    }
  }
  return [...rows]
    .sort(([one], [other]) => one - other)
    .map(([index, { atS, why }]) => ({
      atS,
      why,
      values: Object.fromEntries(
        answers.flatMap((answer) => {
          const one = found[answer];
          if (!one) return [];
          const isWorst = why.some((row) => row.answer === answer && row.what === 'worst');
          const value = isWorst ? one.value : one.series[index];
          return value === undefined ? [] : [[answer, value * level.scale]];
        }),
      ),
    }));
}

function closestTo(timesS: readonly number[], atS: number): number {
  const after = timesS.findIndex((time) => time >= atS);
  if (after < 0) return timesS.length - 1;
  const before = after - 1;
  const isNearer = before >= 0 && atS - (timesS[before] ?? 0) < (timesS[after] ?? 0) - atS;
  return isNearer ? before : after;
}

/** A line may leave out what lies within this share of its span: less than a pen is wide. */
const lineShare = 1 / 800;

function seriesOf(outcome: ZoneOutcome): readonly ZoneSeries[] {
  const { caseName, level, timesS, band } = outcome;
  const lines = (
    rows: readonly { readonly answer: ZoneSeries['answer']; readonly values: readonly number[] }[],
  ): readonly ZoneSeries[] => {
    const points = linePoints(
      timesS,
      rows.map(({ values }) => values),
      lineShare,
    );
    return rows.map(({ answer, values }) => ({
      caseName,
      quantity: level.quantity,
      answer,
      timesS: points.map((index) => timesS[index] ?? 0),
      values: points.map((index) => (values[index] ?? 0) * level.scale),
    }));
  };
  return [
    ...answers.flatMap((answer) => {
      const values = outcome.answers[answer]?.series;
      return values ? lines([{ answer, values }]) : [];
    }),
    ...(band
      ? lines([
          { answer: 'layeredP05', values: band.p05 },
          { answer: 'layeredP95', values: band.p95 },
        ])
      : []),
  ];
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
      // Fallen is checked against Never alone: its planned curve is enough.
      const drawn: readonly CaseName[] = floorCheck ? ['planned'] : ['planned', 'worstCredible'];
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
        series: own.filter(({ caseName }) => drawn.includes(caseName)).flatMap(seriesOf),
        notComputed: null,
      };
    };
    return [result(false), result(true)];
  });
  return [...ofGroups, ...openVessels(resolved)];
}
