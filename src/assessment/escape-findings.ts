import type { Finding } from './assessment.js';
import type { Policy } from './catalogue-types.js';
import type { Evaluation, WorstCase } from './evaluation.js';
import type { LevelName } from './levels.js';
import { policyDefault } from './policy-rows.js';
import { durationWords } from './duration-words.js';
import { quantityWords } from './quantity-words.js';
import { passedAfter, slipOutcomes } from './slip-outcomes.js';
import type { ZoneOutcome } from './zone-outcomes.js';

interface Passing {
  readonly worst: WorstCase;
  readonly outcome: ZoneOutcome;
  readonly afterS: number;
}

const sooner = (one: Passing | null, other: Passing): Passing =>
  one === null || other.afterS < one.afterS ? other : one;

/** The zone that passes a level first after a slip, by the answer that judges, at a declared height. */
function firstPassing(worst: WorstCase, evaluation: Evaluation, level: LevelName): Passing | null {
  return slipOutcomes(worst, evaluation).reduce<Passing | null>((first, outcome) => {
    const atS = outcome.judgedFully ? passedAfter(outcome, level, worst.startS) : undefined;
    if (atS === undefined) return first;
    return sooner(first, { worst, outcome, afterS: atS - worst.startS });
  }, null);
}

/**
 * After the slip that passes a limit soonest the time to it and to Never, against the time that people
 * need to get out: the practised time with the margin of the policy.
 */
export function escapeFindings(
  evaluation: Evaluation,
  policy: Policy,
  nameOf: (gas: string) => string,
): readonly Finding[] {
  const { escapeTimeS } = evaluation.resolved;
  const factor = policyDefault(policy, 'escapeTimeFactor').value;
  const passing = evaluation.worst.flatMap((one) => firstPassing(one, evaluation, 'limit') ?? []);
  const soonest = passing.reduce<Passing | null>(sooner, null);
  if (!soonest) return [];
  const { worst, outcome, afterS } = soonest;
  const never = firstPassing(worst, evaluation, 'never');
  const needed = escapeTimeS === null ? null : factor * escapeTimeS;
  const inTime = needed !== null && afterS >= needed;
  const place = `${quantityWords(outcome.level, nameOf)} at ${outcome.group.title}`;
  const passed = `${worst.title}: the limit for ${place} is passed ${durationWords(afterS)} after it begins`;
  const past =
    never === null ? ', Never is not reached' : `, Never ${durationWords(never.afterS)} after it`;
  const others =
    passing.length > 1 ? ` Other slips that pass a limit: ${String(passing.length - 1)}.` : '';
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
      text: `${passed}${past}${out}${others}`,
    },
  ];
}
