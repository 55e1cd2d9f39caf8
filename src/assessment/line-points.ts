/**
 * Places of the points that lines through several rows need: between two of them every row runs
 * straight within its tolerance, so that nothing is lost to the eye. First, last, lowest and highest
 * points are always among them.
 *
 * @param timesS times of the points, rising
 * @param rows   values at these times, row by row
 * @param share  tolerance as a share of the span of a row, 0 to 1
 */
export function linePoints(
  timesS: readonly number[],
  rows: readonly (readonly number[])[],
  share: number,
): readonly number[] {
  const last = timesS.length - 1;
  if (last < 2) return timesS.map((_, index) => index);
  const kept = new Set([0, last]);
  for (const row of rows) {
    const lowest = Math.min(...row);
    const highest = Math.max(...row);
    kept.add(row.indexOf(lowest)).add(row.indexOf(highest));
    keepBends(timesS, row, (highest - lowest) * share, kept);
  }
  return [...kept].sort((one, other) => one - other);
}

function keepBends(
  timesS: readonly number[],
  row: readonly number[],
  tolerance: number,
  kept: Set<number>,
): void {
  const open = [...kept].sort((one, other) => one - other);
  const spans = open.slice(1).map((to, index): [number, number] => [open[index] ?? 0, to]);
  for (let span = spans.pop(); span !== undefined; span = spans.pop()) {
    const [from, to] = span;
    const [t0, t1] = [timesS[from] ?? 0, timesS[to] ?? 0];
    const [v0, v1] = [row[from] ?? 0, row[to] ?? 0];
    let furthest = from;
    let distance = tolerance;
    for (let i = from + 1; i < to; i++) {
      const onLine = v0 + ((v1 - v0) * ((timesS[i] ?? 0) - t0)) / (t1 - t0);
      const off = Math.abs((row[i] ?? 0) - onLine);
      if (off > distance) [furthest, distance] = [i, off];
    }
    if (furthest === from) continue;
    kept.add(furthest);
    spans.push([from, furthest], [furthest, to]);
  }
}
