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
  'odh-method': {
    title:
      'Miller & Mazur 1984, oxygen-deficiency hazard method, as carried by FESHM 4240 and quoted by Jefferson Lab 6540 T4 and LBNL',
    seen: 'second-hand',
  },
  'shrinivas-hunt-2014': {
    title:
      'Shrinivas and Hunt 2014, Journal of Fluid Mechanics: entrainment by a jet at an interface',
    seen: 'second-hand',
  },
  'squire-eckert-1951': {
    title:
      'Squire and Eckert, laminar free convection on a vertical surface (integral solution; Eckert & Jackson, NACA TR 1015, 1951)',
    seen: 'from memory',
  },
  'si-2019': { title: 'SI Brochure, 9th edition (2019): exact constants', seen: 'second-hand' },
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
  'own-derivation': {
    title: 'Derived here from first principles; the derivation stands in the docstring',
    seen: 'own derivation',
  },
  'a-weighting-iec-61672': {
    title: 'IEC 61672, frequency weighting A, closed form',
    seen: 'second-hand',
  },
  'density-series': {
    title:
      'Own fits of the compressibility factor to the reference equations of state named in each species file',
    seen: 'own derivation',
  },
  'driven-source-level': {
    title:
      'Radiated power of a small source of fixed velocity; plane-wave impedance; Stokes 1868 for bells in light gas',
    seen: 'own derivation',
  },
  'equal-temperament-iso-16': {
    title: 'ISO 16:1975 standard pitch; equal temperament',
    seen: 'from memory',
  },
  'flanged-end': {
    title: 'Radiation impedance of a flanged pipe by mode matching',
    seen: 'own derivation',
  },
  'flue-pipe-proportions': {
    title:
      'Common practice, no source: mouth a quarter of the circumference wide, cut up to a quarter of its width',
    seen: 'from memory',
  },
  geometry: {
    title: 'Geometry and the definition of the quantity',
    seen: 'own derivation',
  },
  'helmholtz-resonator': {
    title: 'Kinsler et al., Fundamentals of Acoustics: Helmholtz resonator with end corrections',
    seen: 'from memory',
  },
  'ising-1971': {
    title: 'Ising 1971: mouth and top correction of flue pipes, intonation number and jet drive',
    seen: 'second-hand',
  },
  'kewley-port-watson-1994': {
    title: 'Kewley-Port & Watson 1994: just noticeable formant changes',
    seen: 'second-hand',
  },
  'kirchhoff-1868': {
    title: 'Kirchhoff 1868, wide-tube form of the wall effect (Rayleigh, Theory of Sound)',
    seen: 'second-hand',
  },
  'klatt-1980': {
    title: 'Klatt, J. Acoust. Soc. Am. 67 (1980): software for a cascade formant synthesiser',
    seen: 'second-hand',
  },
  'levine-schwinger-1948': {
    title: 'Levine & Schwinger, Phys. Rev. 73 (1948): end correction of an unflanged pipe',
    seen: 'second-hand',
  },
  'outside-gas-mass': {
    title: 'Radiation mass of the outside gas acting on the inside column',
    seen: 'own derivation',
  },
  'peterson-barney-1952': {
    title: 'Peterson & Barney, J. Acoust. Soc. Am. 24 (1952): formants of vowels',
    seen: 'second-hand',
  },
  'pitch-inversion': {
    title: 'Inversion of the sound-speed ratio for the gas fraction, uncertainty by quadrature',
    seen: 'own derivation',
  },
  'preview-choices': {
    title: 'Project choices for previews: tone spectrum, bandwidths, level and fades',
    seen: 'own derivation',
  },
  'saturation-states': {
    title:
      'Saturation states solved from the reference equations of state named in each species file',
    seen: 'own derivation',
  },
  'stevens-1998': {
    title:
      'Stevens, Acoustic Phonetics (1998) eq. 3.59, after Fant 1972: yielding walls of the vocal tract; scaling of the wall term derived',
    seen: 'second-hand',
  },
  'vapour-pressure-fits': {
    title:
      'Own fits in Wagner form to the saturation lines of the reference equations of state named in each species file',
    seen: 'own derivation',
  },
  'well-mixed-dilution': {
    title: 'Dilution of a well-mixed enclosure',
    seen: 'own derivation',
  },
  'wilke-1950': {
    title: 'Wilke, J. Chem. Phys. 18 (1950) 517: viscosity of gas mixtures',
    seen: 'from memory',
  },
  'mackay-1993': {
    title: 'Mackay 1993: lip whistling in helium and sulfur hexafluoride',
    seen: 'second-hand',
  },
  'breathing-supply-limits': {
    title:
      'Project choice: strictest of the published supply criteria for breathing gas, 20.5 % to 23.5 % oxygen; EN 12021 for carbon dioxide',
    seen: 'second-hand',
  },
  'reed-practice': {
    title: 'Wind instruments with reeds and lips: common knowledge, no source',
    seen: 'from memory',
  },
  'akhter-kaye-2020': {
    title: 'Akhter and Kaye 2020: line-plume filling boxes, entrainment 0.16',
    seen: 'first-hand',
  },
  'astm-e741': {
    title: 'ASTM E741 and ISO 12569: air change from tracer-gas decay',
    seen: 'second-hand',
  },
  'baines-turner-1969': {
    title:
      'Baines and Turner, J. Fluid Mech. 37 (1969) 51: turbulent buoyant convection from a source in a confined region',
    seen: 'second-hand',
  },
  'brown-solvason-1962': {
    title:
      'Brown and Solvason, Int. J. Heat Mass Transfer 5 (1962) 859: natural convection through rectangular openings',
    seen: 'second-hand',
  },
  'cleaver-marshall-linden-1994': {
    title:
      'Cleaver, Marshall and Linden, J. Hazard. Mater. 36 (1994) 209: volume Richardson number',
    seen: 'first-hand',
  },
  'dahlquist-bjorck-1974': {
    title: 'Dahlquist and Bjorck, Numerical Methods (1974), section 6.4',
    seen: 'from memory',
  },
  'dormand-prince-1980': {
    title: 'Dormand and Prince, J. Comput. Appl. Math. 6 (1980) 19, table 2',
    seen: 'from memory',
  },
  'engineering-judgement': {
    title: 'Engineering judgement without a published source; shown to the user as an assumption',
    seen: 'own derivation',
  },
  'epstein-1988': {
    title:
      'Epstein, J. Heat Transfer 110 (1988) 885: buoyancy-driven exchange flow through small openings in horizontal partitions',
    seen: 'from memory',
  },
  'golub-van-loan-2013': {
    title: 'Golub and Van Loan, Matrix Computations, 4th edition (2013)',
    seen: 'from memory',
  },
  'hairer-norsett-wanner-1993': {
    title:
      'Hairer, Norsett and Wanner, Solving Ordinary Differential Equations I, 2nd edition (1993)',
    seen: 'from memory',
  },
  'hairer-wanner-1996': {
    title: 'Hairer and Wanner, Solving Ordinary Differential Equations II, 2nd edition (1996)',
    seen: 'from memory',
  },
  'higham-2008': {
    title: 'Higham, Functions of Matrices (2008), chapter 10: scaling and squaring',
    seen: 'from memory',
  },
  'huppert-simpson-1980': {
    title: 'Huppert and Simpson, J. Fluid Mech. 99 (1980) 785: the slumping of gravity currents',
    seen: 'second-hand',
  },
  'iso-2533': {
    title:
      'ISO 2533 standard atmosphere: dry air, oxygen rounded to 20.95 %, molar mass to 28.96 g/mol',
    seen: 'second-hand',
  },
  'kaye-hunt-2004': {
    title:
      'Kaye and Hunt, J. Fluid Mech. 520 (2004) 135: time-dependent flows in an emptying filling box',
    seen: 'second-hand',
  },
  'linden-lane-serff-smeed-1990': {
    title: 'Linden, Lane-Serff and Smeed, J. Fluid Mech. 212 (1990) 309: emptying filling boxes',
    seen: 'second-hand',
  },
  'marrero-mason-1972': {
    title: 'Marrero and Mason, J. Phys. Chem. Ref. Data 1 (1972) 3: gaseous diffusion coefficients',
    seen: 'second-hand',
  },
  'morton-taylor-turner-1956': {
    title:
      'Morton, Taylor and Turner, Proc. R. Soc. A 234 (1956) 1: turbulent gravitational convection',
    seen: 'second-hand',
  },
  'own-room-air': {
    title:
      'Own derivation for the room-air models: volume balances, hydrostatic orifice theory, critical flow, inventory bound',
    seen: 'own derivation',
  },
  'persily-de-jonge-2017': {
    title:
      'Persily and de Jonge, Indoor Air 27 (2017) 868: carbon dioxide generation rates of building occupants',
    seen: 'second-hand',
  },
  'robins-2001': {
    title:
      'Robins and others, Atmos. Environ. 35 (2001): mixing at the top of dense layers, fitted below Ri* 15',
    seen: 'first-hand',
  },
  'shin-dalziel-linden-2004': {
    title:
      'Shin, Dalziel and Linden, J. Fluid Mech. 521 (2004) 1: gravity currents produced by lock exchange',
    seen: 'first-hand',
  },
  'van-ulden-1984': {
    title: 'van Ulden 1984: edge entrainment of spreading dense gas',
    seen: 'from memory',
  },
  'wmo-8': {
    title: 'WMO Guide to Instruments No. 8 (2008): saturation vapour pressure over water',
    seen: 'from memory',
  },
  'ideal-gas': { title: 'Ideal gas law with the exact molar gas constant', seen: 'own derivation' },
  'abramowitz-stegun-1964': {
    title: 'Abramowitz and Stegun, Handbook of Mathematical Functions (1964), chapter 26',
    seen: 'from memory',
  },
  'cryogen-standing-loss': {
    title: 'Published cryogen safety guidance: double the maker figure for an aged vessel',
    seen: 'second-hand',
  },
  'dry-ice-box-loss': {
    title: 'Aviation medicine report AM-06/19 (2006) for small boxes; storage sheets of suppliers',
    seen: 'second-hand',
  },
  'dry-ice-heat-balance': {
    title: 'Heat balance with 571 kJ/kg of sublimation and 83 kJ/kg to warm the gas to 20 degC',
    seen: 'own derivation',
  },
  'floor-heat-conduction': {
    title:
      'Heat conduction into a thick floor at constant surface temperature; concrete from memory',
    seen: 'own derivation',
  },
  'isentropic-nozzle': {
    title:
      'Isentropic flow of an ideal gas through an opening; emptying of a vessel, isothermal and adiabatic',
    seen: 'own derivation',
  },
  'release-courses': {
    title: 'Project choices for the course of releases in time',
    seen: 'own derivation',
  },
  'displacement-guidance': {
    title:
      'Straight displacement, the formula of British trade guidance GN 11 as used by universities',
    seen: 'second-hand',
  },
  plan: {
    title: 'As entered in the plan, with the origin its entry names',
    seen: 'first-hand',
  },
  'acklam-2003': {
    title: 'Acklam 2003: rational approximation of the normal quantile',
    seen: 'from memory',
  },
  'mckay-1979': {
    title: 'McKay, Beckman and Conover, Technometrics 21 (1979) 239: Latin hypercube sampling',
    seen: 'from memory',
  },
  'hyndman-fan-1996': {
    title: 'Hyndman and Fan, American Statistician 50 (1996) 361: sample quantiles',
    seen: 'from memory',
  },
  'spearman-1904': { title: 'Spearman 1904: rank correlation', seen: 'from memory' },
  'rang-angermann-2005': {
    title: 'Rang and Angermann, BIT 45 (2005) 761: new Rosenbrock W-methods, ROS34PW2',
    seen: 'from memory',
  },
} as const satisfies Record<string, Source>;

export type SourceKey = keyof typeof sources;
