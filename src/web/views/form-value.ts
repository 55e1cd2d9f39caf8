import type { ErrorDetail } from '../../errors.js';
import { readFigure } from '../forms/figure-form.js';
import { rowNumbers, type FormFields } from '../forms/form-fields.js';
import { siValue, typedNumber, type ShownUnit } from '../forms/typed-number.js';
import type { Range } from '../../science/range.js';
import { dayTimeSeconds } from './day-time.js';
import { nameIn, restField, type FieldSpec, type RowSpec } from './field-spec.js';
import { isRecord, setAt, valueAt, type FormRecord } from './record-access.js';

export interface FormValue {
  readonly value: FormRecord;
  /** `path` is `/` and the name of the field. */
  readonly problems: readonly ErrorDetail[];
}

const isDate = (text: string): boolean =>
  /^\d{4}-\d{2}-\d{2}$/.test(text) &&
  !Number.isNaN(Date.parse(`${text}T00:00:00Z`)) &&
  new Date(`${text}T00:00:00Z`).toISOString().startsWith(text);

const settled = (value: number): number => Number(value.toPrecision(6));

/** The limits of a range in the unit that people type. */
function shownLimits(range: Range | undefined, unit: ShownUnit): { min?: number; max?: number } {
  if (range === undefined) return {};
  const shown = (value: number) => settled((value - (unit.offset ?? 0)) / unit.factor);
  return { min: shown(range.min), max: shown(range.max) };
}

type Complain = (name: string, problem: string) => void;

function readNumber(
  text: string,
  name: string,
  spec: Extract<FieldSpec, { kind: 'number' }>,
  complain: Complain,
): number | undefined {
  const typed = typedNumber(text);
  const say = (problem: string): undefined => {
    complain(name, `${spec.label}: ${problem}`);
    return undefined;
  };
  if ('problem' in typed) {
    say(typed.problem);
    return;
  }
  const { symbol } = spec.unit;
  if (spec.whole && !Number.isInteger(typed.value)) {
    say(`${text} is not a whole number`);
    return;
  }
  if (spec.min !== undefined && typed.value < spec.min) {
    say(`${text} is too small: ${String(spec.min)} ${symbol} or more`.trim());
    return;
  }
  if (spec.max !== undefined && typed.value > spec.max) {
    say(`${text} is too large: ${String(spec.max)} ${symbol} or less`.trim());
    return;
  }
  return siValue(typed.value, spec.unit);
}

function readRest(fields: FormFields, prefix: string, complain: Complain): FormRecord {
  const name = nameIn(prefix, restField);
  const text = fields[name];
  if (text === undefined) return {};
  try {
    const rest: unknown = JSON.parse(text);
    if (isRecord(rest)) return rest;
  } catch {
    // Said below: the field is ours, so only a damaged form gets here.
  }
  complain(name, 'This form was damaged on its way. Load the page again and repeat the change.');
  return {};
}

function readOne(
  fields: FormFields,
  prefix: string,
  spec: FieldSpec,
  record: FormRecord,
  problems: ErrorDetail[],
): void {
  const complain: Complain = (at, problem) => {
    problems.push({ path: `/${at}`, problem });
  };
  const name = nameIn(prefix, spec.key);
  if (spec.kind === 'rows') {
    const rows = rowNumbersIn(fields, name).map((row) =>
      readRow(fields, nameIn(name, String(row)), spec.rows, problems),
    );
    setAt(record, spec.key, rows);
    return;
  }
  const text = fields[name];
  if (spec.kind === 'kept') {
    if (text !== undefined) setAt(record, spec.key, text);
    return;
  }
  if (spec.kind === 'check') {
    if (text === 'on') setAt(record, spec.key, true);
    return;
  }
  if (spec.kind === 'figure' || spec.kind === 'amount') {
    const chosen =
      spec.kind === 'figure' ? spec : spec.units.find(({ key }) => key === fields[`${name}-unit`]);
    if (chosen === undefined) {
      // Taking the first unit for granted could be wrong by a factor of a thousand.
      const isStated = text !== undefined || fields[`${name}-origin`] !== undefined;
      if (isStated) complain(`${name}-unit`, `${spec.label}: choose the unit`);
      return;
    }
    const read = readFigure(fields, name, {
      label: spec.label,
      unit: chosen.unit,
      required: spec.required ?? false,
      ...shownLimits(chosen.range, chosen.unit),
    });
    problems.push(...read.problems);
    if (read.figure === undefined) return;
    const at = spec.kind === 'figure' ? spec.key : siblingKey(spec.key, chosen.key);
    setAt(record, at, read.figure);
    return;
  }
  if (spec.kind === 'yesNo') {
    if (text === 'yes' || text === 'no') setAt(record, spec.key, text === 'yes');
    return;
  }
  if (text === undefined) {
    if (spec.required) {
      const ask = spec.kind === 'choice' ? 'choose one' : 'fill this in';
      complain(name, `${spec.label}: ${ask}`);
    }
    return;
  }
  if (spec.kind === 'number') {
    const value = readNumber(text, name, spec, complain);
    if (value !== undefined) setAt(record, spec.key, value);
    return;
  }
  if (spec.kind === 'dayTime') {
    const seconds = dayTimeSeconds(text);
    if (seconds === undefined) complain(name, `${spec.label}: write the time as 09:45`);
    else setAt(record, spec.key, seconds);
    return;
  }
  if (spec.kind === 'clock' && !/^([01]\d|2[0-3]):[0-5]\d$/.test(text)) {
    complain(name, `${spec.label}: write the time as 09:45`);
    return;
  }
  if (spec.kind === 'date' && !isDate(text)) {
    complain(name, `${spec.label}: write the date as 2026-01-31`);
    return;
  }
  setAt(record, spec.key, text);
}

/** The key beside another one: `releases.amount` and `massKg` give `releases.massKg`. */
export function siblingKey(key: string, sibling: string): string {
  const parts = key.split('.');
  parts[parts.length - 1] = sibling;
  return parts.join('.');
}

/** The numbers of the rows of a list that were sent, wherever the list stands. */
export function rowNumbersIn(fields: FormFields, list: string): readonly number[] {
  const within: Record<string, string | undefined> = {};
  for (const name of Object.keys(fields)) {
    if (name.startsWith(`${list}.`)) within[`row.${name.slice(list.length + 1)}`] = '';
  }
  return rowNumbers(within, 'row');
}

function readRow(
  fields: FormFields,
  prefix: string,
  spec: RowSpec,
  problems: ErrorDetail[],
): FormRecord {
  const inner = formValue(fields, spec.fields, prefix);
  problems.push(...inner.problems);
  const id = spec.idPrefix === undefined ? undefined : fields[nameIn(prefix, 'id')];
  return { ...(id !== undefined && { id }), ...inner.value };
}

/**
 * The record that a form sent, in SI units, with what is wrong in it. A blank field is missing: it
 * never becomes zero.
 */
export function formValue(fields: FormFields, specs: readonly FieldSpec[], prefix = ''): FormValue {
  const problems: ErrorDetail[] = [];
  const value = readRest(fields, prefix, (name, problem) => {
    problems.push({ path: `/${name}`, problem });
  });
  for (const spec of specs) {
    const shown =
      spec.kind === 'amount'
        ? spec.units.map((unit) => siblingKey(spec.key, unit.key))
        : [spec.key];
    // What the form shows wins over what it only carries.
    for (const key of shown) if (valueAt(value, key) !== undefined) setAt(value, key, undefined);
    readOne(fields, prefix, spec, value, problems);
  }
  return { value: JSON.parse(JSON.stringify(value)) as FormRecord, problems };
}
