import { largestCount } from '../science/room-air/amount-search.js';
import { connectedSpaces } from './act-attribution.js';
import type { AirAnswers } from './air-answers.js';
import { airCase, dayWindow, idleReleases, plannedReleases } from './air-case.js';
import type { Finding } from './assessment.js';
import type { Evaluation } from './evaluation.js';
import { mixedAimFailure } from './mixed-aim-failure.js';
import { quantityWords } from './quantity-words.js';
import type { ResolvedPlan } from './resolved-plan.js';
import type { ZoneOutcome } from './zone-outcomes.js';

/** From the end of one show to the start of the next where a plan has one show alone [s]. */
const turnaroundS = 1200;
/** More shows than this are asked of nobody. */
const mostShows = 24;
const dayEndS = 24 * 3600;

interface Rhythm {
  readonly startS: number;
  readonly lastsS: number;
  readonly everyS: number;
}

/** How shows follow each other: as close as the plan has them. */
function rhythmOf({ performances }: ResolvedPlan): Rhythm | null {
  const sorted = [...performances].sort((a, b) => a.startS - b.startS);
  const [first, ...later] = sorted;
  if (!first) return null;
  const lastsS = first.endS - first.startS;
  const gaps = later.map((one, index) => one.startS - (sorted[index]?.startS ?? 0));
  const everyS = gaps.length > 0 ? Math.min(...gaps) : lastsS + turnaroundS;
  return everyS > 0 ? { startS: first.startS, lastsS, everyS } : null;
}

/** The plan with the first show of the day given so many times. */
function repeated(plan: ResolvedPlan, rhythm: Rhythm, count: number): ResolvedPlan {
  const { startS, lastsS, everyS } = rhythm;
  const shifts = Array.from({ length: count }, (_, index) => index * everyS);
  const inFirst = (at: number) => at >= startS && at <= startS + lastsS;
  return {
    ...plan,
    performances: shifts.map((by) => ({ startS: startS + by, endS: startS + by + lastsS })),
    acts: plan.acts.map((act) => {
      const own = act.startsS.filter(inFirst);
      return { ...act, startsS: shifts.flatMap((by) => own.map((at) => at + by)) };
    }),
  };
}

/**
 * How many times a day the first show can be given, one after another in the rhythm of the plan, with
 * what each leaves in the air carried into the next, before an aim is missed in well-mixed air.
 */
export function repeatsPerDay(
  evaluation: Evaluation,
  answers: AirAnswers,
  nameOf: (gas: string) => string,
): readonly Finding[] {
  const { resolved } = evaluation;
  const rhythm = rhythmOf(resolved);
  if (!rhythm) return [];
  const letsGasOut = repeated(resolved, rhythm, 1).acts.some(
    ({ planned, startsS }) =>
      startsS.length > 0 && planned.some((release) => !release.burned && release.amountMol > 0),
  );
  if (!letsGasOut) return [];
  const { startS, lastsS, everyS } = rhythm;
  const most = Math.min(mostShows, 1 + Math.floor((dayEndS - startS - lastsS) / everyS));
  if (most < 1) return [];
  // What breath alone does in a room that no gas reaches is not a matter of how often it is shown.
  const releases = plannedReleases(resolved).map(({ release }) => ({
    gases: Object.keys(release.composition),
    reached: connectedSpaces(resolved, release.space),
  }));
  const isAsked = ({ group, level }: ZoneOutcome) =>
    releases.some(
      ({ gases, reached }) =>
        reached.has(group.space) && (level.gas === null || gases.includes(level.gas)),
    );
  const failureOf = (count: number) => {
    const plan = repeated(resolved, rhythm, count);
    const window = dayWindow(plan);
    const dayReleases = [...idleReleases(plan, window), ...plannedReleases(plan)];
    const air = airCase(plan, dayReleases, window, 'planned');
    return mixedAimFailure(evaluation, plan, air, answers, isAsked);
  };
  // A long day costs more than a short one: the first show is asked by itself.
  const passes = (shows: number) => failureOf(shows) === null;
  const count = passes(1) ? largestCount((shows) => shows === 1 || passes(shows), most) : 0;
  const minutes = String(Math.round(everyS / 60));
  const planned = resolved.performances.length;
  const told = (kind: Finding['kind'], text: string): readonly Finding[] => [
    { code: 'repeats-per-day', kind, path: '/event/performances', text },
  ];
  const blocker = count < most ? failureOf(count + 1) : null;
  const level = blocker ? `the aim for ${quantityWords(blocker.level, nameOf)}` : 'an aim';
  const place = blocker ? ` at ${blocker.group.title}` : '';
  if (count === 0) {
    return told(
      'caution',
      `Repeats: the first show alone misses ${level}${place} in well-mixed air.`,
    );
  }
  const times = count === 1 ? 'once' : `${String(count)} times`;
  const rest = count < most ? `; one more misses ${level}${place}` : '; no more fit into the day';
  return told(
    count < planned ? 'caution' : 'note',
    `Repeats: every ${minutes} min, this show can be given ${times} a day in well-mixed air, its residue carried over${rest}. A reading, not this count, lets the next house in.`,
  );
}
