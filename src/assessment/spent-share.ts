import type { Answer } from './assessment.js';
import type { LevelName } from './levels.js';
import type { ZoneOutcome } from './zone-outcomes.js';

const freshOxygen = 0.2095;

/**
 * How far a number has gone from fresh air to its level [-]; 1 at the level itself. Where the answer
 * was not worked out the well-mixed one stands for it.
 */
export function spentShare(
  { level, answers }: ZoneOutcome,
  answer: Answer,
  name: LevelName,
): number {
  const { statistic, value: limit } = level[name];
  const found = answers[answer] ?? answers.mixed;
  const value = found?.statistics[statistic] ?? found?.value ?? 0;
  const fresh = level.quantity.startsWith('oxygen') ? freshOxygen : 0;
  return Math.abs(value - fresh) / Math.abs(limit - fresh);
}
