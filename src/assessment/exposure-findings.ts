import { highestRollingMean } from '../science/exposure/rolling-mean.js';
import type { Finding } from './assessment.js';
import type { RulePack } from './catalogue-types.js';
import { plainFigure } from './figures.js';
import type { JudgedLevel } from './levels.js';
import { shortText } from './quantity-words.js';
import type { ResolvedPlan } from './resolved-plan.js';
import type { ZoneOutcome } from './zone-outcomes.js';

const eightHoursS = 8 * 3600;
/** The 8-hour value used everywhere, where a pack has no row of its own [-]. */
const usualEightHour = 0.005;

/** The lowest 8-hour value of the pack for a gas, whatever its role: it is a limit for workers. */
function eightHourLevel(pack: RulePack, { gas }: JudgedLevel): number | null {
  const rows = pack.exposureLimits.filter((row) => row.gas === gas && row.period === 'eightHour');
  const values = rows.map((row) => row.value / 1e6);
  if (values.length > 0) return Math.min(...values);
  return gas === 'CO2' ? usualEightHour : null;
}

/**
 * Zones whose worst 8-hour mean of a gas passes the 8-hour value, at a fixed mouth: the peak and the
 * 15-minute mean have levels of their own in the table. A day shorter than 8 hours is averaged over
 * its own length, so that no break thins it out.
 */
export function exposureFindings(
  planned: readonly ZoneOutcome[],
  plan: ResolvedPlan,
  pack: RulePack,
  nameOf: (gas: string) => string,
): readonly Finding[] {
  return planned.flatMap((outcome): Finding[] => {
    const { level, group } = outcome;
    const { gas } = level;
    if (outcome.floorCheck || gas === null || level.quantity !== gas) return [];
    const limit = eightHourLevel(pack, level);
    const answer = outcome.answers.layered ?? outcome.answers.mixed;
    if (limit === null || !answer || answer.series.length === 0) return [];
    const mean = highestRollingMean(outcome.timesS, answer.series, eightHoursS).value;
    if (mean <= limit) return [];
    const words = { method: 'highest mean over 8 hours', formula: 'rolling mean', source: 'plan' };
    const told = (value: number) => shortText(plainFigure(value, 'gasFraction', words));
    const index = plan.groups.indexOf(group);
    return [
      {
        code: 'eight-hour-mean',
        kind: 'danger',
        path: `/event/audience/${String(index)}`,
        text: `${group.title}: the worst 8-hour mean of ${nameOf(gas)} reaches ${told(mean)}, above the 8-hour value of ${told(limit)}. Nobody stays at this place through the day.`,
      },
    ];
  });
}
