import { bracketedRoot } from '../numerics/root.js';
import { inRange } from '../range.js';
import type { Composition, GasId, GasLibrary } from '../gases/gas-library.js';
import { knownGas } from '../gases/known-gas.js';
import { mixtureState, type MixtureState } from '../gases/mixture-state.js';
import { relativeHumidityRange, roomPressure, roomTemperature } from '../gases/ranges.js';
import { airAtEndsFactor, type Resonator } from './instrument.js';
import { wallFactorOfGas } from './wall-friction.js';

/** Which speed of sound: of the virial equation, or of the ideal gas for checks by hand. */
export type SpeedModel = 'virial' | 'ideal';

/** One gas mixed with humid room air, sounding against the same room air. */
export interface GasInAir {
  readonly gas: GasId;
  /** What is let in, where it is not one gas alone; the share is then that of this mixture. */
  readonly mixture?: Composition;
  /** Of the room air [K]. */
  readonly temperatureK: number;
  readonly pressurePa: number;
  readonly relativeHumidity: number;
  /** Of the gas in the resonator, the room's when left out [K]. */
  readonly gasTemperatureK?: number;
  readonly model?: SpeedModel;
  /** Inner radius, where wall friction is to count [m]. */
  readonly radiusM?: number;
  /** Note in air, needed with a radius [Hz]. */
  readonly frequencyInAirHz?: number;
  /** The resonator, where its ends see room air. */
  readonly endsInAir?: Resonator;
}

function speedOf(state: MixtureState, model: SpeedModel): number {
  return model === 'virial' ? state.speedOfSoundMPerS : state.idealSpeedOfSoundMPerS;
}

/**
 * Note in a mixture of gas and room air over the note in room air, as a function of the share [1].
 *
 *   r(x) = c(x, T_gas)/c_air(T) times wall factor and end factor, where asked
 *
 * The air in the mixture keeps its mole fraction of water whatever the temperature of the gas.
 *
 * @param library  gas data [data]
 * @param given  gas id, temperatures [K], pressure [Pa], humidity [1], radius [m], note in air [Hz]
 * @returns  the function from share x [1] to ratio r [1]
 * @throws {OutOfRange} outside the ranges of the room model
 * @throws {InvalidInput} for an unknown gas
 * Source: pitch-inversion. Assumes: same harmonic, same mounting. Accuracy: that of the speeds.
 * @example noteRatio(library, { gas: 'He', temperatureK: 293.15, pressurePa: 101325, relativeHumidity: 0.5, model: 'ideal' })(1) // 2.9297
 */
export function noteRatio(library: GasLibrary, given: GasInAir): (share: number) => number {
  const { gas, temperatureK, pressurePa, relativeHumidity, radiusM } = given;
  const letIn = given.mixture ?? { [gas]: 1 };
  if (given.mixture === undefined && gas !== 'air') knownGas(library, gas, '/gas');
  inRange(temperatureK, roomTemperature, '/temperatureK');
  inRange(pressurePa, roomPressure, '/pressurePa');
  inRange(relativeHumidity, relativeHumidityRange, '/relativeHumidity');
  const model = given.model ?? 'virial';
  const gasTemperatureK = inRange(
    given.gasTemperatureK ?? temperatureK,
    roomTemperature,
    '/gasTemperatureK',
  );
  const room = { composition: { air: 1 }, temperatureK, pressurePa, relativeHumidity };
  const air = mixtureState(library, room);
  const water = air.waterFraction;
  const stateAt = (share: number) =>
    mixtureState(library, mixtureAt(share, letIn, water, gasTemperatureK, pressurePa));
  const airFriction = (f: number, a: number) => wallFactorOfGas(library, room, a, f);
  return (share) => {
    const state = stateAt(share);
    let ratio = speedOf(state, model) / speedOf(air, model);
    if (given.endsInAir) {
      ratio *= airAtEndsFactor(given.endsInAir, air.densityKgPerM3 / state.densityKgPerM3);
    }
    const f = given.frequencyInAirHz;
    if (radiusM !== undefined && f !== undefined) {
      const mixture = mixtureAt(share, letIn, water, gasTemperatureK, pressurePa);
      ratio *= wallFactorOfGas(library, mixture, radiusM, f * ratio) / airFriction(f, radiusM);
    }
    return ratio;
  };
}

function mixtureAt(
  share: number,
  letIn: Composition,
  water: number,
  temperatureK: number,
  pressurePa: number,
) {
  const composition: Record<string, number> = { air: (1 - share) * (1 - water) };
  composition.H2O = (composition.H2O ?? 0) + (1 - share) * water;
  for (const id in letIn) {
    composition[id] = (composition[id] ?? 0) + share * (letIn[id] ?? 0);
  }
  return { composition, temperatureK, pressurePa };
}

/**
 * Share of gas that gives a note ratio, or null where no share does [1].
 *
 *   r(x) = ratio, solved on 0 <= x <= 1; never clipped to the ends
 *
 * @param ratio  note in the gas over note in air [1]
 * @param ratioAt  the function of `noteRatio` [function]
 * @returns  share of gas [1], or null outside the attainable ratios
 * Source: pitch-inversion. Assumes: the ratio is monotonic in the share, as for every gas here but
 * those about as heavy as air.
 * Accuracy: 1e-12 in the share.
 */
export function shareForRatio(ratio: number, ratioAt: (share: number) => number): number | null {
  const atAir = ratioAt(0) - ratio;
  const atGas = ratioAt(1) - ratio;
  if (atAir === 0) return 0;
  if (atGas === 0) return 1;
  if (atAir > 0 === atGas > 0) return null;
  return bracketedRoot((share) => ratioAt(share) - ratio, 0, 1, 1e-12);
}

/**
 * Sensitivity of the note to the share of gas [1].
 *
 *   S = d ln f/dx, by difference over 1e-4 inside 0 to 1
 *
 * @param share  share of gas [1]
 * @param ratioAt  the function of `noteRatio` [function]
 * @returns  relative change of the note per unit of share [1]
 * Source: pitch-inversion. Assumes: a smooth ratio. Accuracy: 1e-4 of itself.
 */
export function noteSensitivity(share: number, ratioAt: (share: number) => number): number {
  const low = Math.max(0, share - 1e-4);
  const high = Math.min(1, share + 1e-4);
  return Math.log(ratioAt(high) / ratioAt(low)) / (high - low);
}
