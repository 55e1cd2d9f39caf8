import Type, { type Static, type TSchema } from 'typebox';

/**
 * The plan file: everything a person states about an event, its venue, what is released and who
 * breathes where. One JSON Schema for the command line, the HTTP door, import and export.
 * SI units throughout; the unit stands in the key.
 */

const id = Type.String({ pattern: '^[A-Za-z][A-Za-z0-9_-]{0,39}$', description: 'short id' });
const words = (maxLength: number, description: string) => Type.String({ maxLength, description });
const title = Type.String({ minLength: 1, maxLength: 160 });
const clock = Type.String({
  pattern: '^([01][0-9]|2[0-3]):[0-5][0-9]$',
  description: 'time of day, hh:mm',
});
const date = Type.String({ format: 'date', description: 'yyyy-mm-dd' });

export const originSchema = Type.Enum(['measured', 'drawing', 'supplied', 'assumed', 'unknown']);

const figureObjectSchema = Type.Object(
  {
    value: Type.Optional(Type.Number()),
    low: Type.Optional(Type.Number()),
    high: Type.Optional(Type.Number()),
    unit: Type.Optional(words(20, 'for the reader only; the number is in the SI unit of the key')),
    origin: Type.Optional(originSchema),
    on: Type.Optional(date),
    by: Type.Optional(words(120, 'role or company, not a private name')),
    note: Type.Optional(words(400, 'where the figure comes from')),
  },
  { additionalProperties: false },
);

/** A physical figure: a number, or a value with range and provenance; `unknown` has no value. */
export const physicalFigureSchema = Type.Union([Type.Number(), figureObjectSchema], {
  description: 'number, or {value, low?, high?, origin: measured|drawing|supplied|assumed|unknown}',
});
export type PhysicalFigure = Static<typeof physicalFigureSchema>;
export type Origin = Static<typeof originSchema>;

const figure = (description: string) =>
  Type.Union([Type.Number(), figureObjectSchema], { description });
const optional = <S extends TSchema>(schema: S) => Type.Optional(schema);
const closed = { additionalProperties: false } as const;
const fractions = Type.Record(Type.String(), Type.Number({ minimum: 0, maximum: 1 }));

const secondsOfDay = Type.Number({ minimum: 0, maximum: 172_800 });
/** Anything timed: seconds after midnight of the event day; missing means all day. */
const timed = { fromS: optional(secondsOfDay), toS: optional(secondsOfDay) };

export const spaceSchema = Type.Object(
  {
    id,
    title: optional(title),
    kind: optional(words(40, 'room type of the policy, for defaults')),
    floorAreaM2: figure('plan area of the floor'),
    heightM: figure('ceiling above the lowest floor'),
    floorLevelM: optional(figure('lowest floor above the datum of the venue; default 0')),
    floorRiseM: optional(figure('raked floor: rise to its highest point')),
    steps: optional(
      Type.Array(Type.Object({ areaM2: Type.Number(), levelM: Type.Number() }, closed), {
        maxItems: 30,
      }),
    ),
    volumeM3: optional(figure('measured free volume, furniture and seats out')),
    pockets: optional(
      Type.Array(
        Type.Object(
          { id, areaM2: Type.Number(), depthM: Type.Number(), at: Type.Enum(['high', 'low']) },
          closed,
        ),
        { maxItems: 20 },
      ),
    ),
    temperatureK: optional(figure('air temperature')),
    initial: optional(fractions),
    occupied: optional(Type.Boolean({ description: 'false: nobody may be inside; default true' })),
    planXM: optional(Type.Number({ description: 'left edge in the section drawing' })),
    planWidthM: optional(Type.Number({ description: 'width in the section drawing' })),
  },
  closed,
);
export type PlanSpace = Static<typeof spaceSchema>;

export const openingSchema = Type.Object(
  {
    id: optional(id),
    title: optional(title),
    from: id,
    to: id,
    kind: Type.Enum(['doorway', 'vent', 'floorOpening']),
    widthM: figure('clear width'),
    heightM: figure('clear height; floor opening: length'),
    sillLevelM: optional(figure('sill above the datum of the venue; default: the higher floor')),
    openFraction: optional(figure('0 shut to 1 fully open; default 1')),
    dischargeCoefficient: optional(figure('default by use, from the policy')),
    ...timed,
  },
  closed,
);
export type PlanOpening = Static<typeof openingSchema>;

const level = Type.Enum(['high', 'low', 'mixed']);
export const airSystemSchema = Type.Object(
  {
    id: optional(id),
    title: optional(title),
    space: optional(id),
    serves: optional(
      Type.Array(
        Type.Object({ space: id, share: Type.Number({ minimum: 0, maximum: 1 }) }, closed),
        {
          maxItems: 40,
        },
      ),
    ),
    freshAirM3PerS: optional(figure('outdoor air delivered')),
    drive: Type.Enum(['supply', 'extract', 'balanced']),
    supplyM3PerS: optional(figure('balanced: outdoor air blown in')),
    extractM3PerS: optional(figure('balanced: air taken out')),
    recirculatedM3PerS: optional(figure('air returned to the spaces; clears nothing')),
    supplyLevel: optional(level),
    extractLevel: optional(level),
    extractTopM: optional(figure('top of a low grille above the floor')),
    effectiveness: optional(figure('ventilation effectiveness; default 1, never above 1')),
    ...timed,
  },
  closed,
);
export type PlanAirSystem = Static<typeof airSystemSchema>;

export const infiltrationSchema = Type.Object(
  { space: id, airChangesPerHour: figure('air changes with fans off') },
  closed,
);
export const transferSchema = Type.Object(
  { from: id, to: id, flowM3PerS: figure('steady flow from one space to the other') },
  closed,
);

export const siteSchema = Type.Object(
  {
    altitudeM: optional(figure('altitude above sea level')),
    pressurePa: optional(figure('absolute air pressure; default from the altitude')),
    temperatureK: optional(figure('indoor air temperature; default 293.15')),
    relativeHumidity: optional(figure('0 to 1; default 0.5')),
    carbonDioxideFraction: optional(figure('outdoor air; default 420e-6')),
    rulePack: optional(id),
    region: optional(
      Type.String({
        pattern: '^[A-Z]{2}(-[A-Z]{2,3})?$',
        description: 'ISO 3166, such as DE or US-CA',
      }),
    ),
    houseRules: optional(
      Type.Array(
        Type.Object(
          {
            title,
            quantity: Type.String({ maxLength: 20 }),
            limit: Type.Number(),
            reason: optional(words(400, 'why the house asks for it')),
          },
          closed,
        ),
        { maxItems: 40 },
      ),
    ),
  },
  closed,
);

export const venueSchema = Type.Object(
  {
    id: optional(id),
    title,
    site: siteSchema,
    spaces: Type.Array(spaceSchema, { minItems: 1, maxItems: 60 }),
    openings: optional(Type.Array(openingSchema, { maxItems: 200 })),
    airSystems: optional(Type.Array(airSystemSchema, { maxItems: 60 })),
    infiltration: optional(Type.Array(infiltrationSchema, { maxItems: 60 })),
    transfers: optional(Type.Array(transferSchema, { maxItems: 60 })),
  },
  closed,
);
export type PlanVenue = Static<typeof venueSchema>;

export const releaseSchema = Type.Object(
  {
    title: optional(title),
    space: optional(id),
    gas: optional(Type.String({ maxLength: 20 })),
    composition: optional(fractions),
    amountMol: optional(figure('amount of substance')),
    massKg: optional(figure('mass')),
    volumeM3: optional(figure('volume at site pressure and temperature')),
    startS: optional(Type.Number({ minimum: 0, description: 'after the start of the act' })),
    durationS: optional(Type.Number({ minimum: 0, description: '0: at once' })),
    profile: optional(Type.Enum(['steady', 'decaying'])),
    timeConstantS: optional(Type.Number({ exclusiveMinimum: 0 })),
    heightM: optional(Type.Number({ minimum: 0 })),
    temperatureK: optional(Type.Number({ minimum: 60, maximum: 1500 })),
    manner: optional(Type.Enum(['gentle', 'pour', 'fog', 'spill', 'jet', 'burst'])),
    episode: optional(id),
    stock: optional(id),
    burned: optional(Type.Boolean({ description: 'true: consumed by flame when all goes well' })),
  },
  closed,
);
export type PlanRelease = Static<typeof releaseSchema>;

export const actSoundSchema = Type.Object(
  {
    instrument: Type.Enum([
      'openPipe',
      'stoppedPipe',
      'fluePipe',
      'helmholtz',
      'tube',
      'voice',
      'coupledReed', // clarinet, oboe, brass
      'freeReed', // accordion, harmonica, organ reed
      'edgeTone', // edge-tone or pea whistle
      'lipWhistle',
      'solidSource', // string, bell, fork, loudspeaker
    ]),
    frequencyInAirHz: optional(figure('pitch in room air')),
    lengthM: optional(figure('sounding length')),
    radiusM: optional(figure('inner radius')),
    isClosedAtOneEnd: optional(Type.Boolean({ description: 'tube: one end closed' })),
    mouthWidthM: optional(figure('width of the mouth of a flue pipe')),
    cutUpM: optional(figure('height of the mouth of a flue pipe')),
    flueThicknessM: optional(figure('thickness of the flue')),
    blowingPressurePa: optional(figure('blowing pressure in air, above the room')),
    volumeM3: optional(figure('volume of a bottle')),
    neckLengthM: optional(figure('length of its neck')),
    neckRadiusM: optional(figure('inner radius of its neck')),
    speaker: optional(Type.Enum(['man', 'woman', 'child'])),
    vowel: optional(Type.Enum(['i', 'ae', 'a', 'u'], { description: 'heed, had, hod, who’d' })),
    gas: optional(Type.String({ maxLength: 20 })),
    composition: optional(fractions),
    gasFraction: optional(figure('share of the gas inside the instrument; the rest is room air')),
    surroundings: optional(Type.Enum(['immersed', 'air'])),
    bagVolumeM3: optional(figure('volume to fill for the effect')),
  },
  closed,
);
export type PlanSound = Static<typeof actSoundSchema>;

const inhalationSchema = Type.Object(
  {
    by: Type.Enum(['public', 'minor', 'volunteer', 'presenter']),
    from: Type.Enum(['pressurised', 'balloon', 'bag', 'limpBag', 'mask', 'hood']),
    gas: optional(Type.String({ maxLength: 20 })),
    composition: optional(fractions),
    certified: optional(Type.Boolean()),
    analysedOxygenFraction: optional(figure('oxygen analysed at the point of use')),
    trainedNamedAdult: optional(Type.Boolean()),
  },
  closed,
);

export const actSchema = Type.Object(
  {
    id,
    title,
    catalogueId: optional(Type.String({ maxLength: 60 })),
    space: id,
    minute: optional(
      Type.Number({ minimum: 0, maximum: 1440, description: 'of each performance' }),
    ),
    startsAt: optional(clock),
    durationMin: optional(Type.Number({ minimum: 0, maximum: 1440 })),
    releases: Type.Object(
      {
        planned: Type.Array(releaseSchema, { maxItems: 40 }),
        worstCredible: Type.Array(releaseSchema, { maxItems: 40 }),
      },
      closed,
    ),
    sound: optional(Type.Array(actSoundSchema, { maxItems: 12 })),
    inhaled: optional(Type.Array(inhalationSchema, { maxItems: 10 })),
    recovery: optional(Type.Boolean({ description: 'the gas is recovered after the act' })),
    writtenAuthority: optional(Type.Boolean({ description: 'authority in writing is attached' })),
    note: optional(words(1000, 'anything the crew must know')),
  },
  closed,
);
export type PlanAct = Static<typeof actSchema>;

export const audienceSchema = Type.Object(
  {
    id,
    title,
    count: figure('people'),
    ageGroup: Type.Enum(['toddler', 'child', 'teenager', 'adult']),
    kind: Type.Enum(['public', 'crew']),
    zone: Type.Object(
      {
        space: id,
        heightM: Type.Number({ minimum: 0, maximum: 60, description: 'mouth above their floor' }),
        floorLevelM: optional(
          Type.Number({ description: 'their floor above the datum; default: lowest of the space' }),
        ),
      },
      closed,
    ),
    metabolicRateMet: optional(figure('activity; default from the policy')),
    employees: optional(Type.Boolean()),
  },
  closed,
);
export type PlanAudience = Static<typeof audienceSchema>;

export const stockSchema = Type.Object(
  {
    id,
    title,
    gas: optional(Type.String({ maxLength: 20 })),
    composition: optional(fractions),
    form: Type.Enum(['compressed', 'liquefied', 'dryIce', 'cryogen', 'balloon', 'bag', 'made']),
    count: optional(Type.Integer({ minimum: 1, maximum: 500 })),
    waterVolumeM3: optional(figure('water capacity of one container')),
    pressurePa: optional(figure('absolute filling pressure')),
    temperatureK: optional(figure('gas temperature at that pressure; default 288.15')),
    massKg: optional(figure('mass of content of one container')),
    amountMol: optional(figure('amount in one container')),
    idleLossPerHour: optional(figure('share of the content lost per hour with the lid on')),
    place: Type.String({ maxLength: 40, description: 'space id, outside, lift or vehicle' }),
    open: optional(Type.Boolean({ description: 'open or connected there; default true' })),
    ...timed,
  },
  closed,
);
export type PlanStock = Static<typeof stockSchema>;

export const meterSchema = Type.Object(
  {
    id,
    title: optional(title),
    gas: Type.String({ maxLength: 20 }),
    cellType: optional(
      Type.Enum([
        'capillary',
        'partialPressure',
        'paramagnetic',
        'optical',
        'zirconia',
        'infrared',
        'catalytic',
        'unknown',
      ]),
    ),
    space: optional(id),
    heightM: optional(Type.Number({ minimum: 0, maximum: 60 })),
    responseTimeS: optional(figure('time to 90 % of the reading')),
    accuracyFraction: optional(figure('accuracy, as a fraction of gas')),
    driftFraction: optional(figure('drift since calibration, as a fraction of gas')),
    crossEffectFraction: optional(figure('effect of the other gases, as a fraction of gas')),
    rangeFraction: optional(figure('highest fraction of gas that it can show')),
    calibratedOn: optional(date),
    altitudeCompensated: optional(Type.Boolean()),
  },
  closed,
);

export const chosenControlSchema = Type.Object(
  {
    control: Type.String({ maxLength: 60 }),
    act: optional(id),
    space: optional(id),
    group: optional(id),
    gas: optional(Type.String({ maxLength: 20, description: 'the gas that takes the place' })),
    value: optional(Type.Number({ description: 'the first parameter of the control' })),
    values: optional(
      Type.Record(Type.String({ pattern: '^[a-z][A-Za-z0-9]*$' }), Type.Number(), {
        description: 'parameters of the control by key',
      }),
    ),
    note: optional(words(400, 'how it is done here')),
  },
  closed,
);
export type ChosenControl = Static<typeof chosenControlSchema>;

export const transportSchema = Type.Object(
  {
    id,
    title,
    kind: Type.Enum(['car', 'van', 'lift', 'hand']),
    airVolumeM3: optional(figure('air volume that load and people share')),
    airChangesPerHour: optional(figure('while moving')),
    people: optional(Type.Integer({ minimum: 0, maximum: 60 })),
    sealedBulkhead: optional(Type.Boolean()),
    durationS: optional(figure('time under way')),
    load: Type.Array(id, { maxItems: 60 }),
  },
  closed,
);

export const eventSchema = Type.Object(
  {
    title,
    date: optional(date),
    performances: Type.Array(
      Type.Object(
        { startsAt: clock, durationMin: Type.Number({ exclusiveMinimum: 0, maximum: 1440 }) },
        closed,
      ),
      { minItems: 1, maxItems: 30 },
    ),
    audience: Type.Array(audienceSchema, { minItems: 1, maxItems: 40 }),
    escapeTimeS: optional(figure('practised time to empty the room')),
  },
  closed,
);

export const planFileSchema = Type.Object(
  {
    schemaVersion: Type.Literal(1),
    event: eventSchema,
    venue: venueSchema,
    acts: Type.Array(actSchema, { maxItems: 60 }),
    stock: optional(Type.Array(stockSchema, { maxItems: 100 })),
    meters: optional(Type.Array(meterSchema, { maxItems: 40 })),
    roles: optional(
      Type.Array(
        Type.Object({ role: title, filledBy: optional(words(120, 'role or initials')) }, closed),
        { maxItems: 40 },
      ),
    ),
    controls: optional(Type.Array(chosenControlSchema, { maxItems: 80 })),
    transport: optional(Type.Array(transportSchema, { maxItems: 20 })),
    attachments: optional(
      Type.Array(Type.Object({ title, kind: words(40, 'what it is evidence of') }, closed), {
        maxItems: 100,
      }),
    ),
    revision: optional(Type.String({ maxLength: 8, description: 'revision letter; default A' })),
    preparedBy: optional(words(120, 'role')),
  },
  {
    additionalProperties: false,
    title: 'Stillair plan file',
    description: 'SI units; a physical figure is a number or an object with value and provenance.',
  },
);
export type PlanFile = Static<typeof planFileSchema>;
