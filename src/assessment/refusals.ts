import { breathingRefusal } from '../science/acoustics/breathing-gate.js';
import type { Composition, GasLibrary } from '../science/gases/gas-library.js';
import type { Refusal } from './assessment.js';
import type { Demonstration, Policy, RulePack } from './catalogue-types.js';
import { conditionHolds, type FactValues } from './condition-holds.js';
import { actFacts, gasesOfRelease } from './plan-facts.js';
import type { PlanAct, PlanFile } from './plan-file.js';

type Inhalation = NonNullable<PlanAct['inhaled']>[number];

/** Gases that numb or harm even with oxygen enough. */
const neverBreathed = new Set(['Xe', 'Kr', 'N2O', 'SF6', 'CO2', 'H2', 'CH4', 'C3H8']);

/** Ends of the analysis; a figure that nobody measured or supplied is no analysis. */
function analysedEnds(inhalation: Inhalation): { low: number; high: number } | null {
  const analysed = inhalation.analysedOxygenFraction;
  if (analysed === undefined) return null;
  if (typeof analysed === 'number') return { low: analysed, high: analysed };
  const { value, low, high, origin = 'supplied' } = analysed;
  const isAnalysis = origin === 'measured' || origin === 'supplied';
  const lowest = low ?? value;
  const highest = high ?? value;
  if (!isAnalysis || lowest === undefined || highest === undefined) return null;
  return { low: lowest, high: highest };
}

/** Ids of the policy's refusal rows that an inhalation meets, gravest first; empty when allowed. */
export function refusalIds(
  inhalation: Inhalation,
  policy: Policy,
  gases: GasLibrary,
): readonly string[] {
  const ids: string[] = [];
  if (inhalation.by !== 'presenter' || inhalation.trainedNamedAdult !== true) {
    ids.push('public-or-minor');
  }
  if (inhalation.from === 'mask' || inhalation.from === 'hood') ids.push('mask-or-hood');
  else if (inhalation.from !== 'limpBag') ids.push('pressurised-source');
  const stated: Composition =
    inhalation.composition ?? (inhalation.gas === undefined ? {} : { [inhalation.gas]: 1 });
  if (Object.keys(stated).some((gas) => neverBreathed.has(gas))) ids.push('narcotic');
  if (inhalation.certified !== true || Object.keys(stated).length === 0) {
    ids.push('technical-grade');
  }
  const limit = (name: 'breathableOxygenLowFraction' | 'breathableOxygenHighFraction') =>
    policy.defaults.find((row) => row.name === name)?.value;
  const low = limit('breathableOxygenLowFraction') ?? 1;
  const high = limit('breathableOxygenHighFraction') ?? 0;
  // The whole stated range has to pass, and what is said to be in the bag has to fit the analysis.
  const oxygen = analysedEnds(inhalation);
  if (oxygen === null || oxygen.low < low) ids.push('oxygen-poor');
  if (oxygen !== null && oxygen.high > high) ids.push('oxygen-rich');
  if (
    ids.length === 0 &&
    Object.keys(stated).length > 0 &&
    breathingRefusal(gases, stated) !== null
  ) {
    ids.push('oxygen-poor');
  }
  return ids;
}

function inhalationRefusals(act: PlanAct, context: RefusalContext): readonly Refusal[] {
  const { policy, gases, demonstrations } = context;
  const shown = demonstrations.find((one) => one.id === act.catalogueId);
  const stated = act.inhaled ?? [];
  if (shown?.inhaled === true && stated.length === 0) {
    return [
      {
        act: act.id,
        reason: 'A person breathes the mixture and the plan does not say who, from what, and what.',
        alternative: 'State the certified mixture and who breathes it, or play a recording.',
      },
    ];
  }
  return stated.flatMap((inhalation): Refusal[] => {
    const [gravest] = refusalIds(inhalation, policy, gases);
    if (gravest === undefined) return [];
    const row = policy.refusals.find((candidate) => candidate.id === gravest);
    return [
      {
        act: act.id,
        reason: row?.reason ?? 'No person breathes a demonstration gas.',
        alternative: row?.alternative ?? 'Put the instrument in the bag, or play a recording.',
      },
    ];
  });
}

interface Authority {
  readonly needsRecovery: boolean;
  readonly reason: string;
  readonly alternative: string;
}

/** What stands between an act and its release: the policy's own rows, and rules of the pack. */
function authoritiesFor(
  act: PlanAct,
  policy: Policy,
  pack: RulePack,
  facts: FactValues,
): readonly Authority[] {
  const released = new Set(act.releases.planned.flatMap(gasesOfRelease));
  if (released.size === 0) return [];
  const own = policy.authorities.filter((row) => released.has(row.gas));
  const ofAct = actFacts(facts, act);
  const ruled = pack.rules
    .filter((rule) => rule.needsAuthority === true && conditionHolds(rule.when, ofAct))
    .map((rule) => ({
      needsRecovery: rule.needsRecovery ?? false,
      reason: `${rule.instrument}: ${rule.title.toLowerCase()} needs written authority.`,
      alternative: 'Ask the authority named by the rule, or show the effect without this gas.',
    }));
  return [...own, ...ruled];
}

function authorityRefusals(act: PlanAct, authorities: readonly Authority[]): readonly Refusal[] {
  const missing = authorities.find(
    (one) => act.writtenAuthority !== true || (one.needsRecovery && act.recovery !== true),
  );
  if (!missing) return [];
  const lacks = act.writtenAuthority === true ? 'recovery of the gas' : 'written authority';
  return [
    {
      act: act.id,
      reason: `${missing.reason} The plan shows no ${lacks}.`,
      alternative: missing.alternative,
    },
  ];
}

/** What the refusals are drawn from, besides the plan. */
export interface RefusalContext {
  readonly policy: Policy;
  readonly pack: RulePack;
  readonly demonstrations: readonly Demonstration[];
  readonly gases: GasLibrary;
  readonly facts: FactValues;
}

/** Everything in a plan that is refused whatever the numbers say. One line of reason each. */
export function planRefusals(plan: PlanFile, context: RefusalContext): readonly Refusal[] {
  const { policy, pack, facts } = context;
  return plan.acts.flatMap((act) => [
    ...inhalationRefusals(act, context),
    ...authorityRefusals(act, authoritiesFor(act, policy, pack, facts)),
  ]);
}
