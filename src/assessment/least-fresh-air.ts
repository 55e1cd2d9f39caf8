import { leastAmount } from '../science/room-air/amount-search.js';
import type { AirAnswers } from './air-answers.js';
import { airCase } from './air-case.js';
import type { Finding } from './assessment.js';
import type { Evaluation } from './evaluation.js';
import { freshAirOf } from './figures.js';
import { quantityWords } from './quantity-words.js';
import type { ZoneOutcome } from './zone-outcomes.js';
import type { ResolvedAirSystem, ResolvedPlan } from './resolved-plan.js';
import { mixedAimFailure } from './mixed-aim-failure.js';

/** Systems are never asked to deliver more than this many times what is planned. */
const mostTimes = 10;
/** Air changes beyond which nobody ventilates a room of people [1/h]. */
const mostChangesPerHour = 20;
/** Every try is a day worked through; what is told is rounded upwards anyway. */
const fineness = 0.03;

const scaled = (system: ResolvedAirSystem, factor: number): ResolvedAirSystem => ({
  ...system,
  freshAirM3PerS: system.freshAirM3PerS * factor,
  supplyM3PerS: system.supplyM3PerS === null ? null : system.supplyM3PerS * factor,
  extractM3PerS: system.extractM3PerS === null ? null : system.extractM3PerS * factor,
});

/** A supply for a space that has none, so that one can be asked about. */
const plainSupply = (space: string, freshAirM3PerS: number): ResolvedAirSystem => ({
  title: 'supply asked about',
  serves: [{ space, share: 1 }],
  freshAirM3PerS,
  isEffectivenessUsual: false,
  flowFactor: null,
  drive: 'supply',
  supplyM3PerS: null,
  extractM3PerS: null,
  recirculatedM3PerS: 0,
  supplyLevel: null,
  extractLevel: null,
  extractTopM: null,
  effectiveness: 1,
  fromS: null,
  toS: null,
});

/** Litres per second, upwards: a printed least is never below the true one. */
const litres = (m3PerS: number): string => {
  const value = m3PerS * 1000;
  const step = 10 ** Math.max(0, Math.floor(Math.log10(Math.max(value, 1))) - 1);
  return `${String(Math.ceil(value / step - 1e-9) * step)} L/s`;
};

/**
 * Least fresh air with which the planned day meets every aim in mixed air: all systems turned down or
 * up together, or a supply in the space of the first act where there is none.
 */
export function leastFreshAir(
  evaluation: Evaluation,
  answers: AirAnswers,
  nameOf: (gas: string) => string,
): readonly Finding[] {
  const { resolved, dayAir, dayReleases } = evaluation;
  const act = resolved.acts.find(({ planned }) =>
    planned.some((release) => !release.burned && release.amountMol > 0),
  );
  const space = resolved.spaces.find(({ id }) => id === act?.space);
  if (!act || !space) return [];
  const served = freshAirOf(resolved, space.id);
  // No system is asked to clear a space that it does not serve.
  const asked = new Set([
    space.id,
    ...resolved.airSystems.flatMap(({ serves }) => serves.map((one) => one.space)),
  ]);
  // The planned day has been worked through: it says on which side of 1 to look.
  const isAsked = ({ group }: ZoneOutcome) => asked.has(group.space);
  const plannedPasses = !evaluation.planned.some(
    (outcome) =>
      outcome.judgedFully && isAsked(outcome) && (outcome.answers.mixed?.fails.aim ?? false),
  );
  const failureAt = (airSystems: readonly ResolvedAirSystem[]) => {
    const plan: ResolvedPlan = { ...resolved, airSystems };
    const air = airCase(plan, dayReleases, dayAir.window, 'planned');
    return mixedAimFailure(evaluation, plan, air, answers, isAsked);
  };
  const hasAir = served > 0;
  const systemsAt = (amount: number) =>
    hasAir
      ? resolved.airSystems.map((system) => scaled(system, amount))
      : [...resolved.airSystems, plainSupply(space.id, amount)];
  const high = hasAir
    ? plannedPasses
      ? 1
      : mostTimes
    : (mostChangesPerHour * space.volumeM3) / 3600;
  const least = leastAmount((amount) => failureAt(systemsAt(amount)) === null, {
    low: hasAir && !plannedPasses ? 1 : 0,
    high,
    relative: fineness,
  });
  const flow = (amount: number): string => litres(hasAir ? amount * served : amount);
  const planned = hasAir ? `; ${litres(served)} is counted` : '; none is counted';
  const told = (kind: Finding['kind'], text: string): readonly Finding[] => [
    { code: 'least-fresh-air', kind, path: '/venue/airSystems', text },
  ];
  if (least === undefined) {
    const blocker = failureAt(systemsAt(high));
    const level = blocker ? `the aim for ${quantityWords(blocker.level, nameOf)}` : 'an aim';
    return told(
      'caution',
      `Least fresh air: not even ${flow(high)} in ${space.title} would meet ${level} on the planned day. Let out less, or move people.`,
    );
  }
  if (least === 0) {
    return told(
      'note',
      `Least fresh air: well-mixed air meets every aim of the planned day without a fan${planned}. Layers and faults are judged apart.`,
    );
  }
  const isEnough = hasAir && least <= 1;
  return told(
    isEnough ? 'note' : 'caution',
    `Least fresh air: ${flow(least)} in ${space.title} meets every aim of the planned day in well-mixed air${planned}. Layers and faults are judged apart.`,
  );
}
