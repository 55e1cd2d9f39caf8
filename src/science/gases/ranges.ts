import type { Range } from '../range.js';

/** Where the room model of gases holds: -10 to 45 degC, 60 to 110 kPa. */
export const roomTemperature: Range = {
  min: 263.15,
  max: 318.15,
  unit: 'K',
  name: 'temperature',
};

export const roomPressure: Range = {
  min: 60_000,
  max: 110_000,
  unit: 'Pa',
  name: 'absolute pressure',
};

export const relativeHumidityRange: Range = {
  min: 0,
  max: 1,
  unit: '',
  name: 'relative humidity',
};

export const moleFractionRange: Range = { min: 0, max: 1, unit: '', name: 'mole fraction' };

/** Mole fractions may miss one by this much; they are then scaled to sum to one. */
export const compositionSumTolerance = 1e-6;
