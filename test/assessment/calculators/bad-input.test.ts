import { describe, expect, it } from 'vitest';
import type { Calculator } from '../../../src/assessment/calculators/calculator.js';
import { cylinderCalculator } from '../../../src/assessment/calculators/cylinder.js';
import { answer, type DoorError } from '../../../src/assessment/calculators/door.js';
import { gasCalculator } from '../../../src/assessment/calculators/gas.js';
import { purityCalculator } from '../../../src/assessment/calculators/purity.js';
import { soundCalculator } from '../../../src/assessment/calculators/sound.js';
import { loadGasLibrary } from '../../../src/catalogue/gas-library.js';

const data = { gases: loadGasLibrary() };

const good: readonly (readonly [Calculator, Readonly<Record<string, unknown>>])[] = [
  [gasCalculator, { composition: { He: 1 }, temperatureK: 293.15, pressurePa: 101_325 }],
  [
    cylinderCalculator,
    {
      gas: 'He',
      waterVolumeM3: 0.05,
      pressurePa: 2e7,
      temperatureK: 288.15,
      roomTemperatureK: 293.15,
      roomPressurePa: 101_325,
    },
  ],
  [
    soundCalculator,
    {
      instrument: 'fluePipe',
      frequencyInAirHz: 315,
      composition: { He: 1 },
      temperatureK: 293.15,
      pressurePa: 101_325,
    },
  ],
  [
    purityCalculator,
    {
      frequencyInAirHz: 315,
      frequencyMeasuredHz: 780,
      gas: 'He',
      temperatureK: 293.15,
      pressurePa: 101_325,
    },
  ],
];

function failure(calculator: Calculator, input: unknown) {
  const { body, status, faults } = answer(calculator, input, data);
  expect(faults).toEqual([]);
  expect(body).toHaveProperty('error');
  return { ...(body as DoorError).error, status };
}

const numberKeys = good.flatMap(([calculator, input]) =>
  Object.entries(input)
    .filter(([, value]) => typeof value === 'number')
    .map(([key]) => [calculator.name, key, calculator, input] as const),
);

describe('every number of every gas and sound calculator', () => {
  it.each(numberKeys)(
    '%s %s: not a number, infinite and negative are refused at that key',
    (...given) => {
      const [, key, calculator, input] = given;
      for (const value of [Number.NaN, Infinity, -Infinity]) {
        const { code, status, details, hint } = failure(calculator, { ...input, [key]: value });
        expect([code, status]).toEqual(['invalid-input', 2]);
        expect(details.map(({ path }) => path)).toContain(`/${key}`);
        expect(hint).not.toBe('');
      }
      const negative = failure(calculator, { ...input, [key]: -1 });
      expect([negative.code, negative.status]).toEqual(['out-of-range', 3]);
      expect(negative.details[0]?.path).toBe(`/${key}`);
      // The range itself stands in the details.
      expect(negative.details[0]?.problem).toMatch(/outside \S+ to \S+/);
    },
  );

  it.each(good)('a text, a null and a stranger key are refused (%#)', (calculator, input) => {
    const key = 'temperatureK' in input ? 'temperatureK' : 'roomTemperatureK';
    expect(failure(calculator, { ...input, [key]: '293.15' }).code).toBe('invalid-input');
    expect(failure(calculator, { ...input, [key]: null }).code).toBe('invalid-input');
    expect(failure(calculator, { ...input, stranger: 1 }).details[0]?.path).toBe('/stranger');
    expect(failure(calculator, null).code).toBe('invalid-input');
    expect(failure(calculator, 7).code).toBe('invalid-input');
  });
});

describe('each class of mistake has a hint of its own', () => {
  const [gas, cylinder] = good;
  const hintOf = (which: typeof gas, change: Readonly<Record<string, unknown>>): string =>
    which === undefined ? '' : failure(which[0], { ...which[1], ...change }).hint;

  it('no two of them share one', () => {
    const hints = [
      hintOf(gas, { temperatureK: Number.NaN }),
      hintOf(gas, { temperatureK: 400 }),
      hintOf(gas, { composition: { He: 0.4 } }),
      hintOf(gas, { composition: { Xx: 1 } }),
      hintOf(gas, { composition: { He: -0.5, air: 1.5 } }),
      hintOf(cylinder, { gas: 'CO2', pressurePa: 5.7e6 }),
      hintOf(cylinder, { pressurePa: 0 }),
      hintOf(cylinder, { pressurePa: 200 }),
      hintOf(cylinder, { massKg: 1 }),
    ];
    expect(hints).not.toContain('');
    expect(new Set(hints).size).toBe(hints.length);
  });

  it('sums say what they come to, and fractions of percent are met by the range', () => {
    const wrong = failure(gasCalculator, { ...gas?.[1], composition: { He: 0.5, air: 0.4 } });
    expect(wrong.message).toContain('0.9');
    expect(failure(gasCalculator, { ...gas?.[1], composition: { He: 94, air: 6 } }).code).toBe(
      'out-of-range',
    );
  });

  it('0 bar is told to be a gauge reading, 200 to be bar, and liquid gas to be weighed', () => {
    expect(hintOf(cylinder, { pressurePa: 0 })).toContain('gauge');
    expect(hintOf(cylinder, { pressurePa: 200 })).toContain('bar');
    for (const liquid of ['CO2', 'SF6', 'N2O', 'C3H8']) {
      expect(hintOf(cylinder, { gas: liquid, pressurePa: 8.5e6 })).toContain('massKg');
    }
  });
});
