/** A seeded stream of numbers in [0, 1). */
export function seededStream(seed: number): () => number {
  // A 32-bit counter hashed by multiplication and shifts (splitmix32).
  let state = seed >>> 0;
  return () => {
    state = (state + 0x9e3779b9) >>> 0;
    let z = state;
    z = Math.imul(z ^ (z >>> 16), 0x85ebca6b);
    z = Math.imul(z ^ (z >>> 13), 0xc2b2ae35);
    return ((z ^ (z >>> 16)) >>> 0) / 4_294_967_296;
  };
}

/**
 * Latin hypercube of points in the unit cube [-]: each axis is met once in each of n strata.
 *
 * @param points     number of points n
 * @param dimensions number of axes
 * @param seed       seed; the same seed gives the same points
 * @returns n rows of one number per axis
 * Source: mckay-1979. Assumes: nothing. Accuracy: sampling.
 */
export function latinHypercube(
  points: number,
  dimensions: number,
  seed: number,
): readonly Float64Array[] {
  const random = seededStream(seed);
  const rows = Array.from({ length: points }, () => new Float64Array(dimensions));
  for (let d = 0; d < dimensions; d++) {
    const order = Array.from({ length: points }, (_, i) => i);
    for (let i = points - 1; i > 0; i--) {
      const j = Math.floor(random() * (i + 1));
      const held = order[i] ?? 0;
      order[i] = order[j] ?? 0;
      order[j] = held;
    }
    for (const [i, row] of rows.entries()) row[d] = ((order[i] ?? 0) + random()) / points;
  }
  return rows;
}
