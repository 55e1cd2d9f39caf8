import type { ErrorDetail } from '../errors.js';
import { planTexts as words } from '../web/texts/en-plans.js';
import { nameIn, type FieldSpec } from '../web/views/field-spec.js';
import { fieldNameAt } from '../web/views/pointer-names.js';

/** The label of a field by its name on the page, and the row it stands in. */
function labelAt(specs: readonly FieldSpec[], name: string, prefix = ''): string | undefined {
  for (const spec of specs) {
    if (spec.kind === 'kept') continue;
    const own = nameIn(prefix, spec.key);
    if (spec.kind !== 'rows') {
      if (own === name) return spec.label;
      continue;
    }
    if (own === name) return spec.rows.title;
    if (!name.startsWith(`${own}.`)) continue;
    const [row = '', ...rest] = name.slice(own.length + 1).split('.');
    const place = `${spec.rows.title} ${String(Number(row) + 1)}`;
    if (rest.length === 0) return place;
    const inner = labelAt(spec.rows.fields, name, nameIn(own, row));
    return inner === undefined ? place : `${place}, ${inner}`;
  }
  return undefined;
}

/** Complaints that read better in the words of the page than in those of the plan file. */
const plainer: readonly (readonly [RegExp, string])[] = [
  [/either as minute/, words.problems.time],
  [/one of amountMol/, words.problems.amount],
  [/its content one way/, words.problems.content],
];

/**
 * Complaints about a plan file as messages of the page: each moved to the field it concerns, named
 * as the page names it.
 */
export function pageMessages(
  details: readonly ErrorDetail[],
  specs: readonly FieldSpec[],
  names: ReadonlySet<string>,
): readonly ErrorDetail[] {
  return details.map(({ path, problem }) => {
    const pointer = path.split('/').slice(1).join('.');
    const missingList =
      pointer in words.problems.list
        ? words.problems.list[pointer as keyof typeof words.problems.list]
        : undefined;
    if (missingList !== undefined) return { path: `/${pointer}`, problem: missingList };
    if (path === '/venue') return { path: '/venueId', problem: words.venueNeeded };
    const name = fieldNameAt(path, names);
    const said = plainer.find(([pattern]) => pattern.test(problem))?.[1] ?? problem;
    const label = name === undefined ? undefined : labelAt(specs, name);
    return {
      path: name === undefined ? '' : `/${name}`,
      problem: label === undefined ? `${path} ${said}`.trim() : `${label}: ${said}`,
    };
  });
}
