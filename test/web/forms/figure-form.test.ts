import { describe, expect, it } from 'vitest';
import { figureTexts, readFigure } from '../../../src/web/forms/figure-form.js';
import { formFields, rowNumbers } from '../../../src/web/forms/form-fields.js';
import { typedNumber } from '../../../src/web/forms/typed-number.js';

const litresPerSecond = { symbol: 'L/s', factor: 0.001 };
const celsius = { symbol: '°C', factor: 1, offset: 273.15 };
const rule = { label: 'The fresh air', unit: litresPerSecond };
const read = (fields: Record<string, string>, more: object = {}) =>
  readFigure(formFields(fields), 'air', { ...rule, ...more });

describe('a typed number', () => {
  it.each([
    ['12', 12],
    ['0.5', 0.5],
    ['0,5', 0.5],
    ['.5', 0.5],
    ['1500', 1500],
    ['-3', -3],
    ['\u22123', -3],
    ['1e3', 1000],
    ['0,125', 0.125],
  ])('reads %s as %d', (text, value) => {
    expect(typedNumber(text)).toEqual({ value });
  });

  it.each(['1,500', '12,000', '1.500.000', '1 500 000'])(
    'does not guess whether %s has thousands or decimals',
    (text) => {
      expect(typedNumber(text)).toMatchObject({ problem: expect.stringMatching(/.+/) as unknown });
    },
  );

  it.each(['', 'abc', '12 m', '1..2', 'Infinity', 'NaN', '0x10', '1e999', '--1'])(
    'refuses "%s"',
    (text) => {
      expect(typedNumber(text)).toHaveProperty('problem');
    },
  );
});

describe('a figure field', () => {
  it('gives the number in SI', () => {
    expect(read({ air: '7.5' })).toEqual({ figure: 0.0075, problems: [] });
    expect(readFigure({ t: '20' }, 't', { label: 'T', unit: celsius }).figure).toBe(293.15);
  });

  it('takes a blank as missing, never as zero', () => {
    expect(read({ air: '   ' })).toEqual({ problems: [] });
    expect(read({ air: '0' })).toEqual({ figure: 0, problems: [] });
  });

  it('keeps bounds, origin, date, by whom and note', () => {
    expect(
      read({
        air: '400',
        'air-low': '350',
        'air-high': '420',
        'air-origin': 'measured',
        'air-on': '2026-03-01',
        'air-by': 'venue engineer',
        'air-note': 'at the grille',
      }),
    ).toEqual({
      figure: {
        value: 0.4,
        low: 0.35,
        high: 0.42,
        origin: 'measured',
        on: '2026-03-01',
        by: 'venue engineer',
        note: 'at the grille',
      },
      problems: [],
    });
  });

  it('gives the one who stated a figure back on the next save', () => {
    const figure = { value: 0.4, origin: 'measured' as const, by: 'venue engineer' };
    const shown = figureTexts('air', figure, litresPerSecond);

    expect(readFigure(shown, 'air', rule).figure).toEqual(figure);
  });

  it('takes "don\u2019t know" as a figure without a value', () => {
    expect(read({ 'air-origin': 'unknown' }, { required: true })).toEqual({
      figure: { origin: 'unknown' },
      problems: [],
    });
  });

  it.each([
    ['a value that is not known', { air: '1', 'air-origin': 'unknown' }, '/air'],
    ['bounds without a value', { 'air-low': '1' }, '/air'],
    ['bounds the wrong way round', { air: '2', 'air-low': '3', 'air-high': '1' }, '/air-low'],
    ['a value below its lowest', { air: '2', 'air-low': '3' }, '/air-low'],
    ['a value above its highest', { air: '4', 'air-high': '3' }, '/air-high'],
    ['a date that does not exist', { air: '4', 'air-on': '2026-02-30' }, '/air-on'],
    ['a month that does not exist', { air: '4', 'air-on': '2026-13-01' }, '/air-on'],
    ['an origin nobody offered', { air: '4', 'air-origin': 'guessed' }, '/air-origin'],
    ['a number below the range', { air: '-1' }, '/air'],
    ['words', { air: 'lots' }, '/air'],
  ])('refuses %s, and says which field', (_, fields, path) => {
    const { figure, problems } = read(fields, { min: 0 });

    expect(figure).toBeUndefined();
    expect(problems.map((problem) => problem.path)).toContain(path);
  });

  it('asks for a required figure that was left blank', () => {
    expect(read({}, { required: true }).problems).toEqual([
      {
        path: '/air',
        problem: 'The fresh air: enter a number, or choose \u201cDon\u2019t know\u201d',
      },
    ]);
  });

  it.each([0.0075, 0.1, 1 / 3, 0.4, { value: 0.07, low: 0.06, origin: 'drawing' as const }])(
    'shows what it read: %j comes back the same',
    (figure) => {
      const shown = figureTexts('air', figure, litresPerSecond);
      const back = readFigure(shown, 'air', rule).figure;
      const value = typeof figure === 'number' ? figure : figure.value;

      expect(typeof back === 'number' ? back : back?.value).toBeCloseTo(value, 12);
      expect(figureTexts('air', back, litresPerSecond)).toEqual(shown);
    },
  );
});

describe('the fields of a form', () => {
  it('are trimmed, blank ones left out, the last of two kept, a password left as typed', () => {
    expect({ ...formFields({ a: ' x ', b: ' ', c: ['1', '2'], password: ' p ' }) }).toEqual({
      a: 'x',
      c: '2',
      password: ' p ',
    });
  });

  it('do not reach the prototype of anything', () => {
    const fields = formFields(
      JSON.parse('{"__proto__": {"role": "administrator"}, "constructor": "x"}'),
    );

    expect(Object.getPrototypeOf(fields)).toBeNull();
    expect(fields.role).toBeUndefined();
  });

  it('number the rows of a repeated group', () => {
    const fields = formFields({ 'spaces.2.title': 'a', 'spaces.10.title': 'b', 'doors.1.x': 'c' });

    expect(rowNumbers(fields, 'spaces')).toEqual([2, 10]);
  });
});
