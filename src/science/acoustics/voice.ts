import { OutOfRange } from '../../errors.js';
import type { Composition, GasLibrary } from '../gases/gas-library.js';
import { mixtureState } from '../gases/mixture-state.js';

export type Speaker = 'man' | 'woman' | 'child';
export type Vowel = 'i' | 'ae' | 'a' | 'u';

/** First three formants of four vowels as spoken by men, women and children [Hz]. */
export const vowelFormants: Readonly<
  Record<Vowel, Readonly<Record<Speaker, readonly [number, number, number]>>>
> = {
  i: { man: [270, 2290, 3010], woman: [310, 2790, 3310], child: [370, 3200, 3730] },
  ae: { man: [660, 1720, 2410], woman: [860, 2050, 2850], child: [1010, 2320, 3320] },
  a: { man: [730, 1090, 2440], woman: [850, 1220, 2810], child: [1030, 1370, 3170] },
  u: { man: [300, 870, 2240], woman: [370, 950, 2670], child: [430, 1170, 3260] },
};

/** Fundamental of the same speakers, the middle of the published ranges [Hz]. */
export const speakingPitchHz: Readonly<Record<Speaker, number>> = {
  man: 132,
  woman: 222,
  child: 264,
};

/** First resonance of the yielding walls in air [Hz]; the child's from memory. */
export const wallResonanceHz: Readonly<Record<Speaker, number>> = {
  man: 190,
  woman: 190,
  child: 225,
};

/** The vocal tract is as warm as the body and saturated with water. */
const tractTemperatureK = 310.15;
/** 47 mmHg, the vapour pressure of water at that temperature. */
const tractWaterPa = 47 * 133.322387415;

export interface TractState {
  readonly speedOfSoundMPerS: number;
  readonly heatCapacityRatio: number;
  readonly idealSpeedOfSoundMPerS: number;
}

/**
 * State of a gas in the vocal tract: 37 degC and saturated with water [m/s, 1].
 *
 *   x_i = x_i,dry (1 - x_w), x_w = 47 mmHg/p
 *
 * @param library  gas data [data]
 * @param dry  composition of the gas before it meets the tract [1]
 * @param p  absolute pressure [Pa], 60 000 to 110 000
 * @returns  speed of sound [m/s], also of the ideal gas, and ratio of heat capacities [1]
 * @throws {OutOfRange} outside the range above
 * Source: stevens-1998. Assumes: the tract is full of the gas, nothing of the lung mixed in.
 * Accuracy: that of the room model.
 */
export function tractState(library: GasLibrary, dry: Composition, p: number): TractState {
  const water = tractWaterPa / p;
  const wet: Record<string, number> = { H2O: water };
  for (const [id, fraction] of Object.entries(dry)) {
    wet[id] = (wet[id] ?? 0) + fraction * (1 - water);
  }
  return mixtureState(library, {
    composition: wet,
    temperatureK: tractTemperatureK,
    pressurePa: p,
  });
}

/**
 * Formant of a vowel in another gas [Hz].
 *
 *   F_gas^2 = k^2 (F_air^2 - F_w^2) + (gamma_gas/gamma_air) F_w^2
 *
 * @param formantInAirHz  formant in air [Hz], above the wall resonance
 * @param k  ratio of the sound speeds, gas over air, in the tract [1]
 * @param gammaRatio  ratio of the heat capacity ratios, gas over air [1]
 * @param wallHz  first resonance of the tract walls in air [Hz]
 * @returns  formant in the gas [Hz]
 * @throws {OutOfRange} for a formant not above the wall resonance
 * Source: stevens-1998. Assumes: equal pressure; one wall resonance.
 * Accuracy: the wall term is derived; it was not found measured at room pressure.
 * @example formantInGas(730, 1.74317, 1.11549, 190) // 1244.94
 */
export function formantInGas(
  formantInAirHz: number,
  k: number,
  gammaRatio: number,
  wallHz: number,
): number {
  if (!(formantInAirHz > wallHz)) {
    throw new OutOfRange(
      `A formant of ${String(formantInAirHz)} Hz does not lie above the wall resonance of ${String(wallHz)} Hz.`,
      `Give formants above ${String(wallHz)} Hz.`,
      [{ path: '/formantsInAirHz', problem: `outside above ${String(wallHz)} Hz` }],
    );
  }
  const wall = wallHz * wallHz;
  return Math.sqrt(k * k * (formantInAirHz * formantInAirHz - wall) + gammaRatio * wall);
}

/** Lung volume left after a normal breath out, breathing dead space, and a full normal breath [L]. */
const restingLungL = 2.4;
const deadSpaceL = 0.15;
const oneBreathL = 1;

/**
 * Share of a breathable mixture in the lung after one normal breath of it [1].
 *
 *   share = 1 - (V0 + VD)/(V0 + VI)
 *
 * @returns  share [1]: why the effect is much smaller than in a full tract
 * Source: well-mixed-dilution. Assumes: a resting adult, one litre, perfect mixing.
 * Accuracy: real lungs scatter by a fifth.
 * @example oneBreathShare() // 0.25
 */
export function oneBreathShare(): number {
  return 1 - (restingLungL + deadSpaceL) / (restingLungL + oneBreathL);
}
