import type { AirResult } from '../science/room-air/air-result.js';
import type { AirAnswers } from './air-answers.js';
import type { HoldTime } from './assessment.js';
import type { Policy } from './catalogue-types.js';
import type { Evaluation } from './evaluation.js';
import { plainFigure } from './figures.js';
import type { JudgedLevel } from './levels.js';
import { policyDefault } from './policy-rows.js';
import type { ZoneOutcome } from './zone-outcomes.js';
import { clearFrom, holdTime, type ClearSide } from '../science/room-air/hold-time.js';

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

interface Cleared {
  /** Seconds after the end; undefined when not reached while it was followed. */
  readonly afterS: number | undefined;
  readonly where: string;
}

/**
 * When the layered answer is clear for good where people are in a space, followed as far as the day
 * is. The mixed answer alone would release a house into a layer on the floor.
 */
function layersCleared(
  planned: readonly ZoneOutcome[],
  space: string,
  criterion: Criterion,
  side: ClearSide,
  lastEndS: number,
): readonly Cleared[] {
  return planned.flatMap((outcome): Cleared[] => {
    const { level, group, answers, floorCheck } = outcome;
    const isSame =
      side === 'atLeast'
        ? level.quantity === 'oxygenFraction'
        : level.gas === criterion.quantity && level.failsWhen === 'above';
    if (group.space !== space || !isSame || !answers.layered) return [];
    const series = answers.layered.series.map((value) => value * level.scale);
    const afterS = holdTime(outcome.timesS, series, criterion.value, side, lastEndS);
    return [{ afterS, where: floorCheck ? `${group.title}, 0.2 m` : group.title }];
  });
}

/**
 * How long each space that takes part needs, empty and with its planned air, until the next house
 * may enter. The clock never releases a house: a reading does.
 */
export function holdTimes(
  { resolved: plan, dayAir: air, dayResult: result, planned, levelsOf }: Evaluation,
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
      const side: ClearSide = isOxygen ? 'atLeast' : 'atMost';
      const mixedAt = clearFrom(cleared.timesS, series, criterion.value, side);
      const all: readonly Cleared[] = [
        { afterS: mixedAt, where: 'well mixed' },
        ...layersCleared(planned, space.id, criterion, side, lastEndS),
      ];
      const times = all.flatMap(({ afterS }) => afterS ?? []);
      const at = times.length < all.length ? null : Math.max(...times);
      return [{ criterion, isOxygen, at, all, mixedAt }];
    });
    // A space without an act is told of only where something of the day has reached it.
    if (!actSpaces.has(space.id) && times.every(({ at }) => at === 0)) return [];
    return times.map(({ criterion, isOxygen, at, all, mixedAt }): HoldTime => ({
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
              method:
                all.length > 1
                  ? 'empty space, planned air: the longest of well mixed and layered at each place'
                  : 'empty space, planned air, well mixed',
              formula: 'time from which the value meets the level for good',
              source: 'own-room-air',
              range:
                all.length > 1
                  ? 'a pit clears more slowly than the air above it: read it there'
                  : 'a pit or a floor layer clears more slowly: read it there',
              inputs: all.flatMap(({ afterS, where }) =>
                afterS === undefined ? [] : [{ name: where, value: Math.ceil(afterS), unit: 's' }],
              ),
            }),
      words: holdWords(at, mixedAt, all),
    }));
  });
}

function holdWords(
  at: number | null,
  mixedAt: number | undefined,
  all: readonly Cleared[],
): string {
  if (at !== null) {
    return 'Then take the reading at the lowest places; the clock alone releases nobody.';
  }
  if (mixedAt === undefined) {
    return 'Not reached within 12 hours with the planned air. Open doors or raise the fresh air.';
  }
  const late = all.filter(({ afterS }) => afterS === undefined).map(({ where }) => where);
  return `A layer has not cleared by the end of the time followed: ${late.join('; ')}. Stir the air, and let a reading there decide.`;
}
