/**
 * The one bibliography. Docstrings, data rows and sheets cite by key; nothing is cited that is not
 * here. `seen` says how the text was checked: first-hand, second-hand (a quotation or public code),
 * or from memory.
 */
export interface Source {
  readonly title: string;
  readonly seen: 'first-hand' | 'second-hand' | 'from memory' | 'own derivation';
}

export const sources = {
  'si-2019': { title: 'SI Brochure, 9th edition (2019): exact constants', seen: 'second-hand' },
  'standard-atmosphere': {
    title: 'ISO 2533 standard atmosphere, pressure below 11 km',
    seen: 'from memory',
  },
  'cipm-2007': {
    title: 'Picard, Davis, Glaeser & Fujii (CIPM-2007), Metrologia 45 (2008) 149-155',
    seen: 'second-hand',
  },
  'hardy-1998': {
    title:
      'Hardy, ITS-90 formulations for vapour pressure, Third International Symposium on Humidity and Moisture, London 1998',
    seen: 'second-hand',
  },
  'iupac-atomic-weights': {
    title: 'IUPAC/CIAAW atomic weights, as used in NASA/TP-2002-211556 and CIPM-2007',
    seen: 'second-hand',
  },
  'nasa-tp-2002-211556': {
    title: 'McBride, Zehe & Gordon, NASA/TP-2002-211556 (2002), nine-coefficient heat capacities',
    seen: 'second-hand',
  },
  'prausnitz-mixing-rules': {
    title:
      'Prausnitz, Lichtenthaler & de Azevedo, Molecular Thermodynamics of Fluid-Phase Equilibria: mixing rules for virial coefficients',
    seen: 'from memory',
  },
  'tsonopoulos-1974': {
    title:
      'Tsonopoulos, AIChE J. 20 (1974) 263-272; quantum gases after Gunn, Chueh & Prausnitz 1966',
    seen: 'second-hand',
  },
  'virial-fits': {
    title:
      'Own fits to the second virial coefficients of the reference equations of state named in each species file',
    seen: 'own derivation',
  },
  'virial-sound-speed': {
    title: 'Speed of sound of the virial equation Z = 1 + B rho, exact thermodynamics',
    seen: 'own derivation',
  },
} as const satisfies Record<string, Source>;

export type SourceKey = keyof typeof sources;
