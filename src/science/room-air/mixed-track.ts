import {
  denseSlope,
  denseValue,
  rungeKuttaWork,
  stepThrough,
  writeDense,
  type RungeKuttaWork,
} from '../numerics/runge-kutta.js';
import { addRelease, type Displacement, type FlowSegment } from './air-flows.js';
import type { AirModel } from './air-model.js';
import {
  advance,
  fitDecays,
  isSteady,
  mixedBalance,
  seriesWork,
  setFlows,
  writeSlopes,
  type MixedBalance,
  type SeriesWork,
} from './mixed-rates.js';
import type { ReleasePlan } from './release-flow.js';

/** The well-mixed answer at its nodes, in pieces without jumps; a piece has nodes at both ends. */
export interface MixedTrack {
  /** Rising; the end of a piece and the start of the next are two nodes [s]. */
  readonly timesS: Float64Array;
  /** First node of each piece, then the number of nodes. */
  readonly firstNode: readonly number[];
  /** Node by node: amounts by space and component [m3 at ambient]. */
  readonly amounts: Float64Array;
  /** Their slopes [m3/s], where they were asked for. */
  readonly slopes: Float64Array | undefined;
  /** Volume of each space in each piece [m3 at ambient]. */
  readonly capacities: readonly Float64Array[];
  /** At the end: every space, what has left outdoors, what has come in. */
  readonly last: Float64Array;
  /** Amounts at any time inside a piece, where they were asked for. */
  readonly between: readonly ((t: number) => Float64Array)[];
}

export interface MixedOptions {
  readonly displacement: Displacement;
  /** The run of the mixing factor in which it shrinks the volume too. */
  readonly useMixingVolume: boolean;
  readonly wantsSlopes: boolean;
  /** Keeps what is needed to ask for any time. */
  readonly wantsBetween: boolean;
}

/** Tolerances where flows depend on what the spaces hold: relative, and as a fraction of a space. */
const TOLERANCE = { relative: 1e-6, fraction: 1e-10 } as const;
/**
 * Longest step, over the time in which the quickest space is replaced once [-]. Within it the pair
 * of formulas keeps amounts not below 0 for flows that do not change: its radius of absolute
 * monotonicity is 5/6.
 */
const MOST_TURNOVERS = 0.8;
const MAX_STEP_S = 1800;

/** What one run works with. */
interface Run {
  readonly model: AirModel;
  readonly options: MixedOptions;
  readonly pulses: ReadonlyMap<number, readonly ReleasePlan[]>;
  readonly series: SeriesWork;
  readonly work: RungeKuttaWork;
  readonly dense: Float64Array;
  readonly tolerances: Float64Array;
  /** Spaces by component. */
  readonly held: number;
  readonly timesS: Float64Array;
  readonly amounts: Float64Array;
  readonly slopes: Float64Array | undefined;
  readonly between: ((t: number) => Float64Array)[];
  state: Float64Array;
  capacities: Float64Array;
  stepS: number;
}

/**
 * The well-mixed answer of all spaces over the whole time, in pieces between jumps.
 *
 *   state  amounts N [m3 at ambient] of each component in each space
 *   balance dN/dt = A N + B (MixedBalance), closed by a volume balance in every space
 *   step   the exponential series (advance) where A and B are constant; embedded Runge-Kutta 5(4)
 *          where an opening exchanges by density or a release decays
 *   limit  one space without openings is the textbook exponential
 *
 * @param model    resolved input
 * @param segments flows between the edges of the model
 * @param timesS   rising times wanted as nodes
 * @param options  how releases move the air, and what is wanted
 */
export function mixedTrack(
  model: AirModel,
  segments: readonly FlowSegment[],
  timesS: readonly number[],
  options: MixedOptions,
): MixedTrack {
  const n = model.spaces.length;
  const m = model.components.length;
  const pulses = pulsesOf(model);
  const firstNode = [0];
  const nodes: number[] = [];
  let wanted = 0;
  for (const { fromS, toS } of segments) {
    nodes.push(fromS);
    while ((timesS[wanted] ?? Infinity) <= fromS) wanted++;
    for (; (timesS[wanted] ?? Infinity) < toS; wanted++) nodes.push(timesS[wanted] ?? toS);
    nodes.push(toS);
    firstNode.push(nodes.length);
  }
  // What is released at the very end of the run is still shown there.
  const endS = segments.at(-1)?.toS ?? 0;
  const endsWithPulse = pulses.has(endS) && segments.length > 0;
  if (endsWithPulse) {
    nodes.push(endS);
    firstNode.push(nodes.length);
  }
  const run: Run = {
    model,
    options,
    pulses,
    series: seriesWork((n + 2) * m),
    work: rungeKuttaWork((n + 2) * m),
    dense: new Float64Array(5 * n * m),
    tolerances: new Float64Array((n + 2) * m),
    held: n * m,
    timesS: Float64Array.from(nodes),
    amounts: new Float64Array(nodes.length * n * m),
    slopes: options.wantsSlopes ? new Float64Array(nodes.length * n * m) : undefined,
    between: [],
    state: startState(model),
    capacities: Float64Array.from(model.spaces, (space) => space.capacityM3),
    stepS: 60,
  };
  const capacities: Float64Array[] = [];
  for (const [piece, segment] of segments.entries()) {
    if (options.useMixingVolume) rescale(run, segment);
    applyPulses(run, segment, segment.fromS);
    const balance = mixedBalance(model, segment, run.capacities, options.displacement);
    const first = firstNode[piece] ?? 0;
    const until = firstNode[piece + 1] ?? first;
    if (isSteady(segment)) advancePiece(run, balance, first, until);
    else integratePiece(run, balance, first, until);
    capacities.push(run.capacities);
  }
  const lastSegment = segments.at(-1);
  if (endsWithPulse && lastSegment) {
    applyPulses(run, lastSegment, endS);
    run.amounts.set(run.state.subarray(0, run.held), (nodes.length - 1) * run.held);
    const after = Float64Array.from(run.state.subarray(0, run.held));
    run.between.push(() => after);
    capacities.push(run.capacities);
  }
  return {
    timesS: run.timesS,
    firstNode,
    amounts: run.amounts,
    slopes: run.slopes,
    capacities,
    last: run.state,
    between: run.between,
  };
}

function startState(model: AirModel): Float64Array {
  const n = model.spaces.length;
  const m = model.components.length;
  const state = new Float64Array((n + 2) * m);
  for (const [i, space] of model.spaces.entries()) {
    for (let k = 0; k < m; k++) {
      const held = (space.initial[k] ?? 0) * space.capacityM3;
      state[i * m + k] = held;
      state[(n + 1) * m + k] = (state[(n + 1) * m + k] ?? 0) + held;
    }
  }
  return state;
}

function pulsesOf(model: AirModel): ReadonlyMap<number, readonly ReleasePlan[]> {
  const pulses = new Map<number, ReleasePlan[]>();
  for (const one of model.releases) {
    if (one.endS > one.startS) continue;
    const known = pulses.get(one.startS);
    if (known) known.push(one);
    else pulses.set(one.startS, [one]);
  }
  return pulses;
}

/** Volumes as the mixing factor of a segment has them; fractions stay. */
function rescale(run: Run, segment: FlowSegment): void {
  const m = run.model.components.length;
  const next = Float64Array.from(
    run.model.spaces,
    (space, i) => space.capacityM3 * (segment.mixing[i] ?? 1),
  );
  for (let i = 0; i < next.length; i++) {
    const factor = (next[i] ?? 1) / (run.capacities[i] ?? 1);
    if (factor === 1) continue;
    for (let k = 0; k < m; k++) run.state[i * m + k] = (run.state[i * m + k] ?? 0) * factor;
  }
  run.capacities = next;
}

/** Everything that is released at once at this moment: mixture is pushed out evenly. */
function applyPulses(run: Run, segment: FlowSegment, t: number): void {
  const pulses = run.pulses.get(t);
  if (!pulses) return;
  const { model, options } = run;
  const n = model.spaces.length;
  const net = new Float64Array(n);
  const sources = new Float64Array(run.held);
  for (const release of pulses) {
    addRelease(model, release, release.totalM3, sources, options.displacement);
    if (options.displacement === 'pushOut') {
      net[release.space] = (net[release.space] ?? 0) + release.totalM3;
    }
  }
  const pulse: FlowSegment = {
    ...segment,
    between: new Float64Array(n * n),
    freshM3PerS: new Float64Array(n),
    extractM3PerS: new Float64Array(n),
    sources,
    net,
    decaying: [],
    // A push goes one way through every opening; the exchange needs time.
    links: segment.links.map((link) => ({ ...link, vertical: [], floorHole: undefined })),
  };
  const balance = mixedBalance(model, pulse, run.capacities, options.displacement);
  setFlows(balance, t, run.state);
  advance(balance, run.state, 1, run.series);
}

/** A piece whose flows stay as they are: every node exactly from the one before. */
function advancePiece(run: Run, balance: MixedBalance, first: number, until: number): void {
  const { timesS, held, state, series } = run;
  setFlows(balance, timesS[first] ?? 0, state);
  for (let node = first; node < until; node++) {
    if (node > first)
      advance(balance, state, (timesS[node] ?? 0) - (timesS[node - 1] ?? 0), series);
    run.amounts.set(state.subarray(0, held), node * held);
    if (run.slopes) {
      writeSlopes(balance, timesS[node] ?? 0, state, series.rates);
      run.slopes.set(series.rates.subarray(0, held), node * held);
    }
  }
  if (!run.options.wantsBetween) return;
  run.between.push((t) => {
    const node = nodeBefore(timesS, first, until, t);
    const from = new Float64Array(state.length);
    from.set(run.amounts.subarray(node * held, (node + 1) * held));
    advance(balance, from, t - (timesS[node] ?? t), series);
    return from.subarray(0, held);
  });
}

/** One accepted step, kept for times between the nodes. */
interface KeptStep {
  readonly t0: number;
  readonly t1: number;
  readonly dense: Float64Array;
}

/** A piece whose flows follow what the spaces hold, or the time. */
function integratePiece(run: Run, balance: MixedBalance, first: number, until: number): void {
  const { timesS, held, work, dense, amounts, slopes, tolerances, capacities } = run;
  const m = run.model.components.length;
  const whole = capacities.reduce((sum, one) => sum + one, 0);
  for (let i = 0; i < tolerances.length; i++) {
    tolerances[i] = TOLERANCE.fraction * (capacities[Math.floor(i / m)] ?? whole);
  }
  const kept: KeptStep[] = [];
  let node = first;
  work.before.set(run.state);
  run.stepS = stepThrough(
    (t, y, out) => {
      writeSlopes(balance, t, y, out);
    },
    work,
    timesS[first] ?? 0,
    timesS[until - 1] ?? 0,
    {
      relative: TOLERANCE.relative,
      absolute: tolerances,
      firstStepS: run.stepS,
      onTry: (t, h) => {
        fitDecays(balance, t, h);
      },
      longestStepS: () => Math.min(MAX_STEP_S, MOST_TURNOVERS / balance.turnover),
    },
    (t0, t1) => {
      const h = t1 - t0;
      writeDense(work, h, dense);
      for (; node < until && (timesS[node] ?? 0) <= t1; node++) {
        const share = ((timesS[node] ?? 0) - t0) / h;
        const row = node * held;
        for (let i = 0; i < held; i++) amounts[row + i] = denseValue(dense, i, share);
        if (!slopes) continue;
        for (let i = 0; i < held; i++) slopes[row + i] = denseSlope(dense, i, share) / h;
      }
      if (run.options.wantsBetween) kept.push({ t0, t1, dense: Float64Array.from(dense) });
    },
  );
  run.state.set(work.before);
  if (!run.options.wantsBetween) return;
  run.between.push((t) => {
    const out = new Float64Array(held);
    const step = stepAround(kept, t);
    if (!step) return out;
    const share = (t - step.t0) / (step.t1 - step.t0);
    for (let i = 0; i < held; i++) out[i] = denseValue(step.dense, i, share);
    return out;
  });
}

function nodeBefore(timesS: Float64Array, first: number, until: number, t: number): number {
  let low = first;
  let high = until - 1;
  while (low < high) {
    const middle = (low + high + 1) >> 1;
    if ((timesS[middle] ?? Infinity) <= t) low = middle;
    else high = middle - 1;
  }
  return low;
}

function stepAround(steps: readonly KeptStep[], t: number): KeptStep | undefined {
  let low = 0;
  let high = steps.length - 1;
  while (low < high) {
    const middle = (low + high) >> 1;
    if ((steps[middle]?.t1 ?? 0) < t) low = middle + 1;
    else high = middle;
  }
  return steps[low];
}
