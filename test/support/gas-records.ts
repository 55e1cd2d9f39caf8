import { readFileSync } from 'node:fs';

/** Records of one file of test/reference; the caller knows their shape. */
export function recordsOf(file: string): readonly unknown[] {
  const text = readFileSync(new URL(`../reference/${file}`, import.meta.url), 'utf8');
  return (JSON.parse(text) as { records: readonly unknown[] }).records;
}

/** Worst relative error per group, printed by the test that asks for it. */
export class WorstErrors {
  readonly #worst = new Map<string, { error: number; share: number; id: string; count: number }>();

  note(group: string, id: string, error: number, tolerance: number): void {
    const known = this.#worst.get(group);
    const share = Math.abs(error) / tolerance;
    const count = (known?.count ?? 0) + 1;
    if (known === undefined || share > known.share) {
      this.#worst.set(group, { error, share, id, count });
    } else {
      known.count = count;
    }
  }

  lines(): readonly string[] {
    return [...this.#worst]
      .sort(([one], [other]) => one.localeCompare(other))
      .map(
        ([group, { error, share, id, count }]) =>
          `${group}: ${String(count)} records, worst ${(error * 100).toExponential(1)} % (${(share * 100).toFixed(0)} % of the tolerance, ${id})`,
      );
  }
}
