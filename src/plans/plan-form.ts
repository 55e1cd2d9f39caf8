import { planRanges } from '../assessment/plan-ranges.js';
import { planTexts as words } from '../web/texts/en-plans.js';
import type { AmountUnit, FieldSpec, Option, RowSpec } from '../web/views/field-spec.js';
import { shownUnits as units } from '../web/views/units.js';

const options = (labels: Readonly<Record<string, string>>): readonly Option[] =>
  Object.entries(labels).map(([value, label]) => ({ value, label }));

const releaseAmounts: readonly AmountUnit[] = [
  {
    key: 'volumeM3',
    unit: units.litre,
    label: words.release.litres,
    range: planRanges.gasVolumeM3,
  },
  { key: 'massKg', unit: units.kilogram, label: words.release.kilograms, range: planRanges.massKg },
  { key: 'amountMol', unit: units.mole, label: words.release.moles, range: planRanges.amountMol },
];

const release = (title: string, noun: string, empty: string): RowSpec => ({
  title,
  noun,
  empty,
  heading: ['title', 'gas', 'amount', 'durationS'],
  preset: { manner: 'gentle', profile: 'steady', 'amount-unit': 'volumeM3' },
  fields: [
    { kind: 'text', key: 'title', label: words.release.title },
    {
      kind: 'choice',
      key: 'gas',
      label: words.release.gas,
      options: 'gases',
      blank: words.choose,
    },
    { kind: 'amount', key: 'amount', label: words.release.amount, units: releaseAmounts },
    {
      kind: 'number',
      key: 'startS',
      label: words.release.start,
      unit: units.second,
      min: 0,
      max: 86_400,
    },
    {
      kind: 'number',
      key: 'durationS',
      label: words.release.duration,
      hint: words.release.durationHint,
      unit: units.second,
      min: 0,
      max: 172_800,
    },
    {
      kind: 'choice',
      key: 'manner',
      label: words.release.manner,
      options: options(words.release.manners),
      blank: words.notStated,
    },
    {
      kind: 'number',
      key: 'heightM',
      label: words.release.height,
      unit: units.metre,
      min: 0,
      max: 60,
    },
    {
      kind: 'choice',
      key: 'profile',
      label: words.release.profile,
      options: options(words.release.profiles),
      blank: words.notStated,
    },
    {
      kind: 'number',
      key: 'timeConstantS',
      label: words.release.timeConstant,
      unit: units.second,
      min: 0.1,
      max: 86_400,
    },
    {
      kind: 'choice',
      key: 'space',
      label: words.release.space,
      options: 'spaces',
      blank: words.release.whereAct,
    },
    {
      kind: 'choice',
      key: 'stock',
      label: words.release.stock,
      options: 'stock',
      blank: words.release.notFromStock,
    },
    { kind: 'check', key: 'burned', label: words.release.burned },
  ],
});

const sound: RowSpec = {
  title: words.sound.title,
  noun: words.sound.noun,
  empty: words.sound.empty,
  heading: ['instrument', 'gas', 'frequencyInAirHz'],
  preset: { instrument: 'fluePipe', surroundings: 'air' },
  fields: [
    {
      kind: 'choice',
      key: 'instrument',
      label: words.sound.instrument,
      options: options(words.sound.instruments),
    },
    {
      kind: 'choice',
      key: 'gas',
      label: words.sound.gas,
      options: 'gases',
      blank: words.choose,
    },
    {
      kind: 'figure',
      key: 'frequencyInAirHz',
      label: words.sound.frequency,
      unit: units.hertz,
      range: planRanges.frequencyHz,
    },
    {
      kind: 'figure',
      key: 'lengthM',
      label: words.sound.length,
      unit: units.metre,
      range: planRanges.lengthM,
    },
    {
      kind: 'figure',
      key: 'radiusM',
      label: words.sound.radius,
      unit: units.metre,
      range: planRanges.radiusM,
    },
    {
      kind: 'figure',
      key: 'gasFraction',
      label: words.sound.share,
      hint: words.sound.shareHint,
      unit: units.percent,
      range: planRanges.gasFraction,
    },
    {
      kind: 'figure',
      key: 'bagVolumeM3',
      label: words.sound.bag,
      unit: units.litre,
      range: planRanges.gasVolumeM3,
    },
    {
      kind: 'choice',
      key: 'surroundings',
      label: words.sound.surroundings,
      options: [
        { value: 'air', label: words.sound.air },
        { value: 'immersed', label: words.sound.immersed },
      ],
      blank: words.notStated,
    },
  ],
};

const inhaled: RowSpec = {
  title: words.inhaled.title,
  noun: words.inhaled.noun,
  empty: words.inhaled.empty,
  heading: ['by', 'from', 'gas'],
  preset: { by: 'presenter', from: 'limpBag' },
  fields: [
    { kind: 'choice', key: 'by', label: words.inhaled.by, options: options(words.inhaled.bys) },
    {
      kind: 'choice',
      key: 'from',
      label: words.inhaled.from,
      options: options(words.inhaled.froms),
    },
    {
      kind: 'choice',
      key: 'gas',
      label: words.inhaled.gas,
      options: 'gases',
      blank: words.choose,
    },
    {
      kind: 'figure',
      key: 'analysedOxygenFraction',
      label: words.inhaled.oxygen,
      unit: units.percent,
      range: planRanges.gasFraction,
    },
    { kind: 'check', key: 'certified', label: words.inhaled.certified },
    { kind: 'check', key: 'trainedNamedAdult', label: words.inhaled.trained },
  ],
};

export const actRows: RowSpec = {
  title: words.acts.title,
  noun: words.acts.noun,
  empty: words.acts.empty,
  idPrefix: 'act',
  heading: ['title', 'space', 'minute', 'startsAt'],
  fields: [
    { kind: 'kept', key: 'catalogueId' },
    { kind: 'text', key: 'title', label: words.acts.name, required: true },
    {
      kind: 'choice',
      key: 'space',
      label: words.acts.space,
      options: 'spaces',
      blank: words.choose,
    },
    {
      kind: 'number',
      key: 'minute',
      label: words.acts.minute,
      unit: units.minute,
      min: 0,
      max: 1440,
    },
    {
      kind: 'clock',
      key: 'startsAt',
      label: words.acts.startsAt,
      hint: words.acts.startsAtHint,
    },
    {
      kind: 'number',
      key: 'durationMin',
      label: words.acts.duration,
      unit: units.minute,
      min: 0,
      max: 1440,
    },
    {
      kind: 'rows',
      key: 'releases.planned',
      rows: release(words.acts.planned, words.acts.plannedNoun, words.acts.plannedEmpty),
    },
    {
      kind: 'rows',
      key: 'releases.worstCredible',
      rows: release(words.acts.worst, words.acts.worstNoun, words.acts.worstEmpty),
    },
    { kind: 'rows', key: 'sound', rows: sound },
    { kind: 'rows', key: 'inhaled', rows: inhaled },
    { kind: 'yesNo', key: 'recovery', label: words.acts.recovery, ...words.yesNo },
    { kind: 'yesNo', key: 'writtenAuthority', label: words.acts.authority, ...words.yesNo },
    { kind: 'longText', key: 'note', label: words.acts.note },
  ],
};

const performances: RowSpec = {
  title: words.event.performances,
  noun: words.event.performance,
  empty: words.event.noPerformance,
  heading: ['startsAt', 'durationMin'],
  within: true,
  flat: true,
  fields: [
    { kind: 'clock', key: 'startsAt', label: words.event.startsAt, required: true },
    {
      kind: 'number',
      key: 'durationMin',
      label: words.event.duration,
      unit: units.minute,
      min: 0.1,
      max: 1440,
      required: true,
    },
  ],
};

const audience: RowSpec = {
  title: words.people.title,
  noun: words.people.noun,
  hint: words.people.hint,
  empty: words.people.empty,
  idPrefix: 'P',
  heading: ['title', 'count', 'zone.space', 'zone.heightM'],
  preset: { kind: 'public', ageGroup: 'adult' },
  fields: [
    { kind: 'text', key: 'title', label: words.people.name, required: true },
    {
      kind: 'figure',
      key: 'count',
      label: words.people.count,
      unit: units.people,
      range: planRanges.people,
    },
    {
      kind: 'choice',
      key: 'ageGroup',
      label: words.people.age,
      options: options(words.people.ages),
    },
    {
      kind: 'choice',
      key: 'kind',
      label: words.people.kind,
      options: options(words.people.kinds),
    },
    {
      kind: 'choice',
      key: 'zone.space',
      label: words.people.space,
      options: 'spaces',
      blank: words.choose,
    },
    {
      kind: 'choice',
      key: 'zone.posture',
      label: words.people.posture,
      hint: words.people.postureHint,
      options: 'breathingHeights',
      blank: words.notStated,
    },
    {
      kind: 'number',
      key: 'zone.heightM',
      label: words.people.height,
      hint: words.people.heightHint,
      unit: units.metre,
      min: 0,
      max: 60,
    },
    {
      kind: 'number',
      key: 'zone.floorLevelM',
      label: words.people.floorLevel,
      hint: words.people.floorLevelHint,
      unit: units.metre,
      min: -100,
      max: 200,
    },
  ],
};

const stock: RowSpec = {
  title: words.stock.title,
  noun: words.stock.noun,
  hint: words.stock.hint,
  empty: words.stock.empty,
  idPrefix: 'K',
  heading: ['title', 'gas', 'place', 'open'],
  preset: { form: 'compressed', 'amount-unit': 'massKg' },
  fields: [
    { kind: 'text', key: 'title', label: words.stock.name, required: true },
    {
      kind: 'choice',
      key: 'gas',
      label: words.stock.gas,
      options: 'gases',
      blank: words.choose,
    },
    { kind: 'choice', key: 'form', label: words.stock.form, options: options(words.stock.forms) },
    {
      kind: 'number',
      key: 'count',
      label: words.stock.count,
      unit: units.one,
      min: 1,
      max: 500,
      whole: true,
    },
    {
      kind: 'figure',
      key: 'waterVolumeM3',
      label: words.stock.water,
      hint: words.stock.waterHint,
      unit: units.litre,
      range: planRanges.waterVolumeM3,
    },
    {
      kind: 'figure',
      key: 'pressurePa',
      label: words.stock.pressure,
      unit: units.barAbsolute,
      range: planRanges.fillPressurePa,
    },
    {
      kind: 'figure',
      key: 'temperatureK',
      label: words.stock.temperature,
      unit: units.celsius,
      range: planRanges.fillTemperatureK,
    },
    {
      kind: 'amount',
      key: 'amount',
      label: words.stock.amount,
      units: releaseAmounts.filter(({ key }) => key !== 'volumeM3'),
    },
    {
      kind: 'figure',
      key: 'idleLossPerHour',
      label: words.stock.idle,
      unit: units.percentPerHour,
      range: planRanges.idleLossPerHour,
    },
    {
      kind: 'choice',
      key: 'place',
      label: words.stock.place,
      options: 'places',
      blank: words.choose,
    },
    {
      kind: 'yesNo',
      key: 'open',
      label: words.stock.open,
      yes: words.stock.openYes,
      no: words.stock.openNo,
      blank: words.stock.openBlank,
    },
    { kind: 'dayTime', key: 'fromS', label: words.stock.from, hint: words.stock.timedHint },
    { kind: 'dayTime', key: 'toS', label: words.stock.to },
  ],
};

const meters: RowSpec = {
  title: words.meters.title,
  noun: words.meters.noun,
  empty: words.meters.empty,
  idPrefix: 'M',
  heading: ['title', 'gas', 'space', 'heightM'],
  preset: { gas: 'O2' },
  fields: [
    { kind: 'text', key: 'title', label: words.meters.name },
    { kind: 'choice', key: 'gas', label: words.meters.gas, options: 'gases' },
    {
      kind: 'choice',
      key: 'cellType',
      label: words.meters.cell,
      hint: words.meters.cellHint,
      options: options(words.meters.cells),
      blank: words.notStated,
    },
    {
      kind: 'choice',
      key: 'space',
      label: words.meters.space,
      options: 'spaces',
      blank: words.notStated,
    },
    {
      kind: 'number',
      key: 'heightM',
      label: words.meters.height,
      unit: units.metre,
      min: 0,
      max: 60,
    },
    {
      kind: 'figure',
      key: 'responseTimeS',
      label: words.meters.response,
      unit: units.second,
    },
    {
      kind: 'figure',
      key: 'accuracyFraction',
      label: words.meters.accuracy,
      hint: words.meters.shareHint,
      unit: units.percent,
    },
    {
      kind: 'figure',
      key: 'driftFraction',
      label: words.meters.drift,
      unit: units.percent,
    },
    {
      kind: 'figure',
      key: 'crossEffectFraction',
      label: words.meters.crossEffect,
      hint: words.meters.crossEffectHint,
      unit: units.percent,
    },
    {
      kind: 'figure',
      key: 'rangeFraction',
      label: words.meters.range,
      unit: units.percent,
    },
    {
      kind: 'yesNo',
      key: 'altitudeCompensated',
      label: words.meters.altitude,
      hint: words.meters.altitudeHint,
      ...words.yesNo,
    },
    { kind: 'date', key: 'calibratedOn', label: words.meters.calibrated },
  ],
};

const controls: RowSpec = {
  title: words.controls.title,
  noun: words.controls.noun,
  hint: words.controls.hint,
  empty: words.controls.empty,
  heading: ['control', 'act', 'space', 'value'],
  fields: [
    {
      kind: 'choice',
      key: 'control',
      label: words.controls.control,
      options: 'controls',
      blank: words.choose,
      required: true,
    },
    {
      kind: 'choice',
      key: 'act',
      label: words.controls.act,
      options: 'acts',
      blank: words.controls.allActs,
    },
    {
      kind: 'choice',
      key: 'space',
      label: words.controls.space,
      options: 'spaces',
      blank: words.controls.allSpaces,
    },
    {
      kind: 'number',
      key: 'value',
      label: words.controls.value,
      hint: words.controls.valueHint,
      unit: units.one,
    },
    { kind: 'text', key: 'note', label: words.controls.note },
  ],
};

const roles: RowSpec = {
  title: words.roles.title,
  noun: words.roles.noun,
  empty: words.roles.empty,
  heading: ['role', 'filledBy'],
  flat: true,
  fields: [
    { kind: 'text', key: 'role', label: words.roles.role, required: true },
    {
      kind: 'text',
      key: 'filledBy',
      label: words.roles.filledBy,
    },
  ],
};

const event: readonly FieldSpec[] = [
  { kind: 'text', key: 'event.title', label: words.planTitle, required: true },
  { kind: 'date', key: 'event.date', label: words.date },
  { kind: 'text', key: 'preparedBy', label: words.preparedBy, hint: words.preparedByHint },
  { kind: 'text', key: 'revision', label: words.revision },
  {
    kind: 'figure',
    key: 'event.escapeTimeS',
    label: words.event.escape,
    hint: words.event.escapeHint,
    unit: units.second,
    range: planRanges.escapeTimeS,
  },
];

/** The sections of the plan page, in their order. */
export const planSections = {
  event,
  performances,
  audience,
  acts: actRows,
  stock,
  meters,
  controls,
  roles,
} as const;

/** The whole plan form, described once for page, texts and value. */
export const planForm: readonly FieldSpec[] = [
  ...event,
  { kind: 'rows', key: 'event.performances', rows: performances },
  { kind: 'rows', key: 'event.audience', rows: audience },
  { kind: 'rows', key: 'acts', rows: actRows },
  { kind: 'rows', key: 'stock', rows: stock },
  { kind: 'rows', key: 'meters', rows: meters },
  { kind: 'rows', key: 'controls', rows: controls },
  { kind: 'rows', key: 'roles', rows: roles },
];
