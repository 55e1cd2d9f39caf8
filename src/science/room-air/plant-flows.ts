import type { AirSystem } from './air-input.js';

/** A space and the share of a plant that it gets. */
export interface ServedShare {
  readonly space: string;
  readonly share: number;
}

/** The spaces that a plant serves with their shares: as listed, or all of it to its own space. */
export function servedShares(system: {
  readonly space?: string | undefined;
  readonly serves?: readonly ServedShare[] | undefined;
}): readonly ServedShare[] {
  return system.serves ?? (system.space === undefined ? [] : [{ space: system.space, share: 1 }]);
}

/** Air that a plant brings from outdoors and takes there [m3/s], as far as it mixes. */
export interface PlantFlows {
  readonly supplyM3PerS: number;
  readonly exhaustM3PerS: number;
  /** Mixing factor, at most 1. */
  readonly mixing: number;
}

/** The flows of a plant with outdoors by its drive, times its mixing factor. */
export function plantFlows(system: AirSystem): PlantFlows {
  const mixing = Math.min(1, system.effectiveness ?? 1);
  const fresh = (system.freshAirM3PerS ?? 0) * mixing;
  switch (system.drive) {
    case 'balanced':
      return {
        supplyM3PerS: (system.supplyM3PerS ?? system.freshAirM3PerS ?? 0) * mixing,
        exhaustM3PerS: (system.extractM3PerS ?? system.freshAirM3PerS ?? 0) * mixing,
        mixing,
      };
    case 'supply':
      return { supplyM3PerS: fresh, exhaustM3PerS: 0, mixing };
    case 'extract':
      return { supplyM3PerS: 0, exhaustM3PerS: fresh, mixing };
  }
}
