import type { Displacement } from './air-flows.js';
import { OXYGEN, type AirModel } from './air-model.js';
import type { MixedNode, MixedPiece } from './mixed-track.js';

/** Columns of a quantity row: oxygen first, then the gases of the model. */
export interface QuantityRow {
  readonly t: number;
  readonly values: Float64Array;
  /** Slopes where the answer is smooth; undefined where only the nodes are known. */
  readonly slopes: Float64Array | undefined;
}

/**
 * Fractions of one space, one per component [-].
 *
 * In the straight form the released gas only replaces air: oxygen is that of the air which would be
 * there without it times what the gas leaves, so the sum of gases is capped at 1 here.
 */
export function spaceFractions(
  model: AirModel,
  amounts: Float64Array,
  capacities: Float64Array,
  space: number,
  displacement: Displacement,
): Float64Array {
  const m = model.components.length;
  const capacity = capacities[space] ?? 1;
  const x = new Float64Array(m);
  let released = 0;
  for (let k = 0; k < m; k++) {
    const fraction = Math.min(1, Math.max(0, (amounts[space * m + k] ?? 0) / capacity));
    x[k] = fraction;
    if (model.components[k]?.episode !== undefined) released += fraction;
  }
  if (displacement === 'straight') {
    let oxygen = Math.min(1, Math.max(0, (amounts[space * m + OXYGEN] ?? 0) / capacity));
    oxygen *= Math.max(0, 1 - released);
    for (const [k, one] of model.components.entries()) {
      if (one.gas === 'O2' && one.episode !== undefined) oxygen += x[k] ?? 0;
    }
    x[OXYGEN] = Math.min(1, oxygen);
  }
  return x;
}

/** Oxygen and gas totals from component fractions. */
export function quantitiesOf(model: AirModel, fractions: Float64Array): Float64Array {
  const values = new Float64Array(model.gases.length + 1);
  values[0] = fractions[OXYGEN] ?? 0;
  for (const [at, gas] of model.gases.entries()) {
    let sum = 0;
    if (gas === 'O2') sum = fractions[OXYGEN] ?? 0;
    else {
      for (const [k, one] of model.components.entries()) {
        if (one.gas === gas) sum += fractions[k] ?? 0;
      }
    }
    values[at + 1] = Math.min(1, sum);
  }
  return values;
}

/** Slopes of the same quantities, unclipped. */
function slopesOf(model: AirModel, node: MixedNode, space: number): Float64Array {
  const m = model.components.length;
  const capacity = node.capacities[space] ?? 1;
  const slopes = new Float64Array(model.gases.length + 1);
  for (const [k, one] of model.components.entries()) {
    const slope = (node.slopes[space * m + k] ?? 0) / capacity;
    if (k === OXYGEN) slopes[0] = slope;
    for (const [at, gas] of model.gases.entries()) {
      const counts = gas === 'O2' ? k === OXYGEN : one.gas === gas;
      if (counts) slopes[at + 1] = (slopes[at + 1] ?? 0) + slope;
    }
  }
  return slopes;
}

/** The worse of two rows, quantity by quantity: less oxygen, more gas. */
export function worseOf(a: Float64Array, b: Float64Array): Float64Array {
  return a.map((value, i) =>
    i === 0 ? Math.min(value, b[i] ?? value) : Math.max(value, b[i] ?? value),
  );
}

/** Runs of the well-mixed model that are reported together, the worse at each time. */
export interface MixedRuns {
  readonly displacement: Displacement;
  /** With the same pieces and nodes; one, or two where a mixing factor is below 1. */
  readonly tracks: readonly (readonly MixedPiece[])[];
}

/** Rows of one piece in one space, at its nodes. */
export function pieceRows(
  model: AirModel,
  runs: MixedRuns,
  piece: number,
  space: number,
): readonly QuantityRow[] {
  const first = runs.tracks[0]?.[piece];
  if (!first) return [];
  return first.nodes.map((node, at) => {
    let values = quantitiesOf(
      model,
      spaceFractions(model, node.amounts, node.capacities, space, runs.displacement),
    );
    let slopes: Float64Array | undefined =
      runs.displacement === 'pushOut' ? slopesOf(model, node, space) : undefined;
    for (const track of runs.tracks.slice(1)) {
      const other = track[piece]?.nodes[at];
      if (!other) continue;
      const second = quantitiesOf(
        model,
        spaceFractions(model, other.amounts, other.capacities, space, runs.displacement),
      );
      values = worseOf(values, second);
      slopes = undefined;
    }
    return { t: node.t, values, slopes };
  });
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
    const one = track[piece];
    const capacities = one?.nodes[0]?.capacities;
    if (!one || !capacities) return [];
    return [spaceFractions(model, one.stateAt(t), capacities, space, runs.displacement)];
  });
}
