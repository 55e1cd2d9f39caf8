import type { GasLibrary } from '../science/gases/gas-library.js';
import type { Control } from './catalogue-types.js';
import { controlValue, statedValue } from './control-values.js';
import type { ChosenControl, PlanAct, PlanFile, PlanRelease, PlanStock } from './plan-file.js';

/** A chosen control, and what its change of the plan may draw on. */
export interface ControlUse {
  readonly control: Control;
  readonly chosen: ChosenControl;
  readonly gases: GasLibrary;
}

/** The plan with a control in place; the very same plan where the control changes nothing in it. */
export type ControlChange = (plan: PlanFile, use: ControlUse) => PlanFile;

export const valueOf = ({ control, chosen }: ControlUse, key: string): number | undefined =>
  controlValue(control, chosen, key);
export const statedOf = ({ control, chosen }: ControlUse, key: string): number | undefined =>
  statedValue(control, chosen, key);

/** The space that a control is for: its own, else that of its act. */
export const spaceOf = (plan: PlanFile, { chosen }: ControlUse): string | undefined =>
  chosen.space ?? plan.acts.find((act) => act.id === chosen.act)?.space;

/** The plan with the acts changed that a control is for; all of them where it names none. */
export function withActs(
  plan: PlanFile,
  { chosen }: ControlUse,
  change: (act: PlanAct) => PlanAct,
): PlanFile {
  return {
    ...plan,
    acts: plan.acts.map((act) =>
      chosen.act === undefined || act.id === chosen.act ? change(act) : act,
    ),
  };
}

type Row = 'planned' | 'worstCredible';

/** The plan with the planned or worst credible releases changed of the one act that a control names. */
export function withReleases(
  plan: PlanFile,
  use: ControlUse,
  row: Row,
  change: (release: PlanRelease, act: PlanAct) => readonly PlanRelease[],
): PlanFile {
  if (use.chosen.act === undefined) return plan;
  return withActs(plan, use, (act) => ({
    ...act,
    releases: {
      ...act.releases,
      [row]: act.releases[row].flatMap((release) => change(release, act)),
    },
  }));
}

/** Stock that a control is for: what its act lets out of, or what stands in its space. */
export function stockOf(plan: PlanFile, use: ControlUse): (item: PlanStock) => boolean {
  const act = plan.acts.find((one) => one.id === use.chosen.act);
  const used = new Set(
    act
      ? [...act.releases.planned, ...act.releases.worstCredible].flatMap(({ stock }) => stock ?? [])
      : [],
  );
  const { space } = use.chosen;
  return (item) => used.has(item.id) || (space !== undefined && item.place === space);
}

export function withStock(
  plan: PlanFile,
  isMeant: (item: PlanStock) => boolean,
  change: (item: PlanStock) => PlanStock,
): PlanFile {
  if (!plan.stock?.some(isMeant)) return plan;
  return { ...plan, stock: plan.stock.map((item) => (isMeant(item) ? change(item) : item)) };
}
