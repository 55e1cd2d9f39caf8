import { InvalidInput } from '../../errors.js';
import { inRange } from '../range.js';
import type { Composition, GasLibrary, GasSpecies } from './gas-library.js';
import { idealHeatCapacity } from './heat-capacity.js';
import { compositionSumTolerance, moleFractionRange } from './ranges.js';
import { writeCrossVirial, gasPair, writePureVirial, type GasPair } from './second-virial.js';

/*
 * The work space of one library: constants by species and pair, and the terms of the last temperature
 * asked for. It exists for speed only; what is returned depends on the arguments alone, because every
 * temperature-dependent term is kept beside its own temperature, and nothing in here is handed out.
 */
interface Workspace {
  readonly gases: readonly GasSpecies[];
  readonly indexOf: ReadonlyMap<string, number>;
  /** Pair of species i and j at i times the stride plus j, i below j. */
  readonly pairs: readonly (GasPair | undefined)[];
  readonly stride: number;
  readonly molarMasses: Float64Array;
  readonly fractions: Float64Array;
  /** Species of the mixture at hand, ascending. */
  readonly present: Int32Array;
  /** Temperature, cp/R, B, T B', T^2 B'' by species. */
  readonly pureTerms: Float64Array;
  /** Temperature, B, T B', T^2 B'' by pair. */
  readonly crossTerms: Float64Array;
  readonly airIndices: Int32Array;
  readonly airFractions: Float64Array;
  readonly airMolarMass: number;
  /** Temperature and B of dry air. */
  readonly airTerms: Float64Array;
  readonly oxygen: number;
  readonly water: number;
}

/** Sums over a mixture at one temperature; cp and B need no pressure. */
export interface MixtureTerms {
  readonly molarMassKgPerMol: number;
  /** Ideal cp/R [1]. */
  readonly heatCapacity: number;
  readonly b: number;
  readonly tb1: number;
  readonly t2b2: number;
  readonly oxygenFraction: number;
  readonly waterFraction: number;
}

const pureWidth = 5;
const crossWidth = 4;
const workspaces = new WeakMap<GasLibrary, Workspace>();

/** The species with coefficients of its own: reading a frozen list of numbers takes twice the time. */
function thawed(gas: GasSpecies): GasSpecies {
  const { heatCapacity, secondVirial } = gas;
  return {
    ...gas,
    heatCapacity: { ...heatCapacity, coefficients: [...heatCapacity.coefficients] },
    secondVirial: {
      ...secondVirial,
      coefficientsM3PerMol: [...secondVirial.coefficientsM3PerMol],
    },
  };
}

function freshWorkspace(library: GasLibrary): Workspace {
  const gases = Object.values(library.species).map(thawed);
  const count = gases.length;
  const indexOf = new Map(gases.map(({ id }, index) => [id, index]));
  const placeOf = (id: string): number => {
    const index = indexOf.get(id);
    if (index !== undefined) return index;
    throw new InvalidInput(`The gas data lack ${id}.`, 'Restore its species file.', [
      { path: `/species/${id}`, problem: 'is missing' },
    ]);
  };
  // Ascending, as the pairs are.
  const air = Object.entries(library.dryAir.composition.moleFractions)
    .map(([id, fraction]) => ({ index: placeOf(id), fraction }))
    .sort((one, other) => one.index - other.index);
  return {
    gases,
    indexOf,
    pairs: gases.flatMap((one, i) =>
      gases.map((other, j) => (i < j ? gasPair(library, one, other) : undefined)),
    ),
    stride: count,
    molarMasses: Float64Array.from(gases, (gas) => gas.molarMass.molarMassKgPerMol),
    fractions: new Float64Array(count),
    present: new Int32Array(count),
    pureTerms: new Float64Array(pureWidth * count),
    crossTerms: new Float64Array(crossWidth * count * count),
    airIndices: Int32Array.from(air, ({ index }) => index),
    airFractions: Float64Array.from(air, ({ fraction }) => fraction),
    airMolarMass: air.reduce(
      (sum, { index, fraction }) =>
        sum + fraction * (gases[index]?.molarMass.molarMassKgPerMol ?? 0),
      0,
    ),
    airTerms: new Float64Array(2),
    oxygen: placeOf('O2'),
    water: placeOf('H2O'),
  };
}

function workspaceOf(library: GasLibrary): Workspace {
  const known = workspaces.get(library);
  if (known) return known;
  const fresh = freshWorkspace(library);
  workspaces.set(library, fresh);
  return fresh;
}

function refuseUnknownGas(library: GasLibrary, id: string): never {
  throw new InvalidInput(
    `There is no gas "${id}".`,
    `Use one of ${Object.keys(library.species).join(', ')}, or air.`,
    [{ path: `/composition/${id}`, problem: 'is not a known gas' }],
  );
}

/** Sets the fractions by species from a composition whose air share holds the given part of water. */
function setFractions(
  library: GasLibrary,
  workspace: Workspace,
  composition: Composition,
  waterOfAir: number,
): void {
  const { fractions, indexOf, airIndices, airFractions, water } = workspace;
  for (let index = 0; index < fractions.length; index += 1) fractions[index] = 0;
  let sum = 0;
  for (const id in composition) {
    const fraction = composition[id] ?? Number.NaN;
    if (!(fraction >= 0 && fraction <= 1)) {
      inRange(fraction, moleFractionRange, `/composition/${id}`);
    }
    sum += fraction;
    if (id === 'air') {
      const dry = fraction * (1 - waterOfAir);
      for (let part = 0; part < airIndices.length; part += 1) {
        const index = airIndices[part] ?? 0;
        fractions[index] = (fractions[index] ?? 0) + dry * (airFractions[part] ?? 0);
      }
      fractions[water] = (fractions[water] ?? 0) + fraction * waterOfAir;
    } else {
      const index = indexOf.get(id);
      if (index === undefined) refuseUnknownGas(library, id);
      else fractions[index] = (fractions[index] ?? 0) + fraction;
    }
  }
  if (Math.abs(sum - 1) > compositionSumTolerance) {
    throw new InvalidInput(
      `The mole fractions sum to ${String(sum)}, not to 1.`,
      'Give mole fractions that sum to 1; name the rest air if it is room air.',
      [{ path: '/composition', problem: `sums to ${String(sum)}` }],
    );
  }
  if (sum === 1) return;
  for (let index = 0; index < fractions.length; index += 1) {
    fractions[index] = (fractions[index] ?? 0) / sum;
  }
}

function setPureTerms({ gases, pureTerms }: Workspace, index: number, T: number): void {
  const gas = gases[index];
  if (gas === undefined) return;
  const at = index * pureWidth;
  pureTerms[at] = T;
  pureTerms[at + 1] = idealHeatCapacity(gas, T);
  writePureVirial(gas, T, pureTerms, at + 2);
}

function setCrossTerms({ pairs, crossTerms }: Workspace, index: number, T: number): void {
  const pair = pairs[index];
  if (pair === undefined) return;
  const at = index * crossWidth;
  crossTerms[at] = T;
  writeCrossVirial(pair, T, crossTerms, at + 1);
}

/**
 * Sums over the components of a gas mixture at one temperature [kg/mol, 1, m^3/mol].
 *
 *   M = sum x_i M_i;  cp/R = sum x_i cp_i/R;  B = sum_i sum_j x_i x_j B_ij
 *
 * @param library  gas data [data]
 * @param composition  mole fractions by gas id or `air` [1], sum 1 within 1e-6
 * @param T  temperature [K], 240 to 330
 * @param waterOfAir  mole fraction of water in the air share [1]
 * @returns  molar mass [kg/mol], cp/R [1], B, T B' and T^2 B'' [m^3/mol], fractions [1]
 * @throws {InvalidInput} for an unknown gas, or fractions that do not sum to one
 * Source: prausnitz-mixing-rules. Assumes: ideal mixing of heat capacity.
 * Accuracy: that of the pure and cross coefficients.
 */
export function mixtureTerms(
  library: GasLibrary,
  composition: Composition,
  T: number,
  waterOfAir: number,
): MixtureTerms {
  const workspace = workspaceOf(library);
  setFractions(library, workspace, composition, waterOfAir);
  const { fractions, present, molarMasses, pureTerms, crossTerms } = workspace;
  const count = fractions.length;
  let presentCount = 0;
  let molarMassKgPerMol = 0;
  let heatCapacity = 0;
  let b = 0;
  let tb1 = 0;
  let t2b2 = 0;
  for (let i = 0; i < count; i += 1) {
    const x = fractions[i] ?? 0;
    if (x === 0) continue;
    const at = i * pureWidth;
    if (pureTerms[at] !== T) setPureTerms(workspace, i, T);
    molarMassKgPerMol += x * (molarMasses[i] ?? 0);
    heatCapacity += x * (pureTerms[at + 1] ?? 0);
    b += x * x * (pureTerms[at + 2] ?? 0);
    tb1 += x * x * (pureTerms[at + 3] ?? 0);
    t2b2 += x * x * (pureTerms[at + 4] ?? 0);
    // The pairs with the species met before.
    for (let k = 0; k < presentCount; k += 1) {
      const j = present[k] ?? 0;
      const pair = j * count + i;
      const crossAt = pair * crossWidth;
      if (crossTerms[crossAt] !== T) setCrossTerms(workspace, pair, T);
      const weight = 2 * x * (fractions[j] ?? 0);
      b += weight * (crossTerms[crossAt + 1] ?? 0);
      tb1 += weight * (crossTerms[crossAt + 2] ?? 0);
      t2b2 += weight * (crossTerms[crossAt + 3] ?? 0);
    }
    present[presentCount] = i;
    presentCount += 1;
  }
  return {
    molarMassKgPerMol,
    heatCapacity,
    b,
    tb1,
    t2b2,
    oxygenFraction: fractions[workspace.oxygen] ?? 0,
    waterFraction: fractions[workspace.water] ?? 0,
  };
}

/**
 * Second virial coefficient of dry air [m^3/mol].
 *
 *   B = sum_i sum_j x_i x_j B_ij over nitrogen, oxygen, argon and carbon dioxide
 *
 * @param library  gas data [data]
 * @param T  temperature [K], 240 to 330
 * @returns  B [m^3/mol]
 * Source: prausnitz-mixing-rules. Assumes: dry air of four components.
 * Accuracy: that of the pure and cross coefficients.
 * @example 1e6 * dryAirVirial(library, 300) // -7.2
 */
export function dryAirVirial(library: GasLibrary, T: number): number {
  const workspace = workspaceOf(library);
  const { airIndices, airFractions, airTerms, pureTerms, crossTerms, stride } = workspace;
  if (airTerms[0] === T) return airTerms[1] ?? 0;
  let b = 0;
  for (let one = 0; one < airIndices.length; one += 1) {
    const i = airIndices[one] ?? 0;
    const x = airFractions[one] ?? 0;
    if (pureTerms[i * pureWidth] !== T) setPureTerms(workspace, i, T);
    b += x * x * (pureTerms[i * pureWidth + 2] ?? 0);
    for (let other = 0; other < one; other += 1) {
      const pair = (airIndices[other] ?? 0) * stride + i;
      if (crossTerms[pair * crossWidth] !== T) setCrossTerms(workspace, pair, T);
      b += 2 * x * (airFractions[other] ?? 0) * (crossTerms[pair * crossWidth + 1] ?? 0);
    }
  }
  airTerms[0] = T;
  airTerms[1] = b;
  return b;
}

/**
 * Molar mass of dry air as every mixture here counts it [kg/mol].
 *
 *   M = sum of x_i M_i over nitrogen, oxygen, argon and carbon dioxide
 *
 * @param library  gas data [data]
 * @returns  molar mass [kg/mol]
 * Source: iupac-atomic-weights. Assumes: dry air of four components. Accuracy: 1e-5 of itself.
 * @example dryAirMolarMass(library) // 0.0289657
 */
export function dryAirMolarMass(library: GasLibrary): number {
  return workspaceOf(library).airMolarMass;
}

/**
 * Mole fractions of every species present in a mixture, air taken apart [1].
 *
 * @param library  gas data [data]
 * @param composition  mole fractions by gas id or `air` [1], sum 1 within 1e-6
 * @param waterOfAir  mole fraction of water in the air share [1]
 * @returns  mole fractions by species id [1]
 * @throws {InvalidInput} for an unknown gas, or fractions that do not sum to one
 * Source: cipm-2007. Assumes: dry air of four components. Accuracy: exact.
 * @example speciesFractions(library, { He: 0.5, air: 0.5 }, 0).O2 // 0.104698
 */
export function speciesFractions(
  library: GasLibrary,
  composition: Composition,
  waterOfAir: number,
): Composition {
  const workspace = workspaceOf(library);
  setFractions(library, workspace, composition, waterOfAir);
  return Object.fromEntries(
    workspace.gases.flatMap(({ id }, index) => {
      const fraction = workspace.fractions[index] ?? 0;
      return fraction > 0 ? [[id, fraction]] : [];
    }),
  );
}
