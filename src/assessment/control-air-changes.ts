import { afterDayS, doorsBeforeS } from './air-case.js';
import type { Control } from './catalogue-types.js';
import {
  spaceOf,
  statedOf,
  valueOf,
  type ControlChange,
  type ControlUse,
} from './control-change.js';
import { highestOf } from './gas-content.js';
import type { PhysicalFigure, PlanAirSystem, PlanFile, PlanOpening } from './plan-file.js';
import { secondsOfDay } from './resolve.js';

const servesSpace = (system: PlanAirSystem, space: string): boolean =>
  system.space === space || (system.serves?.some((served) => served.space === space) ?? false);

function withSystems(
  plan: PlanFile,
  space: string | undefined,
  isMeant: (system: PlanAirSystem) => boolean,
  change: (system: PlanAirSystem) => PlanAirSystem,
): PlanFile {
  const meant = (system: PlanAirSystem) =>
    space !== undefined && servesSpace(system, space) && isMeant(system);
  if (!plan.venue.airSystems?.some(meant)) return plan;
  return {
    ...plan,
    venue: {
      ...plan.venue,
      airSystems: plan.venue.airSystems.map((system) => (meant(system) ? change(system) : system)),
    },
  };
}

/** What somebody stated for this control was measured, as its terms of credit ask; a default is assumed. */
const flowFigure = (use: ControlUse, flow: number): PhysicalFigure => ({
  value: flow,
  origin: statedOf(use, 'flowM3PerS') === undefined ? 'assumed' : 'measured',
});

const withSystem = (plan: PlanFile, system: PlanAirSystem): PlanFile => ({
  ...plan,
  venue: { ...plan.venue, airSystems: [...(plan.venue.airSystems ?? []), system] },
});

const extractAt =
  (level: 'low' | 'high'): ControlChange =>
  (plan, use) => {
    const space = spaceOf(plan, use);
    const flow = valueOf(use, 'flowM3PerS');
    if (space === undefined || flow === undefined || flow <= 0) return plan;
    const topM = level === 'low' ? valueOf(use, 'topM') : undefined;
    return withSystem(plan, {
      id: `${use.control.id}-${space}`.slice(0, 40),
      title: use.control.title,
      space,
      drive: 'extract',
      freshAirM3PerS: flowFigure(use, flow),
      extractLevel: level,
      ...(topM === undefined ? {} : { extractTopM: topM }),
    });
  };

const plus = (a: PhysicalFigure | undefined, b: PhysicalFigure | undefined): PhysicalFigure => {
  const sum = (highestOf(a) ?? 0) + (highestOf(b) ?? 0);
  // All of the air as outdoor air is a mode that nobody measured: the resolver credits it in part.
  return { value: sum, origin: 'assumed', note: 'all that the plant moves now' };
};

/** A plant that brings outdoor air only: the flow stated, else what it moves now. */
function allOutdoor(system: PlanAirSystem, stated: number | undefined): PlanAirSystem {
  const flow: PhysicalFigure | undefined =
    stated === undefined ? undefined : { value: stated, origin: 'measured' };
  const { recirculatedM3PerS, ...rest } = system;
  if (system.drive !== 'balanced') {
    return { ...rest, freshAirM3PerS: flow ?? plus(system.freshAirM3PerS, recirculatedM3PerS) };
  }
  return {
    ...rest,
    supplyM3PerS: flow ?? plus(system.supplyM3PerS, recirculatedM3PerS),
    extractM3PerS: flow ?? plus(system.extractM3PerS, recirculatedM3PerS),
  };
}

const recirculates = ({ recirculatedM3PerS }: PlanAirSystem): boolean =>
  (highestOf(recirculatedM3PerS) ?? 0) > 0;

const isOutside = ({ from, to }: PlanOpening): boolean => from === 'outside' || to === 'outside';
const touches = ({ from, to }: PlanOpening, space: string): boolean =>
  from === space || to === space;

/** The doorways of a space to outdoors, wide open; one of the stated size where the plan has none. */
function doorsOf(plan: PlanFile, use: ControlUse, space: string): readonly PlanOpening[] {
  const own = (plan.venue.openings ?? []).filter(
    (opening) => opening.kind === 'doorway' && touches(opening, space) && isOutside(opening),
  );
  if (own.length > 0) return own.map((opening) => ({ ...opening, openFraction: 1 }));
  const widthM = valueOf(use, 'widthM');
  const heightM = valueOf(use, 'heightM');
  if (widthM === undefined || heightM === undefined) return [];
  return [
    {
      id: `${use.control.id}-${space}`.slice(0, 40),
      from: space,
      to: 'outside',
      kind: 'doorway',
      widthM: widthM * (valueOf(use, 'count') ?? 1),
      heightM,
    },
  ];
}

function withOpenings(plan: PlanFile, openings: readonly PlanOpening[]): PlanFile {
  return { ...plan, venue: { ...plan.venue, openings: [...openings] } };
}

/** The times of the day in which no house is in its places [s after midnight]. */
function gapsBetweenShows(plan: PlanFile): readonly { fromS: number; toS: number }[] {
  const shows = plan.event.performances
    .map(({ startsAt, durationMin }) => ({
      startS: secondsOfDay(startsAt),
      endS: secondsOfDay(startsAt) + durationMin * 60,
    }))
    .toSorted((one, other) => one.startS - other.startS);
  return shows
    .map(({ endS }, index) => ({
      fromS: endS,
      toS: (shows[index + 1]?.startS ?? endS + afterDayS + doorsBeforeS) - doorsBeforeS,
    }))
    .filter(({ fromS, toS }) => toS > fromS);
}

const floorOf = (plan: PlanFile, id: string): number =>
  highestOf(plan.venue.spaces.find((space) => space.id === id)?.floorLevelM) ?? 0;

/** Changes in how air comes, goes and passes from space to space. */
export const airChanges = {
  allOutdoorAir: (plan, use) => {
    const stated = statedOf(use, 'freshAirM3PerS');
    return withSystems(
      plan,
      spaceOf(plan, use),
      (system) => recirculates(system) || stated !== undefined,
      (system) => allOutdoor(system, stated),
    );
  },

  recirculationOff: (plan, use) =>
    withSystems(
      plan,
      spaceOf(plan, use),
      recirculates,
      ({ recirculatedM3PerS: _off, ...rest }) => rest,
    ),

  fansOn: (plan, use) =>
    withSystems(
      plan,
      spaceOf(plan, use),
      ({ fromS, toS }) => fromS !== undefined || toS !== undefined,
      ({ fromS: _from, toS: _to, ...rest }) => rest,
    ),

  lowExtract: extractAt('low'),
  zoneExtract: extractAt('low'),
  highVent: extractAt('high'),

  // Only a flow that somebody measured stirs: a fan out of a catalogue does not.
  mixingFan: (plan, use) => {
    const space = spaceOf(plan, use);
    const flow = statedOf(use, 'flowM3PerS');
    if (space === undefined || flow === undefined || flow <= 0) return plan;
    return withSystem(plan, {
      id: `fan-${space}`.slice(0, 40),
      title: use.control.title,
      space,
      drive: 'supply',
      freshAirM3PerS: 0,
      recirculatedM3PerS: { value: flow, origin: 'measured' },
      supplyLevel: 'mixed',
      extractLevel: 'low',
    });
  },

  openingOpened: (plan, use) => {
    const space = spaceOf(plan, use);
    if (space === undefined) return plan;
    const opened = doorsOf(plan, use, space);
    const others = (plan.venue.openings ?? []).filter(
      (opening) => !(opening.kind === 'doorway' && touches(opening, space) && isOutside(opening)),
    );
    return withOpenings(plan, [...others, ...opened]);
  },

  doorsBetweenShows: (plan, use) => {
    const space = spaceOf(plan, use);
    if (space === undefined) return plan;
    const isShut = ({ openFraction }: PlanOpening) => highestOf(openFraction) === 0;
    const own = (plan.venue.openings ?? []).filter(
      (opening) => opening.kind === 'doorway' && touches(opening, space) && isOutside(opening),
    );
    if (own.length > 0 && !own.some(isShut)) return plan;
    const doors = own.length > 0 ? own.filter(isShut) : doorsOf(plan, use, space);
    const timed = gapsBetweenShows(plan).flatMap((gap, index) =>
      doors.map((door) => ({
        ...door,
        ...(door.id === undefined ? {} : { id: `${door.id}-${String(index + 1)}`.slice(0, 40) }),
        openFraction: 1,
        ...gap,
      })),
    );
    return timed.length === 0
      ? plan
      : withOpenings(plan, [...(plan.venue.openings ?? []), ...timed]);
  },

  openingCovered: (plan, use) => {
    const { space } = use.chosen;
    const leak = valueOf(use, 'leakShare');
    const covers = (opening: PlanOpening) =>
      space !== undefined && opening.kind === 'floorOpening' && touches(opening, space);
    if (leak === undefined || !plan.venue.openings?.some(covers)) return plan;
    const openings = plan.venue.openings.map((opening) =>
      covers(opening)
        ? { ...opening, openFraction: (highestOf(opening.openFraction) ?? 1) * leak }
        : opening,
    );
    // Nobody stays under a cover.
    return {
      ...withOpenings(plan, openings),
      event: {
        ...plan.event,
        audience: plan.event.audience.filter(({ zone }) => zone.space !== space),
      },
    };
  },

  spreadBlocked: (plan, use) => {
    const space = spaceOf(plan, use);
    const heightM = valueOf(use, 'heightM');
    if (space === undefined || heightM === undefined) return plan;
    const raised = (opening: PlanOpening): PlanOpening => {
      if (opening.kind === 'vent' || !touches(opening, space)) return opening;
      const other = opening.from === space ? opening.to : opening.from;
      const floors = [space, other].filter((id) => id !== 'outside').map((id) => floorOf(plan, id));
      const sill = highestOf(opening.sillLevelM) ?? Math.max(...floors);
      // A kerb on this floor changes nothing where the way out lies higher, and nothing in what
      // comes down into this space from above.
      const kerbTop = floorOf(plan, space) + heightM;
      if (kerbTop <= sill || (opening.kind === 'floorOpening' && opening.to === space))
        return opening;
      const clear = highestOf(opening.heightM) ?? 0;
      return {
        ...opening,
        sillLevelM: kerbTop,
        ...(opening.kind === 'doorway' ? { heightM: Math.max(0.1, clear - (kerbTop - sill)) } : {}),
      };
    };
    const openings = plan.venue.openings ?? [];
    const next = openings.map(raised);
    return next.every((opening, index) => opening === openings[index])
      ? plan
      : withOpenings(plan, next);
  },

  storeVentilated: (plan, use) => {
    const space = spaceOf(plan, use);
    const changes = statedOf(use, 'airChangesPerHour');
    if (space === undefined || changes === undefined) return plan;
    const others = (plan.venue.infiltration ?? []).filter((row) => row.space !== space);
    return {
      ...plan,
      venue: {
        ...plan.venue,
        infiltration: [
          ...others,
          { space, airChangesPerHour: { value: changes, origin: 'measured' } },
        ],
      },
    };
  },
} as const satisfies Partial<Record<Control['effect'], ControlChange>>;
