import type { GasLibrary } from '../../src/science/gases/gas-library.js';
import { knownGas } from '../../src/science/gases/known-gas.js';
import { gasPair } from '../../src/science/gases/second-virial.js';

/**
 * The plain contender: helium in humid air with the same polynomials and the same constants as the
 * project's own function, written out for this one mixture, with no checks, no cache, no data lookup
 * and nothing returned but the numbers themselves.
 *
 * @returns a function from temperature [K], pressure [Pa], humidity [1] and share of helium [1] to
 *   the speed of sound [m/s]; density and density against dry air are left in `also`
 */
export function plainMixture(library: GasLibrary) {
  const ids = ['N2', 'O2', 'Ar', 'CO2', 'H2O', 'He'];
  const gases = ids.map((id) => knownGas(library, id, ''));
  const count = gases.length;
  const flat = (rows: readonly (readonly number[])[]) => Float64Array.from(rows.flat());
  const masses = Float64Array.from(gases, (gas) => gas.molarMass.molarMassKgPerMol);
  const cpRows = flat(gases.map((gas) => gas.heatCapacity.coefficients));
  const pureRows = flat(gases.map((gas) => gas.secondVirial.coefficientsM3PerMol));
  // Per pair: volume, temperature, two quantum terms, coefficients of powers 0, 1, 2, 3 and 8.
  const pairRows = flat(
    gases.flatMap((one, i) =>
      gases.slice(i + 1).map((other) => {
        const pair = gasPair(library, one, other);
        const { c0, c1, c2, c3, c8 } = pair;
        const { volumeM3PerMol, temperatureK, quantumTemperatureK, quantumPressureK } = pair;
        const head = [volumeM3PerMol, temperatureK, quantumTemperatureK, quantumPressureK];
        return [...head, c0, c1, c2, c3, c8];
      }),
    ),
  );
  const airShares = Float64Array.from(
    ids,
    (id) => library.dryAir.composition.moleFractions[id] ?? 0,
  );
  const airMass = airShares.reduce((sum, x, i) => sum + x * (masses[i] ?? 0), 0);
  const g = Float64Array.from(library.humidAir.saturationPressureWater.coefficients);
  const { alpha, betaPerPa, gammaPerC2 } = library.humidAir.enhancementFactor;
  const R = library.gasConstant.jPerMolK;
  const x = new Float64Array(count);
  const also = { densityKgPerM3: 0, densityRelativeToAir: 0, oxygenFraction: 0 };
  const c = (row: Float64Array, at: number): number => row[at] ?? 0;

  function speed(T: number, p: number, humidity: number, share: number): number {
    const T2 = T * T;
    const vapour = Math.exp(
      c(g, 0) / T2 +
        c(g, 1) / T +
        c(g, 2) +
        c(g, 3) * T +
        c(g, 4) * T2 +
        c(g, 5) * T2 * T +
        c(g, 6) * T2 * T2 +
        c(g, 7) * Math.log(T),
    );
    const t = T - 273.15;
    const water = (humidity * (alpha + betaPerPa * p + gammaPerC2 * t * t) * vapour) / p;
    const air = 1 - share;
    for (let i = 0; i < count; i += 1) x[i] = air * (1 - water) * c(airShares, i);
    x[4] = air * water;
    x[5] = share;
    let M = 0;
    let cp = 0;
    let B = 0;
    let TB1 = 0;
    let T2B2 = 0;
    let airB = 0;
    const th = 300 / T;
    let at = 0;
    for (let i = 0; i < count; i += 1) {
      const xi = c(x, i);
      const yi = c(airShares, i);
      const a = 7 * i;
      M += xi * c(masses, i);
      cp +=
        (xi *
          (c(cpRows, a) +
            T *
              (c(cpRows, a + 1) +
                T *
                  (c(cpRows, a + 2) +
                    T *
                      (c(cpRows, a + 3) +
                        T *
                          (c(cpRows, a + 4) + T * (c(cpRows, a + 5) + T * c(cpRows, a + 6)))))))) /
        T2;
      const k = 5 * i;
      const b1 = c(pureRows, k + 1) * th;
      const b2 = c(pureRows, k + 2) * th * th;
      const b3 = c(pureRows, k + 3) * th * th * th;
      const b4 = c(pureRows, k + 4) * th * th * th * th;
      const b = c(pureRows, k) + b1 + b2 + b3 + b4;
      B += xi * xi * b;
      TB1 -= xi * xi * (b1 + 2 * b2 + 3 * b3 + 4 * b4);
      T2B2 += xi * xi * (2 * b1 + 6 * b2 + 12 * b3 + 20 * b4);
      airB += yi * yi * b;
      for (let j = i + 1; j < count; j += 1) {
        const K0 = c(pairRows, at);
        const shifted = T + c(pairRows, at + 2);
        const y = c(pairRows, at + 1) / shifted;
        const y2 = y * y;
        const y4 = y2 * y2;
        const t1 = c(pairRows, at + 5) * y;
        const t2 = c(pairRows, at + 6) * y2;
        const t3 = c(pairRows, at + 7) * y2 * y;
        const t8 = c(pairRows, at + 8) * y4 * y4;
        const f = c(pairRows, at + 4) + t1 + t2 + t3 + t8;
        const G = -(t1 + 2 * t2 + 3 * t3 + 8 * t8);
        const H = 2 * t1 + 6 * t2 + 12 * t3 + 72 * t8;
        const pressureTerm = c(pairRows, at + 3);
        const K = (K0 * (T + pressureTerm)) / shifted;
        const K1 = (K0 * (c(pairRows, at + 2) - pressureTerm)) / (shifted * shifted);
        const K2 = (-2 * K1) / shifted;
        const ratio = T / shifted;
        const weight = 2 * xi * c(x, j);
        const cross = K * f;
        B += weight * cross;
        TB1 += weight * (T * K1 * f + K * G * ratio);
        T2B2 += weight * (T2 * K2 * f + 2 * T * K1 * G * ratio + K * H * ratio * ratio);
        airB += 2 * yi * c(airShares, j) * cross;
        at += 9;
      }
    }
    const RT = R * T;
    const ideal = p / RT;
    const rho = (2 * ideal) / (1 + Math.sqrt(1 + 4 * B * ideal));
    const airRho = (2 * ideal) / (1 + Math.sqrt(1 + 4 * airB * ideal));
    also.densityKgPerM3 = rho * M;
    also.densityRelativeToAir = (rho * M) / (airRho * airMass);
    also.oxygenFraction = c(x, 1) / (1 - c(x, 4));
    const slope = 1 + (B + TB1) * rho;
    const cv = cp - 1 - rho * (2 * TB1 + T2B2);
    return Math.sqrt((RT / M) * (1 + 2 * B * rho + (slope * slope) / cv));
  }
  return { speed, also };
}
