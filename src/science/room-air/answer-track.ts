import { bracketedRoot } from '../numerics/root.js';
import type { Crossing, Extreme, OxygenExtreme } from './air-result.js';
import type { QuantityRow } from './mixed-values.js';

/** One answer at one place: rows in rising time, in pieces between jumps. */
export interface AnswerTrack {
  readonly pieces: readonly {
    readonly rows: readonly QuantityRow[];
    /** Oxygen, then gases, at any time inside the piece. */
    valuesAt(t: number): Float64Array;
  }[];
}

/** Finest bracket of a crossing time [s]. */
const CROSSING_TOLERANCE_S = 1e-5;

/** Smallest (sign -1) or largest (sign +1) value of a quantity with its time, the first of equals. */
export function extremeOf(track: AnswerTrack, column: number, sign: 1 | -1): Extreme {
  let value = -Infinity;
  let atS = 0;
  const offer = (candidate: number, t: number): void => {
    if (sign * candidate > value) {
      value = sign * candidate;
      atS = t;
    }
  };
  for (const { rows } of track.pieces) {
    for (const [i, row] of rows.entries()) {
      offer(row.values[column] ?? 0, row.t);
      const next = rows[i + 1];
      if (next?.slopes && row.slopes) {
        const inner = innerExtreme(row, next, column, sign);
        if (inner) offer(inner.value, inner.atS);
      }
    }
  }
  return { value: value * sign, atS };
}

/** Extreme of the cubic between two rows, where both slopes lead into the interval. */
function innerExtreme(
  row: QuantityRow,
  next: QuantityRow,
  column: number,
  sign: number,
): Extreme | undefined {
  const h = next.t - row.t;
  const f0 = h * (row.slopes?.[column] ?? 0);
  const f1 = h * (next.slopes?.[column] ?? 0);
  if (!(h > 0) || sign * f0 <= 0 || sign * f1 >= 0) return undefined;
  const y0 = row.values[column] ?? 0;
  const y1 = next.values[column] ?? 0;
  // y = y0 + f0 s + b s^2 + a s^3 with the slopes at both ends.
  const a = f0 + f1 - 2 * (y1 - y0);
  const b = 3 * (y1 - y0) - 2 * f0 - f1;
  const root = Math.sqrt(Math.max(0, b * b - 3 * a * f0));
  const s = [(-b + root) / (3 * a), (-b - root) / (3 * a), -f0 / (2 * b)].find(
    (one) => one > 0 && one < 1 && sign * (b + 3 * a * one) <= 1e-12,
  );
  if (s === undefined) return undefined;
  return {
    value: Math.min(1, Math.max(0, y0 + s * (f0 + s * (b + s * a)))),
    atS: row.t + s * h,
  };
}

/** Smallest oxygen fraction of a track [-] with its time [s], the first of equals. */
export function oxygenMinimum(track: AnswerTrack): OxygenExtreme {
  const { value, atS } = extremeOf(track, 0, -1);
  return { oxygenFraction: value, atS };
}

/** Largest fraction of every gas of a track [-] with its time [s], the first of equals. */
export function gasMaxima(
  track: AnswerTrack,
  gases: readonly string[],
): Readonly<Record<string, Extreme>> {
  return Object.fromEntries(gases.map((gas, at) => [gas, extremeOf(track, at + 1, 1)]));
}

/** Every time at which a quantity passes a level, jumps included. */
export function crossingsOf(
  track: AnswerTrack,
  column: number,
  level: number,
): readonly Pick<Crossing, 'atS' | 'direction'>[] {
  const found: Pick<Crossing, 'atS' | 'direction'>[] = [];
  let before: number | undefined;
  for (const piece of track.pieces) {
    for (const [i, row] of piece.rows.entries()) {
      const value = (row.values[column] ?? 0) - level;
      if (value === 0) continue;
      if (before !== undefined && before > 0 !== value > 0) {
        const previous = piece.rows[i - 1];
        const atS =
          previous === undefined
            ? row.t
            : crossingTime(piece, previous.t, row.t, column, level, before, value);
        found.push({ atS, direction: value > 0 ? 'rising' : 'falling' });
      }
      before = value;
    }
  }
  return found;
}

function crossingTime(
  piece: AnswerTrack['pieces'][number],
  from: number,
  to: number,
  column: number,
  level: number,
  before: number,
  after: number,
): number {
  const difference = (t: number): number => {
    if (t <= from) return before;
    if (t >= to) return after;
    return (piece.valuesAt(t)[column] ?? 0) - level;
  };
  return bracketedRoot(difference, from, to, CROSSING_TOLERANCE_S);
}
