import { readFileSync } from 'node:fs';

/** One published or derived check, as transcribed: question, numbers, tolerance, source. */
export interface ReferenceRecord {
  readonly id: string;
  readonly question: string;
  readonly inputs: Readonly<Record<string, unknown>>;
  readonly expected: Readonly<Record<string, unknown>>;
  readonly tolerance: {
    readonly relative?: number;
    readonly absolute?: number;
    readonly either?: boolean;
    readonly exact?: boolean;
  };
  readonly source: string;
  readonly status: string;
}

export function referenceRecords(file: string, list: string): readonly ReferenceRecord[] {
  const text = readFileSync(new URL(`../reference/${file}`, import.meta.url), 'utf8');
  const document = JSON.parse(text) as Record<string, unknown>;
  return document[list] as readonly ReferenceRecord[];
}

/** Places where an answer lies outside the tolerance of its record, with both values. */
export function recordMisses(
  record: ReferenceRecord,
  actual: Readonly<Record<string, unknown>>,
): readonly string[] {
  return Object.entries(record.expected).flatMap(([key, expected]) =>
    valueMisses(expected, actual[key], key, record.tolerance),
  );
}

function valueMisses(
  expected: unknown,
  actual: unknown,
  path: string,
  tolerance: ReferenceRecord['tolerance'],
): readonly string[] {
  if (Array.isArray(expected)) {
    if (!Array.isArray(actual) || actual.length !== expected.length) {
      return [`${path}: not a list of ${String(expected.length)}`];
    }
    return expected.flatMap((one, i) =>
      valueMisses(one, actual[i], `${path}[${String(i)}]`, tolerance),
    );
  }
  if (typeof expected !== 'number') {
    return actual === expected ? [] : [`${path}: ${String(actual)}, not ${String(expected)}`];
  }
  if (typeof actual !== 'number' || !Number.isFinite(actual)) return [`${path}: no number`];
  const difference = Math.abs(actual - expected);
  const relative =
    tolerance.relative === undefined
      ? undefined
      : difference <= tolerance.relative * Math.abs(expected);
  const absolute = tolerance.absolute === undefined ? undefined : difference <= tolerance.absolute;
  const met = tolerance.either
    ? relative === true || absolute === true
    : relative !== false && absolute !== false && (tolerance.exact !== true || difference === 0);
  return met ? [] : [`${path}: ${String(actual)}, not ${String(expected)}`];
}

/** One number of a record beside what was computed, and the share of the tolerance it takes. */
export interface Deviation {
  readonly path: string;
  readonly expected: number;
  readonly actual: number;
  readonly used: number;
}

/** Every number of a record beside what was computed. */
export function recordDeviations(
  record: ReferenceRecord,
  actual: Readonly<Record<string, unknown>>,
): readonly Deviation[] {
  const { relative, absolute } = record.tolerance;
  const numbers = (expected: unknown, value: unknown, path: string): readonly Deviation[] => {
    if (Array.isArray(expected)) {
      const values: readonly unknown[] = Array.isArray(value) ? value : [];
      return expected.flatMap((one, i) => numbers(one, values[i], `${path}[${String(i)}]`));
    }
    if (typeof expected !== 'number' || typeof value !== 'number') return [];
    const allowed = Math.max((relative ?? 0) * Math.abs(expected), absolute ?? 0, Number.MIN_VALUE);
    const off = Math.abs(value - expected);
    return [{ path, expected, actual: value, used: off === 0 ? 0 : off / allowed }];
  };
  return Object.entries(record.expected).flatMap(([key, expected]) =>
    numbers(expected, actual[key], key),
  );
}
