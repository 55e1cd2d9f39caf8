import { linearSolution } from '../numerics/linear-solve.js';
import type { AirOpening, Timed } from './air-input.js';
import type { AirModel } from './air-model.js';
import { BACKGROUND_CO2, OXYGEN } from './air-model.js';
import { breathFlows } from './occupant.js';
import { plantFlows, servedShares } from './plant-flows.js';
import { releaseFlow, type ReleasePlan } from './release-flow.js';
import type { VerticalOpening } from './vertical-openings.js';

/**
 * How a release moves the air: `pushOut`, the mixture leaves as the gas arrives (exact at constant
 * pressure); `straight`, the gas only replaces air and nothing of it leaves for its own sake.
 */
export type Displacement = 'pushOut' | 'straight';

/** A path on which the two sides settle their difference of inflow and outflow. */
export interface OpenLink {
  readonly a: number;
  /** Index of the other space, or the number of spaces for outdoors. */
  readonly b: number;
  readonly conductanceM2: number;
  readonly vertical: readonly VerticalOpening[];
  /** Horizontal hole; side a lies above. */
  readonly floorHole: { readonly widthM: number; readonly lengthM: number } | undefined;
}

/** Everything that stays the same between two edges. */
export interface FlowSegment {
  readonly fromS: number;
  readonly toS: number;
  /** flow[i * n + j]: from space j to space i [m3/s]. */
  readonly between: Float64Array;
  readonly freshM3PerS: Float64Array;
  readonly extractM3PerS: Float64Array;
  /** Sources of each component in each space, without outdoor air [m3/s]. */
  readonly sources: Float64Array;
  /** Inflow less listed outflow, steady part [m3/s]. */
  readonly net: Float64Array;
  readonly decaying: readonly ReleasePlan[];
  readonly links: readonly OpenLink[];
  readonly leakM2: Float64Array;
  /** Pressure answer to a unit of net inflow, n by n. */
  readonly pressures: Float64Array;
  /** Mixing factor of each space, at most 1. */
  readonly mixing: Float64Array;
}

/** Default discharge coefficients (medians): towards outdoors for removal, between spaces. */
export const DISCHARGE_COEFFICIENTS = {
  removal: { low: 0.35, mode: 0.45, high: 0.55, source: 'own-room-air' },
  spread: { low: 0.6, mode: 0.75, high: 0.85, source: 'own-room-air' },
} as const;

/** Area of gaps per flow of fresh air [m2 per m3/s]: about 3 m/s through gaps at 5 to 10 Pa. */
const GAP_AREA_PER_FLOW = 0.2;

/** Fresh air of a closed group below which its gaps are taken to lie everywhere [m3/s]. */
const LEAST_KNOWN_FLOW = 1e-9;

/** Whether something with a schedule runs at a time: from its start on, no longer at its end. */
export function isActive(one: Timed, t: number): boolean {
  return t >= (one.fromS ?? 0) && t < (one.toS ?? Infinity);
}

function effectiveWidth(opening: AirOpening, toOutdoors: boolean): number {
  const coefficient =
    opening.dischargeCoefficient ??
    (toOutdoors ? DISCHARGE_COEFFICIENTS.removal.mode : DISCHARGE_COEFFICIENTS.spread.mode);
  return opening.widthM * (opening.openFraction ?? 1) * coefficient;
}

function openLinks(model: AirModel, t: number): readonly OpenLink[] {
  const n = model.spaces.length;
  const vertical = new Map<string, { a: number; b: number; openings: VerticalOpening[] }>();
  const links: OpenLink[] = [];
  for (const opening of model.input.openings ?? []) {
    if (!isActive(opening, t) || (opening.openFraction ?? 1) <= 0) continue;
    const from = opening.from === 'outside' ? n : (model.indexOf.get(opening.from) ?? n);
    const to = opening.to === 'outside' ? n : (model.indexOf.get(opening.to) ?? n);
    if (from === to) continue;
    const a = Math.min(from, to);
    const b = Math.max(from, to);
    const width = effectiveWidth(opening, b === n);
    if (opening.kind === 'floorOpening') {
      const level = (index: number): number =>
        model.spaces[index]?.curve.floorLevelM ?? Number.POSITIVE_INFINITY;
      const upper = level(from) >= level(to) ? from : to;
      links.push({
        a: upper,
        b: upper === from ? to : from,
        conductanceM2: width * opening.heightM,
        vertical: [],
        floorHole: {
          widthM: opening.widthM * (opening.openFraction ?? 1),
          lengthM: opening.heightM,
        },
      });
      continue;
    }
    const key = `${String(a)} ${String(b)}`;
    const group = vertical.get(key) ?? { a, b, openings: [] };
    group.openings.push({
      sillM: opening.sillLevelM ?? model.spaces[a]?.curve.floorLevelM ?? 0,
      heightM: opening.heightM,
      effectiveWidthM: width,
    });
    vertical.set(key, group);
  }
  for (const { a, b, openings } of vertical.values()) {
    const conductanceM2 = openings.reduce((sum, one) => sum + one.effectiveWidthM * one.heightM, 0);
    links.push({ a, b, conductanceM2, vertical: openings, floorHole: undefined });
  }
  return links;
}

/** Gaps: where fresh air is known to come in or go out; else everywhere in a closed group. */
function leakAreas(model: AirModel, links: readonly OpenLink[], known: Float64Array): Float64Array {
  const n = model.spaces.length;
  const group = Int32Array.from({ length: n + 1 }, (_, i) => i);
  const root = (i: number): number => {
    let at = i;
    while (group[at] !== at) at = group[at] ?? at;
    return at;
  };
  for (const link of links) group[root(link.a)] = root(link.b);
  const leaks = known.map((flow) => flow * GAP_AREA_PER_FLOW);
  for (let i = 0; i < n; i++) {
    if (root(i) === root(n)) continue;
    let total = 0;
    for (let j = 0; j < n; j++) if (root(j) === root(i)) total += known[j] ?? 0;
    if (total > LEAST_KNOWN_FLOW) continue;
    leaks[i] = (model.spaces[i]?.capacityM3 ?? 1) * 1e-6;
  }
  return leaks;
}

function pressureAnswer(n: number, links: readonly OpenLink[], leaks: Float64Array): Float64Array {
  const matrix = new Float64Array(n * n);
  const unit = new Float64Array(n * n);
  const add = (i: number, j: number, value: number): void => {
    matrix[i * n + j] = (matrix[i * n + j] ?? 0) + value;
  };
  for (let i = 0; i < n; i++) {
    unit[i * n + i] = 1;
    add(i, i, leaks[i] ?? 0);
  }
  for (const { a, b, conductanceM2 } of links) {
    if (a < n) add(a, a, conductanceM2);
    if (b < n) add(b, b, conductanceM2);
    if (a < n && b < n) {
      add(a, b, -conductanceM2);
      add(b, a, -conductanceM2);
    }
  }
  return linearSolution(matrix, unit, n, n);
}

/** The part of the flows that only schedules of openings and plant change. */
type Ventilation = Pick<
  FlowSegment,
  'between' | 'freshM3PerS' | 'extractM3PerS' | 'net' | 'links' | 'leakM2' | 'pressures' | 'mixing'
>;

function ventilation(model: AirModel, t: number): Ventilation {
  const n = model.spaces.length;
  const { input } = model;
  const between = new Float64Array(n * n);
  const fresh = new Float64Array(n);
  const extract = new Float64Array(n);
  const net = new Float64Array(n);
  const known = new Float64Array(n);
  const mixing = new Float64Array(n).fill(1);
  const place = (id: string): number => model.indexOf.get(id) ?? 0;

  for (const system of input.airSystems ?? []) {
    if (!isActive(system, t)) continue;
    const served = servedShares(system);
    const { supplyM3PerS: supply, exhaustM3PerS: exhaust, mixing: factor } = plantFlows(system);
    for (const { space, share } of served) {
      const i = place(space);
      mixing[i] = Math.min(mixing[i] ?? 1, factor);
      add(fresh, i, supply * share);
      add(extract, i, exhaust * share);
      add(known, i, Math.max(supply, exhaust) * share);
      for (const other of served) {
        add(
          between,
          i * n + place(other.space),
          (system.recirculatedM3PerS ?? 0) * share * other.share,
        );
      }
    }
  }
  for (const one of input.infiltration ?? []) {
    if (!isActive(one, t)) continue;
    const i = place(one.space);
    const flow =
      (one.airChangesPerHour / 3600) * (model.spaces[i]?.capacityM3 ?? 0) * (mixing[i] ?? 1);
    add(fresh, i, flow);
    add(known, i, flow);
  }
  for (const one of input.transfers ?? []) {
    if (!isActive(one, t)) continue;
    const from = one.from === 'outside' ? n : place(one.from);
    const to = one.to === 'outside' ? n : place(one.to);
    if (from < n && to < n) {
      add(between, to * n + from, one.flowM3PerS);
    } else if (from < n) add(extract, from, one.flowM3PerS);
    else if (to < n) add(fresh, to, one.flowM3PerS);
  }
  for (let i = 0; i < n; i++) {
    add(net, i, (fresh[i] ?? 0) - (extract[i] ?? 0));
    for (let j = 0; j < n; j++) {
      if (i === j) continue;
      const flow = between[i * n + j] ?? 0;
      add(net, i, flow);
      add(net, j, -flow);
    }
  }
  const links = openLinks(model, t);
  const leakM2 = leakAreas(model, links, known);
  return {
    between,
    freshM3PerS: fresh,
    extractM3PerS: extract,
    net,
    links,
    leakM2,
    pressures: pressureAnswer(n, links, leakM2),
    mixing,
  };
}

function add(to: Float64Array, at: number, value: number): void {
  to[at] = (to[at] ?? 0) + value;
}

/** By segment between edges: which of the timed things act in it, in their own order. */
function activeBySegment(
  edges: readonly number[],
  spans: readonly (readonly [from: number, to: number])[],
): readonly (readonly number[])[] {
  const active = Array.from({ length: Math.max(0, edges.length - 1) }, (): number[] => []);
  for (const [index, [from, to]] of spans.entries()) {
    for (let e = segmentAt(edges, from); e < active.length; e++) {
      const middle = 0.5 * ((edges[e] ?? 0) + (edges[e + 1] ?? 0));
      if (middle >= to) break;
      if (middle >= from) active[e]?.push(index);
    }
  }
  return active;
}

/** The last segment that starts at or before a time; the first one for any time before. */
function segmentAt(edges: readonly number[], t: number): number {
  let low = 0;
  let high = edges.length - 1;
  while (low < high) {
    const middle = (low + high + 1) >> 1;
    if ((edges[middle] ?? Infinity) <= t) low = middle;
    else high = middle - 1;
  }
  return low;
}

const timedSpan = (one: Timed): readonly [number, number] => [one.fromS ?? 0, one.toS ?? Infinity];

/**
 * All flows of a run in segments between edges, in order.
 *
 * What openings and plant do is worked out once for every set of them that acts together: a long day
 * has hundreds of segments, but few states of its doors and fans.
 */
export function flowSegments(
  model: AirModel,
  displacement: Displacement,
  edgesS: readonly number[] = model.edgesS,
): readonly FlowSegment[] {
  const { input } = model;
  const n = model.spaces.length;
  const m = model.components.length;
  const plant = [
    ...(input.openings ?? []),
    ...(input.airSystems ?? []),
    ...(input.infiltration ?? []),
    ...(input.transfers ?? []),
  ].filter((one) => one.fromS !== undefined || one.toS !== undefined);
  const people = input.occupants ?? [];
  const continuous = model.releases.filter((one) => one.endS > one.startS);
  const plantIn = activeBySegment(edgesS, plant.map(timedSpan));
  const peopleIn = activeBySegment(edgesS, people.map(timedSpan));
  const releasesIn = activeBySegment(
    edgesS,
    continuous.map((one) => [one.startS, one.endS] as const),
  );
  const states = new Map<string, Ventilation>();
  return edgesS.slice(0, -1).map((fromS, e) => {
    const toS = edgesS[e + 1] ?? fromS;
    const middle = 0.5 * (fromS + toS);
    const key = (plantIn[e] ?? []).join(' ');
    const still = states.get(key) ?? ventilation(model, middle);
    states.set(key, still);
    const sources = new Float64Array(n * m);
    const net = Float64Array.from(still.net);
    for (const index of peopleIn[e] ?? []) {
      const one = people[index];
      if (!one) continue;
      const i = model.indexOf.get(one.space) ?? 0;
      const { carbonDioxide, oxygen } = breathFlows(one, model.siteFactor);
      add(sources, i * m + BACKGROUND_CO2, carbonDioxide);
      add(sources, i * m + OXYGEN, -oxygen);
      add(net, i, carbonDioxide - oxygen);
    }
    const decaying: ReleasePlan[] = [];
    for (const index of releasesIn[e] ?? []) {
      const release = continuous[index];
      if (!release) continue;
      if (release.decayS !== undefined) {
        decaying.push(release);
        continue;
      }
      const flow = releaseFlow(release, middle);
      addRelease(model, release, flow, sources, displacement);
      if (displacement === 'pushOut') add(net, release.space, flow);
    }
    return { ...still, fromS, toS, sources, net, decaying };
  });
}

/** The flows between two edges. */
export function flowSegment(
  model: AirModel,
  fromS: number,
  toS: number,
  displacement: Displacement,
): FlowSegment {
  const [segment] = flowSegments(model, displacement, [fromS, toS]);
  if (!segment) throw new RangeError(`no time from ${String(fromS)} to ${String(toS)}`);
  return segment;
}

/** Adds what a release brings per second to the sources of its space. */
export function addRelease(
  model: AirModel,
  release: ReleasePlan,
  flow: number,
  sources: Float64Array,
  displacement: Displacement,
): void {
  const m = model.components.length;
  const base = release.space * m;
  const origin = model.origins.get(release.index);
  for (const [gas, share] of Object.entries(release.shares)) {
    if (gas === 'air') {
      // Air from a bottle counts as outdoor air; in the straight form it displaces nothing.
      if (displacement === 'straight') continue;
      for (const [column, one] of model.components.entries()) {
        add(sources, base + column, flow * share * one.outdoors);
      }
      continue;
    }
    const column = model.components.findIndex((one) => one.gas === gas && one.origin === origin);
    if (column >= 0) add(sources, base + column, flow * share);
    if (gas === 'O2' && displacement === 'pushOut') add(sources, base + OXYGEN, flow * share);
  }
}
