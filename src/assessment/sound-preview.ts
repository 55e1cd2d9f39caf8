import { tonePreview, vowelPreview, type PreviewPair } from '../science/acoustics/preview.js';
import { frequencyRange } from '../science/acoustics/ranges.js';
import type { SoundResult } from './assessment.js';

const isAudible = (f: number): boolean => f >= frequencyRange.min && f <= frequencyRange.max;

/** Whether a result can be made audible: never what was refused, nor what has no number. */
export function hasPreview({ frequency, frequencyInAir, voice, refusal }: SoundResult): boolean {
  if (refusal !== null) return false;
  if (voice !== null) return true;
  return (
    frequency !== null &&
    frequencyInAir !== null &&
    isAudible(frequency.value) &&
    isAudible(frequencyInAir.value)
  );
}

/** The pair of sounds of a result, before in air and after in the gas, or null. */
export function previewOf(result: SoundResult): PreviewPair | null {
  if (!hasPreview(result)) return null;
  const { frequency, frequencyInAir, voice, isStopped } = result;
  if (voice !== null) {
    return vowelPreview({
      vowel: voice.vowel,
      fundamentalHz: voice.fundamentalHz,
      formantsInAirHz: voice.formantsInAir.map(({ value }) => value),
      formantsInGasHz: voice.formants.map(({ value }) => value),
      formantFactor: voice.factor.value,
    });
  }
  if (frequency === null || frequencyInAir === null) return null;
  return tonePreview(frequencyInAir.value, frequency.value, isStopped);
}
