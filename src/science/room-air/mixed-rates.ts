import { GRAVITY_M_PER_S2, MOLAR_GAS_CONSTANT } from './air-constants.js';
import { addRelease, type Displacement, type FlowSegment } from './air-flows.js';
import type { AirModel } from './air-model.js';
import { flowsWithNet } from './doorway.js';
import { rectangularFloorExchange } from './floor-opening.js';
import { releaseFlow } from './release-flow.js';
import { verticalOpeningFlows } from './vertical-openings.js';

/**
 * The linear balance of all spaces at one moment: dN/dt = A N + B.
 *
 * N has one row per space, then what has left outdoors, then what has come in; one column per
 * component; amounts in m3 at ambient conditions. Row-major.
 */
export interface MixedRates {
  readonly rows: number;
  readonly matrix: Float64Array;
  readonly sources: Float64Array;
}

/** Whether no flow of a segment depends on what the spaces hold, or on time. */
export function isSteady(segment: FlowSegment): boolean {
  return segment.decaying.length === 0 && segment.links.length === 0;
}

/**
 * Density of what a space holds [kg/m3].
 *
 *   rho = M p/(R T), M = M_air + sum of x_i (M_i - M_air), x_i = amount/capacity
 *
 * @param model      spaces, ambient state and components
 * @param capacities volume of each space at ambient temperature [m3]
 * @param amounts    by space and component, volumes at ambient [m3]
 * @param space      index of the space [-]; outdoors for one past the last
 * @returns density [kg/m3]
 * Source: ideal-gas. Assumes: ideal gas, well mixed, the pressure outdoors. Accuracy: about 0.1 %.
 */
export function spaceDensity(
  model: AirModel,
  capacities: Float64Array,
  amounts: Float64Array,
  space: number,
): number {
  const { pressurePa, temperatureK } = model.input.ambient;
  const m = model.components.length;
  let molar = model.airKgPerMol;
  const at = model.spaces[space]?.temperatureK ?? temperatureK;
  const capacity = capacities[space];
  if (capacity === undefined) {
    for (const one of model.components) molar += one.excessKgPerMol * one.outdoors;
  } else {
    for (let k = 0; k < m; k++) {
      const excess = model.components[k]?.excessKgPerMol ?? 0;
      if (excess !== 0) molar += (excess * (amounts[space * m + k] ?? 0)) / capacity;
    }
  }
  return (molar * pressurePa) / (MOLAR_GAS_CONSTANT * at);
}

/** A solver of one segment's balance, with its work space. */
export interface MixedBalance {
  /** Matrix and sources at a time and state; the same arrays every call. */
  at(t: number, amounts: Float64Array): MixedRates;
  readonly capacities: Float64Array;
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
  const rows = n + 2;
  const fixed = new Float64Array(rows * rows);
  const move = (matrix: Float64Array, from: number, to: number, flow: number): void => {
    if (flow <= 0 || from === to) return;
    const rate = flow / (capacities[from] ?? 1);
    matrix[from * rows + from] = (matrix[from * rows + from] ?? 0) - rate;
    matrix[to * rows + from] = (matrix[to * rows + from] ?? 0) + rate;
  };
  for (let i = 0; i < n; i++) {
    move(fixed, i, n, segment.extractM3PerS[i] ?? 0);
    for (let j = 0; j < n; j++) move(fixed, j, i, segment.between[i * n + j] ?? 0);
  }
  const matrix = new Float64Array(rows * rows);
  const sources = new Float64Array(rows * m);
  const net = new Float64Array(n);
  const pressure = new Float64Array(n);
  const fresh = new Float64Array(n);
  const outdoors = Float64Array.from(model.components, (one) => one.outdoors);

  const balance = (t: number, amounts: Float64Array): MixedRates => {
    matrix.set(fixed);
    sources.fill(0);
    sources.set(segment.sources.subarray(0, n * m));
    net.set(segment.net);
    fresh.set(segment.freshM3PerS);
    for (const release of segment.decaying) {
      const flow = releaseFlow(release, t);
      addRelease(model, release, flow, sources, displacement);
      if (displacement === 'pushOut') {
        net[release.space] = (net[release.space] ?? 0) + flow;
      }
    }
    for (let i = 0; i < n; i++) {
      let value = 0;
      for (let j = 0; j < n; j++) value += (segment.pressures[i * n + j] ?? 0) * (net[j] ?? 0);
      pressure[i] = value;
      const leak = value * (segment.leakM2[i] ?? 0);
      if (leak > 0) move(matrix, i, n, leak);
      else fresh[i] = (fresh[i] ?? 0) - leak;
    }
    for (const link of segment.links) {
      const { a, b } = link;
      const through = link.conductanceM2 * ((pressure[a] ?? 0) - (pressure[b] ?? 0));
      const densityA = spaceDensity(model, capacities, amounts, a);
      const densityB = spaceDensity(model, capacities, amounts, b);
      let aToB: number;
      let bToA: number;
      if (link.floorHole) {
        const gPrime = (2 * GRAVITY_M_PER_S2 * (densityA - densityB)) / (densityA + densityB);
        const { widthM, lengthM } = link.floorHole;
        const flows = flowsWithNet(rectangularFloorExchange(widthM, lengthM, gPrime), through);
        aToB = flows.outM3PerS;
        bToA = flows.inM3PerS;
      } else {
        const flows = verticalOpeningFlows(link.vertical, densityA, densityB, through);
        aToB = flows.aToBM3PerS;
        bToA = flows.bToAM3PerS;
      }
      if (b === n) {
        move(matrix, a, n, aToB);
        fresh[a] = (fresh[a] ?? 0) + bToA;
      } else if (a === n) {
        move(matrix, b, n, bToA);
        fresh[b] = (fresh[b] ?? 0) + aToB;
      } else {
        move(matrix, a, b, aToB);
        move(matrix, b, a, bToA);
      }
    }
    for (let k = 0; k < m; k++) {
      let into = 0;
      let outOf = 0;
      for (let i = 0; i < n; i++) {
        const own = sources[i * m + k] ?? 0;
        const air = (fresh[i] ?? 0) * (outdoors[k] ?? 0);
        sources[i * m + k] = own + air;
        into += Math.max(0, own) + air;
        outOf -= Math.min(0, own);
      }
      sources[n * m + k] = outOf;
      sources[(n + 1) * m + k] = into;
    }
    return { rows, matrix, sources };
  };
  return { at: balance, capacities };
}

/** dN/dt written into `out`. */
export function applyRates(rates: MixedRates, amounts: Float64Array, out: Float64Array): void {
  const { rows, matrix, sources } = rates;
  const m = sources.length / rows;
  out.set(sources);
  for (let i = 0; i < rows; i++) {
    for (let j = 0; j < rows; j++) {
      const rate = matrix[i * rows + j] ?? 0;
      if (rate === 0) continue;
      for (let k = 0; k < m; k++) {
        out[i * m + k] = (out[i * m + k] ?? 0) + rate * (amounts[j * m + k] ?? 0);
      }
    }
  }
}
