import type { HoldTime } from './assessment.js';
import type { ResolvedAct, ResolvedPlan } from './resolved-plan.js';

const litresPerM3 = 1000;
/** Density of liquid nitrogen at its boiling point [kg/L], as in the stock of the plans. */
const liquidNitrogenKgPerL = 0.808;

const short = (value: number): string => String(Number(value.toPrecision(3)));

/**
 * Numbers of an act for the slots of its demonstration: what the plan itself says. A slot that no
 * figure of the plan answers is left to the planner.
 */
export function offeredNumbers(
  act: ResolvedAct,
  plan: ResolvedPlan,
  holds: readonly HoldTime[],
): Readonly<Record<string, string | undefined>> {
  const released = act.planned.filter(({ amountMol }) => amountMol > 0);
  const kg = released.reduce((sum, { massKg }) => sum + massKg, 0);
  const litres = released.map(
    ({ amountMol }) => amountMol * plan.site.molarVolumeM3PerMol * litresPerM3,
  );
  const most = (values: readonly number[]) => (values.length === 0 ? 0 : Math.max(...values));
  const mouths = plan.groups
    .filter(({ kind, space }) => kind === 'public' && space === act.space)
    .map(({ heightM }) => heightM);
  const holdS = most(holds.flatMap(({ time }) => (time ? [time.value] : [])));
  const when = (isKnown: boolean, text: string) => (isKnown ? text : undefined);
  const hasGas = released.length > 0;
  return {
    portionKg: when(hasGas, short(kg)),
    cueMassKg: when(hasGas, short(kg)),
    bagCount: when(hasGas, String(released.length)),
    balloonCount: when(hasGas, String(released.length)),
    jugCount: when(hasGas, String(released.length)),
    jugLitres: when(hasGas, short(most(litres))),
    jarLitres: when(hasGas, short(most(litres))),
    handfulLitres: when(hasGas, short(most(litres))),
    roomMaxLitres: when(hasGas, short(kg / liquidNitrogenKgPerL)),
    stageMaxLitres: when(hasGas, short(kg / liquidNitrogenKgPerL)),
    meterHeightM: when(mouths.length > 0, short(Math.min(...mouths))),
    flowLitresPerMin: when(
      released.some(({ durationS }) => durationS > 0),
      short(
        most(
          released.map(({ durationS }, index) =>
            durationS > 0 ? ((litres[index] ?? 0) / durationS) * 60 : 0,
          ),
        ),
      ),
    ),
    holdMin: when(holdS > 0, String(Math.ceil(holdS / 60))),
  };
}
