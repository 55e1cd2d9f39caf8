#!/usr/bin/env node
import { mkdirSync, readFileSync, renameSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import type { AssessmentData } from './assessment/assess.js';
import { answer, doorError, parsedJson, statusOf } from './assessment/calculators/door.js';
import { calculatorsOf } from './assessment/calculators/registry.js';
import { engineVersion } from './assessment/engine-version.js';
import { loadGasLibrary } from './catalogue/gas-library.js';
import { InvalidInput, NotFound } from './errors.js';

// What only one command needs (catalogue, YAML, sheets, previews) is loaded by that command: a
// calculator that answers in a millisecond should not wait for a printer.

interface Request {
  readonly calculator: string;
  readonly file: string | null;
  readonly sheets: string | null;
  readonly preview: string | null;
}

const usage =
  'Use: cli.js CALCULATOR [FILE] [--sheets DIR] [--preview FILE], or cli.js schema CALCULATOR.';

function requestOf(words: readonly string[]): Request {
  const options: { sheets: string | null; preview: string | null } = {
    sheets: null,
    preview: null,
  };
  const places: string[] = [];
  for (let i = 0; i < words.length; i += 1) {
    const word = words[i] ?? '';
    if (word === '--sheets' || word === '--preview') {
      const value = words[i + 1];
      if (value === undefined || value.startsWith('--')) {
        throw new InvalidInput(`The option ${word} needs a value.`, usage);
      }
      options[word === '--sheets' ? 'sheets' : 'preview'] = value;
      i += 1;
    } else if (word.startsWith('--')) {
      throw new InvalidInput(`There is no option ${word}.`, usage);
    } else places.push(word);
  }
  const [calculator, file = null, extra] = places;
  if (calculator === undefined || extra !== undefined) {
    throw new InvalidInput('The command names one calculator and at most one file.', usage);
  }
  return { calculator, file, ...options };
}

function textOf(file: string | null): string {
  try {
    return readFileSync(file ?? 0, 'utf8');
  } catch {
    throw new InvalidInput(
      file === null ? 'Standard input cannot be read.' : `The file ${file} cannot be read.`,
      'Give the path of a readable file, or send the document on standard input.',
      [{ path: '', problem: 'cannot be read' }],
    );
  }
}

/** Writes aside and renames, so that a file is either the old one or the whole new one. */
function writeWhole(path: string, bytes: Uint8Array): void {
  const aside = `${path}.part`;
  try {
    writeFileSync(aside, bytes);
    renameSync(aside, path);
  } catch {
    throw new InvalidInput(
      `The file ${path} cannot be written.`,
      'Choose a folder that you may write to.',
      [{ path: '', problem: 'cannot be written' }],
    );
  }
}

async function writeSheets(document: unknown, folder: string, data: AssessmentData): Promise<void> {
  const { assess, checkedPlan } = await import('./assessment/assess.js');
  const { renderRiskSheet } = await import('./sheets/risk-sheet-pdf.js');
  const assessment = assess(checkedPlan(document, data), data);
  const printedOn = assessment.date ?? new Date().toISOString().slice(0, 10);
  const pdf = await renderRiskSheet(assessment, { printedOn, status: 'draft' });
  const workings = await renderRiskSheet(assessment, {
    printedOn,
    status: 'draft',
    kind: 'workings',
  });
  try {
    mkdirSync(folder, { recursive: true });
  } catch {
    throw new InvalidInput(
      `The folder ${folder} cannot be made.`,
      'Choose a folder that you may write to.',
      [{ path: '', problem: 'cannot be made' }],
    );
  }
  writeWhole(join(folder, 'risk-sheet.pdf'), pdf);
  writeWhole(join(folder, 'workings.pdf'), workings);
}

async function writePreviews(document: unknown, file: string, data: AssessmentData): Promise<void> {
  const { soundCalculator, soundPreview } = await import('./assessment/calculators/sound.js');
  const { fitting } = await import('./assessment/schema-check.js');
  const { wavBytes } = await import('./science/acoustics/preview.js');
  const pair = soundPreview(fitting(soundCalculator.input, document, 'input of sound'), data);
  const stem = file.replace(/\.wav$/i, '');
  writeWhole(`${stem}-before.wav`, wavBytes(pair.before));
  writeWhole(`${stem}-after.wav`, wavBytes(pair.after));
}

/** The catalogue is read and checked for the one calculator that draws on it. */
async function dataFor(request: Request): Promise<AssessmentData> {
  const gases = loadGasLibrary();
  if (request.calculator === 'assess') {
    const { loadCatalogue } = await import('./catalogue/catalogue.js');
    return { gases, catalogue: loadCatalogue(), engineVersion };
  }
  return {
    gases,
    engineVersion,
    get catalogue(): AssessmentData['catalogue'] {
      throw new Error(`The calculator ${request.calculator} draws on the catalogue unannounced.`);
    },
  };
}

async function answered(words: readonly string[]): Promise<{ body: unknown; status: number }> {
  const request = requestOf(words);
  const data = await dataFor(request);
  const calculators = calculatorsOf(data);
  const known = [...calculators.keys()].join(', ');
  const named = (name: string) => {
    const calculator = calculators.get(name);
    if (calculator) return calculator;
    throw new NotFound(`There is no calculator ${name}.`, `Choose one of ${known}, or schema.`);
  };
  if (request.calculator === 'schema') {
    if (request.file === null) throw new InvalidInput('schema names one calculator.', usage);
    const { input, output } = named(request.file);
    return { body: { input, output }, status: 0 };
  }
  const calculator = named(request.calculator);
  const text = textOf(request.file);
  const document =
    request.calculator === 'assess'
      ? (await import('./catalogue/data-file.js')).parsedDataText(
          text,
          request.file ?? 'standard input',
        ).value
      : parsedJson(text);
  const { body, status, faults } = answer(calculator, document, data);
  for (const fault of faults) console.error(fault);
  if (status === 0 && request.sheets !== null && request.calculator === 'assess') {
    await writeSheets(document, request.sheets, data);
  }
  if (status === 0 && request.preview !== null && request.calculator === 'sound') {
    await writePreviews(document, request.preview, data);
  }
  return { body, status };
}

try {
  const { body, status } = await answered(process.argv.slice(2));
  process.stdout.write(`${JSON.stringify(body, null, 2)}\n`);
  process.exitCode = status;
} catch (thrown) {
  const failure = doorError(thrown);
  if (failure.error.code === 'internal') console.error(thrown);
  process.stdout.write(`${JSON.stringify(failure, null, 2)}\n`);
  process.exitCode = statusOf(failure);
}
