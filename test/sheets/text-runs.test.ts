import { describe, expect, it } from 'vitest';
import { InvalidInput } from '../../src/errors.js';
import { printableText, textRuns } from '../../src/sheets/text-runs.js';
import { ruler } from '../support/ruler.js';

describe('textRuns', () => {
  it('lowers the digits of gas formulas and leaves other numbers on the line', () => {
    const runs = textRuns('CO2 and SF6 in 2 rooms', 'regular', ruler);
    expect(runs.filter((run) => run.subscript).map((run) => run.text)).toEqual(['2', '6']);
    expect(runs.map((run) => run.text).join('')).toBe('CO2 and SF6 in 2 rooms');
  });

  it('reads a subscript sign as a lowered digit, so that no font needs it', () => {
    const runs = textRuns('N₂O', 'regular', ruler);
    expect(runs.map((run) => [run.text, run.subscript])).toEqual([
      ['N', false],
      ['2', true],
      ['O', false],
    ]);
  });

  it('sets a whole word in the second font when the first lacks one of its letters', () => {
    const runs = textRuns('fog туман fog', 'regular', ruler);
    const second = runs.filter((run) => run.font === 'far').map((run) => run.text.trim());
    expect(second).toEqual(['туман']);
  });

  it.each([
    ['Hebrew', 'מופע'],
    ['Arabic', 'عرض'],
    ['a right-to-left override', 'abc\u202edef'],
  ])('refuses %s, naming the text and a way out', (_name, text) => {
    expect(() => textRuns(text, 'regular', ruler)).toThrow(InvalidInput);
    expect(() => textRuns(text, 'regular', ruler)).toThrow(/right-to-left/);
  });

  it('refuses a character that no font can draw instead of leaving a hole', () => {
    expect(() => textRuns('演示', 'regular', ruler)).toThrow(/no sign for/);
  });
});

describe('printableText', () => {
  it('drops joiners and turns control characters into spaces', () => {
    expect(printableText('a\u200bb\tc\u00add')).toBe('ab cd');
  });
});
