import type { Composition, GasLibrary } from '../gases/gas-library.js';
import { refuseUnbreathable } from './breathing-gate.js';
import { shareForRatio } from './gas-fraction.js';
import { tractState } from './voice.js';

/**
 * Share of a breathable mixture in the tract, the rest air, that moves the formants by a factor [1].
 *
 *   k(x) = c(x)/c(0) = 1 + change, or 1 - change for heavy mixtures
 *
 * @param library  gas data [data]
 * @param mixture  the breathable mixture [1]
 * @param p  absolute pressure [Pa], 60 000 to 110 000
 * @param change  relative change of the formants [1], such as 0.05 or 0.15
 * @returns  share of the mixture [1], or null where even the mixture alone falls short
 * @throws {NotAllowed} for a mixture that may not be breathed
 * @throws {OutOfRange} outside the range above
 * Source: kewley-port-watson-1994. Assumes: tract wholly filled; higher formants.
 * Accuracy: that of the room model.
 */
export function mixtureShareForFormants(
  library: GasLibrary,
  mixture: Composition,
  p: number,
  change: number,
): number | null {
  refuseUnbreathable(library, mixture, undefined);
  const { speedOfSoundMPerS: inAir } = tractState(library, { air: 1 }, p);
  const ratioAt = (share: number) => {
    const blend: Record<string, number> = { air: 1 - share };
    for (const [id, fraction] of Object.entries(mixture)) {
      blend[id] = (blend[id] ?? 0) + share * fraction;
    }
    return tractState(library, blend, p).speedOfSoundMPerS / inAir;
  };
  const upwards = ratioAt(1) > 1;
  return shareForRatio(upwards ? 1 + change : 1 - change, ratioAt);
}
