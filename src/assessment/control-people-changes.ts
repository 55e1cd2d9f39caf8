import { clockText } from './clock-text.js';
import type { Control } from './catalogue-types.js';
import {
  spaceOf,
  statedOf,
  valueOf,
  type ControlChange,
  type ControlUse,
} from './control-change.js';
import { highestOf } from './gas-content.js';
import type { PlanFile } from './plan-file.js';
import { secondsOfDay } from './resolve.js';

/** No chair puts a mouth higher than this [m]. */
const highestSeatedM = 1.3;
/** People above this height sit on a chair already, or stand [m]. */
const floorSeatedBelowM = 0.7;

type Group = PlanFile['event']['audience'][number];

function withGroups(plan: PlanFile, change: (group: Group) => readonly Group[]): PlanFile {
  const audience = plan.event.audience.flatMap(change);
  const isSame =
    audience.length === plan.event.audience.length &&
    audience.every((group, index) => group === plan.event.audience[index]);
  return isSame ? plan : { ...plan, event: { ...plan.event, audience } };
}

/** The audience that a control moves: the group it names, else the public of its space, else all of it. */
const isMoved =
  (use: ControlUse) =>
  (group: Group): boolean => {
    if (use.chosen.group !== undefined) return group.id === use.chosen.group;
    const { space } = use.chosen;
    return group.kind === 'public' && (space === undefined || group.zone.space === space);
  };

/** A clock time of the plan file, rounded up to the minute. */
const clockOf = (seconds: number): string => clockText(60 * Math.ceil(seconds / 60));
const lastMinuteS = 86_340;

/** Performances with at least a gap between them; as they are where the day would not hold them. */
function spaced(plan: PlanFile, gapS: number): PlanFile['event']['performances'] {
  const sorted = plan.event.performances.toSorted(
    (one, other) => secondsOfDay(one.startsAt) - secondsOfDay(other.startsAt),
  );
  let freeFrom = 0;
  const moved = sorted.map((show) => {
    const startS = Math.max(secondsOfDay(show.startsAt), freeFrom);
    freeFrom = startS + show.durationMin * 60 + gapS;
    return { startS, show };
  });
  if (moved.some(({ startS }) => startS > lastMinuteS)) return plan.event.performances;
  return moved.map(({ startS, show }) => ({ ...show, startsAt: clockOf(startS) }));
}

/** The cell that the policy accepts for a gas whatever else is in the air. */
const rightCells: Readonly<Record<string, 'partialPressure' | 'infrared' | undefined>> = {
  O2: 'partialPressure',
  CO2: 'infrared',
};

/** Changes in who is where, when, and who watches which meter. */
export const peopleChanges = {
  zoneEmptied: (plan, { chosen }) =>
    chosen.space === undefined
      ? plan
      : withGroups(plan, (group) =>
          group.zone.space === chosen.space &&
          (chosen.group === undefined || chosen.group === group.id)
            ? []
            : [group],
        ),

  seatsRaised: (plan, use) => {
    const heightM = Math.min(valueOf(use, 'heightM') ?? 0, highestSeatedM);
    const moved = isMoved(use);
    return withGroups(plan, (group) =>
      // Seats are given to those on the floor; who sits already goes on sitting as high.
      moved(group) && group.zone.heightM <= floorSeatedBelowM && group.zone.heightM < heightM
        ? [{ ...group, zone: { ...group.zone, heightM } }]
        : [group],
    );
  },

  peopleMoved: (plan, use) => {
    const riseM = valueOf(use, 'riseM') ?? 0;
    const moved = isMoved(use);
    return withGroups(plan, (group) => {
      const space = plan.venue.spaces.find(({ id }) => id === group.zone.space);
      const lowest = highestOf(space?.floorLevelM) ?? 0;
      const highest = lowest + (highestOf(space?.floorRiseM) ?? 0);
      const now = group.zone.floorLevelM ?? lowest;
      const floorLevelM = Math.min(highest, now + riseM);
      return moved(group) && floorLevelM > now
        ? [{ ...group, zone: { ...group.zone, floorLevelM } }]
        : [group];
    });
  },

  headcountCapped: (plan, use) => {
    const most = statedOf(use, 'peopleMax');
    const space = spaceOf(plan, use);
    const isMeant = ({ kind, zone }: Group) =>
      kind === 'public' && (space === undefined || zone.space === space);
    const people = plan.event.audience
      .filter(isMeant)
      .reduce((sum, { count }) => sum + (highestOf(count) ?? 0), 0);
    if (most === undefined || people <= most) return plan;
    return withGroups(plan, (group) =>
      isMeant(group)
        ? [{ ...group, count: Math.ceil(((highestOf(group.count) ?? 0) * most) / people) }]
        : [group],
    );
  },

  holdTime: (plan, use) => ({
    ...plan,
    event: { ...plan.event, performances: spaced(plan, valueOf(use, 'holdS') ?? 0) },
  }),

  fixedMonitor: (plan, use) => {
    const { gas } = use.chosen;
    const group = plan.event.audience.find(({ id }) => id === use.chosen.group);
    const cellType = gas === undefined ? undefined : rightCells[gas];
    if (!group || gas === undefined || cellType === undefined) return plan;
    const meter = {
      id: `meter-${gas}-${group.id}`.slice(0, 40),
      title: use.control.title,
      gas,
      cellType,
      space: group.zone.space,
      heightM: statedOf(use, 'heightM') ?? group.zone.heightM,
      altitudeCompensated: true,
    };
    return { ...plan, meters: [...(plan.meters ?? []), meter] };
  },

  // What a reading changes is which gas still counts: the resolver looks for the control itself.
  readingGate: (plan) => ({ ...plan }),

  liftUnmanned: (plan) =>
    plan.transport?.some(({ kind, people }) => kind === 'lift' && (people ?? 1) > 0)
      ? {
          ...plan,
          transport: plan.transport.map((leg) =>
            leg.kind === 'lift' ? { ...leg, people: 0 } : leg,
          ),
        }
      : plan,
} as const satisfies Partial<Record<Control['effect'], ControlChange>>;
