import { NotComputable } from '../../errors.js';
import { hermiteValue, type AcceptedStep } from '../numerics/runge-kutta.js';
import { flowSegments } from './air-flows.js';
import { layerFlows, layerFlowTables, type LayerFlows } from './layer-flows.js';
import type { LayerNetwork } from './layer-network.js';
import type { LayerParameters } from './layer-parameters.js';
import { layerSegment } from './layer-segment.js';
import { layerRates } from './layer-rates.js';
import { implicitStep } from './layer-step.js';
import {
  emptyZoneState,
  readZones,
  zoneLayout,
  type ZoneLayout,
  type ZoneState,
} from './layer-zones.js';

/** One moment of the two-layer answer. */
export interface LayerNode {
  readonly t: number;
  /** Volume of each layer, then of each upper zone [m3]. */
  readonly volumes: Float64Array;
  /** Fractions, zone by zone. */
  readonly fractions: Float64Array;
  /** Level of each layer above its own base [m]. */
  readonly depths: Float64Array;
  readonly molarMasses: Float64Array;
}

export interface LayerTrack extends LayerRunReport {
  readonly network: LayerNetwork;
  readonly layout: ZoneLayout;
  readonly nodes: readonly LayerNode[];
}

/** How closely the layers are followed. */
export interface LayerAccuracy {
  /** Error a step may make, relative to what is there [-]. */
  readonly relative: number;
  /** Columns of the extrapolation: its order. */
  readonly order: 2 | 3 | 4;
}

/** Single runs: their error is far below it, as the column before the last one is held to it. */
export const FINE: LayerAccuracy = { relative: 1e-3, order: 3 };
/** The bracket without any mixing, of which only the worst is shown. */
export const MIDDLING: LayerAccuracy = { relative: 5e-3, order: 2 };
/** One of many runs of a band, whose inputs are known to a few per cent at best. */
export const COARSE: LayerAccuracy = { relative: 1e-2, order: 2 };

/** Upper air below this share of its zone: the whole becomes one mixed zone [-]. */
const LEAST_UPPER_SHARE = 0.02;
/** Depth [m] and fraction [-] that a step may miss at a relative error of 1. */
const DEPTH_SCALE_M = 0.1;
const FRACTION_SCALE = 0.01;
/** A layer thinner than this is not reported; its fraction need not be followed closely [m]. */
const THIN_M = 0.002;
const FIRST_STEP_S = 0.05;
/** After an edge of the schedule a step is no longer than this [s]. */
const RESTART_STEP_S = 30;
const MAX_STEP_S = 600;
const MAX_STEPS = 200_000;
/** Excess of the wrong sign, over the molar mass of air, at which a layer turns over [-]. */
const TURNED = 1e-6;
/** A layer below this depth has drained [m]. */
const DRAINED_M = 1e-7;

/**
 * The two-layer answer of all spaces over the whole time.
 *
 *   state  volume of each zone, amounts of its components [m3 at ambient]
 *   flows  layerFlows; a layer begins where a source or another layer feeds it
 *   step   linearly implicit Euler (implicitStep) with 1, 2, 3 .. parts, extrapolated; the difference
 *          of the last two columns steers the step. Where extrapolation would leave the range of
 *          fractions, the finest of its parts stands, which never does
 *   ends   a layer that can no longer be told from the air above, or is lighter, joins it
 *   limits strong turbulence gives the mixed room; none at all gives the pure pool
 *
 * @param network    layers and upper zones
 * @param parameters what the run assumes
 * @param timesS     rising times wanted
 * @param accuracy   how closely
 * @returns nodes at those times
 * @throws {NotComputable} when the step shrinks to nothing
 * Source: hairer-wanner-1996 (extrapolated linearly implicit Euler, IV.9). Assumes: as layerFlows.
 * Accuracy: about the relative error of `accuracy`, tested against a general integrator.
 */
export function layeredTrack(
  network: LayerNetwork,
  parameters: LayerParameters,
  timesS: readonly number[],
  accuracy: LayerAccuracy = FINE,
): LayerTrack {
  const layout = zoneLayout(network);
  const nodes: LayerNode[] = [];
  const run = followLayers(network, layout, parameters, timesS, accuracy, (t, state, zones) => {
    nodes.push({
      t,
      volumes: state.slice(0, layout.held),
      fractions: zones.fractions.slice(),
      depths: zones.depths.slice(),
      molarMasses: zones.molarMasses.slice(),
    });
  });
  return { network, layout, nodes, ...run };
}

/** What a run reports besides its nodes. */
interface LayerRunReport {
  /** Largest share of any component that the run gained or lost [-]. */
  readonly balanceError: number;
  /** Steps taken, and those taken back because they were too long. */
  readonly steps: number;
  readonly rejected: number;
}

/**
 * Follows the layers and shows each wanted time in turn; state and zones are lent for the call only.
 * The run of layeredTrack, for callers that keep less than all of it.
 */
export function followLayers(
  network: LayerNetwork,
  layout: ZoneLayout,
  parameters: LayerParameters,
  timesS: readonly number[],
  accuracy: LayerAccuracy,
  visit: (t: number, state: Float64Array, zones: ZoneState) => void,
): LayerRunReport {
  const { model } = network;
  const extrapolated = extrapolation(network, layout, accuracy);
  const state = startState(network, layout);
  const next = new Float64Array(layout.size);
  const between = new Float64Array(layout.size);
  const tables = layerFlowTables(network, layout);
  const work = emptyZoneState(layout);
  const shown = emptyZoneState(layout);
  const joined = new Set<number>();
  const edges = edgesWithWarming(network);
  const parts = flowSegments(model, 'pushOut', edges);
  let wanted = 0;
  let steps = 0;
  let rejected = 0;
  let step = FIRST_STEP_S;
  const show = (t: number, now: Float64Array, excess: Float64Array): void => {
    readZones(network, layout, excess, now, shown);
    visit(t, now, shown);
    wanted++;
  };
  for (let e = 0; e + 1 < edges.length; e++) {
    const from = edges[e] ?? 0;
    const to = edges[e + 1] ?? 0;
    const part = parts[e];
    if (!part) break;
    const segment = layerSegment(network, part);
    const { excess } = segment;
    const flows = layerFlows(network, layout, segment, parameters, joined, tables, work);
    if (e === 0) while ((timesS[wanted] ?? Infinity) <= from) show(from, state, excess);
    let t = from;
    step = Math.min(step, RESTART_STEP_S);
    while (t < to) {
      if (steps + rejected > MAX_STEPS || step < 1e-9) throw notThrough(t);
      const isLast = t + step * (1 + 1e-6) >= to;
      const h = isLast ? to - t : step;
      const error = extrapolated(flows, t, h, state, next);
      if (error > 1) {
        rejected++;
        step = h * Math.max(0.2, Math.min(0.7, 0.8 * error ** (-1 / accuracy.order)));
        continue;
      }
      steps++;
      const end = isLast ? to : t + h;
      let slopes: AcceptedStep | undefined;
      while ((timesS[wanted] ?? Infinity) <= end) {
        const at = timesS[wanted] ?? end;
        if (at === end) show(at, next, excess);
        else {
          if (accuracy.order > 2)
            slopes ??= stepWithSlopes(network, layout, flows, t, end, state, next);
          writeBetween(layout, t, end, state, next, slopes, at, between);
          show(at, between, excess);
        }
      }
      state.set(next);
      t = end;
      join(network, layout, excess, state, flows, joined, parameters.joinContrast);
      const factor = Math.min(5, 0.85 * Math.max(error, 1e-6) ** (-1 / accuracy.order));
      if (!isLast || h * factor < step) step = Math.min(MAX_STEP_S, h * Math.max(0.3, factor));
    }
  }
  return { balanceError: worstImbalance(layout, state), steps, rejected };
}

/** Edges of the schedule, and the times at which a cold gas has warmed. */
function edgesWithWarming({ model, components }: LayerNetwork): readonly number[] {
  const { durationS } = model.input;
  const warm = components.flatMap((one) => one.cold.map((spell) => spell.untilS));
  const all = new Set([...model.edgesS, ...warm.filter((t) => t < durationS)]);
  return [...all].sort((a, b) => a - b);
}

/** A step with its slopes at both ends, from which the state inside is cubic. */
function stepWithSlopes(
  network: LayerNetwork,
  layout: ZoneLayout,
  flows: LayerFlows,
  t0: number,
  t1: number,
  y0: Float64Array,
  y1: Float64Array,
): AcceptedStep {
  const rates = layerRates(network, layout, flows);
  const f0 = new Float64Array(layout.size);
  const f1 = new Float64Array(layout.size);
  rates(t0, y0, f0);
  rates(t1, y1, f1);
  return { t0, t1, y0, y1, f0, f1 };
}

/** The state inside a step: cubic where its slopes are known and tame, else straight. */
function writeBetween(
  layout: ZoneLayout,
  t0: number,
  t1: number,
  y0: Float64Array,
  y1: Float64Array,
  slopes: AcceptedStep | undefined,
  t: number,
  into: Float64Array,
): void {
  if (slopes) {
    for (let i = 0; i < into.length; i++) into[i] = hermiteValue(slopes, i, t);
    if (liesBetween(layout, y0, y1, into)) return;
  }
  const share = (t - t0) / (t1 - t0);
  for (let i = 0; i < into.length; i++) {
    const a = y0[i] ?? 0;
    into[i] = a + share * ((y1[i] ?? 0) - a);
  }
}

/** How far a state inside a step may lie beyond both its ends: of their difference, and at all [-]. */
const BEYOND_SHARE = 0.1;
const BEYOND = 1e-7;

/** Whether all volumes and fractions of a state lie about between those of two others. */
function liesBetween(
  { k, held, amounts }: ZoneLayout,
  a: Float64Array,
  b: Float64Array,
  state: Float64Array,
): boolean {
  for (let z = 0; z < held; z++) {
    const [va = 0, vb = 0, v = 0] = [a[z], b[z], state[z]];
    if (v < 0) return false;
    if (v <= 0 || va <= 0 || vb <= 0) continue;
    for (let at = amounts + z * k; at < amounts + (z + 1) * k; at++) {
      const xa = (a[at] ?? 0) / va;
      const xb = (b[at] ?? 0) / vb;
      const x = (state[at] ?? 0) / v;
      const room = BEYOND_SHARE * Math.abs(xa - xb) + BEYOND;
      if (x < Math.min(xa, xb) - room || x > Math.max(xa, xb) + room) return false;
    }
  }
  return true;
}

/** A step with its error over what is allowed; above 1 it must be taken again, shorter. */
type Extrapolated = (
  flows: LayerFlows,
  t: number,
  h: number,
  state: Float64Array,
  next: Float64Array,
) => number;

function extrapolation(
  network: LayerNetwork,
  layout: ZoneLayout,
  accuracy: LayerAccuracy,
): Extrapolated {
  const { k, layers, held, amounts, size } = layout;
  const step = implicitStep(layout, network.outdoor);
  const { order, relative } = accuracy;
  const columns = Array.from({ length: order }, () => new Float64Array(size));
  const part = new Float64Array(size);
  const column = (i: number): Float64Array => columns[i] ?? part;
  const areas = Float64Array.from(network.layers, (layer) => layer.basin.areaM2);

  /** Largest difference of two results over what is allowed; NaN where the first is out of range. */
  const difference = (a: Float64Array, b: Float64Array): number => {
    let worst = 0;
    for (let z = 0; z < held; z++) {
      const volume = a[z] ?? 0;
      const other = b[z] ?? 0;
      if (volume < 0) return Number.NaN;
      if (volume <= 0 && other <= 0) continue;
      const scale = Math.max(volume, other);
      const change = volume - other;
      let weight = 1;
      if (z < layers) {
        const area = areas[z] ?? 1;
        worst = Math.max(worst, Math.abs(change) / (scale + DEPTH_SCALE_M * area));
        weight = Math.min(1, scale / (THIN_M * area));
      }
      const from = amounts + z * k;
      for (let c = 0; c < k; c++) {
        const amount = a[from + c] ?? 0;
        if (amount < -1e-12 || amount > volume + 1e-12) return Number.NaN;
        const x = volume > 0 ? amount / volume : 0;
        const off = Math.abs(amount - (b[from + c] ?? 0) - x * change) / scale;
        worst = Math.max(worst, (weight * off) / (x + FRACTION_SCALE));
      }
    }
    return worst / relative;
  };

  return (flows, t, h, state, next) => {
    for (let j = 0; j < order; j++) {
      const parts = j + 1;
      let now = state;
      for (let i = 0; i < parts; i++) {
        const length = h / parts;
        const target = (parts - i) % 2 === 1 ? column(j) : part;
        const table =
          i === 0 ? flows.fromStart(t, length, state) : flows.at(t + i * length, length, now);
        if (!step(table, length, now, target)) return 1e6;
        now = target;
      }
      for (let i = j; i > 0; i--) {
        const weight = 1 / (parts / i - 1);
        const right = column(i);
        const left = column(i - 1);
        for (let at = 0; at < size; at++) {
          const value = right[at] ?? 0;
          left[at] = value + weight * (value - (left[at] ?? 0));
        }
      }
    }
    const error = difference(column(0), column(1));
    if (!Number.isNaN(error)) {
      next.set(column(0));
      return error;
    }
    // The finest of the parts is a mean of means: it never leaves the range.
    next.set(column(order - 1));
    return difference(next, column(order - 2));
  };
}

function startState(network: LayerNetwork, layout: ZoneLayout): Float64Array {
  const { model } = network;
  const state = new Float64Array(layout.size);
  for (const [i, space] of model.spaces.entries()) {
    const zone = layout.layers + (network.groupOf[i] ?? 0);
    state[zone] = (state[zone] ?? 0) + space.capacityM3;
    for (const [column, one] of model.components.entries()) {
      const to =
        column < 2
          ? column
          : network.components.findIndex((c) => c.isReleased && c.gas === one.gas);
      const amount = (space.initial[column] ?? 0) * space.capacityM3;
      const at = layout.amounts + zone * layout.k + to;
      state[at] = (state[at] ?? 0) + amount;
      state[layout.into + to] = (state[layout.into + to] ?? 0) + amount;
    }
  }
  return state;
}

/** Oxygen and the carbon dioxide of the air come first among the components. */
const BACKGROUND_COMPONENTS = 2;

/** Layers that have ended join the air above them, in the state itself. */
function join(
  network: LayerNetwork,
  layout: ZoneLayout,
  excess: Float64Array,
  state: Float64Array,
  flows: LayerFlows,
  joined: Set<number>,
  joinContrast: number,
): void {
  const { k, layers, amounts } = layout;
  const unite = (l: number): void => {
    const zone = layers + (network.layers[l]?.group ?? 0);
    state[zone] = (state[zone] ?? 0) + (state[l] ?? 0);
    state[l] = 0;
    for (let c = 0; c < k; c++) {
      const to = amounts + zone * k + c;
      state[to] = (state[to] ?? 0) + (state[amounts + l * k + c] ?? 0);
      state[amounts + l * k + c] = 0;
    }
  };
  for (let l = 0; l < layers; l++) {
    const layer = network.layers[l];
    const volume = state[l] ?? 0;
    if (!layer || volume <= 0) continue;
    const g = layers + layer.group;
    const above = state[g] ?? 0;
    if (above < LEAST_UPPER_SHARE * (network.groupVolumesM3[layer.group] ?? 1)) {
      for (let other = 0; other < layers; other++) {
        const one = network.layers[other];
        if (one?.group !== layer.group) continue;
        if ((state[other] ?? 0) > 0) unite(other);
        joined.add(one.space);
      }
      continue;
    }
    const isFed = flows.isFed(l);
    let heavier = 0;
    let contrast = 0;
    for (let c = 0; c < k; c++) {
      const here = (state[amounts + l * k + c] ?? 0) / volume;
      const there = (state[amounts + g * k + c] ?? 0) / above;
      heavier += (excess[c] ?? 0) * here - (network.excessAbove[c] ?? 0) * there;
      // Behind oxygen and the carbon dioxide of the air stands what is released.
      if (c >= BACKGROUND_COMPONENTS) contrast += here - there;
    }
    const wrongWay = layer.side === 'ceiling' ? heavier : -heavier;
    const isTurned = wrongWay > TURNED * network.airMolarMassKgPerMol;
    const isDrained = volume < DRAINED_M * layer.basin.areaM2;
    if (isTurned || (!isFed && (isDrained || contrast < joinContrast))) unite(l);
  }
}

/** Share of a component that came in and neither went out nor stayed, the largest [-]. */
function worstImbalance(layout: ZoneLayout, state: Float64Array): number {
  let worst = 0;
  for (let c = 0; c < layout.k; c++) {
    let inside = 0;
    for (let z = 0; z < layout.held; z++) inside += state[layout.amounts + z * layout.k + c] ?? 0;
    const out = state[layout.out + c] ?? 0;
    const into = state[layout.into + c] ?? 0;
    if (into > 0) worst = Math.max(worst, Math.abs(into - out - inside) / into);
  }
  return worst;
}

function notThrough(t: number): NotComputable {
  return new NotComputable(
    'The two-layer answer did not get through.',
    'Shorten the span or look for a flow that is out of proportion.',
    [{ path: '', problem: `stopped at ${String(t)} s` }],
  );
}
