import { InvalidInput } from '../errors.js';
import type { Distribution } from '../science/room-air/air-input.js';
import { servedShares } from '../science/room-air/plant-flows.js';
import { standardAltitude, standardPressure } from '../science/atmosphere.js';
import type { Composition, GasLibrary } from '../science/gases/gas-library.js';
import { molarVolumeM3PerMol } from '../science/gases/molar-volume.js';
import { planningContentMol } from '../science/gases/container-content.js';
import { molarMassKgPerMol } from '../science/gases/molar-mass.js';
import type { Control, Policy } from './catalogue-types.js';
import { freshAirDistribution, scaledDistribution } from './fresh-air-distribution.js';
import type {
  PhysicalFigure,
  PlanAct,
  PlanAirSystem,
  PlanAudience,
  PlanFile,
  PlanOpening,
  PlanRelease,
  PlanSpace,
  PlanStock,
} from './plan-file.js';
import type { Fallback, FigureSpec, PlanReader } from './plan-reader.js';
import { planRanges } from './plan-ranges.js';
import { breathRow, infiltrationFallback, policyDefault } from './policy-rows.js';
import type {
  ResolvedAct,
  ResolvedAirSystem,
  ResolvedGroup,
  ResolvedOpening,
  ResolvedPlan,
  ResolvedRelease,
  ResolvedSite,
  ResolvedSpace,
  ResolvedStock,
} from './resolved-plan.js';

/** What turns a plan into numbers, besides the plan. */
export interface ResolveContext {
  readonly reader: PlanReader;
  readonly gases: GasLibrary;
  readonly policy: Policy;
  readonly controls: readonly Control[];
}

const spec = (
  range: FigureSpec['range'],
  worse: FigureSpec['worse'],
  fallback?: Fallback,
): FigureSpec => (fallback ? { range, worse, fallback } : { range, worse });

const constant = (value: number, why: string): Fallback => ({
  value,
  low: value,
  high: value,
  source: 'plan-default',
  why,
});

/** Seconds after midnight of a clock time hh:mm. */
export function secondsOfDay(clock: string): number {
  const [hours = '0', minutes = '0'] = clock.split(':');
  return Number(hours) * 3600 + Number(minutes) * 60;
}

function resolvedSite(plan: PlanFile, { reader, policy }: ResolveContext): ResolvedSite {
  const { site } = plan.venue;
  const path = '/venue/site';
  const read = (raw: PhysicalFigure | undefined, key: string, how: FigureSpec) =>
    reader.number(raw, `${path}/${key}`, how);

  const statesPressureOnly = site.altitudeM === undefined && site.pressurePa !== undefined;
  const altitudeM = statesPressureOnly
    ? standardAltitude(read(site.pressurePa, 'pressurePa', spec(planRanges.pressurePa, 'low')))
    : read(
        site.altitudeM,
        'altitudeM',
        spec(planRanges.altitudeM, 'high', constant(0, 'sea level, altitude not stated')),
      );
  const standard = standardPressure(altitudeM);
  const pressurePa = read(
    site.pressurePa,
    'pressurePa',
    spec(planRanges.pressurePa, 'low', constant(standard, 'standard atmosphere at the altitude')),
  );
  if (Math.abs(pressurePa - standard) > 10_000) {
    throw new InvalidInput(
      'Altitude and pressure of the site contradict each other by more than 10 kPa.',
      'Give the absolute pressure at the site (not reduced to sea level), in Pa.',
      [{ path: `${path}/pressurePa`, problem: 'does not fit the altitude' }],
    );
  }
  const temperatureK = read(
    site.temperatureK,
    'temperatureK',
    spec(planRanges.temperatureK, 'high', policyDefault(policy, 'siteTemperatureK')),
  );
  return {
    altitudeM,
    pressurePa,
    temperatureK,
    relativeHumidity: read(
      site.relativeHumidity,
      'relativeHumidity',
      spec(planRanges.relativeHumidity, 'high', policyDefault(policy, 'relativeHumidity')),
    ),
    carbonDioxideFraction: read(
      site.carbonDioxideFraction,
      'carbonDioxideFraction',
      spec(
        planRanges.carbonDioxideFraction,
        'high',
        policyDefault(policy, 'carbonDioxideOutdoorFraction'),
      ),
    ),
    molarVolumeM3PerMol: molarVolumeM3PerMol(temperatureK, pressurePa),
  };
}

/** Volume of the plain shape: plan area times height over its mean floor, pockets added. */
function grossVolume(
  space: PlanSpace,
  floorAreaM2: number,
  heightM: number,
  floorLevelM: number,
  floorRiseM: number,
): number {
  const pockets = (space.pockets ?? []).reduce((sum, one) => sum + one.areaM2 * one.depthM, 0);
  const steps = space.steps ?? [];
  const raised = steps.reduce((sum, one) => sum + one.areaM2 * (one.levelM - floorLevelM), 0);
  return floorAreaM2 * (heightM - floorRiseM / 2) - raised + pockets;
}

/** Plan area and height of a kind of room, where a plan admits that nobody knows them. */
function roomFallback(policy: Policy, kind: string | undefined, of: 'area' | 'height') {
  const row = policy.roomTypes.find((candidate) => candidate.id === kind);
  const { lengthM: length, widthM: width, heightM: height } = row ?? {};
  const spread =
    of === 'height'
      ? height
      : length && width
        ? {
            low: length.low * width.low,
            typical: length.typical * width.typical,
            high: length.high * width.high,
          }
        : undefined;
  if (!row || !spread) return undefined;
  const { low, typical, high } = spread;
  return { value: typical, low, high, source: row.source, why: `usual for: ${row.title}` };
}

function resolvedSpace(space: PlanSpace, index: number, context: ResolveContext): ResolvedSpace {
  const { reader, policy } = context;
  const path = `/venue/spaces/${String(index)}`;
  const read = (raw: PhysicalFigure | undefined, key: string, how: FigureSpec) =>
    reader.number(raw, `${path}/${key}`, how);
  const usual = (of: 'area' | 'height') => roomFallback(policy, space.kind, of);
  const floorAreaM2 = read(
    space.floorAreaM2,
    'floorAreaM2',
    spec(planRanges.floorAreaM2, 'low', usual('area')),
  );
  const heightM = read(space.heightM, 'heightM', spec(planRanges.heightM, 'low', usual('height')));
  const floorLevelM = read(
    space.floorLevelM,
    'floorLevelM',
    spec(planRanges.floorLevelM, 'either', constant(0, 'floor at the datum of the venue')),
  );
  const floorRiseM = read(
    space.floorRiseM,
    'floorRiseM',
    spec(planRanges.floorRiseM, 'high', constant(0, 'level floor')),
  );
  const gross = grossVolume(space, floorAreaM2, heightM, floorLevelM, floorRiseM);
  const furniture = policyDefault(policy, 'furnitureShare');
  const net = gross * (1 - furniture.value);
  const volumeM3 = read(
    space.volumeM3,
    'volumeM3',
    spec(planRanges.volumeM3, 'low', {
      value: net,
      low: gross * (1 - furniture.high),
      high: gross * (1 - furniture.low),
      source: furniture.source,
      why: 'area times height, less furniture and seats',
    }),
  );
  return {
    id: space.id,
    title: space.title ?? space.id,
    kind: space.kind ?? null,
    floorAreaM2,
    heightM,
    floorLevelM,
    floorRiseM,
    steps: space.steps ?? [],
    pockets: space.pockets ?? [],
    volumeM3,
    isVolumeMeasured: reader.origins.get(`${path}/volumeM3`) === 'measured',
    shapeVolumeM3: gross,
    temperatureK:
      space.temperatureK === undefined
        ? null
        : read(space.temperatureK, 'temperatureK', spec(planRanges.temperatureK, 'high')),
    initial: space.initial ?? null,
    occupied: space.occupied ?? true,
  };
}

function resolvedOpening(
  opening: PlanOpening,
  index: number,
  levels: ReadonlyMap<string, number>,
  { reader }: ResolveContext,
): ResolvedOpening {
  const path = `/venue/openings/${String(index)}`;
  const read = (raw: PhysicalFigure | undefined, key: string, how: FigureSpec) =>
    reader.number(raw, `${path}/${key}`, how);
  const floors = [levels.get(opening.from), levels.get(opening.to)].filter(
    (level): level is number => level !== undefined,
  );
  // A way to the open air only helps; a way to the next space helps one and harms the other.
  const worse = opening.from === 'outside' || opening.to === 'outside' ? 'low' : 'either';
  return {
    from: opening.from,
    to: opening.to,
    kind: opening.kind,
    widthM: read(opening.widthM, 'widthM', spec(planRanges.openingWidthM, worse)),
    heightM: read(opening.heightM, 'heightM', spec(planRanges.openingHeightM, worse)),
    sillLevelM: read(
      opening.sillLevelM,
      'sillLevelM',
      spec(
        planRanges.floorLevelM,
        'either',
        constant(Math.max(...floors, -100), 'sill at the higher floor'),
      ),
    ),
    openFraction: read(
      opening.openFraction,
      'openFraction',
      spec(planRanges.openFraction, worse, {
        value: 1,
        low: 0,
        high: 1,
        source: 'plan-default',
        why: 'fully open',
      }),
    ),
    dischargeCoefficient:
      opening.dischargeCoefficient === undefined
        ? null
        : read(
            opening.dischargeCoefficient,
            'dischargeCoefficient',
            spec(planRanges.dischargeCoefficient, worse),
          ),
    fromS: opening.fromS ?? null,
    toS: opening.toS ?? null,
  };
}

/** A measured flow holds for two years; dates as yyyy-mm-dd. */
function isOld(measuredOn: string | undefined, eventOn: string | undefined): boolean {
  if (measuredOn === undefined || eventOn === undefined) return false;
  const [year = '0', ...rest] = eventOn.split('-');
  const twoYearsBefore = [String(Number(year) - 2).padStart(4, '0'), ...rest].join('-');
  return measuredOn < twoYearsBefore;
}

/** People who may be in the spaces that a plant serves: what it may have been built for. */
function peopleServed(plan: PlanFile, system: PlanAirSystem): number {
  const spaces = new Set(system.serves?.map((served) => served.space) ?? [system.space]);
  return plan.event.audience
    .filter((group) => spaces.has(group.zone.space))
    .reduce((sum, { count }) => {
      const people = typeof count === 'number' ? count : (count.high ?? count.value ?? 0);
      return sum + people;
    }, 0);
}

function resolvedAirSystem(
  system: PlanAirSystem,
  index: number,
  plan: PlanFile,
  { reader, policy }: ResolveContext,
): ResolvedAirSystem {
  const path = `/venue/airSystems/${String(index)}`;
  const perPerson = Math.max(...policy.outdoorAirPerPerson.map((row) => row.m3PerS));
  const flow = spec(planRanges.flowM3PerS, 'low', {
    value: 0,
    low: 0,
    high: Math.min(planRanges.flowM3PerS.max, perPerson * peopleServed(plan, system)),
    source: 'policy',
    why: 'no flow stated: none is credited; at best what is built for so many people',
  });
  const read = (raw: PhysicalFigure | undefined, key: string, how: FigureSpec = flow) =>
    reader.number(raw, `${path}/${key}`, how);
  /** Air that nobody measured in the last two years is credited in part. */
  const delivered = (raw: PhysicalFigure | undefined, key: string): number => {
    const stated = read(raw, key);
    const origin = reader.origins.get(`${path}/${key}`);
    const on = typeof raw === 'object' ? raw.on : undefined;
    const isMeasured = origin === 'measured' && !isOld(on, plan.event.date);
    if (isMeasured || origin === 'unknown' || stated === 0) return stated;
    const share = policyDefault(policy, 'deliveredShareOfDesign');
    reader.assumed.set(`${path}/${key} delivered`, {
      path: `${path}/${key}`,
      name: 'delivered share of an air flow not measured in two years',
      unit: '',
      value: share.value,
      origin: 'assumed',
      source: share.source,
      why: share.why,
    });
    return stated * share.value;
  };
  const balanced = system.drive === 'balanced';
  const deciding = balanced ? system.supplyM3PerS : system.freshAirM3PerS;
  const decidingKey = balanced ? 'supplyM3PerS' : 'freshAirM3PerS';
  return {
    title: system.title ?? system.id ?? `air system ${String(index + 1)}`,
    serves: servedShares(system),
    freshAirM3PerS: balanced ? 0 : delivered(system.freshAirM3PerS, 'freshAirM3PerS'),
    drive: system.drive,
    supplyM3PerS: balanced ? delivered(system.supplyM3PerS, 'supplyM3PerS') : null,
    extractM3PerS: balanced ? delivered(system.extractM3PerS, 'extractM3PerS') : null,
    recirculatedM3PerS:
      system.recirculatedM3PerS === undefined
        ? 0
        : read(system.recirculatedM3PerS, 'recirculatedM3PerS', {
            ...flow,
            worse: 'either',
          }),
    supplyLevel: system.supplyLevel ?? null,
    extractLevel: system.extractLevel ?? null,
    extractTopM:
      system.extractTopM === undefined
        ? null
        : read(system.extractTopM, 'extractTopM', spec(planRanges.extractTopM, 'either')),
    effectiveness: read(
      system.effectiveness,
      'effectiveness',
      spec(planRanges.effectiveness, 'low', policyDefault(policy, 'ventilationEffectiveness')),
    ),
    isEffectivenessUsual: system.effectiveness === undefined,
    flowFactor: drawnFlow(
      deciding,
      plan.event.date,
      reader.assumed.get(`${path}/${decidingKey} delivered`)?.value ?? 1,
    ),
    fromS: system.fromS ?? null,
    toS: system.toS ?? null,
  };
}

/**
 * What may be delivered of a flow, over the share of it that is credited. Of what is not known the
 * run is made at both ends, and there nothing is drawn.
 */
function drawnFlow(
  figure: PhysicalFigure | undefined,
  date: string | undefined,
  credited: number,
): Distribution | null {
  if (figure === undefined) return null;
  const on = typeof figure === 'object' ? figure.on : undefined;
  const { factor } = freshAirDistribution(figure, isOld(on, date));
  return scaledDistribution(factor, 1 / credited);
}

/** What may leak in over what is calculated with: only what was measured, or is not known, has its own. */
function drawnLeakage(figure: PhysicalFigure | undefined): Distribution | null {
  if (typeof figure !== 'object') return null;
  if (figure.origin !== 'measured' && figure.origin !== 'unknown') return null;
  return freshAirDistribution(figure).factor;
}

function resolvedGroup(
  group: PlanAudience,
  index: number,
  levels: ReadonlyMap<string, number>,
  { reader, policy }: ResolveContext,
): ResolvedGroup {
  const path = `/event/audience/${String(index)}`;
  const seated = breathRow(policy, group.ageGroup, group.kind === 'crew' ? 'working' : 'seated');
  let carbonDioxideM3PerS = seated.value;
  if (group.metabolicRateMet !== undefined) {
    const met = reader.number(
      group.metabolicRateMet,
      `${path}/metabolicRateMet`,
      spec(planRanges.metabolicRateMet, 'high'),
    );
    carbonDioxideM3PerS *= met / policyDefault(policy, 'metabolicRateSeatedMet').value;
  }
  return {
    id: group.id,
    title: group.title,
    space: group.zone.space,
    heightM: group.zone.heightM,
    floorLevelM: group.zone.floorLevelM ?? levels.get(group.zone.space) ?? 0,
    count: reader.number(group.count, `${path}/count`, spec(planRanges.people, 'high')),
    ageGroup: group.ageGroup,
    kind: group.kind,
    carbonDioxideM3PerS,
  };
}

const compositionOf = (item: { gas?: string; composition?: Record<string, number> }): Composition =>
  item.composition ?? { [item.gas ?? 'air']: 1 };

function resolvedRelease(
  release: PlanRelease,
  path: string,
  act: { readonly id: string; readonly space: string; readonly title: string },
  site: ResolvedSite,
  { reader, gases }: ResolveContext,
): ResolvedRelease {
  const composition = compositionOf(release);
  const molarMass = molarMassKgPerMol(gases, composition);
  const amount = (): number => {
    if (release.massKg !== undefined) {
      const kg = reader.number(release.massKg, `${path}/massKg`, spec(planRanges.massKg, 'high'));
      return kg / molarMass;
    }
    if (release.volumeM3 !== undefined) {
      const volume = spec(planRanges.gasVolumeM3, 'high');
      return reader.number(release.volumeM3, `${path}/volumeM3`, volume) / site.molarVolumeM3PerMol;
    }
    const mol = spec(planRanges.amountMol, 'high');
    return reader.number(release.amountMol, `${path}/amountMol`, mol);
  };
  const amountMol = amount();
  const durationS = release.durationS ?? 0;
  return {
    act: act.id,
    title: release.title ?? act.title,
    space: release.space ?? act.space,
    composition,
    amountMol,
    massKg: amountMol * molarMass,
    startS: release.startS ?? 0,
    durationS,
    profile: release.profile ?? 'steady',
    timeConstantS: release.timeConstantS ?? (release.profile === 'decaying' ? durationS / 3 : null),
    heightM: release.heightM ?? null,
    temperatureK: release.temperatureK ?? null,
    manner: release.manner ?? 'gentle',
    burned: release.burned ?? false,
    episode: release.episode ?? null,
    stock: release.stock ?? null,
  };
}

function resolvedAct(
  act: PlanAct,
  index: number,
  plan: PlanFile,
  site: ResolvedSite,
  context: ResolveContext,
): ResolvedAct {
  const path = `/acts/${String(index)}`;
  const releases = (kind: 'planned' | 'worstCredible') =>
    act.releases[kind].map((release, at) =>
      resolvedRelease(release, `${path}/releases/${kind}/${String(at)}`, act, site, context),
    );
  const planned = releases('planned');
  const lastRelease = Math.max(0, ...planned.map((one) => one.startS + one.durationS));
  const startsS =
    act.startsAt === undefined
      ? plan.event.performances.map(
          (performance) => secondsOfDay(performance.startsAt) + (act.minute ?? 0) * 60,
        )
      : [secondsOfDay(act.startsAt)];
  return {
    id: act.id,
    title: act.title,
    space: act.space,
    startsS,
    durationS: act.durationMin === undefined ? lastRelease : act.durationMin * 60,
    planned,
    worstCredible: releases('worstCredible'),
  };
}

function resolvedStock(item: PlanStock, index: number, context: ResolveContext): ResolvedStock {
  const { reader, gases, policy } = context;
  const path = `/stock/${String(index)}`;
  const composition = compositionOf(item);
  const molarMass = molarMassKgPerMol(gases, composition);
  const content = (): number => {
    if (item.massKg !== undefined) {
      const mass = spec(planRanges.massKg, 'high');
      return reader.number(item.massKg, `${path}/massKg`, mass) / molarMass;
    }
    if (item.amountMol !== undefined) {
      const mol = spec(planRanges.amountMol, 'high');
      return reader.number(item.amountMol, `${path}/amountMol`, mol);
    }
    return planningContentMol(gases, {
      composition,
      waterVolumeM3: reader.number(
        item.waterVolumeM3,
        `${path}/waterVolumeM3`,
        spec(planRanges.waterVolumeM3, 'high'),
      ),
      pressurePa: reader.number(
        item.pressurePa,
        `${path}/pressurePa`,
        spec(planRanges.fillPressurePa, 'high'),
      ),
      temperatureK: reader.number(
        item.temperatureK,
        `${path}/temperatureK`,
        spec(planRanges.fillTemperatureK, 'low', policyDefault(policy, 'cylinderFillTemperatureK')),
      ),
    });
  };
  const amountMol = content();
  const cold = item.form === 'dryIce' || item.form === 'cryogen';
  const idle =
    item.form === 'cryogen'
      ? policyDefault(policy, 'cryogenIdleLossPerDay')
      : policyDefault(policy, 'dryIceIdleLossPerHour');
  const perHour = item.form === 'cryogen' ? 1 / 24 : 1;
  return {
    id: item.id,
    title: item.title,
    form: item.form,
    composition,
    amountMol,
    massKg: amountMol * molarMass,
    count: item.count ?? 1,
    idleLossPerHour: cold
      ? reader.number(
          item.idleLossPerHour,
          `${path}/idleLossPerHour`,
          spec(planRanges.idleLossPerHour, 'high', {
            ...idle,
            value: idle.value * perHour,
            low: idle.low * perHour,
            high: idle.high * perHour,
          }),
        )
      : 0,
    place: item.place,
    open: item.open ?? true,
    fromS: item.fromS ?? null,
    toS: item.toS ?? null,
  };
}

/**
 * The plan with every figure settled at the ends the reader takes.
 *
 * @throws {InvalidInput | OutOfRange} naming the figure that cannot be used
 */
export function resolvedPlan(plan: PlanFile, context: ResolveContext): ResolvedPlan {
  const { reader, policy } = context;
  const site = resolvedSite(plan, context);
  const spaces = plan.venue.spaces.map((space, index) => resolvedSpace(space, index, context));
  const levels = new Map(spaces.map((space) => [space.id, space.floorLevelM]));
  const stated = new Map((plan.venue.infiltration ?? []).map((row, index) => [row.space, index]));
  return {
    site,
    spaces,
    openings: (plan.venue.openings ?? []).map((opening, index) =>
      resolvedOpening(opening, index, levels, context),
    ),
    airSystems: (plan.venue.airSystems ?? []).map((system, index) =>
      resolvedAirSystem(system, index, plan, context),
    ),
    infiltration: spaces.map((space, index) => {
      const at = stated.get(space.id);
      const row = at === undefined ? undefined : plan.venue.infiltration?.[at];
      const path =
        at === undefined
          ? `/venue/spaces/${String(index)}/airChangesPerHour`
          : `/venue/infiltration/${String(at)}/airChangesPerHour`;
      return {
        space: space.id,
        airChangesPerHour: reader.number(
          row?.airChangesPerHour,
          path,
          spec(planRanges.airChangesPerHour, 'low', infiltrationFallback(policy, space.kind)),
        ),
        factor: drawnLeakage(row?.airChangesPerHour),
      };
    }),
    transfers: (plan.venue.transfers ?? []).map((row, index) => ({
      from: row.from,
      to: row.to,
      flowM3PerS: reader.number(
        row.flowM3PerS,
        `/venue/transfers/${String(index)}/flowM3PerS`,
        spec(planRanges.flowM3PerS, 'either'),
      ),
    })),
    groups: plan.event.audience.map((group, index) => resolvedGroup(group, index, levels, context)),
    performances: plan.event.performances.map((performance) => {
      const startS = secondsOfDay(performance.startsAt);
      return { startS, endS: startS + performance.durationMin * 60 };
    }),
    acts: plan.acts.map((act, index) => resolvedAct(act, index, plan, site, context)),
    stock: (plan.stock ?? []).map((item, index) => resolvedStock(item, index, context)),
    readingBetweenShows: (plan.controls ?? []).some((chosen) => {
      const effect = context.controls.find((control) => control.id === chosen.control)?.effect;
      return effect === 'readingGate' || effect === 'holdTime';
    }),
    escapeTimeS:
      plan.event.escapeTimeS === undefined
        ? null
        : reader.number(
            plan.event.escapeTimeS,
            '/event/escapeTimeS',
            spec(planRanges.escapeTimeS, 'high', {
              value: 300,
              low: 60,
              high: 600,
              source: 'judgement',
              why: 'escape time not practised',
            }),
          ),
  };
}
