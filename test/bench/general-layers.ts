import { airModel } from '../../src/science/room-air/air-model.js';
import type { AirGasTable } from '../../src/science/room-air/air-gases.js';
import type { AirInput } from '../../src/science/room-air/air-input.js';
import { flowSegment } from '../../src/science/room-air/air-flows.js';
import { layerFlows, layerFlowTables } from '../../src/science/room-air/layer-flows.js';
import { layerRates } from '../../src/science/room-air/layer-rates.js';
import { layerSegment } from '../../src/science/room-air/layer-segment.js';
import { usualLayers } from '../../src/science/room-air/layer-parameters.js';
import { emptyZoneState, zoneLayout } from '../../src/science/room-air/layer-zones.js';
import { layerCase } from '../../src/science/room-air/layer-case.js';
import type { LayerAccuracy } from '../../src/science/room-air/layer-extrapolation.js';
import { followLayers } from '../../src/science/room-air/layered-track.js';
import { generalSolution } from '../support/general-solver.js';

const THIN_M = 0.002;

/** The layers are there by then, and no contender meets a space without any [s]. */
const FROM_S = 30;

/**
 * The same two-layer equations for both solvers, from 30 s to the end of the input: the project's own
 * steps, and the derivative of the same flows handed to the general-purpose package.
 */
export function layerContest(input: AirInput, gases: AirGasTable) {
  const { network } = layerCase(airModel(input, gases), gases);
  const layout = zoneLayout(network);
  const parameters = usualLayers();
  const edges = [...new Set([FROM_S, ...network.model.edgesS.filter((t) => t > FROM_S)])];
  const endS = input.durationS;
  const own = (accuracy: LayerAccuracy, atS = endS): Float64Array => {
    let found = new Float64Array(0);
    followLayers(network, layout, parameters, [atS], accuracy, (_, state) => {
      found = Float64Array.from(state);
    });
    return found;
  };
  const start = own({ relative: 1e-7, order: 4 }, FROM_S);
  const general = (relative: number): Float64Array => {
    let state: readonly number[] = [...start];
    const y = new Float64Array(layout.size);
    const out = new Float64Array(layout.size);
    for (const [e, from] of edges.entries()) {
      const to = edges[e + 1];
      if (to === undefined) break;
      const segment = layerSegment(network, flowSegment(network.model, from, to, 'pushOut'));
      const tables = layerFlowTables(network, layout);
      const work = emptyZoneState(layout);
      const joined = new Set<number>();
      const flows = layerFlows(network, layout, segment, parameters, joined, tables, work);
      const rates = layerRates(network, layout, flows);
      const f = (t: number, now: readonly number[]): number[] => {
        y.set(now);
        rates(t, y, out);
        return [...out];
      };
      state = generalSolution(f, state, from, to, { relative, absolute: 1e-3 * relative }).y;
    }
    return Float64Array.from(state);
  };
  /** Largest difference of two states, of the largest amount of its kind. */
  const difference = (a: Float64Array, b: Float64Array): number => {
    const held = a.subarray(0, layout.out);
    const most = held.reduce((sum, value) => Math.max(sum, Math.abs(value)), 0);
    let worst = 0;
    for (let z = 0; z < layout.layers; z++) {
      // A layer too thin to be reported counts as one of 2 mm.
      const thin = THIN_M * (network.layers[z]?.basin.areaM2 ?? 1);
      const volume = Math.max(thin, b[z] ?? most);
      worst = Math.max(worst, Math.abs((a[z] ?? NaN) - (b[z] ?? NaN)) / volume);
      for (let c = 0; c < layout.k; c++) {
        const at = layout.amounts + z * layout.k + c;
        worst = Math.max(worst, Math.abs((a[at] ?? NaN) - (b[at] ?? NaN)) / volume);
      }
    }
    return worst;
  };
  return { own, general, difference };
}
