/**
 * What the air run is told. SI throughout; names as in the calculator `air`. A `Level` is measured
 * from the venue's datum, a `Height` from the floor where something stands. Fractions are mole
 * fractions of dry air. Anything timed acts from `fromS` (default 0) up to `toS` (default: the end).
 */
export interface Timed {
  readonly fromS?: number;
  readonly toS?: number;
}

export interface AirAmbient {
  readonly temperatureK: number;
  readonly pressurePa: number;
  /** 0..1; default 0.5. */
  readonly relativeHumidity?: number;
  /** Outdoor carbon dioxide; default 420e-6. */
  readonly carbonDioxideFraction?: number;
}

export interface AirThreshold {
  readonly quantity: string;
  readonly value: number;
}

export interface FloorStep {
  readonly areaM2: number;
  /** Above the venue's datum. */
  readonly levelM: number;
}

export interface AirPocket {
  readonly id: string;
  readonly areaM2: number;
  readonly depthM: number;
  readonly at: 'high' | 'low';
}

export interface AirSpace {
  readonly id: string;
  readonly floorAreaM2: number;
  /** Ceiling above the lowest floor (pockets not counted). */
  readonly heightM: number;
  /** Lowest floor above the datum; default 0, or the lowest step. */
  readonly floorLevelM?: number;
  readonly floorRiseM?: number;
  readonly steps?: readonly FloorStep[];
  /** Measured free volume; default the volume of the shape. */
  readonly volumeM3?: number;
  /** What a band draws of the free volume over what is stated; default: that of the run. */
  readonly volumeFactor?: Distribution;
  readonly pockets?: readonly AirPocket[];
  /** Default: ambient. */
  readonly temperatureK?: number;
  /** Fractions at the start, totals; what is not named is outdoor air. */
  readonly initial?: Readonly<Record<string, number>>;
}

export interface AirOpening extends Timed {
  readonly id?: string;
  readonly from: string;
  readonly to: string;
  readonly kind: 'doorway' | 'vent' | 'floorOpening';
  readonly widthM: number;
  /** Of a floor opening: its length. */
  readonly heightM: number;
  /** Lower edge (floor opening: its plane) above the datum. */
  readonly sillLevelM?: number;
  readonly openFraction?: number;
  readonly dischargeCoefficient?: number;
}

export type AirLevel = 'high' | 'low' | 'mixed';

export interface AirSystem extends Timed {
  readonly id?: string;
  readonly space?: string;
  readonly serves?: readonly { readonly space: string; readonly share: number }[];
  readonly freshAirM3PerS?: number;
  readonly drive: 'supply' | 'extract' | 'balanced';
  readonly supplyM3PerS?: number;
  readonly extractM3PerS?: number;
  readonly recirculatedM3PerS?: number;
  readonly supplyLevel?: AirLevel;
  readonly extractLevel?: AirLevel;
  /** Top of a low grille above the floor. */
  readonly extractTopM?: number;
  readonly extractWidthM?: number;
  /** The jet of the supply where it meets a layer on the floor; only what was measured there. */
  readonly supplyJet?: { readonly radiusM: number; readonly speedMPerS: number };
  /** Mixing factor, at most 1 is used. */
  readonly effectiveness?: number;
  /** True where that factor is only what is usual: a band then draws it. */
  readonly isEffectivenessUsual?: boolean;
  /** What a band draws of this system's flows over what is stated; default: that of the run. */
  readonly flowFactor?: Distribution;
}

export interface AirInfiltration extends Timed {
  readonly space: string;
  readonly airChangesPerHour: number;
  /** What a band draws of it over what is stated; default: that of the run. */
  readonly factor?: Distribution;
}

export interface AirTransfer extends Timed {
  readonly from: string;
  readonly to: string;
  readonly flowM3PerS: number;
}

export type ReleaseManner = 'gentle' | 'pour' | 'fog' | 'spill' | 'jet' | 'burst';

export interface AirRelease {
  readonly id?: string;
  readonly space: string;
  readonly gas?: string;
  readonly composition?: Readonly<Record<string, number>>;
  readonly amountMol?: number;
  readonly massKg?: number;
  /** At ambient temperature and pressure. */
  readonly volumeM3?: number;
  readonly startS?: number;
  /** 0 (default): at once. */
  readonly durationS?: number;
  readonly profile?: 'steady' | 'decaying';
  readonly timeConstantS?: number;
  readonly heightM?: number;
  readonly temperatureK?: number;
  readonly manner?: ReleaseManner;
  /** Bore of the outlet of a jet [m]: tells whether it stirs the room or lies as a layer. */
  readonly outletDiameterM?: number;
  readonly episode?: string;
}

export interface AirOccupants extends Timed {
  readonly space: string;
  readonly count: number;
  readonly metabolicRateMet?: number;
  /** Per person, at 293.15 K and 101 325 Pa. */
  readonly carbonDioxideM3PerS?: number;
  /** Carbon dioxide out per oxygen in, by volume; default 0.85. */
  readonly respiratoryQuotient?: number;
  /** Mouths above the lowest floor; where not given they breathe the air above the layers. */
  readonly heightM?: number;
}

export interface AirZone {
  readonly id: string;
  readonly space: string;
  /** Mouth above the floor where the people are. */
  readonly heightM: number;
  /** That floor above the datum; default the space's lowest. */
  readonly floorLevelM?: number;
}

export interface AirLayerOverrides {
  readonly sourceDilution?: number;
  readonly turbulenceVelocityMPerS?: number;
  readonly walkingExchangeMPerS?: number;
  readonly smearHeightM?: number;
  readonly fallEntrainment?: number;
  readonly edgeEntrainment?: number;
}

export interface AirUncertainty {
  readonly samples: number;
  readonly seed: number;
  readonly distributions?: Readonly<Record<string, Distribution>>;
}

export type Distribution =
  | { readonly kind: 'fixed'; readonly value: number }
  | { readonly kind: 'uniform'; readonly low: number; readonly high: number }
  | { readonly kind: 'logUniform'; readonly low: number; readonly high: number }
  | { readonly kind: 'normal'; readonly mean: number; readonly standardDeviation: number }
  | { readonly kind: 'lognormal'; readonly median: number; readonly geometricDeviation: number }
  | {
      readonly kind: 'triangular';
      readonly low: number;
      readonly mode: number;
      readonly high: number;
    };

export interface AirInput {
  readonly ambient: AirAmbient;
  readonly durationS: number;
  readonly outputIntervalS: number;
  readonly thresholds?: readonly AirThreshold[];
  readonly spaces: readonly AirSpace[];
  readonly openings?: readonly AirOpening[];
  readonly airSystems?: readonly AirSystem[];
  readonly infiltration?: readonly AirInfiltration[];
  readonly transfers?: readonly AirTransfer[];
  readonly releases?: readonly AirRelease[];
  readonly occupants?: readonly AirOccupants[];
  readonly zones?: readonly AirZone[];
  readonly uncertainty?: AirUncertainty;
  readonly layers?: AirLayerOverrides;
}
