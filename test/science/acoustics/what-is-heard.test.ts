import { describe, expect, it } from 'vitest';
import { loadGasLibrary } from '../../../src/catalogue/gas-library.js';
import { NotAllowed } from '../../../src/errors.js';
import { mixtureShareForFormants } from '../../../src/science/acoustics/formant-share.js';
import { airAtEndsFactor, pipeColumn } from '../../../src/science/acoustics/instrument.js';
import {
  audibleFormantChanges,
  audibleShifts,
  gasByFlushing,
  gasBySqueezing,
  shareForShift,
} from '../../../src/science/acoustics/smallest-amount.js';
import {
  boundaryTransmission,
  drivenSourceLevel,
} from '../../../src/science/acoustics/sound-level.js';
import { sourceTypes } from '../../../src/science/acoustics/source-types.js';
import { wallFactorOfGas } from '../../../src/science/acoustics/wall-friction.js';
import { mixtureState } from '../../../src/science/gases/mixture-state.js';
import { sources } from '../../../src/science/sources.js';

const library = loadGasLibrary();
const room = { temperatureK: 293.15, pressurePa: 101_325, relativeHumidity: 0.5 };
const air = mixtureState(library, { composition: { air: 1 }, ...room });
const pure = (gas: string) => mixtureState(library, { composition: { [gas]: 1 }, ...room });

describe('smallest shares that are heard, immersed at 20 degC (dossier A3, ideal gas)', () => {
  it.each([
    ['He', 'sideBySide', 0.0118],
    ['SF6', 'sideBySide', 0.00233],
    ['CO2', 'sideBySide', 0.0184],
    ['Xe', 'sideBySide', 0.0034],
    ['Kr', 'sideBySide', 0.0065],
    ['He', 'obvious', 0.113],
    ['SF6', 'obvious', 0.0244],
    ['CO2', 'obvious', 0.192],
    ['Xe', 'obvious', 0.036],
    ['Kr', 'obvious', 0.069],
    ['He', 'striking', 0.307],
    ['SF6', 'striking', 0.081],
    ['CO2', 'striking', 0.64],
  ] as const)('%s is %s at a share of %d', (gas, shift, share) => {
    const ideal = shareForShift(library, { gas, ...room, model: 'ideal' }, audibleShifts[shift]);
    // Two or three digits are printed: 1.5 % covers the rounding.
    expect(Math.abs((ideal ?? 0) / share - 1)).toBeLessThan(0.015);
    const real = shareForShift(library, { gas, ...room }, audibleShifts[shift]);
    expect(Math.abs((real ?? 0) / share - 1)).toBeLessThan(0.03);
  });

  it('argon never gives a striking shift, and says so', () => {
    expect(shareForShift(library, { gas: 'Ar', ...room }, audibleShifts.striking)).toBeNull();
  });

  it('squeezing the bag first needs less gas than flushing', () => {
    for (const share of [0.1, 0.5, 0.9, 0.99]) {
      expect(gasBySqueezing(0.02, share)).toBeLessThan(gasByFlushing(0.02, share));
    }
    expect(() => gasByFlushing(0.02, 1)).toThrow();
  });

  it('formants of the breathable mixture move by 5 and 15 % at growing shares of it', () => {
    const mixture = { He: 0.79, O2: 0.21 };
    const five = mixtureShareForFormants(
      library,
      mixture,
      101_325,
      audibleFormantChanges.noticeable,
    );
    const fifteen = mixtureShareForFormants(
      library,
      mixture,
      101_325,
      audibleFormantChanges.obvious,
    );
    expect(five).toBeGreaterThan(0.1);
    expect(fifteen).toBeGreaterThan(five ?? 1);
    // snd-026: a share of 0.25 gives 1.102, so 1.15 needs more.
    expect(fifteen).toBeGreaterThan(0.25);
    expect(mixtureShareForFormants(library, mixture, 101_325, 0.9)).toBeNull();
    expect(() => mixtureShareForFormants(library, { He: 1 }, 101_325, 0.05)).toThrow(NotAllowed);
  });
});

describe('pipes filled with one gas and ending in air (dossier A1, two or three digits)', () => {
  it.each([
    ['He', 1, 0.02, 2.56],
    ['He', 0.5, 0.015, 2.42],
    ['He', 0.5, 0.03, 2.12],
    ['SF6', 0.5, 0.015, 0.405],
  ])('%s in %d m of %d m radius gives %d', (gas, lengthM, radiusM, expected) => {
    const state = pure(gas);
    const column = pipeColumn('openPipe', { lengthM, radiusM });
    const factor = airAtEndsFactor(
      { shape: 'column', column },
      air.densityKgPerM3 / state.densityKgPerM3,
    );
    const ratio = (state.idealSpeedOfSoundMPerS / air.idealSpeedOfSoundMPerS) * factor;
    expect(Math.abs(ratio - expected)).toBeLessThan(gas === 'He' ? 0.006 : 0.001);
  });
});

describe('wall friction', () => {
  it.each([
    // Dossier A1: helium at 780 Hz, air at 315 Hz.
    ['He', 780, 0.01, 0.98],
    ['He', 780, 0.005, 0.96],
    ['air', 315, 0.01, 0.991],
    ['air', 315, 0.005, 0.982],
  ])('%s at %d Hz in %d m of radius keeps %d of its speed', (gas, f, a, factor) => {
    const dry = { composition: { [gas]: 1 }, temperatureK: 293.15, pressurePa: 101_325 };
    expect(Math.abs(wallFactorOfGas(library, dry, a, f) - factor)).toBeLessThan(0.001);
  });
});

describe('level and source types', () => {
  it.each([
    // Dossier A4, one decimal: monopole and dipole in dB.
    ['He', -13.2, -22.6],
    ['SF6', 11.1, 19.2],
    ['Xe', 9.5, 15.3],
  ])('a bell moved into %s changes by %d and %d dB', (gas, monopole, dipole) => {
    const state = pure(gas);
    const of = ({ densityKgPerM3: rho, idealSpeedOfSoundMPerS: c }: typeof state) => ({ rho, c });
    expect(drivenSourceLevel('monopole', of(state), of(air))).toBeCloseTo(monopole, 0);
    expect(drivenSourceLevel('dipole', of(state), of(air))).toBeCloseTo(dipole, 0);
  });

  it('sulfur hexafluoride to air loses 0.50 dB', () => {
    const Z = ({ densityKgPerM3, speedOfSoundMPerS }: typeof air) =>
      densityKgPerM3 * speedOfSoundMPerS;
    expect(boundaryTransmission(Z(pure('SF6')), Z(air))).toBeCloseTo(-0.5, 1);
  });

  it('every source type has its own words and a source; a voice shifts timbre only', () => {
    expect(new Set(sourceTypes.map(({ expectation }) => expectation)).size).toBe(
      sourceTypes.length,
    );
    for (const { source } of sourceTypes) expect(sources).toHaveProperty(source);
    expect(sourceTypes.find(({ id }) => id === 'voice')?.following).toBe('timbre');
    expect(sourceTypes.find(({ id }) => id === 'freeReed')?.following).toBe('none');
  });
});
