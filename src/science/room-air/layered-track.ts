import { stiffState } from '../numerics/rosenbrock.js';
import { hermiteValue, type AcceptedStep } from '../numerics/runge-kutta.js';
import { flowSegment } from './air-flows.js';
import type { AirModel } from './air-model.js';
import { basinLevel } from './layer-geometry.js';
import type { LayerNetwork, LayerWeir } from './layer-network.js';
import type { LayerParameters } from './layer-parameters.js';
import {
  FILM_DEPTH_M,
  emptyZoneState,
  layerLayout,
  layerRates,
  layerSegment,
  readZones,
  zoneOffset,
  type LayerLayout,
} from './layered-rates.js';

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
  readonly layout: LayerLayout;
  readonly nodes: readonly LayerNode[];
  /** Largest share of any component that the run gained or lost [-]. */
  readonly balanceError: number;
}

/** Upper air below this share of its zone: the whole becomes one mixed zone [-]. */
const LEAST_UPPER_SHARE = 0.02;
const RELATIVE = 1e-5;
const ABSOLUTE = 1e-8;
const MAX_STEP_S = 120;

/**
 * The two-layer answer of all spaces over the whole time.
 *
 *   state  volume of each layer, amounts in layers and upper zones [m3 at ambient]
 *   balance layerRates
 *   step   embedded Runge-Kutta 5(4), restarted at every schedule edge; layers that can no longer
 *          be told apart, or are lighter than the air above, join it after the step
 *   limits strong turbulence gives the mixed room; none at all gives the pure pool
 */
export function layeredTrack(
  network: LayerNetwork,
  parameters: LayerParameters,
  timesS: readonly number[],
  relative: number = RELATIVE,
): LayerTrack {
  const { model } = network;
  const layout = layerLayout(network);
  const { k, layers, groups } = layout;
  let state = startState(model, network, layout);
  const nodes: LayerNode[] = [];
  const joined = new Set<number>();
  let wanted = 0;
  const edges = model.edgesS;
  for (let e = 0; e + 1 < edges.length; e++) {
    const from = edges[e] ?? 0;
    const to = edges[e + 1] ?? 0;
    const segment = layerSegment(network, flowSegment(model, from, to, 'pushOut'));
    const feeding: Feeding = {
      sources: new Set(
        network.sources
          .filter(({ plan }) => plan.startS <= from && plan.endS >= to)
          .map((source) => source.layer),
      ),
      weirs: segment.weirs,
    };
    const emit = (step: AcceptedStep): void => {
      while (wanted < timesS.length && (timesS[wanted] ?? Infinity) <= step.t1) {
        const t = timesS[wanted] ?? step.t1;
        const at = Float64Array.from(step.y0, (_, i) => hermiteValue(step, i, t));
        nodes.push(nodeOf(network, layout, at, t));
        wanted++;
      }
    };
    if (e === 0) {
      while ((timesS[wanted] ?? Infinity) <= from) {
        nodes.push(nodeOf(network, layout, state, from));
        wanted++;
      }
    }
    const absolute = (ABSOLUTE * relative) / RELATIVE;
    const options = { relative, absolute, maxStepS: MAX_STEP_S };
    const rates = layerRates(network, segment, parameters, joined);
    state = Float64Array.from(
      stiffState(rates, state, from, to, options, (step) => {
        emit(step);
        return afterJoins(network, layout, step.y1, feeding, joined, parameters.joinContrast);
      }),
    );
  }
  let worst = 0;
  for (let c = 0; c < k; c++) {
    let held = 0;
    for (let z = 0; z < layers + groups; z++) held += state[zoneOffset(layout, z) + c] ?? 0;
    const out = state[zoneOffset(layout, layers + groups) + c] ?? 0;
    const into = state[zoneOffset(layout, layers + groups + 1) + c] ?? 0;
    if (into > 0) worst = Math.max(worst, Math.abs(into - out - held) / into);
  }
  return { network, layout, nodes, balanceError: worst };
}

function startState(
  model: AirModel,
  network: LayerNetwork,
  layout: LayerLayout,
): Float64Array<ArrayBuffer> {
  const state = new Float64Array(layout.size);
  const into = zoneOffset(layout, layout.layers + layout.groups + 1);
  for (const [i, space] of model.spaces.entries()) {
    const base = zoneOffset(layout, layout.layers + (network.groupOf[i] ?? 0));
    for (const [column, one] of model.components.entries()) {
      const to =
        column < 2
          ? column
          : network.components.findIndex((c) => c.isReleased && c.gas === one.gas);
      const amount = (space.initial[column] ?? 0) * space.capacityM3;
      state[base + to] = (state[base + to] ?? 0) + amount;
      state[into + to] = (state[into + to] ?? 0) + amount;
    }
  }
  for (const [l, layer] of network.layers.entries()) {
    const film = FILM_DEPTH_M * layer.basin.areaM2;
    const from = zoneOffset(layout, layout.layers + layer.group);
    const share = film / (network.groupVolumesM3[layer.group] ?? 1);
    for (let c = 0; c < layout.k; c++) {
      const amount = (state[from + c] ?? 0) * share;
      state[zoneOffset(layout, l) + c] = amount;
      state[from + c] = (state[from + c] ?? 0) - amount;
    }
    state[l * (layout.k + 1)] = film;
  }
  return state;
}

function nodeOf(
  network: LayerNetwork,
  layout: LayerLayout,
  state: Float64Array,
  t: number,
): LayerNode {
  const zones = emptyZoneState(layout);
  readZones(network, layout, state, zones);
  const depths = Float64Array.from(network.layers, (layer, l) =>
    basinLevel(layer.basin, zones.volumes[l] ?? 0),
  );
  const { volumes, fractions, molarMasses } = zones;
  return { t, volumes, fractions: fractions.map(unit), depths, molarMasses };
}

function unit(x: number): number {
  return Math.min(1, Math.max(0, x));
}

/** What keeps a layer in being: sources into it, and edges over which another layer pours. */
interface Feeding {
  readonly sources: ReadonlySet<number>;
  readonly weirs: readonly LayerWeir[];
}

/** Whether a source or another layer still feeds a layer. */
function isFed(
  network: LayerNetwork,
  feeding: Feeding,
  volumes: Float64Array,
  layer: number,
): boolean {
  if (feeding.sources.has(layer)) return true;
  return feeding.weirs.some(({ a, b, sillA, sillB }) => {
    if (b < 0 || (a !== layer && b !== layer)) return false;
    const other = a === layer ? b : a;
    const basin = network.layers[other]?.basin;
    if (!basin) return false;
    const volume = volumes[other] ?? 0;
    if (volume <= 2 * FILM_DEPTH_M * basin.areaM2) return false;
    return basinLevel(basin, volume) > (other === a ? sillA : sillB);
  });
}

/** The state after layers have joined the air above them; undefined when none did. */
function afterJoins(
  network: LayerNetwork,
  layout: LayerLayout,
  state: Float64Array,
  feeding: Feeding,
  joined: Set<number>,
  joinContrast: number,
): Float64Array | undefined {
  const { k, layers } = layout;
  const zones = emptyZoneState(layout);
  readZones(network, layout, state, zones);
  const { volumes, fractions, molarMasses } = zones;
  let next: Float64Array | undefined;
  const join = (l: number): void => {
    const layer = network.layers[l];
    if (!layer) return;
    next ??= Float64Array.from(state);
    const from = zoneOffset(layout, l);
    const to = zoneOffset(layout, layers + layer.group);
    const film = FILM_DEPTH_M * layer.basin.areaM2;
    const volume = (volumes[layers + layer.group] ?? 0) + (volumes[l] ?? 0);
    for (let c = 0; c < k; c++) {
      const all = (next[to + c] ?? 0) + (next[from + c] ?? 0);
      next[from + c] = (all * film) / volume;
      next[to + c] = all - (all * film) / volume;
    }
    next[l * (k + 1)] = film;
  };
  for (const [l, layer] of network.layers.entries()) {
    const volume = volumes[l] ?? 0;
    const film = FILM_DEPTH_M * layer.basin.areaM2;
    if (joined.has(layer.space) || volume <= 2 * film) {
      if (volume < 0.5 * film) join(l);
      continue;
    }
    const g = layers + layer.group;
    const sign = layer.side === 'ceiling' ? -1 : 1;
    const heavier = sign * ((molarMasses[l] ?? 0) - (molarMasses[g] ?? 0));
    let contrast = 0;
    for (const [c, one] of network.components.entries()) {
      if (one.isReleased) contrast += (fractions[l * k + c] ?? 0) - (fractions[g * k + c] ?? 0);
    }
    const group = network.groupVolumesM3[layer.group] ?? 1;
    if ((volumes[g] ?? 0) < LEAST_UPPER_SHARE * group) {
      for (const [other, one] of network.layers.entries()) {
        if (one.group !== layer.group) continue;
        join(other);
        joined.add(one.space);
      }
      return next;
    }
    if (heavier < 0 || (contrast < joinContrast && !isFed(network, feeding, volumes, l))) join(l);
  }
  return next;
}
