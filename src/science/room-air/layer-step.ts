import type { FlowTable } from './flow-table.js';
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
  /** Place of a layer among those that drive a variable, -1 for the others. */
  const driver = new Int32Array(layers).fill(-1);
  const drivers = new Int32Array(layers);
  const matrix = new Float64Array(zones * zones);
  const right = new Float64Array(zones * k);
  const order = new Int32Array(zones);
  const filled = new Int32Array(zones);
  const outflow = new Float64Array(zones);
  const inflow = new Float64Array(zones);
  const arrived = new Float64Array(zones);
  const departed = new Float64Array(zones);
  const airParts = Int32Array.from(outdoor.keys()).filter((c) => (outdoor[c] ?? 0) !== 0);

  /** Brings the variables to where they are at the end of the step, by the layers that drive them. */
  const updateVariables = (table: FlowTable, h: number): void => {
    const { variables, zoneA, zoneB, slopeA, slopeB, start, value } = table;
    if (variables === 0) return;
    let n = 0;
    const drive = (layer: number): void => {
      if (layer < 0 || (driver[layer] ?? 0) >= 0) return;
      driver[layer] = n;
      drivers[n++] = layer;
    };
    for (let v = 0; v < variables; v++) {
      drive(zoneA[v] ?? -1);
      drive(zoneB[v] ?? -1);
    }
    slope.fill(0, 0, n * n);
    for (let r = 0; r < n; r++) {
      growth[r] = h * (table.volumeSource[drivers[r] ?? 0] ?? 0);
      slope[r * n + r] = 1;
    }
    for (let i = 0; i < table.count; i++) {
      const from = table.from[i] ?? 0;
      const to = table.to[i] ?? 0;
      const leaving = from < layers ? (driver[from] ?? -1) : -1;
      const entering = to < layers ? (driver[to] ?? -1) : -1;
      if (leaving < 0 && entering < 0) continue;
      const v = table.variable[i] ?? -1;
      const factor = v < 0 ? 0 : h * (table.factor[i] ?? 0);
      const size = h * (table.base[i] ?? 0) + (v < 0 ? 0 : factor * (start[v] ?? 0));
      if (leaving >= 0) growth[leaving] = (growth[leaving] ?? 0) - size;
      if (entering >= 0) growth[entering] = (growth[entering] ?? 0) + size;
      if (v < 0) continue;
      const a = driver[zoneA[v] ?? 0] ?? 0;
      const byA = factor * (slopeA[v] ?? 0);
      const zone = zoneB[v] ?? -1;
      const b = zone < 0 ? a : (driver[zone] ?? 0);
      const byB = zone < 0 ? 0 : factor * (slopeB[v] ?? 0);
      if (leaving >= 0) {
        slope[leaving * n + a] = (slope[leaving * n + a] ?? 0) + byA;
        slope[leaving * n + b] = (slope[leaving * n + b] ?? 0) + byB;
      }
      if (entering >= 0) {
        slope[entering * n + a] = (slope[entering * n + a] ?? 0) - byA;
        slope[entering * n + b] = (slope[entering * n + b] ?? 0) - byB;
      }
    }
    for (let r = 0; r < n; r++) order[r] = r;
    eliminate(slope, growth, n, n, 1, order, filled);
    for (let v = 0; v < variables; v++) {
      const zone = zoneB[v] ?? -1;
      let flow = (start[v] ?? 0) + (slopeA[v] ?? 0) * (growth[driver[zoneA[v] ?? 0] ?? 0] ?? 0);
      if (zone >= 0) flow += (slopeB[v] ?? 0) * (growth[driver[zone] ?? 0] ?? 0);
      // Only a weir between two layers may turn round inside a step.
      if (zone < 0 && flow < 0) flow = 0;
      const most = table.most[v] ?? 0;
      value[v] = flow > most ? most : flow;
    }
    for (let r = 0; r < n; r++) driver[drivers[r] ?? 0] = -1;
  };

  /** Volumes moved in the step, each from where it comes: a weir may turn round inside it. */
  const readMoved = (table: FlowTable, h: number): void => {
    inflow.fill(0);
    outflow.fill(0);
    arrived.fill(0);
    departed.fill(0);
    matrix.fill(0);
    for (let i = 0; i < table.count; i++) {
      let from = table.from[i] ?? 0;
      let to = table.to[i] ?? 0;
      const v = table.variable[i] ?? -1;
      let size = table.base[i] ?? 0;
      if (v >= 0) size += (table.factor[i] ?? 0) * (table.value[v] ?? 0);
      if (size < 0) {
        size = -size;
        const turned = from;
        from = to;
        to = turned;
      }
      const volume = h * size;
      if (from < zones) outflow[from] = (outflow[from] ?? 0) + volume;
      else arrived[to] = (arrived[to] ?? 0) + volume;
      if (to >= zones) {
        departed[from] = (departed[from] ?? 0) + volume;
        continue;
      }
      inflow[to] = (inflow[to] ?? 0) + volume;
      if (from < zones) {
        const at = to * zones + from;
        matrix[at] = (matrix[at] ?? 0) - volume;
      }
    }
  };

  return (table, h, state, next) => {
    updateVariables(table, h);
    readMoved(table, h);
    let count = 0;
    for (let z = 0; z < zones; z++) {
      let full = inflow[z] ?? 0;
      if (z < held) {
        full += (state[z] ?? 0) + h * (table.volumeSource[z] ?? 0);
        const left = full - (outflow[z] ?? 0);
        if (left < -NOTHING_M3) return false;
        next[z] = left > 0 ? left : 0;
      }
      if (full > NOTHING_M3) {
        order[count++] = z;
        matrix[z * zones + z] = full;
      } else if (z < held) {
        next[z] = state[z] ?? 0;
        const from = amounts + z * k;
        for (let at = from; at < from + k; at++) next[at] = state[at] ?? 0;
      }
    }
    for (let c = 0; c < k; c++) {
      next[layout.out + c] = (state[layout.out + c] ?? 0) + h * (table.out[c] ?? 0);
      next[layout.into + c] = (state[layout.into + c] ?? 0) + h * (table.into[c] ?? 0);
    }
    for (let r = 0; r < count; r++) {
      const z = order[r] ?? 0;
      const row = z * k;
      if (z < held) {
        for (let at = row; at < row + k; at++) {
          right[at] = (state[amounts + at] ?? 0) + h * (table.amountSource[at] ?? 0);
        }
      } else right.fill(0, row, row + k);
      const fresh = arrived[z] ?? 0;
      if (fresh === 0) continue;
      for (const c of airParts) {
        const amount = fresh * (outdoor[c] ?? 0);
        right[row + c] = (right[row + c] ?? 0) + amount;
        next[layout.into + c] = (next[layout.into + c] ?? 0) + amount;
      }
    }
    eliminate(matrix, right, count, zones, k, order, filled);
    for (let r = 0; r < count; r++) {
      const z = order[r] ?? 0;
      const row = z * k;
      if (z < held) {
        const volume = next[z] ?? 0;
        for (let at = row; at < row + k; at++) next[amounts + at] = volume * (right[at] ?? 0);
      }
      const gone = departed[z] ?? 0;
      if (gone === 0) continue;
      for (let c = 0; c < k; c++) {
        next[layout.out + c] = (next[layout.out + c] ?? 0) + gone * (right[row + c] ?? 0);
      }
    }
    return true;
  };
}

/**
 * Solves A X = B in place for the rows and columns of `order`, without exchange of rows: here the
 * diagonal outweighs the rest of its row or column, so no pivot can vanish. Most entries are 0: layers
 * touch the air above them and a neighbour or two, so what is filled of a row is listed first.
 *
 * @param a       matrix, `stride` entries a row
 * @param b       right sides, `width` a row; the solution when it returns
 * @param n       number of rows
 * @param stride  entries of the matrix from row to row
 * @param width   number of right sides
 * @param order   the rows in the order of elimination
 * @param filled  work space of n entries
 */
function eliminate(
  a: Float64Array,
  b: Float64Array,
  n: number,
  stride: number,
  width: number,
  order: Int32Array,
  filled: Int32Array,
): void {
  for (let p = 0; p < n; p++) {
    const own = order[p] ?? 0;
    const pivot = a[own * stride + own] ?? 1;
    let entries = -1;
    for (let r = p + 1; r < n; r++) {
      const row = order[r] ?? 0;
      const value = a[row * stride + own] ?? 0;
      if (value === 0) continue;
      if (entries < 0) {
        entries = 0;
        for (let j = p + 1; j < n; j++) {
          const column = order[j] ?? 0;
          if (a[own * stride + column] !== 0) filled[entries++] = column;
        }
      }
      const factor = value / pivot;
      for (let j = 0; j < entries; j++) {
        const column = filled[j] ?? 0;
        const at = row * stride + column;
        a[at] = (a[at] ?? 0) - factor * (a[own * stride + column] ?? 0);
      }
      for (let c = 0; c < width; c++) {
        const at = row * width + c;
        b[at] = (b[at] ?? 0) - factor * (b[own * width + c] ?? 0);
      }
    }
  }
  for (let p = n - 1; p >= 0; p--) {
    const own = order[p] ?? 0;
    for (let j = p + 1; j < n; j++) {
      const column = order[j] ?? 0;
      const value = a[own * stride + column] ?? 0;
      if (value === 0) continue;
      for (let c = 0; c < width; c++) {
        const at = own * width + c;
        b[at] = (b[at] ?? 0) - value * (b[column * width + c] ?? 0);
      }
    }
    const pivot = a[own * stride + own] ?? 1;
    for (let c = 0; c < width; c++) {
      const at = own * width + c;
      b[at] = (b[at] ?? 0) / pivot;
    }
  }
}
