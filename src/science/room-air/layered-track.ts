import { NotComputable } from '../../errors.js';
import { hermiteValue, type AcceptedStep } from '../numerics/runge-kutta.js';
import { flowSegments } from './air-flows.js';
import { layerFlows, layerFlowTables, type LayerFlows } from './layer-flows.js';
import { extrapolatedStep, FINE, type LayerAccuracy } from './layer-extrapolation.js';
import { joinEndedLayers } from './layer-ends.js';
import type { LayerNetwork } from './layer-network.js';
import type { LayerParameters } from './layer-parameters.js';
import { layerSegment } from './layer-segment.js';
import { layerRates } from './layer-rates.js';
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

const FIRST_STEP_S = 0.05;
/** After an edge of the schedule a step is no longer than this [s]. */
const RESTART_STEP_S = 30;
const MAX_STEP_S = 600;
const MAX_STEPS = 200_000;
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
  const extrapolated = extrapolatedStep(network, layout, accuracy);
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
      joinEndedLayers(network, layout, excess, state, flows, joined, parameters.joinContrast);
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
