/** Calls per second of one core over several rounds. */
export interface Rates {
  readonly median: number;
  readonly low: number;
  readonly high: number;
  /** Heap at the end less heap at the start, both after a collection where one can be asked for. */
  readonly heapGrowthBytes: number;
}

const collect = (): void => {
  globalThis.gc?.();
};

/** Processor seconds of this process: other programs on the machine take none of them. */
function processorSeconds(): number {
  const { user, system } = process.cpuUsage();
  return (user + system) / 1e6;
}

function roundOf(call: (index: number) => number, seconds: number): number {
  const batch = 500;
  let sum = 0;
  let count = 0;
  const start = processorSeconds();
  let elapsed = 0;
  while (elapsed < seconds) {
    for (let index = 0; index < batch; index += 1) sum += call(count + index);
    count += batch;
    elapsed = processorSeconds() - start;
  }
  if (!Number.isFinite(sum)) throw new Error('the bench computed nothing');
  return count / elapsed;
}

const middle = (sorted: readonly number[]): number => sorted[Math.floor(sorted.length / 2)] ?? 0;

/**
 * Rates of several contenders, taken in turns so that a busy minute of the machine meets them all.
 * Reckoned by processor time, the collector's included.
 */
export function ratesOf<Names extends string>(
  contenders: Readonly<Record<Names, (index: number) => number>>,
  { rounds, seconds }: { readonly rounds: number; readonly seconds: number },
): Readonly<Record<Names, Rates>> {
  const names = Object.keys(contenders) as Names[];
  for (const name of names) roundOf(contenders[name], seconds);
  const heap = new Map<Names, number>(names.map((name) => [name, 0]));
  const seen = new Map<Names, number[]>(names.map((name) => [name, []]));
  for (let round = 0; round < rounds; round += 1) {
    for (const name of names) {
      collect();
      const before = process.memoryUsage().heapUsed;
      seen.get(name)?.push(roundOf(contenders[name], seconds));
      collect();
      heap.set(name, (heap.get(name) ?? 0) + process.memoryUsage().heapUsed - before);
    }
  }
  const entries = names.map((name): [Names, Rates] => {
    const sorted = (seen.get(name) ?? []).sort((one, other) => one - other);
    return [
      name,
      {
        median: middle(sorted),
        low: sorted[0] ?? 0,
        high: sorted.at(-1) ?? 0,
        heapGrowthBytes: heap.get(name) ?? 0,
      },
    ];
  });
  return Object.fromEntries(entries) as Record<Names, Rates>;
}

const thousands = (perSecond: number): string => (perSecond / 1000).toFixed(1);

/** One line of a bench. */
export function rateText(words: string, rates: Rates): string {
  const spread = `${thousands(rates.low)} to ${thousands(rates.high)}`;
  const heap = `heap grew by ${(rates.heapGrowthBytes / 1e6).toFixed(2)} MB`;
  return `${words}: ${thousands(rates.median)} thousand/s (${spread}); ${heap}`;
}
