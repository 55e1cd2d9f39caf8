import type { Composition, GasLibrary } from './gas-library.js';
import { mixtureTerms } from './mixture-terms.js';

/**
 * Molar mass of a gas mixture, the air share taken as dry [kg/mol].
 *
 *   M = sum x_i M_i
 *
 * @param library  gas data [data]
 * @param composition  mole fractions by gas id or `air` [1], sum 1 within 1e-6
 * @returns  molar mass [kg/mol]
 * @throws {InvalidInput} for an unknown gas, or fractions that do not sum to one
 * Source: iupac-atomic-weights. Assumes: natural isotopes. Accuracy: that of the table.
 * @example molarMassKgPerMol(library, { He: 1 }) // 0.004002602
 * @example molarMassKgPerMol(library, { He: 0.5, air: 0.5 }) // 0.016484
 */
export function molarMassKgPerMol(library: GasLibrary, composition: Composition): number {
  // Any temperature serves: the molar mass is summed with the terms that depend on it.
  return mixtureTerms(library, composition, 300, 0).molarMassKgPerMol;
}
