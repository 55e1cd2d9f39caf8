import { InvalidInput, type ErrorDetail } from '../errors.js';
import type { PlanFile } from './plan-file.js';
import { planReader } from './plan-reader.js';
import { resolvedPlan, type ResolveContext } from './resolve.js';

/** Rounding of a weight or a volume on the way into a plan [-]. */
const rounding = 1.02;

/**
 * Releases that let out more than their container holds, even where the release is at the low end of
 * its range and the container at the high end.
 */
export function containerProblems(
  plan: PlanFile,
  context: Omit<ResolveContext, 'reader'>,
): readonly ErrorDetail[] {
  if ((plan.stock ?? []).length === 0) return [];
  const least = resolvedPlan(plan, { ...context, reader: planReader(() => 'best') });
  const most = resolvedPlan(plan, { ...context, reader: planReader(() => 'worst') });
  return least.acts.flatMap((act, index) =>
    (['planned', 'worstCredible'] as const).flatMap((kind) =>
      act[kind].flatMap((release, at): ErrorDetail[] => {
        const item = most.stock.find((one) => one.id === release.stock);
        const held = item ? item.amountMol * item.count * rounding : Infinity;
        if (!item || release.amountMol <= held) return [];
        const share = (release.amountMol / (item.amountMol * item.count)).toPrecision(2);
        return [
          {
            path: `/acts/${String(index)}/releases/${kind}/${String(at)}`,
            problem: `lets out ${share} times what its container ${item.id} holds`,
          },
        ];
      }),
    ),
  );
}

/** @throws {InvalidInput} naming every release that is larger than its container */
export function requireContainers(plan: PlanFile, context: Omit<ResolveContext, 'reader'>): void {
  const problems = containerProblems(plan, context);
  const [first] = problems;
  if (!first) return;
  throw new InvalidInput(
    `A release is larger than its container at ${first.path}: it ${first.problem}.`,
    'Correct the amount, the content or the number of containers, or name another container.',
    problems,
  );
}
