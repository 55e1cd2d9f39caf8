import type { Control } from './catalogue-types.js';
import { controlCandidates } from './control-candidates.js';
import { planWithOnly, type ControlSources } from './controlled-plan.js';
import { worseWord, type Hit } from './decision-table.js';
import type { EvaluationContext } from './evaluation.js';
import type { ChosenControl, PlanFile } from './plan-file.js';
import { spentShare } from './spent-share.js';
import { quickly, standing, type Standing } from './standing.js';
import { targetNumber, type TriedControls } from './suggested-controls.js';

interface Chosen {
  readonly control: Control;
  readonly choice: ChosenControl;
}

/** A set of controls for one subject, none of which can be left out. */
export interface LeastSet {
  readonly chosen: readonly Chosen[];
  /** Confirmed with the draws and the runs without mixing. */
  readonly standing: Standing;
  readonly isReached: boolean;
}

/** Controls that leave the effect, the house and the day as they are. */
const mostBurdenKept = 3;
/** Shares of the planned amount that are tried where nothing else suffices, the largest first. */
const smallerShares = [0.75, 0.5, 0.25, 0.1] as const;
/** Whole answers asked to mend a set that only the quick ones passed. */
const mostMendings = 5;

const passes = ({ word }: Standing): boolean =>
  worseWord(word, 'goWithConditions') === 'goWithConditions';

const refusals = (hits: readonly Hit[]): readonly Hit[] =>
  hits.filter(({ word }) => word === 'noGo');

const placeOf = ({ outcome, row, space }: Hit): string =>
  `${String(row)} ${outcome?.zone ?? space ?? ''} ${outcome?.level.quantity ?? ''}`;

/** How far the worst of what refuses a subject is past its level. */
export function refusedBy({ hits }: Standing): number {
  return Math.max(
    0,
    ...refusals(hits).map(({ outcome, answer, level }) =>
      outcome ? spentShare(outcome, answer, level) : Infinity,
    ),
  );
}

/** Whether a control tried alone opens a new way to fail, or deepens the worst. */
function harms(tried: Standing, asFiled: Standing): boolean {
  const before = new Set(refusals(asFiled.hits).map(placeOf));
  return (
    refusals(tried.hits).some((hit) => !before.has(placeOf(hit))) ||
    refusedBy(tried) > 1.02 * refusedBy(asFiled)
  );
}

/** A number that moves by less than this share has not moved. */
const leastEffect = 0.01;

/** Whether a control tried alone lessens anything that refuses a subject. */
const helps = (tried: Standing, asFiled: Standing): boolean =>
  refusals(asFiled.hits).some(
    (hit) => targetNumber(hit, tried).spent < (1 - leastEffect) * targetNumber(hit, asFiled).spent,
  );

/**
 * The least set of controls that brings a subject from No-go to Go with conditions. All that help and
 * leave the effect as it is are taken together, with a smaller amount where they do not suffice; then
 * one after the other is left out, the most burdensome first, and stays out where the word allows it.
 * What the quick answers passed is confirmed in full, and mended where that fails. Where no set
 * suffices, the one that comes closest.
 */
export function leastControls(
  filed: PlanFile,
  { subject, asFiled, tried }: TriedControls,
  context: EvaluationContext,
  sources: ControlSources,
): LeastSet {
  const quick: EvaluationContext = { ...context, answers: quickly(context.answers) };
  const standingOf = (chosen: readonly Chosen[], how: EvaluationContext) =>
    standing(
      planWithOnly(
        filed,
        chosen.map(({ choice }) => choice),
        sources,
      ),
      subject,
      how,
    );
  const order = (one: Chosen, other: Chosen) =>
    sources.controls.indexOf(one.control) - sources.controls.indexOf(other.control);

  const kept: readonly Chosen[] = tried
    .filter(
      ({ control, standing: alone }) =>
        control.burden <= mostBurdenKept && helps(alone, asFiled) && !harms(alone, asFiled),
    )
    .map(({ control, choice }) => ({ control, choice }));
  const less = sources.controls.find(({ effect }) => effect === 'releaseScaled');
  const { act } = subject;
  const portions: readonly Chosen[] =
    less && act !== null
      ? smallerShares.map((amountShare) => ({
          control: less,
          choice: { control: less.id, act, values: { amountShare } },
        }))
      : [];
  const together = [kept, ...portions.map((portion) => [...kept, portion])].map((chosen) =>
    chosen.toSorted(order),
  );
  const enough = together.find((chosen) => passes(standingOf(chosen, quick)));
  if (!enough) {
    const closest = together
      .map((chosen) => ({ chosen, standing: standingOf(chosen, quick) }))
      .reduce((best, one) => (refusedBy(one.standing) < refusedBy(best.standing) ? one : best));
    return { ...closest, isReached: false };
  }

  const effect = new Map(tried.map(({ choice, spent }) => [choice, spent]));
  const leastWanted = enough.toSorted(
    (one, other) =>
      other.control.burden - one.control.burden ||
      (effect.get(other.choice) ?? 0) - (effect.get(one.choice) ?? 0),
  );
  let chosen = enough;
  const leftOut: Chosen[] = [];
  for (const one of leastWanted) {
    const without = chosen.filter((other) => other !== one);
    if (!passes(standingOf(without, quick))) continue;
    chosen = without;
    leftOut.unshift(one);
  }

  let confirmed = standingOf(chosen, context);
  const added: Chosen[] = [];
  for (let i = 0; i < mostMendings && !passes(confirmed); i += 1) {
    const meters = controlCandidates(
      sources.controls.filter((control) => control.effect === 'fixedMonitor'),
      {
        plan: filed,
        subject,
        hits: refusals(confirmed.hits),
        gases: sources.gases,
        spaces: new Set(),
        otherGases: [],
        enoughShare: null,
      },
    );
    const mended = meters.length > 0 ? meters : leftOut.splice(0, 1);
    if (mended.length === 0) break;
    added.push(...mended);
    chosen = [...chosen, ...mended].toSorted(order);
    confirmed = standingOf(chosen, context);
  }
  // The last to come in may have made those before it needless.
  for (const one of passes(confirmed) ? added.slice(0, -1) : []) {
    const without = chosen.filter((other) => other !== one);
    const found = standingOf(without, context);
    if (!passes(found)) continue;
    chosen = without;
    confirmed = found;
  }
  return { chosen, standing: confirmed, isReached: passes(confirmed) };
}
