import { inRange, type Range } from '../range.js';
import type { GasLibrary } from '../gases/gas-library.js';
import { noteRatio, noteSensitivity, shareForRatio, type GasInAir } from './gas-fraction.js';
import { frequencyRange } from './ranges.js';
import type { Resonator } from './instrument.js';

export const frequencyUncertaintyRange: Range = {
  min: 0,
  max: 1000,
  unit: 'Hz',
  name: 'standard uncertainty of a frequency',
};
export const temperatureUncertaintyRange: Range = {
  min: 0,
  max: 30,
  unit: 'K',
  name: 'standard uncertainty of the temperature',
};

/** Gases whose pure note lies closer to air than this (|ln r|) are not told by their note: argon. */
const leastSpan = 0.2;

/** Shortfall of a ratio that rounding of the readings explains. */
const usualUncertainty = { temperatureK: 1, relativeFrequency: 0.003 };

export interface PurityInput extends GasInAir {
  readonly frequencyInAirHz: number;
  readonly frequencyMeasuredHz: number;
  readonly standardUncertaintyHz?: number;
  readonly standardUncertaintyInAirHz?: number;
  readonly standardUncertaintyK?: number;
  /** The resonator, where the ends may have seen air. */
  readonly standsInAir?: Resonator;
}

export type Purity =
  | { readonly possible: false; readonly suspects: readonly string[] }
  | {
      readonly possible: true;
      readonly gasFraction: number;
      readonly airFraction: number;
      readonly sensitivity: number;
      readonly standardUncertainty: number;
      /** Interval between immersed ends and ends in air, where the pipe stood in air. */
      readonly interval?: readonly [number, number];
    };

function suspectsFor(ratio: number, ratioAt: (share: number) => number): string[] {
  const suspects: string[] = [];
  const attainable = (r: number) => shareForRatio(r, ratioAt) !== null;
  for (const [factor, words] of [
    [1 / 2, 'the note in the gas was read an octave too high'],
    [1 / 3, 'the note in the gas was a third harmonic'],
    [2, 'the note in the gas was read an octave too low'],
    [3, 'the note in air was a third harmonic'],
  ] as const) {
    if (attainable(ratio * factor)) suspects.push(`wrong harmonic: ${words}`);
  }
  suspects.push(
    'temperature: the gas was colder or warmer than stated (fresh from a cylinder or a cold source)',
    'end condition: the ends of the pipe saw other gas than assumed',
    'gas: another gas than named, or two gases',
    'meter: the frequency reading itself',
  );
  return suspects;
}

/**
 * Share of gas in the air around and in a pipe, from its note there and in air [1].
 *
 *   c(x, T_gas)/c_air(T, RH) = f/f_air, solved for x
 *   u(x) = sqrt((u_f/f)^2 + (u_fa/f_a)^2 + (u_T/(2T))^2)/|d ln f/dx|
 *
 * @param library  gas data [data]
 * @param input  notes [Hz] 16 to 16 000, gas id, temperatures [K], pressure [Pa], humidity [1],
 *   radius [m] for wall friction, standard uncertainties [Hz, K]
 * @returns  share and its standard uncertainty [1], or why no share fits; never clipped
 * @throws {OutOfRange} outside the ranges above
 * Source: pitch-inversion. Assumes: same pipe, same harmonic, same mounting.
 * Accuracy: u(x) is repeatability alone; the end condition is given as an interval.
 */
export function purityFromNote(library: GasLibrary, input: PurityInput): Purity {
  const f = inRange(input.frequencyMeasuredHz, frequencyRange, '/frequencyMeasuredHz');
  const fAir = inRange(input.frequencyInAirHz, frequencyRange, '/frequencyInAirHz');
  const uf = inRange(
    input.standardUncertaintyHz ?? usualUncertainty.relativeFrequency * f,
    frequencyUncertaintyRange,
    '/standardUncertaintyHz',
  );
  const ufAir = inRange(
    input.standardUncertaintyInAirHz ?? input.standardUncertaintyHz ?? uf * (fAir / f),
    frequencyUncertaintyRange,
    '/standardUncertaintyInAirHz',
  );
  const uT = inRange(
    input.standardUncertaintyK ?? usualUncertainty.temperatureK,
    temperatureUncertaintyRange,
    '/standardUncertaintyK',
  );
  const T = input.gasTemperatureK ?? input.temperatureK;
  const ratio = f / fAir;
  const ratioAt = noteRatio(library, input);
  const share = shareForRatio(ratio, ratioAt);
  const filledAt =
    input.standsInAir && noteRatio(library, { ...input, endsInAir: input.standsInAir });
  const filled = filledAt && shareForRatio(ratio, filledAt);
  const sensitivity = noteSensitivity(share ?? filled ?? 1, ratioAt);
  const span = Math.abs(Math.log(ratioAt(1) / ratioAt(0)));
  if (span < leastSpan) {
    return {
      possible: false,
      suspects: [
        'gas: the note hardly depends on the amount of this gas, so it cannot be turned into a purity; use a meter',
      ],
    };
  }
  if (share === null) return { possible: false, suspects: suspectsFor(ratio, ratioAt) };
  const relative = Math.hypot(uf / f, ufAir / fAir, uT / (2 * T));
  const standardUncertainty = relative / Math.abs(sensitivity);
  const answer = {
    possible: true as const,
    gasFraction: share,
    airFraction: 1 - share,
    sensitivity,
    standardUncertainty,
  };
  if (filledAt === undefined) return answer;
  // Where air at the ends could not give the note at any share, even the pure gas may have been there.
  const other = filled ?? 1;
  return { ...answer, interval: [Math.min(share, other), Math.max(share, other)] };
}
