import { createRequire } from 'node:module';
import { describe, expect, it } from 'vitest';
import { loadGasLibrary } from '../../../src/catalogue/gas-library.js';
import { InvalidInput, OutOfRange } from '../../../src/errors.js';
import {
  amountByPressureDrop,
  amountByWeighing,
  contentByPressure,
  planningContentMol,
} from '../../../src/science/gases/container-content.js';
import { containerState } from '../../../src/science/gases/container-density.js';
import { balloonVolume, liquidGasVolume } from '../../../src/science/gases/expansion.js';
import {
  waterFractionOfAir,
  waterSaturationPressure,
} from '../../../src/science/gases/humid-air.js';
import { mixtureState } from '../../../src/science/gases/mixture-state.js';
import { molarVolumeM3PerMol } from '../../../src/science/gases/molar-volume.js';
import {
  absolutePressure,
  amountOfTradeVolume,
  fromSi,
  inSi,
  units,
  type UnitName,
} from '../../../src/science/quantity.js';

const library = loadGasLibrary();
const room = { temperatureK: 293.15, pressurePa: 101_325 };
const cylinder = (gas: string, pressurePa = 2e7) => ({
  composition: { [gas]: 1 },
  waterVolumeM3: 0.05,
  pressurePa,
  temperatureK: 293.15,
});

describe('containers', () => {
  it.each([
    // Reference dossier, section 10: Z at 300 K and 200 bar, five digits.
    ['He', 1.09279],
    ['N2', 1.05682],
    ['Ar', 0.95374],
    ['air', 1.03201],
    ['H2', 1.1225],
    ['O2', 0.94912],
  ])('%s at 300 K and 200 bar has the compressibility factor %d', (gas, Z) => {
    expect(Math.abs(containerState(library, gas, 300, 2e7).compressibilityFactor - Z)).toBeLessThan(
      1.1e-5,
    );
  });

  it('plans helium by the ideal gas and argon by the gas model', () => {
    const ideal = (2e7 * 0.05) / (library.gasConstant.jPerMolK * 293.15);
    expect(planningContentMol(library, cylinder('He'))).toBe(ideal);
    expect(planningContentMol(library, cylinder('Ar'))).toBe(
      contentByPressure(library, cylinder('Ar'), room).amountMol,
    );
    expect(planningContentMol(library, cylinder('Ar'))).toBeGreaterThan(ideal);
  });

  it('a pressure drop releases what the contents differ by, and a mixture keeps the sum', () => {
    const after = { pressurePa: 1.5e7, temperatureK: 290 };
    const drop = amountByPressureDrop(library, cylinder('N2'), after);
    const before = contentByPressure(library, cylinder('N2'), room).amountMol;
    const rest = contentByPressure(library, { ...cylinder('N2'), ...after }, room).amountMol;
    expect(drop).toBeCloseTo(before - rest, 9);
  });

  it('a weighed kilogram of carbon dioxide is 22.7 mol', () => {
    expect(amountByWeighing(library, { CO2: 1 }, 31.5, 30.5)).toBeCloseTo(1 / 0.0440095, 9);
    expect(amountByWeighing(library, { CO2: 1 }, 30.5, 31.5)).toBeLessThan(0);
  });

  it('content grows with pressure for every compressed gas', () => {
    for (const gas of ['He', 'Ne', 'Ar', 'Kr', 'N2', 'O2', 'air', 'H2', 'CH4']) {
      let last = 0;
      for (let bar = 5; bar <= 300; bar += 5) {
        const { amountDensityMolPerM3 } = containerState(library, gas, 288.15, bar * 1e5);
        expect(amountDensityMolPerM3).toBeGreaterThan(last);
        last = amountDensityMolPerM3;
      }
    }
  });

  it('at room pressure the series and the room model agree within 0.01 %', () => {
    for (const gas of ['He', 'Ar', 'N2', 'CO2', 'SF6', 'Xe', 'air']) {
      const series = containerState(library, gas, 293.15, 101_325).amountDensityMolPerM3;
      const { amountDensityMolPerM3 } = mixtureState(library, {
        composition: { [gas]: 1 },
        ...room,
      });
      expect(Math.abs(series / amountDensityMolPerM3 - 1)).toBeLessThan(1e-4);
    }
  });
});

describe('expansion', () => {
  it.each([
    // Expansion ratios of the species files, liquid at its boiling point to gas at 20 degC.
    ['N2', 692],
    ['Ar', 839.7],
    ['O2', 857.3],
    ['He', 749.6],
  ])('a litre of liquid %s becomes %d litres', (gas, ratio) => {
    // Four digits of density enter the ratio.
    expect(Math.abs(liquidGasVolume(library, gas, 1e-3, room) / (ratio * 1e-3) - 1)).toBeLessThan(
      3e-4,
    );
  });

  it('refuses a liquid that does not exist at room pressure', () => {
    expect(() => liquidGasVolume(library, 'CO2', 1e-3, room)).toThrow(InvalidInput);
  });

  it.each([
    // Sphere volumes in litres, common practice, no source beyond geometry.
    [5, 1.1],
    [11, 11.4],
    [12, 14.8],
    [36, 400],
  ])('a round balloon of %d in holds %d L', (inches, litres) => {
    const volume = fromSi(balloonVolume(inSi(inches, 'in')), 'L');
    expect(Math.abs(volume / litres - 1)).toBeLessThan(0.03);
  });
});

describe('units', () => {
  it('every unit goes to SI and back', () => {
    for (const unit of Object.keys(units) as UnitName[]) {
      expect(fromSi(inSi(12.5, unit), unit)).toBeCloseTo(12.5, 9);
    }
  });

  it('trade volumes keep their base: 1 scf is 28.2 L and 1 Nm3 is 1.073 m3 at 20 degC', () => {
    // Common practice; three and four digits printed.
    const at20 = molarVolumeM3PerMol(293.15, 101_325);
    expect(amountOfTradeVolume(1, 'scf') * at20 * 1000).toBeCloseTo(28.2, 1);
    expect(amountOfTradeVolume(1, 'Nm3') * at20).toBeCloseTo(1.073, 3);
    expect(() => amountOfTradeVolume(-1, 'scf')).toThrow(InvalidInput);
  });

  it('a gauge pressure adds the room, and cannot be negative', () => {
    expect(absolutePressure(2e7, 80_000)).toBe(20_080_000);
    expect(() => absolutePressure(-1, 101_325)).toThrow(InvalidInput);
  });
});

describe('humid air against the general-purpose library psychrolib (ASHRAE formulas)', () => {
  interface Psychrometrics {
    readonly SI: number;
    SetUnitSystem(system: number): void;
    GetSatVapPres(tC: number): number;
    GetHumRatioFromRelHum(tC: number, rh: number, p: number): number;
    GetMoistAirDensity(tC: number, humRatio: number, p: number): number;
  }
  const other = createRequire(import.meta.url)('psychrolib') as Psychrometrics;
  other.SetUnitSystem(other.SI);

  it('saturation pressure agrees within 0.1 % from 1 to 45 degC', () => {
    for (let t = 1; t <= 45; t += 4) {
      expect(
        Math.abs(waterSaturationPressure(library, t + 273.15) / other.GetSatVapPres(t) - 1),
      ).toBeLessThan(1e-3);
    }
  });

  it('density agrees within 0.15 %, as that library takes ideal gases and no enhancement', () => {
    for (const t of [5, 20, 35]) {
      for (const rh of [0, 0.5, 1]) {
        const ours = mixtureState(library, {
          composition: { air: 1 },
          temperatureK: t + 273.15,
          pressurePa: 95_000,
          relativeHumidity: rh,
        }).densityKgPerM3;
        const ratio = other.GetHumRatioFromRelHum(t, rh, 95_000);
        expect(Math.abs(ours / other.GetMoistAirDensity(t, ratio, 95_000) - 1)).toBeLessThan(
          1.5e-3,
        );
      }
    }
  });

  it('water content agrees within the enhancement factor of 0.5 %', () => {
    const ratio = other.GetHumRatioFromRelHum(20, 0.5, 101_325);
    const fraction = ratio / (ratio + 0.621945);
    const ours = waterFractionOfAir(library, 293.15, 101_325, 0.5);
    expect(ours / fraction - 1).toBeGreaterThan(0);
    expect(ours / fraction - 1).toBeLessThan(0.005);
  });

  it('refuses a humidity or temperature outside its range', () => {
    expect(() => waterFractionOfAir(library, 293.15, 101_325, 1.2)).toThrow(OutOfRange);
    expect(() => waterSaturationPressure(library, 330)).toThrow(OutOfRange);
  });
});
