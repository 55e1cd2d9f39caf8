/** What the air run answers; the shape of the calculator `air`. Fractions are of dry air. */
export interface AirSeries {
  readonly oxygenFraction: readonly number[];
  /** Actual, with the water vapour of the air. */
  readonly oxygenPartialPressurePa: readonly number[];
  /**
   * By gas id. Carbon dioxide is the total (outdoor, breath, residual, released); `O2` is present
   * when oxygen is released and is the total, in the bound the largest total; any other gas is what
   * the releases and the start added.
   */
  readonly gasFraction: Readonly<Record<string, readonly number[]>>;
}

export interface LayerFractions {
  readonly oxygenFraction: readonly number[];
  readonly gasFraction: Readonly<Record<string, readonly number[]>>;
}

export interface SpaceLayers {
  readonly floorLayerDepthM: readonly number[];
  readonly ceilingLayerDepthM: readonly number[];
  readonly floorLayer: LayerFractions;
  readonly middle: LayerFractions;
  readonly ceilingLayer: LayerFractions;
}

export interface SpaceAir {
  readonly mixed: AirSeries;
  readonly layered?: SpaceLayers;
  /** Largest depth of the released dense gas lying pure on the lowest floor. Shown, never judged. */
  readonly purePoolDepthM: number;
}

export interface Extreme {
  readonly value: number;
  readonly atS: number;
}

export interface OxygenExtreme {
  readonly oxygenFraction: number;
  readonly atS: number;
}

export type AirAnswer = 'mixed' | 'layered' | 'bound';

export interface ByAnswer<T> {
  readonly mixed: T;
  readonly bound: T;
  readonly layered?: T;
}

export interface LayeredSeries extends AirSeries {
  readonly p05?: AirSeries;
  readonly p50?: AirSeries;
  readonly p95?: AirSeries;
  /** Quantiles of the worst that each draw reaches, at times of its own. */
  readonly peak?: BandPeak;
  /** The run without any mixing, worst over fall entrainment and source dilution. */
  readonly adverse?: AirSeries;
}

/** Worst values of the draws: lowest oxygen, highest gases. */
export interface BandPeak {
  readonly p05: PeakValues;
  readonly p50: PeakValues;
  readonly p95: PeakValues;
}

export interface PeakValues {
  readonly oxygenFraction: number;
  readonly gasFraction: Readonly<Record<string, number>>;
}

/** The answers at one mouth height. */
export interface HeightAir {
  readonly heightM: number;
  readonly mixed: AirSeries;
  readonly bound: AirSeries;
  readonly layered?: LayeredSeries;
  readonly minimum: ByAnswer<OxygenExtreme>;
  readonly maximum: ByAnswer<Readonly<Record<string, Extreme>>>;
}

export interface ZoneAir extends HeightAir {
  /** The same zone with a mouth 0.2 m above its floor: fallen, picking something up. */
  readonly at02M: HeightAir;
}

export interface Crossing {
  readonly zone: string;
  /** Mouth height: the zone's own, or 0.2. */
  readonly heightM: number;
  readonly answer: AirAnswer;
  readonly quantity: string;
  readonly value: number;
  readonly atS: number;
  readonly direction: 'rising' | 'falling';
}

export interface GasBalance {
  /** Held at the start, released, breathed out, and brought in by outdoor air. */
  readonly inMol: number;
  /** Left to outdoors, and breathed in. */
  readonly outMol: number;
  readonly heldMol: number;
  readonly relativeError: number;
}

export interface AirResult {
  readonly timesS: readonly number[];
  readonly spaces: Readonly<Record<string, SpaceAir>>;
  readonly zones: Readonly<Record<string, ZoneAir>>;
  readonly crossings: readonly Crossing[];
  readonly balance: Readonly<Record<string, GasBalance>>;
  readonly drivers?: readonly Driver[];
  readonly chances?: readonly Chance[];
}

/** How many of the draws pass a threshold, and when they first do [s]. */
export interface Chance {
  readonly zone: string;
  readonly heightM: number;
  readonly quantity: string;
  readonly value: number;
  readonly share: number;
  readonly firstS?: { readonly p05: number; readonly p50: number; readonly p95: number };
}

/** Rank correlation of an uncertain input with the worst value at a zone's own mouth height. */
export interface Driver {
  readonly zone: string;
  readonly quantity: string;
  readonly input: string;
  readonly rankCorrelation: number;
}
