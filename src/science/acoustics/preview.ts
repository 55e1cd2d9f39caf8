import { InvalidInput } from '../../errors.js';
import { inRange } from '../range.js';
import { formantResonator, resonated } from './formant-filter.js';
import { frequencyRange } from './ranges.js';
import type { Vowel } from './voice.js';

/*
 * Illustrations made by arithmetic, no recordings: same input, same samples. Two sounds of a pair
 * have equal effective level, so that they show the pitch or timbre and not the loudness.
 */
export const sampleRateHz = 44_100;
export const previewSeconds = 1.5;
/** -12 dB below full scale: loud enough to hear, far from startling. */
const peakSample = 32_767 * 10 ** (-12 / 20);
const fadeSeconds = 0.02;
const attackSeconds = 0.04;
/** Partials and poles stop below half the sampling rate. */
const highestHz = 0.45 * sampleRateHz;
/** Fall of the partials of the tone with their number. */
const partialPower = -1.2;

export interface PreviewPair {
  readonly before: Int16Array;
  readonly after: Int16Array;
}

/** Fade length of the previews [samples]. */
export const fadeSamples = Math.round(fadeSeconds * sampleRateHz);

function rootMeanSquare(signal: Float64Array): number {
  return Math.sqrt(signal.reduce((sum, sample) => sum + sample * sample, 0) / signal.length);
}

function faded(signal: Float64Array): Float64Array {
  const last = signal.length - 1;
  return signal.map((sample, index) => {
    const edge = Math.min(index, last - index) / fadeSamples;
    return edge >= 1 ? sample : sample * 0.5 * (1 - Math.cos(Math.PI * edge));
  });
}

/** Both sounds at equal effective level, the louder peak of the two at the safe level. */
function safePair(before: Float64Array, after: Float64Array): PreviewPair {
  const shapes = [faded(before), faded(after)].map((signal) => {
    const level = rootMeanSquare(signal);
    return signal.map((sample) => sample / level);
  });
  const peak = Math.max(
    ...shapes.map((signal) => signal.reduce((top, sample) => Math.max(top, Math.abs(sample)), 0)),
  );
  const [first, second] = shapes.map((signal) =>
    Int16Array.from(signal, (sample) => Math.round((sample / peak) * peakSample)),
  );
  return { before: first ?? new Int16Array(), after: second ?? new Int16Array() };
}

function tone(f: number, oddOnly: boolean): Float64Array {
  const signal = new Float64Array(Math.round(previewSeconds * sampleRateHz));
  const step = oddOnly ? 2 : 1;
  for (let n = 1; n * f <= highestHz; n += step) {
    const amplitude = n ** partialPower;
    const turn = (2 * Math.PI * n * f) / sampleRateHz;
    for (let index = 0; index < signal.length; index += 1) {
      signal[index] = (signal[index] ?? 0) + amplitude * Math.sin(turn * index);
    }
  }
  const attack = attackSeconds * sampleRateHz;
  return signal.map((sample, index) => sample * Math.min(1, index / attack));
}

/**
 * Tones of a pipe before and after, as 16-bit samples [1].
 *
 *   y = sum of n^-1.2 sin(2 pi n f t); odd n only for a stopped pipe
 *
 * @param beforeHz  note in air [Hz], 16 to 16 000
 * @param afterHz  note in the gas [Hz], 16 to 16 000
 * @param isStopped  whether only odd partials sound [yes or no]
 * @returns  the pair at 44 100 samples a second [1]
 * @throws {OutOfRange} outside the ranges above
 * Source: preview-choices. Assumes: the same spectrum before and after. Accuracy: an illustration.
 */
export function tonePreview(beforeHz: number, afterHz: number, isStopped: boolean): PreviewPair {
  inRange(beforeHz, frequencyRange, '/frequencyInAirHz');
  inRange(afterHz, frequencyRange, '/frequencyHz');
  return safePair(tone(beforeHz, isStopped), tone(afterHz, isStopped));
}

/** Bandwidths of the first three formants in air [Hz]. */
const bandwidthsHz: Readonly<Record<Vowel, readonly [number, number, number]>> = {
  a: [57, 72, 130],
  i: [43, 125, 77],
  u: [69, 50, 110],
  // Not measured in the source used: the neighbour's values.
  ae: [57, 72, 130],
};
/** Fourth and fifth formant and their bandwidths, the same for every vowel [Hz]. */
const upperFormants = [
  { F: 3300, BW: 250 },
  { F: 3750, BW: 200 },
] as const;
const glottalBandwidthHz = 100;

export interface VowelPreviewInput {
  readonly vowel: Vowel;
  readonly fundamentalHz: number;
  readonly formantsInAirHz: readonly number[];
  readonly formantsInGasHz: readonly number[];
  /** Factor for the formants above the third [1]. */
  readonly formantFactor: number;
}

function vowel(fundamentalHz: number, poles: readonly { F: number; BW: number }[]): Float64Array {
  const impulses = new Float64Array(Math.round(previewSeconds * sampleRateHz));
  const count = Math.floor(previewSeconds * fundamentalHz);
  for (let pulse = 0; pulse < count; pulse += 1) {
    const index = Math.round((pulse * sampleRateHz) / fundamentalHz);
    if (index < impulses.length) impulses[index] = 1;
  }
  let signal = resonated(impulses, formantResonator(0, glottalBandwidthHz, sampleRateHz));
  for (const { F, BW } of poles) {
    if (F < highestHz) signal = resonated(signal, formantResonator(F, BW, sampleRateHz));
  }
  let last = 0;
  return signal.map((sample) => {
    const change = sample - last;
    last = sample;
    return change;
  });
}

/**
 * A vowel before and after, the same fundamental and other formants, as 16-bit samples [1].
 *
 *   impulse train, low-pass resonator (0 Hz, 100 Hz wide), cascade of formants, first difference
 *
 * @param input  vowel, fundamental [Hz], formants in air and gas [Hz], factor of the upper ones [1]
 * @returns  the pair at 44 100 samples a second [1]
 * @throws {OutOfRange} for a fundamental outside 16 to 16 000 Hz
 * @throws {InvalidInput} where the formants in air and gas do not pair up
 * Source: klatt-1980. Assumes: bandwidths grow with the formant (constant quality).
 * Accuracy: an illustration.
 */
export function vowelPreview(input: VowelPreviewInput): PreviewPair {
  const { formantsInAirHz, formantsInGasHz, formantFactor, fundamentalHz } = input;
  inRange(fundamentalHz, frequencyRange, '/fundamentalHz');
  if (formantsInAirHz.length !== formantsInGasHz.length || formantsInAirHz.length === 0) {
    throw new InvalidInput(
      'Formants in air and in gas do not pair up.',
      'Give as many formants in gas as in air.',
      [{ path: '/formantsInGasHz', problem: 'has another length' }],
    );
  }
  const widths = bandwidthsHz[input.vowel];
  const inAir = [
    ...formantsInAirHz.map((F, index) => ({ F, BW: widths[index] ?? widths[2] })),
    ...upperFormants,
  ];
  const inGas = inAir.map(({ F, BW }, index) => {
    const factor = (formantsInGasHz[index] ?? F * formantFactor) / F;
    return { F: F * factor, BW: BW * factor };
  });
  return safePair(vowel(fundamentalHz, inAir), vowel(fundamentalHz, inGas));
}

/**
 * A WAV file of 16-bit samples, one channel [bytes].
 *
 * @param samples  16-bit samples at 44 100 a second [1]
 * @returns  the file [bytes]
 * Source: preview-choices. Assumes: RIFF/WAVE with one PCM chunk. Accuracy: exact.
 */
export function wavBytes(samples: Int16Array): Uint8Array {
  const headerBytes = 44;
  const bytes = new Uint8Array(headerBytes + 2 * samples.length);
  const view = new DataView(bytes.buffer);
  const text = (offset: number, words: string): void => {
    for (let index = 0; index < words.length; index += 1) {
      view.setUint8(offset + index, words.charCodeAt(index));
    }
  };
  text(0, 'RIFF');
  view.setUint32(4, bytes.length - 8, true);
  text(8, 'WAVEfmt ');
  view.setUint32(16, 16, true);
  view.setUint16(20, 1, true);
  view.setUint16(22, 1, true);
  view.setUint32(24, sampleRateHz, true);
  view.setUint32(28, 2 * sampleRateHz, true);
  view.setUint16(32, 2, true);
  view.setUint16(34, 16, true);
  text(36, 'data');
  view.setUint32(40, 2 * samples.length, true);
  samples.forEach((sample, index) => {
    view.setInt16(headerBytes + 2 * index, sample, true);
  });
  return bytes;
}
