import Type, { type Static } from 'typebox';
import { pipeColumnFromNote, type Resonator } from '../../science/acoustics/instrument.js';
import { purityFromNote } from '../../science/acoustics/purity.js';
import { frequencyRange } from '../../science/acoustics/ranges.js';
import type { GasLibrary } from '../../science/gases/gas-library.js';
import { mixtureState } from '../../science/gases/mixture-state.js';
import { inRange } from '../../science/range.js';
import type { Calculator } from './calculator.js';
import { humiditySchema, pressureSchema, temperatureSchema } from './gas.js';
import { surroundingsSchema } from './sound.js';

const closed = { additionalProperties: false };

const input = Type.Object(
  {
    frequencyInAirHz: Type.Number({ description: 'note in room air [Hz], 16 to 16000' }),
    frequencyMeasuredHz: Type.Number({
      description: 'note of the same pipe, same harmonic, in the gas [Hz], 16 to 16000',
    }),
    gas: Type.String({ minLength: 1, description: 'gas id; the rest is humid room air' }),
    surroundings: Type.Optional(surroundingsSchema),
    temperatureK: temperatureSchema,
    pressurePa: pressureSchema,
    relativeHumidity: Type.Optional(humiditySchema),
    gasTemperatureK: Type.Optional(
      Type.Number({ description: 'temperature of the gas in the pipe [K]; default the room' }),
    ),
    radiusM: Type.Optional(
      Type.Number({
        description:
          'inner radius of the pipe [m], 0.001 to 0.5: friction at its wall is corrected',
      }),
    ),
    standardUncertaintyHz: Type.Optional(
      Type.Number({
        description:
          'of frequencyMeasuredHz [Hz], 0 to 1000; default 0.3 %; the note in air has the same relative one',
      }),
    ),
    standardUncertaintyInAirHz: Type.Optional(
      Type.Number({ description: 'of frequencyInAirHz, where it differs [Hz], 0 to 1000' }),
    ),
    standardUncertaintyK: Type.Optional(
      Type.Number({ description: 'of the temperature of the gas [K], 0 to 30; default 1' }),
    ),
  },
  { ...closed, title: 'purity: input' },
);

const fraction = (description: string) => Type.Number({ minimum: 0, maximum: 1, description });

const output = Type.Union(
  [
    Type.Object(
      {
        possible: Type.Literal(true),
        gasFraction: fraction('mole fraction of the gas, for a pipe wholly inside it [1]'),
        airFraction: fraction('mole fraction of humid room air [1]'),
        oxygenFraction: fraction('oxygen of the mixture, dry basis [1]'),
        standardUncertainty: Type.Number({
          description: 'of gasFraction, from the readings alone [1]',
        }),
        low: Type.Optional(fraction('where the ends saw air: lower end of gasFraction [1]')),
        high: Type.Optional(
          fraction(
            'where the ends saw air: upper end of gasFraction [1]; without radiusM the widest usual bore is assumed',
          ),
        ),
      },
      closed,
    ),
    Type.Object(
      {
        possible: Type.Literal(false),
        suspects: Type.Array(Type.String(), { minItems: 1, description: 'what to check' }),
      },
      closed,
    ),
  ],
  { title: 'purity: output' },
);

type PurityDocument = Static<typeof input>;

/** The pipe as it stood in air: usual flue-pipe proportions, on which outside air weighs most. */
function standingPipe(given: PurityDocument, gases: GasLibrary): Resonator {
  const air = mixtureState(gases, {
    composition: { air: 1 },
    temperatureK: given.temperatureK,
    pressurePa: given.pressurePa,
    relativeHumidity: given.relativeHumidity ?? 0,
  });
  const f = inRange(given.frequencyInAirHz, frequencyRange, '/frequencyInAirHz');
  return {
    shape: 'column',
    column: pipeColumnFromNote('fluePipe', f, air.speedOfSoundMPerS, given.radiusM),
  };
}

/** Share of gas from the note of a pipe in it and in air. */
export const purityCalculator: Calculator<typeof input, typeof output> = {
  name: 'purity',
  input,
  output,
  run(given, { gases }) {
    const { surroundings, ...rest } = given;
    const relativeHumidity = given.relativeHumidity ?? 0;
    const purity = purityFromNote(gases, {
      ...rest,
      relativeHumidity,
      ...(surroundings === 'air' ? { standsInAir: standingPipe(given, gases) } : {}),
    });
    if (!purity.possible) return { possible: false, suspects: [...purity.suspects] };
    const { gasFraction, airFraction, standardUncertainty, interval } = purity;
    const { gas, temperatureK, pressurePa } = given;
    const composition: Record<string, number> = { air: airFraction };
    composition[gas] = (composition[gas] ?? 0) + gasFraction;
    const mixture = { composition, temperatureK, pressurePa, relativeHumidity };
    return {
      possible: true,
      gasFraction,
      airFraction,
      oxygenFraction: mixtureState(gases, mixture).oxygenFraction,
      standardUncertainty,
      ...(interval === undefined ? {} : { low: interval[0], high: interval[1] }),
    };
  },
};
