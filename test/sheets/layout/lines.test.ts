import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { setLines } from '../../../src/sheets/layout/lines.js';
import { ruler } from '../../support/ruler.js';

const look = { weight: 'regular', size: 10 } as const;
const textOf = (lines: ReturnType<typeof setLines>): string[] =>
  lines.map((line) => line.runs.map((run) => run.text).join(''));

describe('setLines', () => {
  it('breaks at spaces and keeps the space at the end of the line for readers', () => {
    expect(textOf(setLines('one two three', look, 40, ruler))).toEqual(['one two ', 'three']);
  });

  it('keeps a number with its unit on one line', () => {
    expect(textOf(setLines('about 20.6\u00a0% here', look, 45, ruler))).toEqual([
      'about ',
      '20.6\u00a0% ',
      'here',
    ]);
  });

  it('divides a word that is wider than the line', () => {
    expect(textOf(setLines('abcdefghij', look, 20, ruler))).toEqual(['abcd', 'efgh', 'ij']);
  });

  it('never sets a line wider than the room and never loses a letter', () => {
    const word = fc.stringMatching(/^[a-z0-9/-]{1,30}$/);
    fc.assert(
      fc.property(
        fc.array(word, { maxLength: 20 }),
        fc.integer({ min: 20, max: 200 }),
        (words, width) => {
          const text = words.join(' ');
          const lines = setLines(text, look, width, ruler);
          for (const line of lines) expect(line.width).toBeLessThanOrEqual(width + 1e-6);
          expect(textOf(lines).join('').replaceAll(' ', '')).toBe(text.replaceAll(' ', ''));
        },
      ),
      { numRuns: 200, seed: 11 },
    );
  });
});
