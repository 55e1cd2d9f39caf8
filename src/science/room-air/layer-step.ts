import { flowSize, type FlowTable } from './flow-table.js';
import type { ZoneLayout } from './layer-zones.js';

/** A zone that holds less and lets through less than this counts as empty [m3]. */
const NOTHING_M3 = 1e-12;

/** Takes a state over a step with the flows of its start; false when the step is too long. */
export type ImplicitStep = (
  table: FlowTable,
  h: number,
  state: Float64Array,
  next: Float64Array,
) => boolean;

/**
 * One implicit step of the two-layer model with the flows of its start.
 *
 *   volumes (I - h J) dV = h dV/dt, J the slopes of the variables; variables brought up to date
 *   zones   (V + h sum of inflows) x = n + h (sum of inflow x_from + sources): x is a mean of what
 *           was there and what comes in, so it stays between 0 and 1 for any step
 *
 * Gas is kept to rounding: what leaves a zone arrives in another, outdoors included.
 *
 * @param layout  layout of the state
 * @param outdoor by component, fraction outdoors [-]
 * @returns the step, with its work space
 * Source: own-derivation (linearly implicit Euler, as hairer-wanner-1996 IV.9). Assumes: flows as
 * layerFlows gives them. Accuracy: order 1; layeredTrack extrapolates.
 */
export function implicitStep(layout: ZoneLayout, outdoor: Float64Array): ImplicitStep {
  const { k, layers, held, zones, amounts } = layout;
  const slope = new Float64Array(layers * layers);
  const growth = new Float64Array(layers);
  const matrix = new Float64Array(zones * zones);
  const right = new Float64Array(zones * k);
  const order = new Int32Array(zones);
  const place = new Int32Array(zones);
  const outflow = new Float64Array(zones);
  const inflow = new Float64Array(zones);
  const share = new Float64Array(zones);
  let moved = new Float64Array(0);
  let from = new Int32Array(0);
  let to = new Int32Array(0);

  const updateVariables = (table: FlowTable, h: number): void => {
    if (table.variables === 0 || layers === 0) return;
    growth.fill(0);
    slope.fill(0);
    for (let i = 0; i < table.count; i++) {
      const from = table.from[i] ?? 0;
      const to = table.to[i] ?? 0;
      if (from >= layers && to >= layers) continue;
      const size = flowSize(table, i);
      const v = table.variable[i] ?? -1;
      const a = v < 0 ? -1 : (table.zoneA[v] ?? -1);
      const b = v < 0 ? -1 : (table.zoneB[v] ?? -1);
      const factor = v < 0 ? 0 : h * (table.factor[i] ?? 0);
      const byA = factor * (table.slopeA[v] ?? 0);
      const byB = b < 0 ? 0 : factor * (table.slopeB[v] ?? 0);
      for (let side = 0; side < 2; side++) {
        const row = side === 0 ? from : to;
        if (row >= layers) continue;
        const sign = side === 0 ? -1 : 1;
        growth[row] = (growth[row] ?? 0) + sign * h * size;
        if (a >= 0) slope[row * layers + a] = (slope[row * layers + a] ?? 0) - sign * byA;
        if (b >= 0) slope[row * layers + b] = (slope[row * layers + b] ?? 0) - sign * byB;
      }
    }
    for (let l = 0; l < layers; l++) {
      growth[l] = (growth[l] ?? 0) + h * (table.volumeSource[l] ?? 0);
      slope[l * layers + l] = (slope[l * layers + l] ?? 0) + 1;
    }
    eliminate(slope, growth, layers, 1);
    for (let v = 0; v < table.variables; v++) {
      const a = table.zoneA[v] ?? -1;
      const b = table.zoneB[v] ?? -1;
      const change =
        (table.slopeA[v] ?? 0) * (growth[a] ?? 0) +
        (b < 0 ? 0 : (table.slopeB[v] ?? 0) * (growth[b] ?? 0));
      const flow = (table.value[v] ?? 0) + change;
      table.value[v] = Math.min(table.most[v] ?? 0, Math.max(b < 0 ? 0 : -Infinity, flow));
    }
  };

  /** Volumes moved in the step, each from where it comes: a weir may turn round inside it. */
  const readMoved = (table: FlowTable, h: number): void => {
    if (moved.length < table.count) {
      moved = new Float64Array(2 * table.count);
      from = new Int32Array(2 * table.count);
      to = new Int32Array(2 * table.count);
    }
    inflow.fill(0);
    outflow.fill(0);
    for (let i = 0; i < table.count; i++) {
      const size = h * flowSize(table, i);
      const forward = size >= 0;
      const a = (forward ? table.from[i] : table.to[i]) ?? 0;
      const b = (forward ? table.to[i] : table.from[i]) ?? 0;
      const volume = Math.abs(size);
      from[i] = a;
      to[i] = b;
      moved[i] = volume;
      if (a < zones) outflow[a] = (outflow[a] ?? 0) + volume;
      if (b < zones) inflow[b] = (inflow[b] ?? 0) + volume;
    }
  };

  return (table, h, state, next) => {
    updateVariables(table, h);
    readMoved(table, h);
    let count = 0;
    for (let z = 0; z < zones; z++) {
      const before = z < held ? (state[z] ?? 0) : 0;
      const source = z < held ? h * (table.volumeSource[z] ?? 0) : 0;
      const full = before + (inflow[z] ?? 0) + source;
      if (z < held) {
        const left = full - (outflow[z] ?? 0);
        if (left < -NOTHING_M3) return false;
        next[z] = Math.max(0, left);
      }
      if (full <= NOTHING_M3) {
        place[z] = -1;
        if (z >= held) continue;
        next[z] = before;
        for (let c = 0; c < k; c++) next[amounts + z * k + c] = state[amounts + z * k + c] ?? 0;
        continue;
      }
      place[z] = count;
      order[count] = z;
      share[count] = full;
      count++;
    }
    matrix.fill(0, 0, count * count);
    for (let r = 0; r < count; r++) {
      const z = order[r] ?? 0;
      matrix[r * count + r] = share[r] ?? 0;
      for (let c = 0; c < k; c++) {
        right[r * k + c] =
          z < held
            ? (state[amounts + z * k + c] ?? 0) + h * (table.amountSource[z * k + c] ?? 0)
            : 0;
      }
    }
    for (let c = 0; c < k; c++) {
      next[layout.out + c] = (state[layout.out + c] ?? 0) + h * (table.out[c] ?? 0);
      next[layout.into + c] = (state[layout.into + c] ?? 0) + h * (table.into[c] ?? 0);
    }
    for (let i = 0; i < table.count; i++) {
      const b = to[i] ?? 0;
      const row = b < zones ? (place[b] ?? -1) : -1;
      if (row < 0) continue;
      const volume = moved[i] ?? 0;
      const a = from[i] ?? 0;
      if (a < zones) {
        const column = place[a] ?? -1;
        if (column < 0) continue;
        matrix[row * count + column] = (matrix[row * count + column] ?? 0) - volume;
        continue;
      }
      for (let c = 0; c < k; c++) {
        const amount = volume * (outdoor[c] ?? 0);
        right[row * k + c] = (right[row * k + c] ?? 0) + amount;
        next[layout.into + c] = (next[layout.into + c] ?? 0) + amount;
      }
    }
    eliminate(matrix, right, count, k);
    for (let r = 0; r < count; r++) {
      const z = order[r] ?? 0;
      if (z >= held) continue;
      const volume = next[z] ?? 0;
      for (let c = 0; c < k; c++) next[amounts + z * k + c] = volume * (right[r * k + c] ?? 0);
    }
    for (let i = 0; i < table.count; i++) {
      if (to[i] !== zones) continue;
      const row = place[from[i] ?? 0] ?? -1;
      if (row < 0) continue;
      for (let c = 0; c < k; c++) {
        const at = layout.out + c;
        next[at] = (next[at] ?? 0) + (moved[i] ?? 0) * (right[row * k + c] ?? 0);
      }
    }
    return true;
  };
}

/**
 * Solves A X = B in place, without exchange of rows: here the diagonal outweighs the rest of its row
 * or column, so no pivot can vanish.
 */
function eliminate(a: Float64Array, b: Float64Array, n: number, columns: number): void {
  for (let p = 0; p < n; p++) {
    const pivot = a[p * n + p] ?? 1;
    for (let r = p + 1; r < n; r++) {
      const value = a[r * n + p] ?? 0;
      if (value === 0) continue;
      const factor = value / pivot;
      for (let j = p + 1; j < n; j++) {
        a[r * n + j] = (a[r * n + j] ?? 0) - factor * (a[p * n + j] ?? 0);
      }
      for (let c = 0; c < columns; c++) {
        b[r * columns + c] = (b[r * columns + c] ?? 0) - factor * (b[p * columns + c] ?? 0);
      }
    }
  }
  for (let p = n - 1; p >= 0; p--) {
    const pivot = a[p * n + p] ?? 1;
    for (let c = 0; c < columns; c++) {
      let value = b[p * columns + c] ?? 0;
      for (let j = p + 1; j < n; j++) value -= (a[p * n + j] ?? 0) * (b[j * columns + c] ?? 0);
      b[p * columns + c] = value / pivot;
    }
  }
}
