import type { Range } from '../range.js';

export const frequencyRange: Range = { min: 16, max: 16_000, unit: 'Hz', name: 'frequency' };
export const pipeLengthRange: Range = { min: 0.01, max: 12, unit: 'm', name: 'length' };
export const radiusRange: Range = { min: 0.001, max: 0.5, unit: 'm', name: 'inner radius' };
export const mouthWidthRange: Range = { min: 0.001, max: 1, unit: 'm', name: 'mouth width' };
export const cutUpRange: Range = { min: 0.0005, max: 0.5, unit: 'm', name: 'cut-up' };
export const flueThicknessRange: Range = {
  min: 1e-5,
  max: 0.01,
  unit: 'm',
  name: 'flue thickness',
};
export const blowingPressureRange: Range = {
  min: 1,
  max: 10_000,
  unit: 'Pa',
  name: 'blowing pressure above the room',
};
export const neckLengthRange: Range = { min: 0, max: 2, unit: 'm', name: 'neck length' };
export const resonatorVolumeRange: Range = {
  min: 1e-6,
  max: 1,
  unit: 'm3',
  name: 'resonator volume',
};
