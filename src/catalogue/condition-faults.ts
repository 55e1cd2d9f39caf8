import {
  factKinds,
  type Condition,
  type Fact,
  type FactKind,
} from '../assessment/catalogue-types.js';
import type { Fault } from './data-file.js';

const forms = ['always', 'fact', 'all', 'any', 'not'] as const;
const tests = ['is', 'anyOf', 'above', 'atLeast', 'below'] as const;

const testsOfKind: Record<FactKind, readonly (typeof tests)[number][]> = {
  truth: ['is'],
  list: ['anyOf'],
  number: ['above', 'atLeast', 'below'],
};

const hint =
  'A condition is always: true, or one fact with one fitting test, or all, any or not of such.';

/** What is wrong with a condition beyond its shape: mixed forms, or a test its fact cannot take. */
export function conditionFaults(condition: Condition, path: string): readonly Fault[] {
  const used = forms.filter((form) => condition[form] !== undefined);
  const asked = tests.filter((test) => condition[test] !== undefined);
  const [form] = used;
  if (used.length !== 1 || form === undefined) {
    return [{ path, problem: `needs exactly one of ${forms.join(', ')}`, hint }];
  }
  if (form !== 'fact' && asked.length > 0) {
    return [{ path, problem: `${asked.join(', ')} without a fact`, hint }];
  }
  if (condition.fact !== undefined) {
    const kind = factKinds[condition.fact];
    const [test] = asked;
    if (asked.length !== 1 || test === undefined || !testsOfKind[kind].includes(test)) {
      const wanted = testsOfKind[kind].join(', ');
      return [{ path, problem: `${condition.fact} takes exactly one of ${wanted}`, hint }];
    }
    return [];
  }
  return [
    ...(condition.all ?? []).flatMap((part, i) =>
      conditionFaults(part, `${path}/all/${String(i)}`),
    ),
    ...(condition.any ?? []).flatMap((part, i) =>
      conditionFaults(part, `${path}/any/${String(i)}`),
    ),
    ...(condition.not ? conditionFaults(condition.not, `${path}/not`) : []),
  ];
}

/** What a condition names under some facts, with the place where each is named. */
export function namesAsked(
  condition: Condition,
  facts: readonly Fact[],
  path: string,
): readonly [string, string][] {
  const own: [string, string][] =
    condition.fact !== undefined && facts.includes(condition.fact)
      ? (condition.anyOf ?? []).map((name, i) => [name, `${path}/anyOf/${String(i)}`])
      : [];
  const of = (part: Condition, step: string) => namesAsked(part, facts, `${path}/${step}`);
  return [
    ...own,
    ...(condition.all ?? []).flatMap((part, i) => of(part, `all/${String(i)}`)),
    ...(condition.any ?? []).flatMap((part, i) => of(part, `any/${String(i)}`)),
    ...(condition.not ? of(condition.not, 'not') : []),
  ];
}
