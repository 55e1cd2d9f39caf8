import { NotComputable } from '../../errors.js';
import { hermiteValue, type AcceptedStep } from '../numerics/runge-kutta.js';
import { flowSegment } from './air-flows.js';
import { layerFlows, type LayerFlows } from './layer-flows.js';
import type { LayerNetwork } from './layer-network.js';
import type { LayerParameters } from './layer-parameters.js';
import { layerSegment } from './layer-segment.js';
import { implicitStep, layerRates, type ImplicitStep } from './layer-step.js';
import { emptyZoneState, readZones, zoneLayout, type ZoneLayout } from './layer-zones.js';

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

export interface LayerTrack {
  readonly network: LayerNetwork;
  readonly layout: ZoneLayout;
  readonly nodes: readonly LayerNode[];
  /** Largest share of any component that the run gained or lost [-]. */
  readonly balanceError: number;
  /** Steps taken, and those taken back because they were too long. */
  readonly steps: number;
  readonly rejected: number;
}

/** How closely the layers are followed. */
export interface LayerAccuracy {
  /** Error a step may make, relative to what is there [-]. */
  readonly relative: number;
  /** Columns of the extrapolation: its order. */
  readonly order: 2 | 3 | 4;
}

/** Single runs: far below what the printed digits show. */
export const FINE: LayerAccuracy = { relative: 1e-4, order: 3 };
/** One of many runs of a band, whose inputs are known to a few per cent at best. */
export const COARSE: LayerAccuracy = { relative: 2e-3, order: 2 };

/** Upper air below this share of its zone: the whole becomes one mixed zone [-]. */
const LEAST_UPPER_SHARE = 0.02;
/** Depth [m] and fraction [-] that a step may miss at a relative error of 1. */
const DEPTH_SCALE_M = 0.1;
const FRACTION_SCALE = 0.01;
/** A layer thinner than this is not reported; its fraction need not be followed closely [m]. */
const THIN_M = 0.002;
const FIRST_STEP_S = 0.05;
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
  const { model } = network;
  const layout = zoneLayout(network);
  const outdoor = Float64Array.from(network.components, (one) => one.outdoors);
  const stepper = implicitStep(layout, outdoor);
  const extrapolated = extrapolation(network, layout, stepper, accuracy);
  const state = startState(network, layout);
  const nodes: LayerNode[] = [];
  const joined = new Set<number>();
  const edges = edgesWithWarming(network);
  let wanted = 0;
  let steps = 0;
  let rejected = 0;
  let step = FIRST_STEP_S;
  const next = new Float64Array(layout.size);
  for (let e = 0; e + 1 < edges.length; e++) {
    const from = edges[e] ?? 0;
    const to = edges[e + 1] ?? 0;
    const segment = layerSegment(network, flowSegment(model, from, to, 'pushOut'));
    const flows = layerFlows(network, layout, segment, parameters, joined);
    const rates = layerRates(layout, flows, outdoor);
    if (e === 0) {
      while ((timesS[wanted] ?? Infinity) <= from) {
        nodes.push(nodeOf(network, layout, segment.excess, state, from));
        wanted++;
      }
    }
    let t = from;
    step = Math.min(step, 10);
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
      const before = wanted;
      while ((timesS[wanted] ?? Infinity) <= end) wanted++;
      if (wanted > before) {
        const between = stateBetween(rates, accuracy, t, end, state, next);
        for (let i = before; i < wanted; i++) {
          const at = timesS[i] ?? end;
          nodes.push(nodeOf(network, layout, segment.excess, at < end ? between(at) : next, at));
        }
      }
      state.set(next);
      t = end;
      join(network, layout, segment.excess, state, flows, joined, parameters.joinContrast);
      const factor = Math.min(3, 0.85 * Math.max(error, 1e-6) ** (-1 / accuracy.order));
      if (!isLast || h * factor < step) step = Math.min(MAX_STEP_S, h * Math.max(0.3, factor));
    }
  }
  return {
    network,
    layout,
    nodes,
    balanceError: worstImbalance(layout, state),
    steps,
    rejected,
  };
}

/** Edges of the schedule, and the times at which a cold gas has warmed. */
function edgesWithWarming({ model, components }: LayerNetwork): readonly number[] {
  const { durationS } = model.input;
  const warm = components.flatMap((one) => one.cold.map((spell) => spell.untilS));
  const all = new Set([...model.edgesS, ...warm.filter((t) => t < durationS)]);
  return [...all].sort((a, b) => a - b);
}

/** The state inside a step: cubic from the slopes at both ends, or straight where that will do. */
function stateBetween(
  rates: ReturnType<typeof layerRates>,
  accuracy: LayerAccuracy,
  t0: number,
  t1: number,
  y0: Float64Array,
  y1: Float64Array,
): (t: number) => Float64Array {
  if (accuracy.order === 2) {
    return (t) => {
      const share = (t - t0) / (t1 - t0);
      return y0.map((value, i) => value + share * ((y1[i] ?? 0) - value));
    };
  }
  let step: AcceptedStep | undefined;
  return (t) => {
    if (!step) {
      const f0 = new Float64Array(y0.length);
      const f1 = new Float64Array(y0.length);
      rates(t0, y0, f0);
      rates(t1, y1, f1);
      step = { t0, t1, y0, y1, f0, f1 };
    }
    const known = step;
    return y0.map((_, i) => hermiteValue(known, i, t));
  };
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
  step: ImplicitStep,
  accuracy: LayerAccuracy,
): Extrapolated {
  const { k, layers, held, amounts, size } = layout;
  const { order, relative } = accuracy;
  const columns = Array.from({ length: order }, () => new Float64Array(size));
  const part = new Float64Array(size);
  const finest = new Float64Array(size);
  const column = (i: number): Float64Array => columns[i] ?? part;

  const isInRange = (state: Float64Array): boolean => {
    for (let z = 0; z < held; z++) {
      const volume = state[z] ?? 0;
      if (volume < 0) return false;
      for (let c = 0; c < k; c++) {
        const amount = state[amounts + z * k + c] ?? 0;
        if (amount < -1e-12 || amount > volume + 1e-12) return false;
      }
    }
    return true;
  };
  /** Largest difference of two results over what is allowed. */
  const difference = (a: Float64Array, b: Float64Array): number => {
    let worst = 0;
    for (let z = 0; z < held; z++) {
      const volume = Math.max(a[z] ?? 0, b[z] ?? 0);
      if (volume <= 0) continue;
      const change = (a[z] ?? 0) - (b[z] ?? 0);
      let weight = 1;
      if (z < layers) {
        const area = network.layers[z]?.basin.areaM2 ?? 1;
        worst = Math.max(worst, Math.abs(change) / (relative * (volume + DEPTH_SCALE_M * area)));
        weight = Math.min(1, volume / (THIN_M * area));
      }
      for (let c = 0; c < k; c++) {
        const amount = a[amounts + z * k + c] ?? 0;
        const x = amount / Math.max(a[z] ?? 0, 1e-300);
        const off = Math.abs(amount - (b[amounts + z * k + c] ?? 0) - x * change) / volume;
        worst = Math.max(worst, (weight * off) / (relative * (x + FRACTION_SCALE)));
      }
    }
    return worst;
  };

  return (flows, t, h, state, next) => {
    for (let j = 0; j < order; j++) {
      const parts = j + 1;
      let now = state;
      for (let i = 0; i < parts; i++) {
        const length = h / parts;
        const table = flows.at(t + i * length, length, now);
        const target = i % 2 === parts % 2 ? part : finest;
        if (!step(table, length, now, target)) return 1e6;
        now = target;
      }
      if (now !== finest) finest.set(now);
      // Aitken-Neville: from the right, so that one row of columns is enough.
      let left = Float64Array.from(finest);
      for (let i = 0; i < j; i++) {
        const old = Float64Array.from(column(i));
        const weight = 1 / (parts / (parts - i - 1) - 1);
        column(i).set(left);
        left = left.map((value, at) => value + weight * (value - (old[at] ?? 0)));
      }
      column(j).set(left);
    }
    next.set(column(order - 1));
    const error = difference(next, column(order - 2));
    if (isInRange(next)) return error;
    next.set(finest);
    return difference(finest, column(0)) * 0.5 + error * 0.5;
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

function nodeOf(
  network: LayerNetwork,
  layout: ZoneLayout,
  excess: Float64Array,
  state: Float64Array,
  t: number,
): LayerNode {
  const zones = emptyZoneState(layout);
  readZones(network, layout, excess, state, zones);
  const { fractions, molarMasses, depths } = zones;
  for (let i = 0; i < fractions.length; i++) {
    fractions[i] = Math.min(1, Math.max(0, fractions[i] ?? 0));
  }
  return { t, volumes: state.slice(0, layout.held), fractions, depths, molarMasses };
}

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
      for (const [other, one] of network.layers.entries()) {
        if (one.group !== layer.group) continue;
        if ((state[other] ?? 0) > 0) unite(other);
        joined.add(one.space);
      }
      continue;
    }
    const isFed = flows.isFed(l);
    let heavier = 0;
    let contrast = 0;
    for (const [c, one] of network.components.entries()) {
      const here = (state[amounts + l * k + c] ?? 0) / volume;
      const there = (state[amounts + g * k + c] ?? 0) / above;
      heavier += (excess[c] ?? 0) * here - one.excessKgPerMol * there;
      if (one.isReleased) contrast += here - there;
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
