import type { AirResult } from '../science/room-air/air-result.js';
import type { AirAnswers } from './air-answers.js';
import type { HoldTime } from './assessment.js';
import type { Policy } from './catalogue-types.js';
import type { Evaluation } from './evaluation.js';
import { plainFigure } from './figures.js';
import type { JudgedLevel } from './levels.js';
import { policyDefault } from './policy-rows.js';

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

interface Criterion {
  readonly quantity: string;
  readonly value: number;
  readonly why: string;
  readonly source: string;
}

/** Levels before the next house: oxygen and carbon dioxide of the policy, the aim of any other gas. */
function criteriaOf(policy: Policy, levels: readonly JudgedLevel[]): readonly Criterion[] {
  const oxygen = policyDefault(policy, 'holdOxygenFraction');
  const carbonDioxide = policyDefault(policy, 'holdCarbonDioxideFraction');
  const others = new Map<string, Criterion>();
  for (const { gas, aim, scale, title } of levels) {
    if (gas === null || gas === 'CO2') continue;
    const value = aim.value * scale;
    if (value >= (others.get(gas)?.value ?? Infinity)) continue;
    others.set(gas, { quantity: gas, value, why: `aim: ${title}`, source: aim.source });
  }
  return [
    { quantity: 'oxygenFraction', ...oxygen },
    { quantity: 'CO2', ...carbonDioxide },
    ...others.values(),
  ];
}

/** The moment from which a series meets its level for good, or null. */
function metFrom(
  timesS: readonly number[],
  series: readonly number[],
  isMet: (value: number) => boolean,
): number | null {
  const lastFailing = series.findLastIndex((value) => !isMet(value));
  return timesS[lastFailing + 1] ?? null;
}

/**
 * How long each space that takes part needs, empty and with its planned air, until the next house
 * may enter. The clock never releases a house: a reading does.
 */
export function holdTimes(
  { resolved: plan, dayAir: air, dayResult: result, levelsOf }: Evaluation,
  answers: AirAnswers,
  policy: Policy,
): readonly HoldTime[] {
  const lastEndS = Math.min(
    air.window.endS,
    Math.max(
      ...plan.performances.map((performance) => performance.endS),
      ...air.placed.flatMap(({ release, startS }) =>
        release.act.startsWith('stock:') ? [] : [startS + release.durationS],
      ),
    ),
  );
  const start = fractionsAt(result, lastEndS - air.window.startS);
  const { occupants: _people, releases: _gas, thresholds: _levels, ...still } = air.input;
  const cleared = answers(
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
    'mixed',
  );
  const criteria = criteriaOf(policy, plan.groups.flatMap(levelsOf));
  const actSpaces = new Set(plan.acts.flatMap((act) => act.planned.map((one) => one.space)));
  return plan.spaces.flatMap((space) => {
    const mixed = cleared.spaces[space.id]?.mixed;
    if (!mixed) return [];
    const times = criteria.flatMap((criterion) => {
      const isOxygen = criterion.quantity === 'oxygenFraction';
      const series = isOxygen ? mixed.oxygenFraction : mixed.gasFraction[criterion.quantity];
      if (!series) return [];
      const isMet = (value: number) =>
        isOxygen ? value >= criterion.value : value <= criterion.value;
      return [{ criterion, isOxygen, at: metFrom(cleared.timesS, series, isMet) }];
    });
    // A space without an act is told of only where something of the day has reached it.
    if (!actSpaces.has(space.id) && times.every(({ at }) => at === 0)) return [];
    return times.map(({ criterion, isOxygen, at }): HoldTime => ({
      space: space.id,
      spaceTitle: space.title,
      quantity: criterion.quantity,
      toLevel: plainFigure(criterion.value, isOxygen ? 'oxygenFraction' : 'gasFraction', {
        method: 'level before the next house',
        formula: criterion.why,
        source: criterion.source,
      }),
      time:
        at === null
          ? null
          : plainFigure(at, 's', {
              method: 'empty space, planned air, well mixed',
              formula: 'time from which the mixed value meets the level',
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
