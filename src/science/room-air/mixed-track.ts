import { exponentialStep, type ExponentialStep } from '../numerics/matrix-exponential.js';
import { hermiteValue, integratedState, type AcceptedStep } from '../numerics/runge-kutta.js';
import { flowSegment, addRelease, type Displacement, type FlowSegment } from './air-flows.js';
import type { AirModel } from './air-model.js';
import { applyRates, isSteady, mixedBalance, type MixedBalance } from './mixed-rates.js';

/** One moment of the well-mixed answer; amounts row-major as in MixedRates. */
export interface MixedNode {
  readonly t: number;
  readonly amounts: Float64Array;
  readonly slopes: Float64Array;
  readonly capacities: Float64Array;
}

/** A piece without jumps; its nodes include both ends. */
export interface MixedPiece {
  readonly fromS: number;
  readonly toS: number;
  readonly nodes: readonly MixedNode[];
  readonly segment: FlowSegment;
  /** Exact state at any time inside the piece, from the node before. */
  stateAt(t: number): Float64Array;
}

/** Tolerances of the integration where flows depend on what the spaces hold. */
const RELATIVE = 1e-8;
const ABSOLUTE = 1e-11;
const MAX_STEP_S = 300;

/**
 * The well-mixed answer of all spaces over the whole time, in pieces between jumps.
 *
 *   state  amounts N [m3 at ambient] of each component in each space
 *   balance dN/dt = A N + B (MixedRates), closed by a volume balance in every space
 *   step   exact matrix exponential where A and B are constant; embedded Runge-Kutta 5(4) where an
 *          opening exchanges by density or a release decays
 *   limit  one space without openings is the textbook exponential
 *
 * @param model   resolved input
 * @param timesS  rising times wanted as nodes
 * @param displacement whether a release pushes mixture out
 * @param useMixingVolume the run of the mixing factor in which it shrinks the volume too
 */
export function mixedTrack(
  model: AirModel,
  timesS: readonly number[],
  displacement: Displacement,
  useMixingVolume: boolean,
): readonly MixedPiece[] {
  const n = model.spaces.length;
  const m = model.components.length;
  const pieces: MixedPiece[] = [];
  let amounts = new Float64Array((n + 2) * m);
  let capacities = Float64Array.from(model.spaces, (space) => space.capacityM3);
  for (const [i, space] of model.spaces.entries()) {
    for (let k = 0; k < m; k++) {
      const held = (space.initial[k] ?? 0) * space.capacityM3;
      amounts[i * m + k] = held;
      amounts[(n + 1) * m + k] = (amounts[(n + 1) * m + k] ?? 0) + held;
    }
  }
  const edges = model.edgesS;
  let wanted = 0;
  for (let e = 0; e + 1 < edges.length; e++) {
    const from = edges[e] ?? 0;
    const to = edges[e + 1] ?? 0;
    const segment = flowSegment(model, from, to, displacement);
    if (useMixingVolume) {
      const next = Float64Array.from(
        model.spaces,
        (space, i) => space.capacityM3 * (segment.mixing[i] ?? 1),
      );
      amounts = rescaled(amounts, capacities, next, m);
      capacities = next;
    }
    amounts = afterPulses(model, segment, from, amounts, capacities, displacement);
    const inside: number[] = [from];
    while ((timesS[wanted] ?? Infinity) <= from) wanted++;
    while ((timesS[wanted] ?? Infinity) < to) {
      inside.push(timesS[wanted] ?? to);
      wanted++;
    }
    inside.push(to);
    const balance = mixedBalance(model, segment, capacities, displacement);
    const piece = isSteady(segment)
      ? steadyPiece(segment, balance, inside, amounts)
      : integratedPiece(segment, balance, inside, amounts);
    pieces.push(piece);
    amounts = Float64Array.from(piece.nodes.at(-1)?.amounts ?? amounts);
  }
  // What is released at the very end of the run is still shown there.
  const end = edges.at(-1) ?? 0;
  const last = pieces.at(-1);
  if (last && model.releases.some((one) => one.endS <= one.startS && one.startS === end)) {
    const after = afterPulses(model, last.segment, end, amounts, capacities, displacement);
    const node = { t: end, amounts: after, slopes: new Float64Array(after.length), capacities };
    pieces.push({ ...last, fromS: end, toS: end, nodes: [node], stateAt: () => after });
  }
  return pieces;
}

function rescaled(
  amounts: Float64Array,
  before: Float64Array,
  after: Float64Array,
  m: number,
): Float64Array<ArrayBuffer> {
  const scaled = Float64Array.from(amounts);
  for (let i = 0; i < before.length; i++) {
    const factor = (after[i] ?? 1) / (before[i] ?? 1);
    for (let k = 0; k < m; k++) scaled[i * m + k] = (scaled[i * m + k] ?? 0) * factor;
  }
  return scaled;
}

/** State after everything that is released at once at this moment: mixture is pushed out evenly. */
function afterPulses(
  model: AirModel,
  segment: FlowSegment,
  t: number,
  amounts: Float64Array,
  capacities: Float64Array,
  displacement: Displacement,
): Float64Array<ArrayBuffer> {
  const pulses = model.releases.filter((one) => one.endS <= one.startS && one.startS === t);
  const state = Float64Array.from(amounts);
  if (pulses.length === 0) return state;
  const n = model.spaces.length;
  const m = model.components.length;
  const net = new Float64Array(n);
  const sources = new Float64Array(n * m);
  for (const release of pulses) {
    addRelease(model, release, release.totalM3, sources, displacement);
    if (displacement === 'pushOut')
      net[release.space] = (net[release.space] ?? 0) + release.totalM3;
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
  const rates = mixedBalance(model, pulse, capacities, displacement).at(t, state);
  return stepped(exponentialStep(rates.matrix, rates.rows, 1), state, rates.sources, rates.rows);
}

function stepped(
  step: ExponentialStep,
  amounts: Float64Array,
  sources: Float64Array,
  rows: number,
): Float64Array<ArrayBuffer> {
  const m = amounts.length / rows;
  const next = new Float64Array(amounts.length);
  for (let i = 0; i < rows; i++) {
    for (let j = 0; j < rows; j++) {
      const keep = step.propagator[i * rows + j] ?? 0;
      const gain = step.integral[i * rows + j] ?? 0;
      if (keep === 0 && gain === 0) continue;
      for (let k = 0; k < m; k++) {
        next[i * m + k] =
          (next[i * m + k] ?? 0) +
          keep * (amounts[j * m + k] ?? 0) +
          gain * (sources[j * m + k] ?? 0);
      }
    }
  }
  return next;
}

function steadyPiece(
  segment: FlowSegment,
  balance: MixedBalance,
  times: readonly number[],
  start: Float64Array,
): MixedPiece {
  const rates = balance.at(times[0] ?? 0, start);
  const fixed = {
    rows: rates.rows,
    matrix: Float64Array.from(rates.matrix),
    sources: Float64Array.from(rates.sources),
  };
  const steps = new Map<number, ExponentialStep>();
  const stepOf = (dt: number): ExponentialStep => {
    const key = Math.round(dt * 1e9);
    const known = steps.get(key);
    if (known) return known;
    const fresh = exponentialStep(fixed.matrix, fixed.rows, dt);
    steps.set(key, fresh);
    return fresh;
  };
  const nodes: MixedNode[] = [];
  let amounts = Float64Array.from(start);
  let before = times[0] ?? 0;
  for (const t of times) {
    if (t > before) amounts = stepped(stepOf(t - before), amounts, fixed.sources, fixed.rows);
    const slopes = new Float64Array(amounts.length);
    applyRates(fixed, amounts, slopes);
    nodes.push({ t, amounts, slopes, capacities: balance.capacities });
    before = t;
  }
  return {
    fromS: segment.fromS,
    toS: segment.toS,
    nodes,
    segment,
    stateAt: (t) => {
      const node = nodeBefore(nodes, t);
      if (!node || t <= node.t) return node?.amounts ?? start;
      const step = exponentialStep(fixed.matrix, fixed.rows, t - node.t);
      return stepped(step, node.amounts, fixed.sources, fixed.rows);
    },
  };
}

function integratedPiece(
  segment: FlowSegment,
  balance: MixedBalance,
  times: readonly number[],
  start: Float64Array,
): MixedPiece {
  const derivative = (t: number, y: Float64Array, out: Float64Array): void => {
    applyRates(balance.at(t, y), y, out);
  };
  const steps: AcceptedStep[] = [];
  const from = times[0] ?? 0;
  const to = times.at(-1) ?? from;
  const options = { relative: RELATIVE, absolute: ABSOLUTE, maxStepS: MAX_STEP_S };
  const end = integratedState(derivative, start, from, to, options, (step) => {
    steps.push(step);
    return undefined;
  });
  const stateAt = (t: number): Float64Array => {
    if (t >= to) return end;
    const step = stepAround(steps, t);
    if (!step) return start;
    return Float64Array.from(start, (_, index) => hermiteValue(step, index, t));
  };
  const nodes = times.map((t) => {
    const amounts = stateAt(t);
    const slopes = new Float64Array(amounts.length);
    derivative(t, amounts, slopes);
    return { t, amounts, slopes, capacities: balance.capacities };
  });
  return { fromS: segment.fromS, toS: segment.toS, nodes, segment, stateAt };
}

function nodeBefore(nodes: readonly MixedNode[], t: number): MixedNode | undefined {
  let low = 0;
  let high = nodes.length - 1;
  while (low < high) {
    const middle = (low + high + 1) >> 1;
    if ((nodes[middle]?.t ?? Infinity) <= t) low = middle;
    else high = middle - 1;
  }
  return nodes[low];
}

function stepAround(steps: readonly AcceptedStep[], t: number): AcceptedStep | undefined {
  let low = 0;
  let high = steps.length - 1;
  while (low < high) {
    const middle = (low + high) >> 1;
    if ((steps[middle]?.t1 ?? 0) < t) low = middle + 1;
    else high = middle;
  }
  return steps[low];
}
