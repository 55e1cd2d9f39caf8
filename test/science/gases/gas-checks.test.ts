import { afterAll, describe, expect, it } from 'vitest';
import { loadGasLibrary } from '../../../src/catalogue/gas-library.js';
import { containerState } from '../../../src/science/gases/container-density.js';
import { contentByPressure } from '../../../src/science/gases/container-content.js';
import { idealHeatCapacity } from '../../../src/science/gases/heat-capacity.js';
import {
  iceSaturationPressure,
  waterFractionOfAir,
  waterSaturationPressure,
} from '../../../src/science/gases/humid-air.js';
import { knownGas } from '../../../src/science/gases/known-gas.js';
import { mixtureState } from '../../../src/science/gases/mixture-state.js';
import { vapourPressure } from '../../../src/science/gases/vapour-pressure.js';
import { recordsOf, WorstErrors } from '../../support/gas-records.js';

interface GasRecord {
  readonly id: string;
  readonly quantity: string;
  readonly species?: string;
  readonly composition?: Record<string, number>;
  readonly humidAir?: { relativeHumidity: number; co2MoleFraction: number };
  readonly label?: string;
  readonly waterVolumeM3?: number;
  readonly temperatureK: number;
  readonly pressurePa: number | null;
  readonly value: number;
  readonly unit: string;
  readonly tolerance: number;
  readonly source: string;
  readonly status: string;
}

const library = loadGasLibrary();
const records = recordsOf('gas-checks.json') as readonly GasRecord[];
const worst = new WorstErrors();

function idOf(record: GasRecord): string {
  return record.species === 'dryAir' ? 'air' : (record.species ?? '');
}

/** Moist air with its own carbon dioxide: oxygen and carbon dioxide sum to 0.20979 (CIPM-2007). */
function moistAir(record: GasRecord): Record<string, number> {
  const { relativeHumidity = 0, co2MoleFraction = 0 } = record.humidAir ?? {};
  const { temperatureK, pressurePa } = record;
  const water = waterFractionOfAir(library, temperatureK, pressurePa ?? 0, relativeHumidity);
  const N2 = 0.780872;
  const Ar = 0.009332;
  const dry = { N2, Ar, CO2: co2MoleFraction, O2: 1 - N2 - Ar - co2MoleFraction };
  return {
    H2O: water,
    ...Object.fromEntries(Object.entries(dry).map(([id, x]) => [id, x * (1 - water)])),
  };
}

function compositionOf(record: GasRecord): Record<string, number> {
  if (record.composition) return record.composition;
  return record.humidAir ? moistAir(record) : { [idOf(record)]: 1 };
}

function computed(record: GasRecord): number {
  const { quantity, temperatureK: T } = record;
  const p = record.pressurePa ?? Number.NaN;
  switch (quantity) {
    case 'density':
    case 'speedOfSound': {
      const state = mixtureState(library, {
        composition: compositionOf(record),
        temperatureK: T,
        pressurePa: p,
      });
      return quantity === 'density' ? state.densityKgPerM3 : state.speedOfSoundMPerS;
    }
    case 'compressibilityFactor':
      return containerState(library, idOf(record), T, p).compressibilityFactor;
    case 'cylinderContentMass':
      return contentByPressure(
        library,
        {
          composition: { [idOf(record)]: 1 },
          waterVolumeM3: record.waterVolumeM3 ?? 0,
          temperatureK: T,
          pressurePa: p,
        },
        { temperatureK: 293.15, pressurePa: 101_325 },
      ).massKg;
    case 'idealGasIsobaricHeatCapacity': {
      const parts =
        idOf(record) === 'air' ? library.dryAir.composition.moleFractions : { [idOf(record)]: 1 };
      const cp = Object.entries(parts).reduce(
        (sum, [id, x]) => sum + x * idealHeatCapacity(knownGas(library, id, ''), T),
        0,
      );
      return cp * library.gasConstant.jPerMolK;
    }
    case 'saturationVapourPressureWater':
      return waterSaturationPressure(library, T);
    case 'saturationVapourPressureIce':
      return iceSaturationPressure(library, T);
    case 'vapourPressure':
      return vapourPressure(knownGas(library, idOf(record), ''), T);
    case 'saturatedLiquidDensity': {
      // Only the datum at 20 degC is kept; every record is at that temperature.
      expect(T).toBe(293.15);
      return knownGas(library, idOf(record), '').container?.liquidDensityAt20CKgPerM3 ?? Number.NaN;
    }
    default:
      throw new Error(`no check for ${quantity}`);
  }
}

function titleOf(record: GasRecord): string {
  const what =
    record.label ??
    record.species ??
    `air at ${String(record.humidAir?.relativeHumidity)} humidity`;
  const estimated = /estimated|no published mixture/.test(record.source)
    ? ' (rests on an estimate)'
    : '';
  return `${record.id} ${record.quantity} of ${what} at ${String(record.temperatureK)} K and ${String(record.pressurePa)} Pa is ${String(record.value)} ${record.unit} within ${String(record.tolerance)}${estimated}`;
}

it('the transcription holds 668 records, each with source, status and tolerance', () => {
  expect(records).toHaveLength(668);
  for (const record of records) {
    expect(record.source.length).toBeGreaterThan(5);
    expect(record.status).not.toBe('');
    expect(record.tolerance).toBeGreaterThan(0);
  }
});

describe.each([...new Set(records.map(({ quantity }) => quantity))])('%s', (quantity) => {
  const group = records
    .filter((record) => record.quantity === quantity)
    .map((record) => [titleOf(record), record] as const);
  it.each(group)('%s', (_title, record) => {
    const error = computed(record) / record.value - 1;
    const what = record.composition ? 'mixture' : (record.species ?? 'humid air');
    worst.note(`${quantity} ${what}`, record.id, error, record.tolerance);
    expect(Math.abs(error)).toBeLessThanOrEqual(record.tolerance);
  });
});

afterAll(() => {
  if (process.env.GAS_REPORT !== undefined) process.stdout.write(`${worst.lines().join('\n')}\n`);
});
