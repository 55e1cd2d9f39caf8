import type { Finding } from './assessment.js';
import type { Policy } from './catalogue-types.js';
import type { Evaluation, WorstCase } from './evaluation.js';
import type { LevelName } from './levels.js';
import { policyDefault } from './policy-rows.js';
import { durationWords } from './duration-words.js';
import { quantityWords } from './quantity-words.js';
import type { ZoneOutcome } from './zone-outcomes.js';

interface Passing {
  readonly outcome: ZoneOutcome;
  readonly afterS: number;
}

/** The zone that passes a level first after a slip, by the answer that judges, at a declared height. */
function firstPassing(worst: WorstCase, level: LevelName): Passing | null {
  return worst.outcomes.reduce<Passing | null>((first, outcome) => {
    const atS = (outcome.answers.layered ?? outcome.answers.mixed)?.firstPast[level];
    if (atS === undefined || !outcome.judgedFully) return first;
    const afterS = Math.max(0, atS - worst.startS);
    return first === null || afterS < first.afterS ? { outcome, afterS } : first;
  }, null);
}

/**
 * After each slip the time to the limit and to Never, against the time that people need to get out:
 * the practised time with the margin of the policy.
 */
export function escapeFindings(
  evaluation: Evaluation,
  policy: Policy,
  nameOf: (gas: string) => string,
): readonly Finding[] {
  const { escapeTimeS } = evaluation.resolved;
  const factor = policyDefault(policy, 'escapeTimeFactor').value;
  return evaluation.worst.flatMap((worst): Finding[] => {
    const limit = firstPassing(worst, 'limit');
    if (!limit) return [];
    const never = firstPassing(worst, 'never');
    const needed = escapeTimeS === null ? null : factor * escapeTimeS;
    const inTime = needed !== null && limit.afterS >= needed;
    const place = `${quantityWords(limit.outcome.level, nameOf)} at ${limit.outcome.group.title}`;
    const passed = `${worst.title}: the limit for ${place} is passed ${durationWords(limit.afterS)} after it begins`;
    const past =
      never === null ? ', Never is not reached' : `, Never ${durationWords(never.afterS)} after it`;
    const out =
      needed === null
        ? '. Nobody has practised how long it takes to leave: practise and enter it.'
        : inTime
          ? `. People need ${durationWords(needed)} to leave, margin included: enough, if they start at once.`
          : `. People need ${durationWords(needed)} to leave, margin included: too long to rely on it.`;
    return [
      {
        code: 'time-to-limit',
        kind: inTime ? 'note' : 'caution',
        path: '/event/escapeTimeS',
        text: `${passed}${past}${out}`,
      },
    ];
  });
}
