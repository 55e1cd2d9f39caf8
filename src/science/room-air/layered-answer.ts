import type { FlatTrack } from './answer-track.js';
import type { SpaceLayers } from './air-result.js';
import type { LayerCase, LayerMouth } from './layer-case.js';
import type { LayerParameters } from './layer-parameters.js';
import type { LayerNode, LayerTrack } from './layered-track.js';
import { mouthReader } from './mouth-reader.js';

/** Oxygen and gases of one zone of a node, in the order of an answer. */
function zoneValues(one: LayerCase, node: LayerNode, zone: number): Float64Array {
  const k = one.network.components.length;
  const values = new Float64Array(one.columnsOf.length + 1);
  values[0] = node.fractions[zone * k] ?? 0;
  for (const [at, columns] of one.columnsOf.entries()) {
    let sum = 0;
    for (const column of columns) sum += node.fractions[zone * k + column] ?? 0;
    values[at + 1] = Math.min(1, sum);
  }
  return values;
}

/**
 * What the two-layer answer shows at a mouth (mouthReader), at the nodes of a run [-].
 *
 * @param bounds oxygen, then gases of the bound at the mouth, row by row at the same nodes
 */
export function layeredRows(
  one: LayerCase,
  track: LayerTrack,
  at: LayerMouth,
  parameters: LayerParameters,
  bounds: Float64Array,
): FlatTrack {
  const read = mouthReader(one, at, parameters);
  const width = one.columnsOf.length + 1;
  const values = new Float64Array(track.nodes.length * width);
  for (const [i, node] of track.nodes.entries()) {
    read(node.t, node, bounds, i * width, values, i * width);
  }
  const timesS = Float64Array.from(track.nodes, (node) => node.t);
  return {
    timesS,
    firstNode: [0, timesS.length],
    width,
    values,
    slopes: undefined,
    valuesAt: (_, t) => between(timesS, values, width, t),
  };
}

/** Straight between the nodes: the layered answer is kept at the nodes only. */
function between(
  timesS: Float64Array,
  values: Float64Array,
  width: number,
  t: number,
): Float64Array {
  let low = 0;
  let high = timesS.length - 1;
  while (low < high) {
    const middle = (low + high + 1) >> 1;
    if ((timesS[middle] ?? Infinity) <= t) low = middle;
    else high = middle - 1;
  }
  const from = timesS[low] ?? t;
  const to = timesS[low + 1] ?? from;
  const share = to > from ? (t - from) / (to - from) : 0;
  return Float64Array.from({ length: width }, (_, q) => {
    const before = values[low * width + q] ?? 0;
    return before + share * ((values[(low + 1) * width + q] ?? before) - before);
  });
}

/** Depths and fractions of the layers of one space at the output times. */
export function spaceLayers(
  one: LayerCase,
  track: LayerTrack,
  space: number,
  gases: readonly string[],
  timesS: readonly number[],
): SpaceLayers {
  const { network } = one;
  const upper = network.layers.length + (network.groupOf[space] ?? 0);
  const zoneOf = (side: 'floor' | 'ceiling'): number =>
    network.layers.findIndex((layer) => layer.space === space && layer.side === side);
  const nodes: LayerNode[] = [];
  let at = 0;
  for (const t of timesS) {
    while ((track.nodes[at + 1]?.t ?? Infinity) <= t) at++;
    const node = track.nodes[at];
    if (node) nodes.push(node);
  }
  const fractionsIn = (zone: number) => {
    const rows = nodes.map((node) => {
      const empty = zone < 0 || (zone !== upper && (node.depths[zone] ?? 0) <= 0);
      return zoneValues(one, node, empty ? upper : zone);
    });
    return {
      oxygenFraction: rows.map((row) => row[0] ?? 0),
      gasFraction: Object.fromEntries(
        gases.map((gas, q) => [gas, rows.map((row) => row[q + 1] ?? 0)]),
      ),
    };
  };
  const depthOf = (zone: number): number[] => nodes.map((node) => node.depths[zone] ?? 0);
  const floor = zoneOf('floor');
  const ceiling = zoneOf('ceiling');
  return {
    floorLayerDepthM: depthOf(floor),
    ceilingLayerDepthM: depthOf(ceiling),
    floorLayer: fractionsIn(floor),
    middle: fractionsIn(upper),
    ceilingLayer: fractionsIn(ceiling),
  };
}
