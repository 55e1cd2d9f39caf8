import { InvalidInput } from '../../errors.js';
import { inRange } from '../range.js';
import type { GasSpecies } from './gas-library.js';

/**
 * Vapour pressure of a liquefied gas [Pa].
 *
 *   ln(p/pc) = (Tc/T)(n1 th + n2 th^1.5 + n3 th^2.5 + n4 th^5),  th = 1 - T/Tc
 *
 * @param gas  a species that is supplied as a liquid [data]
 * @param T  temperature [K], the span of its fit, at most a few kelvin below the critical point
 * @returns  vapour pressure [Pa]
 * @throws {OutOfRange} outside the span of the fit
 * @throws {InvalidInput} for a gas that is never liquid at room temperature
 * Source: vapour-pressure-fits. Assumes: pure gas. Accuracy: 0.1 % or better, per species file.
 * @example vapourPressure(library.species.CO2, 293.15) // 5.729e6
 */
export function vapourPressure(gas: GasSpecies, T: number): number {
  const fit = gas.vapourPressure;
  if (fit === undefined) {
    throw new InvalidInput(
      `${gas.name} has no vapour pressure at room temperature.`,
      'Ask for the content by pressure instead: it stays a gas in its cylinder.',
      [{ path: '/gas', problem: 'is above its critical temperature' }],
    );
  }
  const { temperatureMinK: min, temperatureMaxK: max, coefficients } = fit;
  inRange(T, { min, max, unit: 'K', name: `temperature of liquid ${gas.name}` }, '/temperatureK');
  const { temperatureK: Tc, pressurePa: pc } = gas.critical;
  const th = 1 - T / Tc;
  const exponents = [1, 1.5, 2.5, 5];
  const sum = coefficients.reduce(
    (total, n, index) => total + n * th ** (exponents[index] ?? 0),
    0,
  );
  return pc * Math.exp((Tc / T) * sum);
}
