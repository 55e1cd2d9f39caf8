import type { GasLibrary } from '../science/gases/gas-library.js';
import type { Control } from './catalogue-types.js';
import { airChanges } from './control-air-changes.js';
import type { ControlChange } from './control-change.js';
import { peopleChanges } from './control-people-changes.js';
import { releaseChanges } from './control-release-changes.js';
import type { ChosenControl, PlanFile } from './plan-file.js';

/** What each effect changes in a plan; the rest are conditions. */
const changes: Readonly<Partial<Record<Control['effect'], ControlChange>>> = {
  ...releaseChanges,
  ...airChanges,
  ...peopleChanges,
};

/** What controls are made of: their catalogue, and the gases it speaks of. */
export interface ControlSources {
  readonly controls: readonly Control[];
  readonly gases: GasLibrary;
}

/** Whether the air model can express what a control does. */
export function isModelled(effect: Control['effect']): boolean {
  return changes[effect] !== undefined;
}

/** A reading between houses changes which gas still counts, and no figure of the plan. */
const countsByItself: readonly Control['effect'][] = ['readingGate', 'holdTime'];

const isSamePlan = (one: PlanFile, other: PlanFile): boolean =>
  one === other || JSON.stringify(one) === JSON.stringify(other);

/** The plan with one control in place; the very same plan where that changes nothing. */
export function planWith(
  plan: PlanFile,
  chosen: ChosenControl,
  { controls, gases }: ControlSources,
): PlanFile {
  const control = controls.find((candidate) => candidate.id === chosen.control);
  const change = control?.credit === true ? changes[control.effect] : undefined;
  if (!control || !change) return plan;
  const next = change(plan, { control, chosen, gases });
  if (!countsByItself.includes(control.effect) && isSamePlan(next, plan)) return plan;
  // A plan keeps at least one group: emptying the last zone would leave nobody to protect.
  return next.event.audience.length === 0 ? plan : next;
}

/** Whether a chosen control changes what is calculated for this plan; if not it is a condition. */
export function isCredited(
  plan: PlanFile,
  chosen: ChosenControl,
  sources: ControlSources,
): boolean {
  return planWith(plan, chosen, sources) !== plan;
}

/** The plan as filed: before any control that earns credit. */
export function filedPlan(plan: PlanFile, sources: ControlSources): PlanFile {
  const kept = (plan.controls ?? []).filter((chosen) => !isCredited(plan, chosen, sources));
  return kept.length === (plan.controls ?? []).length ? plan : { ...plan, controls: kept };
}

/** The plan with its chosen controls in place. */
export function controlledPlan(plan: PlanFile, sources: ControlSources): PlanFile {
  return (plan.controls ?? []).reduce(
    (current, chosen) => planWith(current, chosen, sources),
    plan,
  );
}

/** A plan as filed with these controls alone in place. */
export function planWithOnly(
  filed: PlanFile,
  chosen: readonly ChosenControl[],
  sources: ControlSources,
): PlanFile {
  return controlledPlan({ ...filed, controls: [...(filed.controls ?? []), ...chosen] }, sources);
}
