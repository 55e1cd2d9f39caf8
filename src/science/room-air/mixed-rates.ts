import { exponentialStep } from '../numerics/matrix-exponential.js';
import { STEP_WEIGHTS } from '../numerics/runge-kutta.js';
import { GRAVITY_M_PER_S2, MOLAR_GAS_CONSTANT } from './air-constants.js';
import { addRelease, type Displacement, type FlowSegment, type OpenLink } from './air-flows.js';
import type { AirModel } from './air-model.js';
import { flowsWithNet } from './doorway.js';
import { rectangularFloorExchange } from './floor-opening.js';
import { releaseFlow, releasedVolume, type ReleasePlan } from './release-flow.js';
import { verticalOpeningFlows } from './vertical-openings.js';

/** A release that decays through a segment. */
interface DecayingSource {
  readonly plan: ReleasePlan;
  readonly decayS: number;
  /** Flow at the start of the release [m3/s]. */
  readonly firstM3PerS: number;
  /** Entries of B that it feeds, per m3/s. */
  readonly entries: Int32Array;
  readonly shares: Float64Array;
  /** Brings the sum that a step forms of the flow to what is let out in it [-]. */
  factor: number;
  /** The factor with which the slope at the start of the step was formed, and that start. */
  startFactor: number;
  startS: number;
}

/**
 * The linear balance of all spaces at one moment, dN/dt = A N + B, as a list of flows.
 *
 * N has one row per space, then what has left outdoors, then what has come in; one column per
 * component; amounts in m3 at ambient conditions, row-major. A flow q from i to j takes q N_i/V_i
 * from every column of row i and gives it to row j: nothing can be lost between the two. All columns
 * share one list, which is why episodes and gases cost little.
 */
export interface MixedBalance {
  readonly model: AirModel;
  readonly segment: FlowSegment;
  readonly displacement: Displacement;
  /** Volume of each space [m3 at ambient], and one over it. */
  readonly capacities: Float64Array;
  readonly inverse: Float64Array;
  /** Columns that outdoor air carries, with their fractions. */
  readonly outdoorColumns: Int32Array;
  readonly outdoorFractions: Float64Array;
  readonly excess: Float64Array;
  /** Density of a space is its molar mass times this [mol/m3]; outdoors last. */
  readonly molarDensity: Float64Array;
  readonly outdoorDensity: number;
  /** Flow by flow: row it leaves, row it enters, m3/s. The first `fixedCount` never change. */
  readonly from: Int32Array;
  readonly to: Int32Array;
  readonly flow: Float64Array;
  fixedCount: number;
  count: number;
  /** Outdoor air into each space: listed, and with what leaks and openings let in [m3/s]. */
  readonly fresh: Float64Array;
  /** Sources of the spaces without outdoor air, steady and at the moment [m3/s]. */
  readonly own: Float64Array;
  /** B. */
  readonly sources: Float64Array;
  /** Net inflow and pressure of each space at the moment. */
  readonly net: Float64Array;
  readonly pressure: Float64Array;
  readonly density: Float64Array;
  /** Share of each space that is replaced per second [1/s]. */
  readonly replaced: Float64Array;
  /** Exchange of each link at a reduced gravity of 1 m/s2 [m3/s]; holes only. */
  readonly holeExchange: Float64Array;
  readonly decaying: readonly DecayingSource[];
  /** The largest of `replaced`, of the flows last set [1/s]. */
  turnover: number;
}

/** Whether no flow of a segment depends on what the spaces hold, or on time. */
export function isSteady(segment: FlowSegment): boolean {
  return segment.decaying.length === 0 && segment.links.every((link) => !exchanges(link));
}

/** Links without any height or hole only pass on what is pushed through them. */
function exchanges(link: OpenLink): boolean {
  return link.vertical.length > 0 || link.floorHole !== undefined;
}

/** The balance of one segment for given capacities of the spaces [m3 at ambient]. */
export function mixedBalance(
  model: AirModel,
  segment: FlowSegment,
  capacities: Float64Array,
  displacement: Displacement,
): MixedBalance {
  const n = model.spaces.length;
  const m = model.components.length;
  const { pressurePa, temperatureK } = model.input.ambient;
  const outdoors = [...model.components.entries()].filter(([, one]) => one.outdoors > 0);
  const fixed: [from: number, to: number, flow: number][] = [];
  for (let i = 0; i < n; i++) {
    const out = segment.extractM3PerS[i] ?? 0;
    if (out > 0) fixed.push([i, n, out]);
    for (let j = 0; j < n; j++) {
      const flow = segment.between[i * n + j] ?? 0;
      if (flow > 0 && i !== j) fixed.push([j, i, flow]);
    }
  }
  const most = fixed.length + n + 2 * segment.links.length;
  const balance: MixedBalance = {
    model,
    segment,
    displacement,
    capacities,
    inverse: capacities.map((one) => 1 / one),
    outdoorColumns: Int32Array.from(outdoors, ([k]) => k),
    outdoorFractions: Float64Array.from(outdoors, ([, one]) => one.outdoors),
    excess: Float64Array.from(model.components, (one) => one.excessKgPerMol),
    molarDensity: Float64Array.from(
      model.spaces,
      (space) => pressurePa / (MOLAR_GAS_CONSTANT * space.temperatureK),
    ),
    outdoorDensity:
      ((model.airKgPerMol +
        model.components.reduce((sum, one) => sum + one.excessKgPerMol * one.outdoors, 0)) *
        pressurePa) /
      (MOLAR_GAS_CONSTANT * temperatureK),
    from: new Int32Array(most),
    to: new Int32Array(most),
    flow: new Float64Array(most),
    fixedCount: 0,
    count: 0,
    fresh: new Float64Array(n),
    own: new Float64Array(n * m),
    sources: new Float64Array((n + 2) * m),
    net: new Float64Array(n),
    pressure: new Float64Array(n),
    density: new Float64Array(n),
    replaced: new Float64Array(n),
    holeExchange: Float64Array.from(segment.links, ({ floorHole }) =>
      floorHole ? rectangularFloorExchange(floorHole.widthM, floorHole.lengthM, 1) : 0,
    ),
    decaying: segment.decaying.flatMap((plan) => decayingSource(model, plan, displacement)),
    turnover: 0,
  };
  for (const [from, to, flow] of fixed) addFlow(balance, from, to, flow);
  balance.fixedCount = balance.count;
  setPushes(balance, 0.5 * (segment.fromS + segment.toS));
  return balance;
}

function addFlow(balance: MixedBalance, from: number, to: number, flow: number): void {
  if (flow <= 0) return;
  const at = balance.count++;
  balance.from[at] = from;
  balance.to[at] = to;
  balance.flow[at] = flow;
}

function decayingSource(
  model: AirModel,
  plan: ReleasePlan,
  displacement: Displacement,
): readonly DecayingSource[] {
  const { decayS } = plan;
  if (decayS === undefined) return [];
  const unit = new Float64Array(model.spaces.length * model.components.length);
  addRelease(model, plan, 1, unit, displacement);
  const entries = Int32Array.from([...unit.keys()].filter((at) => unit[at] !== 0));
  return [
    {
      plan,
      decayS,
      firstM3PerS: releaseFlow(plan, plan.startS),
      entries,
      shares: Float64Array.from(entries, (at) => unit[at] ?? 0),
      factor: 1,
      startFactor: 1,
      startS: NaN,
    },
  ];
}

/** Flow of a decaying release, its last moment included [m3/s]. */
function decayingFlow({ plan, decayS, firstM3PerS }: DecayingSource, t: number): number {
  return firstM3PerS * Math.exp(-(t - plan.startS) / decayS);
}

/**
 * Sets for each decaying release the factor with which a step lets out just what the release does.
 *
 * @param t start of the step [s]
 * @param h its length [s]
 */
export function fitDecays(balance: MixedBalance, t: number, h: number): void {
  for (const source of balance.decaying) {
    const { plan } = source;
    const letOut = releasedVolume(plan, t + h) - releasedVolume(plan, t);
    // The slope at the start of a step was formed with the factor of the last one that was accepted;
    // a step tried again still starts where it did.
    if (t !== source.startS) source.startFactor = source.factor;
    source.startS = t;
    let rest = letOut / h;
    let formed = 0;
    for (const [weight, share] of STEP_WEIGHTS) {
      const flow = weight * decayingFlow(source, t + share * h);
      if (share === 0) rest -= flow * source.startFactor;
      else formed += flow;
    }
    if (formed > 0 && rest > 0) source.factor = rest / formed;
  }
}

/** What is let out at a time, and the pressures that pass it on. */
function setPushes(balance: MixedBalance, t: number): void {
  const { segment, displacement, own, net, pressure } = balance;
  const n = net.length;
  own.set(segment.sources);
  net.set(segment.net);
  for (const source of balance.decaying) {
    const flow = decayingFlow(source, t) * source.factor;
    for (let e = 0; e < source.entries.length; e++) {
      const at = source.entries[e] ?? 0;
      own[at] = (own[at] ?? 0) + flow * (source.shares[e] ?? 0);
    }
    const { space } = source.plan;
    if (displacement === 'pushOut') net[space] = (net[space] ?? 0) + flow;
  }
  for (let i = 0; i < n; i++) {
    let value = 0;
    for (let j = 0; j < n; j++) value += (segment.pressures[i * n + j] ?? 0) * (net[j] ?? 0);
    pressure[i] = value;
  }
}

/**
 * Density of what every space holds [kg/m3], written into `balance.density`.
 *
 *   rho = M p/(R T), M = M_air + sum of x_i (M_i - M_air), x_i = amount/capacity
 */
function setDensities(balance: MixedBalance, amounts: Float64Array): void {
  const { model, inverse, excess, molarDensity, density } = balance;
  const m = excess.length;
  for (let i = 0; i < density.length; i++) {
    let sum = 0;
    for (let k = 0; k < m; k++) sum += (excess[k] ?? 0) * (amounts[i * m + k] ?? 0);
    density[i] = (model.airKgPerMol + sum * (inverse[i] ?? 0)) * (molarDensity[i] ?? 0);
  }
}

/** Sets the flows and sources of a time and state. */
export function setFlows(balance: MixedBalance, t: number, amounts: Float64Array): void {
  const { segment, fresh, pressure, capacities, inverse } = balance;
  const n = capacities.length;
  const { links, leakM2 } = segment;
  if (balance.decaying.length > 0) setPushes(balance, t);
  balance.count = balance.fixedCount;
  fresh.set(segment.freshM3PerS);
  for (let i = 0; i < n; i++) {
    const leak = (pressure[i] ?? 0) * (leakM2[i] ?? 0);
    if (leak > 0) addFlow(balance, i, n, leak);
    else fresh[i] = (fresh[i] ?? 0) - leak;
  }
  if (links.length > 0) {
    setDensities(balance, amounts);
    for (let l = 0; l < links.length; l++) {
      const link = links[l];
      if (link) addLink(balance, link, l);
    }
  }
  setSources(balance);
  const { from, flow, count, replaced } = balance;
  replaced.fill(0);
  let turnover = 0;
  for (let e = 0; e < count; e++) {
    const i = from[e] ?? 0;
    const rate = (replaced[i] ?? 0) + (flow[e] ?? 0) * (inverse[i] ?? 0);
    replaced[i] = rate;
    if (rate > turnover) turnover = rate;
  }
  balance.turnover = turnover;
}

function addLink(balance: MixedBalance, link: OpenLink, index: number): void {
  const { pressure, density, fresh, outdoorDensity } = balance;
  const n = pressure.length;
  const { a, b } = link;
  const through =
    link.conductanceM2 * ((a < n ? (pressure[a] ?? 0) : 0) - (b < n ? (pressure[b] ?? 0) : 0));
  const densityA = a < n ? (density[a] ?? 0) : outdoorDensity;
  const densityB = b < n ? (density[b] ?? 0) : outdoorDensity;
  let aToB: number;
  let bToA: number;
  if (link.floorHole) {
    const gPrime = (2 * GRAVITY_M_PER_S2 * (densityA - densityB)) / (densityA + densityB);
    const exchange = gPrime > 0 ? (balance.holeExchange[index] ?? 0) * Math.sqrt(gPrime) : 0;
    const flows = flowsWithNet(exchange, through);
    aToB = flows.outM3PerS;
    bToA = flows.inM3PerS;
  } else {
    const flows = verticalOpeningFlows(link.vertical, densityA, densityB, through);
    aToB = flows.aToBM3PerS;
    bToA = flows.bToAM3PerS;
  }
  if (a < n) addFlow(balance, a, b, aToB);
  else fresh[b] = (fresh[b] ?? 0) + aToB;
  if (b < n) addFlow(balance, b, a, bToA);
  else fresh[a] = (fresh[a] ?? 0) + bToA;
}

/** B of the flows last set, with what it adds to what has come in and what has left. */
function setSources(balance: MixedBalance): void {
  const { own, fresh, sources, outdoorColumns, outdoorFractions } = balance;
  const n = fresh.length;
  const m = balance.excess.length;
  sources.fill(0);
  for (let i = 0; i < n; i++) {
    for (let k = 0; k < m; k++) {
      const value = own[i * m + k] ?? 0;
      if (value === 0) continue;
      sources[i * m + k] = value;
      const ledger = (value > 0 ? n + 1 : n) * m + k;
      sources[ledger] = (sources[ledger] ?? 0) + Math.abs(value);
    }
  }
  for (let c = 0; c < outdoorColumns.length; c++) {
    const k = outdoorColumns[c] ?? 0;
    const fraction = outdoorFractions[c] ?? 0;
    let into = 0;
    for (let i = 0; i < n; i++) {
      const air = (fresh[i] ?? 0) * fraction;
      sources[i * m + k] = (sources[i * m + k] ?? 0) + air;
      into += air;
    }
    sources[(n + 1) * m + k] = (sources[(n + 1) * m + k] ?? 0) + into;
  }
}

/** A N written into `out`, B times a factor added: dN/dt where the factor is 1. */
function writeRates(
  balance: MixedBalance,
  amounts: Float64Array,
  factor: number,
  out: Float64Array,
): void {
  const { sources, from, to, flow, count, inverse } = balance;
  const m = balance.excess.length;
  for (let i = 0; i < out.length; i++) out[i] = factor * (sources[i] ?? 0);
  for (let e = 0; e < count; e++) {
    const i = from[e] ?? 0;
    const rate = (flow[e] ?? 0) * (inverse[i] ?? 0);
    const source = i * m;
    const target = (to[e] ?? 0) * m;
    for (let k = 0; k < m; k++) {
      const moved = rate * (amounts[source + k] ?? 0);
      out[source + k] = (out[source + k] ?? 0) - moved;
      out[target + k] = (out[target + k] ?? 0) + moved;
    }
  }
}

/** dN/dt at a time and state, written into `out`. */
export function writeSlopes(
  balance: MixedBalance,
  t: number,
  amounts: Float64Array,
  out: Float64Array,
): void {
  setFlows(balance, t, amounts);
  writeRates(balance, amounts, 1, out);
}

/** Turnovers that one series sums [-]; beyond, the span is cut into parts. */
const SERIES_TURNOVERS = 8;
/** Turnovers beyond which squaring the whole matrix is cheaper [-]. */
const MANY_TURNOVERS = 256;

/** Work space of `advance`. */
export interface SeriesWork {
  readonly term: Float64Array;
  readonly rates: Float64Array;
}

/** Work space for as many amounts. */
export function seriesWork(length: number): SeriesWork {
  return { term: new Float64Array(length), rates: new Float64Array(length) };
}

/**
 * State after a span in which the flows last set do not change; `amounts` is written over.
 *
 *   exp(A t) N + integral of exp(A s) B ds = e^(-r) sum_k (A t + r)^k (N, B t) / k!,
 *   r = t times the largest share replaced per second
 *
 * With this shift every term is a share of what is there, so that nothing cancels, no amount falls
 * below 0 and what leaves one space arrives in another to the last digit.
 */
export function advance(
  balance: MixedBalance,
  amounts: Float64Array,
  spanS: number,
  work: SeriesWork,
): void {
  if (spanS <= 0) return;
  const turnovers = balance.turnover * spanS;
  if (turnovers > MANY_TURNOVERS) {
    advanceBySquaring(balance, amounts, spanS);
    return;
  }
  const parts = Math.max(1, Math.ceil(turnovers / SERIES_TURNOVERS));
  const h = spanS / parts;
  const shift = turnovers / parts;
  const decay = Math.exp(-shift);
  const { term, rates } = work;
  for (let part = 0; part < parts; part++) {
    term.set(amounts);
    amounts.fill(0);
    // The share of B in a term: a column of its own that only the shift acts on.
    let factor = 1;
    let weight = decay;
    for (let k = 1; ; k++) {
      for (let i = 0; i < amounts.length; i++) {
        amounts[i] = (amounts[i] ?? 0) + decay * (term[i] ?? 0);
      }
      // What the terms left out can add is below rounding.
      if (k > shift + 1 && weight < 1e-18) break;
      writeRates(balance, term, factor, rates);
      for (let i = 0; i < term.length; i++) {
        term[i] = (h * (rates[i] ?? 0) + shift * (term[i] ?? 0)) / k;
      }
      factor *= shift / k;
      weight *= Math.max(shift, 1e-3) / k;
    }
  }
}

function advanceBySquaring(balance: MixedBalance, amounts: Float64Array, spanS: number): void {
  const { from, to, flow, count, inverse, sources } = balance;
  const m = balance.excess.length;
  const rows = inverse.length + 2;
  const matrix = new Float64Array(rows * rows);
  for (let e = 0; e < count; e++) {
    const i = from[e] ?? 0;
    const j = to[e] ?? 0;
    const rate = (flow[e] ?? 0) * (inverse[i] ?? 0);
    matrix[i * rows + i] = (matrix[i * rows + i] ?? 0) - rate;
    matrix[j * rows + i] = (matrix[j * rows + i] ?? 0) + rate;
  }
  const { propagator, integral } = exponentialStep(matrix, rows, spanS);
  const start = Float64Array.from(amounts);
  amounts.fill(0);
  for (let i = 0; i < rows; i++) {
    for (let j = 0; j < rows; j++) {
      const keep = propagator[i * rows + j] ?? 0;
      const gain = integral[i * rows + j] ?? 0;
      if (keep === 0 && gain === 0) continue;
      for (let k = 0; k < m; k++) {
        amounts[i * m + k] =
          (amounts[i * m + k] ?? 0) +
          keep * (start[j * m + k] ?? 0) +
          gain * (sources[j * m + k] ?? 0);
      }
    }
  }
}
