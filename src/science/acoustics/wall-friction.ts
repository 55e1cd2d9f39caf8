import type { Composition, GasLibrary, ViscosityPoint } from '../gases/gas-library.js';
import { mixtureState, type MixtureInput } from '../gases/mixture-state.js';
import { molarMassKgPerMol } from '../gases/molar-mass.js';

/**
 * Factor by which friction and heat loss at the wall slow sound in a tube [1].
 *
 *   1 - (1/a) sqrt(nu/(4 pi f)) (1 + (gamma - 1)/sqrt(Pr))
 *
 * @param a  inner radius [m]
 * @param f  frequency [Hz]
 * @param nu  kinematic viscosity [m^2/s]
 * @param gamma  ratio of heat capacities [1]
 * @param Pr  Prandtl number [1]
 * @returns  speed in the tube over free speed [1]
 * Source: kirchhoff-1868. Assumes: boundary layer thin against the radius.
 * Accuracy: second order in the boundary layer; good while the factor stays above 0.9.
 * @example wallFactor(0.01, 780, 1.18e-4, 1.6667, 0.664) // 0.980051
 */
export function wallFactor(a: number, f: number, nu: number, gamma: number, Pr: number): number {
  return 1 - (Math.sqrt(nu / (4 * Math.PI * f)) * (1 + (gamma - 1) / Math.sqrt(Pr))) / a;
}

/** Growth of dynamic viscosity with temperature, as a power (from memory). */
const viscosityExponent = 0.7;

interface Carrier {
  readonly fraction: number;
  readonly molarMass: number;
  readonly dynamicViscosity: number;
  readonly prandtlNumber: number;
}

function carrierOf(library: GasLibrary, id: string, fraction: number, T: number): Carrier {
  const own: ViscosityPoint | undefined =
    id === 'air' ? library.dryAir.viscosity : library.species[id]?.viscosity;
  // A gas without a row is taken as viscous as air: within a factor two, so a quarter of the effect.
  const row = own ?? library.dryAir.viscosity;
  const measured: Composition = own === undefined ? { air: 1 } : { [id]: 1 };
  const { densityKgPerM3 } = mixtureState(library, {
    composition: measured,
    temperatureK: row.temperatureK,
    pressurePa: row.pressurePa,
  });
  return {
    fraction,
    molarMass: molarMassKgPerMol(library, { [id]: 1 }),
    dynamicViscosity:
      row.kinematicViscosityM2PerS * densityKgPerM3 * (T / row.temperatureK) ** viscosityExponent,
    prandtlNumber: row.prandtlNumber,
  };
}

function mixtureViscosity(carriers: readonly Carrier[]): number {
  let sum = 0;
  for (const one of carriers) {
    let weight = 0;
    for (const other of carriers) {
      const massRatio = other.molarMass / one.molarMass;
      const viscosityRatio = one.dynamicViscosity / other.dynamicViscosity;
      const phi =
        (1 + Math.sqrt(viscosityRatio) * massRatio ** 0.25) ** 2 /
        Math.sqrt(8 * (1 + 1 / massRatio));
      weight += other.fraction * phi;
    }
    sum += (one.fraction * one.dynamicViscosity) / weight;
  }
  return sum;
}

/**
 * Wall factor of a tube filled with a gas mixture [1].
 *
 *   as `wallFactor`, with the viscosity of the mixture by Wilke's rule
 *
 * @param library  gas data [data]
 * @param gas  composition [1], temperature [K], absolute pressure [Pa], relative humidity [1]
 * @param a  inner radius [m]
 * @param f  frequency [Hz]
 * @returns  speed in the tube over free speed [1]
 * @throws {OutOfRange} outside the ranges of the room model
 * Source: wilke-1950. Assumes: Prandtl numbers average by amount; gases without a viscosity row
 * are taken as viscous as air.
 * Accuracy: a tenth of the effect for air, He, Ar, CO2 and SF6, a quarter for others.
 */
export function wallFactorOfGas(
  library: GasLibrary,
  gas: MixtureInput,
  a: number,
  f: number,
): number {
  const { heatCapacityRatio, densityKgPerM3 } = mixtureState(library, gas);
  const carriers = Object.entries(gas.composition)
    .filter(([, fraction]) => fraction > 0)
    .map(([id, fraction]) => carrierOf(library, id, fraction, gas.temperatureK));
  const nu = mixtureViscosity(carriers) / densityKgPerM3;
  const Pr = carriers.reduce(
    (sum, { fraction, prandtlNumber }) => sum + fraction * prandtlNumber,
    0,
  );
  return wallFactor(a, f, nu, heatCapacityRatio, Pr);
}
