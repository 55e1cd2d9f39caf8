import { readdirSync, readFileSync, statSync } from 'node:fs';
import { basename, dirname, join } from 'node:path';
import type { Static, TSchema } from 'typebox';
import { isNode, LineCounter, parseDocument } from 'yaml';
import { InvalidInput, type ErrorDetail } from '../errors.js';
import { fitting } from '../assessment/schema-check.js';

/** Largest data file read; the longest of ours is a tenth of it. */
const MAX_BYTES = 1_000_000;

/** One file of templates/, parsed, with the line on which each place of it stands. */
export interface DataFile {
  /** As told to people: folder and name. */
  readonly name: string;
  readonly value: unknown;
  /** Line of the place a JSON Pointer names, or of its nearest parent. */
  lineOf(pointer: string): number;
}

/** Something wrong with a file that its schema cannot see, and what to do about it. */
export interface Fault extends ErrorDetail {
  readonly hint: string;
}

/** A complaint about a file: `name` and line in front, the pointer kept. */
function refusal(
  file: DataFile,
  what: string,
  problems: readonly ErrorDetail[],
  hint: string,
): InvalidInput {
  const located = problems.map(({ path, problem }) => ({
    path,
    problem: `${file.name} line ${String(file.lineOf(path))}: ${problem}`,
  }));
  const [first] = problems;
  const line = String(file.lineOf(first?.path ?? ''));
  const place = first && first.path !== '' ? `${first.path} ` : '';
  const more = problems.length > 1 ? ` (and ${String(problems.length - 1)} more)` : '';
  return new InvalidInput(
    `${file.name} line ${line}: this ${what} cannot be used: ${place}${first?.problem ?? 'does not fit'}${more}.`,
    hint,
    located,
  );
}

function stepsOf(pointer: string): string[] {
  return pointer
    .split('/')
    .slice(1)
    .map((step) => step.replaceAll('~1', '/').replaceAll('~0', '~'));
}

function broken(name: string, line: number, problem: string, hint: string): InvalidInput {
  return new InvalidInput(`${name} line ${String(line)}: ${problem}`, hint, [
    { path: '', problem: `${name} line ${String(line)}: ${problem}` },
  ]);
}

/**
 * A YAML or JSON file of templates/ as plain values.
 *
 * @throws {InvalidInput} with file, line and hint when it is missing, too large or broken
 */
export function readDataFile(path: string): DataFile {
  const name = join(basename(dirname(path)), basename(path));
  return parsedDataText(textOf(path, name), name);
}

/**
 * YAML or JSON text as plain values, with the line of every place.
 *
 * Anchors and aliases are not followed: a small file must not be able to unfold into a large one.
 *
 * @param name what the text is called when something is wrong with it
 * @throws {InvalidInput} with name, line and hint when it is broken
 */
export function parsedDataText(text: string, name: string): DataFile {
  const lines = new LineCounter();
  const document = parseDocument(text, { lineCounter: lines, uniqueKeys: true });
  const [error] = document.errors;
  if (error) {
    const [summary = ''] = error.message.split('\n');
    throw broken(
      name,
      lines.linePos(error.pos[0]).line,
      `the file cannot be read: ${summary.replace(/ at line .*$/, '')}.`,
      'Check indentation, colons and quotes around that line; nothing was taken from it.',
    );
  }
  let value: unknown;
  try {
    value = document.toJS({ maxAliasCount: 0 });
  } catch {
    const alias = Math.max(0, text.search(/(^|[\s[,{:-])\*[A-Za-z0-9]/));
    throw broken(
      name,
      lines.linePos(alias).line,
      'references with * are not accepted.',
      'Write the value out in full where it is needed.',
    );
  }
  const offsetOf = (steps: readonly string[]): number | undefined => {
    const node = document.getIn(steps.map(numeric), true);
    return isNode(node) ? node.range?.[0] : undefined;
  };
  return {
    name,
    value,
    lineOf(pointer) {
      const steps = stepsOf(pointer);
      for (let depth = steps.length; depth > 0; depth -= 1) {
        const offset = offsetOf(steps.slice(0, depth));
        if (offset !== undefined) return lines.linePos(offset).line;
      }
      return 1;
    },
  };
}

/** Steps into a list are numbers; a mapping with number-like keys does not occur in our files. */
function numeric(step: string): string | number {
  return /^\d+$/.test(step) ? Number(step) : step;
}

function textOf(path: string, name: string): string {
  let size: number;
  try {
    size = statSync(path).size;
  } catch {
    throw broken(name, 1, 'the file is missing or cannot be opened.', 'Put the file back.');
  }
  if (size > MAX_BYTES) {
    throw broken(
      name,
      1,
      `the file is larger than ${String(MAX_BYTES)} bytes.`,
      'Split it, or take out what does not belong in it.',
    );
  }
  return readFileSync(path, 'utf8');
}

/**
 * Data files of a folder in the order of their names.
 *
 * @throws {InvalidInput} when the folder cannot be opened
 */
export function dataFilesIn(folder: string): readonly string[] {
  let names: string[];
  try {
    names = readdirSync(folder);
  } catch {
    throw new InvalidInput(
      `The data folder ${basename(folder)} is missing or cannot be opened.`,
      'Put the folder templates back beside the program.',
      [{ path: '', problem: `${basename(folder)} cannot be opened` }],
    );
  }
  return names
    .filter((name) => /\.(ya?ml|json)$/.test(name))
    .sort()
    .map((name) => join(folder, name));
}

/**
 * The content of a data file once it fits its schema.
 *
 * @throws {InvalidInput} naming file, line and place of everything that does not fit
 */
export function checked<S extends TSchema>(file: DataFile, schema: S, what: string): Static<S> {
  try {
    return fitting(schema, file.value, what);
  } catch (error) {
    if (!(error instanceof InvalidInput)) throw error;
    throw refusal(
      file,
      what,
      error.details,
      'Correct the line; every row needs its fields, a source and how it was checked.',
    );
  }
}

/**
 * Nothing, when there is nothing to complain about.
 *
 * @throws {InvalidInput} with every fault, and the hint of the first
 */
export function refuseFaults(file: DataFile, what: string, faults: readonly Fault[]): void {
  const [first] = faults;
  if (!first) return;
  throw refusal(
    file,
    what,
    faults.map(({ path, problem }) => ({ path, problem })),
    first.hint,
  );
}
