import type { ReleaseManner } from './air-input.js';
import { mixesByMomentum, type GasJet } from './momentum.js';

export interface MannerTraits {
  /** Source dilution D with surrounding air [-], range and usual value. */
  readonly dilutionLow: number;
  readonly dilution: number;
  readonly dilutionHigh: number;
  /** Whether it lies as a layer; for a jet the nozzle decides where it is known. */
  readonly startsLayered: boolean;
  readonly source: string;
}

/**
 * What the manner of a release means for its first dilution, and whether it starts as a layer.
 *
 * A leaking bag and an open hose are gentle, a balloon is a burst: all of these stratify. The hiss
 * of a cylinder valve or regulator is a jet: it stirs several metres of air.
 * Source: engineering-judgement throughout (gentle pour or bag 1-3, fog over a lip 3-10, burst or
 * jet above 10).
 */
export const RELEASE_MANNERS: Readonly<Record<ReleaseManner, MannerTraits>> = {
  gentle: {
    dilutionLow: 1,
    dilution: 2,
    dilutionHigh: 3,
    startsLayered: true,
    source: 'engineering-judgement',
  },
  pour: {
    dilutionLow: 1,
    dilution: 2,
    dilutionHigh: 3,
    startsLayered: true,
    source: 'engineering-judgement',
  },
  fog: {
    dilutionLow: 3,
    dilution: 5,
    dilutionHigh: 10,
    startsLayered: true,
    source: 'engineering-judgement',
  },
  spill: {
    dilutionLow: 1,
    dilution: 3,
    dilutionHigh: 10,
    startsLayered: true,
    source: 'engineering-judgement',
  },
  jet: {
    dilutionLow: 10,
    dilution: 20,
    dilutionHigh: 50,
    startsLayered: false,
    source: 'engineering-judgement',
  },
  // A burst has no lasting momentum: it thins in the first metre and then rises or sinks.
  burst: {
    dilutionLow: 10,
    dilution: 20,
    dilutionHigh: 50,
    startsLayered: true,
    source: 'engineering-judgement',
  },
};

/** Manner taken where none is given: nothing is known, so it may lie as a layer. */
export const DEFAULT_MANNER: ReleaseManner = 'gentle';

/**
 * Whether a release lies as a layer, true or false.
 *
 *   by its manner; a jet of known nozzle lies as a layer unless Ri_v < 1
 *
 * @param manner   manner of the release
 * @param jet      flow, nozzle and densities of a jet [m3/s, m, kg/m3]; undefined where not known
 * @param volumeM3 volume of the space [m3], above 0
 * @returns true when it starts as a layer
 * Source: cleaver-marshall-linden-1994 (criterion); engineering-judgement (manners). Assumes: still
 * air. Accuracy: a criterion of order 1.
 * @example startsAsLayer('burst', undefined, 300) // true
 */
export function startsAsLayer(
  manner: ReleaseManner,
  jet: GasJet | undefined,
  volumeM3: number,
): boolean {
  if (manner !== 'jet' || jet === undefined) return RELEASE_MANNERS[manner].startsLayered;
  return !mixesByMomentum(jet, volumeM3);
}
