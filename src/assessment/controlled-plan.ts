import type { Control } from './catalogue-types.js';
import type { ChosenControl, PlanAct, PlanFile, PlanRelease, PlanStock } from './plan-file.js';

/** Seat height where chairs take the place of the floor [m], when the plan names none. */
const chairHeightM = 1.1;
/** No chair puts a mouth higher than this [m]. */
const highestSeatedM = 1.3;
/** People above this height sit on a chair already, or stand [m]. */
const floorSeatedBelowM = 0.7;

type Change = (plan: PlanFile, chosen: ChosenControl) => PlanFile;

const onAct = (
  plan: PlanFile,
  chosen: ChosenControl,
  change: (act: PlanAct) => PlanAct,
): PlanFile => ({
  ...plan,
  acts: plan.acts.map((act) =>
    chosen.act === undefined || act.id === chosen.act ? change(act) : act,
  ),
});

const capped = <T extends PlanRelease | PlanStock>(item: T, capKg: number): T => {
  const { massKg } = item;
  if (massKg === undefined) return item;
  const value = typeof massKg === 'number' ? massKg : (massKg.high ?? massKg.value);
  return value === undefined || value <= capKg ? item : { ...item, massKg: capKg };
};

/** Effects that the models of today express; every other control is a condition without credit. */
const changes: Partial<Record<Control['effect'], Change>> = {
  sourceRemoved: (plan, chosen) =>
    chosen.act === undefined
      ? plan
      : onAct(plan, chosen, (act) => ({ ...act, releases: { planned: [], worstCredible: [] } })),
  inventoryCapped: (plan, chosen) => {
    const capKg = chosen.value;
    if (capKg === undefined) return plan;
    const acts = onAct(plan, chosen, (act) => ({
      ...act,
      releases: {
        ...act.releases,
        worstCredible: act.releases.worstCredible.map((release) => capped(release, capKg)),
      },
    }));
    const space = chosen.space ?? plan.acts.find((act) => act.id === chosen.act)?.space;
    return {
      ...acts,
      ...(plan.stock
        ? {
            stock: plan.stock.map((item) =>
              space === undefined || item.place === space ? capped(item, capKg) : item,
            ),
          }
        : {}),
    };
  },
  zoneEmptied: (plan, chosen) =>
    chosen.space === undefined
      ? plan
      : {
          ...plan,
          event: {
            ...plan.event,
            audience: plan.event.audience.filter((group) => group.zone.space !== chosen.space),
          },
        },
  seatsRaised: (plan, chosen) => {
    const heightM = Math.min(chosen.value ?? chairHeightM, highestSeatedM);
    return {
      ...plan,
      event: {
        ...plan.event,
        audience: plan.event.audience.map((group) =>
          (chosen.space === undefined || group.zone.space === chosen.space) &&
          // Seats are given to the audience on the floor; crew who kneel go on kneeling.
          group.kind === 'public' &&
          group.zone.heightM <= floorSeatedBelowM &&
          group.zone.heightM < heightM
            ? { ...group, zone: { ...group.zone, heightM } }
            : group,
        ),
      },
    };
  },
};

/** Whether the numbers change with a control; the rest are conditions. */
export function isCredited(control: Control): boolean {
  return control.credit && changes[control.effect] !== undefined;
}

/** The plan as it is with its chosen controls in place. */
export function controlledPlan(plan: PlanFile, catalogue: readonly Control[]): PlanFile {
  return (plan.controls ?? []).reduce((current, chosen) => {
    const control = catalogue.find((candidate) => candidate.id === chosen.control);
    const change = control && isCredited(control) ? changes[control.effect] : undefined;
    const next = change ? change(current, chosen) : current;
    // A plan keeps at least one group: emptying the last zone would leave nobody to protect.
    return next.event.audience.length === 0 ? current : next;
  }, plan);
}
