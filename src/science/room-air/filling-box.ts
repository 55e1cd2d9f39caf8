import { bracketedRoot } from '../numerics/root.js';
import { integratedState } from '../numerics/runge-kutta.js';
import { displacementFlow } from './vent-flow.js';
import { plumeFlow } from './plume.js';

/**
 * Time scale of the filling of a closed space by a plume [s].
 *
 *   tau = 1.5 A/(C B^(1/3) Hs^(2/3))
 *
 * @param floorAreaM2  plan area A [m2]
 * @param buoyancyFlux B [m4/s3], above 0
 * @param riseM        source to ceiling Hs [m], above 0
 * @param constant     plume constant C [-]
 * @returns time scale [s]
 * Source: baines-turner-1969. Assumes: plan wider than the rise, still air. Accuracy: not stated.
 */
export function fillingTime(
  floorAreaM2: number,
  buoyancyFlux: number,
  riseM: number,
  constant: number,
): number {
  return (1.5 * floorAreaM2) / (constant * Math.cbrt(buoyancyFlux) * riseM ** (2 / 3));
}

/**
 * Height of the first front above the source [m].
 *
 *   z1 = Hs (1 + t/tau)^(-3/2)
 *
 * @param riseM   source to ceiling Hs [m]
 * @param timeS   time [s]
 * @param fillingTimeS tau [s]
 * @returns height [m]
 * Source: baines-turner-1969. Assumes: volume of the gas itself neglected. Accuracy: not stated.
 */
export function firstFrontHeight(riseM: number, timeS: number, fillingTimeS: number): number {
  return riseM * (1 + timeS / fillingTimeS) ** -1.5;
}

/** A plume into a space with an upper and a lower vent. */
export interface EmptyingBox {
  readonly heightM: number;
  readonly effectiveAreaM2: number;
  readonly buoyancyFlux: number;
  readonly plumeConstant: number;
}

/**
 * Steady interface height over the height between the vents [-].
 *
 *   xi^(5/2)/(1 - xi)^(1/2) = A* /(C^(3/2) H^2)
 *
 * @param effectiveAreaM2 A* [m2]
 * @param heightM         height between the vents H [m]
 * @param constant        plume constant C [-]
 * @returns xi [-], independent of the release
 * Source: linden-lane-serff-smeed-1990. Assumes: point source at the floor, no draughts.
 * Accuracy: agrees with salt tests within their scatter.
 */
export function interfaceFraction(
  effectiveAreaM2: number,
  heightM: number,
  constant: number,
): number {
  const area = effectiveAreaM2 / (constant ** 1.5 * heightM ** 2);
  // Squared, so that the end at xi = 1 is finite.
  return bracketedRoot((xi) => xi ** 5 - area ** 2 * (1 - xi), 0, 1, 1e-14);
}

/** A uniform layer under the ceiling. */
export interface UniformLayer {
  readonly depthM: number;
  readonly gPrime: number;
}

/**
 * Depth and reduced gravity of the upper layer of an emptying box [m, m/s2] over time.
 *
 *   A dh/dt = C B^(1/3) (H - h)^(5/3) - A* sqrt(g1 h);  A d(h g1)/dt = B - g1 A* sqrt(g1 h)
 *
 * State: layer volume over area h [m] and h g1 [m2/s2]; embedded Runge-Kutta 5(4); limit: the
 * steady interface of interfaceFraction.
 *
 * @param box         the box
 * @param floorAreaM2 plan area A [m2]
 * @param timesS      rising times [s]
 * @returns the layer at those times
 * Source: kaye-hunt-2004 (uniform layer). Assumes: starts without a layer. Accuracy: integration to
 * 1e-9.
 */
export function emptyingBoxLayers(
  box: EmptyingBox,
  floorAreaM2: number,
  timesS: readonly number[],
): readonly UniformLayer[] {
  const rate = (_: number, y: Float64Array, out: Float64Array): void => {
    const h = Math.max(0, y[0] ?? 0);
    const buoyancy = Math.max(0, y[1] ?? 0);
    const gPrime = h > 0 ? buoyancy / h : 0;
    const vent = displacementFlow(box.effectiveAreaM2, gPrime, h);
    out[0] = (plumeFlow(box.buoyancyFlux, box.heightM - h, box.plumeConstant) - vent) / floorAreaM2;
    out[1] = (box.buoyancyFlux - gPrime * vent) / floorAreaM2;
  };
  // A first thin layer as the plume makes it, so that g1 is defined.
  const top = plumeFlow(box.buoyancyFlux, box.heightM, box.plumeConstant);
  const first = 1e-6;
  let state = Float64Array.of(
    (top * first) / floorAreaM2,
    (box.buoyancyFlux * first) / floorAreaM2,
  );
  let at = 0;
  return timesS.map((t) => {
    state = Float64Array.from(
      integratedState(rate, state, at, t, { relative: 1e-9, absolute: 1e-12, maxStepS: 60 }),
    );
    at = t;
    const h = state[0] ?? 0;
    return { depthM: h, gPrime: h > 0 ? (state[1] ?? 0) / h : 0 };
  });
}
