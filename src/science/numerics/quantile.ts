/**
 * Quantile of a sorted list [unit of the list].
 *
 *   straight between the ranks on both sides of p (n - 1)
 *
 * @param sorted numbers in rising order [any one unit], at least one
 * @param p      probability [-], 0 to 1
 * @returns quantile [unit of the list]
 * Source: hyndman-fan-1996, definition 7. Assumes: sorted already. Accuracy: sampling.
 * @example sortedQuantile([1, 2, 3, 4], 0.5) // 2.5
 */
export function sortedQuantile(sorted: ArrayLike<number>, p: number): number {
  const at = p * (sorted.length - 1);
  const low = Math.floor(at);
  const first = sorted[low] ?? 0;
  return first + (at - low) * ((sorted[low + 1] ?? first) - first);
}
