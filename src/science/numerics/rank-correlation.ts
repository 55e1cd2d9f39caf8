/** Ranks from 1, equal values sharing the mean of theirs. */
function ranks(values: readonly number[]): readonly number[] {
  const order = values.map((_, i) => i).sort((a, b) => (values[a] ?? 0) - (values[b] ?? 0));
  const rank = new Array<number>(values.length).fill(0);
  let from = 0;
  while (from < order.length) {
    let to = from;
    while (
      to + 1 < order.length &&
      (values[order[to + 1] ?? 0] ?? 0) === (values[order[from] ?? 0] ?? 0)
    ) {
      to++;
    }
    for (let i = from; i <= to; i++) rank[order[i] ?? 0] = (from + to) / 2 + 1;
    from = to + 1;
  }
  return rank;
}

/**
 * Rank correlation of two lists [-].
 *
 *   correlation of the ranks; 0 when one of them does not vary
 *
 * @param x numbers [any one unit], at least two
 * @param y as many numbers [any one unit]
 * @returns correlation [-], -1 to 1
 * Source: spearman-1904. Assumes: nothing. Accuracy: sampling.
 * @example rankCorrelation([1, 2, 3], [10, 30, 90]) // 1
 */
export function rankCorrelation(x: readonly number[], y: readonly number[]): number {
  const a = ranks(x);
  const b = ranks(y);
  const mean = (x.length + 1) / 2;
  let xy = 0;
  let xx = 0;
  let yy = 0;
  for (const [i, rank] of a.entries()) {
    const dx = rank - mean;
    const dy = (b[i] ?? mean) - mean;
    xy += dx * dy;
    xx += dx * dx;
    yy += dy * dy;
  }
  return xx > 0 && yy > 0 ? xy / Math.sqrt(xx * yy) : 0;
}
