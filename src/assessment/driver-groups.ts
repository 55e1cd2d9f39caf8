import type { Assessment, DriverResult } from './assessment.js';

/** The uncertain inputs that move one quantity where one group breathes, the strongest first. */
export interface DriverGroup {
  readonly zoneTitle: string;
  readonly quantityTitle: string;
  readonly drivers: readonly DriverResult[];
}

/** More than these move little. */
const most = 3;

/** The inputs that drive the quantities which are judged, by zone and quantity. */
export function driverGroups({
  drivers,
  zones,
}: Pick<Assessment, 'drivers' | 'zones'>): DriverGroup[] {
  const groups = new Map<
    string,
    { zoneTitle: string; quantityTitle: string; of: DriverResult[] }
  >();
  for (const driver of drivers) {
    const { zone: id, quantity, zoneTitle } = driver;
    const judged = zones
      .find((zone) => zone.id === id)
      ?.quantities.find((entry) => entry.quantity === quantity);
    if (judged === undefined) continue;
    const key = `${id} ${quantity}`;
    const known = groups.get(key) ?? { zoneTitle, quantityTitle: judged.quantityTitle, of: [] };
    groups.set(key, { ...known, of: [...known.of, driver] });
  }
  return [...groups.values()].map(({ zoneTitle, quantityTitle, of }) => ({
    zoneTitle,
    quantityTitle,
    drivers: of
      .toSorted((one, other) => Math.abs(other.rankCorrelation) - Math.abs(one.rankCorrelation))
      .slice(0, most),
  }));
}
