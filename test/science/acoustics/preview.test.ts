import { describe, expect, it } from 'vitest';
import { soundCalculator, soundPreview } from '../../../src/assessment/calculators/sound.js';
import { loadGasLibrary } from '../../../src/catalogue/gas-library.js';
import {
  fadeSamples,
  sampleRateHz,
  tonePreview,
  vowelPreview,
  wavBytes,
} from '../../../src/science/acoustics/preview.js';

const data = { gases: loadGasLibrary() };
const room = { temperatureK: 293.15, pressurePa: 101_325, relativeHumidity: 0.5 };

/** Power spectrum of the middle 32 768 samples under a Hann window; index times resolution is Hz. */
function spectrum(samples: Int16Array): { power: Float64Array; resolutionHz: number } {
  const size = 32_768;
  const start = Math.floor((samples.length - size) / 2);
  const real = new Float64Array(size);
  const imaginary = new Float64Array(size);
  for (let n = 0; n < size; n += 1) {
    const window = 0.5 - 0.5 * Math.cos((2 * Math.PI * n) / size);
    real[n] = (samples[start + n] ?? 0) * window;
  }
  // Radix-2 transform in place.
  for (let i = 1, j = 0; i < size; i += 1) {
    let bit = size >> 1;
    for (; j & bit; bit >>= 1) j ^= bit;
    j ^= bit;
    if (i < j) [real[i], real[j]] = [real[j] ?? 0, real[i] ?? 0];
  }
  for (let length = 2; length <= size; length *= 2) {
    const half = length / 2;
    for (let k = 0; k < half; k += 1) {
      const turn = (-2 * Math.PI * k) / length;
      const c = Math.cos(turn);
      const s = Math.sin(turn);
      for (let i = k; i < size; i += length) {
        const re = (real[i + half] ?? 0) * c - (imaginary[i + half] ?? 0) * s;
        const im = (real[i + half] ?? 0) * s + (imaginary[i + half] ?? 0) * c;
        real[i + half] = (real[i] ?? 0) - re;
        imaginary[i + half] = (imaginary[i] ?? 0) - im;
        real[i] = (real[i] ?? 0) + re;
        imaginary[i] = (imaginary[i] ?? 0) + im;
      }
    }
  }
  const power = new Float64Array(size / 2).map(
    (_, k) => (real[k] ?? 0) ** 2 + (imaginary[k] ?? 0) ** 2,
  );
  return { power, resolutionHz: sampleRateHz / size };
}

/** Frequency of the highest line between two frequencies, refined by a parabola through its logs. */
function peakHz(samples: Int16Array, lowHz: number, highHz: number): number {
  const { power, resolutionHz } = spectrum(samples);
  let best = Math.ceil(lowHz / resolutionHz);
  for (let k = best; k <= highHz / resolutionHz; k += 1) {
    if ((power[k] ?? 0) > (power[best] ?? 0)) best = k;
  }
  const [a = 0, b = 0, c = 0] = [best - 1, best, best + 1].map((k) => Math.log(power[k] ?? 1));
  return (best + (0.5 * (a - c)) / (a - 2 * b + c)) * resolutionHz;
}

function levelAt(samples: Int16Array, f: number): number {
  const { power, resolutionHz } = spectrum(samples);
  const k = Math.round(f / resolutionHz);
  return 10 * Math.log10(Math.max(...power.subarray(k - 2, k + 3)) + 1);
}

function peakOf(samples: Int16Array): number {
  return samples.reduce((top, sample) => Math.max(top, Math.abs(sample)), 0);
}

function effective(samples: Int16Array): number {
  return Math.sqrt(samples.reduce((sum, sample) => sum + sample * sample, 0) / samples.length);
}

describe('tone previews', () => {
  it('the pair of a helium pipe has its first line at the two predicted notes, within 0.2 Hz', () => {
    const given = {
      instrument: 'openPipe' as const,
      lengthM: 0.5,
      radiusM: 0.015,
      composition: { He: 1 },
      ...room,
    };
    const sound = soundCalculator.run(given, data);
    if (!('frequencyHz' in sound)) throw new Error('not a pipe');
    const { before, after } = soundPreview(given, data);
    expect(Math.abs(peakHz(before, 100, 1400) - sound.frequencyInAirHz)).toBeLessThan(0.2);
    expect(Math.abs(peakHz(after, 100, 1400) - sound.frequencyHz)).toBeLessThan(0.2);
  });

  it('partials fall as n^-1.2, 7.2 dB from the first to the second', () => {
    const { before } = tonePreview(440, 440, false);
    expect(levelAt(before, 440) - levelAt(before, 880)).toBeCloseTo(24 * Math.log10(2), 0);
  });

  it('a stopped pipe sounds odd partials only', () => {
    const { before } = tonePreview(300, 300, true);
    expect(levelAt(before, 600)).toBeLessThan(levelAt(before, 900) - 40);
  });

  it('nothing lies above 0.45 of the sampling rate', () => {
    const { before } = tonePreview(5000, 5000, false);
    expect(levelAt(before, 20_500)).toBeLessThan(levelAt(before, 5000) - 60);
  });
});

describe('vowel previews', () => {
  const given = {
    instrument: 'voice' as const,
    speaker: 'man' as const,
    vowel: 'a' as const,
    composition: { He: 0.79, O2: 0.21 },
    ...room,
  };

  it('keep the fundamental and move the strongest harmonics to the predicted formants', () => {
    const sound = soundCalculator.run(given, data);
    if (!('formantsHz' in sound)) throw new Error('not a voice');
    const { before, after } = soundPreview(given, data);
    // Spacing of the lines: the fundamental, unchanged.
    for (const samples of [before, after]) {
      expect(Math.abs(peakHz(samples, 120, 144) - 132)).toBeLessThan(0.5);
    }
    // The strongest harmonic lies within one harmonic of the formant it marks.
    expect(Math.abs(peakHz(before, 500, 950) - 730)).toBeLessThan(132);
    expect(Math.abs(peakHz(after, 1000, 1550) - (sound.formantsHz[0] ?? 0))).toBeLessThan(132);
    expect(Math.abs(peakHz(before, 2200, 2900) - 2440)).toBeLessThan(132);
    expect(Math.abs(peakHz(after, 3900, 4700) - (sound.formantsHz[2] ?? 0))).toBeLessThan(132);
  });

  it('refuse formants that do not pair up', () => {
    expect(() =>
      vowelPreview({
        vowel: 'a',
        fundamentalHz: 130,
        formantsInAirHz: [700],
        formantsInGasHz: [],
        formantFactor: 1,
      }),
    ).toThrow(/pair up/);
  });
});

describe('level and form of every preview', () => {
  const pairs = [
    ['tone', tonePreview(315, 780, false)],
    [
      'vowel',
      vowelPreview({
        vowel: 'i',
        fundamentalHz: 222,
        formantsInAirHz: [310, 2790, 3310],
        formantsInGasHz: [440, 4800, 5700],
        formantFactor: 1.74,
      }),
    ],
  ] as const;

  it.each(pairs)(
    'the %s peaks at -12 dB, both sounds equally loud, under three seconds',
    (_n, pair) => {
      const peak = Math.max(peakOf(pair.before), peakOf(pair.after));
      expect(Math.abs(peak - 8230.7)).toBeLessThanOrEqual(1);
      expect(effective(pair.after) / effective(pair.before)).toBeCloseTo(1, 2);
      for (const samples of [pair.before, pair.after]) {
        expect(samples.length / sampleRateHz).toBeLessThan(3);
        expect(Math.abs(samples[0] ?? 1)).toBe(0);
        expect(Math.abs(samples[samples.length - 1] ?? 1)).toBe(0);
        const edge = samples.subarray(0, Math.round(fadeSamples / 8));
        expect(peakOf(edge)).toBeLessThan(0.05 * peakOf(samples));
      }
    },
  );

  it('the same input gives the same bytes', () => {
    const bytes = () => wavBytes(tonePreview(315, 780, false).after);
    expect(bytes()).toEqual(bytes());
  });

  it('the file is a one-channel 16-bit WAV of the samples', () => {
    const bytes = wavBytes(Int16Array.from([0, 1, -2]));
    const view = new DataView(bytes.buffer);
    expect(new TextDecoder().decode(bytes.subarray(0, 4))).toBe('RIFF');
    expect(new TextDecoder().decode(bytes.subarray(8, 16))).toBe('WAVEfmt ');
    expect(view.getUint32(4, true)).toBe(bytes.length - 8);
    expect(view.getUint16(22, true)).toBe(1);
    expect(view.getUint32(24, true)).toBe(44_100);
    expect(view.getUint32(40, true)).toBe(6);
    expect(view.getInt16(48, true)).toBe(-2);
  });
});
