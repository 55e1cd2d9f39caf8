import type { GasLibrary } from '../gases/gas-library.js';
import { AIR_MOLAR_MASS_KG_PER_MOL } from './air-constants.js';

/** What the air run needs to know of a gas. */
export interface AirGas {
  readonly molarMassKgPerMol: number;
  /** In air near 20 degC [m2/s]. */
  readonly diffusivityM2PerS?: number;
}

/** By gas id; `air` may be left out. */
export type AirGasTable = Readonly<Record<string, AirGas>> & { readonly air?: AirGas };

/**
 * Diffusivity in air at 20 degC [m2/s]. He, Ar and CO2 read in stored text; the rest from memory,
 * about +-20 %.
 */
export const DIFFUSIVITIES_IN_AIR: Readonly<
  Record<string, { readonly valueM2PerS: number; readonly source: string; readonly seen: boolean }>
> = {
  He: { valueM2PerS: 0.7e-4, source: 'marrero-mason-1972', seen: true },
  H2: { valueM2PerS: 0.77e-4, source: 'marrero-mason-1972', seen: false },
  N2: { valueM2PerS: 0.2e-4, source: 'marrero-mason-1972', seen: false },
  O2: { valueM2PerS: 0.2e-4, source: 'marrero-mason-1972', seen: false },
  Ar: { valueM2PerS: 0.19e-4, source: 'marrero-mason-1972', seen: true },
  CO2: { valueM2PerS: 0.16e-4, source: 'marrero-mason-1972', seen: true },
  CH4: { valueM2PerS: 0.21e-4, source: 'marrero-mason-1972', seen: false },
  N2O: { valueM2PerS: 0.16e-4, source: 'marrero-mason-1972', seen: false },
  C3H8: { valueM2PerS: 0.11e-4, source: 'marrero-mason-1972', seen: false },
  Ne: { valueM2PerS: 0.32e-4, source: 'marrero-mason-1972', seen: false },
  Kr: { valueM2PerS: 0.15e-4, source: 'marrero-mason-1972', seen: false },
  Xe: { valueM2PerS: 0.13e-4, source: 'marrero-mason-1972', seen: false },
  SF6: { valueM2PerS: 0.1e-4, source: 'marrero-mason-1972', seen: false },
};

/** Diffusivity taken where the table has none: that of carbon dioxide [m2/s]. */
const DIFFUSIVITY_UNLISTED = 0.16e-4;

/** The table that the air run reads, from the gas data of the project. */
export function airGasTable(library: GasLibrary): AirGasTable {
  const table: Record<string, AirGas> = {
    air: { molarMassKgPerMol: library.dryAir.molarMass.molarMassKgPerMol },
  };
  for (const [id, species] of Object.entries(library.species)) {
    table[id] = {
      molarMassKgPerMol: species.molarMass.molarMassKgPerMol,
      diffusivityM2PerS: DIFFUSIVITIES_IN_AIR[id]?.valueM2PerS ?? DIFFUSIVITY_UNLISTED,
    };
  }
  return table;
}

/**
 * Molar mass of dry air in a table [kg/mol].
 *
 * @param gases gas table
 * @returns molar mass [kg/mol]; the rounded value of the models where the table has no air
 * Source: iso-2533. Assumes: dry air. Accuracy: 2e-4 for the rounded value.
 * @example airMolarMass({}) // 0.02896
 */
export function airMolarMass(gases: AirGasTable): number {
  return gases.air?.molarMassKgPerMol ?? AIR_MOLAR_MASS_KG_PER_MOL;
}

/**
 * Diffusivity of a gas in air near 20 degC [m2/s].
 *
 * @param gases gas table
 * @param id    gas id
 * @returns diffusivity [m2/s]; of the table, else listed here, else that of carbon dioxide
 * Source: marrero-mason-1972 (which values were seen: DIFFUSIVITIES_IN_AIR). Assumes: dilute, about
 * 101 kPa. Accuracy: about 20 % where from memory.
 * @example diffusivityInAir({}, 'He') // 0.7e-4
 */
export function diffusivityInAir(gases: AirGasTable, id: string): number {
  return (
    gases[id]?.diffusivityM2PerS ?? DIFFUSIVITIES_IN_AIR[id]?.valueM2PerS ?? DIFFUSIVITY_UNLISTED
  );
}
