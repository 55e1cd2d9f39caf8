import { isActive, type FlowSegment } from './air-flows.js';
import {
  layerUnits,
  type LayerNetwork,
  type LayerSource,
  type LayerWeir,
} from './layer-network.js';
import { breathFlows, type BreathFlows } from './occupant.js';

/** What the flows of one segment read: everything that does not change inside it. */
export interface LayerSegment {
  readonly flows: FlowSegment;
  readonly units: ReturnType<typeof layerUnits>;
  readonly weirs: readonly LayerWeir[];
  readonly sources: readonly LayerSource[];
  readonly transfers: readonly {
    readonly from: number;
    readonly to: number;
    readonly flow: number;
  }[];
  readonly breath: readonly (BreathFlows & {
    readonly space: number;
    readonly heightM: number | undefined;
  })[];
  /** Infiltration into each space [m3/s]. */
  readonly infiltration: Float64Array;
  /** By component: excess over the molar mass of air in a layer [kg/mol]. */
  readonly excess: Float64Array;
}

/** What the flows of the layers need of one flow segment, schedules taken at its middle. */
export function layerSegment(network: LayerNetwork, flows: FlowSegment): LayerSegment {
  const { model } = network;
  const t = 0.5 * (flows.fromS + flows.toS);
  const units = layerUnits(model, t);
  const infiltration = Float64Array.from(flows.freshM3PerS);
  for (const supply of units.supplies) {
    infiltration[supply.space] = (infiltration[supply.space] ?? 0) - supply.freshM3PerS;
  }
  const place = (id: string): number => (id === 'outside' ? -1 : (model.indexOf.get(id) ?? -1));
  const transfers = (model.input.transfers ?? [])
    .filter((one) => isActive(one, t))
    .map((one) => ({ from: place(one.from), to: place(one.to), flow: one.flowM3PerS }));
  for (const { from, to, flow } of transfers) {
    if (from < 0 && to >= 0) infiltration[to] = (infiltration[to] ?? 0) - flow;
  }
  const breath = (model.input.occupants ?? [])
    .filter((one) => isActive(one, t))
    .map((one) => ({
      space: place(one.space),
      heightM: one.heightM,
      ...breathFlows(one, model.siteFactor),
    }));
  return {
    flows,
    units,
    weirs: network.weirs.filter((weir) => isActive(weir.opening, t)),
    sources: network.sources.filter(
      ({ plan }) => plan.startS <= flows.fromS && plan.endS >= flows.toS,
    ),
    transfers,
    breath,
    infiltration: infiltration.map((flow) => Math.max(0, flow)),
    excess: Float64Array.from(network.components, (one) =>
      one.cold
        .filter(({ fromS, untilS }) => t >= fromS && t < untilS)
        .reduce((most, spell) => Math.max(most, spell.excessKgPerMol), one.excessKgPerMol),
    ),
  };
}
