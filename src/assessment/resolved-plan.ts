import type { Distribution } from '../science/room-air/air-input.js';
import type { Composition } from '../science/gases/gas-library.js';

/**
 * The plan with every figure settled to a number at chosen ends, ready to be calculated with.
 * Times are seconds after midnight of the event day; levels are above the datum of the venue.
 */

export interface ResolvedSite {
  readonly altitudeM: number;
  readonly pressurePa: number;
  readonly temperatureK: number;
  readonly relativeHumidity: number;
  readonly carbonDioxideFraction: number;
  readonly molarVolumeM3PerMol: number;
}

export interface ResolvedSpace {
  readonly id: string;
  readonly title: string;
  readonly kind: string | null;
  readonly floorAreaM2: number;
  readonly heightM: number;
  readonly floorLevelM: number;
  readonly floorRiseM: number;
  readonly steps: readonly { readonly areaM2: number; readonly levelM: number }[];
  readonly pockets: readonly {
    readonly id: string;
    readonly areaM2: number;
    readonly depthM: number;
    readonly at: 'high' | 'low';
  }[];
  readonly volumeM3: number;
  readonly isVolumeMeasured: boolean;
  /** Volume of the shape before furniture and seats are taken off. */
  readonly shapeVolumeM3: number;
  readonly temperatureK: number | null;
  readonly initial: Readonly<Record<string, number>> | null;
  readonly occupied: boolean;
}

export interface ResolvedOpening {
  readonly from: string;
  readonly to: string;
  readonly kind: 'doorway' | 'vent' | 'floorOpening';
  readonly widthM: number;
  readonly heightM: number;
  readonly sillLevelM: number;
  readonly openFraction: number;
  readonly dischargeCoefficient: number | null;
  readonly fromS: number | null;
  readonly toS: number | null;
}

export interface ResolvedAirSystem {
  readonly title: string;
  readonly serves: readonly { readonly space: string; readonly share: number }[];
  readonly freshAirM3PerS: number;
  readonly drive: 'supply' | 'extract' | 'balanced';
  readonly supplyM3PerS: number | null;
  readonly extractM3PerS: number | null;
  readonly recirculatedM3PerS: number;
  readonly supplyLevel: 'high' | 'low' | 'mixed' | null;
  readonly extractLevel: 'high' | 'low' | 'mixed' | null;
  readonly extractTopM: number | null;
  readonly effectiveness: number;
  /** True where the plan states none, so that the usual one stands. */
  readonly isEffectivenessUsual: boolean;
  /** What may be delivered, over the flow that is calculated with; null: nothing is drawn. */
  readonly flowFactor: Distribution | null;
  readonly fromS: number | null;
  readonly toS: number | null;
}

export interface ResolvedGroup {
  readonly id: string;
  readonly title: string;
  readonly space: string;
  readonly heightM: number;
  readonly floorLevelM: number;
  readonly count: number;
  readonly ageGroup: 'toddler' | 'child' | 'teenager' | 'adult';
  readonly kind: 'public' | 'crew';
  readonly carbonDioxideM3PerS: number;
}

export interface ResolvedRelease {
  readonly act: string;
  readonly title: string;
  readonly space: string;
  readonly composition: Composition;
  readonly amountMol: number;
  readonly massKg: number;
  /** After the start of the act. */
  readonly startS: number;
  readonly durationS: number;
  readonly profile: 'steady' | 'decaying';
  readonly timeConstantS: number | null;
  readonly heightM: number | null;
  readonly temperatureK: number | null;
  readonly manner: 'gentle' | 'pour' | 'fog' | 'spill' | 'jet' | 'burst';
  readonly burned: boolean;
  /** Worst credible rows with the same episode happen together; others are alternatives. */
  readonly episode: string | null;
  readonly stock: string | null;
}

export interface ResolvedAct {
  readonly id: string;
  readonly title: string;
  readonly space: string;
  /** Starts of every time the act is shown that day. */
  readonly startsS: readonly number[];
  readonly durationS: number;
  readonly planned: readonly ResolvedRelease[];
  readonly worstCredible: readonly ResolvedRelease[];
}

export interface ResolvedStock {
  readonly id: string;
  readonly title: string;
  readonly form: string;
  readonly composition: Composition;
  /** Content of one container, the larger of ideal gas and gas model for compressed gas. */
  readonly amountMol: number;
  readonly massKg: number;
  readonly count: number;
  readonly idleLossPerHour: number;
  readonly place: string;
  readonly open: boolean;
  readonly fromS: number | null;
  readonly toS: number | null;
}

export interface ResolvedPlan {
  readonly site: ResolvedSite;
  readonly spaces: readonly ResolvedSpace[];
  readonly openings: readonly ResolvedOpening[];
  readonly airSystems: readonly ResolvedAirSystem[];
  readonly infiltration: readonly {
    readonly space: string;
    readonly airChangesPerHour: number;
    /** What may leak in over what is calculated with, where it was measured. */
    readonly factor: Distribution | null;
  }[];
  readonly transfers: readonly {
    readonly from: string;
    readonly to: string;
    readonly flowM3PerS: number;
  }[];
  readonly groups: readonly ResolvedGroup[];
  readonly performances: readonly { readonly startS: number; readonly endS: number }[];
  readonly acts: readonly ResolvedAct[];
  readonly stock: readonly ResolvedStock[];
  readonly escapeTimeS: number | null;
  /** True when a control of the plan takes a reading before each house. */
  readonly readingBetweenShows: boolean;
}
