import type { SensitivityRow } from './assessment.js';
import type { Control } from './catalogue-types.js';
import { planWithOnly, type ControlSources } from './controlled-plan.js';
import { worstWord, type Hit } from './decision-table.js';
import { evaluation, type Evaluation, type EvaluationContext } from './evaluation.js';
import { highestOf, withContentTimes } from './gas-content.js';
import { closestToAim, gravestNumber, numberOfHit } from './governing.js';
import type { ChosenControl, PhysicalFigure, PlanFile } from './plan-file.js';
import { quickly } from './standing.js';

/** Row 1 looks at refusals, stores and journeys: none of them moves with the air of the day. */
const firstRowOfAir = 2;

/** The planned day alone: what can slip is judged elsewhere. */
function plannedDay(plan: PlanFile): PlanFile {
  return {
    ...plan,
    acts: plan.acts.map((act) => ({ ...act, releases: { ...act.releases, worstCredible: [] } })),
    ...(plan.stock ? { stock: plan.stock.map((item) => ({ ...item, open: false })) } : {}),
  };
}

const half = (figure: PhysicalFigure | undefined): PhysicalFigure | undefined => {
  if (figure === undefined) return undefined;
  if (typeof figure === 'number') return figure / 2;
  const { value, low, high } = figure;
  return {
    ...figure,
    ...(value === undefined ? {} : { value: value / 2 }),
    ...(low === undefined ? {} : { low: low / 2 }),
    ...(high === undefined ? {} : { high: high / 2 }),
  };
};

const flowKeys = ['freshAirM3PerS', 'supplyM3PerS', 'extractM3PerS', 'recirculatedM3PerS'] as const;

function halfAir(plan: PlanFile): PlanFile {
  const { airSystems, infiltration } = plan.venue;
  return {
    ...plan,
    venue: {
      ...plan.venue,
      ...(airSystems
        ? {
            airSystems: airSystems.map((system) => ({
              ...system,
              ...Object.fromEntries(
                flowKeys.flatMap((key) => {
                  const figure = half(system[key]);
                  return figure === undefined ? [] : [[key, figure] as const];
                }),
              ),
            })),
          }
        : {}),
      ...(infiltration
        ? {
            infiltration: infiltration.map((row) => ({
              ...row,
              airChangesPerHour: half(row.airChangesPerHour) ?? row.airChangesPerHour,
            })),
          }
        : {}),
    },
  };
}

const twiceRelease = (plan: PlanFile): PlanFile => ({
  ...plan,
  acts: plan.acts.map((act) => ({
    ...act,
    releases: {
      ...act.releases,
      planned: act.releases.planned.map((release) => withContentTimes(release, 2)),
    },
  })),
});

function fansOff(plan: PlanFile): PlanFile {
  const { airSystems: _systems, transfers: _transfers, ...venue } = plan.venue;
  return { ...plan, venue };
}

const letsGasOut = ({ acts }: PlanFile): boolean =>
  acts.some(({ releases }) => releases.planned.some(({ burned }) => burned !== true));

function rowOf(
  id: string,
  title: string,
  found: Evaluation,
  nameOf: (gas: string) => string,
): SensitivityRow {
  const hits: readonly Hit[] = found.hits.filter(({ row }) => row >= firstRowOfAir);
  const hit = gravestNumber(hits);
  const number = (hit ? numberOfHit(hit, found, nameOf) : null) ?? closestToAim(found, nameOf);
  return {
    id,
    title,
    word: worstWord(hits.map(({ word }) => word)),
    zoneTitle: number?.zoneTitle ?? '',
    quantity: number?.quantity ?? '',
    figure: number?.figure ?? null,
    limit: number?.limit ?? null,
  };
}

/**
 * What becomes of the planned day when one thing that carries it gives way: the word by rows 2 to 9
 * and the number that decides, of one layered run each, the day as judged beside them.
 *
 * @param filed    the plan before its controls
 * @param credited its controls that earn credit
 */
export function sensitivityRows(
  filed: PlanFile,
  credited: readonly { readonly control: Control; readonly chosen: ChosenControl }[],
  context: EvaluationContext,
  sources: ControlSources,
  nameOf: (gas: string) => string,
): readonly SensitivityRow[] {
  const quick: EvaluationContext = { ...context, answers: quickly(context.answers) };
  const withOnly = (chosen: readonly ChosenControl[]) =>
    plannedDay(planWithOnly(filed, chosen, sources));
  const day = withOnly(credited.map(({ chosen }) => chosen));
  const releasesGas = letsGasOut(day);
  const hasAir = (day.venue.airSystems ?? []).length > 0 || (day.venue.transfers ?? []).length > 0;
  const leaks = (day.venue.infiltration ?? []).some(
    ({ airChangesPerHour }) => (highestOf(airChangesPerHour) ?? 0) > 0,
  );
  const cases: readonly (readonly [string, string, PlanFile])[] = [
    ['asJudged', 'as judged, one layered run', day],
    ...(hasAir || leaks ? [['halfAir', 'half the ventilation', halfAir(day)] as const] : []),
    ...(releasesGas ? [['twiceRelease', 'twice the release', twiceRelease(day)] as const] : []),
    ...(hasAir ? [['fansOff', 'fans off all day', fansOff(day)] as const] : []),
    ...credited.map(
      ({ control, chosen }, index) =>
        [
          `without:${String(index + 1)}`,
          `without: ${control.title}`,
          withOnly(credited.flatMap((one) => (one.chosen === chosen ? [] : [one.chosen]))),
        ] as const,
    ),
  ];
  return cases.map(([id, title, plan]) =>
    rowOf(
      id,
      title,
      evaluation(plan, quick, () => 'worst'),
      nameOf,
    ),
  );
}
