import { flowSize } from './flow-table.js';
import type { LayerFlows } from './layer-flows.js';
import type { LayerNetwork } from './layer-network.js';
import { emptyZoneState, readZones, type ZoneLayout } from './layer-zones.js';

/**
 * Rates of the two-layer model: writes d(state)/dt.
 *
 * @param network layers and upper zones
 * @param layout layout of the state
 * @param flows  flows of the segment
 * @returns a derivative for a general integrator; units mix without delay
 * Source: own-room-air. Assumes: as layerFlows. Accuracy: exact for the equations.
 */
export function layerRates(
  network: LayerNetwork,
  layout: ZoneLayout,
  flows: LayerFlows,
): (t: number, state: Float64Array, out: Float64Array) => void {
  const { k, held, zones } = layout;
  const { outdoor, excessAbove } = network;
  const here = emptyZoneState(layout);
  const mixed = new Float64Array((zones - held) * k);
  const through = new Float64Array(zones - held);
  return (t, state, out) => {
    readZones(network, layout, excessAbove, state, here);
    const table = flows.at(t, 0, state);
    out.fill(0);
    mixed.fill(0);
    through.fill(0);
    for (let i = 0; i < table.count; i++) {
      const to = (table.to[i] ?? 0) - held;
      const from = table.from[i] ?? 0;
      if (to < 0 || to >= zones - held) continue;
      const size = flowSize(table, i);
      through[to] = (through[to] ?? 0) + size;
      for (let c = 0; c < k; c++) {
        mixed[to * k + c] = (mixed[to * k + c] ?? 0) + size * (here.fractions[from * k + c] ?? 0);
      }
    }
    const add = (at: number, value: number): void => {
      out[at] = (out[at] ?? 0) + value;
    };
    for (let i = 0; i < table.count; i++) {
      const from = table.from[i] ?? 0;
      const to = table.to[i] ?? 0;
      const size = flowSize(table, i);
      if (from < held) add(from, -size);
      if (to < held) add(to, size);
      for (let c = 0; c < k; c++) {
        const x =
          from < held
            ? (here.fractions[from * k + c] ?? 0)
            : from < zones
              ? (mixed[(from - held) * k + c] ?? 0) / (through[from - held] ?? 1)
              : (outdoor[c] ?? 0);
        if (from < held) add(layout.amounts + from * k + c, -size * x);
        else if (from === zones) add(layout.into + c, size * x);
        if (to < held) add(layout.amounts + to * k + c, size * x);
        else if (to === zones) add(layout.out + c, size * x);
      }
    }
    for (let z = 0; z < held; z++) {
      add(z, table.volumeSource[z] ?? 0);
      for (let c = 0; c < k; c++) {
        add(layout.amounts + z * k + c, table.amountSource[z * k + c] ?? 0);
      }
    }
    for (let c = 0; c < k; c++) {
      add(layout.out + c, table.out[c] ?? 0);
      add(layout.into + c, table.into[c] ?? 0);
    }
  };
}
