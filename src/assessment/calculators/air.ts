import { Type, type TOptional } from 'typebox';
import { InvalidInput, NotComputable, type ErrorDetail } from '../../errors.js';
import type { Distribution } from '../../science/room-air/air-input.js';
import { airGasTable } from '../../science/room-air/air-gases.js';
import type { AirResult } from '../../science/room-air/air-result.js';
import { airRun } from '../../science/room-air/air-run.js';
import {
  DEFAULT_DISTRIBUTIONS,
  SAMPLED_INPUTS,
  type SampledInput,
} from '../../science/room-air/input-distributions.js';
import type { Calculator } from './calculator.js';

const closed = { additionalProperties: false };
const id = Type.String({ minLength: 1, maxLength: 200 });
const positive = Type.Number({ exclusiveMinimum: 0 });
const notNegative = Type.Number({ minimum: 0 });
const share = Type.Number({ minimum: 0, maximum: 1 });
const fractions = Type.Record(Type.String({ minLength: 1 }), share);
const level = Type.Union([Type.Literal('high'), Type.Literal('low'), Type.Literal('mixed')]);
const timed = { fromS: Type.Optional(notNegative), toS: Type.Optional(notNegative) };

const ambient = Type.Object(
  {
    temperatureK: Type.Number({ minimum: 223.15, maximum: 343.15 }),
    pressurePa: Type.Number({ minimum: 40_000, maximum: 120_000 }),
    relativeHumidity: Type.Optional(share),
    carbonDioxideFraction: Type.Optional(Type.Number({ minimum: 0, maximum: 0.1 })),
  },
  closed,
);

const space = Type.Object(
  {
    id,
    floorAreaM2: positive,
    heightM: positive,
    floorLevelM: Type.Optional(Type.Number()),
    floorRiseM: Type.Optional(notNegative),
    steps: Type.Optional(
      Type.Array(Type.Object({ areaM2: positive, levelM: Type.Number() }, closed), { minItems: 1 }),
    ),
    volumeM3: Type.Optional(positive),
    pockets: Type.Optional(
      Type.Array(
        Type.Object(
          {
            id,
            areaM2: positive,
            depthM: positive,
            at: Type.Union([Type.Literal('high'), Type.Literal('low')]),
          },
          closed,
        ),
      ),
    ),
    temperatureK: Type.Optional(Type.Number({ minimum: 223.15, maximum: 343.15 })),
    initial: Type.Optional(fractions),
  },
  closed,
);

const opening = Type.Object(
  {
    id: Type.Optional(id),
    from: id,
    to: id,
    kind: Type.Union([Type.Literal('doorway'), Type.Literal('vent'), Type.Literal('floorOpening')]),
    widthM: positive,
    heightM: positive,
    sillLevelM: Type.Optional(Type.Number()),
    openFraction: Type.Optional(share),
    dischargeCoefficient: Type.Optional(Type.Number({ exclusiveMinimum: 0, maximum: 1 })),
    ...timed,
  },
  closed,
);

const airSystem = Type.Object(
  {
    id: Type.Optional(id),
    space: Type.Optional(id),
    serves: Type.Optional(Type.Array(Type.Object({ space: id, share }, closed), { minItems: 1 })),
    freshAirM3PerS: Type.Optional(notNegative),
    drive: Type.Union([Type.Literal('supply'), Type.Literal('extract'), Type.Literal('balanced')]),
    supplyM3PerS: Type.Optional(notNegative),
    extractM3PerS: Type.Optional(notNegative),
    recirculatedM3PerS: Type.Optional(notNegative),
    supplyLevel: Type.Optional(level),
    extractLevel: Type.Optional(level),
    extractTopM: Type.Optional(positive),
    extractWidthM: Type.Optional(positive),
    supplyJet: Type.Optional(
      Type.Object(
        { radiusM: positive, speedMPerS: notNegative },
        {
          ...closed,
          description: 'jet of the supply where it meets the floor layer, as measured there',
        },
      ),
    ),
    effectiveness: Type.Optional(Type.Number({ exclusiveMinimum: 0, maximum: 2 })),
    ...timed,
  },
  closed,
);

const release = Type.Object(
  {
    id: Type.Optional(id),
    space: id,
    gas: Type.Optional(id),
    composition: Type.Optional(fractions),
    amountMol: Type.Optional(notNegative),
    massKg: Type.Optional(notNegative),
    volumeM3: Type.Optional(notNegative),
    startS: Type.Optional(notNegative),
    durationS: Type.Optional(notNegative),
    profile: Type.Optional(Type.Union([Type.Literal('steady'), Type.Literal('decaying')])),
    timeConstantS: Type.Optional(positive),
    heightM: Type.Optional(notNegative),
    temperatureK: Type.Optional(Type.Number({ minimum: 4, maximum: 400 })),
    manner: Type.Optional(
      Type.Union([
        Type.Literal('gentle'),
        Type.Literal('pour'),
        Type.Literal('fog'),
        Type.Literal('spill'),
        Type.Literal('jet'),
        Type.Literal('burst'),
      ]),
    ),
    outletDiameterM: Type.Optional(Type.Number({ exclusiveMinimum: 0, maximum: 2 })),
    episode: Type.Optional(id),
  },
  closed,
);

const occupants = Type.Object(
  {
    space: id,
    count: notNegative,
    metabolicRateMet: Type.Optional(Type.Number({ minimum: 0.5, maximum: 10 })),
    carbonDioxideM3PerS: Type.Optional(notNegative),
    respiratoryQuotient: Type.Optional(Type.Number({ minimum: 0.6, maximum: 1.3 })),
    heightM: Type.Optional(notNegative),
    ...timed,
  },
  closed,
);

const distribution = Type.Union([
  Type.Object({ kind: Type.Literal('fixed'), value: Type.Number() }, closed),
  Type.Object({ kind: Type.Literal('uniform'), low: Type.Number(), high: Type.Number() }, closed),
  Type.Object({ kind: Type.Literal('logUniform'), low: positive, high: positive }, closed),
  Type.Object(
    { kind: Type.Literal('normal'), mean: Type.Number(), standardDeviation: notNegative },
    closed,
  ),
  Type.Object(
    {
      kind: Type.Literal('lognormal'),
      median: positive,
      geometricDeviation: Type.Number({ minimum: 1 }),
    },
    closed,
  ),
  Type.Object(
    {
      kind: Type.Literal('triangular'),
      low: Type.Number(),
      mode: Type.Number(),
      high: Type.Number(),
    },
    closed,
  ),
]);

/** The body of the calculator `air`; one description for every door. */
/** Each sampled input with its own distribution, which stands where the document gives none. */
const overrides = Object.fromEntries(
  SAMPLED_INPUTS.map((name) => [
    name,
    Type.Optional(Type.Union(distribution.anyOf, { default: DEFAULT_DISTRIBUTIONS[name] })),
  ]),
) as Record<SampledInput, TOptional<typeof distribution>>;

/** Distributions whose ends stand the wrong way round. */
function distributionProblems(
  distributions: Partial<Record<SampledInput, Distribution>>,
): readonly ErrorDetail[] {
  return Object.entries(distributions).flatMap(([name, one]): ErrorDetail[] => {
    const ends =
      one.kind === 'triangular'
        ? [one.low, one.mode, one.high]
        : one.kind === 'uniform' || one.kind === 'logUniform'
          ? [one.low, one.high]
          : [0, 1];
    const isRising = ends.every((end, i) => i === 0 || end >= (ends[i - 1] ?? end));
    if (isRising && (ends[0] ?? 0) < (ends.at(-1) ?? 0)) return [];
    const path = `/uncertainty/distributions/${name}`;
    return [{ path, problem: 'low, mode and high do not rise; give fixed for one value' }];
  });
}

export const airInputSchema = Type.Object(
  {
    ambient,
    durationS: Type.Number({ exclusiveMinimum: 0, maximum: 366 * 86_400 }),
    outputIntervalS: positive,
    thresholds: Type.Optional(Type.Array(Type.Object({ quantity: id, value: share }, closed))),
    spaces: Type.Array(space, { minItems: 1 }),
    openings: Type.Optional(Type.Array(opening)),
    airSystems: Type.Optional(Type.Array(airSystem)),
    infiltration: Type.Optional(
      Type.Array(Type.Object({ space: id, airChangesPerHour: notNegative, ...timed }, closed)),
    ),
    transfers: Type.Optional(
      Type.Array(Type.Object({ from: id, to: id, flowM3PerS: notNegative, ...timed }, closed)),
    ),
    releases: Type.Optional(Type.Array(release)),
    occupants: Type.Optional(Type.Array(occupants)),
    zones: Type.Optional(
      Type.Array(
        Type.Object(
          { id, space: id, heightM: positive, floorLevelM: Type.Optional(Type.Number()) },
          closed,
        ),
      ),
    ),
    uncertainty: Type.Optional(
      Type.Object(
        {
          samples: Type.Integer({ minimum: 1, maximum: 65_536 }),
          seed: Type.Integer({ minimum: 0 }),
          distributions: Type.Optional(Type.Object(overrides, closed)),
        },
        closed,
      ),
    ),
    layers: Type.Optional(
      Type.Object(
        {
          sourceDilution: Type.Optional(Type.Number({ minimum: 1 })),
          turbulenceVelocityMPerS: Type.Optional(notNegative),
          walkingExchangeMPerS: Type.Optional(notNegative),
          smearHeightM: Type.Optional(notNegative),
          fallEntrainment: Type.Optional(Type.Number({ minimum: 0, maximum: 1 })),
          edgeEntrainment: Type.Optional(Type.Number({ minimum: 0, maximum: 0.8 })),
        },
        closed,
      ),
    ),
  },
  closed,
);

const numbers = Type.Array(Type.Number());
const byGas = <T extends Parameters<typeof Type.Record>[1]>(of: T) =>
  Type.Record(Type.String(), of);
const series = {
  oxygenFraction: numbers,
  oxygenPartialPressurePa: numbers,
  gasFraction: byGas(numbers),
};
const airSeries = Type.Object(series);
const peakValues = Type.Object({
  oxygenFraction: Type.Number(),
  gasFraction: byGas(Type.Number()),
});
const quantiles = <T extends Parameters<typeof Type.Optional>[0]>(of: T) =>
  Type.Object({ p05: of, p50: of, p95: of });
const layeredSeries = Type.Object({
  ...series,
  peak: Type.Optional(quantiles(peakValues)),
  p05: Type.Optional(airSeries),
  p50: Type.Optional(airSeries),
  p95: Type.Optional(airSeries),
  adverse: Type.Optional(airSeries),
});
const layerFractions = Type.Object({ oxygenFraction: numbers, gasFraction: byGas(numbers) });
const spaceLayers = Type.Object({
  floorLayerDepthM: numbers,
  ceilingLayerDepthM: numbers,
  floorLayer: layerFractions,
  middle: layerFractions,
  ceilingLayer: layerFractions,
});
const oxygenExtreme = Type.Object({ oxygenFraction: Type.Number(), atS: Type.Number() });
const extreme = Type.Object({ value: Type.Number(), atS: Type.Number() });
const height = {
  heightM: Type.Number(),
  mixed: airSeries,
  bound: airSeries,
  layered: Type.Optional(layeredSeries),
  minimum: Type.Object({
    mixed: oxygenExtreme,
    bound: oxygenExtreme,
    layered: Type.Optional(oxygenExtreme),
  }),
  maximum: Type.Object({
    mixed: byGas(extreme),
    bound: byGas(extreme),
    layered: Type.Optional(byGas(extreme)),
  }),
};

export const airResultSchema = Type.Object({
  timesS: numbers,
  /** Answers left out of this result, and why. */
  warnings: Type.Optional(Type.Array(Type.String())),
  spaces: Type.Record(
    Type.String(),
    Type.Object({
      mixed: airSeries,
      layered: Type.Optional(spaceLayers),
      purePoolDepthM: Type.Number(),
    }),
  ),
  zones: Type.Record(Type.String(), Type.Object({ ...height, at02M: Type.Object(height) })),
  crossings: Type.Array(
    Type.Object({
      zone: Type.String(),
      heightM: Type.Number(),
      answer: Type.Union([Type.Literal('mixed'), Type.Literal('layered'), Type.Literal('bound')]),
      quantity: Type.String(),
      value: Type.Number(),
      atS: Type.Number(),
      direction: Type.Union([Type.Literal('rising'), Type.Literal('falling')]),
    }),
  ),
  balance: byGas(
    Type.Object({
      inMol: Type.Number(),
      outMol: Type.Number(),
      heldMol: Type.Number(),
      relativeError: Type.Number(),
    }),
  ),
  chances: Type.Optional(
    Type.Array(
      Type.Object({
        zone: Type.String(),
        heightM: Type.Number(),
        quantity: Type.String(),
        value: Type.Number(),
        share: Type.Number({ description: 'share of the draws that pass the value' }),
        firstS: Type.Optional(quantiles(Type.Number())),
      }),
    ),
  ),
  drivers: Type.Optional(
    Type.Array(
      Type.Object({
        zone: Type.String(),
        quantity: Type.String(),
        input: Type.String(),
        rankCorrelation: Type.Number(),
      }),
    ),
  ),
});

type DeepMutable<T> = T extends readonly (infer E)[]
  ? DeepMutable<E>[]
  : T extends object
    ? { -readonly [K in keyof T]: DeepMutable<T[K]> }
    : T;

/** Oxygen and gas where people breathe, over time. */
export const airCalculator: Calculator<typeof airInputSchema, typeof airResultSchema> = {
  name: 'air',
  input: airInputSchema,
  output: airResultSchema,
  run(input, data) {
    const gases = airGasTable(data.gases);
    const problems = distributionProblems(input.uncertainty?.distributions ?? {});
    if (problems.length > 0) {
      throw new InvalidInput(
        'A distribution of the uncertainty stands the wrong way round.',
        'Give low below high, and mode between them.',
        problems,
      );
    }
    // The science declares its own plain types; the signature checks that both say the same.
    const mutable = (result: AirResult) => result as DeepMutable<AirResult>;
    try {
      return mutable(airRun(input, gases));
    } catch (thrown) {
      if (!(thrown instanceof NotComputable)) throw thrown;
      // The layered answer did not get through: the mixed answer and the bound stand, and it is said.
      return {
        ...mutable(airRun(input, gases, { layered: false })),
        warnings: [`The layered answer is left out: ${thrown.message}`],
      };
    }
  },
};
