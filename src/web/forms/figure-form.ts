import type { PhysicalFigure, Origin } from '../../assessment/plan-file.js';
import type { ErrorDetail } from '../../errors.js';
import type { FormFields } from './form-fields.js';
import { shownText, siValue, typedNumber, type ShownUnit } from './typed-number.js';

export const origins = [
  'measured',
  'drawing',
  'supplied',
  'assumed',
  'unknown',
] as const satisfies readonly Origin[];

export interface ReadFigure {
  /** Missing when the field was left blank, or when something in it is wrong. */
  readonly figure?: PhysicalFigure;
  readonly problems: readonly ErrorDetail[];
}

export interface FigureRule {
  /** What the figure is, for messages: "The floor area". */
  readonly label: string;
  readonly unit: ShownUnit;
  readonly required?: boolean;
  /** Limits in the shown unit. */
  readonly min?: number;
  readonly max?: number;
}

function isDate(text: string): boolean {
  if (!/^\d{4}-\d{2}-\d{2}$/.test(text)) return false;
  const date = new Date(`${text}T00:00:00Z`);
  return !Number.isNaN(date.getTime()) && date.toISOString().startsWith(text);
}

const isOrigin = (text: string): text is Origin => origins.some((origin) => origin === text);

/**
 * The figure that a figure field sent: `name`, `name-low`, `name-high`, `name-origin`, `name-on`,
 * `name-by`, `name-note`. The result is in the SI unit of the stored key.
 */
export function readFigure(fields: FormFields, name: string, rule: FigureRule): ReadFigure {
  const problems: ErrorDetail[] = [];
  const wrong = (part: string, problem: string): void => {
    problems.push({ path: `/${part}`, problem: `${rule.label}: ${problem}` });
  };
  const number = (part: string): number | undefined => {
    const text = fields[part];
    if (text === undefined) return undefined;
    const typed = typedNumber(text);
    if ('problem' in typed) {
      wrong(part, typed.problem);
      return undefined;
    }
    const { symbol } = rule.unit;
    if (rule.min !== undefined && typed.value < rule.min) {
      wrong(part, `${text} is too small: ${String(rule.min)} ${symbol} or more`.trim());
    } else if (rule.max !== undefined && typed.value > rule.max) {
      wrong(part, `${text} is too large: ${String(rule.max)} ${symbol} or less`.trim());
    }
    return siValue(typed.value, rule.unit);
  };

  const value = number(name);
  const low = number(`${name}-low`);
  const high = number(`${name}-high`);
  const originText = fields[`${name}-origin`];
  const on = fields[`${name}-on`];
  const by = fields[`${name}-by`];
  const note = fields[`${name}-note`];
  const origin = originText !== undefined && isOrigin(originText) ? originText : undefined;
  if (originText !== undefined && origin === undefined) {
    wrong(`${name}-origin`, 'choose where it comes from');
  }
  if (on !== undefined && !isDate(on)) wrong(`${name}-on`, 'write the date as 2026-01-31');

  if (origin === 'unknown' && value !== undefined) {
    wrong(name, 'remove the number, or say where it comes from; what is not known has no value');
  }
  if (value === undefined && origin !== 'unknown' && problems.length === 0) {
    if (low !== undefined || high !== undefined) {
      wrong(name, 'give the value too, or choose \u201cDon\u2019t know\u201d');
    } else if (rule.required === true) {
      wrong(name, 'enter a number, or choose \u201cDon\u2019t know\u201d');
    }
  }
  if (low !== undefined && high !== undefined && low > high) {
    wrong(`${name}-low`, 'the lowest is above the highest');
  } else if (value !== undefined && low !== undefined && value < low) {
    wrong(`${name}-low`, 'the lowest is above the value');
  } else if (value !== undefined && high !== undefined && value > high) {
    wrong(`${name}-high`, 'the highest is below the value');
  }
  if (problems.length > 0) return { problems };

  const bare = [low, high, origin, on, by, note].every((part) => part === undefined);
  if (bare) return value === undefined ? { problems } : { figure: value, problems };
  if (value === undefined && origin !== 'unknown') return { problems };
  return {
    figure: {
      ...(value !== undefined && { value }),
      ...(low !== undefined && { low }),
      ...(high !== undefined && { high }),
      ...(origin !== undefined && { origin }),
      ...(on !== undefined && { on }),
      ...(by !== undefined && { by }),
      ...(note !== undefined && { note }),
    },
    problems,
  };
}

/** The texts that show a stored figure in its field again. */
export function figureTexts(
  name: string,
  figure: PhysicalFigure | undefined,
  unit: ShownUnit,
): Record<string, string> {
  if (figure === undefined) return {};
  if (typeof figure === 'number') return { [name]: shownText(figure, unit) };
  const { value, low, high, origin, on, by, note } = figure;
  return {
    ...(value !== undefined && { [name]: shownText(value, unit) }),
    ...(low !== undefined && { [`${name}-low`]: shownText(low, unit) }),
    ...(high !== undefined && { [`${name}-high`]: shownText(high, unit) }),
    ...(origin !== undefined && { [`${name}-origin`]: origin }),
    ...(on !== undefined && { [`${name}-on`]: on }),
    ...(by !== undefined && { [`${name}-by`]: by }),
    ...(note !== undefined && { [`${name}-note`]: note }),
  };
}
