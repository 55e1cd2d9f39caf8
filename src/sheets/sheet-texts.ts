import { readFileSync } from 'node:fs';
import { fileURLToPath } from 'node:url';
import { parse } from 'yaml';
import { fitting } from '../assessment/schema-check.js';
import { InvalidInput, NotFound } from '../errors.js';
import { riskTextsSchema, type RiskTexts } from './risk/risk-texts.js';

const folder = new URL('../../templates/sheets/', import.meta.url);
const read = new Map<string, RiskTexts>();

/**
 * The words of the risk sheet in a language, read and checked once.
 *
 * @throws {NotFound} when there is no file for the language
 * @throws {InvalidInput} when the file is not YAML or lacks a word
 */
export function riskSheetTexts(language = 'en'): RiskTexts {
  const known = read.get(language);
  if (known !== undefined) return known;
  const file = `risk-sheet.${language}.yaml`;
  const texts = riskTextsFrom(fileText(file, language), file);
  read.set(language, texts);
  return texts;
}

function fileText(file: string, language: string): string {
  if (!/^[a-z]{2,3}(-[A-Za-z0-9]+)*$/.test(language)) {
    throw new NotFound(`"${language}" is not a language tag.`, 'Give a tag such as en.');
  }
  try {
    return readFileSync(fileURLToPath(new URL(file, folder)), 'utf8');
  } catch {
    throw new NotFound(
      `There are no words for the risk sheet in "${language}".`,
      `Add templates/sheets/${file}, with the same entries as the English one.`,
    );
  }
}

/** The words of a risk sheet from the text of a file. */
export function riskTextsFrom(text: string, file: string): RiskTexts {
  let value: unknown;
  try {
    value = parse(text);
  } catch (error) {
    const [line = ''] = (error instanceof Error ? error.message : String(error)).split('\n');
    throw new InvalidInput(
      `templates/sheets/${file} is not valid YAML: ${line}`,
      'Correct the file at the line named.',
      [{ path: '', problem: line }],
    );
  }
  return fitting(riskTextsSchema, value, `file templates/sheets/${file}`);
}
