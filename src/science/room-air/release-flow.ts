import type { AirRelease } from './air-input.js';
import type { AirGasTable } from './air-gases.js';

/** A release as the balances use it; volumes at ambient temperature and pressure. */
export interface ReleasePlan {
  readonly index: number;
  readonly space: number;
  readonly episode: string;
  readonly totalM3: number;
  readonly startS: number;
  /** End of the flow; equal to the start for one at once, infinite for an endless decay. */
  readonly endS: number;
  readonly decayS: number | undefined;
  /** Share of each gas of the release, `air` included. */
  readonly shares: Readonly<Record<string, number>>;
  readonly molarMassKgPerMol: number;
  readonly source: AirRelease;
}

/**
 * Volume flow of a release [m3/s at ambient conditions].
 *
 *   steady V/d; decaying q0 exp(-(t - start)/tau), q0 = V/(tau (1 - exp(-d/tau)))
 *
 * @param plan release
 * @param t    time [s]
 * @returns flow [m3/s]; 0 outside its time and for one at once
 * Source: own-room-air. Assumes: nothing more. Accuracy: exact.
 */
export function releaseFlow(plan: ReleasePlan, t: number): number {
  if (t < plan.startS || t >= plan.endS || plan.endS <= plan.startS) return 0;
  if (plan.decayS === undefined) return plan.totalM3 / (plan.endS - plan.startS);
  const tau = plan.decayS;
  const first = plan.totalM3 / (tau * -Math.expm1(-(plan.endS - plan.startS) / tau));
  return first * Math.exp(-(t - plan.startS) / tau);
}

/**
 * Volume released up to a time [m3 at ambient conditions].
 *
 *   integral of releaseFlow; all of it from the start on for one at once
 *
 * @param plan release
 * @param t    time [s]
 * @returns volume [m3]
 * Source: own-room-air. Assumes: nothing more. Accuracy: exact.
 */
export function releasedVolume(plan: ReleasePlan, t: number): number {
  if (t < plan.startS) return 0;
  if (t >= plan.endS) return plan.totalM3;
  if (plan.decayS === undefined) {
    return (plan.totalM3 * (t - plan.startS)) / (plan.endS - plan.startS);
  }
  const tau = plan.decayS;
  return (
    (plan.totalM3 * Math.expm1(-(t - plan.startS) / tau)) /
    Math.expm1(-(plan.endS - plan.startS) / tau)
  );
}

/**
 * Molar mass of a release [kg/mol].
 *
 *   M = sum of x_i M_i
 *
 * @param shares      share of each gas [-], `air` included, together 1
 * @param gases       gas table
 * @param airKgPerMol molar mass of the air of the room [kg/mol]
 * @returns molar mass [kg/mol]; a gas that the table lacks counts as air
 * Source: own-derivation (mole-fraction mean). Assumes: shares add up to 1. Accuracy: exact.
 * @example releaseMolarMass({ He: 0.5, air: 0.5 }, { He: { molarMassKgPerMol: 0.004 } }, 0.029) // 0.0165
 */
export function releaseMolarMass(
  shares: Readonly<Record<string, number>>,
  gases: AirGasTable,
  airKgPerMol: number,
): number {
  return Object.entries(shares).reduce(
    (sum, [gas, share]) =>
      sum + share * (gas === 'air' ? airKgPerMol : (gases[gas]?.molarMassKgPerMol ?? airKgPerMol)),
    0,
  );
}
