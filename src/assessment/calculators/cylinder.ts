import Type from 'typebox';
import { InvalidInput } from '../../errors.js';
import { contentByMass, contentByPressure } from '../../science/gases/container-content.js';
import { knownGas } from '../../science/gases/known-gas.js';
import { roomPressure, roomTemperature } from '../../science/gases/ranges.js';
import { inRange } from '../../science/range.js';
import type { Calculator } from './calculator.js';
import { compositionSchema, pressureSchema, temperatureSchema } from './gas.js';

const closed = { additionalProperties: false };

const input = Type.Object(
  {
    gas: Type.Optional(Type.String({ minLength: 1, description: 'gas id or air' })),
    composition: Type.Optional(compositionSchema),
    waterVolumeM3: Type.Optional(
      Type.Number({ description: 'water volume of the container [m3], 1e-6 to 100' }),
    ),
    pressurePa: Type.Optional(
      Type.Number({
        description:
          'absolute pressure inside [Pa], 50000 to 3e7: gauge plus room pressure; not for liquefied gases',
      }),
    ),
    temperatureK: Type.Optional(
      Type.Number({ description: 'temperature of the gas inside [K], 253.15 to 323.15' }),
    ),
    massKg: Type.Optional(
      Type.Number({ description: 'weight less tare [kg], 0 to 100000; for liquefied gases' }),
    ),
    roomTemperatureK: temperatureSchema,
    roomPressurePa: pressureSchema,
  },
  {
    ...closed,
    title: 'cylinder: input',
    description:
      'gas or composition; and either waterVolumeM3, pressurePa and temperatureK, or massKg',
  },
);

const output = Type.Object(
  {
    amountMol: Type.Number({ description: 'amount of gas [mol]' }),
    massKg: Type.Number({ description: 'mass of gas [kg]' }),
    volumeAtRoomM3: Type.Number({ description: 'volume at the room conditions given [m3]' }),
    compressibilityFactor: Type.Union([Type.Number(), Type.Null()], {
      description: 'p V/(n R T) inside [1]; null where the content was given by mass',
    }),
  },
  { ...closed, title: 'cylinder: output' },
);

function missing(keys: readonly string[], hint: string): InvalidInput {
  return new InvalidInput(
    `The content does not follow from what is given: ${keys.join(', ')} missing.`,
    hint,
    keys.map((key) => ({ path: `/${key}`, problem: 'is missing' })),
  );
}

/** Content of a container, by pressure or by mass. */
export const cylinderCalculator: Calculator<typeof input, typeof output> = {
  name: 'cylinder',
  input,
  output,
  run(given, { gases }) {
    const { gas, waterVolumeM3, pressurePa, temperatureK, massKg } = given;
    // Checked under their own names: the science knows them as any temperature and pressure.
    const room = {
      temperatureK: inRange(given.roomTemperatureK, roomTemperature, '/roomTemperatureK'),
      pressurePa: inRange(given.roomPressurePa, roomPressure, '/roomPressurePa'),
    };
    if (gas !== undefined && given.composition !== undefined) {
      throw new InvalidInput('Both gas and composition are given.', 'Give one of them.', [
        { path: '/composition', problem: 'contradicts gas' },
      ]);
    }
    if (gas !== undefined && gas !== 'air') knownGas(gases, gas, '/gas');
    const composition = given.composition ?? (gas === undefined ? undefined : { [gas]: 1 });
    if (composition === undefined) {
      throw missing(['gas'], 'Give gas (an id, or air) or a composition.');
    }
    const byPressure = { waterVolumeM3, pressurePa, temperatureK };
    if (massKg !== undefined) {
      if (pressurePa !== undefined) {
        throw new InvalidInput(
          'Both a mass and a pressure are given.',
          'Give massKg alone, or waterVolumeM3, pressurePa and temperatureK.',
          [{ path: '/pressurePa', problem: 'contradicts massKg' }],
        );
      }
      return contentByMass(gases, composition, massKg, room);
    }
    if (waterVolumeM3 === undefined || pressurePa === undefined || temperatureK === undefined) {
      throw missing(
        Object.entries(byPressure)
          .filter(([, value]) => value === undefined)
          .map(([key]) => key),
        'Give waterVolumeM3, pressurePa (absolute) and temperatureK, or massKg.',
      );
    }
    return contentByPressure(gases, { composition, waterVolumeM3, pressurePa, temperatureK }, room);
  },
};
