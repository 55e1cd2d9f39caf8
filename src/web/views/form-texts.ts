import type { PhysicalFigure } from '../../assessment/plan-file.js';
import { figureTexts } from '../forms/figure-form.js';
import { shownText, type ShownUnit } from '../forms/typed-number.js';
import { dayTimeText } from './day-time.js';
import { nameIn, restField, type FieldSpec } from './field-spec.js';
import { siblingKey } from './form-value.js';
import { isRecord, valueAt, type FormRecord } from './record-access.js';

type Texts = Record<string, string>;

const isFigure = (value: unknown): value is PhysicalFigure =>
  typeof value === 'number' || isRecord(value);

function amountTexts(
  record: FormRecord,
  name: string,
  spec: Extract<FieldSpec, { kind: 'amount' }>,
): Texts {
  for (const { key, unit } of spec.units) {
    const figure = valueAt(record, siblingKey(spec.key, key));
    if (!isFigure(figure)) continue;
    return { ...figureTexts(name, figure, unit), [`${name}-unit`]: key };
  }
  return {};
}

function plainText(value: unknown, unit?: ShownUnit): string | undefined {
  if (typeof value === 'string') return value;
  if (typeof value !== 'number') return undefined;
  return unit === undefined ? String(value) : shownText(value, unit);
}

function textsOfField(record: FormRecord, prefix: string, spec: FieldSpec): Texts {
  const name = nameIn(prefix, spec.key);
  if (spec.kind === 'amount') return amountTexts(record, name, spec);
  const value = valueAt(record, spec.key);
  if (value === undefined) return {};
  switch (spec.kind) {
    case 'rows': {
      const rows: readonly unknown[] = Array.isArray(value) ? value : [];
      return Object.assign(
        {},
        ...rows.map((row, index) => {
          const inner: FormRecord = isRecord(row) ? row : {};
          const at = nameIn(name, String(index));
          const { id } = inner;
          const own: Texts = typeof id === 'string' ? { [nameIn(at, 'id')]: id } : {};
          return { ...own, ...formTexts(inner, spec.rows.fields, at) };
        }),
      ) as Texts;
    }
    case 'figure':
      return isFigure(value) ? figureTexts(name, value, spec.unit) : {};
    case 'check':
      return value === true ? { [name]: 'on' } : {};
    case 'yesNo':
      return typeof value === 'boolean' ? { [name]: value ? 'yes' : 'no' } : {};
    case 'dayTime':
      return typeof value === 'number' ? { [name]: dayTimeText(value) } : {};
    case 'text':
    case 'longText':
    case 'number':
    case 'choice':
    case 'date':
    case 'clock':
    case 'kept': {
      const text = plainText(value, spec.kind === 'number' ? spec.unit : undefined);
      return text === undefined ? {} : { [name]: text };
    }
  }
}

/** What the description does not show, so that saving a form cannot lose it. */
function restOf(record: FormRecord, specs: readonly FieldSpec[]): FormRecord {
  const shown = new Set([
    'id',
    ...specs.flatMap((spec) =>
      spec.kind === 'amount' ? spec.units.map(({ key }) => siblingKey(spec.key, key)) : [spec.key],
    ),
  ]);
  const remainder = (value: FormRecord, prefix: string): FormRecord =>
    Object.fromEntries(
      Object.entries(value).flatMap(([key, entry]): [string, unknown][] => {
        const at = nameIn(prefix, key);
        if (shown.has(at)) return [];
        const leadsOn = [...shown].some((name) => name.startsWith(`${at}.`));
        if (!leadsOn || !isRecord(entry)) return [[key, entry]];
        const inner = remainder(entry, at);
        return Object.keys(inner).length > 0 ? [[key, inner]] : [];
      }),
    );
  return remainder(record, '');
}

/** The texts that fill a form with a record: the way back from `formValue`. */
export function formTexts(
  record: FormRecord,
  specs: readonly FieldSpec[],
  prefix = '',
): Record<string, string> {
  const texts: Texts = {};
  for (const spec of specs) Object.assign(texts, textsOfField(record, prefix, spec));
  const rest = restOf(record, specs);
  if (Object.keys(rest).length > 0) texts[nameIn(prefix, restField)] = JSON.stringify(rest);
  return texts;
}
