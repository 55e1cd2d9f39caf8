import { InvalidInput } from '../../errors.js';
import type { GasId, GasLibrary, GasSpecies } from './gas-library.js';

/**
 * The species behind an id, `air` not being one [data].
 *
 * @param library  gas data [data]
 * @param gas  a gas id [id]
 * @param path  JSON Pointer of the id in the caller's input [text]
 * @returns  the species [data]
 * @throws {InvalidInput} for an unknown gas
 * Source: iupac-atomic-weights. Assumes: nothing more. Accuracy: exact.
 * @example knownGas(library, 'He', '/gas').formula // 'He'
 */
export function knownGas(library: GasLibrary, gas: GasId, path: string): GasSpecies {
  const species = Object.hasOwn(library.species, gas) ? library.species[gas] : undefined;
  if (species) return species;
  throw new InvalidInput(
    `There is no gas "${gas}" here.`,
    `Use one of ${Object.keys(library.species).join(', ')}.`,
    [{ path, problem: 'is not a known gas' }],
  );
}
