import { InvalidInput } from '../../errors.js';
import { inRange } from '../range.js';
import type { Composition, GasLibrary, GasSpecies } from './gas-library.js';
import { idealHeatCapacity } from './heat-capacity.js';
import { compositionSumTolerance, moleFractionRange } from './ranges.js';
import {
  crossVirial,
  gasPair,
  pureVirial,
  type GasPair,
  type VirialTerms,
} from './second-virial.js';

/*
 * The work space of one library: a slot per species, with the constants of its pairs and the terms
 * of the last temperature asked for. It exists for speed only; what is returned depends on the
 * arguments alone, because every temperature-dependent term is checked against its own temperature.
 */
interface Cross {
  readonly other: Slot;
  readonly pair: GasPair;
  temperatureK: number;
  terms: VirialTerms;
}

interface Slot {
  readonly gas: GasSpecies;
  readonly molarMassKgPerMol: number;
  readonly isOxygen: boolean;
  readonly crosses: Cross[];
  fraction: number;
  temperatureK: number;
  heatCapacity: number;
  terms: VirialTerms;
}

interface Workspace {
  readonly slots: readonly Slot[];
  readonly byId: ReadonlyMap<string, Slot>;
  readonly air: readonly { readonly slot: Slot; readonly fraction: number }[];
  readonly water: Slot;
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

const noTerms: VirialTerms = { b: 0, tb1: 0, t2b2: 0 };
const workspaces = new WeakMap<GasLibrary, Workspace>();

function workspaceOf(library: GasLibrary): Workspace {
  const known = workspaces.get(library);
  if (known) return known;
  const slots: Slot[] = Object.values(library.species).map((gas) => ({
    gas,
    molarMassKgPerMol: gas.molarMass.molarMassKgPerMol,
    isOxygen: gas.id === 'O2',
    crosses: [],
    fraction: 0,
    temperatureK: 0,
    heatCapacity: 0,
    terms: noTerms,
  }));
  slots.forEach((slot, index) => {
    for (const other of slots.slice(index + 1)) {
      const pair = gasPair(library, slot.gas, other.gas);
      slot.crosses.push({ other, pair, temperatureK: 0, terms: noTerms });
    }
  });
  const byId = new Map(slots.map((slot) => [slot.gas.id, slot]));
  const slotOf = (id: string): Slot => {
    const slot = byId.get(id);
    if (slot) return slot;
    throw new InvalidInput(`The gas data lack ${id}.`, 'Restore its species file.', [
      { path: `/species/${id}`, problem: 'is missing' },
    ]);
  };
  const fresh: Workspace = {
    slots,
    byId,
    air: Object.entries(library.dryAir.composition.moleFractions).map(([id, fraction]) => ({
      slot: slotOf(id),
      fraction,
    })),
    water: slotOf('H2O'),
  };
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

/** Fills the slots from a checked composition whose air share holds the given part of water. */
function fillSlots(
  library: GasLibrary,
  workspace: Workspace,
  composition: Composition,
  waterOfAir: number,
): void {
  for (const slot of workspace.slots) slot.fraction = 0;
  let sum = 0;
  for (const id in composition) {
    const fraction = composition[id] ?? Number.NaN;
    if (!(fraction >= 0 && fraction <= 1)) {
      inRange(fraction, moleFractionRange, `/composition/${id}`);
    }
    sum += fraction;
  }
  if (Math.abs(sum - 1) > compositionSumTolerance) {
    throw new InvalidInput(
      `The mole fractions sum to ${String(sum)}, not to 1.`,
      'Give mole fractions that sum to 1; name the rest air if it is room air.',
      [{ path: '/composition', problem: `sums to ${String(sum)}` }],
    );
  }
  for (const id in composition) {
    const fraction = (composition[id] ?? 0) / sum;
    if (id === 'air') {
      const dry = fraction * (1 - waterOfAir);
      for (const part of workspace.air) part.slot.fraction += dry * part.fraction;
      workspace.water.fraction += fraction * waterOfAir;
    } else {
      const slot = workspace.byId.get(id);
      if (slot === undefined) refuseUnknownGas(library, id);
      else slot.fraction += fraction;
    }
  }
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
  fillSlots(library, workspace, composition, waterOfAir);
  let molarMassKgPerMol = 0;
  let heatCapacity = 0;
  let b = 0;
  let tb1 = 0;
  let t2b2 = 0;
  let oxygenFraction = 0;
  for (const slot of workspace.slots) {
    const x = slot.fraction;
    if (x === 0) continue;
    if (slot.temperatureK !== T) {
      slot.heatCapacity = idealHeatCapacity(slot.gas, T);
      slot.terms = pureVirial(slot.gas, T);
      slot.temperatureK = T;
    }
    molarMassKgPerMol += x * slot.molarMassKgPerMol;
    heatCapacity += x * slot.heatCapacity;
    if (slot.isOxygen) oxygenFraction = x;
    b += x * x * slot.terms.b;
    tb1 += x * x * slot.terms.tb1;
    t2b2 += x * x * slot.terms.t2b2;
    for (const cross of slot.crosses) {
      const y = cross.other.fraction;
      if (y === 0) continue;
      if (cross.temperatureK !== T) {
        cross.terms = crossVirial(cross.pair, T);
        cross.temperatureK = T;
      }
      const weight = 2 * x * y;
      b += weight * cross.terms.b;
      tb1 += weight * cross.terms.tb1;
      t2b2 += weight * cross.terms.t2b2;
    }
  }
  return {
    molarMassKgPerMol,
    heatCapacity,
    b,
    tb1,
    t2b2,
    oxygenFraction,
    waterFraction: workspace.water.fraction,
  };
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
  fillSlots(library, workspace, composition, waterOfAir);
  const present = workspace.slots.filter(({ fraction }) => fraction > 0);
  return Object.fromEntries(present.map(({ gas, fraction }) => [gas.id, fraction]));
}
