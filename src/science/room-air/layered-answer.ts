import type { AirGasTable } from './air-gases.js';
import { GRAVITY_M_PER_S2 } from './air-constants.js';
import { spaceAt, type AirModel } from './air-model.js';
import type { AnswerTrack } from './answer-track.js';
import type { SpaceLayers } from './air-result.js';
import { liftsToMouth } from './body-heat.js';
import { layerNetwork, withoutPulses, type LayerNetwork } from './layer-network.js';
import type { LayerParameters } from './layer-parameters.js';
import type { LayerNode, LayerTrack } from './layered-track.js';
import type { QuantityRow } from './mixed-values.js';
import { reportedFraction, smearHeight } from './smear.js';
import { boundReleases, firstPassEnd, type BoundMouth, type BoundRelease } from './zone-bound.js';

/** Depth below which a layer is not reported [m]. */
const LEAST_REPORTED_M = 0.002;

/** The layers of a model, ready to be run with several sets of parameters. */
export interface LayerCase {
  readonly network: LayerNetwork;
  readonly releases: readonly BoundRelease[];
  /** By gas of the model: the components that make it up. */
  readonly columnsOf: readonly (readonly number[])[];
}

/** The layers of a model, with releases at once spread over the seconds a current needs to form. */
export function layerCase(model: AirModel, gases: AirGasTable): LayerCase {
  const continuous = withoutPulses(model);
  const releases = boundReleases(continuous);
  const network = layerNetwork(continuous, gases, releases);
  return {
    network,
    releases,
    columnsOf: model.gases.map((gas) =>
      network.components.flatMap((one, c) =>
        gas === 'O2' ? (c === 0 ? [0] : []) : one.gas === gas && c !== 0 ? [c] : [],
      ),
    ),
  };
}

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

/** A mouth as the layers see it. */
export interface LayerMouth {
  readonly mouth: BoundMouth;
  /** Mouth and the own floor above the lowest floor of the space [m]. */
  readonly levelM: number;
  readonly floorM: number;
}

/** A mouth above its own floor, referred to the lowest floor of its space. */
export function layerMouth(model: AirModel, mouth: BoundMouth, floorLevelM?: number): LayerMouth {
  const { curve } = spaceAt(model, mouth.space);
  const floorM = (floorLevelM ?? curve.floorLevelM) - curve.floorLevelM;
  return { mouth, floorM, levelM: floorM + mouth.heightM };
}

/**
 * What the two-layer answer shows at a mouth, at the times of the bound [-].
 *
 *   max(xu, min(xl, bound)) where a layer with its smear reaches the mouth, else xu; a weak layer
 *   is breathed at any height (liftsToMouth); while the first pass lasts the bound does not cut
 */
export function layeredRows(
  one: LayerCase,
  track: LayerTrack,
  at: LayerMouth,
  parameters: LayerParameters,
  bounds: readonly QuantityRow[],
): AnswerTrack {
  const { network, releases } = one;
  const { space } = at.mouth;
  const { curve } = spaceAt(network.model, space);
  const upper = network.layers.length + (network.groupOf[space] ?? 0);
  const here = network.layers.flatMap((layer, l) => (layer.space === space ? [{ layer, l }] : []));
  const passes = releases.map((release) => ({
    from: Math.max(release.plan.startS, release.reachS[space] ?? Infinity),
    until: firstPassEnd(release, curve.floorAreaM2),
    side: release.gathering === 'below' ? 'floor' : 'ceiling',
  }));
  let row = 0;
  const rows = track.nodes.map((node): QuantityRow => {
    while ((bounds[row + 1]?.t ?? Infinity) <= node.t) row++;
    const bound = bounds[row]?.values;
    const values = zoneValues(one, node, upper);
    const above = Float64Array.from(values);
    for (const { layer, l } of here) {
      const depth = node.depths[l] ?? 0;
      if (depth < LEAST_REPORTED_M) continue;
      const started = passes.filter((pass) => pass.side === layer.side && pass.from <= node.t);
      const first = Math.min(...started.map((pass) => pass.from));
      const isFirstPass = started.some((pass) => pass.until > node.t);
      const smear = smearHeight(
        layer.diffusivityM2PerS,
        Number.isFinite(first) ? node.t - first : 0,
        parameters.smearM,
        isFirstPass ? depth : 0,
      );
      const sign = layer.side === 'floor' ? 1 : -1;
      const gPrime =
        (GRAVITY_M_PER_S2 * sign * ((node.molarMasses[l] ?? 0) - (node.molarMasses[upper] ?? 0))) /
        network.airMolarMassKgPerMol;
      const distance = layer.side === 'floor' ? at.levelM : curve.heightM - at.levelM;
      const lifted = layer.side === 'floor' && liftsToMouth(gPrime, depth - at.floorM);
      const inLayer = zoneValues(one, node, l);
      for (let q = 0; q < values.length; q++) {
        const xl = inLayer[q] ?? 0;
        const xu = above[q] ?? 0;
        const limit = isFirstPass || lifted ? undefined : bound?.[q];
        const reach = lifted ? Infinity : depth;
        if (q === 0) {
          const low = limit === undefined ? xl : Math.max(xl, limit);
          if (reach + smear >= distance) values[0] = Math.min(values[0] ?? 1, low);
        } else {
          values[q] = Math.max(
            values[q] ?? 0,
            reportedFraction(xl, xu, limit ?? 1, reach, smear, distance),
          );
        }
      }
    }
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
