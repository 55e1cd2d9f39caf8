import { bracketedRoot } from '../numerics/root.js';
import type { Crossing, Extreme, OxygenExtreme } from './air-result.js';

/**
 * One answer at one place in one table, in pieces between jumps: a day has a thousand rows at each of
 * dozens of places. Columns: oxygen first, then the gases of the model.
 */
export interface FlatTrack {
  readonly timesS: Float64Array;
  /** First row of each piece, then the number of rows. */
  readonly firstNode: readonly number[];
  /** Quantities in a row: oxygen, then gases. */
  readonly width: number;
  readonly values: Float64Array;
  /** Slopes where the answer is smooth; undefined where only the rows are known. */
  readonly slopes: Float64Array | undefined;
  /** Oxygen, then gases, at any time inside a piece. */
  valuesAt(piece: number, t: number): Float64Array;
}

/** Finest bracket of a crossing time [s]. */
const CROSSING_TOLERANCE_S = 1e-5;

/** Smallest (sign -1) or largest (sign +1) value of a quantity with its time, the first of equals. */
export function extremeOf(track: FlatTrack, column: number, sign: 1 | -1): Extreme {
  const { timesS, firstNode, width, values, slopes } = track;
  let best = -Infinity;
  let atS = 0;
  for (let piece = 0; piece + 1 < firstNode.length; piece++) {
    const until = firstNode[piece + 1] ?? 0;
    for (let node = firstNode[piece] ?? 0; node < until; node++) {
      const value = sign * (values[node * width + column] ?? 0);
      if (value > best) {
        best = value;
        atS = timesS[node] ?? 0;
      }
      if (!slopes || node + 1 >= until) continue;
      const inner = innerExtreme(track, slopes, node, column, sign);
      if (inner && sign * inner.value > best) {
        best = sign * inner.value;
        atS = inner.atS;
      }
    }
  }
  return { value: best * sign, atS };
}

/** Extreme of the cubic between two rows, where both slopes lead into the interval. */
function innerExtreme(
  { timesS, width, values }: FlatTrack,
  slopes: Float64Array,
  node: number,
  column: number,
  sign: number,
): Extreme | undefined {
  const at = node * width + column;
  const t = timesS[node] ?? 0;
  const h = (timesS[node + 1] ?? t) - t;
  const f0 = h * (slopes[at] ?? 0);
  const f1 = h * (slopes[at + width] ?? 0);
  if (!(h > 0) || sign * f0 <= 0 || sign * f1 >= 0) return undefined;
  const y0 = values[at] ?? 0;
  const y1 = values[at + width] ?? 0;
  // y = y0 + f0 s + b s^2 + a s^3 with the slopes at both ends.
  const a = f0 + f1 - 2 * (y1 - y0);
  const b = 3 * (y1 - y0) - 2 * f0 - f1;
  const root = Math.sqrt(Math.max(0, b * b - 3 * a * f0));
  const s = [(-b + root) / (3 * a), (-b - root) / (3 * a), -f0 / (2 * b)].find(
    (one) => one > 0 && one < 1 && sign * (b + 3 * a * one) <= 1e-12,
  );
  if (s === undefined) return undefined;
  return { value: Math.min(1, Math.max(0, y0 + s * (f0 + s * (b + s * a)))), atS: t + s * h };
}

/** Smallest oxygen fraction of a track [-] with its time [s], the first of equals. */
export function oxygenMinimum(track: FlatTrack): OxygenExtreme {
  const { value, atS } = extremeOf(track, 0, -1);
  return { oxygenFraction: value, atS };
}

/** Largest fraction of every gas of a track [-] with its time [s], the first of equals. */
export function gasMaxima(
  track: FlatTrack,
  gases: readonly string[],
): Readonly<Record<string, Extreme>> {
  return Object.fromEntries(gases.map((gas, at) => [gas, extremeOf(track, at + 1, 1)]));
}

/** Every time at which a quantity passes a level, jumps included. */
export function crossingsOf(
  track: FlatTrack,
  column: number,
  level: number,
): readonly Pick<Crossing, 'atS' | 'direction'>[] {
  const { timesS, firstNode, width, values } = track;
  const found: Pick<Crossing, 'atS' | 'direction'>[] = [];
  let before: number | undefined;
  for (let piece = 0; piece + 1 < firstNode.length; piece++) {
    const start = firstNode[piece] ?? 0;
    const until = firstNode[piece + 1] ?? 0;
    for (let node = start; node < until; node++) {
      const value = (values[node * width + column] ?? 0) - level;
      if (value === 0) continue;
      const t = timesS[node] ?? 0;
      if (before !== undefined && before > 0 !== value > 0) {
        const from = timesS[node - 1] ?? t;
        const atS =
          node === start
            ? t
            : crossingTime(track, piece, { from, to: t, before, after: value }, column, level);
        found.push({ atS, direction: value > 0 ? 'rising' : 'falling' });
      }
      before = value;
    }
  }
  return found;
}

function crossingTime(
  track: FlatTrack,
  piece: number,
  span: {
    readonly from: number;
    readonly to: number;
    readonly before: number;
    readonly after: number;
  },
  column: number,
  level: number,
): number {
  const { from, to, before, after } = span;
  const difference = (t: number): number => {
    if (t <= from) return before;
    if (t >= to) return after;
    return (track.valuesAt(piece, t)[column] ?? 0) - level;
  };
  return bracketedRoot(difference, from, to, CROSSING_TOLERANCE_S);
}
