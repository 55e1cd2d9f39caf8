import { GRAVITY_M_PER_S2, MOLAR_GAS_CONSTANT } from './air-constants.js';
import { DISCHARGE_COEFFICIENTS } from './air-flows.js';
import { flowsWithNet } from './doorway.js';
import { edgeDilution } from './gravity-current.js';
import { rectangularFloorExchange } from './floor-opening.js';
import { addFlow, addSharedFlow, addVariable, flowTable, type FlowTable } from './flow-table.js';
import type { OpenLink } from './air-flows.js';
import { addSourceGas, fixedFlows, writePressures } from './layer-fixed-flows.js';
import { basinArea } from './layer-geometry.js';
import { grilleIntake, jetErosion, turbulentExchange, WEIR_CONSTANT } from './layer-flow.js';
import type {
  LayerIntake,
  LayerNetwork,
  LayerSource,
  LayerSupply,
  LayerWeir,
} from './layer-network.js';
import type { LayerParameters } from './layer-parameters.js';
import type { LayerSegment } from './layer-segment.js';
import { readDensities, type ZoneLayout, type ZoneState } from './layer-zones.js';
import { LINE_PLUME_CONSTANT } from './plume.js';
import { releasedVolume } from './release-flow.js';
import { verticalOpeningFlows } from './vertical-openings.js';

/** Depth below which a layer counts as this deep for the smear [m]. */
const LEAST_SMEAR_DEPTH_M = 1e-3;
/** Depth over which what is drawn from a thin layer fades, and over which mouths enter it [m]. */
const RAMP_M = 0.05;

const NO_STATE: Float64Array = new Float64Array(0);

/** A layer begins beyond an edge only from this many times the contrast at which one ends. */
const BIRTH_CONTRAST = 5;

/** The flows of one segment, worked out anew for a state. */
export interface LayerFlows {
  /** Flows at a state, for a step from t to t + h; h 0: the rates of this moment. */
  at(t: number, h: number, state: Float64Array): FlowTable;
  /**
   * The same at the start of steps: worked out once for each t, as the parts of a step and a second,
   * shorter try begin at the same state. `at` leaves this table alone.
   */
  fromStart(t: number, h: number, state: Float64Array): FlowTable;
  /** Number of outdoors where a flow begins or ends. */
  readonly outdoors: number;
  /** Whether a source or another layer feeds a layer, at the state last asked. */
  isFed(layer: number): boolean;
}

/** Work space for the flows of any segment of a network. */
export interface LayerFlowTables {
  readonly inside: FlowTable;
  readonly start: FlowTable;
  readonly insideSmears: Smears;
  readonly startSmears: Smears;
  /** By layer: 1 where a source or another layer feeds it. */
  readonly fed: Uint8Array;
  /** By space: inflow less listed outflow, and the pressure that follows. */
  readonly net: Float64Array;
  readonly pressure: Float64Array;
}

/** Tables that hold all flows that any segment of a network may have. */
export function layerFlowTables(network: LayerNetwork, layout: ZoneLayout): LayerFlowTables {
  const spaces = network.model.spaces.length;
  return {
    inside: layerFlowTable(network, layout),
    start: layerFlowTable(network, layout),
    insideSmears: noSmears(layout.layers),
    startSmears: noSmears(layout.layers),
    fed: new Uint8Array(layout.layers),
    net: new Float64Array(spaces),
    pressure: new Float64Array(spaces),
  };
}

function layerFlowTable(network: LayerNetwork, layout: ZoneLayout): FlowTable {
  const { airSystems = [], transfers = [], openings = [] } = network.model.input;
  const n = network.model.spaces.length;
  const served = airSystems.reduce((sum, one) => sum + (one.serves?.length ?? 1), 0);
  const weirs = network.weirs.length;
  return flowTable(
    3 * layout.layers +
      4 * n +
      2 * network.sources.length +
      3 * weirs +
      7 * served +
      2 * transfers.length +
      4 * openings.length,
    weirs + 2 * served + n + transfers.length + 2 * openings.length,
    layout.held,
    layout.k,
  );
}

/**
 * The flows of the two-layer model between two edges of the schedule.
 *
 *   dVl/dt  = D q + E + F + I + Sl - L - J - O - sg S + Pl (sc - so)
 *   dnkl/dt = qk + [(D-1) q + E + F] xku + X (xku - xkl) + I xkI + Sl ck
 *             - (L + J + O + sg S) xkl + Pl bk
 *   dnku/dt = the same with the other sign, and outdoor air, units, people, neighbours
 *
 * each term a flow between two zones with the fraction of the zone it leaves.
 *
 * @param network    layers and upper zones
 * @param layout     layout of the state
 * @param segment    what stays the same between the edges
 * @param parameters what the run assumes
 * @param joined     spaces that have become one mixed zone
 * @param tables     work space (layerFlowTables), written by every call
 * @param zones      work space (emptyZoneState), its molar masses and depths written by every call
 * @returns flows by state; the same two tables every call
 * Source: own-room-air (recommended layer model), robins-2001 for the exchange. Assumes: level
 * layers, one temperature in the density differences of layers. Accuracy: scenario spread, never
 * one number.
 */
export function layerFlows(
  network: LayerNetwork,
  layout: ZoneLayout,
  segment: LayerSegment,
  parameters: LayerParameters,
  joined: ReadonlySet<number>,
  tables: LayerFlowTables,
  zones: ZoneState,
): LayerFlows {
  const { k, layers, held } = layout;
  const { model, floorLayerOf, ceilingLayerOf } = network;
  const n = model.spaces.length;
  const outdoors = layout.zones;
  const { flows } = segment;
  const { molarMasses, depths } = zones;
  const air = network.airMolarMassKgPerMol;
  const fixed = fixedFlows(network, layout, segment, parameters.surplusFromLayer);
  const { fed, net, pressure } = tables;
  const inside = { table: tables.inside, smears: tables.insideSmears };
  const start = { table: tables.start, smears: tables.startSmears };
  for (const { table } of [inside, start]) {
    table.count = 0;
    for (let i = 0; i < fixed.sizes.length; i++) {
      addFlow(table, fixed.from[i] ?? 0, fixed.to[i] ?? 0, fixed.sizes[i] ?? 0);
    }
  }
  const fixedCount = inside.table.count;
  let { table, smears } = inside;
  let state = NO_STATE;
  let startS = Number.NaN;

  const upperOf = (space: number): number => layers + (network.groupOf[space] ?? 0);
  const isJoined = (space: number): boolean => joined.size > 0 && joined.has(space);
  const layerIn = (space: number, list: readonly number[]): number =>
    isJoined(space) ? -1 : (list[space] ?? -1);
  const volume = (layer: number): number => state[layer] ?? 0;
  const areaAt = (layer: number): number => {
    const basin = network.layers[layer]?.basin;
    return basin ? basinArea(basin, depths[layer] ?? 0) : 1;
  };
  /** Excess of a layer's molar mass over an upper zone's, along the side of the layer. */
  const excess = (layer: number, upper: number): number => {
    const sign = network.layers[layer]?.side === 'ceiling' ? -1 : 1;
    return Math.max(0, sign * ((molarMasses[layer] ?? air) - (molarMasses[upper] ?? air)));
  };
  const addSource = (zone: number, column: number, flow: number): void => {
    const at = zone * k + column;
    table.amountSource[at] = (table.amountSource[at] ?? 0) + flow;
  };
  const addVolume = (zone: number, flow: number): void => {
    table.volumeSource[zone] = (table.volumeSource[zone] ?? 0) + flow;
  };
  /** Air that leaves a space without a unit: from above, or by choice from the floor layer. */
  const leave = (space: number, to: number, flow: number): void => {
    if (flow <= 0) return;
    const upper = upperOf(space);
    const layer = parameters.surplusFromLayer > 0 ? layerIn(space, floorLayerOf) : -1;
    if (layer < 0 || volume(layer) <= 0) {
      addFlow(table, upper, to, flow);
      return;
    }
    const share = parameters.surplusFromLayer * Math.min(1, (depths[layer] ?? 0) / RAMP_M);
    const low = flow * share;
    addVariable(table, low, layer, low / volume(layer), flow);
    addSharedFlow(table, layer, to, 0, 1);
    addSharedFlow(table, upper, to, flow, -1);
  };

  const sourceFlow = (source: LayerSource, t: number, h: number): number => {
    const { plan } = source;
    if (plan.decayS === undefined) return plan.totalM3 / (plan.endS - plan.startS);
    const span = h > 0 ? h : 1e-3;
    return (releasedVolume(plan, t + span) - releasedVolume(plan, t)) / span;
  };
  const addRelease = (source: LayerSource, q: number): void => {
    const { plan } = source;
    const upper = upperOf(plan.space);
    const layer = source.layer >= 0 && !isJoined(plan.space) ? source.layer : -1;
    const to = layer >= 0 ? layer : upper;
    addSourceGas(network, table, source, to, q);
    addFlow(table, outdoors, to, q * source.airShare);
    if (layer < 0 || q <= 0) return;
    fed[layer] = 1;
    const dilution = dilutionOf(source, parameters);
    const entrained =
      source.plumeRiseM === undefined
        ? (dilution - 1) * q
        : parameters.plumeConstant *
          Math.cbrt(source.gZero * q) *
          Math.max(0, source.plumeRiseM - (depths[layer] ?? 0)) ** (5 / 3);
    addFlow(table, upper, layer, entrained);
  };

  /**
   * Air that diffusion takes into a layer over a step of some length [m3/s]. h^2 grows evenly while a
   * layer only smears, so the mean over the step is known exactly.
   */
  const smearFlow = (layer: number, area: number, mean: number, h: number): number => {
    const depth = Math.max(mean, LEAST_SMEAR_DEPTH_M);
    const growth = Math.PI * (network.layers[layer]?.diffusivityM2PerS ?? 0);
    const deeper =
      h > 0 ? (Math.sqrt(depth * depth + growth * h) - depth) / h : growth / (2 * depth);
    return area * deeper;
  };
  const addMixing = (h: number): void => {
    smears.count = 0;
    for (let l = 0; l < layers; l++) {
      if (volume(l) <= 0 && fed[l] === 0) continue;
      const layer = network.layers[l];
      if (!layer || isJoined(layer.space)) continue;
      const upper = layers + layer.group;
      const area = areaAt(l);
      if (area <= 0) continue;
      const mean = volume(l) / area;
      const deeper = parameters.diffusion > 0 ? smearFlow(l, area, mean, h) : 0;
      if (deeper > 0) {
        const i = smears.count++;
        smears.flow[i] = table.count;
        smears.layer[i] = l;
        smears.areaM2[i] = area;
        smears.meanM[i] = mean;
        addFlow(table, upper, l, deeper);
      }
      const gPrime = (GRAVITY_M_PER_S2 * excess(l, upper)) / air;
      const exchange =
        area *
        (turbulentExchange(parameters.turbulenceMPerS, gPrime, mean) + parameters.walkingMPerS);
      addFlow(table, upper, l, exchange);
      addFlow(table, l, upper, exchange);
    }
  };

  const addOutwardWeir = (weir: LayerWeir): void => {
    const depth = (depths[weir.a] ?? 0) - weir.sillA;
    if (depth <= 0) return;
    const layer = network.layers[weir.a];
    if (!layer || isJoined(layer.space)) return;
    const head = Math.min(depth, weir.heightM);
    const sign = layer.side === 'ceiling' ? -1 : 1;
    const difference = Math.max(
      0,
      sign * ((molarMasses[weir.a] ?? air) - network.outdoorMolarMassKgPerMol),
    );
    const speed =
      (weir.dischargeCoefficient / 3) *
      weir.widthM *
      smoothRoot((GRAVITY_M_PER_S2 * difference) / air);
    const root = Math.sqrt(head);
    const flow = speed * head * root;
    if (flow <= 0) return;
    const slope = depth < weir.heightM ? (1.5 * speed * root) / areaAt(weir.a) : 0;
    // What leaves through the lower part of an opening comes back as air through the rest.
    addVariable(table, flow, weir.a, Math.max(slope, flow / volume(weir.a)), Infinity);
    addSharedFlow(table, weir.a, outdoors, 0, 1);
    addSharedFlow(table, outdoors, layers + layer.group, 0, 1);
  };
  /** Own part of a layer in a weir: its flow without the other side, and the slope to its volume. */
  const own = { flow: 0, slope: 0 };
  const readOwn = (weir: LayerWeir, layer: number, upper: number, sill: number): void => {
    own.flow = 0;
    own.slope = 0;
    const head = (depths[layer] ?? 0) - sill;
    if (head <= 0 || volume(layer) <= 0) return;
    const gravity = (GRAVITY_M_PER_S2 * excess(layer, upper)) / (molarMasses[layer] ?? air);
    const speed = WEIR_CONSTANT * weir.widthM * smoothRoot(gravity);
    const root = Math.sqrt(head);
    own.flow = speed * head * root;
    own.slope = Math.max((1.5 * speed * root) / areaAt(layer), own.flow / volume(layer));
  };
  /**
   * Most that a hole in a floor lets pour down [m3/s]: as through any hole where the air below has
   * another way out, else no more than air comes up through it.
   */
  const throughHole = ({ hole }: LayerWeir, heavier: number, head: number): number => {
    if (!hole) return Infinity;
    const gPrime = (GRAVITY_M_PER_S2 * heavier) / air;
    const both = hole.exchangeM3PerS * Math.sqrt(Math.max(0, gPrime));
    if (!hole.hasOtherWay) return both;
    const { spread } = DISCHARGE_COEFFICIENTS;
    return Math.max(both, spread.mode * hole.areaM2 * Math.sqrt(2 * gPrime * Math.max(0, head)));
  };
  const addWeir = (weir: LayerWeir): void => {
    if (volume(weir.a) <= 0 && volume(weir.b) <= 0) return;
    const first = network.layers[weir.a];
    const second = network.layers[weir.b];
    if (!first || !second) return;
    const upperA = layers + first.group;
    const upperB = layers + second.group;
    if (isJoined(first.space)) own.flow = own.slope = 0;
    else readOwn(weir, weir.a, upperB, weir.sillA);
    const flowA = own.flow;
    const slopeA = own.slope;
    if (isJoined(second.space)) own.flow = own.slope = 0;
    else readOwn(weir, weir.b, upperA, weir.sillB);
    const flow = flowA - own.flow;
    if (flow === 0) return;
    const forward = flow > 0;
    const donor = forward ? weir.a : weir.b;
    const receiver = forward ? weir.b : weir.a;
    const head = (depths[donor] ?? 0) - (forward ? weir.sillA : weir.sillB);
    const most = throughHole(weir, excess(donor, forward ? upperB : upperA), head);
    const isHeld = Math.abs(flow) > most;
    const size = isHeld ? most : Math.abs(flow);
    if (size <= 0) return;
    const donorUpper = forward ? upperA : upperB;
    const receiverUpper = forward ? upperB : upperA;
    // Below some contrast any draught decides, not the gas: what comes over the edge then mixes.
    const least = volume(receiver) > 0 ? 1 : BIRTH_CONTRAST;
    const isWeak = excess(donor, receiverUpper) < least * parameters.joinContrast * air;
    const target = isWeak || isJoined((forward ? second : first).space) ? receiverUpper : receiver;
    const donorSlope = forward ? slopeA : own.slope;
    const receiverSlope = forward ? own.slope : slopeA;
    addVariable(
      table,
      size,
      donor,
      isHeld ? size / volume(donor) : donorSlope,
      Infinity,
      receiver,
      isHeld ? 0 : -receiverSlope,
    );
    addSharedFlow(table, donor, target, 0, 1);
    addSharedFlow(table, receiverUpper, donorUpper, 0, 1);
    if (target !== receiver) return;
    fed[receiver] = 1;
    const fall = (forward ? weir.sillB : weir.sillA) - (depths[receiver] ?? 0);
    if (fall <= 0) return;
    const gPrime = (GRAVITY_M_PER_S2 * excess(donor, receiverUpper)) / air;
    const plume =
      LINE_PLUME_CONSTANT * Math.cbrt((gPrime * size) / weir.widthM) * weir.widthM * fall;
    addFlow(table, receiverUpper, receiver, parameters.fallEntrainment * Math.max(0, plume - size));
  };

  const addIntake = (intake: LayerIntake): void => {
    const total = intake.grille.flowM3PerS;
    const upper = upperOf(intake.space);
    const mixer = held + intake.system;
    const outdoorShare = intake.outdoorM3PerS / total;
    const layer = layerIn(intake.space, intake.level === 'low' ? floorLayerOf : ceilingLayerOf);
    const full = layer >= 0 ? volume(layer) : 0;
    let fromLayer = 0;
    if (full > 0) {
      const gravity = (GRAVITY_M_PER_S2 * excess(layer, upper)) / (molarMasses[layer] ?? air);
      fromLayer = grilleIntake(intake.grille, gravity, depths[layer] ?? 0);
    }
    if (fromLayer <= 0) {
      addFlow(table, upper, outdoors, total * outdoorShare);
      addFlow(table, upper, mixer, total * (1 - outdoorShare));
      return;
    }
    // Between plug flow and the thin-layer limit the intake grows with depth to the power 1.25.
    const slope = fromLayer < total ? (1.25 * fromLayer) / full : fromLayer / full;
    addVariable(table, fromLayer, layer, slope, total);
    addSharedFlow(table, layer, outdoors, 0, outdoorShare);
    addSharedFlow(table, layer, mixer, 0, 1 - outdoorShare);
    addSharedFlow(table, upper, outdoors, total * outdoorShare, -outdoorShare);
    addSharedFlow(table, upper, mixer, total * (1 - outdoorShare), outdoorShare - 1);
  };
  const addSupply = (supply: LayerSupply): void => {
    const below = layerIn(supply.space, floorLayerOf);
    const isThere = below >= 0 && volume(below) > 0;
    const upper = upperOf(supply.space);
    const to = supply.level === 'low' && isThere ? below : upper;
    addFlow(table, outdoors, to, supply.freshM3PerS);
    addFlow(table, held + supply.system, to, supply.recirculatedM3PerS);
    if (supply.jet === undefined || !isThere) return;
    const gPrime = (GRAVITY_M_PER_S2 * excess(below, upper)) / air;
    const flow =
      parameters.jets *
      jetErosion(supply.jet.radiusM, supply.jet.speedMPerS, gPrime) *
      Math.min(1, (depths[below] ?? 0) / RAMP_M);
    if (flow <= 0) return;
    addVariable(table, flow, below, flow / volume(below), Infinity);
    addSharedFlow(table, below, upper, 0, 1);
  };

  /** What people take from a layer that reaches their mouths, and no longer from the air above. */
  const addPeople = (): void => {
    for (const one of fixed.breath) {
      const layer = layerIn(one.space, floorLayerOf);
      if (layer < 0 || volume(layer) <= 0) continue;
      const share = Math.min(1, ((depths[layer] ?? 0) - (one.heightM ?? 0)) / RAMP_M);
      if (share <= 0) continue;
      const upper = upperOf(one.space);
      const carbonDioxide = share * one.carbonDioxide;
      const oxygen = share * one.oxygen;
      addSource(layer, 1, carbonDioxide);
      addSource(layer, 0, -oxygen);
      addVolume(layer, carbonDioxide - oxygen);
      addSource(upper, 1, -carbonDioxide);
      addSource(upper, 0, oxygen);
      addVolume(upper, oxygen - carbonDioxide);
    }
  };

  const { pressurePa, temperatureK } = model.input.ambient;
  /** Density of a space or outdoors over the molar mass of its upper air [mol/m3]. */
  const molarDensity = Float64Array.from(
    { length: n + 1 },
    (_, i) => pressurePa / (MOLAR_GAS_CONSTANT * (model.spaces[i]?.temperatureK ?? temperatureK)),
  );
  const densityOf = (space: number): number =>
    (molarDensity[space] ?? 0) *
    (space < n ? (molarMasses[upperOf(space)] ?? air) : network.outdoorMolarMassKgPerMol);
  const pass = (from: number, to: number, flow: number): void => {
    if (from >= n) addFlow(table, outdoors, upperOf(to), flow);
    else leave(from, to >= n ? outdoors : upperOf(to), flow);
  };
  const addLink = (link: OpenLink, through: number): void => {
    const { a, b } = link;
    const densityA = densityOf(a);
    const densityB = densityOf(b);
    if (link.floorHole) {
      const gPrime = (2 * GRAVITY_M_PER_S2 * (densityA - densityB)) / (densityA + densityB);
      const { widthM, lengthM } = link.floorHole;
      const both = flowsWithNet(rectangularFloorExchange(widthM, lengthM, gPrime), through);
      pass(a, b, both.outM3PerS);
      pass(b, a, both.inM3PerS);
    } else {
      const both = verticalOpeningFlows(link.vertical, densityA, densityB, through);
      pass(a, b, both.aToBM3PerS);
      pass(b, a, both.bToAM3PerS);
    }
  };
  /** Pressures and leaks while a release changes by itself; else they are among the fixed flows. */
  const addLeaks = (t: number, h: number): void => {
    net.set(flows.net);
    for (const source of segment.sources) {
      if (source.plan.decayS === undefined) continue;
      const { space } = source.plan;
      net[space] = (net[space] ?? 0) + sourceFlow(source, t, h);
    }
    writePressures(segment, net, pressure);
    for (let i = 0; i < n; i++) {
      const leak = (pressure[i] ?? 0) * (flows.leakM2[i] ?? 0);
      if (leak > 0) leave(i, outdoors, leak);
      else addFlow(table, outdoors, upperOf(i), -leak);
    }
  };

  const write = (into: typeof inside, t: number, h: number, now: Float64Array): FlowTable => {
    ({ table, smears } = into);
    state = now;
    table.count = fixedCount;
    table.variables = 0;
    table.volumeSource.set(fixed.volumeSource);
    table.amountSource.set(fixed.amountSource);
    table.into.set(fixed.into);
    table.out.set(fixed.out);
    fed.fill(0);
    readDensities(network, layout, segment.excess, state, zones);
    for (const source of fixed.sources) addRelease(source, sourceFlow(source, t, h));
    for (const weir of segment.weirs) {
      if (weir.b < 0) addOutwardWeir(weir);
      else addWeir(weir);
    }
    addMixing(h);
    for (const intake of fixed.intakes) addIntake(intake);
    for (const supply of fixed.supplies) addSupply(supply);
    addPeople();
    for (const { space, to, flow } of fixed.surplus) leave(space, to, flow);
    if (!fixed.isSteady) addLeaks(t, h);
    for (const { link, through } of fixed.links) {
      const net = fixed.isSteady
        ? through
        : link.conductanceM2 * ((pressure[link.a] ?? 0) - (pressure[link.b] ?? 0));
      addLink(link, net);
    }
    return table;
  };

  return {
    outdoors,
    isFed: (layer) => fed[layer] === 1,
    at: (t, h, now) => write(inside, t, h, now),
    fromStart: (t, h, now) => {
      if (t !== startS || !fixed.isSteady) {
        startS = t;
        return write(start, t, h, now);
      }
      // Of a state only what smears depends on the length of the step.
      const { flow, layer, areaM2, meanM } = start.smears;
      for (let i = 0; i < start.smears.count; i++) {
        start.table.base[flow[i] ?? 0] = smearFlow(layer[i] ?? 0, areaM2[i] ?? 0, meanM[i] ?? 0, h);
      }
      return start.table;
    },
  };
}

/** Flows by which layers smear: their place in a table, and what they depend on. */
interface Smears {
  count: number;
  readonly flow: Int32Array;
  readonly layer: Int32Array;
  readonly areaM2: Float64Array;
  readonly meanM: Float64Array;
}

function noSmears(layers: number): Smears {
  return {
    count: 0,
    flow: new Int32Array(layers),
    layer: new Int32Array(layers),
    areaM2: new Float64Array(layers),
    meanM: new Float64Array(layers),
  };
}

/**
 * First dilution of a release in one run [-]: at its source, and at the edge of what spreads at once.
 *
 * A sampled value spans 1 to 10 for what is let out gently; what bursts or blows is diluted tenfold
 * at least, so for it the same draw spans its own range.
 */
function dilutionOf(
  source: LayerSource,
  { sourceDilution, edgeEntrainment }: LayerParameters,
): number {
  const edge = edgeDilution(source.radiusRatio, 1, edgeEntrainment);
  return Math.min(source.mostDilution, edge * firstDilution(source, sourceDilution));
}

function firstDilution({ manner }: LayerSource, sampled: number | undefined): number {
  if (sampled === undefined) return manner.dilution;
  const { dilutionLow, dilutionHigh } = manner;
  if (dilutionLow < 10) return sampled;
  return dilutionLow * (dilutionHigh / dilutionLow) ** Math.min(1, Math.log10(sampled));
}

/** Reduced gravity below which its root is made smooth [m/s2]: 0.2 ppm of carbon dioxide. */
const SMOOTH_BELOW = 1e-5;

/** Square root that ends in a smooth slope, so that flows fade and do not chatter. */
function smoothRoot(gravity: number): number {
  if (gravity >= SMOOTH_BELOW) return Math.sqrt(gravity);
  const share = gravity / SMOOTH_BELOW;
  return Math.sqrt(SMOOTH_BELOW) * share * (1.5 - 0.5 * share);
}
