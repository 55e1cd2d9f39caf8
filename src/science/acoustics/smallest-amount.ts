import type { GasLibrary } from '../gases/gas-library.js';
import { inRange, type Range } from '../range.js';
import { noteRatio, shareForRatio, type GasInAir } from './gas-fraction.js';

/** Shifts worth naming [cent]: heard side by side, obvious, striking (project judgement). */
export const audibleShifts = { sideBySide: 10, obvious: 100, striking: 300 } as const;

/** Formant changes worth naming [1]: noticeable and obvious (project judgement). */
export const audibleFormantChanges = { noticeable: 0.05, obvious: 0.15 } as const;

export const enclosureVolumeRange: Range = {
  min: 1e-6,
  max: 1000,
  unit: 'm3',
  name: 'enclosure volume',
};

const targetShare: Range = { min: 0, max: 1, unit: '', name: 'share of gas' };

/**
 * Smallest share of gas that moves an immersed resonator by an interval, or null [1].
 *
 *   c(x)/c_air = 2^(+-cents/1200), upwards for light gases and downwards for heavy ones
 *
 * @param library  gas data [data]
 * @param given  gas id, temperatures [K], pressure [Pa], humidity [1]
 * @param cents  size of the shift [cent], above 0
 * @returns  share of gas [1], or null where even the pure gas falls short
 * @throws {OutOfRange} outside the ranges of the room model
 * Source: pitch-inversion. Assumes: resonator wholly immersed. Accuracy: 0.5 % of itself.
 * @example shareForShift(library, { gas: 'He', temperatureK: 293.15, pressurePa: 101325, relativeHumidity: 0.5, model: 'ideal' }, 10) // 0.0118
 */
export function shareForShift(library: GasLibrary, given: GasInAir, cents: number): number | null {
  const ratioAt = noteRatio(library, given);
  const upwards = ratioAt(1) > ratioAt(0);
  return shareForRatio(ratioAt(0) * 2 ** ((upwards ? cents : -cents) / 1200), ratioAt);
}

/**
 * Gas to fill a bag that was first pressed flat, until a share is reached [m^3].
 *
 *   V_gas = V (1 - left) where the air left makes the share 1 - left; at least x V
 *
 * @param volumeM3  volume of the full bag [m^3], 1e-6 to 1000
 * @param share  share of gas wanted [1], 0 to 1
 * @returns  volume of gas [m^3]
 * @throws {OutOfRange} outside the ranges above
 * Source: well-mixed-dilution. Assumes: nothing is lost while filling. Accuracy: exact.
 * @example gasBySqueezing(0.1, 0.95) // 0.095
 */
export function gasBySqueezing(volumeM3: number, share: number): number {
  inRange(volumeM3, enclosureVolumeRange, '/volumeM3');
  return volumeM3 * inRange(share, targetShare, '/share');
}

/**
 * Gas to flush a well-mixed enclosure until a share is reached [m^3].
 *
 *   V_gas = V ln(1/(1 - x))
 *
 * @param volumeM3  volume of the enclosure [m^3], 1e-6 to 1000
 * @param share  share of gas wanted [1], 0 to below 1
 * @returns  volume of gas [m^3]
 * @throws {OutOfRange} outside the ranges above; pure gas is never reached by flushing
 * Source: well-mixed-dilution. Assumes: instant mixing, as much leaves as enters.
 * Accuracy: exact under these; a real enclosure needs more.
 * @example gasByFlushing(1, 0.939) // 2.79688
 */
export function gasByFlushing(volumeM3: number, share: number): number {
  inRange(volumeM3, enclosureVolumeRange, '/volumeM3');
  inRange(share, { ...targetShare, max: 0.9999 }, '/share');
  return -volumeM3 * Math.log1p(-share);
}
