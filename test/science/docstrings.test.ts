import { readdirSync } from 'node:fs';
import { join, relative, resolve } from 'node:path';
import { pathToFileURL } from 'node:url';
import { runInNewContext } from 'node:vm';
import ts from 'typescript';
import { describe, expect, it } from 'vitest';
import { loadGasLibrary } from '../../src/catalogue/gas-library.js';
import { sources } from '../../src/science/sources.js';

/*
 * Every exported function under src/science that answers a quantity is documented as our house
 * documents science: a first line with a unit, each number it takes with a unit in brackets, a source
 * that is in the bibliography, and examples that evaluate to the number shown. Functions that hand
 * structures from one step of a model to the next need a docstring in words.
 */
const root = resolve('src/science');

/** Guards and tables that measure nothing, and so have no unit or source. */
const notScience = new Set(['range.ts', 'sources.ts']);

/** Rooms in which even functions that answer structures are in the full form. */
const wholeRooms = /^(gases|acoustics|releases)\/|^quantity\.ts$/;

function filesUnder(folder: string): string[] {
  return readdirSync(folder, { withFileTypes: true }).flatMap((entry) => {
    const path = join(folder, entry.name);
    if (entry.isDirectory()) return filesUnder(path);
    return entry.name.endsWith('.ts') && !notScience.has(relative(root, path)) ? [path] : [];
  });
}

interface DocumentedFunction {
  readonly name: string;
  readonly file: string;
  readonly text: string;
  readonly isQuantity: boolean;
  readonly parameters: readonly { readonly name: string; readonly isNumeric: boolean }[];
}

/** Whether a written type is a number or a list of numbers: then its unit must be named. */
function isNumeric(type: ts.TypeNode | undefined): boolean {
  return /^(readonly )?(number|number\[\]|Float64Array)( \| (undefined|null))?$/.test(
    type?.getText() ?? 'number',
  );
}

function exportedFunctions(file: string): DocumentedFunction[] {
  const text = ts.sys.readFile(file) ?? '';
  const source = ts.createSourceFile(file, text, ts.ScriptTarget.ES2023, true);
  return source.statements.flatMap((statement) => {
    if (!ts.isFunctionDeclaration(statement) || statement.name === undefined) return [];
    const isExported = statement.modifiers?.some(
      ({ kind }) => kind === ts.SyntaxKind.ExportKeyword,
    );
    if (isExported !== true) return [];
    const ranges = ts.getLeadingCommentRanges(text, statement.getFullStart()) ?? [];
    const last = ranges.at(-1);
    return [
      {
        name: statement.name.text,
        file: relative(root, file),
        isQuantity:
          /^number\b/.test(statement.type?.getText() ?? '') ||
          wholeRooms.test(relative(root, file)),
        text: last === undefined ? '' : text.slice(last.pos, last.end),
        parameters: statement.parameters.map(({ name, type }) => ({
          name: name.getText(),
          isNumeric: isNumeric(type),
        })),
      },
    ];
  });
}

/** The docstring without its stars, one entry a tag; the first entry is what precedes the tags. */
function partsOf(text: string): string[] {
  return text
    .replace(/^\/\*\*|\*\/$/g, '')
    .replace(/^[ \t]*\*[ \t]?/gm, '')
    .split(/\n(?=@|Source:)/)
    .map((part) => part.trim());
}

function documentationGaps({ text, parameters, isQuantity }: DocumentedFunction): string[] {
  if (!text.startsWith('/**')) return ['has no docstring'];
  if (!isQuantity) return [];
  const parts = partsOf(text);
  const gaps: string[] = [];
  const opening = parts[0]?.split('\n\n')[0] ?? '';
  if (!opening.includes('[')) gaps.push('its first line names no unit in brackets');
  for (const { name, isNumeric: needsUnit } of parameters) {
    if (name.startsWith('{')) continue;
    const part = parts.find((entry) => new RegExp(`^@param ${name}\\b`).test(entry));
    if (part === undefined) gaps.push(`parameter ${name} is not described`);
    else if (needsUnit && !part.includes('['))
      gaps.push(`parameter ${name} has no unit in brackets`);
  }
  const key = /Source:\s+([a-z0-9-]+)/.exec(text)?.[1];
  if (key === undefined) gaps.push('names no source');
  else if (!(key in sources)) gaps.push(`source ${key} is not in the bibliography`);
  return gaps;
}

interface Example {
  readonly title: string;
  readonly file: string;
  readonly expression: string;
  readonly shown: string;
}

function examplesOf(documented: DocumentedFunction): Example[] {
  return partsOf(documented.text)
    .filter((part) => part.startsWith('@example'))
    .map((part) => {
      const [expression = '', shown = ''] = part.slice('@example'.length).split('//');
      return {
        title: `${documented.file} ${documented.name}:${expression.trimEnd()} is ${shown.trim()}`,
        file: documented.file,
        expression: expression.replace(/\s+/g, ' ').trim(),
        shown: shown.trim(),
      };
    });
}

/** Half a unit of the last digit shown. */
function roundingOf(shown: string): number {
  const [mantissa = '', exponent = '0'] = shown.toLowerCase().split('e');
  const decimals = mantissa.split('.')[1]?.length ?? 0;
  return 0.5000001 * 10 ** (Number(exponent) - decimals);
}

const documented = filesUnder(root).flatMap(exportedFunctions);
const examples = documented.flatMap(examplesOf);

it('finds the exported functions of the science', () => {
  expect(documented.length).toBeGreaterThan(50);
  expect(examples.length).toBeGreaterThan(30);
});

describe('docstrings', () => {
  it.each(documented.map((entry) => [entry.file, entry.name, entry] as const))(
    '%s %s names units and a source',
    (_file, _name, entry) => {
      expect(documentationGaps(entry)).toEqual([]);
    },
  );
});

describe('examples', () => {
  const library = loadGasLibrary();
  it.each(examples.map((example) => [example.title, example] as const))(
    '%s',
    async (_title, { file, expression, shown }) => {
      const own = (await import(pathToFileURL(join(root, file)).href)) as Record<string, unknown>;
      const molar = await import('../../src/science/gases/molar-volume.js');
      const scope: Record<string, unknown> = { ...molar, ...own, library };
      const value: unknown = runInNewContext(expression, scope);
      if (typeof value === 'number') {
        expect(Math.abs(value - Number(shown))).toBeLessThanOrEqual(roundingOf(shown));
      } else {
        expect(JSON.stringify(value)).toBe(shown.replace(/'/g, '"'));
      }
    },
  );
});
