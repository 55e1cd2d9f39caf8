import { engineVersion } from '../../src/assessment/engine-version.js';
import type { AssessmentData } from '../../src/assessment/assess.js';
import type { PlanFile } from '../../src/assessment/plan-file.js';
import { loadCatalogue } from '../../src/catalogue/catalogue.js';
import { loadGasLibrary } from '../../src/catalogue/gas-library.js';

/** The project's own data, read once. */
export const data: AssessmentData = {
  gases: loadGasLibrary(),
  catalogue: loadCatalogue(),
  engineVersion,
};

/** A hall 18 x 10 x 6 m with 200 people on chairs for an hour, invented for tests. */
export function hall(changes: Partial<PlanFile> = {}): PlanFile {
  return {
    schemaVersion: 1,
    event: {
      title: 'Evening of gases',
      performances: [{ startsAt: '19:00', durationMin: 60 }],
      audience: [
        {
          id: 'seats',
          title: 'Seats',
          count: 200,
          ageGroup: 'adult',
          kind: 'public',
          zone: { space: 'hall', heightM: 1.15 },
        },
      ],
      escapeTimeS: 120,
    },
    venue: {
      title: 'Plain Hall',
      site: { altitudeM: 0, temperatureK: 293.15, rulePack: 'gb' },
      spaces: [
        {
          id: 'hall',
          title: 'Hall',
          kind: 'school-hall',
          floorAreaM2: { value: 180, origin: 'measured' },
          heightM: { value: 6, origin: 'measured' },
          volumeM3: { value: 1080, origin: 'measured' },
        },
      ],
      infiltration: [{ space: 'hall', airChangesPerHour: { value: 0.7, origin: 'measured' } }],
    },
    acts: [],
    ...changes,
  };
}

/** Dry ice let go in warm water: planned mass, and the box that is brought. */
export function fogAct(space: string, plannedKg: number, boxKg: number): PlanFile['acts'][number] {
  return {
    id: 'fog',
    title: 'Bench fog',
    space,
    minute: 20,
    durationMin: 10,
    releases: {
      planned: [{ gas: 'CO2', massKg: plannedKg, durationS: 600, manner: 'fog' }],
      worstCredible: [{ gas: 'CO2', massKg: boxKg, durationS: 900, manner: 'fog' }],
    },
  };
}
