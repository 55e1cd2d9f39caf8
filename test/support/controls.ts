import { airAnswers, type AirAnswers } from '../../src/assessment/air-answers.js';
import type { ControlSources } from '../../src/assessment/controlled-plan.js';
import type { EvaluationContext } from '../../src/assessment/evaluation.js';
import type { PlanFile } from '../../src/assessment/plan-file.js';
import { quickly } from '../../src/assessment/standing.js';
import { airGasTable } from '../../src/science/room-air/air-gases.js';
import { data, fogAct, hall } from './plans.js';

export const sources: ControlSources = {
  controls: data.catalogue.controls,
  gases: data.gases,
};

const air = airAnswers(airGasTable(data.gases));

/** What a plan is worked out with, in full or by one layered run each. */
export function contextFor(plan: PlanFile, how: 'full' | 'quick'): EvaluationContext {
  const pack = data.catalogue.rulePacks.find(({ id }) => id === plan.venue.site.rulePack);
  if (!pack) throw new Error('the plan names a pack');
  const answers: AirAnswers = how === 'quick' ? quickly(air) : air;
  return { data, pack, answers };
}

const measured = (value: number) => ({ value, origin: 'measured' as const });

/** A hall with a plant that recirculates, children on mats, players in a pit, and fog. */
export function hallWithPit(kg: number, boxKg: number): PlanFile {
  const base = hall({ acts: [fogAct('hall', kg, boxKg)] });
  const [seats] = base.event.audience;
  if (!seats) throw new Error('the hall has an audience');
  return {
    ...base,
    event: {
      ...base.event,
      performances: [
        { startsAt: '18:00', durationMin: 40 },
        { startsAt: '19:00', durationMin: 40 },
      ],
      audience: [
        { ...seats, count: 40 },
        {
          id: 'mats',
          title: 'Children on mats',
          count: 20,
          ageGroup: 'child',
          kind: 'public',
          zone: { space: 'hall', heightM: 0.5 },
        },
        {
          id: 'players',
          title: 'Players',
          count: 3,
          ageGroup: 'adult',
          kind: 'crew',
          zone: { space: 'pit', heightM: 1.15 },
        },
      ],
    },
    venue: {
      ...base.venue,
      spaces: [
        ...base.venue.spaces.map((space) => ({
          ...space,
          floorRiseM: 2,
          heightM: measured(7),
          volumeM3: measured(1080),
        })),
        {
          id: 'pit',
          title: 'Pit',
          floorAreaM2: measured(30),
          heightM: measured(2.4),
          floorLevelM: measured(-2.4),
        },
      ],
      openings: [
        {
          id: 'mouth',
          from: 'hall',
          to: 'pit',
          kind: 'floorOpening',
          widthM: measured(2),
          heightM: measured(10),
          sillLevelM: measured(0),
        },
        {
          id: 'door',
          from: 'hall',
          to: 'outside',
          kind: 'doorway',
          widthM: measured(1.8),
          heightM: measured(2.1),
          openFraction: measured(0),
        },
      ],
      airSystems: [
        {
          id: 'plant',
          space: 'hall',
          drive: 'supply',
          freshAirM3PerS: measured(0.3),
          recirculatedM3PerS: measured(0.7),
          supplyLevel: 'high',
          extractLevel: 'high',
          fromS: 61_200,
          toS: 79_200,
        },
      ],
      infiltration: [
        { space: 'hall', airChangesPerHour: measured(0.2) },
        { space: 'pit', airChangesPerHour: measured(0.1) },
      ],
    },
    stock: [
      {
        id: 'ice',
        title: 'Box of dry ice',
        gas: 'CO2',
        form: 'dryIce',
        massKg: boxKg,
        idleLossPerHour: measured(0.05),
        place: 'hall',
        open: false,
        fromS: 61_200,
      },
    ],
    transport: [
      { id: 'lift', title: 'Lift', kind: 'lift', people: 2, airVolumeM3: 9, load: ['ice'] },
    ],
  };
}
