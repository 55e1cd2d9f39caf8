import { servedShares } from '../science/room-air/plant-flows.js';
import type { PhysicalFigure, PlanAirSystem, PlanVenue } from '../assessment/plan-file.js';
import type { ResolvedPlan } from '../assessment/resolved-plan.js';

/** Fresh air of a space as a log has it, ready to be written into the venue. */
export interface MeasuredAir {
  readonly freshAirM3PerS: number;
  readonly lowM3PerS: number;
  readonly highM3PerS: number;
  readonly volumeM3: number;
  readonly on: string;
  readonly by?: string | undefined;
  readonly note: string;
}

/** What was running: an air system by its place in the list, nothing, or a system not entered yet. */
export type RunningPart = `system:${number}` | 'leakage' | 'newSystem';

const shareIn = (system: PlanAirSystem, space: string): number =>
  servedShares(system)
    .filter((served) => served.space === space)
    .reduce((sum, { share }) => sum + share, 0);

/** Systems of the venue that serve a space, with their place in the list. */
export function systemsServing(
  venue: PlanVenue,
  space: string,
): readonly { readonly part: RunningPart; readonly system: PlanAirSystem }[] {
  return (venue.airSystems ?? []).flatMap((system, index) =>
    shareIn(system, space) > 0 ? [{ part: `system:${String(index)}` as RunningPart, system }] : [],
  );
}

/** Outdoor air that the venue counts for a space without the log's system: leakage [m3/s]. */
export function countedLeakage(read: ResolvedPlan, space: string): number {
  const rate = read.infiltration.find((row) => row.space === space)?.airChangesPerHour ?? 0;
  const volumeM3 = read.spaces.find(({ id }) => id === space)?.volumeM3 ?? 0;
  return (rate * volumeM3) / 3600;
}

// Five digits are more than any log knows, and spare the form a tail of binary noise.
const settled = (value: number): number => Number(value.toPrecision(5));

function figureOf(air: MeasuredAir, from: (m3PerS: number) => number): PhysicalFigure {
  return {
    value: settled(from(air.freshAirM3PerS)),
    low: settled(Math.max(0, from(air.lowM3PerS))),
    high: settled(from(air.highM3PerS)),
    origin: 'measured',
    on: air.on,
    ...(air.by !== undefined && { by: air.by }),
    note: air.note,
  };
}

const plainValue = (figure: PhysicalFigure | undefined): number | undefined =>
  typeof figure === 'object' ? figure.value : figure;

/** A system that does both keeps the proportion of what it blows in and takes out. */
function measuredSystem(
  system: PlanAirSystem,
  air: MeasuredAir,
  from: (m3PerS: number) => number,
): PlanAirSystem {
  if (system.drive !== 'balanced') return { ...system, freshAirM3PerS: figureOf(air, from) };
  const supply = plainValue(system.supplyM3PerS) ?? 0;
  const extract = plainValue(system.extractM3PerS) ?? 0;
  const most = Math.max(supply, extract);
  const scaled = (side: number) =>
    figureOf(air, (m3PerS) => from(m3PerS) * (most > 0 ? side / most : 1));
  return { ...system, supplyM3PerS: scaled(supply), extractM3PerS: scaled(extract) };
}

function freeId(systems: readonly PlanAirSystem[]): string {
  const taken = new Set(systems.map(({ id }) => id));
  let number = systems.length + 1;
  while (taken.has(`A${String(number)}`)) number += 1;
  return `A${String(number)}`;
}

function withLeakage(venue: PlanVenue, space: string, air: MeasuredAir): PlanVenue {
  const airChangesPerHour = figureOf(air, (m3PerS) => (m3PerS * 3600) / air.volumeM3);
  const others = (venue.infiltration ?? []).filter((row) => row.space !== space);
  return { ...venue, infiltration: [...others, { space, airChangesPerHour }] };
}

/**
 * The venue with the fresh air of a space as it was measured, or undefined when the log shows no more
 * than the leakage that the venue counts already.
 *
 * @param leakageM3PerS leakage counted for the space; taken off what a system delivered
 */
export function withMeasuredAir(
  venue: PlanVenue,
  space: string,
  part: RunningPart,
  air: MeasuredAir,
  leakageM3PerS: number,
): PlanVenue | undefined {
  if (part === 'leakage') return withLeakage(venue, space, air);
  if (air.freshAirM3PerS <= leakageM3PerS) return undefined;
  const systems = venue.airSystems ?? [];
  const index = part === 'newSystem' ? -1 : Number(part.slice('system:'.length));
  if (index < 0) {
    const added: PlanAirSystem = {
      id: freeId(systems),
      title: 'Fresh air as measured',
      drive: 'supply',
      serves: [{ space, share: 1 }],
      freshAirM3PerS: figureOf(air, (m3PerS) => m3PerS - leakageM3PerS),
    };
    return { ...venue, airSystems: [...systems, added] };
  }
  return {
    ...venue,
    airSystems: systems.map((system, at) =>
      at === index
        ? measuredSystem(
            system,
            air,
            (m3PerS) => Math.max(0, m3PerS - leakageM3PerS) / shareIn(system, space),
          )
        : system,
    ),
  };
}
