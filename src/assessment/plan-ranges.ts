import type { Range } from '../science/range.js';

/** The ranges within which a plan is worked out; forms, guards and docs read them here. */
const range = (name: string, unit: string, min: number, max: number): Range => ({
  name,
  unit,
  min,
  max,
});

export const planRanges = {
  altitudeM: range('altitude', 'm', -430, 4500),
  pressurePa: range('site pressure', 'Pa', 60_000, 110_000),
  temperatureK: range('air temperature', 'K', 263.15, 318.15),
  relativeHumidity: range('relative humidity', '', 0, 1),
  carbonDioxideFraction: range('outdoor carbon dioxide', 'mol/mol', 0, 0.01),
  floorAreaM2: range('floor area', 'm2', 0.2, 50_000),
  heightM: range('height', 'm', 0.2, 100),
  floorLevelM: range('floor level', 'm', -100, 200),
  floorRiseM: range('floor rise', 'm', 0, 40),
  volumeM3: range('free volume', 'm3', 0.2, 500_000),
  openingWidthM: range('opening width', 'm', 0.002, 60),
  openingHeightM: range('opening height', 'm', 0.002, 40),
  openFraction: range('open fraction', '', 0, 1),
  dischargeCoefficient: range('discharge coefficient', '', 0.05, 1),
  flowM3PerS: range('air flow', 'm3/s', 0, 1000),
  airChangesPerHour: range('air changes', '1/h', 0, 120),
  effectiveness: range('ventilation effectiveness', '', 0.05, 1),
  extractTopM: range('top of the low grille', 'm', 0.01, 5),
  people: range('head count', 'people', 0, 100_000),
  metabolicRateMet: range('activity', 'met', 0.7, 8),
  amountMol: range('amount of gas', 'mol', 0, 1e7),
  massKg: range('mass', 'kg', 0, 50_000),
  gasVolumeM3: range('gas volume', 'm3', 0, 200_000),
  waterVolumeM3: range('water capacity', 'm3', 1e-5, 60),
  fillPressurePa: range('filling pressure (absolute)', 'Pa', 80_000, 30_000_000),
  fillTemperatureK: range('gas temperature', 'K', 253.15, 323.15),
  idleLossPerHour: range('idle loss', '1/h', 0, 1),
  escapeTimeS: range('escape time', 's', 1, 7200),
  frequencyHz: range('frequency', 'Hz', 16, 20_000),
  lengthM: range('sounding length', 'm', 0.005, 20),
  radiusM: range('inner radius', 'm', 0.0005, 1),
  gasFraction: range('gas fraction', 'mol/mol', 0, 1),
} as const satisfies Record<string, Range>;
