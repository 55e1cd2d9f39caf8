import type { FormFields } from '../forms/form-fields.js';
import { nameIn, type ChoiceLists, type FieldSpec } from './field-spec.js';
import { rowNumbersIn } from './form-value.js';
import { fieldText } from './row-heading.js';

/** One entry in which two versions of a form differ. */
export interface Difference {
  readonly where: string;
  readonly theirs: string;
  readonly yours: string;
}

const parts = ['', '-low', '-high', '-origin', '-on', '-by', '-note', '-unit'];

/** Where two fillings of the same form differ, in the words of the page. */
export function formDifferences(
  theirs: FormFields,
  yours: FormFields,
  specs: readonly FieldSpec[],
  lists: ChoiceLists,
  place: { readonly prefix: string; readonly title: string } = { prefix: '', title: '' },
): readonly Difference[] {
  const { prefix, title } = place;
  return specs.flatMap((spec): readonly Difference[] => {
    const name = nameIn(prefix, spec.key);
    if (spec.kind === 'kept') return [];
    if (spec.kind === 'rows') {
      const rows = new Set([...rowNumbersIn(theirs, name), ...rowNumbersIn(yours, name)]);
      return [...rows].flatMap((row) =>
        formDifferences(theirs, yours, spec.rows.fields, lists, {
          prefix: nameIn(name, String(row)),
          title: `${title}${spec.rows.title} ${String(row + 1)}, `,
        }),
      );
    }
    const shown = (fields: FormFields) =>
      fieldText(spec, prefix, { values: fields, problems: [] }, lists) || (fields[name] ?? '');
    const bounds = (fields: FormFields) =>
      parts
        .slice(1)
        .map((part) => fields[`${name}${part}`])
        .filter((text) => text !== undefined)
        .join(', ');
    const whole = (fields: FormFields) =>
      [shown(fields), bounds(fields)].filter((text) => text !== '').join('; ');
    const differs = parts.some((part) => theirs[`${name}${part}`] !== yours[`${name}${part}`]);
    if (!differs) return [];
    return [{ where: `${title}${spec.label}`, theirs: whole(theirs), yours: whole(yours) }];
  });
}
