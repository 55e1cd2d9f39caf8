import { readdirSync, readFileSync } from 'node:fs';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';
import Type from 'typebox';
import { fitting } from '../assessment/schema-check.js';
import { DomainError, InvalidInput } from '../errors.js';
import type { GasLibrary, GasSpecies } from '../science/gases/gas-library.js';

const Status = Type.Union([Type.Literal('verified'), Type.Literal('from memory')]);
const Positive = Type.Number({ exclusiveMinimum: 0 });
const NullableNumber = Type.Union([Type.Number(), Type.Null()]);
const Name = Type.String({ minLength: 1 });
const closed = { additionalProperties: false };

const sourced = { source: Name, status: Status, note: Type.Optional(Name) };
const span = { temperatureMinK: Positive, temperatureMaxK: Positive };
const numbers = (count: number) => Type.Array(Type.Number(), { minItems: count, maxItems: count });

const MolarMassRow = Type.Object({ ...sourced, molarMassKgPerMol: Positive }, closed);

const CriticalRow = Type.Object(
  {
    ...sourced,
    temperatureK: Positive,
    pressurePa: Positive,
    molarVolumeM3PerMol: Positive,
    acentricFactor: Type.Number(),
    molarVolumeStatus: Type.Optional(Status),
  },
  closed,
);

const SecondVirialRow = Type.Object(
  { ...sourced, ...span, coefficientsM3PerMol: numbers(5), worstFitErrorM3PerMol: Positive },
  closed,
);

const DensitySeriesRow = Type.Object(
  {
    ...sourced,
    ...span,
    coefficients: Type.Array(Type.Array(Type.Number(), { minItems: 2, maxItems: 3 }), {
      minItems: 2,
      maxItems: 4,
    }),
    pressureMaxPa: Positive,
    worstErrorPercent: Type.Number({ minimum: 0 }),
    use: Type.Union([Type.Literal('compressed'), Type.Literal('residualVapour')]),
  },
  closed,
);

const ViscosityRow = Type.Object(
  {
    ...sourced,
    kinematicViscosityM2PerS: Positive,
    prandtlNumber: Positive,
    temperatureK: Positive,
    pressurePa: Positive,
  },
  closed,
);

const limits = {
  ...sourced,
  lowerLimitPercent: NullableNumber,
  upperLimitPercent: NullableNumber,
};

const TransportRow = Type.Object(
  {
    ...sourced,
    entries: Type.Array(
      Type.Object(
        {
          form: Name,
          unNumber: Type.String({ pattern: '^UN [0-9]{4}$' }),
          properName: Name,
          adrClass: Name,
          classificationCode: Name,
          labels: Name,
        },
        closed,
      ),
    ),
    classificationStatus: Status,
  },
  closed,
);

const SpeciesFile = Type.Object(
  {
    id: Type.String({ pattern: '^[A-Za-z0-9]+$' }),
    name: Name,
    formula: Name,
    identity: Type.Object({ ...sourced, casNumber: Name }, closed),
    molarMass: MolarMassRow,
    heatCapacity: Type.Object(
      {
        ...sourced,
        ...span,
        coefficients: numbers(7),
        worstErrorPercent260To320K: Type.Optional(Type.Number()),
        worstFitErrorPercent: Type.Optional(Type.Number()),
      },
      closed,
    ),
    critical: CriticalRow,
    quantumCritical: Type.Optional(CriticalRow),
    secondVirial: SecondVirialRow,
    densitySeries: Type.Optional(DensitySeriesRow),
    vapourPressure: Type.Optional(
      Type.Object(
        { ...sourced, ...span, coefficients: numbers(4), worstFitErrorPercent: Type.Number() },
        closed,
      ),
    ),
    phase: Type.Object(
      {
        ...sourced,
        change: Type.Union([Type.Literal('boiling'), Type.Literal('sublimation')]),
        boilingTemperatureK: Type.Optional(Positive),
        sublimationTemperatureK: Type.Optional(Positive),
        latentHeatJPerKg: Positive,
        liquidDensityAtBoilingKgPerM3: Type.Optional(Positive),
        gasDensityAtBoilingKgPerM3: Type.Optional(Positive),
        solidDensityKgPerM3: Type.Optional(Positive),
        solidDensityStatus: Type.Optional(Status),
        gasDensityAtSublimationKgPerM3: Type.Optional(Positive),
        triplePointTemperatureK: Type.Optional(Positive),
        triplePointPressurePa: Type.Optional(Positive),
        liquidDensityAtTriplePointKgPerM3: Type.Optional(Positive),
        latentHeatOfVaporisationAtTriplePointJPerKg: Type.Optional(Positive),
        expansionRatioLiquidToGas20C: Type.Optional(Positive),
        expansionRatioSolidToGas20C: Type.Optional(Positive),
        expansionRatioLiquidAt20CToGas20C: Type.Optional(Positive),
      },
      closed,
    ),
    roomDensity: Type.Optional(
      Type.Object(
        {
          ...sourced,
          densityAt15C101325PaKgPerM3: Positive,
          densityAt20C101325PaKgPerM3: Positive,
        },
        closed,
      ),
    ),
    container: Type.Optional(
      Type.Object(
        {
          ...sourced,
          stateAt20C: Type.Union([
            Type.Literal('compressed'),
            Type.Literal('liquefied'),
            Type.Literal('nearCritical'),
          ]),
          contentBy: Type.Union([Type.Literal('pressure'), Type.Literal('mass')]),
          vapourPressureAt20CPa: Type.Optional(Positive),
          vapourPressureAt15CPa: Type.Optional(Positive),
          liquidDensityAt20CKgPerM3: Type.Optional(Positive),
          vapourDensityAt20CKgPerM3: Type.Optional(Positive),
          latentHeatAt20CJPerKg: Type.Optional(Positive),
        },
        closed,
      ),
    ),
    viscosity: Type.Optional(ViscosityRow),
    relaxation: Type.Optional(
      Type.Object(
        {
          ...sourced,
          frequencyHzAt1Atm: Positive,
          frequencyMinHz: Positive,
          frequencyMaxHz: Positive,
          effect: Name,
        },
        closed,
      ),
    ),
    flammability: Type.Object(
      {
        ...limits,
        flammable: Type.Boolean(),
        oxidising: Type.Boolean(),
        flammableAt20C: Type.Optional(Type.Boolean()),
        iso817Class: Type.Optional(Name),
        alternative: Type.Optional(Type.Object(limits, closed)),
      },
      closed,
    ),
    warmingPotential: Type.Object(
      {
        ...sourced,
        gwp100Ar4: NullableNumber,
        gwp100Ar5: NullableNumber,
        gwp100Ar6: NullableNumber,
        gwp100Eu2024573: NullableNumber,
        gwp100Ar6FirstPrinting: Type.Optional(Type.Number()),
        isEuFluorinatedGas: Type.Boolean(),
        ar5Qualifier: Type.Optional(Name),
        ar5Status: Type.Optional(Status),
        euStatus: Type.Optional(Status),
      },
      closed,
    ),
    odour: Type.Object({ ...sourced, description: Name }, closed),
    transport: TransportRow,
    remark: Type.Optional(Type.Object({ ...sourced, text: Name }, closed)),
  },
  closed,
);

const FractionsRow = Type.Object(
  {
    ...sourced,
    moleFractions: Type.Record(Type.String(), Type.Number({ minimum: 0, maximum: 1 })),
  },
  closed,
);

const InversePowersRow = Type.Object(
  { coefficients: Type.Array(Type.Number()), powers: Type.Array(Type.Integer({ minimum: 0 })) },
  closed,
);

const SharedModelsFile = Type.Object(
  {
    gasConstant: Type.Object({ ...sourced, jPerMolK: Positive }, closed),
    dryAir: Type.Object(
      {
        name: Name,
        composition: FractionsRow,
        traceComposition: FractionsRow,
        molarMass: MolarMassRow,
        secondVirial: SecondVirialRow,
        densitySeries: DensitySeriesRow,
        viscosity: ViscosityRow,
        transport: TransportRow,
      },
      closed,
    ),
    humidAir: Type.Object(
      {
        saturationPressureWater: Type.Object(
          { ...sourced, ...span, coefficients: numbers(8) },
          closed,
        ),
        saturationPressureIce: Type.Object(
          { ...sourced, ...span, coefficients: numbers(6) },
          closed,
        ),
        enhancementFactor: Type.Object(
          {
            ...sourced,
            ...span,
            alpha: Type.Number(),
            betaPerPa: Type.Number(),
            gammaPerC2: Type.Number(),
            pressureMinPa: Positive,
            pressureMaxPa: Positive,
          },
          closed,
        ),
      },
      closed,
    ),
    tsonopoulos: Type.Object({ ...sourced, f0: InversePowersRow, f1: InversePowersRow }, closed),
    quantumCorrection: Type.Object(
      { ...sourced, temperatureTermGKPerMol: Positive, pressureTermGKPerMol: Positive },
      closed,
    ),
    k12: Type.Object(
      {
        ...sourced,
        default: Type.Number(),
        pairs: Type.Array(
          Type.Object(
            {
              between: Type.Array(Name, { minItems: 2, maxItems: 2 }),
              value: Type.Number(),
            },
            closed,
          ),
        ),
      },
      closed,
    ),
  },
  closed,
);

const sharedModelsFileName = 'shared-models.json';

function deepFrozen<T>(value: T): T {
  if (typeof value === 'object' && value !== null && !Object.isFrozen(value)) {
    Object.freeze(value);
    Object.values(value).forEach(deepFrozen);
  }
  return value;
}

function jsonFrom(file: string): unknown {
  try {
    return JSON.parse(readFileSync(file, 'utf8')) as unknown;
  } catch (error) {
    const problem = error instanceof Error ? error.message : String(error);
    throw new InvalidInput(
      `The gas data file ${file} cannot be read: ${problem}`,
      'Restore the file or mend its JSON at the place named.',
      [{ path: file, problem }],
    );
  }
}

/** Runs a check and, when it fails, says in which file. */
function inFile<T>(file: string, check: () => T): T {
  try {
    return check();
  } catch (error) {
    if (!(error instanceof DomainError)) throw error;
    throw new InvalidInput(
      `Gas data file ${file}: ${error.message}`,
      'Mend the places listed under details; every datum needs its source and status.',
      error.details.map(({ path, problem }) => ({ path: `${file}#${path}`, problem })),
    );
  }
}

function speciesFrom(file: string): GasSpecies {
  return inFile(file, () => fitting(SpeciesFile, jsonFrom(file), 'gas data'));
}

function requireKnown(ids: readonly string[], species: object, file: string): void {
  const unknown = ids.filter((id) => !Object.hasOwn(species, id));
  if (unknown.length > 0) {
    throw new InvalidInput(
      `Gas data file ${file} names gases without a file: ${unknown.join(', ')}.`,
      'Add the missing species file or correct the id.',
      unknown.map((id) => ({ path: file, problem: `no species file for ${id}` })),
    );
  }
}

/** Folder of data and words that people may edit, found from this file in src/ and dist/ alike. */
const defaultTemplatesDir = fileURLToPath(new URL('../../templates', import.meta.url));

/**
 * Every gas of templates/gases with the shared models, checked and deeply frozen.
 *
 * @throws {InvalidInput} naming the file, the place in it and what to do
 */
export function loadGasLibrary(templatesDir: string = defaultTemplatesDir): GasLibrary {
  const folder = join(templatesDir, 'gases');
  const species: Record<string, GasSpecies> = {};
  let names: string[];
  try {
    names = readdirSync(folder).filter((name) => name.endsWith('.json'));
  } catch {
    throw new InvalidInput(
      `The folder of gas data ${folder} cannot be read.`,
      'Restore templates/gases from the repository.',
      [{ path: folder, problem: 'missing or not readable' }],
    );
  }
  for (const name of names.sort()) {
    if (name === sharedModelsFileName) continue;
    const file = join(folder, name);
    const gas = speciesFrom(file);
    if (`${gas.id}.json` !== name) {
      throw new InvalidInput(
        `Gas data file ${file} describes ${gas.id}.`,
        'Name the file after the id inside it.',
        [{ path: `${file}#/id`, problem: `is ${gas.id}` }],
      );
    }
    species[gas.id] = gas;
  }
  const sharedFile = join(folder, sharedModelsFileName);
  const shared = inFile(sharedFile, () =>
    fitting(SharedModelsFile, jsonFrom(sharedFile), 'shared gas models'),
  );
  requireKnown(
    [
      ...Object.keys(shared.dryAir.composition.moleFractions),
      ...shared.k12.pairs.flatMap(({ between }) => between),
      'H2O',
    ],
    species,
    sharedFile,
  );
  return deepFrozen({ species, ...shared });
}
