/**
 * Froude number of the exchange through a horizontal hole, dense over light [-].
 *
 *   F = 0.055 [1 + 400 r^3]^(1/6) / [1 + 0.00527 (1 + 400 r^3)^(1/2) (r^6 + 117 r^2)^(3/4)]^(1/3)
 *
 * @param thicknessRatio thickness of the floor over the diameter of the hole r = L/D [-], 0 to 10
 * @returns F in Q = F sqrt(g' D^5) [-]
 * Source: epstein-1988, coefficients from memory. Assumes: no net flow; holds for 0.01 < r < 10.
 * Accuracy: 10 % (source, from memory).
 * @example horizontalExchangeFroude(0.05) // 0.055409425
 */
export function horizontalExchangeFroude(thicknessRatio: number): number {
  const r = Math.min(10, Math.max(0, thicknessRatio));
  const s = 1 + 400 * r ** 3;
  return (
    (0.055 * s ** (1 / 6)) /
    (1 + 0.00527 * Math.sqrt(s) * (r ** 6 + 117 * r ** 2) ** 0.75) ** (1 / 3)
  );
}

/**
 * Exchange through a round hole in a floor, dense above light [m3/s each way].
 *
 *   Q = F sqrt(g' D^5)
 *
 * @param diameterM  diameter D [m]
 * @param thicknessM thickness of the floor [m]
 * @param gPrime     reduced gravity with the mean density [m/s2]; 0 or less: stable, no exchange
 * @returns flow each way [m3/s]
 * Source: epstein-1988. Assumes: no net flow. Accuracy: 10 % (source, from memory).
 * @example horizontalExchange(1, 0.05, 0.5) // 0.03918038
 */
export function horizontalExchange(diameterM: number, thicknessM: number, gPrime: number): number {
  if (gPrime <= 0) return 0;
  return horizontalExchangeFroude(thicknessM / diameterM) * Math.sqrt(gPrime * diameterM ** 5);
}

/** Thickness taken for a floor whose thickness is not given [m]. */
const FLOOR_THICKNESS_M = 0.2;

/**
 * Exchange through a rectangular hole in a floor [m3/s each way]: square cells of the shorter side.
 *
 *   Q = (long/short) F sqrt(g' short^5)
 *
 * @param widthM  one side [m]
 * @param lengthM other side [m]
 * @param gPrime  reduced gravity with the mean density [m/s2]
 * @returns flow each way [m3/s]
 * Source: engineering-judgement (cells of the hydraulic diameter). Assumes: floor 0.2 m thick.
 * Accuracy: not known; water-model tests give about half of a vertical opening.
 */
export function rectangularFloorExchange(widthM: number, lengthM: number, gPrime: number): number {
  const short = Math.min(widthM, lengthM);
  if (short <= 0) return 0;
  const long = Math.max(widthM, lengthM);
  return (long / short) * horizontalExchange(short, FLOOR_THICKNESS_M, gPrime);
}
