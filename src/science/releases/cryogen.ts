/** Age doubles the maker's loss figure (guidance of university safety offices). */
const ageFactor = 2;

/**
 * Rate at which a storage vessel loses liquid while standing [m^3/s of liquid].
 *
 *   V' = 2 x the maker's daily loss
 *
 * @param makerLossM3PerDay  daily loss of the data sheet [m^3 of liquid per day]
 * @returns  loss [m^3/s of liquid]
 * Source: cryogen-standing-loss. Assumes: an aged vessel. Accuracy: cautious, not exact.
 * @example vesselLoss(0.00015) * 86400 // 0.0003
 */
export function vesselLoss(makerLossM3PerDay: number): number {
  return (ageFactor * makerLossM3PerDay) / 86_400;
}

/** What a liquid does to a floor: the floor's own properties. */
export interface FloorMaterial {
  readonly conductivityWPerMK: number;
  readonly diffusivityM2PerS: number;
}

/** Concrete, from memory. */
export const concreteFloor: FloorMaterial = { conductivityWPerMK: 1.5, diffusivityM2PerS: 7e-7 };

/**
 * Liquid boiled off by a floor since it was wetted [kg/m^2].
 *
 *   m = 2 k dT sqrt(t/(pi a))/L
 *
 * @param floor  conductivity [W/(m K)] and diffusivity [m^2/s]
 * @param dT  floor above the boiling point [K]
 * @param L  latent heat [J/kg]
 * @param t  time since it was wetted [s]
 * @returns  mass per area [kg/m^2]
 * Source: floor-heat-conduction. Assumes: perfect contact, thick floor; film boiling is slower.
 * Accuracy: a factor three: treat a spill as instantaneous.
 * @example boiledByFloor(concreteFloor, 215.8, 199180, 1) // 2.19
 */
export function boiledByFloor(floor: FloorMaterial, dT: number, L: number, t: number): number {
  return (
    (2 * floor.conductivityWPerMK * dT * Math.sqrt(t / (Math.PI * floor.diffusivityM2PerS))) / L
  );
}

/** Loss of a transfer, share of the liquid drawn: into a cold and into a warm vessel (from memory). */
export const transferLoss = { coldVessel: 0.1, warmVessel: 0.3 } as const;
