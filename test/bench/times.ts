/** Milliseconds of one call over several rounds. */
export interface Times {
  readonly median: number;
  readonly low: number;
  readonly high: number;
}

const spreadOf = (times: readonly number[]): Times => {
  const sorted = [...times].sort((one, other) => one - other);
  return {
    median: sorted[Math.floor(sorted.length / 2)] ?? NaN,
    low: sorted[0] ?? NaN,
    high: sorted.at(-1) ?? NaN,
  };
};

/** By processor time: other programs on the machine take none of it; the collector's counts. */
export function timesOf(call: () => unknown, rounds: number, warmUps = 1): Times {
  for (let i = 0; i < warmUps; i += 1) call();
  const times: number[] = [];
  for (let round = 0; round < rounds; round += 1) {
    globalThis.gc?.();
    const before = process.cpuUsage();
    call();
    const { user, system } = process.cpuUsage(before);
    times.push((user + system) / 1000);
  }
  return spreadOf(times);
}

/** By the clock, for what several threads do together. */
export async function clockTimesOf(call: () => Promise<unknown>, rounds: number): Promise<Times> {
  const times: number[] = [];
  for (let round = 0; round < rounds; round += 1) {
    const before = performance.now();
    await call();
    times.push(performance.now() - before);
  }
  return spreadOf(times);
}

const shown = (ms: number): string =>
  ms >= 1000 ? `${(ms / 1000).toFixed(2)} s` : `${ms.toPrecision(3)} ms`;

/** One line of a bench. */
export function timesText(words: string, { median, low, high }: Times): string {
  return `${words}: ${shown(median)} (${shown(low)} to ${shown(high)})`;
}

/** Exponent p of time = constant x size^p, by least squares on logarithms. */
export function growthExponent(points: readonly (readonly [size: number, ms: number])[]): number {
  const logs = points.map(([size, ms]) => [Math.log(size), Math.log(ms)] as const);
  const meanX = logs.reduce((sum, [x]) => sum + x, 0) / logs.length;
  const meanY = logs.reduce((sum, [, y]) => sum + y, 0) / logs.length;
  const top = logs.reduce((sum, [x, y]) => sum + (x - meanX) * (y - meanY), 0);
  return top / logs.reduce((sum, [x]) => sum + (x - meanX) ** 2, 0);
}
