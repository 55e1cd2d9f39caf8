import { inRange } from '../range.js';
import { flangedEnd, mouthEnd, topEnd, unflangedEnd } from './end-correction.js';
import {
  cutUpRange,
  frequencyRange,
  mouthWidthRange,
  neckLengthRange,
  pipeLengthRange,
  radiusRange,
  resonatorVolumeRange,
} from './ranges.js';
import {
  bottleResonance,
  columnResonance,
  filledColumnResonance,
  type Bottle,
  type Column,
} from './resonator.js';

export type PipeKind = 'openPipe' | 'stoppedPipe' | 'fluePipe' | 'tube';

/** Sizes of a pipe; a flue pipe adds its mouth, a tube says whether one end is closed. */
export interface PipeSizes {
  readonly lengthM: number;
  readonly radiusM: number;
  readonly mouthWidthM?: number;
  readonly cutUpM?: number;
  readonly isClosedAtOneEnd?: boolean;
}

export interface BottleSizes {
  readonly volumeM3: number;
  readonly neckLengthM: number;
  readonly neckRadiusM: number;
}

/** Widest bore in use, as inner radius over effective length; assumed where the bore is unknown. */
export const widestBore = 0.06;

/** Mouth of a flue pipe: a quarter of the circumference wide, cut up to a quarter of that. */
function usualMouth(radiusM: number): { mouthWidthM: number; cutUpM: number } {
  const mouthWidthM = (Math.PI / 2) * radiusM;
  return { mouthWidthM, cutUpM: mouthWidthM / 4 };
}

function endsOf(kind: PipeKind, sizes: Omit<PipeSizes, 'lengthM'>): readonly number[] {
  const { radiusM } = sizes;
  const open = unflangedEnd(radiusM);
  switch (kind) {
    case 'openPipe':
      return [open, open];
    case 'stoppedPipe':
      return [open];
    case 'tube':
      return sizes.isClosedAtOneEnd === true ? [open] : [open, open];
    case 'fluePipe': {
      const usual = usualMouth(radiusM);
      const width = sizes.mouthWidthM ?? usual.mouthWidthM;
      const height = sizes.cutUpM ?? usual.cutUpM;
      return [
        mouthEnd(
          radiusM,
          inRange(width, mouthWidthRange, '/mouthWidthM'),
          inRange(height, cutUpRange, '/cutUpM'),
        ),
        topEnd(radiusM),
      ];
    }
  }
}

/**
 * Column of a pipe with its end corrections [m].
 *
 * @param kind  which pipe [name]
 * @param sizes  body length [m] 0.01 to 12, inner radius [m] 0.001 to 0.5, mouth [m]
 * @returns  the column [m]
 * @throws {OutOfRange} outside the ranges above
 * Source: ising-1971. Assumes: circular bore; a mouth not described has the usual proportions.
 * Accuracy: that of the end corrections.
 * @example pipeColumn('stoppedPipe', { lengthM: 0.25, radiusM: 0.015 }).endCorrectionsM[0] // 0.0091995
 */
export function pipeColumn(kind: PipeKind, sizes: PipeSizes): Column {
  inRange(sizes.lengthM, pipeLengthRange, '/lengthM');
  inRange(sizes.radiusM, radiusRange, '/radiusM');
  return { lengthM: sizes.lengthM, endCorrectionsM: endsOf(kind, sizes) };
}

/**
 * Column of a pipe known by its note in air instead of its length [m].
 *
 *   effective length c/(2f) or c/(4f) less the end corrections
 *
 * @param kind  which pipe [name]
 * @param f  its note in air [Hz], 16 to 16 000
 * @param c  speed of sound of that air [m/s]
 * @param radiusM  inner radius [m]; 0.06 of the effective length when not known
 * @returns  the column [m]
 * @throws {OutOfRange} outside the ranges above, or a radius too wide for the note
 * Source: flue-pipe-proportions. Assumes: usual mouth; the widest bore where none is given, which
 * makes the outside air weigh most.
 * Accuracy: a bound.
 */
export function pipeColumnFromNote(
  kind: PipeKind,
  f: number,
  c: number,
  radiusM: number | undefined,
): Column {
  inRange(f, frequencyRange, '/frequencyInAirHz');
  const halves = kind === 'stoppedPipe' ? 4 : 2;
  const effective = c / (halves * f);
  const radius = inRange(radiusM ?? widestBore * effective, radiusRange, '/radiusM');
  const endCorrectionsM = endsOf(kind, { radiusM: radius });
  const lengthM = effective - endCorrectionsM.reduce((sum, d) => sum + d, 0);
  inRange(lengthM, pipeLengthRange, '/lengthM');
  return { lengthM, endCorrectionsM };
}

/**
 * Bottle with its neck corrections, inner end flanged and outer end not [m].
 *
 * @param sizes  volume [m^3] 1e-6 to 1, neck length [m] 0 to 2, neck radius [m] 0.001 to 0.5
 * @returns  the bottle [m, m^3]
 * @throws {OutOfRange} outside the ranges above
 * Source: helmholtz-resonator. Assumes: straight neck. Accuracy: a few percent.
 * @example bottleOf({ volumeM3: 0.00075, neckLengthM: 0.07, neckRadiusM: 0.0095 }).innerCorrectionM // 0.0078052
 */
export function bottleOf(sizes: BottleSizes): Bottle {
  inRange(sizes.volumeM3, resonatorVolumeRange, '/volumeM3');
  inRange(sizes.neckLengthM, neckLengthRange, '/neckLengthM');
  inRange(sizes.neckRadiusM, radiusRange, '/neckRadiusM');
  return {
    ...sizes,
    innerCorrectionM: flangedEnd(sizes.neckRadiusM),
    outerCorrectionM: unflangedEnd(sizes.neckRadiusM),
  };
}

/** Anything that resonates: a column or a bottle. */
export type Resonator =
  | { readonly shape: 'column'; readonly column: Column }
  | { readonly shape: 'bottle'; readonly bottle: Bottle };

/**
 * Note of a resonator wholly inside one gas [Hz].
 *
 * @param resonator  column or bottle [data]
 * @param c  speed of sound [m/s]
 * @returns  frequency of the first resonance [Hz]
 * Source: levine-schwinger-1948. Assumes: no wall friction. Accuracy: that of the corrections.
 */
export function immersedNote(resonator: Resonator, c: number): number {
  return resonator.shape === 'column'
    ? columnResonance(resonator.column, c, 1)
    : bottleResonance(resonator.bottle, c, 1);
}

/**
 * Factor by which the ratio to air changes when the ends see air instead of the gas inside [1].
 *
 *   f(rho_out/rho_in)/f(1) at the same sound speed inside
 *
 * @param resonator  column or bottle [data]
 * @param densityRatio  outside over inside density [1]
 * @returns  filled note over immersed note [1]; below 1 for light gases
 * Source: outside-gas-mass. Assumes: a sharp boundary at the ends.
 * Accuracy: a bound; the truth lies between this and 1.
 */
export function airAtEndsFactor(resonator: Resonator, densityRatio: number): number {
  // The sound speed inside cancels.
  return resonator.shape === 'column'
    ? filledColumnResonance(resonator.column, 1, densityRatio) /
        filledColumnResonance(resonator.column, 1, 1)
    : bottleResonance(resonator.bottle, 1, densityRatio) / bottleResonance(resonator.bottle, 1, 1);
}
