import type {
  CriticalConstants,
  GasId,
  GasLibrary,
  GasSpecies,
  InversePowers,
} from './gas-library.js';

/*
 * What the virial equation truncated after B needs: B, T dB/dT and T^2 d2B/dT2, all in m3/mol. They
 * are written into the caller's array, because fifteen small objects for each mixture of six gases
 * cost more than the polynomials themselves.
 */

/**
 * Writes the second virial coefficient of a pure gas and its temperature derivatives [m^3/mol].
 *
 *   th = 300/T;  B = sum over k of b_k th^k
 *   T B' = -sum of k b_k th^k;  T^2 B'' = sum of k (k + 1) b_k th^k
 *
 * @param gas  the species with its fitted coefficients [data]
 * @param T  temperature [K], 240 to 330
 * @param into  takes B, T B' and T^2 B'' [m^3/mol]
 * @param at  where in it B goes [1]
 * Source: virial-fits. Assumes: density low enough for one virial term (room pressure).
 * Accuracy: the fit error stands in the species file, below 0.1 cm3/mol for all but water.
 */
export function writePureVirial(gas: GasSpecies, T: number, into: Float64Array, at: number): void {
  const th = 300 / T;
  const b = gas.secondVirial.coefficientsM3PerMol;
  const square = th * th;
  const b1 = (b[1] ?? 0) * th;
  const b2 = (b[2] ?? 0) * square;
  const b3 = (b[3] ?? 0) * square * th;
  const b4 = (b[4] ?? 0) * square * square;
  into[at] = (b[0] ?? 0) + b1 + b2 + b3 + b4;
  into[at + 1] = -(b1 + 2 * b2 + 3 * b3 + 4 * b4);
  into[at + 2] = 2 * b1 + 6 * b2 + 12 * b3 + 20 * b4;
}

/** Constants of one unlike pair, ready for `writeCrossVirial`. */
export interface GasPair {
  /** R Tc12/pc12 before the quantum correction [m^3/mol]. */
  readonly volumeM3PerMol: number;
  readonly temperatureK: number;
  readonly acentricFactor: number;
  /** Terms of the quantum correction divided by the pair mass [K]; 0 for ordinary pairs. */
  readonly quantumTemperatureK: number;
  readonly quantumPressureK: number;
  /** Coefficients of f0 + omega12 f1 by inverse power of T/Tc12. */
  readonly c0: number;
  readonly c1: number;
  readonly c2: number;
  readonly c3: number;
  readonly c8: number;
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

/** Coefficient of one inverse power in f0 + omega f1. */
function combinedCoefficient(f0: InversePowers, f1: InversePowers, omega: number, power: number) {
  const of = ({ coefficients, powers }: InversePowers) => coefficients[powers.indexOf(power)] ?? 0;
  return of(f0) + omega * of(f1);
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
  const { f0, f1 } = library.tsonopoulos;
  const coefficient = (power: number) => combinedCoefficient(f0, f1, acentricFactor, power);
  const massPerMol = (gas: GasSpecies) => gas.molarMass.molarMassKgPerMol * 1000;
  const inverseMass = isQuantum ? (1 / massPerMol(one) + 1 / massPerMol(other)) / 2 : 0;
  return {
    // R Tc12/pc12 with pc12 from the mean critical factor leaves the volume over that factor.
    volumeM3PerMol: (2 * meanRoot ** 3) / (criticalFactor(a) + criticalFactor(b)),
    temperatureK,
    acentricFactor,
    quantumTemperatureK: library.quantumCorrection.temperatureTermGKPerMol * inverseMass,
    quantumPressureK: library.quantumCorrection.pressureTermGKPerMol * inverseMass,
    c0: coefficient(0),
    c1: coefficient(1),
    c2: coefficient(2),
    c3: coefficient(3),
    c8: coefficient(8),
  };
}

/**
 * Writes the second virial coefficient of an unlike pair and its temperature derivatives [m^3/mol].
 *
 *   B = K(T) f(Tr);  f = f0 + omega f1, a sum of c_n/Tr^n
 *   Tr = (T + a)/Tc12 and K = (R Tc12/pc12)(T + b)/(T + a), where a and b are the quantum terms
 *   (zero for ordinary pairs, so that Tr = T/Tc12 and K is constant)
 *
 * Derivatives are exact: K' = K0 (a - b)/(T + a)^2, K'' = -2 K0 (a - b)/(T + a)^3.
 *
 * @param pair  constants of the pair [data]
 * @param T  temperature [K], 240 to 330
 * @param into  takes B12, T B12' and T^2 B12'' [m^3/mol]
 * @param at  where in it B12 goes [1]
 * Source: tsonopoulos-1974. Assumes: non-polar or weakly polar partners.
 * Accuracy: about 10 cm3/mol, that is 0.02 % in density and 0.01 % in sound speed at one half.
 */
export function writeCrossVirial(pair: GasPair, T: number, into: Float64Array, at: number): void {
  const K0 = pair.volumeM3PerMol;
  const a = pair.quantumTemperatureK;
  const inverseShifted = 1 / (T + a);
  const y = pair.temperatureK * inverseShifted;
  const square = y * y;
  const fourth = square * square;
  const t1 = pair.c1 * y;
  const t2 = pair.c2 * square;
  const t3 = pair.c3 * square * y;
  const t8 = pair.c8 * fourth * fourth;
  const f = pair.c0 + t1 + t2 + t3 + t8;
  // g = Tr f' and h = Tr^2 f'': each power n contributes -n and n(n + 1) times its term.
  const g = -(t1 + 2 * t2 + 3 * t3 + 8 * t8);
  const h = 2 * t1 + 6 * t2 + 12 * t3 + 72 * t8;
  if (a === 0) {
    into[at] = K0 * f;
    into[at + 1] = K0 * g;
    into[at + 2] = K0 * h;
    return;
  }
  const ratio = T * inverseShifted;
  const K = K0 * (T + pair.quantumPressureK) * inverseShifted;
  const TK1 = K0 * (a - pair.quantumPressureK) * inverseShifted * ratio;
  const T2K2 = -2 * TK1 * ratio;
  into[at] = K * f;
  into[at + 1] = TK1 * f + K * g * ratio;
  into[at + 2] = T2K2 * f + 2 * TK1 * g * ratio + K * h * ratio * ratio;
}
