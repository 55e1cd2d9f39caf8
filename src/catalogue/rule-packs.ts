import {
  commonRulesSchema,
  rulePackSchema,
  type CommonRules,
  type Policy,
  type RulePack,
} from '../assessment/catalogue-types.js';
import { checked, readDataFile, refuseFaults, type Fault } from './data-file.js';
import { exposureFaults, flammableFaults, oxygenFaults } from './judging-rows.js';
import { repeatedIdFaults, unknownFaults, whenFaults, type KnownNames } from './references.js';

/** What the loader must know to check a pack. */
export interface PackKnowledge extends KnownNames {
  readonly policy: Policy;
}

const carriageFigure = {
  points: 'maxPoints',
  grossMass: 'maxTotalKg',
  passengerDryIce: 'maxTotalKg',
  containerCount: 'maxCount',
} as const satisfies Record<RulePack['carriageLimits'][number]['kind'], string>;

function carriageFaults(pack: RulePack): readonly Fault[] {
  return pack.carriageLimits.flatMap((row, i) => {
    const needed = carriageFigure[row.kind];
    if (row[needed] !== undefined) return [];
    const hint = 'Give the figure that this kind of limit counts.';
    return [{ path: `/carriageLimits/${String(i)}`, problem: `${needed} is missing`, hint }];
  });
}

function readFaults(pack: RulePack): readonly Fault[] {
  const rows = [
    ...pack.exposureLimits,
    ...pack.oxygenThresholds,
    ...pack.flammableThresholds,
    ...pack.alarms,
    ...pack.warmingPotentials,
    ...pack.carriageLimits,
    ...pack.rules,
    ...pack.notes,
  ];
  if (!pack.fullyRead || rows.every((row) => row.checked === 'first-hand')) return [];
  const hint = 'Set fullyRead to false until every row was read first-hand.';
  return [{ path: '/fullyRead', problem: 'not every row was read first-hand', hint }];
}

/**
 * One rule pack from its file.
 *
 * @throws {InvalidInput} naming file, line and place of everything that cannot be used
 */
export function rulePackOf(path: string, known: PackKnowledge): RulePack {
  const { gases, policy } = known;
  const file = readDataFile(path);
  const pack = checked(file, rulePackSchema, 'rule pack');
  const gasRows = [
    ...pack.exposureLimits.map((row, i) => [row.gas, `/exposureLimits/${String(i)}/gas`] as const),
    ...pack.alarms.map((row, i) => [row.gas, `/alarms/${String(i)}/gas`] as const),
    ...pack.warmingPotentials.map(
      (row, i) => [row.gas, `/warmingPotentials/${String(i)}/gas`] as const,
    ),
    ...pack.notes.flatMap((note, i) =>
      (note.gases ?? []).map((gas, j) => [gas, `/notes/${String(i)}/gases/${String(j)}`] as const),
    ),
  ];
  refuseFaults(file, 'rule pack', [
    ...repeatedIdFaults(pack.rules, '/rules'),
    ...repeatedIdFaults(pack.exposureLimits, '/exposureLimits'),
    ...repeatedIdFaults(pack.oxygenThresholds, '/oxygenThresholds'),
    ...repeatedIdFaults(pack.flammableThresholds, '/flammableThresholds'),
    ...whenFaults(pack.rules, '/rules', known),
    ...gasRows.flatMap(([gas, place]) => unknownFaults(gas, gases, 'gas', place)),
    ...pack.exposureLimits.flatMap((row, i) =>
      exposureFaults(row, pack, policy, `/exposureLimits/${String(i)}`),
    ),
    ...pack.oxygenThresholds.flatMap((row, i) =>
      oxygenFaults(row, policy, `/oxygenThresholds/${String(i)}`),
    ),
    ...pack.flammableThresholds.flatMap((row, i) =>
      flammableFaults(row, policy, `/flammableThresholds/${String(i)}`),
    ),
    ...pack.alarms.flatMap((row, i): readonly Fault[] =>
      row.role === 'judge'
        ? [
            {
              path: `/alarms/${String(i)}/role`,
              problem: 'an alarm set point is no limit and cannot judge',
              hint: 'Set role to show.',
            },
          ]
        : [],
    ),
    ...carriageFaults(pack),
    ...readFaults(pack),
  ]);
  return pack;
}

/** What all packs share, from `rules/common.yaml`. */
export function commonRulesOf(path: string, names: KnownNames): CommonRules {
  const file = readDataFile(path);
  const common = checked(file, commonRulesSchema, 'list of shared rules');
  refuseFaults(file, 'list of shared rules', [
    ...repeatedIdFaults(common.signs, '/signs'),
    ...whenFaults(common.signs, '/signs', names),
    ...common.unNumbers.flatMap((row, i) =>
      unknownFaults(row.gas, names.gases, 'gas', `/unNumbers/${String(i)}/gas`),
    ),
    ...common.flammableLimits.flatMap((row, i) =>
      unknownFaults(row.gas, names.gases, 'gas', `/flammableLimits/${String(i)}/gas`),
    ),
  ]);
  return common;
}
