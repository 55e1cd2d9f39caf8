import type { OpenLink } from './air-flows.js';
import type { FlowTable } from './flow-table.js';
import type { LayerIntake, LayerNetwork, LayerSource, LayerSupply } from './layer-network.js';
import type { LayerSegment } from './layer-segment.js';
import type { ZoneLayout } from './layer-zones.js';

/** Air that leaves a space for a zone, without a unit. */
export interface LayerSurplus {
  readonly space: number;
  readonly to: number;
  readonly flow: number;
}

/** What flows the same at every state of one segment, and what is left to be asked of the state. */
export interface FixedFlows {
  /** From, to and size of the flows between zones, merged where they join the same two. */
  readonly from: readonly number[];
  readonly to: readonly number[];
  readonly sizes: readonly number[];
  /** What sources add: as in the flow table. */
  readonly volumeSource: Float64Array;
  readonly amountSource: Float64Array;
  readonly into: Float64Array;
  readonly out: Float64Array;
  /** Releases into a layer, or whose flow changes by itself. */
  readonly sources: readonly LayerSource[];
  readonly intakes: readonly LayerIntake[];
  readonly supplies: readonly LayerSupply[];
  /** People whose mouths a layer may reach; they breathe of the upper air among the fixed flows. */
  readonly breath: LayerSegment['breath'];
  /** Air that leaves spaces where a layer may have a part in it. */
  readonly surplus: readonly LayerSurplus[];
  /** Openings between different zones, with the net flow from a to b. */
  readonly links: readonly { readonly link: OpenLink; readonly through: number }[];
  /** False where releases that change by themselves move the pressures: then `surplus` lacks leaks. */
  readonly isSteady: boolean;
}

/** Pressures of the spaces over outdoors, from what comes in less what is listed as leaving. */
export function writePressures(segment: LayerSegment, net: Float64Array, into: Float64Array): void {
  const { pressures } = segment.flows;
  const n = net.length;
  for (let i = 0; i < n; i++) {
    let value = 0;
    for (let j = 0; j < n; j++) value += (pressures[i * n + j] ?? 0) * (net[j] ?? 0);
    into[i] = value;
  }
}

/** Adds to a list of sums. */
const grow = (list: Float64Array, at: number, value: number): void => {
  list[at] = (list[at] ?? 0) + value;
};

/** What a source brings of its own: the gas, not the air that comes with it. */
export function addSourceGas(
  { components }: LayerNetwork,
  sums: Pick<FlowTable, 'volumeSource' | 'amountSource' | 'into'>,
  { columns, airShare }: LayerSource,
  zone: number,
  q: number,
): void {
  const k = components.length;
  for (const { column, share } of columns) {
    grow(sums.amountSource, zone * k + column, q * share);
    grow(sums.into, column, q * share);
    if (components[column]?.gas !== 'O2') continue;
    // Released oxygen is oxygen of the zone too.
    grow(sums.amountSource, zone * k, q * share);
    grow(sums.into, 0, q * share);
  }
  grow(sums.volumeSource, zone, q * (1 - airShare));
}

/**
 * The flows of a segment that no state changes, worked out once for all its steps.
 *
 * @param network layers and upper zones
 * @param layout  layout of the state
 * @param segment what stays the same between the edges
 * @param surplusFromLayer share of the air that leaves without a unit that the layer gives
 */
export function fixedFlows(
  network: LayerNetwork,
  layout: ZoneLayout,
  segment: LayerSegment,
  surplusFromLayer: number,
): FixedFlows {
  const { k, layers, held } = layout;
  const { model, floorLayerOf, ceilingLayerOf } = network;
  const n = model.spaces.length;
  const outdoors = layout.zones;
  const { flows, units } = segment;
  const from: number[] = [];
  const to: number[] = [];
  const sizes: number[] = [];
  const volumeSource = new Float64Array(held);
  const amountSource = new Float64Array(held * k);
  const into = new Float64Array(k);
  const out = new Float64Array(k);
  const upperOf = (space: number): number => layers + (network.groupOf[space] ?? 0);
  const add = (a: number, b: number, flow: number): void => {
    if (flow <= 0 || a === b) return;
    const known = from.findIndex((zone, i) => zone === a && to[i] === b);
    if (known >= 0) {
      sizes[known] = (sizes[known] ?? 0) + flow;
      return;
    }
    from.push(a);
    to.push(b);
    sizes.push(flow);
  };
  const surplus: LayerSurplus[] = [];
  const leave = (space: number, zone: number, flow: number): void => {
    if (flow <= 0) return;
    if (surplusFromLayer > 0 && (floorLayerOf[space] ?? -1) >= 0) {
      surplus.push({ space, to: zone, flow });
    } else add(upperOf(space), zone, flow);
  };

  const isFixedSource = ({ plan, layer }: LayerSource): boolean =>
    layer < 0 && plan.decayS === undefined;
  for (const source of segment.sources.filter(isFixedSource)) {
    const { plan, airShare } = source;
    const q = plan.totalM3 / (plan.endS - plan.startS);
    const zone = upperOf(plan.space);
    addSourceGas(network, { volumeSource, amountSource, into }, source, zone, q);
    add(outdoors, zone, q * airShare);
  }

  const isFixedIntake = ({ space, level, grille }: LayerIntake): boolean =>
    grille.flowM3PerS <= 0 ||
    level === 'mixed' ||
    ((level === 'low' ? floorLayerOf : ceilingLayerOf)[space] ?? -1) < 0;
  for (const intake of units.intakes.filter(isFixedIntake)) {
    const upper = upperOf(intake.space);
    add(upper, outdoors, intake.outdoorM3PerS);
    add(upper, held + intake.system, intake.recirculatedM3PerS);
  }
  const isFixedSupply = ({ space, level, jet }: LayerSupply): boolean =>
    (level !== 'low' && jet === undefined) || (floorLayerOf[space] ?? -1) < 0;
  for (const supply of units.supplies.filter(isFixedSupply)) {
    add(outdoors, upperOf(supply.space), supply.freshM3PerS);
    add(held + supply.system, upperOf(supply.space), supply.recirculatedM3PerS);
  }

  for (const { space, carbonDioxide, oxygen } of segment.breath) {
    const zone = upperOf(space);
    grow(amountSource, zone * k + 1, carbonDioxide);
    grow(amountSource, zone * k, -oxygen);
    grow(volumeSource, zone, carbonDioxide - oxygen);
    grow(into, 1, carbonDioxide);
    grow(out, 0, oxygen);
  }

  const isSteady = segment.sources.every(({ plan }) => plan.decayS === undefined);
  const pressure = new Float64Array(n);
  writePressures(segment, flows.net, pressure);
  for (let i = 0; i < n; i++) {
    add(outdoors, upperOf(i), segment.infiltration[i] ?? 0);
    if (!isSteady) continue;
    const leak = (pressure[i] ?? 0) * (flows.leakM2[i] ?? 0);
    if (leak > 0) leave(i, outdoors, leak);
    else add(outdoors, upperOf(i), -leak);
  }
  for (const { from: a, to: b, flow } of segment.transfers) {
    if (a >= 0) leave(a, b >= 0 ? upperOf(b) : outdoors, flow);
    else if (b >= 0) add(outdoors, upperOf(b), flow);
  }
  return {
    from,
    to,
    sizes,
    volumeSource,
    amountSource,
    into,
    out,
    sources: segment.sources.filter((one) => !isFixedSource(one)),
    intakes: units.intakes.filter((one) => !isFixedIntake(one)),
    supplies: units.supplies.filter((one) => !isFixedSupply(one)),
    breath: segment.breath.filter(
      ({ space, heightM }) => heightM !== undefined && (floorLayerOf[space] ?? -1) >= 0,
    ),
    surplus,
    links: flows.links
      .filter(({ a, b }) => a >= n || b >= n || upperOf(a) !== upperOf(b))
      .map((link) => ({
        link,
        through: link.conductanceM2 * ((pressure[link.a] ?? 0) - (pressure[link.b] ?? 0)),
      })),
    isSteady,
  };
}
