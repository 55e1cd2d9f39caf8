import type { AirGasTable } from '../science/room-air/air-gases.js';
import type { AirResult } from '../science/room-air/air-result.js';
import { airRun } from '../science/room-air/air-run.js';
import type { AirCase } from './air-case.js';
import type { HoldTime } from './assessment.js';
import type { Policy } from './catalogue-types.js';
import { plainFigure } from './figures.js';
import { policyDefault } from './policy-rows.js';
import type { ResolvedPlan } from './resolved-plan.js';

const followedS = 12 * 3600;
const stepS = 60;

/** Fractions in every space at the moment nearest to a time, for a run that starts there. */
function fractionsAt(result: AirResult, atS: number): Record<string, Record<string, number>> {
  const last = result.timesS.length - 1;
  const found = result.timesS.findIndex((t) => t >= atS);
  const index = found < 0 ? last : found;
  return Object.fromEntries(
    Object.entries(result.spaces).map(([space, { mixed }]) => [
      space,
      {
        ...Object.fromEntries(
          Object.entries(mixed.gasFraction).map(([gas, series]) => [gas, series[index] ?? 0]),
        ),
        O2: mixed.oxygenFraction[index] ?? 0,
      },
    ]),
  );
}

/**
 * How long each space with an act needs, empty and with its planned air, until the next house may
 * enter. The clock never releases a house: a reading does.
 */
export function holdTimes(
  plan: ResolvedPlan,
  air: AirCase,
  result: AirResult,
  gases: AirGasTable,
  policy: Policy,
): readonly HoldTime[] {
  const lastEndS = Math.max(...plan.performances.map((performance) => performance.endS));
  const start = fractionsAt(result, lastEndS - air.window.startS);
  const { occupants: _people, releases: _gas, thresholds: _levels, ...still } = air.input;
  const cleared = airRun(
    {
      ...still,
      durationS: followedS,
      outputIntervalS: stepS,
      // Schedules belong to the show; after it the air is taken as it stands at its end.
      airSystems: (still.airSystems ?? [])
        .filter((system) => system.toS === undefined || system.toS > lastEndS - air.window.startS)
        .map(({ fromS: _from, toS: _to, ...system }) => system),
      openings: (still.openings ?? []).map(({ fromS: _from, toS: _to, ...opening }) => opening),
      spaces: still.spaces.map((space) => {
        const initial = start[space.id];
        return initial ? { ...space, initial } : space;
      }),
      zones: [],
    },
    gases,
  );
  const oxygen = policyDefault(policy, 'holdOxygenFraction');
  const carbonDioxide = policyDefault(policy, 'holdCarbonDioxideFraction');
  const actSpaces = new Set(plan.acts.flatMap((act) => act.planned.map((one) => one.space)));
  return plan.spaces
    .filter((space) => actSpaces.has(space.id))
    .flatMap((space) => {
      const mixed = cleared.spaces[space.id]?.mixed;
      if (!mixed) return [];
      const time = (series: readonly number[] | undefined, met: (value: number) => boolean) => {
        const at = series?.findIndex(met) ?? -1;
        return at < 0 ? null : (cleared.timesS[at] ?? null);
      };
      const rows = [
        {
          quantity: 'oxygenFraction',
          level: oxygen,
          unit: 'oxygenFraction' as const,
          at: time(mixed.oxygenFraction, (value) => value >= oxygen.value),
        },
        {
          quantity: 'CO2',
          level: carbonDioxide,
          unit: 'gasFraction' as const,
          at: time(mixed.gasFraction.CO2, (value) => value <= carbonDioxide.value),
        },
      ];
      return rows.map(({ quantity, level, unit, at }): HoldTime => ({
        space: space.id,
        spaceTitle: space.title,
        quantity,
        toLevel: plainFigure(level.value, unit, {
          method: 'level before the next house',
          formula: level.why,
          source: level.source,
        }),
        time:
          at === null
            ? null
            : plainFigure(at, 's', {
                method: 'empty space, planned air, well mixed',
                formula: 'time until the mixed value meets the level',
                source: 'own-room-air',
                range: 'a pit or a floor layer clears more slowly: read it there',
              }),
        words:
          at === null
            ? 'Not reached within 12 hours with the planned air. Open doors or raise the fresh air.'
            : 'Then take the reading at the lowest places; the clock alone releases nobody.',
      }));
    });
}
