import { NotAllowed } from '../../errors.js';
import type { Composition, GasLibrary } from '../gases/gas-library.js';
import { speciesFractions } from '../gases/mixture-terms.js';

/** Oxygen that a mixture must hold by analysis before a person may breathe it. */
export const breathableOxygen = { min: 0.205, max: 0.235 } as const;

/** Carbon dioxide that breathing air may hold. */
const carbonDioxideMax = 0.0005;

/** Gases that a breathable mixture may hold besides oxygen, carbon dioxide and water. */
const harmlessDiluents: ReadonlySet<string> = new Set(['N2', 'He', 'Ar', 'Ne', 'SF6']);
/** Noble gases in fresh air that act on people when there is much of them. */
const traceMax = 1e-4;

const alternative =
  'Let an instrument inside a gas bag change its sound, play a recording, or use a certified breathable mixture (analysed 20.5 to 23.5 % oxygen) from a limp bag with a named, trained adult.';

/**
 * Why a gas may not be breathed, in one line, or null [text].
 *
 * @param library  gas data [data]
 * @param composition  mole fractions by gas id or `air` [1]
 * @returns  the reason [text], or null for air and mixtures that keep the supply limits
 * @throws {InvalidInput} for an unknown gas, or fractions that do not sum to one
 * Source: breathing-supply-limits. Assumes: the composition is the analysed one.
 * Accuracy: a limit, not an effect; meeting it is necessary and not sufficient.
 */
export function breathingRefusal(library: GasLibrary, composition: Composition): string | null {
  const fractions = speciesFractions(library, composition, 0);
  const oxygen = fractions.O2 ?? 0;
  if (oxygen < breathableOxygen.min) {
    return `It holds ${(oxygen * 100).toFixed(1)} % oxygen; less than 20.5 % is never breathed.`;
  }
  if (oxygen > breathableOxygen.max) {
    return `It holds ${(oxygen * 100).toFixed(1)} % oxygen; above 23.5 % hair and clothing burn fiercely.`;
  }
  for (const [id, fraction] of Object.entries(fractions)) {
    const name = library.species[id]?.name ?? id;
    if (id === 'O2' || id === 'H2O' || harmlessDiluents.has(id)) continue;
    if (id === 'CO2') {
      if (fraction > carbonDioxideMax)
        return 'It holds more carbon dioxide than breathing air may.';
      continue;
    }
    if (fraction > traceMax)
      return `It holds ${name}, which is not breathed at any oxygen content.`;
  }
  return null;
}

/**
 * Refuses a gas that may not be breathed; the refusal names the alternative [nothing].
 *
 * @param library  gas data [data]
 * @param composition  mole fractions by gas id or `air` [1]
 * @param speaker  who would breathe it [name]
 * @throws {NotAllowed} for such a gas, and for any gas but air with a child
 * Source: breathing-supply-limits. Assumes: as `breathingRefusal`. Accuracy: not a measure.
 */
export function refuseUnbreathable(
  library: GasLibrary,
  composition: Composition,
  speaker: 'man' | 'woman' | 'child' | undefined,
): void {
  const reason = breathingRefusal(library, composition);
  const isAir = (composition.air ?? 0) === 1;
  const refusal =
    reason ??
    (speaker === 'child' && !isAir ? 'Children do not breathe demonstration gases.' : null);
  if (refusal !== null) {
    throw new NotAllowed(
      `Refused: this gas is not planned for breathing. ${refusal}`,
      alternative,
      [{ path: '/composition', problem: refusal }],
    );
  }
}
