import { InvalidInput } from '../errors.js';
import type { Words } from './document-tree.js';

/** Faces a sheet is set in; each has a chain of fonts behind it. */
export type Weight = 'regular' | 'strong';

/** A font file by its key, and whether it can draw a character. */
export interface Glyphs {
  /** Font keys to try in order for a weight. */
  readonly chain: (weight: Weight) => readonly string[];
  readonly has: (font: string, codePoint: number) => boolean;
}

/** Text drawn with one font at one size and height. */
export interface TextRun {
  readonly text: string;
  readonly font: string;
  readonly subscript: boolean;
}

// Digits in these stand lower. Longer names first, so that N2O is not read as N2 and O.
const formulas = /\b(?:CO2e?|SF6|N2O|N2|O2|H2O|H2|CH4|C3H8)(?![A-Za-z0-9])/g;
const subscriptDigits = '₀₁₂₃₄₅₆₇₈₉';
const rightToLeft =
  /[\p{Script=Hebrew}\p{Script=Arabic}\p{Script=Syriac}\p{Script=Thaana}\p{Script=Nko}\u200f\u202b\u202e\u2067]/u;

interface Piece {
  readonly text: string;
  readonly subscript: boolean;
}

/** The pieces of a text, gas formulas with their digits lowered. */
function subscriptPieces(text: string): Piece[] {
  const lowered = text
    .replace(/[₀-₉]/g, (digit) => `\u0001${String(subscriptDigits.indexOf(digit))}`)
    .replace(formulas, (formula) => formula.replace(/[0-9]/g, '\u0001$&'));
  return lowered
    .split(/(\u0001[0-9])/)
    .filter((part) => part !== '')
    .map((part) =>
      part.startsWith('\u0001')
        ? { text: part.slice(1), subscript: true }
        : { text: part, subscript: false },
    );
}

/**
 * The runs of a text: every character with the first font of the chain that can draw it.
 *
 * @throws {InvalidInput} for right-to-left text, and for a character no font of the sheet has
 */
export function textRuns(words: Words, weight: Weight, glyphs: Glyphs): TextRun[] {
  // Spans say their own weight; a plain text takes that of its place.
  const base = typeof words === 'string' ? weight : 'regular';
  const spans = typeof words === 'string' ? [{ text: words }] : words;
  const runs: (TextRun & { text: string })[] = [];
  for (const span of spans) {
    const text = printableText(span.text);
    const chain = glyphs.chain('strong' in span ? 'strong' : base);
    for (const piece of subscriptPieces(text)) {
      for (const word of piece.text.match(/\s+|[^\s]+/gu) ?? []) {
        for (const { part, font } of fontParts(word, chain, glyphs)) {
          const last = runs.at(-1);
          if (last?.font === font && last.subscript === piece.subscript) last.text += part;
          else runs.push({ text: part, font, subscript: piece.subscript });
        }
      }
    }
  }
  return runs;
}

/** Composed characters, no control characters; right-to-left text is refused. */
export function printableText(text: string): string {
  if (rightToLeft.test(text)) {
    throw new InvalidInput(
      'A sheet cannot print right-to-left text yet, and printing it in the wrong order would mislead.',
      'Write this text in Latin, Greek or Cyrillic letters and print the sheet again.',
      [{ path: '', problem: `right-to-left text: "${text.slice(0, 60)}"` }],
    );
  }
  // A tab, a joiner or a stray control character has no glyph: it becomes a space or nothing.
  return text
    .normalize('NFC')
    .replace(/[\u2007\u202f]/g, '\u00a0')
    .replace(/[\u2000-\u200a\u205f\u3000]/g, ' ')
    .replace(/[\u200b-\u200e\u2060\ufeff\u00ad]/g, '')
    .replace(/[\u0000-\u0009\u000b-\u001f\u007f]/g, ' ');
}

interface FontPart {
  readonly part: string;
  readonly font: string;
}

/** The word in one font if one has all its letters, else letter by letter. */
function fontParts(word: string, chain: readonly string[], glyphs: Glyphs): FontPart[] {
  const letters = Array.from(word);
  const draws = (key: string, letter: string): boolean =>
    /\s/.test(letter) || glyphs.has(key, letter.codePointAt(0) ?? 32);
  const whole = chain.find((key) => letters.every((letter) => draws(key, letter)));
  if (whole !== undefined) return [{ part: word, font: whole }];
  return letters.map((letter) => {
    const font = chain.find((key) => draws(key, letter));
    if (font === undefined) {
      throw new InvalidInput(
        `The fonts of the sheet have no sign for "${letter}".`,
        'Write this text in Latin, Greek or Cyrillic letters and print the sheet again.',
        [{ path: '', problem: `cannot be printed: "${word.slice(0, 60)}"` }],
      );
    }
    return { part: letter, font };
  });
}
