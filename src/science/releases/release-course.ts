import { inRange, type Range } from '../range.js';

export const releaseAmountRange: Range = { min: 0, max: 1e7, unit: 'mol', name: 'amount' };

/** Course of a release in time, in the terms of the air model. */
export interface ReleaseCourse {
  readonly amountMol: number;
  /** 0 means at once [s]. */
  readonly durationS: number;
  readonly profile: 'steady' | 'decaying';
  readonly timeConstantS?: number;
}

/**
 * Course of a release that happens at once: open valve, burst balloon, tank or liquid spilled [mol, s].
 *
 * @param amountMol  the whole content [mol], 0 to 1e7
 * @returns  the course [mol, s]
 * @throws {OutOfRange} outside the range above
 * Source: release-courses. Assumes: caution; seconds count as nothing. Accuracy: a bound in time.
 * @example releaseAtOnce(12).durationS // 0
 */
export function releaseAtOnce(amountMol: number): ReleaseCourse {
  inRange(amountMol, releaseAmountRange, '/amountMol');
  return { amountMol, durationS: 0, profile: 'steady' };
}

/**
 * Course of a regulated flow left open until the container is empty [mol, s].
 *
 *   duration = n/n'
 *
 * @param contentMol  content of the container [mol], 0 to 1e7
 * @param flowMolPerS  regulated flow [mol/s], above 0
 * @param longestS  when somebody shuts it [s]; infinite if nobody does
 * @returns  the course [mol, s]
 * @throws {OutOfRange} outside the ranges above
 * Source: release-courses. Assumes: flow constant until the container is empty.
 * Accuracy: the last minutes are slower than stated.
 * @example regulatedRelease(100, 0.5, 60).amountMol // 30
 */
export function regulatedRelease(
  contentMol: number,
  flowMolPerS: number,
  longestS: number,
): ReleaseCourse {
  inRange(contentMol, releaseAmountRange, '/contentMol');
  inRange(
    flowMolPerS,
    { min: 1e-9, max: 1e6, unit: 'mol/s', name: 'regulated flow' },
    '/flowMolPerS',
  );
  const durationS = Math.min(contentMol / flowMolPerS, longestS);
  return { amountMol: flowMolPerS * durationS, durationS, profile: 'steady' };
}

/**
 * Course of a blow-down through a hole in the isothermal picture [mol, s].
 *
 *   n' = (n/tau) exp(-t/tau), ended after five time constants
 *
 * @param amountMol  amount above room pressure [mol], 0 to 1e7
 * @param timeConstantS  time constant of the hole [s], above 0
 * @returns  the course [mol, s]
 * @throws {OutOfRange} outside the ranges above
 * Source: release-courses. Assumes: choked throughout; what is left then comes within the five.
 * Accuracy: 20 %, that of the hole.
 * @example blowDownRelease(400, 15).durationS // 75
 */
export function blowDownRelease(amountMol: number, timeConstantS: number): ReleaseCourse {
  inRange(amountMol, releaseAmountRange, '/amountMol');
  inRange(
    timeConstantS,
    { min: 1e-3, max: 1e7, unit: 's', name: 'time constant' },
    '/timeConstantS',
  );
  return { amountMol, durationS: 5 * timeConstantS, profile: 'decaying', timeConstantS };
}

/**
 * Time in which a full open tank of dense gas loses it by diffusion alone [s].
 *
 *   t = d^2/(2 D)
 *
 * @param depthM  depth of the tank [m]
 * @param diffusivityM2PerS  of the gas in air [m^2/s]
 * @returns  time [s]; draughts make it far shorter
 * Source: release-courses. Assumes: still air above. Accuracy: order of magnitude.
 * @example tankDiffusionTime(0.5, 1e-5) / 3600 // 3.5
 */
export function tankDiffusionTime(depthM: number, diffusivityM2PerS: number): number {
  return depthM ** 2 / (2 * diffusivityM2PerS);
}
