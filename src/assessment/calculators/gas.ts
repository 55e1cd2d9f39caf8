import Type from 'typebox';
import { mixtureState } from '../../science/gases/mixture-state.js';
import type { Calculator } from './calculator.js';

const closed = { additionalProperties: false };

/** Mole fractions by gas id; shared by every calculator that takes a mixture. */
export const compositionSchema = Type.Record(Type.String({ minLength: 1 }), Type.Number(), {
  minProperties: 1,
  description: 'mole fractions by gas id or air, each 0 to 1, sum 1 within 1e-6',
});

export const temperatureSchema = Type.Number({ description: 'temperature [K], 263.15 to 318.15' });
export const pressureSchema = Type.Number({
  description: 'absolute pressure [Pa], 60000 to 110000',
});
export const humiditySchema = Type.Number({
  description: 'relative humidity of the air share over liquid water [1], 0 to 1; default 0',
});

const input = Type.Object(
  {
    composition: compositionSchema,
    temperatureK: temperatureSchema,
    pressurePa: pressureSchema,
    relativeHumidity: Type.Optional(humiditySchema),
  },
  { ...closed, title: 'gas: input' },
);

const output = Type.Object(
  {
    molarMassKgPerMol: Type.Number({ description: 'molar mass [kg/mol]' }),
    densityKgPerM3: Type.Number({ description: 'density of the real gas [kg/m3]' }),
    speedOfSoundMPerS: Type.Number({
      description: 'speed of sound at audible frequencies, vibration in equilibrium [m/s]',
    }),
    heatCapacityRatio: Type.Number({
      description: 'cp/cv of the ideal gas, the gamma of acoustic formulas [1]',
    }),
    compressibilityFactor: Type.Number({ description: 'p V/(n R T) [1]' }),
    oxygenFraction: Type.Number({ description: 'oxygen, dry basis [1]' }),
    densityRelativeToAir: Type.Number({
      description: 'density over that of dry air at the same temperature and pressure [1]',
    }),
  },
  { ...closed, title: 'gas: output' },
);

/** Density, speed of sound and their companions of a gas mixture in a room. */
export const gasCalculator: Calculator<typeof input, typeof output> = {
  name: 'gas',
  input,
  output,
  run(given, { gases }) {
    const state = mixtureState(gases, given);
    return {
      molarMassKgPerMol: state.molarMassKgPerMol,
      densityKgPerM3: state.densityKgPerM3,
      speedOfSoundMPerS: state.speedOfSoundMPerS,
      heatCapacityRatio: state.heatCapacityRatio,
      compressibilityFactor: state.compressibilityFactor,
      oxygenFraction: state.oxygenFraction,
      densityRelativeToAir: state.densityRelativeToAir,
    };
  },
};
