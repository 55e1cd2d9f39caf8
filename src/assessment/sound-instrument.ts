import {
  bottleOf,
  immersedNote,
  pipeColumn,
  pipeColumnFromNote,
  type PipeKind,
  type Resonator,
} from '../science/acoustics/instrument.js';
import {
  cutUpRange,
  frequencyRange,
  mouthWidthRange,
  neckLengthRange,
  pipeLengthRange,
  radiusRange,
  resonatorVolumeRange,
} from '../science/acoustics/ranges.js';
import type { Column } from '../science/acoustics/resonator.js';
import { wallFactorOfGas } from '../science/acoustics/wall-friction.js';
import type { MixtureInput, MixtureState } from '../science/gases/mixture-state.js';
import type { Figure, FigureInput } from './assessment.js';
import { plainFigure } from './figures.js';
import type { PlanSound } from './plan-file.js';
import { soundFigure, type SoundCase } from './sound-context.js';

/** The instrument as it sounds in room air. */
export interface Instrument {
  readonly inAir: Figure;
  /** Its shape where sizes are given, or as its note makes it where they are not. */
  readonly resonator: Resonator | null;
  /** Whether the shape follows from sizes and not from the note. */
  readonly isMeasured: boolean;
  readonly radiusM: number | undefined;
  readonly isStopped: boolean;
}

/** Doubt of the mouth correction of a flue pipe, of itself. */
const mouthDoubt = 0.1;

function pipeKindOf({ instrument, isClosedAtOneEnd }: PlanSound): PipeKind | null {
  if (instrument === 'tube') return isClosedAtOneEnd === true ? 'stoppedPipe' : 'tube';
  const isPipe =
    instrument === 'openPipe' || instrument === 'stoppedPipe' || instrument === 'fluePipe';
  return isPipe ? instrument : null;
}

function bottle(one: SoundCase): Resonator | null {
  const volume = soundFigure(one, 'volumeM3', resonatorVolumeRange);
  const length = soundFigure(one, 'neckLengthM', neckLengthRange);
  const radius = soundFigure(one, 'neckRadiusM', radiusRange);
  if (volume === null || length === null || radius === null) return null;
  const sizes = {
    volumeM3: volume.value,
    neckLengthM: length.value,
    neckRadiusM: radius.value,
  };
  return { shape: 'bottle', bottle: bottleOf(sizes) };
}

function pipe(one: SoundCase, kind: PipeKind, radiusM: number | undefined): Resonator | null {
  const length = soundFigure(one, 'lengthM', pipeLengthRange);
  if (length === null || radiusM === undefined) return null;
  const width = soundFigure(one, 'mouthWidthM', mouthWidthRange);
  const cutUp = soundFigure(one, 'cutUpM', cutUpRange);
  const column = pipeColumn(kind, {
    lengthM: length.value,
    radiusM,
    ...(width === null ? {} : { mouthWidthM: width.value }),
    ...(cutUp === null ? {} : { cutUpM: cutUp.value }),
  });
  return { shape: 'column', column };
}

const scaledMouth = ({ lengthM, endCorrectionsM }: Column, factor: number): Column => ({
  lengthM,
  endCorrectionsM: endCorrectionsM.map((d, index) => (index === 0 ? d * factor : d)),
});

function noteFromSizes(
  one: SoundCase,
  kind: PipeKind | null,
  resonator: Resonator,
  air: MixtureState,
  room: MixtureInput,
  radiusM: number | undefined,
): Figure {
  const noteOfShape = (shape: Resonator): number => {
    const free = immersedNote(shape, air.speedOfSoundMPerS);
    return radiusM === undefined || kind === null
      ? free
      : free * wallFactorOfGas(one.gases, room, radiusM, free);
  };
  const value = noteOfShape(resonator);
  const inputs: FigureInput[] = [
    { name: 'speed of sound in room air', value: air.speedOfSoundMPerS, unit: 'm/s' },
    ...(resonator.shape === 'column'
      ? [
          { name: 'length', value: resonator.column.lengthM, unit: 'm' },
          {
            name: 'end corrections together',
            value: resonator.column.endCorrectionsM.reduce((sum, d) => sum + d, 0),
            unit: 'm',
          },
          ...(radiusM === undefined ? [] : [{ name: 'inner radius', value: radiusM, unit: 'm' }]),
        ]
      : [
          { name: 'volume', value: resonator.bottle.volumeM3, unit: 'm3' },
          { name: 'neck length', value: resonator.bottle.neckLengthM, unit: 'm' },
          { name: 'neck radius', value: resonator.bottle.neckRadiusM, unit: 'm' },
        ]),
  ];
  const words = (formula: string, source: string, range: string) => ({
    method: 'note of the resonator in room air, from its sizes',
    formula,
    source,
    range,
    inputs,
  });
  if (resonator.shape === 'bottle') {
    return plainFigure(
      value,
      'Hz',
      words(
        'f = c/(2 pi) sqrt(S/(V (l + 0.82 r + 0.61 r)))',
        'helmholtz-resonator',
        'straight neck; a few percent',
      ),
    );
  }
  const friction = radiusM === undefined ? '' : ', slowed by friction at the wall';
  if (kind !== 'fluePipe') {
    const ends = resonator.column.endCorrectionsM.length === 2 ? 2 : 4;
    return plainFigure(
      value,
      'Hz',
      words(
        `f = c/(${String(ends)} (L + end corrections))${friction}`,
        'levine-schwinger-1948',
        'thin wall, bore narrow against the wavelength',
      ),
    );
  }
  const { column } = resonator;
  const ends = [1 - mouthDoubt, 1 + mouthDoubt].map((factor) =>
    noteOfShape({ shape: 'column', column: scaledMouth(column, factor) }),
  );
  return {
    ...plainFigure(
      value,
      'Hz',
      words(
        `f = c/(2 (L + mouth + top))${friction}; mouth 0.73 S/sqrt(w h)`,
        'ising-1971',
        'mouth correction within 10 % of itself; ears and beards shift it further',
      ),
    ),
    low: Math.min(...ends),
    high: Math.max(...ends),
  };
}

/** The instrument in room air, or null where neither its note nor its sizes are given. */
export function instrumentInAir(
  one: SoundCase,
  air: MixtureState,
  room: MixtureInput,
): Instrument | null {
  const { sound } = one;
  const kind = pipeKindOf(sound);
  const radiusM = soundFigure(one, 'radiusM', radiusRange)?.value;
  const shape = kind === null ? bottle(one) : pipe(one, kind, radiusM);
  const stated = soundFigure(one, 'frequencyInAirHz', frequencyRange);
  const isStopped = kind === 'stoppedPipe';
  const shared = { radiusM, isStopped, isMeasured: shape !== null };
  if (stated !== null) {
    const { value, low, high } = stated;
    const inAir: Figure = {
      ...plainFigure(value, 'Hz', {
        method: 'as stated in the plan',
        formula: 'measured or marked on the instrument',
        source: 'plan',
        range: '16 Hz to 16 kHz',
      }),
      ...(low < high ? { low, high } : {}),
    };
    const fromNote = (): Resonator | null =>
      kind === null
        ? null
        : {
            shape: 'column',
            column: pipeColumnFromNote(kind, value, air.speedOfSoundMPerS, radiusM),
          };
    // The shape only weighs the air at the ends, so it is guessed from the note where it counts.
    const resonator = shape ?? (sound.surroundings === 'air' ? fromNote() : null);
    return { ...shared, inAir, resonator };
  }
  if (shape === null) return null;
  return {
    ...shared,
    inAir: noteFromSizes(one, kind, shape, air, room, radiusM),
    resonator: shape,
  };
}
