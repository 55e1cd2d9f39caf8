import type { FormFields } from '../forms/form-fields.js';
import { nameIn, restField, rowMark, type FieldSpec, type RowSpec } from './field-spec.js';
import { rowNumbersIn } from './form-value.js';

type Texts = Record<string, string>;

/** The description of a list by its name in the form, such as `acts.0.releases.planned`. */
export function rowSpecAt(specs: readonly FieldSpec[], list: string): RowSpec | undefined {
  for (const spec of specs) {
    if (spec.kind !== 'rows') continue;
    if (spec.key === list) return spec.rows;
    if (!list.startsWith(`${spec.key}.`)) continue;
    const [, ...inner] = list.slice(spec.key.length + 1).split('.');
    const found = rowSpecAt(spec.rows.fields, inner.join('.'));
    if (found) return found;
  }
  return undefined;
}

function copied(fields: FormFields): Texts {
  const texts: Texts = {};
  for (const [name, text] of Object.entries(fields)) if (text !== undefined) texts[name] = text;
  return texts;
}

/** Short ids in use anywhere in the form, so that a fresh one meets no other. */
function freeId(fields: FormFields, prefix: string): string {
  const used = new Set(
    Object.entries(fields)
      .filter(([name]) => name.endsWith('.id'))
      .map(([, text]) => text),
  );
  let number = 1;
  while (used.has(`${prefix}${String(number)}`)) number += 1;
  return `${prefix}${String(number)}`;
}

/** The form with one more row at the end of a list, filled with the texts given or its presets. */
export function withRow(
  fields: FormFields,
  list: string,
  spec: RowSpec,
  texts: Readonly<Record<string, string>> = spec.preset ?? {},
): { readonly fields: Texts; readonly row: string } {
  const next = (rowNumbersIn(fields, list).at(-1) ?? -1) + 1;
  const row = nameIn(list, String(next));
  const result = copied(fields);
  for (const [key, text] of Object.entries(texts)) result[nameIn(row, key)] = text;
  if (spec.idPrefix !== undefined) result[nameIn(row, 'id')] = freeId(fields, spec.idPrefix);
  // A row without any text would not be seen again: an empty mark keeps its place.
  result[nameIn(row, rowMark)] = 'on';
  return { fields: result, row };
}

/** The form without one row, the later rows of its list moved up. */
export function withoutRow(fields: FormFields, row: string): Texts {
  const cut = row.lastIndexOf('.');
  const list = row.slice(0, cut);
  const gone = Number(row.slice(cut + 1));
  const result: Texts = {};
  for (const [name, text] of Object.entries(copied(fields))) {
    if (!name.startsWith(`${list}.`)) {
      result[name] = text;
      continue;
    }
    const [head = '', ...tail] = name.slice(list.length + 1).split('.');
    const number = Number(head);
    if (number === gone) continue;
    result[[list, String(number > gone ? number - 1 : number), ...tail].join('.')] = text;
  }
  return result;
}

/** The form with the rows of every list counted from zero without gaps, as the plan file counts. */
export function withRowsCounted(
  fields: FormFields,
  specs: readonly FieldSpec[],
  prefix = '',
): Texts {
  let result = copied(fields);
  for (const spec of specs) {
    if (spec.kind !== 'rows') continue;
    const list = nameIn(prefix, spec.key);
    const numbers = rowNumbersIn(result, list);
    const places = new Map(numbers.map((number, index) => [number, index]));
    const counted: Texts = {};
    for (const [name, text] of Object.entries(result)) {
      if (!name.startsWith(`${list}.`)) {
        counted[name] = text;
        continue;
      }
      const [head = '', ...tail] = name.slice(list.length + 1).split('.');
      const place = places.get(Number(head));
      if (place !== undefined) counted[[list, String(place), ...tail].join('.')] = text;
    }
    result = counted;
    for (const row of numbers.keys()) {
      result = withRowsCounted(result, spec.rows.fields, nameIn(list, String(row)));
    }
  }
  return result;
}

const figureParts = ['', '-low', '-high', '-origin', '-on', '-by', '-note'];

/** Names of all fields that a form of this description may send, for the rows that it sent. */
export function knownFieldNames(
  fields: FormFields,
  specs: readonly FieldSpec[],
  prefix = '',
): ReadonlySet<string> {
  const names = new Set([nameIn(prefix, restField)]);
  for (const spec of specs) {
    const name = nameIn(prefix, spec.key);
    if (spec.kind === 'rows') {
      for (const row of rowNumbersIn(fields, name)) {
        const at = nameIn(name, String(row));
        names.add(nameIn(at, rowMark));
        if (spec.rows.idPrefix !== undefined) names.add(nameIn(at, 'id'));
        for (const inner of knownFieldNames(fields, spec.rows.fields, at)) names.add(inner);
      }
      continue;
    }
    const isFigure = spec.kind === 'figure' || spec.kind === 'amount';
    for (const part of isFigure ? figureParts : ['']) names.add(`${name}${part}`);
    if (spec.kind === 'amount') names.add(`${name}-unit`);
  }
  return names;
}

/** Places on the page that a message can point at: its fields, its rows and its lists. */
export function placesOnPage(
  fields: FormFields,
  specs: readonly FieldSpec[],
  prefix = '',
): ReadonlySet<string> {
  const places = new Set<string>();
  for (const spec of specs) {
    if (spec.kind === 'kept') continue;
    const name = nameIn(prefix, spec.key);
    places.add(name);
    if (spec.kind !== 'rows') continue;
    for (const row of rowNumbersIn(fields, name)) {
      const at = nameIn(name, String(row));
      places.add(at);
      for (const inner of placesOnPage(fields, spec.rows.fields, at)) places.add(inner);
    }
  }
  return places;
}
