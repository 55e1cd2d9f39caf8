import { inRange, type Range } from '../range.js';

const positiveFrequency: Range = { min: 1e-3, max: 1e6, unit: 'Hz', name: 'frequency' };

/** Concert pitch of A4. */
const concertPitchHz = 440;

/** Names of the twelve semitones from C up. */
const noteNames = ['C', 'C#', 'D', 'D#', 'E', 'F', 'F#', 'G', 'G#', 'A', 'A#', 'B'] as const;

export interface Note {
  readonly name: string;
  /** From the note named, above is positive. */
  readonly centsOff: number;
}

/**
 * Interval between two frequencies [cent].
 *
 *   cents = 1200 log2(f2/f1)
 *
 * @param f1  from this frequency [Hz], above 0
 * @param f2  to this frequency [Hz], above 0
 * @returns  interval [cent], upwards positive
 * @throws {OutOfRange} outside 0.001 Hz to 1 MHz
 * Source: equal-temperament-iso-16. Assumes: nothing more. Accuracy: exact.
 * @example centsBetween(315, 780) // 1569.75
 */
export function centsBetween(f1: number, f2: number): number {
  inRange(f1, positiveFrequency, '/frequencyInAirHz');
  inRange(f2, positiveFrequency, '/frequencyHz');
  return 1200 * Math.log2(f2 / f1);
}

/**
 * Nearest note of equal temperament, A4 = 440 Hz [name, cent].
 *
 *   n = 69 + 12 log2(f/440); name n mod 12, octave floor(n/12) - 1
 *
 * @param f  frequency [Hz], above 0
 * @returns  name with octave, and how far the frequency lies from it [cent]
 * @throws {OutOfRange} outside 0.001 Hz to 1 MHz
 * Source: equal-temperament-iso-16. Assumes: C4 is middle C. Accuracy: exact.
 * @example noteOf(315).name // 'D#4'
 * @example noteOf(315).centsOff // 21.42
 */
export function noteOf(f: number): Note {
  inRange(f, positiveFrequency, '/frequencyHz');
  const n = 69 + 12 * Math.log2(f / concertPitchHz);
  const nearest = Math.round(n);
  const step = ((nearest % 12) + 12) % 12;
  const octave = Math.floor(nearest / 12) - 1;
  return { name: `${noteNames[step] ?? ''}${String(octave)}`, centsOff: (n - nearest) * 100 };
}
