import type { ReleaseManner } from './air-input.js';

export interface MannerTraits {
  /** Source dilution D with surrounding air [-], range and usual value. */
  readonly dilutionLow: number;
  readonly dilution: number;
  readonly dilutionHigh: number;
  readonly startsLayered: boolean;
  readonly source: string;
}

/**
 * What the manner of a release means for its first dilution, and whether it starts as a layer.
 * Source: engineering-judgement throughout (gentle pour or bag 1-3, fog over a lip 3-10, burst or
 * jet above 10, then mixed).
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
  burst: {
    dilutionLow: 10,
    dilution: 20,
    dilutionHigh: 50,
    startsLayered: false,
    source: 'engineering-judgement',
  },
};

/** Manner taken where none is given: nothing is known, so it may lie as a layer. */
export const DEFAULT_MANNER: ReleaseManner = 'gentle';
