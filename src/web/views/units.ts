import type { ShownUnit } from '../forms/typed-number.js';

/** The units that the pages show and read, each with its way to the SI unit of the plan file. */
export const shownUnits = {
  one: { symbol: '', factor: 1 },
  metre: { symbol: 'm', factor: 1 },
  squareMetre: { symbol: 'm²', factor: 1 },
  cubicMetre: { symbol: 'm³', factor: 1 },
  litre: { symbol: 'L', factor: 1e-3 },
  litrePerSecond: { symbol: 'L/s', factor: 1e-3 },
  perHour: { symbol: 'per hour', factor: 1 },
  kilogram: { symbol: 'kg', factor: 1 },
  gram: { symbol: 'g', factor: 1e-3 },
  mole: { symbol: 'mol', factor: 1 },
  kilopascal: { symbol: 'kPa', factor: 1000 },
  barAbsolute: { symbol: 'bar absolute', factor: 1e5 },
  celsius: { symbol: '°C', factor: 1, offset: 273.15 },
  percent: { symbol: '%', factor: 0.01 },
  percentPerHour: { symbol: '% per hour', factor: 0.01 },
  ppm: { symbol: 'ppm', factor: 1e-6 },
  second: { symbol: 's', factor: 1 },
  minute: { symbol: 'min', factor: 1 },
  hertz: { symbol: 'Hz', factor: 1 },
  people: { symbol: 'people', factor: 1 },
  met: { symbol: 'met', factor: 1 },
} as const satisfies Record<string, ShownUnit>;
