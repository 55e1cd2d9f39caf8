import { createRequire } from 'node:module';

/** What is used of the package; its own types come as source that other compiler options refuse. */
interface Solver {
  absoluteTolerance: number;
  relativeTolerance: number;
  maxSteps: number;
  initialStepSize: number;
  solve(
    f: (t: number, y: number[]) => number[],
    from: number,
    start: readonly number[],
    to: number,
  ): { readonly y: number[]; readonly outcome: number; readonly nEval: number };
}

const { Solver } = createRequire(import.meta.url)('odex') as {
  readonly Solver: new (size: number) => Solver;
};

/**
 * State at the end of a span by a general-purpose package: Hairer's extrapolation code, which shares
 * no line with the project's own solvers.
 */
export function generalSolution(
  f: (t: number, y: readonly number[]) => number[],
  start: readonly number[],
  fromS: number,
  toS: number,
  tolerance: { readonly relative: number; readonly absolute: number },
): { readonly y: readonly number[]; readonly calls: number } {
  const solver = new Solver(start.length);
  solver.relativeTolerance = tolerance.relative;
  solver.absoluteTolerance = tolerance.absolute;
  solver.maxSteps = 1_000_000;
  const { y, outcome, nEval } = solver.solve(f, fromS, start, toS);
  if (outcome !== 0) throw new Error(`the general solver gave up: outcome ${String(outcome)}`);
  return { y, calls: nEval };
}
