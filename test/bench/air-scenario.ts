import {
  airCase,
  dayWindow,
  idleReleases,
  plannedReleases,
  worstWindow,
} from '../../src/assessment/air-case.js';
import { planReader } from '../../src/assessment/plan-reader.js';
import { resolvedPlan } from '../../src/assessment/resolve.js';
import { worstReleases } from '../../src/assessment/worst-releases.js';
import { loadCatalogue } from '../../src/catalogue/catalogue.js';
import { loadExamples } from '../../src/catalogue/examples.js';
import { loadGasLibrary } from '../../src/catalogue/gas-library.js';
import { airGasTable, type AirGasTable } from '../../src/science/room-air/air-gases.js';
import type { AirInput } from '../../src/science/room-air/air-input.js';

/** The whole day of the matinee example, as planned and with the slip that lasts longest into it. */
export function wholeDay(): {
  readonly gases: AirGasTable;
  readonly planned: AirInput;
  readonly worst: AirInput;
} {
  const plan = loadExamples().find(({ event }) => event.title.includes('Lanternfold'));
  if (!plan) throw new Error('the matinee example is gone');
  const library = loadGasLibrary();
  const { policy, controls } = loadCatalogue();
  const reader = planReader(() => 'worst');
  const resolved = resolvedPlan(plan, { reader, gases: library, policy, controls });
  const day = dayWindow(resolved);
  const releases = [...idleReleases(resolved, day), ...plannedReleases(resolved)];
  const slips = worstReleases(resolved, policy).map((slip) => {
    const before = releases.filter(({ startS }) => startS < slip.startS);
    const window = worstWindow(day, slip.startS);
    return airCase(resolved, [...before, ...slip.placed], window, 'planned').input;
  });
  const planned = airCase(resolved, releases, day, 'planned').input;
  const worst = slips.reduce((longest, one) => (one.durationS > longest.durationS ? one : longest));
  return { gases: airGasTable(library), planned, worst };
}

/**
 * A row of rooms, each with a door to the next, one unit for every five; every fifth has people and
 * lets carbon dioxide out for ten minutes four times a day.
 */
export function roomRow(spaces: number, days: number): AirInput {
  const id = (index: number): string => `room${String(index)}`;
  const rooms = Array.from({ length: spaces }, (_, index) => index);
  const sources = rooms.filter((index) => index % 5 === 0);
  const hours = Array.from({ length: days }, (_, day) =>
    [10, 12, 14, 16].map((hour) => (24 * day + hour) * 3600),
  ).flat();
  return {
    ambient: { temperatureK: 293.15, pressurePa: 101_325 },
    durationS: days * 86_400,
    outputIntervalS: 600,
    spaces: rooms.map((index) => ({ id: id(index), floorAreaM2: 80, heightM: 3.5 })),
    openings: rooms.slice(1).map((index) => ({
      from: id(index - 1),
      to: id(index),
      kind: 'doorway',
      widthM: 0.9,
      heightM: 2.1,
      sillLevelM: 0,
    })),
    airSystems: sources.map((first) => ({
      serves: rooms
        .slice(first, first + 5)
        .map((index, _, all) => ({ space: id(index), share: 1 / all.length })),
      drive: 'supply',
      freshAirM3PerS: 0.3,
      recirculatedM3PerS: 0.4,
    })),
    releases: sources.flatMap((index) =>
      hours.map((startS) => ({
        space: id(index),
        gas: 'CO2',
        massKg: 2,
        startS,
        durationS: 600,
        manner: 'fog' as const,
      })),
    ),
    occupants: sources.flatMap((index) =>
      hours.map((fromS) => ({ space: id(index), count: 40, fromS, toS: fromS + 3600 })),
    ),
    zones: sources.map((index) => ({ id: id(index), space: id(index), heightM: 1.1 })),
  };
}

/**
 * Raked hall over an open pit, with low extract in the pit: fog for ten minutes runs down the rake as
 * a thin layer, pours over the edge and is drawn off. Stiff: the layer is a few millimetres deep.
 */
export const rakedHallWithPit: AirInput = {
  ambient: { temperatureK: 293.15, pressurePa: 101_325, relativeHumidity: 0 },
  durationS: 600,
  outputIntervalS: 60,
  spaces: [
    { id: 'hall', floorAreaM2: 200, heightM: 9, floorRiseM: 2, floorLevelM: 0 },
    { id: 'pit', floorAreaM2: 40, heightM: 1.5, floorLevelM: -1.5 },
  ],
  openings: [
    { from: 'hall', to: 'pit', kind: 'floorOpening', widthM: 5, heightM: 8, sillLevelM: 0 },
  ],
  airSystems: [
    {
      space: 'hall',
      drive: 'balanced',
      supplyM3PerS: 0.66,
      extractM3PerS: 0.66,
      supplyLevel: 'high',
      extractLevel: 'high',
    },
    {
      space: 'pit',
      drive: 'extract',
      freshAirM3PerS: 0.1,
      extractLevel: 'low',
      extractWidthM: 1,
      extractTopM: 0.3,
    },
  ],
  releases: [{ space: 'hall', gas: 'CO2', massKg: 6, durationS: 600, manner: 'fog' }],
  zones: [{ id: 'player', space: 'pit', heightM: 1.15 }],
};
