import { inRange, type Range } from '../range.js';

export const dryIceMassRange: Range = { min: 0, max: 10_000, unit: 'kg', name: 'dry ice' };

/** Heat to turn dry ice into gas at its own temperature, and to warm that gas to 20 degC. */
export const dryIceHeat = { sublimationJPerKg: 571_000, warmingJPerKg: 83_000 } as const;

/** Loss of dry ice in boxes, share of the content per hour: small boxes, and well-made ones. */
export const boxLossPerHour = {
  smallBox: { low: 0.017, usual: 0.02, high: 0.028 },
  wellInsulated: { low: 0.01, usual: 0.013, high: 0.016 },
} as const;

/** Heat transfer to dry ice in the open [W/(m^2 K)], judgement: still air and a fan. */
export const openHeatTransfer = {
  stillAir: { low: 5, usual: 8, high: 10 },
  fan: { low: 20, usual: 35, high: 50 },
} as const;

/** Rate in hot water from supplier figures [kg/s]: 0.15, 0.3 and 0.5 kg a minute. */
export const hotWaterRateKgPerS = { low: 0.15 / 60, usual: 0.3 / 60, high: 0.5 / 60 } as const;

/**
 * Rate at which dry ice turns to gas in the open [kg/s].
 *
 *   m' = h A (T_air - T_sub)/L
 *
 * @param areaM2  exposed surface [m^2]
 * @param h  heat transfer coefficient [W/(m^2 K)]; see `openHeatTransfer`
 * @param airK  temperature of the air [K]
 * @param solidK  sublimation temperature [K], 194.7 at sea level
 * @returns  rate [kg/s]
 * Source: dry-ice-heat-balance. Assumes: latent heat alone. Accuracy: a factor two, from h.
 * @example dryIceRateInAir(0.5, 8, 293.15, 194.65) * 3600 // 2.484
 */
export function dryIceRateInAir(areaM2: number, h: number, airK: number, solidK: number): number {
  return (h * areaM2 * (airK - solidK)) / dryIceHeat.sublimationJPerKg;
}

/**
 * Dry ice that the heat of cooling water could turn to gas: arithmetic, never a cap [kg].
 *
 *   m = m_w c (T1 - T2)/(L + warming)
 *
 * Freezing water and the room go on supplying heat: all of the dry ice becomes gas in the end.
 *
 * @param waterKg  mass of water [kg]
 * @param fromK  temperature of the water at first [K]
 * @param toK  temperature at last [K]
 * @returns  mass of dry ice [kg]
 * Source: dry-ice-heat-balance. Assumes: no heat from the room. Accuracy: a lower figure.
 * @example dryIceByWaterHeat(20, 353.15, 293.15) // 7.681
 */
export function dryIceByWaterHeat(waterKg: number, fromK: number, toK: number): number {
  const waterHeatCapacity = 4186;
  return (
    (waterKg * waterHeatCapacity * (fromK - toK)) /
    (dryIceHeat.sublimationJPerKg + dryIceHeat.warmingJPerKg)
  );
}

/**
 * Dry ice left in a closed box after a time [kg].
 *
 *   m = m0 exp(-k t)
 *
 * @param massKg  at first [kg], 0 to 10 000
 * @param lossPerHour  share lost per hour [1/h]; see `boxLossPerHour`
 * @param t  time [s]
 * @returns  mass left [kg]
 * @throws {OutOfRange} outside the range above
 * Source: dry-ice-box-loss. Assumes: the same share every hour. Accuracy: a factor two.
 * @example dryIceLeftInBox(10, 0.02, 36000) // 8.187
 */
export function dryIceLeftInBox(massKg: number, lossPerHour: number, t: number): number {
  inRange(massKg, dryIceMassRange, '/massKg');
  return massKg * Math.exp((-lossPerHour * t) / 3600);
}
