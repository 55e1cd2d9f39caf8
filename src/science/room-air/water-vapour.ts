/**
 * Partial pressure of the water vapour in air [Pa].
 *
 *   relativeHumidity x 611.2 Pa exp(17.62 t/(243.12 + t)), t in degC
 *
 * @param temperatureK     temperature [K]
 * @param relativeHumidity relative humidity [-], 0 to 1
 * @returns partial pressure [Pa]
 * Source: wmo-8. Assumes: over water. Accuracy: 0.6 % between -45 and 60 degC (source).
 * @example vapourPressure(293.15, 0.5) // 1166
 */
export function vapourPressure(temperatureK: number, relativeHumidity: number): number {
  const t = temperatureK - 273.15;
  return relativeHumidity * 611.2 * Math.exp((17.62 * t) / (243.12 + t));
}

/**
 * Actual partial pressure of oxygen [Pa].
 *
 *   y p/(1 + r (1 - x)),  r = pv/(p - pv)
 *
 * The vapour comes with the air, so a released dry gas dilutes it too.
 *
 * @param oxygenFraction  oxygen fraction of the dry gas y [-]
 * @param releasedFraction share of the dry gas that was released x [-]
 * @param pressurePa      total pressure p [Pa]
 * @param vapourPressurePa vapour pressure of the undiluted air pv [Pa]
 * @returns partial pressure [Pa]
 * Source: ideal-gas. Assumes: the moisture of breath is not counted. Accuracy: 0.5 %.
 */
export function oxygenPartialPressure(
  oxygenFraction: number,
  releasedFraction: number,
  pressurePa: number,
  vapourPressurePa: number,
): number {
  const ratio = vapourPressurePa / (pressurePa - vapourPressurePa);
  return (oxygenFraction * pressurePa) / (1 + ratio * (1 - releasedFraction));
}
