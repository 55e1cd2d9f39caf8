import Type, { type Static, type TProperties, type TSchema } from 'typebox';

/**
 * The shape of the words and numbers people may edit: demonstrations, rule packs, policy, controls,
 * checklists, questions and cautions. The catalogue reads and checks the files; assessment takes the
 * values as arguments. Every row says where it comes from and how that was checked.
 */

const closed = { additionalProperties: false } as const;
const optional = <S extends TSchema>(schema: S) => Type.Optional(schema);
const words = (description: string, maxLength = 600) =>
  Type.String({ minLength: 1, maxLength, description });
const list = <S extends TSchema>(item: S, maxItems = 60) => Type.Array(item, { maxItems });
const positive = (description: string) => Type.Number({ exclusiveMinimum: 0, description });
const atLeastZero = (description: string) => Type.Number({ minimum: 0, description });
const fraction = (description: string) => Type.Number({ minimum: 0, maximum: 1, description });

/** Lower-case words joined by hyphens. */
const id = Type.String({ pattern: '^[a-z][a-z0-9]*(-[a-z0-9]+)*$', maxLength: 60 });
/** A gas of the gas library, for instance CO2; the loader refuses one it does not know. */
const gas = Type.String({ pattern: '^[A-Za-z0-9]{1,12}$', description: 'gas id' });
const phase = Type.Enum(['before', 'during', 'after']);

export const checkedSchema = Type.Enum([
  'first-hand', // the text itself was read
  'second-hand', // read in a quotation, summary or extract
  'from-memory', // believed right: confirm against the current text
  'common-practice', // what experienced crews do; no source
  'judgement', // a choice of this project, with its reason
  'calculated', // worked out from stated inputs
]);

const provenance = {
  source: Type.String({ minLength: 2, maxLength: 300, description: 'where the row comes from' }),
  checked: checkedSchema,
  note: optional(words('what a careful reader should know', 800)),
};
const sourced = <P extends TProperties>(properties: P) =>
  Type.Object({ ...properties, ...provenance }, closed);

/** Low, typical and high of a figure that differs from show to show. */
export const spreadSchema = Type.Object(
  { low: Type.Number(), typical: Type.Number(), high: Type.Number() },
  closed,
);
export type Spread = Static<typeof spreadSchema>;

// ---------------------------------------------------------------- demonstrations

const composition = Type.Record(Type.String(), fraction('mole fraction'));

/** What holds the gas: a fault empties it, so the planner works out its content at the site. */
const containerProperties = {
  title: words('in words a presenter uses', 120),
  form: Type.Enum(['compressed', 'liquefied', 'dryIce', 'cryogen', 'balloon', 'bag', 'made']),
  waterVolumeM3: optional(positive('water capacity')),
  pressurePa: optional(positive('absolute filling pressure')),
  temperatureK: optional(positive('gas temperature at that pressure')),
  massKg: optional(positive('net content by mass')),
  idleLossPerHour: optional(fraction('share lost per hour with the vented lid on')),
};
const containerSchema = Type.Object(containerProperties, closed);

const releaseProperties = {
  id,
  title: words('what is let out, and how', 160),
  gas: optional(gas),
  composition: optional(composition),
  form: Type.Enum(['gas', 'solid', 'liquid']),
  massKg: optional(spreadSchema),
  volumeM3: optional(spreadSchema),
  durationS: spreadSchema,
  profile: Type.Enum(['steady', 'decaying']),
  timeConstantS: optional(positive('decaying: time in which the rate falls to 37 %')),
  heightM: spreadSchema,
  temperatureK: positive('of the gas as it leaves'),
  manner: Type.Enum(['gentle', 'pour', 'fog', 'spill', 'jet', 'burst']),
  per: Type.Enum(['performance', 'event']),
  burned: optional(Type.Boolean({ description: 'consumed by flame when all goes well' })),
};
export const plannedReleaseSchema = sourced({
  ...releaseProperties,
  optionalPart: optional(Type.Boolean({ description: 'the act works without it' })),
  insteadOf: optional(id),
});
/** One fault each: the rows are alternatives and do not happen together. */
export const worstReleaseSchema = sourced({
  ...releaseProperties,
  cause: words('what goes wrong', 240),
  limitedBy: Type.Enum([
    'container', // everything in the largest open or connected container
    'portion', // the mass brought to the table
    'balloon', // one balloon
    'flowTimesTime', // a fitted limiter, times the time nobody looks
  ]),
  container: optional(containerSchema),
  /** The fault exists only where this planned release is chosen; missing: always. */
  onlyWith: optional(id),
});
export type CataloguePlannedRelease = Static<typeof plannedReleaseSchema>;
export type CatalogueWorstRelease = Static<typeof worstReleaseSchema>;

/** One instrument as set up; pitches are invented examples, to be replaced by a measured one. */
export const catalogueSoundSchema = sourced({
  title: words('what is heard', 160),
  instrument: Type.Enum(['openPipe', 'stoppedPipe', 'fluePipe', 'helmholtz', 'tube', 'voice']),
  frequencyInAirHz: optional(positive('pitch in room air')),
  lengthM: optional(positive('sounding length')),
  radiusM: optional(positive('inner radius')),
  speaker: optional(Type.Enum(['man', 'woman', 'child'])),
  vowel: optional(words('vowel of the recording', 8)),
  gas: optional(gas),
  composition: optional(composition),
  surroundings: Type.Enum(['immersed', 'air']),
  volumeForEffectM3: optional(atLeastZero('gas needed for the effect once')),
});

const nearbySchema = Type.Object(
  {
    who: words('role', 80),
    breathingHeight: id,
    distanceM: atLeastZero('from the source'),
  },
  closed,
);
const demonstrationControlSchema = Type.Object(
  { control: id, text: words('how this act does it', 240) },
  closed,
);
const substituteSchema = Type.Object(
  {
    demonstration: optional(id),
    text: words('what to show instead', 240),
  },
  closed,
);
const actLineSchema = Type.Object(
  { phase, text: words('one line, one tick; slots in braces', 200) },
  closed,
);

export const demonstrationSchema = sourced({
  id,
  title: words('plain title', 80),
  purpose: words('why anyone does it', 300),
  audience: Type.Object(
    { sees: words('what people see', 240), hears: words('what people hear', 240) },
    closed,
  ),
  gases: list(gas, 8),
  noGas: optional(Type.Boolean({ description: 'true: nothing is released at all' })),
  inhaled: optional(
    Type.Boolean({ description: 'true: a person breathes the mixture on purpose' }),
  ),
  needsWrittenAuthority: optional(Type.Boolean({ description: 'true: do not plan without it' })),
  referenceConditions: Type.Object(
    {
      temperatureK: positive('of all volumes below'),
      pressurePa: positive('of all volumes below'),
    },
    closed,
  ),
  releases: Type.Object(
    { planned: list(plannedReleaseSchema, 12), worstCredible: list(worstReleaseSchema, 12) },
    closed,
  ),
  sound: list(catalogueSoundSchema, 8),
  people: Type.Array(nearbySchema, { minItems: 1, maxItems: 12 }),
  controls: Type.Array(demonstrationControlSchema, { minItems: 1, maxItems: 16 }),
  cautions: list(id, 24),
  substitutes: list(substituteSchema, 8),
  setUp: list(words('one step', 240), 16),
  clearDown: list(words('one step', 240), 16),
  checklist: list(actLineSchema, 16),
});
export type Demonstration = Static<typeof demonstrationSchema>;

// ---------------------------------------------------------------- facts and conditions

/**
 * The closed list of facts a rule or caution may ask about. `truth`: yes or no; `list`: ids;
 * `number`: a figure in the unit of the name. A fact the plan does not settle counts as true for
 * `truth`, and as meeting the test for `list` and `number`: the unknown leans towards the duty.
 */
export const factKinds = {
  gasesReleased: 'list', // let out in any planned or worst credible release
  gasesPresent: 'list', // anywhere in the stock or the acts
  demonstrations: 'list', // catalogue ids of the acts
  region: 'list', // country or country-part of the venue, for instance DE, FR, US-CA, CA-ON
  occupied: 'truth', // people are in the space
  publicPresent: 'truth',
  minorsPresent: 'truth',
  minorHelps: 'truth', // someone under 18 works or assists
  floorSeated: 'truth',
  indoors: 'truth',
  belowGround: 'truth', // pit, cellar, trap room or any floor below its surroundings
  confinedPlace: 'truth', // enclosed, not meant to be occupied for long, gas may gather
  workAtHeight: 'truth', // ladders, bridges, galleries, lifting platforms
  vehicle: 'truth', // gas, cryogen or dry ice is carried by road
  airTravel: 'truth',
  lift: 'truth', // gas, cryogen or dry ice rides in a lift
  store: 'truth', // stock is kept at the venue
  flame: 'truth',
  fuelGas: 'truth',
  oxidiser: 'truth', // oxygen above the share of air, nitrous oxide
  cold: 'truth', // dry ice or a cryogen
  dryIce: 'truth',
  cryogen: 'truth',
  pressurised: 'truth', // compressed or liquefied gas under pressure
  pipework: 'truth', // connected parts above 0.5 bar gauge beyond the cylinder
  inhalation: 'truth', // anyone breathes a gas on purpose
  noise: 'truth', // bursts, bangs or loud playback
  latex: 'truth',
  employer: 'truth', // the presenter or the venue employs someone
  severalEmployers: 'truth', // a guest show: presenter and venue both employ
  mechanicalVentilation: 'truth',
  recirculation: 'truth',
  largeReleaseCredible: 'truth', // a whole cylinder, vessel or box could be lost
  exposureNearLimit: 'truth', // a computed value passes half of a limit
  residualRisk: 'truth', // the word is anything but Go
  employeeCount: 'number',
  altitudeM: 'number',
  carbonDioxideKg: 'number', // in all containers at the venue
  pressureGaugePa: 'number', // highest beyond a cylinder
  fuelGasKg: 'number',
  lowestOxygenFraction: 'number', // lowest computed at any declared height, dry basis
} as const;
export type Fact = keyof typeof factKinds;
export type FactKind = (typeof factKinds)[Fact];
export const facts = Object.keys(factKinds) as readonly Fact[];

/**
 * A test on one fact (`fact` with `is`, `anyOf`, `above`, `atLeast` or `below`), or `all`, `any`,
 * `not` of further tests, two groups deep at most; `always: true` applies without a test.
 */
export interface Condition {
  always?: true;
  all?: Condition[];
  any?: Condition[];
  not?: Condition;
  fact?: Fact;
  is?: boolean;
  anyOf?: string[];
  above?: number;
  atLeast?: number;
  below?: number;
}
const test = {
  always: optional(Type.Literal(true)),
  fact: optional(Type.Enum([...facts])),
  is: optional(Type.Boolean()),
  anyOf: optional(Type.Array(Type.String({ minLength: 1, maxLength: 60 }), { minItems: 1 })),
  above: optional(Type.Number()),
  atLeast: optional(Type.Number()),
  below: optional(Type.Number()),
};
const groupOf = (member: TSchema) =>
  Type.Object(
    {
      ...test,
      all: optional(Type.Array(member, { minItems: 1 })),
      any: optional(Type.Array(member, { minItems: 1 })),
      not: optional(member),
    },
    closed,
  );
export const conditionSchema = Type.Unsafe<Condition>(groupOf(groupOf(Type.Object(test, closed))));

// ---------------------------------------------------------------- rule packs

/**
 * What a limit row may do: `judge` tightens the levels of the policy where it is stricter; `show` is
 * printed beside the result; `workersOnly` is printed for the crew and is never an audience limit;
 * `note` explains. A row that fresh air or any gas plan at all would fail cannot judge.
 */
export const roleSchema = Type.Enum(['judge', 'show', 'workersOnly', 'note']);

const instrument = {
  instrument: words('instrument, with section', 300),
  edition: words('edition, date or version; "not stated" when unknown', 200),
};
const roleAndReason = {
  role: roleSchema,
  reason: words('why this role', 300),
  /** Parts of the jurisdiction where the row holds; missing: everywhere in the pack. */
  regions: optional(
    Type.Array(Type.String({ pattern: '^[A-Z]{2}(-[A-Z]{2,3})?$' }), { minItems: 1 }),
  ),
};

export const exposureLimitSchema = sourced({
  id,
  gas,
  period: Type.Enum(['eightHour', 'fifteenMinute', 'ceiling', 'immediateDanger']),
  value: positive('volume fraction in the unit below'),
  unit: Type.Enum(['ppm']),
  ...roleAndReason,
  ...instrument,
});
export type ExposureLimit = Static<typeof exposureLimitSchema>;

export const oxygenThresholdSchema = sourced({
  id,
  sense: Type.Enum(['below', 'above']),
  value: positive('in the unit below'),
  unit: Type.Enum(['percent', 'kPa', 'mmHg']),
  /** The level of the policy a judging row tightens. */
  level: Type.Enum(['limit', 'never']),
  meaning: words('what passing it means', 400),
  altitudeFromM: optional(Type.Number()),
  altitudeToM: optional(Type.Number()),
  ...roleAndReason,
  ...instrument,
});
export type OxygenThreshold = Static<typeof oxygenThresholdSchema>;

export const flammableThresholdSchema = sourced({
  id,
  value: positive('in the unit below'),
  unit: Type.Enum(['percentOfLfl']),
  level: Type.Enum(['limit', 'never']),
  meaning: words('what passing it means', 400),
  ...roleAndReason,
  ...instrument,
});
export type FlammableThreshold = Static<typeof flammableThresholdSchema>;

export const alarmSchema = sourced({
  id,
  gas,
  value: positive('in the unit below'),
  unit: Type.Enum(['ppm']),
  meaning: words('what the alarm asks for', 400),
  ...roleAndReason,
  ...instrument,
});

export const ruleSchema = sourced({
  id,
  category: Type.Enum([
    'generalDuty',
    'riskAssessment',
    'ventilation',
    'monitoring',
    'confinedSpace',
    'fireAndExplosion',
    'pressureSystems',
    'cylinders',
    'cryogens',
    'protectiveEquipment',
    'transport',
    'environment',
    'substanceControl',
    'signs',
    'emergency',
    'records',
    'publicAndChildren',
  ]),
  title: words('short title', 120),
  ...instrument,
  when: conditionSchema,
  appliesWhen: words('the same in prose', 300),
  duty: words('what has to be done, in our own words', 600),
  /** Letting the gas out is not lawful, or not allowed, without written authority. */
  needsAuthority: optional(Type.Boolean()),
  /** The authority covers only what cannot be recovered; the rest has to be. */
  needsRecovery: optional(Type.Boolean()),
});

export const warmingPotentialSchema = sourced({
  gas,
  kgCo2ePerKg: atLeastZero('global warming potential over 100 years'),
  ...instrument,
});

export const carriageLimitSchema = sourced({
  id,
  title: words('short title', 120),
  kind: Type.Enum(['points', 'grossMass', 'passengerDryIce', 'containerCount']),
  maxPoints: optional(positive('points on one vehicle')),
  maxTotalKg: optional(positive('gross mass on one vehicle, or net mass per passenger')),
  maxEachKg: optional(positive('gross mass of one container')),
  maxCount: optional(positive('containers')),
  text: words('what remains to be done below the limit', 500),
  ...instrument,
});

export const packNoteSchema = sourced({
  id,
  gases: optional(list(gas, 20)),
  regions: optional(Type.Array(Type.String({ pattern: '^[A-Z]{2}(-[A-Z]{2,3})?$' }))),
  text: words('what the reader should know', 600),
});

export const rulePackSchema = Type.Object(
  {
    id,
    title: words('jurisdiction, short', 80),
    jurisdiction: words('jurisdiction, in full', 300),
    edition: words('edition of this pack', 40),
    language: words('language of notices', 120),
    caution: words('printed with every citation', 600),
    fullyRead: Type.Boolean({ description: 'true only when every row is first-hand' }),
    exposureLimits: list(exposureLimitSchema, 60),
    oxygenThresholds: list(oxygenThresholdSchema, 40),
    flammableThresholds: list(flammableThresholdSchema, 20),
    alarms: list(alarmSchema, 20),
    warmingPotentials: list(warmingPotentialSchema, 20),
    carriageLimits: list(carriageLimitSchema, 20),
    rules: Type.Array(ruleSchema, { minItems: 1, maxItems: 120 }),
    notes: list(packNoteSchema, 40),
  },
  closed,
);
export type RulePack = Static<typeof rulePackSchema>;

/** What all packs share: signs, road carriage of class 2, oxygen pressures worth naming. */
export const commonRulesSchema = Type.Object(
  {
    signs: list(
      sourced({
        id,
        code: words('standard and symbol', 60),
        meaning: words('what the symbol says', 120),
        use: words('where it goes', 160),
        when: conditionSchema,
      }),
    ),
    carriagePoints: sourced({
      ...instrument,
      maxPoints: positive('per vehicle'),
      multipliers: Type.Array(
        Type.Object(
          {
            transportCategory: Type.Integer({ minimum: 0, maximum: 4 }),
            multiplier: Type.Union([Type.Number(), Type.Null()]),
            maxPerVehicle: Type.Union([Type.Number(), Type.Null()]),
          },
          closed,
        ),
      ),
      quantityMeaning: words('what is counted', 400),
    }),
    unNumbers: list(
      sourced({
        gas: optional(gas),
        name: words('as carried', 80),
        state: Type.Enum(['compressed', 'liquefied', 'refrigerated', 'solid', 'mixture']),
        un: Type.Integer({ minimum: 1000, maximum: 3999 }),
        classificationCode: words('class 2 code, or why there is none', 120),
        transportCategory: Type.Union([Type.Integer({ minimum: 0, maximum: 4 }), Type.Null()]),
      }),
    ),
    oxygenPressures: list(
      sourced({ pressurePa: positive('partial pressure of oxygen'), meaning: words('what it is') }),
    ),
    flammableLimits: list(
      sourced({
        gas,
        lowerFraction: fraction('lower flammable limit, the lowest published'),
        upperFraction: fraction('upper flammable limit, the highest published'),
      }),
    ),
  },
  closed,
);
export type CommonRules = Static<typeof commonRulesSchema>;

// ---------------------------------------------------------------- policy

/** One of the three values of a level. `statistic` says what of the series is compared. */
const levelValueSchema = sourced({
  /** The value itself, or how many times the 8-hour limit of the pack. */
  value: optional(atLeastZero('fraction; flammable: share of the lower limit')),
  ofPack: optional(Type.Enum(['eightHour', 'fifteenMinute'])),
  timesEightHour: optional(positive('multiple of the 8-hour limit of the pack')),
  /** Used when the pack is silent. */
  whenMissing: optional(atLeastZero('fraction')),
  whenMissingTimesEightHour: optional(positive('multiple of the 8-hour limit of the pack')),
  stricterOfPack: Type.Boolean({
    description: 'a judging row of the pack replaces it when stricter',
  }),
  statistic: Type.Enum(['minimum', 'peak', 'mean1Min', 'mean15Min', 'meanShow']),
  reason: words('why this value', 400),
});
export const levelSchema = Type.Object(
  {
    quantity: Type.Enum([
      'oxygenFraction',
      'carbonDioxideFraction',
      'limitedGasFraction',
      'flammableShareOfLowerLimit',
      'oxygenEnrichmentFraction',
    ]),
    title: words('as printed', 80),
    /** The side on which it fails. */
    failsWhen: Type.Enum(['below', 'above']),
    basis: Type.Enum(['dry', 'total', 'shareOfLowerLimit']),
    aim: levelValueSchema,
    limit: levelValueSchema,
    never: levelValueSchema,
  },
  closed,
);
export type PolicyLevel = Static<typeof levelSchema>;
export type PolicyLevelValue = Static<typeof levelValueSchema>;

const defaultNames = [
  'deliveredShareOfDesign', // credited part of a design flow nobody has measured
  'designFlowMedianShare',
  'designFlowSpread', // geometric standard deviation
  'infiltrationSpread',
  'outdoorShareRecirculating',
  'furnitureShare', // of the gross volume, when no net volume was measured
  'ventilationEffectiveness',
  'dischargeRemoval',
  'dischargeSpread',
  'doorTemperatureDifferenceK',
  'coverLeakShare',
  'carbonDioxideOutdoorFraction',
  'metabolicRateSeatedMet',
  'metabolicRateExcitedMet',
  'respiratoryQuotient',
  'personVolumeAdultM3',
  'personVolumeChildM3',
  'siteTemperatureK',
  'relativeHumidity',
  'cylinderFillTemperatureK',
  'dryIceGasM3PerKg',
  'dryIceIdleLossPerHour',
  'dryIceFaultDurationS',
  'nitrogenGasM3PerLitre',
  'nitrogenLiquidKgPerM3',
  'cryogenIdleLossPerDay',
  'transferLossCold',
  'transferLossWarm',
  'balloonM3',
  'balloonOverfilledM3',
  'latexFloatS',
  'escapeTimeFactor', // time to Never against practised escape time
  'breathableOxygenLowFraction',
  'breathableOxygenHighFraction',
  'ventilationLeadVolumeChanges',
  'holdOxygenFraction',
  'holdCarbonDioxideFraction',
] as const;
/** Every default must stand in the policy once. */
export const policyDefaultNames: readonly string[] = defaultNames;
export type PolicyDefaultName = (typeof defaultNames)[number];

export const policySchema = Type.Object(
  {
    id,
    title: words('as printed', 120),
    edition: words('edition of the policy', 40),
    levels: Type.Array(levelSchema, { minItems: 5, maxItems: 5 }),
    defaults: Type.Array(
      sourced({
        name: Type.Enum([...defaultNames]),
        value: Type.Number(),
        low: optional(Type.Number()),
        high: optional(Type.Number()),
        unit: words('SI unit, or 1', 20),
        title: words('as printed', 160),
      }),
    ),
    roomTypes: Type.Array(
      sourced({
        id,
        title: words('as printed', 80),
        lengthM: optional(spreadSchema),
        widthM: optional(spreadSchema),
        heightM: optional(spreadSchema),
        volumeM3: spreadSchema,
        /** Air changes per hour with fans off: the planning value and its plausible range. */
        infiltrationPerHour: spreadSchema,
        occupiable: Type.Boolean(),
        people: words('remark for the person who fills in the room', 300),
      }),
    ),
    breathingHeights: Type.Array(
      sourced({
        id,
        title: words('who', 120),
        heightM: Type.Union([spreadSchema, Type.Null()]),
        declared: Type.Boolean({ description: 'an ordinary height; false: always computed' }),
        judgedAgainst: Type.Enum(['all', 'neverOnly', 'none']),
      }),
    ),
    carbonDioxidePerPerson: Type.Array(
      sourced({
        id,
        title: words('who', 120),
        m3PerS: spreadSchema,
        ageGroup: Type.Enum(['toddler', 'child', 'teenager', 'adult']),
        activity: Type.Enum(['seated', 'excited', 'working']),
      }),
    ),
    outdoorAirPerPerson: Type.Array(
      sourced({
        id,
        title: words('kind of room', 120),
        m3PerS: positive('design outdoor air per person'),
        peoplePer100M2: optional(positive('usual density')),
      }),
    ),
    freshAir: Type.Array(sourced({ gas, fraction: fraction('mole fraction in dry outdoor air') })),
    altitude: Type.Array(
      sourced({
        fromM: atLeastZero('from this altitude'),
        word: Type.Enum(['caution', 'refer']),
        text: words('as printed', 400),
      }),
    ),
    sound: Type.Array(
      sourced({
        id: Type.Enum([
          'pitchAudible',
          'pitchClear',
          'pitchLarge',
          'formantAudible',
          'formantClear',
        ]),
        value: positive('cents, or relative change'),
        unit: Type.Enum(['cents', '1']),
        text: words('as printed', 200),
      }),
    ),
    noise: Type.Array(
      sourced({
        id,
        peakDb: optional(positive('peak level')),
        meanDb: optional(positive('A-weighted level')),
        text: words('as printed', 300),
      }),
    ),
    meters: Type.Array(
      sourced({
        id,
        gas,
        warn: optional(positive('fraction')),
        leave: optional(positive('fraction')),
        acceptedCells: list(words('cell type of the plan file', 30), 8),
        refusedCells: list(words('cell type of the plan file', 30), 8),
        /** What a usual meter may be wrong by, as fractions of gas, where its sheet is not at hand. */
        accuracy: optional(positive('fraction')),
        drift: optional(positive('fraction')),
        crossEffect: optional(positive('fraction')),
        responseTimeS: optional(positive('time to 90 % of a step')),
        /** The row holds when this is true; every row that holds must accept the cell. */
        when: conditionSchema,
        text: words('as printed', 400),
      }),
    ),
    costBands: Type.Array(
      sourced({
        gas,
        form: Type.Enum(['gas', 'solid', 'liquid']),
        unit: Type.Enum(['perM3', 'perKg', 'perLitre']),
        low: positive('EUR or USD'),
        high: positive('EUR or USD'),
      }),
    ),
    /** Gases that are not planned without written authority, whatever the pack says. */
    authorities: Type.Array(
      sourced({
        gas,
        needsRecovery: Type.Boolean(),
        reason: words('one line', 240),
        alternative: words('what to do instead', 240),
      }),
    ),
    /** Usual containers, to pick from; their content is worked out, not listed. */
    containers: Type.Array(sourced({ id, gases: list(gas, 12), ...containerProperties })),
    /** The published oxygen-deficiency-hazard rate method: a second view for reviewers. */
    deficiencyMethod: Type.Object(
      {
        classes: Type.Array(
          sourced({
            class: Type.Integer({ minimum: 0, maximum: 4 }),
            belowPerHour: Type.Union([positive('upper end of the class'), Type.Null()]),
            acceptable: Type.Boolean(),
          }),
        ),
        certainPressurePa: positive('oxygen pressure at and below which the factor is 1'),
        noEffectPressurePa: positive('oxygen pressure above which the factor is 0'),
        rates: Type.Array(
          sourced({
            id,
            title: words('what fails', 120),
            value: positive('in the unit below'),
            unit: Type.Enum(['perHour', 'perDemand', 'perAction']),
          }),
        ),
      },
      closed,
    ),
    refusals: Type.Array(
      sourced({
        id,
        when: words('what the plan says', 240),
        reason: words('one line', 240),
        alternative: words('what to do instead', 240),
      }),
    ),
  },
  closed,
);
export type Policy = Static<typeof policySchema>;

// ---------------------------------------------------------------- controls

export const controlLevels = [
  'eliminate',
  'substitute',
  'engineer',
  'organise',
  'protect',
] as const;

/** What the models do with a control; `condition` is recorded and earns nothing in the numbers. */
export const controlEffectSchema = Type.Enum([
  'condition',
  'sourceRemoved', // the release of that act is zero
  'gasSwapped', // another gas or form takes its place
  'releaseScaled', // the planned release shrinks
  'inventoryCapped', // worst credible = the cap, not the stock on site
  'containerSmaller', // worst credible = content of the smaller container
  'openingOpened', // a doorway or shutter is held open
  'allOutdoorAir', // the air system runs on outdoor air, lead time before the act
  'recirculationOff',
  'lowExtract',
  'highVent',
  'mixingFan', // layer becomes room average; removes nothing
  'sourceCaptured', // a share never enters the room
  'containerOutside', // worst credible = line content and limiter flow until shut
  'flowCapped',
  'autoShutOff',
  'openingCovered', // pit, trap or stair closed but for a leak
  'zoneExtract', // its own removal in pit or under-stage
  'gasRecovered',
  'spreadBlocked', // path cut up to a height
  'idleLossOnly', // vented box: a small steady source instead of a burst
  'peopleMoved', // distance, clear height, nobody above or below
  'seatsRaised', // another breathing height
  'headcountCapped',
  'holdTime', // repeats limited, wait between houses
  'releaseSplit', // the same amount in parts
  'zoneEmptied', // nobody in that zone until a reading passes
  'vehicleAired',
  'liftUnmanned',
  'storeVentilated',
  'leakCutShort', // valve shut and line bled between uses
  'evacuation', // people leave at a reading; compared with the escape time
  'fixedMonitor',
  'personalMonitor',
  'readingGate', // no entry or start before a reading
  'noiseLowered',
  'doorsBetweenShows',
  'fansOn', // the air systems of a space run all day
  'stockMoved', // containers kept outdoors
]);

export const controlsFileSchema = Type.Object(
  {
    controls: Type.Array(
      sourced({
        id,
        title: words('plain title', 120),
        level: Type.Enum([...controlLevels]),
        effect: controlEffectSchema,
        /** Whether the numbers may change at all; a condition never has credit. */
        credit: Type.Boolean(),
        creditOnlyIf: optional(words('what must be shown before it counts', 300)),
        /** Why a control without credit earns none. */
        noCreditBecause: optional(words('why no number changes', 300)),
        /** What it asks of a house and its crew, 1 little to 5 much: the order in which sets are sought. */
        burden: Type.Integer({ minimum: 1, maximum: 5 }),
        steps: Type.Array(words('one step; slots in braces', 240), { minItems: 1, maxItems: 6 }),
        line: words('the line that the crew ticks; slots in braces', 240),
        text: words('what it does to the air or the people', 400),
        parameters: list(
          Type.Object(
            {
              key: Type.String({ pattern: '^[a-z][A-Za-z0-9]*$', maxLength: 40 }),
              unit: words('SI unit, or 1', 20),
              ask: words('question to the planner', 160),
              default: optional(Type.Number()),
              low: optional(Type.Number()),
              high: optional(Type.Number()),
            },
            closed,
          ),
          8,
        ),
        suits: optional(Type.Enum(['dense', 'light', 'any'])),
        checklist: list(id, 8),
      }),
      { minItems: 1, maxItems: 80 },
    ),
  },
  closed,
);
export type Control = Static<typeof controlsFileSchema>['controls'][number];

// ---------------------------------------------------------------- checklists, questions, cautions

export const checklistPhases = [
  'weekBefore',
  'loadIn',
  'preShow',
  'during',
  'between',
  'clearDown',
  'emergency',
] as const;

export const checklistsFileSchema = Type.Object(
  {
    slots: Type.Array(
      sourced({
        id: Type.String({ pattern: '^[a-z][A-Za-z0-9]*$', maxLength: 40 }),
        kind: Type.Enum(['number', 'text', 'date', 'clock']),
        unit: words('unit as printed, or text', 30),
        meaning: words('what goes here', 160),
        filledBy: Type.Enum(['planner', 'calculation', 'levels', 'reading']),
      }),
    ),
    lines: Type.Array(
      sourced({
        id,
        phase: Type.Enum([...checklistPhases]),
        text: words('one line, one tick, one initial', 240),
        when: conditionSchema,
        who: words('role', 60),
      }),
    ),
  },
  closed,
);
export type Checklists = Static<typeof checklistsFileSchema>;

export const questionsFileSchema = Type.Object(
  {
    questions: Type.Array(
      sourced({
        id,
        question: words('as a reviewer would ask', 240),
        evidence: Type.Enum([
          'roomDimensions',
          'lowAndHighPoints',
          'stockList',
          'plannedTotals',
          'worstCredible',
          'volumeUsed',
          'airFlowOrigin',
          'extractLevel',
          'fansOff',
          'breathingHeights',
          'separateGases',
          'repeats',
          'limitsUsed',
          'sensitivity',
          'alternatives',
          'transportLiftStore',
          'competence',
          'stopReading',
          'stopWordAndEscape',
          'otherHazards',
          'detectorsAndNeighbours',
          'siteConditions',
          'lawfulness',
          'voidIf',
          'lastTime',
          'handCheck',
        ]),
        answeredBy: words('what counts as an answer', 240),
      }),
    ),
  },
  closed,
);
export type ReviewQuestion = Static<typeof questionsFileSchema>['questions'][number];

export const cautionsFileSchema = Type.Object(
  {
    cautions: Type.Array(
      sourced({
        id,
        group: Type.Enum(['standard', 'emergency', 'gas', 'form', 'hazard', 'meter']),
        text: words('as printed', 400),
        /** When it is printed; standard cautions always. */
        when: conditionSchema,
      }),
      { minItems: 1, maxItems: 120 },
    ),
  },
  closed,
);
export type Caution = Static<typeof cautionsFileSchema>['cautions'][number];

/** Everything of templates/ but the gases, checked, cross-checked and frozen. */
export interface Catalogue {
  readonly demonstrations: readonly Demonstration[];
  readonly rulePacks: readonly RulePack[];
  readonly commonRules: CommonRules;
  readonly policy: Policy;
  readonly controls: readonly Control[];
  readonly checklists: Checklists;
  readonly questions: readonly ReviewQuestion[];
  readonly cautions: readonly Caution[];
}
