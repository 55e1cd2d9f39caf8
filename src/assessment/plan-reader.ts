import { InvalidInput } from '../errors.js';
import { inRange, type Range } from '../science/range.js';
import type { Origin, PhysicalFigure } from './plan-file.js';
import { statedFigure, type StatedFigure } from './stated-figure.js';

/** Which end of an uncertain figure is taken: as stated, or the end that is worst or best for people. */
export type End = 'stated' | 'worst' | 'best';

export type WorseEnd = 'low' | 'high' | 'either';

/** What stands in when the plan is silent, and between which ends when it says "don't know". */
export interface Fallback {
  readonly value: number;
  readonly low: number;
  readonly high: number;
  readonly source: string;
  readonly why: string;
}

/** How one kind of figure is read. */
export interface FigureSpec {
  readonly range: Range;
  /** The end of the range that is worse for people; `either` where it depends on where they are. */
  readonly worse: WorseEnd;
  readonly fallback?: Fallback;
}

/** A figure that the plan leaves open, as a range or as unknown. */
export interface OpenFigure {
  readonly path: string;
  readonly name: string;
  readonly unit: string;
  readonly low: number;
  readonly high: number;
  readonly worse: WorseEnd;
  readonly kind: 'unknown' | 'range';
}

/** A figure on which the result rests without anyone having measured it. */
export interface AssumedFigure {
  readonly path: string;
  readonly name: string;
  readonly unit: string;
  readonly value: number;
  readonly origin: Origin;
  readonly source: string;
  readonly why: string;
}

export interface PlanReader {
  /** The number to calculate with [unit of the spec]. */
  number(raw: PhysicalFigure | undefined, path: string, spec: FigureSpec): number;
  readonly open: Map<string, OpenFigure>;
  readonly assumed: Map<string, AssumedFigure>;
  readonly origins: Map<string, Origin>;
}

/** Nothing can be run at the ends of a figure of which nobody can say where they are. */
function requireCredibleEnds(
  stated: StatedFigure,
  fallback: Fallback | undefined,
  path: string,
  name: string,
): void {
  if (fallback !== undefined || (stated.low !== null && stated.high !== null)) return;
  throw new InvalidInput(
    `The ${name} at ${path} is not known and has no credible range.`,
    'Give low and high for it; for a space, its kind fills in what is usual.',
    [{ path, problem: 'is unknown without low and high' }],
  );
}

/**
 * Reads the figures of a plan at chosen ends. The same plan read at its worst and at its best gives
 * the two ends of every answer; `endOf` may differ figure by figure to ask what one answer decides.
 */
export function planReader(endOf: (path: string) => End): PlanReader {
  const open = new Map<string, OpenFigure>();
  const assumed = new Map<string, AssumedFigure>();
  const origins = new Map<string, Origin>();

  const pick = (path: string, stated: number, low: number, high: number, worse: WorseEnd) => {
    switch (endOf(path)) {
      case 'stated':
        return stated;
      case 'worst':
        return worse === 'high' ? high : low;
      case 'best':
        return worse === 'high' ? low : high;
    }
  };

  const number = (raw: PhysicalFigure | undefined, path: string, spec: FigureSpec): number => {
    const { range, worse, fallback } = spec;
    const { name, unit } = range;
    const assume = (value: number, origin: Origin, source: string, why: string) =>
      assumed.set(path, { path, name, unit, value, origin, source, why });

    if (raw === undefined) {
      if (!fallback) return inRange(Number.NaN, range, path);
      origins.set(path, 'assumed');
      assume(fallback.value, 'assumed', fallback.source, fallback.why);
      return inRange(fallback.value, range, path);
    }
    const stated = statedFigure(raw, path);
    origins.set(path, stated.origin);
    if (stated.value === null) {
      requireCredibleEnds(stated, fallback, path, name);
      const low = stated.low ?? Math.min(fallback?.low ?? range.min, stated.high ?? Infinity);
      const high = stated.high ?? Math.max(fallback?.high ?? range.max, low);
      open.set(path, { path, name, unit, low, high, worse, kind: 'unknown' });
      // Where nothing is known the cautious end stands in for the stated value.
      const cautious = worse === 'high' ? high : low;
      assume(
        cautious,
        'unknown',
        fallback?.source ?? 'plan',
        'not known: the cautious end is used',
      );
      return inRange(pick(path, cautious, low, high, worse), range, path);
    }
    if (stated.origin === 'assumed') {
      assume(stated.value, 'assumed', 'plan', stated.note ?? 'assumed by the planner');
    }
    if (stated.low === null && stated.high === null) return inRange(stated.value, range, path);
    const low = inRange(stated.low ?? stated.value, range, path);
    const high = inRange(stated.high ?? stated.value, range, path);
    if (low < high) open.set(path, { path, name, unit, low, high, worse, kind: 'range' });
    return inRange(pick(path, stated.value, low, high, worse), range, path);
  };

  return { number, open, assumed, origins };
}
