import type { Refusal } from './assessment.js';
import type { Policy, RulePack } from './catalogue-types.js';
import { conditionHolds, type FactValues } from './condition-holds.js';
import { actFacts, gasesOfRelease } from './plan-facts.js';
import type { PlanAct, PlanFile } from './plan-file.js';

type Inhalation = NonNullable<PlanAct['inhaled']>[number];

/** Gases that numb or harm even with oxygen enough. */
const neverBreathed = new Set(['Xe', 'Kr', 'N2O', 'SF6', 'CO2', 'H2', 'CH4', 'C3H8']);

const oxygenOf = (inhalation: Inhalation): number | null => {
  const analysed = inhalation.analysedOxygenFraction;
  if (analysed === undefined) return null;
  if (typeof analysed === 'number') return analysed;
  // The whole stated range has to pass, so its ends are judged, not its middle.
  return analysed.low ?? analysed.value ?? null;
};

const highestOxygenOf = (inhalation: Inhalation): number | null => {
  const analysed = inhalation.analysedOxygenFraction;
  if (analysed === undefined) return null;
  return typeof analysed === 'number' ? analysed : (analysed.high ?? analysed.value ?? null);
};

/** Ids of the policy's refusal rows that an inhalation meets, gravest first; empty when allowed. */
export function refusalIds(inhalation: Inhalation, policy: Policy): readonly string[] {
  const ids: string[] = [];
  if (inhalation.by !== 'presenter' || inhalation.trainedNamedAdult !== true) {
    ids.push('public-or-minor');
  }
  if (inhalation.from === 'mask' || inhalation.from === 'hood') ids.push('mask-or-hood');
  else if (inhalation.from !== 'limpBag') ids.push('pressurised-source');
  const gases = Object.keys(inhalation.composition ?? { [inhalation.gas ?? 'unknown']: 1 });
  if (gases.some((gas) => neverBreathed.has(gas))) ids.push('narcotic');
  if (inhalation.certified !== true) ids.push('technical-grade');
  const limit = (name: 'breathableOxygenLowFraction' | 'breathableOxygenHighFraction') =>
    policy.defaults.find((row) => row.name === name)?.value;
  const low = limit('breathableOxygenLowFraction') ?? 1;
  const high = limit('breathableOxygenHighFraction') ?? 0;
  const oxygen = oxygenOf(inhalation);
  const highest = highestOxygenOf(inhalation);
  if (oxygen === null || oxygen < low) ids.push('oxygen-poor');
  if (highest !== null && highest > high) ids.push('oxygen-rich');
  return ids;
}

function inhalationRefusals(act: PlanAct, policy: Policy): readonly Refusal[] {
  return (act.inhaled ?? []).flatMap((inhalation): Refusal[] => {
    const [gravest] = refusalIds(inhalation, policy);
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

/** Everything in a plan that is refused whatever the numbers say. One line of reason each. */
export function planRefusals(
  plan: PlanFile,
  policy: Policy,
  pack: RulePack,
  facts: FactValues,
): readonly Refusal[] {
  return plan.acts.flatMap((act) => [
    ...inhalationRefusals(act, policy),
    ...authorityRefusals(act, authoritiesFor(act, policy, pack, facts)),
  ]);
}
