/**
 * Largest spread of readings taken at one moment over their mean [-]: how well the air is mixed.
 *
 *   max over time of (largest - smallest)/mean, background taken off, while the mean is above a tenth
 *   of its first value
 *
 * @param positions     readings by position [ppm], as many each
 * @param backgroundPpm reading of the incoming air [ppm]
 * @returns spread [-]; 0 for one position
 * Source: astm-e741 (tracer within 10 % of its mean). Assumes: readings of one moment stand at one
 * index. Accuracy: that of the readings.
 * @example positionSpread([[1420, 720], [1420, 780]], 420) // 0.1818
 */
export function positionSpread(
  positions: readonly (readonly number[])[],
  backgroundPpm: number,
): number {
  const [first = []] = positions;
  const excesses = first.map((_, i) =>
    positions.map((readings) => (readings[i] ?? 0) - backgroundPpm),
  );
  const means = excesses.map((row) => row.reduce((sum, one) => sum + one, 0) / row.length);
  const least = Math.max(0, 0.1 * (means[0] ?? 0));
  return excesses.reduce((most, row, i) => {
    const mean = means[i] ?? 0;
    return mean > least ? Math.max(most, (Math.max(...row) - Math.min(...row)) / mean) : most;
  }, 0);
}
