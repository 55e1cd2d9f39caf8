import type {
  CriticalConstants,
  GasId,
  GasLibrary,
  GasSpecies,
  InversePowers,
} from './gas-library.js';

/** B, T dB/dT and T^2 d2B/dT2, all in m3/mol: what the virial equation truncated after B needs. */
export interface VirialTerms {
  readonly b: number;
  readonly tb1: number;
  readonly t2b2: number;
}

/**
 * Second virial coefficient of a pure gas, with its temperature derivatives [m^3/mol].
 *
 *   th = 300/T;  B = sum over k of b_k th^k
 *   T B' = -sum of k b_k th^k;  T^2 B'' = sum of k (k + 1) b_k th^k
 *
 * @param gas  the species with its fitted coefficients [data]
 * @param T  temperature [K], 240 to 330
 * @returns  B, T B' and T^2 B'' [m^3/mol]
 * Source: virial-fits. Assumes: density low enough for one virial term (room pressure).
 * Accuracy: the fit error stands in the species file, below 0.1 cm3/mol for all but water.
 */
export function pureVirial(gas: GasSpecies, T: number): VirialTerms {
  const th = 300 / T;
  let power = 1;
  let b = 0;
  let tb1 = 0;
  let t2b2 = 0;
  let k = 0;
  for (const coefficient of gas.secondVirial.coefficientsM3PerMol) {
    const term = coefficient * power;
    b += term;
    tb1 -= k * term;
    t2b2 += k * (k + 1) * term;
    power *= th;
    k += 1;
  }
  return { b, tb1, t2b2 };
}

/** Constants of one unlike pair, ready for `crossVirial`. */
export interface GasPair {
  /** R Tc12/pc12 before the quantum correction [m^3/mol]. */
  readonly volumeM3PerMol: number;
  readonly temperatureK: number;
  readonly acentricFactor: number;
  /** Terms of the quantum correction divided by the pair mass [K]; 0 for ordinary pairs. */
  readonly quantumTemperatureK: number;
  readonly quantumPressureK: number;
  /** Sum of f0 and omega12 f1, one term per inverse power of T/Tc12, powers ascending. */
  readonly terms: readonly InverseTerm[];
}

function criticalOf(gas: GasSpecies): CriticalConstants {
  return gas.quantumCritical ?? gas.critical;
}

function pairCorrection(library: GasLibrary, one: GasId, other: GasId): number {
  const row = library.k12.pairs.find(
    ({ between }) => between.includes(one) && between.includes(other),
  );
  return row?.value ?? library.k12.default;
}

/** One term c/Tr^n; `step` is how far n lies beyond the term before. */
interface InverseTerm {
  readonly coefficient: number;
  readonly n: number;
  readonly step: number;
}

function combinedTerms(f0: InversePowers, f1: InversePowers, omega: number): InverseTerm[] {
  const byPower = new Map<number, number>();
  const add = ({ coefficients, powers }: InversePowers, weight: number): void => {
    coefficients.forEach((coefficient, index) => {
      const power = powers[index] ?? 0;
      byPower.set(power, (byPower.get(power) ?? 0) + weight * coefficient);
    });
  };
  add(f0, 1);
  add(f1, omega);
  let last = 0;
  return [...byPower]
    .sort(([one], [other]) => one - other)
    .map(([n, coefficient]) => {
      const step = n - last;
      last = n;
      return { coefficient, n, step };
    });
}

/**
 * Constants of an unlike pair of gases for its cross virial coefficient [m^3/mol, K].
 *
 *   Tc12 = sqrt(Tc1 Tc2)(1 - k12);  Vc12 = ((Vc1^(1/3) + Vc2^(1/3))/2)^3
 *   Zc = pc Vc/(R Tc);  pc12 = (Zc1 + Zc2)/2 R Tc12/Vc12;  omega12 = (omega1 + omega2)/2
 *
 * Helium, hydrogen and neon enter with their effective constants; a pair with one of them keeps the
 * quantum correction with the pair mass 1/M = (1/M1 + 1/M2)/2.
 *
 * @param library  gas data: constants, k12 and the correlation [data]
 * @param one  first species [data]
 * @param other  second species [data]
 * @returns  the pair's constants [m^3/mol, K]
 * Source: prausnitz-mixing-rules. Assumes: three-parameter corresponding states.
 * Accuracy: cross virials within about 10 cm3/mol for simple gases; not known for SF6 with air.
 */
export function gasPair(library: GasLibrary, one: GasSpecies, other: GasSpecies): GasPair {
  const a = criticalOf(one);
  const b = criticalOf(other);
  const R = library.gasConstant.jPerMolK;
  const temperatureK =
    Math.sqrt(a.temperatureK * b.temperatureK) * (1 - pairCorrection(library, one.id, other.id));
  const meanRoot = (Math.cbrt(a.molarVolumeM3PerMol) + Math.cbrt(b.molarVolumeM3PerMol)) / 2;
  const criticalFactor = ({ pressurePa, molarVolumeM3PerMol, ...rest }: CriticalConstants) =>
    (pressurePa * molarVolumeM3PerMol) / (R * rest.temperatureK);
  const acentricFactor = (a.acentricFactor + b.acentricFactor) / 2;
  const isQuantum = one.quantumCritical !== undefined || other.quantumCritical !== undefined;
  const massPerMol = (gas: GasSpecies) => gas.molarMass.molarMassKgPerMol * 1000;
  const inverseMass = isQuantum ? (1 / massPerMol(one) + 1 / massPerMol(other)) / 2 : 0;
  return {
    // R Tc12/pc12 with pc12 from the mean critical factor leaves the volume over that factor.
    volumeM3PerMol: (2 * meanRoot ** 3) / (criticalFactor(a) + criticalFactor(b)),
    temperatureK,
    acentricFactor,
    quantumTemperatureK: library.quantumCorrection.temperatureTermGKPerMol * inverseMass,
    quantumPressureK: library.quantumCorrection.pressureTermGKPerMol * inverseMass,
    terms: combinedTerms(library.tsonopoulos.f0, library.tsonopoulos.f1, acentricFactor),
  };
}

/**
 * Second virial coefficient of an unlike pair, with its temperature derivatives [m^3/mol].
 *
 *   B = K(T) f(Tr);  f = f0 + omega f1, a sum of c_n/Tr^n
 *   Tr = (T + a)/Tc12 and K = (R Tc12/pc12)(T + b)/(T + a), where a and b are the quantum terms
 *   (zero for ordinary pairs, so that Tr = T/Tc12 and K is constant)
 *
 * Derivatives are exact: K' = K0 (a - b)/(T + a)^2, K'' = -2 K0 (a - b)/(T + a)^3.
 *
 * @param pair  constants of the pair [data]
 * @param T  temperature [K], 240 to 330
 * @returns  B12, T B12' and T^2 B12'' [m^3/mol]
 * Source: tsonopoulos-1974. Assumes: non-polar or weakly polar partners.
 * Accuracy: about 10 cm3/mol, that is 0.02 % in density and 0.01 % in sound speed at one half.
 */
export function crossVirial(pair: GasPair, T: number): VirialTerms {
  const shifted = T + pair.quantumTemperatureK;
  const inverse = pair.temperatureK / shifted;
  let f = 0;
  // g = Tr f' and h = Tr^2 f'': each power n contributes -n and n(n + 1) times its term.
  let g = 0;
  let h = 0;
  let power = 1;
  for (const { coefficient, n, step } of pair.terms) {
    for (let count = 0; count < step; count += 1) power *= inverse;
    const term = coefficient * power;
    f += term;
    g -= n * term;
    h += n * (n + 1) * term;
  }
  const K0 = pair.volumeM3PerMol;
  const gap = pair.quantumTemperatureK - pair.quantumPressureK;
  const K = K0 * ((T + pair.quantumPressureK) / shifted);
  const K1 = (K0 * gap) / (shifted * shifted);
  const K2 = (-2 * K1) / shifted;
  const ratio = T / shifted;
  return {
    b: K * f,
    tb1: T * K1 * f + K * g * ratio,
    t2b2: T * T * K2 * f + 2 * T * K1 * g * ratio + K * h * ratio * ratio,
  };
}
