import { InvalidInput, NotComputable } from '../../errors.js';
import { inRange } from '../range.js';
import type { DensitySeries, GasId, GasLibrary, SecondVirialFit } from './gas-library.js';

export interface ContainerState {
  readonly amountDensityMolPerM3: number;
  readonly compressibilityFactor: number;
}

interface SeriesModel {
  readonly name: string;
  readonly series: DensitySeries;
  readonly virial: SecondVirialFit;
}

/** Density of the series' own variable u = 1 [mol/m^3]. */
const seriesDensity = 1e4;

function modelOf(library: GasLibrary, gas: GasId): SeriesModel {
  if (gas === 'air') {
    const { name, densitySeries, secondVirial } = library.dryAir;
    return { name, series: densitySeries, virial: secondVirial };
  }
  const species = library.species[gas];
  if (species?.densitySeries === undefined) {
    throw new InvalidInput(
      species ? `${species.name} is not kept in gas containers.` : `There is no gas "${gas}".`,
      'Use a gas that is supplied in cylinders, or air.',
      [{ path: '/gas', problem: 'has no density series' }],
    );
  }
  return { name: species.name, series: species.densitySeries, virial: species.secondVirial };
}

/** Sum of b_k th^k. */
function polynomial(coefficients: readonly number[], th: number): number {
  let sum = 0;
  let power = 1;
  for (const coefficient of coefficients) {
    sum += coefficient * power;
    power *= th;
  }
  return sum;
}

/**
 * Amount density and compressibility factor of one gas in a closed container [mol/m^3, 1].
 *
 *   Z(T, rho) = 1 + B(T) rho + C2 u^2 + C3 u^3 + ..., u = rho/(1e4 mol/m3)
 *   rho R T Z = p, solved by Newton's method from the ideal gas, steps damped to 30 %
 *
 * @param library  gas data [data]
 * @param gas  a gas id, or `air` [id]
 * @param T  temperature of the gas [K], 253.15 to 323.15 (318.15 for liquefied gases)
 * @param p  absolute pressure [Pa], up to the limit of the gas: 3e7 for compressed gases
 * @returns  amount density [mol/m^3] and Z [1]
 * @throws {OutOfRange} outside the ranges above
 * @throws {InvalidInput} for a gas that is not kept in containers
 * Source: density-series. Assumes: one phase, gas.
 * Accuracy: 0.03 % of the reference equation (xenon 0.1 %), whose own error is 0.02 to 0.1 %.
 * @example containerState(library, 'He', 300, 2e7).compressibilityFactor // 1.09279
 */
export function containerState(
  library: GasLibrary,
  gas: GasId,
  T: number,
  p: number,
): ContainerState {
  const { name, series, virial } = modelOf(library, gas);
  const { temperatureMinK, temperatureMaxK, pressureMaxPa } = series;
  inRange(
    T,
    {
      min: temperatureMinK,
      max: temperatureMaxK,
      unit: 'K',
      name: `temperature of ${name} in a container`,
    },
    '/temperatureK',
  );
  inRange(
    p,
    { min: 1, max: pressureMaxPa, unit: 'Pa', name: `absolute pressure of ${name} as a gas` },
    '/pressurePa',
  );
  const th = 300 / T;
  const RT = library.gasConstant.jPerMolK * T;
  const terms = [
    polynomial(virial.coefficientsM3PerMol, th) * seriesDensity,
    ...series.coefficients.map((row) => polynomial(row, th)),
  ];
  let rho = p / RT;
  for (let step = 0; step < 60; step += 1) {
    const u = rho / seriesDensity;
    let Z = 1;
    let slope = 1;
    let power = 1;
    let order = 1;
    for (const term of terms) {
      power *= u;
      order += 1;
      Z += term * power;
      slope += order * term * power;
    }
    const change = (p / RT - rho * Z) / slope;
    const limit = 0.3 * rho;
    rho += Math.min(limit, Math.max(-limit, change));
    if (Math.abs(change) <= 1e-13 * rho) {
      return { amountDensityMolPerM3: rho, compressibilityFactor: p / (rho * RT) };
    }
  }
  throw new NotComputable(
    `The density of ${name} at this pressure was not found.`,
    'Give the mass instead, or a lower pressure.',
    [{ path: '/pressurePa', problem: 'no gas density fits' }],
  );
}
