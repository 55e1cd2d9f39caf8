import type { Condition } from '../assessment/catalogue-types.js';
import { conditionFaults, namesAsked } from './condition-faults.js';
import type { Fault } from './data-file.js';

/** Names that conditions and rows anywhere may use. */
export interface KnownNames {
  readonly gases: ReadonlySet<string>;
  readonly demonstrations: ReadonlySet<string>;
}

/** A reference to something that must exist: an empty list when it does. */
export function unknownFaults(
  value: string | undefined,
  known: ReadonlySet<string>,
  kind: string,
  path: string,
): readonly Fault[] {
  if (value === undefined || known.has(value)) return [];
  return [
    {
      path,
      problem: `unknown ${kind} "${value}"`,
      hint: `Known: ${[...known].sort().join(', ')}.`,
    },
  ];
}

/** Ids used more than once in one list. */
export function repeatedIdFaults(
  rows: readonly { readonly id: string }[],
  path: string,
): readonly Fault[] {
  const seen = new Set<string>();
  return rows.flatMap(({ id }, i) => {
    if (!seen.has(id)) {
      seen.add(id);
      return [];
    }
    return [
      {
        path: `${path}/${String(i)}/id`,
        problem: `the id "${id}" is used twice`,
        hint: 'Give each row its own id.',
      },
    ];
  });
}

/** Everything wrong with the conditions of a list of rows. */
export function whenFaults(
  rows: readonly { readonly when: Condition }[],
  path: string,
  names: KnownNames,
): readonly Fault[] {
  return rows.flatMap(({ when }, i) => {
    const place = `${path}/${String(i)}/when`;
    return [
      ...conditionFaults(when, place),
      ...namesAsked(when, ['gasesReleased', 'gasesPresent'], place).flatMap(([gas, at]) =>
        unknownFaults(gas, names.gases, 'gas', at),
      ),
      ...namesAsked(when, ['demonstrations'], place).flatMap(([id, at]) =>
        unknownFaults(id, names.demonstrations, 'demonstration', at),
      ),
    ];
  });
}
