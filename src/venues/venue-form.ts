import { planRanges } from '../assessment/plan-ranges.js';
import type { FieldSpec, RowSpec } from '../web/views/field-spec.js';
import { shownUnits as units } from '../web/views/units.js';
import { venueTexts as words } from '../web/texts/en-venues.js';

const levels = [
  { value: 'high', label: words.levels.high },
  { value: 'low', label: words.levels.low },
  { value: 'mixed', label: words.levels.mixed },
];

const timed: readonly FieldSpec[] = [
  { kind: 'dayTime', key: 'fromS', label: words.from, hint: words.timedHint },
  { kind: 'dayTime', key: 'toS', label: words.to },
];

const site: readonly FieldSpec[] = [
  {
    kind: 'figure',
    key: 'site.altitudeM',
    label: words.site.altitude,
    unit: units.metre,
    range: planRanges.altitudeM,
  },
  {
    kind: 'figure',
    key: 'site.pressurePa',
    label: words.site.pressure,
    hint: words.site.pressureHint,
    unit: units.kilopascal,
    range: planRanges.pressurePa,
  },
  {
    kind: 'figure',
    key: 'site.temperatureK',
    label: words.site.temperature,
    unit: units.celsius,
    range: planRanges.temperatureK,
  },
  {
    kind: 'figure',
    key: 'site.relativeHumidity',
    label: words.site.humidity,
    unit: units.percent,
    range: planRanges.relativeHumidity,
  },
  {
    kind: 'figure',
    key: 'site.carbonDioxideFraction',
    label: words.site.carbonDioxide,
    unit: units.ppm,
    range: planRanges.carbonDioxideFraction,
  },
  {
    kind: 'choice',
    key: 'site.rulePack',
    label: words.site.rulePack,
    options: 'rulePacks',
    blank: words.site.noRulePack,
  },
];

const spaces: RowSpec = {
  title: words.spaces.title,
  noun: words.spaces.noun,
  hint: words.spaces.hint,
  empty: words.spaces.empty,
  idPrefix: 'S',
  heading: ['title', 'floorAreaM2', 'heightM', 'volumeM3'],
  fields: [
    { kind: 'text', key: 'title', label: words.spaces.name, required: true },
    {
      kind: 'choice',
      key: 'kind',
      label: words.spaces.kind,
      hint: words.spaces.kindHint,
      options: 'roomTypes',
      blank: words.notStated,
    },
    {
      kind: 'figure',
      key: 'floorAreaM2',
      label: words.spaces.floorArea,
      unit: units.squareMetre,
      range: planRanges.floorAreaM2,
      required: true,
    },
    {
      kind: 'figure',
      key: 'heightM',
      label: words.spaces.height,
      unit: units.metre,
      range: planRanges.heightM,
      required: true,
    },
    {
      kind: 'figure',
      key: 'volumeM3',
      label: words.spaces.volume,
      hint: words.spaces.volumeHint,
      unit: units.cubicMetre,
      range: planRanges.volumeM3,
    },
    {
      kind: 'figure',
      key: 'floorLevelM',
      label: words.spaces.floorLevel,
      hint: words.spaces.floorLevelHint,
      unit: units.metre,
      range: planRanges.floorLevelM,
    },
    {
      kind: 'figure',
      key: 'floorRiseM',
      label: words.spaces.floorRise,
      hint: words.spaces.floorRiseHint,
      unit: units.metre,
      range: planRanges.floorRiseM,
    },
    {
      kind: 'figure',
      key: 'temperatureK',
      label: words.spaces.temperature,
      unit: units.celsius,
      range: planRanges.temperatureK,
    },
  ],
};

const openings: RowSpec = {
  title: words.openings.title,
  noun: words.openings.noun,
  empty: words.openings.empty,
  idPrefix: 'O',
  preset: { kind: 'doorway' },
  heading: ['title', 'from', 'to', 'widthM', 'heightM', 'openFraction'],
  fields: [
    { kind: 'text', key: 'title', label: words.name },
    {
      kind: 'choice',
      key: 'kind',
      label: words.openings.kind,
      options: [
        { value: 'doorway', label: words.openings.kinds.doorway },
        { value: 'vent', label: words.openings.kinds.vent },
        { value: 'floorOpening', label: words.openings.kinds.floorOpening },
      ],
    },
    {
      kind: 'choice',
      key: 'from',
      label: words.openings.fromSpace,
      options: 'spacesAndOutside',
      blank: words.choose,
      required: true,
    },
    {
      kind: 'choice',
      key: 'to',
      label: words.openings.toSpace,
      options: 'spacesAndOutside',
      blank: words.choose,
      required: true,
    },
    {
      kind: 'figure',
      key: 'widthM',
      label: words.openings.width,
      unit: units.metre,
      range: planRanges.openingWidthM,
      required: true,
    },
    {
      kind: 'figure',
      key: 'heightM',
      label: words.openings.height,
      unit: units.metre,
      range: planRanges.openingHeightM,
      required: true,
    },
    {
      kind: 'figure',
      key: 'sillLevelM',
      label: words.openings.sill,
      hint: words.openings.sillHint,
      unit: units.metre,
      range: planRanges.floorLevelM,
    },
    {
      kind: 'figure',
      key: 'openFraction',
      label: words.openings.open,
      hint: words.openings.openHint,
      unit: units.percent,
      range: planRanges.openFraction,
    },
    {
      kind: 'figure',
      key: 'dischargeCoefficient',
      label: words.openings.discharge,
      hint: words.openings.dischargeHint,
      unit: units.one,
      range: planRanges.dischargeCoefficient,
    },
    ...timed,
  ],
};

const flow = (key: string, label: string, hint?: string): FieldSpec => ({
  kind: 'figure',
  key,
  label,
  unit: units.litrePerSecond,
  range: planRanges.flowM3PerS,
  ...(hint !== undefined && { hint }),
});

const airSystems: RowSpec = {
  title: words.air.title,
  noun: words.air.noun,
  hint: words.air.hint,
  empty: words.air.empty,
  idPrefix: 'A',
  preset: { drive: 'supply', 'serves.0.share': '100', 'serves.0.row': 'on' },
  heading: ['title', 'freshAirM3PerS', 'drive'],
  fields: [
    { kind: 'text', key: 'title', label: words.name },
    {
      kind: 'choice',
      key: 'drive',
      label: words.air.drive,
      options: [
        { value: 'supply', label: words.air.drives.supply },
        { value: 'extract', label: words.air.drives.extract },
        { value: 'balanced', label: words.air.drives.balanced },
      ],
    },
    {
      kind: 'rows',
      key: 'serves',
      rows: {
        title: words.air.serves,
        noun: words.air.servesNoun,
        empty: words.air.servesEmpty,
        heading: ['space', 'share'],
        flat: true,
        fields: [
          {
            kind: 'choice',
            key: 'space',
            label: words.air.space,
            options: 'spaces',
            blank: words.choose,
            required: true,
          },
          {
            kind: 'number',
            key: 'share',
            label: words.air.share,
            unit: units.percent,
            min: 0,
            max: 100,
            required: true,
          },
        ],
      },
    },
    flow('freshAirM3PerS', words.air.freshAir, words.air.freshAirHint),
    flow('recirculatedM3PerS', words.air.recirculated, words.air.recirculatedHint),
    flow('supplyM3PerS', words.air.supply, words.air.balancedHint),
    flow('extractM3PerS', words.air.extract, words.air.balancedHint),
    {
      kind: 'choice',
      key: 'supplyLevel',
      label: words.air.supplyLevel,
      options: levels,
      blank: words.notStated,
    },
    {
      kind: 'choice',
      key: 'extractLevel',
      label: words.air.extractLevel,
      options: levels,
      blank: words.notStated,
    },
    {
      kind: 'figure',
      key: 'extractTopM',
      label: words.air.extractTop,
      unit: units.metre,
      range: planRanges.extractTopM,
    },
    {
      kind: 'figure',
      key: 'effectiveness',
      label: words.air.effectiveness,
      hint: words.air.effectivenessHint,
      unit: units.one,
      range: planRanges.effectiveness,
    },
    ...timed,
  ],
};

const infiltration: RowSpec = {
  title: words.infiltration.title,
  noun: words.infiltration.noun,
  hint: words.infiltration.hint,
  empty: words.infiltration.empty,
  heading: ['space', 'airChangesPerHour'],
  fields: [
    {
      kind: 'choice',
      key: 'space',
      label: words.infiltration.space,
      options: 'spaces',
      blank: words.choose,
      required: true,
    },
    {
      kind: 'figure',
      key: 'airChangesPerHour',
      label: words.infiltration.airChanges,
      unit: units.perHour,
      range: planRanges.airChangesPerHour,
      required: true,
    },
  ],
};

const transfers: RowSpec = {
  title: words.transfers.title,
  noun: words.transfers.noun,
  hint: words.transfers.hint,
  empty: words.transfers.empty,
  heading: ['from', 'to', 'flowM3PerS'],
  fields: [
    {
      kind: 'choice',
      key: 'from',
      label: words.transfers.from,
      options: 'spaces',
      blank: words.choose,
      required: true,
    },
    {
      kind: 'choice',
      key: 'to',
      label: words.transfers.to,
      options: 'spaces',
      blank: words.choose,
      required: true,
    },
    { ...flow('flowM3PerS', words.transfers.flow), required: true } as FieldSpec,
  ],
};

/** The sections of the venue page, in their order. */
export const venueSections = {
  site,
  spaces,
  openings,
  airSystems,
  infiltration,
  transfers,
} as const;

/** The whole venue form, described once for page, texts and value. */
export const venueForm: readonly FieldSpec[] = [
  { kind: 'text', key: 'title', label: words.venueName, required: true },
  ...site,
  { kind: 'rows', key: 'spaces', rows: spaces },
  { kind: 'rows', key: 'openings', rows: openings },
  { kind: 'rows', key: 'airSystems', rows: airSystems },
  { kind: 'rows', key: 'infiltration', rows: infiltration },
  { kind: 'rows', key: 'transfers', rows: transfers },
];
