import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import type { FigureUnit } from '../../src/assessment/assessment.js';
import { figureText, quantityText } from '../../src/assessment/figure-text.js';

// No-break spaces read as plain ones here.
const plain = (text: string) => text.replaceAll('\u00a0', ' ');
const text = (value: number, unit: FigureUnit) => plain(quantityText(value, unit));

describe('a quantity as text', () => {
  // The directions are those of the decision rules: oxygen down to 0.1 %, gas and times up.
  it.each([
    [0.2095, 'oxygenFraction', '20.9 %'],
    [0.195, 'oxygenFraction', '19.5 %'],
    [0.19499, 'oxygenFraction', '19.4 %'],
    [0.18, 'oxygenFraction', '18.0 %'],
    [0.3 * 0.65, 'oxygenFraction', '19.5 %'],
    [0, 'gasFraction', '0 ppm'],
    [420e-6, 'gasFraction', '420 ppm'],
    [4991e-6, 'gasFraction', '5000 ppm'],
    [5001e-6, 'gasFraction', '5010 ppm'],
    [9991e-6, 'gasFraction', '1.0 %'],
    [0.015, 'gasFraction', '1.5 %'],
    [0.01501, 'gasFraction', '1.6 %'],
    [45, 's', '45 s'],
    [45.01, 's', '46 s'],
    [60, 's', '1 min'],
    [90.2, 's', '1 min 31 s'],
    [3599.5, 's', '1 h'],
    [3661, 's', '1 h 2 min'],
    [101_325, 'Pa', '101.3 kPa'],
    [315, 'Hz', '315.0 Hz'],
    [926.74, 'Hz', '926.7 Hz'],
    [1240.4, 'Hz', '1240 Hz'],
    [1842.3, 'cents', '+1842 cents'],
    [-386.3, 'cents', '\u2212386 cents'],
    [0.2, 'cents', '0 cents'],
    [293.15, 'K', '20.0 °C'],
    [263.15, 'K', '\u221210.0 °C'],
    [1.23456, 'kg', '1.23 kg'],
    [0.5, 'kg', '0.500 kg'],
    [12_345, 'kg', '12 300 kg'],
    [1080, 'm3', '1080 m³'],
    [0.000299, 'm3', '0.299 L'],
    [0.0000299, 'm3', '29.9 mL'],
    [0.0999, 'm3', '99.9 L'],
    [0.1, 'm3', '0.100 m³'],
    [0, 'm3', '0 m³'],
    [0.0075, 'm3PerS', '7.50 L/s'],
    [1.25, 'm3PerS', '1.25 m³/s'],
    [9.999, 'm', '10.0 m'],
    [0, 'kg', '0 kg'],
    [200, 'people', '200'],
    [2.941, 'ratio', '2.94'],
  ] as const)('is, for %d in %s, "%s"', (value, unit, expected) => {
    expect(text(value, unit)).toBe(expected);
  });

  it('rounds a largest permissible amount down when asked to', () => {
    expect(plain(quantityText(1.999, 'kg', 'down'))).toBe('1.99 kg');
  });

  it('never prints more oxygen, nor less gas or time, than there is', () => {
    fc.assert(
      fc.property(fc.double({ min: 0, max: 1, noNaN: true }), (fraction) => {
        const oxygen = Number.parseFloat(text(fraction, 'oxygenFraction')) / 100;
        const printed = text(fraction, 'gasFraction');
        const gas = Number.parseFloat(printed) / (printed.endsWith('ppm') ? 1e6 : 100);
        // Beyond nine digits a value counts as the noise of binary fractions.
        expect(oxygen).toBeLessThanOrEqual(fraction * (1 + 1e-8) + 1e-12);
        expect(gas).toBeGreaterThanOrEqual(fraction * (1 - 1e-8) - 1e-12);
        expect(fraction - oxygen).toBeLessThan(0.001 + 1e-8);
      }),
      { seed: 7, numRuns: 500 },
    );
  });

  it('prints three significant digits that are within half a unit of the third', () => {
    fc.assert(
      fc.property(fc.double({ min: 1e-6, max: 1e9, noNaN: true }), (value) => {
        const printed = Number(text(value, 'kg').replaceAll(' ', '').replace('kg', ''));
        expect(Math.abs(printed - value) / value).toBeLessThanOrEqual(0.00500001);
      }),
      { seed: 11, numRuns: 500 },
    );
  });
});

describe('a figure as text', () => {
  it('gives its span in brackets', () => {
    expect(
      plain(figureText({ value: 0.2, low: 0.195, high: 0.2051, unit: 'oxygenFraction' })),
    ).toBe('20.0 % (19.5 % to 20.5 %)');
    expect(plain(figureText({ value: 2, low: 1, unit: 'kg' }))).toBe('2.00 kg (at least 1.00 kg)');
    expect(plain(figureText({ value: 2, unit: 'kg' }))).toBe('2.00 kg');
  });
});
