import type { Refusal } from './assessment.js';
import type { Policy, RulePack } from './catalogue-types.js';
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

/** Gases whose release needs written authority under the pack. */
export function gasesNeedingAuthority(pack: RulePack): ReadonlySet<string> {
  const gases = new Set<string>();
  for (const rule of pack.rules) {
    if (rule.needsAuthority !== true) continue;
    const { fact, anyOf } = rule.when;
    if (fact === 'gasesReleased') for (const gas of anyOf ?? []) gases.add(gas);
    for (const part of [...(rule.when.all ?? []), ...(rule.when.any ?? [])]) {
      if (part.fact === 'gasesReleased') for (const gas of part.anyOf ?? []) gases.add(gas);
    }
  }
  // The product's own rule, whatever the pack says.
  gases.add('SF6');
  return gases;
}

function authorityRefusals(act: PlanAct, needing: ReadonlySet<string>): readonly Refusal[] {
  if (act.writtenAuthority === true && act.recovery === true) return [];
  const released = act.releases.planned.flatMap((release) =>
    Object.keys(release.composition ?? { [release.gas ?? '']: 1 }),
  );
  const gas = released.find((candidate) => needing.has(candidate));
  if (gas === undefined) return [];
  return [
    {
      act: act.id,
      reason: `Letting out ${gas} needs written authority and recovery of the gas; the plan shows ${
        act.writtenAuthority === true ? 'no recovery' : 'no authority'
      }.`,
      alternative: 'Use a gas of lower impact first, or show a film of the effect.',
    },
  ];
}

/** Everything in a plan that is refused whatever the numbers say. One line of reason each. */
export function planRefusals(plan: PlanFile, policy: Policy, pack: RulePack): readonly Refusal[] {
  const needing = gasesNeedingAuthority(pack);
  const acts = plan.acts.flatMap((act) => [
    ...inhalationRefusals(act, policy),
    ...authorityRefusals(act, needing),
  ]);
  return acts;
}
