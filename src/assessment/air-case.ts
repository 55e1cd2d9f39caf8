import type {
  AirAmbient,
  AirInput,
  AirOccupants,
  AirRelease,
  AirSystem,
} from '../science/room-air/air-input.js';
import type {
  ResolvedAirSystem,
  ResolvedGroup,
  ResolvedPlan,
  ResolvedRelease,
  ResolvedSpace,
  ResolvedStock,
} from './resolved-plan.js';

/** People are in their places this long before a performance begins. */
export const doorsBeforeS = 600;
/** The day is followed this long after its last event. */
export const afterDayS = 1800;
/** A worst credible release is followed this long. */
const afterWorstS = 3600;

/** A free volume as drawn: what was measured is known closely, furniture taken off by rule less so. */
const measuredVolume = { kind: 'normal', mean: 1, standardDeviation: 0.02 } as const;
const reckonedVolume = { kind: 'normal', mean: 1, standardDeviation: 0.04 } as const;

/** A free volume below this share of the shape narrows the plan area. */
const fullEnough = 0.86;

/** One release placed in the day: absolute start, and the act or container it belongs to. */
export interface PlacedRelease {
  readonly release: ResolvedRelease;
  readonly startS: number;
  /** Gas of one episode adds up in the bound until a reading closes the episode. */
  readonly episode: string;
}

/** The part of the day that is calculated, in seconds after midnight. */
export interface DayWindow {
  readonly startS: number;
  readonly endS: number;
}

/** A run of the air model for a plan, and what is needed to read its answer. */
export interface AirCase {
  readonly input: AirInput;
  readonly window: DayWindow;
  readonly placed: readonly PlacedRelease[];
  /** Length of the shortest performance [s]: what a mean over the show is taken over. */
  readonly shortestShowS: number;
}

const optional = <K extends string, V>(key: K, value: V | null): Partial<Record<K, V>> =>
  value === null ? {} : ({ [key]: value } as Partial<Record<K, V>>);

/**
 * The episode to which a moment of the day belongs. Where the plan has a gate reading before each
 * house, an episode is one performance; where it has none, gas counts from the first act to the last.
 */
export function episodeAt(plan: ResolvedPlan, atS: number): string {
  if (!plan.readingBetweenShows) return 'day';
  const show = plan.performances.findIndex((performance) => atS <= performance.endS);
  return show < 0 ? 'afterwards' : `show${String(show + 1)}`;
}

/** Every planned release of the day with its start. Gas that a flame consumes is left out. */
export function plannedReleases(plan: ResolvedPlan): readonly PlacedRelease[] {
  return plan.acts.flatMap((act) =>
    act.startsS.flatMap((actStartS) =>
      act.planned
        .filter((release) => !release.burned && release.amountMol > 0)
        .map((release) => {
          const startS = actStartS + release.startS;
          return { release, startS, episode: episodeAt(plan, startS) };
        }),
    ),
  );
}

const isCold = (item: ResolvedStock) => item.idleLossPerHour > 0 && item.amountMol > 0;

/**
 * What cold stock gives off in the spaces where it stands, lid on, from when it arrives until it
 * leaves or is gone: a small steady source that belongs to the day as planned.
 */
export function idleReleases(plan: ResolvedPlan, window: DayWindow): readonly PlacedRelease[] {
  const spaces = new Set(plan.spaces.map((space) => space.id));
  return plan.stock
    .filter((item) => isCold(item) && spaces.has(item.place))
    .flatMap((item): PlacedRelease[] => {
      const startS = Math.max(item.fromS ?? window.startS, window.startS);
      const standsS = Math.min(item.toS ?? window.endS, window.endS) - startS;
      const durationS = Math.min(standsS, 3600 / item.idleLossPerHour);
      if (durationS <= 0) return [];
      const share = (item.idleLossPerHour * durationS * item.count) / 3600;
      return [
        {
          release: {
            act: `stock:${item.id}`,
            title: `${item.title}, idle loss`,
            space: item.place,
            composition: item.composition,
            amountMol: item.amountMol * share,
            massKg: item.massKg * share,
            startS: 0,
            durationS,
            profile: 'steady',
            timeConstantS: null,
            heightM: null,
            temperatureK: null,
            manner: 'gentle',
            burned: false,
            episode: null,
            stock: item.id,
          },
          startS,
          episode: episodeAt(plan, startS),
        },
      ];
    });
}

/** From the first doors or act of the day until the air has been followed after the last. */
export function dayWindow(plan: ResolvedPlan): DayWindow {
  const starts = [
    ...plan.performances.map((performance) => performance.startS - doorsBeforeS),
    ...plan.acts.flatMap((act) => act.startsS),
    // Cold stock has been giving off gas since it came.
    ...plan.stock.flatMap((item) => (isCold(item) && item.fromS !== null ? [item.fromS] : [])),
  ];
  const ends = [
    ...plan.performances.map((performance) => performance.endS),
    ...plan.acts.flatMap((act) => act.startsS.map((startS) => startS + act.durationS)),
  ];
  return {
    startS: Math.max(0, Math.floor(Math.min(...starts) / 60) * 60),
    endS: Math.ceil(Math.max(...ends) / 60) * 60 + afterDayS,
  };
}

/**
 * The day carried on until the last cold stock that stays in a space has left it or is all gas: a
 * cold source ends with its mass, not with the show. The day itself where nothing stays.
 */
export function coldWindow(plan: ResolvedPlan, day: DayWindow): DayWindow {
  const spaces = new Set(plan.spaces.map((space) => space.id));
  const ends = plan.stock
    .filter((item) => isCold(item) && spaces.has(item.place))
    .map((item) => {
      const startS = Math.max(item.fromS ?? day.startS, day.startS);
      return Math.min(item.toS ?? Infinity, startS + 3600 / item.idleLossPerHour);
    });
  return { startS: day.startS, endS: Math.ceil(Math.max(day.endS, ...ends) / 60) * 60 };
}

/** The window of a worst credible release that begins at a given time. */
export function worstWindow(day: DayWindow, startS: number): DayWindow {
  return { startS: Math.min(day.startS, startS), endS: startS + afterWorstS };
}

function ambientOf(plan: ResolvedPlan): AirAmbient {
  const { temperatureK, pressurePa, relativeHumidity, carbonDioxideFraction } = plan.site;
  return { temperatureK, pressurePa, relativeHumidity, carbonDioxideFraction };
}

function occupantsOf(
  plan: ResolvedPlan,
  window: DayWindow,
  groups: readonly ResolvedGroup[],
): readonly AirOccupants[] {
  return groups
    .filter((group) => group.count > 0)
    .flatMap((group) =>
      plan.performances
        .map((performance) => ({
          fromS: Math.max(0, performance.startS - doorsBeforeS - window.startS),
          toS: Math.min(performance.endS, window.endS) - window.startS,
        }))
        .filter(({ fromS, toS }) => toS > fromS)
        .map(({ fromS, toS }) => ({
          space: group.space,
          count: group.count,
          carbonDioxideM3PerS: group.carbonDioxideM3PerS,
          fromS,
          toS,
        })),
    );
}

function timedWithin(
  item: { readonly fromS: number | null; readonly toS: number | null },
  window: DayWindow,
): { fromS?: number; toS?: number } | null {
  const fromS = item.fromS === null ? null : Math.max(0, item.fromS - window.startS);
  const toS = item.toS === null ? null : item.toS - window.startS;
  if (toS !== null && toS <= (fromS ?? 0)) return null;
  return { ...optional('fromS', fromS), ...optional('toS', toS) };
}

/** How the air of the venue is run: as planned, nothing running, or plant that only returns air. */
export type AirMode = 'planned' | 'fansOff' | 'airReturned';

/** A plant that recirculates, in the mode in which all of its air is returned and none is fresh. */
const returningAll = (system: ResolvedAirSystem): ResolvedAirSystem =>
  system.recirculatedM3PerS === 0
    ? system
    : {
        ...system,
        drive: 'supply',
        freshAirM3PerS: 0,
        recirculatedM3PerS:
          system.recirculatedM3PerS + system.freshAirM3PerS + (system.supplyM3PerS ?? 0),
      };

function systemsOf(plan: ResolvedPlan, window: DayWindow, mode: AirMode): readonly AirSystem[] {
  if (mode === 'fansOff') return [];
  const systems = mode === 'planned' ? plan.airSystems : plan.airSystems.map(returningAll);
  return systems.flatMap((system): AirSystem[] => {
    const timed = timedWithin(system, window);
    if (!timed) return [];
    return [
      {
        serves: system.serves,
        drive: system.drive,
        ...(system.drive === 'balanced'
          ? {
              ...optional('supplyM3PerS', system.supplyM3PerS),
              ...optional('extractM3PerS', system.extractM3PerS),
            }
          : { freshAirM3PerS: system.freshAirM3PerS }),
        recirculatedM3PerS: system.recirculatedM3PerS,
        effectiveness: system.effectiveness,
        ...(system.isEffectivenessUsual ? { isEffectivenessUsual: true } : {}),
        ...optional('flowFactor', system.flowFactor),
        ...optional('supplyLevel', system.supplyLevel),
        ...optional('extractLevel', system.extractLevel),
        ...optional('extractTopM', system.extractTopM),
        ...timed,
      },
    ];
  });
}

function releaseOf({ release, startS, episode }: PlacedRelease, window: DayWindow): AirRelease {
  return {
    space: release.space,
    composition: release.composition,
    amountMol: release.amountMol,
    startS: startS - window.startS,
    durationS: release.durationS,
    manner: release.manner,
    episode,
    ...(release.profile === 'decaying' && release.durationS > 0
      ? { profile: release.profile, ...optional('timeConstantS', release.timeConstantS) }
      : {}),
    ...optional('heightM', release.heightM),
    ...optional('temperatureK', release.temperatureK),
  };
}

/**
 * Share of the plan area that counts as free. What stands in a room takes its part at every height;
 * where it takes much, the area is narrowed instead of contradicting the measured volume.
 */
function freeShare(space: ResolvedSpace): number {
  const share = space.volumeM3 / space.shapeVolumeM3;
  return share < fullEnough ? share : 1;
}

/** More results than this are not kept: an unwatched box that lasts for weeks changes slowly. */
const mostResults = 2880;

/** Seconds between results: fine enough for a one-minute mean, coarse enough for a long day. */
export function outputInterval(window: DayWindow): number {
  const lengthS = window.endS - window.startS;
  if (lengthS <= 4 * 3600) return 30;
  return Math.max(60, 60 * Math.ceil(lengthS / mostResults / 60));
}

/**
 * The input of the air model for one case of a plan.
 *
 * @param placed what is let out, and when
 * @param mode   how the air is run; with fans off only infiltration and openings remain
 */
export function airCase(
  plan: ResolvedPlan,
  placed: readonly PlacedRelease[],
  window: DayWindow,
  mode: AirMode,
): AirCase {
  const within = placed.filter(({ startS }) => startS >= window.startS && startS <= window.endS);
  const input: AirInput = {
    ambient: ambientOf(plan),
    durationS: window.endS - window.startS,
    outputIntervalS: outputInterval(window),
    spaces: plan.spaces.map((space) => ({
      id: space.id,
      floorAreaM2: space.floorAreaM2 * freeShare(space),
      heightM: space.heightM,
      floorLevelM: space.floorLevelM,
      volumeM3: space.volumeM3,
      volumeFactor: space.isVolumeMeasured ? measuredVolume : reckonedVolume,
      ...(space.floorRiseM > 0 ? { floorRiseM: space.floorRiseM } : {}),
      ...(space.steps.length > 0
        ? {
            steps: space.steps.map((step) => ({ ...step, areaM2: step.areaM2 * freeShare(space) })),
          }
        : {}),
      ...(space.pockets.length > 0 ? { pockets: space.pockets } : {}),
      ...optional('temperatureK', space.temperatureK),
      ...optional('initial', space.initial),
    })),
    openings: plan.openings.flatMap((opening) => {
      const timed = timedWithin(opening, window);
      if (!timed || opening.openFraction === 0) return [];
      return [
        {
          from: opening.from,
          to: opening.to,
          kind: opening.kind,
          widthM: opening.widthM,
          heightM: opening.heightM,
          sillLevelM: opening.sillLevelM,
          openFraction: opening.openFraction,
          ...optional('dischargeCoefficient', opening.dischargeCoefficient),
          ...timed,
        },
      ];
    }),
    airSystems: systemsOf(plan, window, mode),
    infiltration: plan.infiltration.map(({ factor, ...one }) => ({
      ...one,
      ...optional('factor', factor),
    })),
    // What moves air from room to room stands still with the fans.
    transfers: mode === 'fansOff' ? [] : plan.transfers,
    releases: within.map((one) => releaseOf(one, window)),
    occupants: occupantsOf(plan, window, plan.groups),
    zones: plan.groups.map((group) => ({
      id: group.id,
      space: group.space,
      heightM: group.heightM,
      floorLevelM: group.floorLevelM,
    })),
  };
  const shortestShowS = Math.min(
    ...plan.performances.map((performance) => performance.endS - performance.startS),
  );
  return { input, window, placed: within, shortestShowS };
}
