import type { AnswerTrack, QuantityRow } from './answer-track.js';
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

/** What the two-layer answer shows at a mouth (mouthReader), at the nodes of a run [-]. */
export function layeredRows(
  one: LayerCase,
  track: LayerTrack,
  at: LayerMouth,
  parameters: LayerParameters,
  bounds: readonly QuantityRow[],
): AnswerTrack {
  const read = mouthReader(one, at, parameters);
  const unbounded = new Float64Array(one.columnsOf.length + 1).fill(1);
  unbounded[0] = 0;
  let row = 0;
  const rows = track.nodes.map((node): QuantityRow => {
    while ((bounds[row + 1]?.t ?? Infinity) <= node.t) row++;
    const values = new Float64Array(unbounded.length);
    read(node.t, node, bounds[row]?.values ?? unbounded, 0, values, 0);
    return { t: node.t, values, slopes: undefined };
  });
  return { pieces: [{ rows, valuesAt: (t) => between(rows, t) }] };
}

/** Straight between the nodes: the layered answer is kept at the nodes only. */
function between(rows: readonly QuantityRow[], t: number): Float64Array {
  let low = 0;
  let high = rows.length - 1;
  while (low < high) {
    const middle = (low + high + 1) >> 1;
    if ((rows[middle]?.t ?? Infinity) <= t) low = middle;
    else high = middle - 1;
  }
  const before = rows[low];
  const after = rows[low + 1] ?? before;
  if (!before || !after) return new Float64Array(0);
  const span = after.t - before.t;
  const share = span > 0 ? (t - before.t) / span : 0;
  return before.values.map((value, i) => value + share * ((after.values[i] ?? value) - value));
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
