import { Type } from 'typebox';
import { decayRate } from '../../science/room-air/decay-log.js';
import type { Calculator } from './calculator.js';

export const decayInputSchema = Type.Object(
  {
    timesS: Type.Array(Type.Number(), { maxItems: 100_000 }),
    readingsPpm: Type.Array(Type.Number({ minimum: 0 }), { maxItems: 100_000 }),
    backgroundPpm: Type.Union([Type.Number({ minimum: 0 }), Type.Null()]),
    volumeM3: Type.Number({ exclusiveMinimum: 0 }),
  },
  { additionalProperties: false },
);

const interval = Type.Tuple([Type.Number(), Type.Number()]);

export const decayResultSchema = Type.Object({
  airChangesPerHour: Type.Number(),
  standardUncertainty: Type.Number(),
  interval95: interval,
  freshAirM3PerS: Type.Number(),
  freshAirInterval95: interval,
  rSquared: Type.Number(),
  warnings: Type.Array(Type.String()),
});

/** Fresh air of a space from a log of falling readings. */
export const decayCalculator: Calculator<typeof decayInputSchema, typeof decayResultSchema> = {
  name: 'decay',
  input: decayInputSchema,
  output: decayResultSchema,
  run(input) {
    const { interval95, freshAirInterval95, warnings, ...result } = decayRate(input);
    return {
      airChangesPerHour: result.airChangesPerHour,
      standardUncertainty: result.standardUncertainty,
      interval95: [...interval95],
      freshAirM3PerS: result.freshAirM3PerS,
      freshAirInterval95: [...freshAirInterval95],
      rSquared: result.rSquared,
      warnings: [...warnings],
    };
  },
};
