import type { GasLibrary } from '../science/gases/gas-library.js';
import type { PhysicalFigure, PlanFile, PlanRelease, PlanStock } from './plan-file.js';

type Item = PlanRelease | PlanStock;

/** Volume of a mole of ideal gas at 20 degrees C and 101.325 kPa [m3/mol]. */
export const referenceMolarVolumeM3 = 0.0240551;
const referenceK = 293.15;
const referencePa = 101_325;

/** Amount of ideal gas in a volume [mol]. */
const idealMol = (volumeM3: number, temperatureK = referenceK, pressurePa = referencePa): number =>
  ((volumeM3 / referenceMolarVolumeM3) * (pressurePa / referencePa) * referenceK) / temperatureK;

/** The most that a figure of the plan may mean, where it says anything. */
export const highestOf = (figure: PhysicalFigure | undefined): number | undefined =>
  typeof figure === 'number' ? figure : (figure?.high ?? figure?.value);

/** A figure of the plan times a factor, with its range and its origin. */
function timesFigure(figure: PhysicalFigure, factor: number): PhysicalFigure {
  if (typeof figure === 'number') return figure * factor;
  const { value, low, high } = figure;
  return {
    ...figure,
    ...(value === undefined ? {} : { value: value * factor }),
    ...(low === undefined ? {} : { low: low * factor }),
    ...(high === undefined ? {} : { high: high * factor }),
  };
}

const amountKeys = ['amountMol', 'massKg', 'volumeM3', 'waterVolumeM3'] as const;

/** A release or a container with its content times a factor. */
export function withContentTimes<T extends Item>(item: T, factor: number): T {
  const amounts: Partial<Record<(typeof amountKeys)[number], PhysicalFigure>> = item;
  const changed = amountKeys.flatMap((key) => {
    const figure = amounts[key];
    return figure === undefined ? [] : [[key, timesFigure(figure, factor)] as const];
  });
  return { ...item, ...Object.fromEntries(changed) };
}

/** Mean molar mass of what an item holds [kg/mol]; undefined where its gas is not known. */
export function molarMassOf(item: Item, gases: GasLibrary): number | undefined {
  const shares = item.composition ?? (item.gas === undefined ? {} : { [item.gas]: 1 });
  const parts = Object.entries(shares).map(([gas, share]) => {
    const mass = gases.species[gas]?.molarMass.molarMassKgPerMol;
    return mass === undefined ? undefined : mass * share;
  });
  if (parts.length === 0) return undefined;
  return parts.reduce<number | undefined>(
    (sum, part) => (sum === undefined || part === undefined ? undefined : sum + part),
    0,
  );
}

/** The most that a release or a container may hold [mol], as an ideal gas; undefined if not stated. */
export function contentMol(item: Item, plan: PlanFile, gases: GasLibrary): number | undefined {
  const amount = highestOf(item.amountMol);
  if (amount !== undefined) return amount;
  const mass = highestOf(item.massKg);
  const molar = molarMassOf(item, gases);
  if (mass !== undefined) return molar === undefined ? undefined : mass / molar;
  if ('volumeM3' in item) {
    const { temperatureK, pressurePa } = plan.venue.site;
    const volume = highestOf(item.volumeM3);
    return volume === undefined
      ? undefined
      : idealMol(volume, highestOf(temperatureK), highestOf(pressurePa));
  }
  if ('waterVolumeM3' in item) {
    const water = highestOf(item.waterVolumeM3);
    const pressure = highestOf(item.pressurePa);
    return water === undefined || pressure === undefined
      ? undefined
      : idealMol(water, highestOf(item.temperatureK) ?? 288.15, pressure);
  }
  return undefined;
}

/** An item that holds no more than a cap [mol]; as it is where its content is not stated. */
export function cappedTo<T extends Item>(
  item: T,
  capMol: number,
  plan: PlanFile,
  gases: GasLibrary,
): T {
  const content = contentMol(item, plan, gases);
  return content === undefined || content <= capMol
    ? item
    : withContentTimes(item, capMol / content);
}
