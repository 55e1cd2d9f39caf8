import type { Displacement } from './air-flows.js';
import type { FlatTrack } from './answer-track.js';
import { OXYGEN, type AirModel } from './air-model.js';
import type { MixedTrack } from './mixed-track.js';

/**
 * Fractions of one space, one per component [-].
 *
 * In the straight form the released gas only replaces air: oxygen is that of the air which would be
 * there without it times what the gas leaves, so the sum of gases is capped at 1 here.
 *
 * @param out written, one per component
 */
export function writeFractions(
  model: AirModel,
  amounts: Float64Array,
  offset: number,
  capacity: number,
  displacement: Displacement,
  out: Float64Array,
): void {
  const { components } = model;
  let released = 0;
  let releasedOxygen = 0;
  for (let k = 0; k < out.length; k++) {
    const raw = (amounts[offset + k] ?? 0) / capacity;
    const fraction = raw > 1 ? 1 : raw > 0 ? raw : 0;
    out[k] = fraction;
    const one = components[k];
    if (one?.origin === undefined) continue;
    released += fraction;
    if (one.gas === 'O2') releasedOxygen += fraction;
  }
  if (displacement !== 'straight') return;
  const left = (out[OXYGEN] ?? 0) * Math.max(0, 1 - released);
  out[OXYGEN] = Math.min(1, left + releasedOxygen);
}

/** The component fractions of one space, in an array of their own [-]. */
export function spaceFractions(
  model: AirModel,
  amounts: Float64Array,
  capacities: Float64Array,
  space: number,
  displacement: Displacement,
): Float64Array {
  const m = model.components.length;
  const x = new Float64Array(m);
  writeFractions(model, amounts, space * m, capacities[space] ?? 1, displacement, x);
  return x;
}

/** For each component the quantity it adds to: 0 oxygen, then the gases; -1 none. */
export function quantityColumns(model: AirModel): Int32Array {
  return Int32Array.from(model.components, (one, k) =>
    // Released oxygen is in the oxygen of the space already.
    k === OXYGEN ? 0 : one.gas === 'O2' ? -1 : model.gases.indexOf(one.gas) + 1,
  );
}

function writeQuantities(
  columns: Int32Array,
  oxygenAsGas: number,
  fractions: Float64Array,
  out: Float64Array,
  at: number,
  width: number,
): void {
  for (let q = 0; q < width; q++) out[at + q] = 0;
  for (let k = 0; k < columns.length; k++) {
    const q = columns[k] ?? -1;
    if (q >= 0) out[at + q] = (out[at + q] ?? 0) + (fractions[k] ?? 0);
  }
  if (oxygenAsGas > 0) out[at + oxygenAsGas] = out[at] ?? 0;
  for (let q = 1; q < width; q++) if ((out[at + q] ?? 0) > 1) out[at + q] = 1;
}

/** Oxygen and gas totals from component fractions. */
export function quantitiesOf(model: AirModel, fractions: Float64Array): Float64Array {
  const width = model.gases.length + 1;
  const values = new Float64Array(width);
  const oxygen = model.gases.indexOf('O2') + 1;
  writeQuantities(quantityColumns(model), oxygen, fractions, values, 0, width);
  return values;
}

/** The worse of two rows, quantity by quantity: less oxygen, more gas. */
export function worseOf(a: Float64Array, b: Float64Array): Float64Array {
  return a.map((value, i) =>
    i === 0 ? Math.min(value, b[i] ?? value) : Math.max(value, b[i] ?? value),
  );
}

/** Writes a row into a table where it is worse than what stands there, quantity by quantity. */
export function keepWorse(row: Float64Array, table: Float64Array, at: number, width: number): void {
  if ((row[0] ?? 0) < (table[at] ?? 0)) table[at] = row[0] ?? 0;
  for (let q = 1; q < width; q++) {
    if ((row[q] ?? 0) > (table[at + q] ?? 0)) table[at + q] = row[q] ?? 0;
  }
}

/** Runs of the well-mixed model that are reported together, the worse at each time. */
export interface MixedRuns {
  readonly displacement: Displacement;
  /** With the same pieces and nodes; one, or two where a mixing factor is below 1. */
  readonly tracks: readonly [MixedTrack, ...MixedTrack[]];
}

/** Oxygen and gases of one space at all nodes, the worse of all runs. */
export function spaceTrack(model: AirModel, runs: MixedRuns, space: number): FlatTrack {
  const { displacement, tracks } = runs;
  const [first, ...others] = tracks;
  const { timesS, firstNode } = first;
  const n = model.spaces.length;
  const m = model.components.length;
  const width = model.gases.length + 1;
  const columns = quantityColumns(model);
  const oxygenAsGas = model.gases.indexOf('O2') + 1;
  const values = new Float64Array(timesS.length * width);
  const fractions = new Float64Array(m);
  const row = new Float64Array(width);
  for (let piece = 0; piece + 1 < firstNode.length; piece++) {
    for (const track of tracks) {
      const capacity = track.capacities[piece]?.[space] ?? 1;
      const until = firstNode[piece + 1] ?? 0;
      for (let node = firstNode[piece] ?? 0; node < until; node++) {
        const offset = (node * n + space) * m;
        writeFractions(model, track.amounts, offset, capacity, displacement, fractions);
        if (track === first) {
          writeQuantities(columns, oxygenAsGas, fractions, values, node * width, width);
        } else {
          writeQuantities(columns, oxygenAsGas, fractions, row, 0, width);
          keepWorse(row, values, node * width, width);
        }
      }
    }
  }
  return {
    timesS,
    firstNode,
    width,
    values,
    slopes: others.length === 0 ? slopesOf(model, first, space, columns) : undefined,
    valuesAt: (piece, t) =>
      runFractions(model, runs, piece, space, t)
        .map((one) => quantitiesOf(model, one))
        .reduce(worseOf),
  };
}

/** Slopes of the same quantities, unclipped. */
function slopesOf(
  model: AirModel,
  track: MixedTrack,
  space: number,
  columns: Int32Array,
): Float64Array | undefined {
  if (!track.slopes) return undefined;
  const n = model.spaces.length;
  const m = model.components.length;
  const width = model.gases.length + 1;
  const oxygenAsGas = model.gases.indexOf('O2') + 1;
  const slopes = new Float64Array(track.timesS.length * width);
  for (let piece = 0; piece + 1 < track.firstNode.length; piece++) {
    const capacity = track.capacities[piece]?.[space] ?? 1;
    const until = track.firstNode[piece + 1] ?? 0;
    for (let node = track.firstNode[piece] ?? 0; node < until; node++) {
      const at = node * width;
      for (let k = 0; k < m; k++) {
        const q = columns[k] ?? -1;
        if (q < 0) continue;
        const slope = (track.slopes[(node * n + space) * m + k] ?? 0) / capacity;
        slopes[at + q] = (slopes[at + q] ?? 0) + slope;
      }
      if (oxygenAsGas > 0) slopes[at + oxygenAsGas] = slopes[at] ?? 0;
    }
  }
  return slopes;
}

/** Component fractions of every run at a time inside a piece. */
export function runFractions(
  model: AirModel,
  runs: MixedRuns,
  piece: number,
  space: number,
  t: number,
): readonly Float64Array[] {
  return runs.tracks.flatMap((track) => {
    const amounts = track.between[piece]?.(t);
    const capacities = track.capacities[piece];
    if (!amounts || !capacities) return [];
    return [spaceFractions(model, amounts, capacities, space, runs.displacement)];
  });
}
