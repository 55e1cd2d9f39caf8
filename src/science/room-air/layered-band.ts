import { sortedQuantile } from '../numerics/quantile.js';
import { rankCorrelation } from '../numerics/rank-correlation.js';
import type { AirThreshold } from './air-input.js';
import type { BandPeak, Chance, Driver } from './air-result.js';
import { SAMPLED_INPUTS } from './input-distributions.js';
import { quantityColumn, type DrawnMouth, type DrawnValues } from './layered-draws.js';
import type { Draw } from './sampled-input.js';

/** Correlations of no more than this are not told: a hundred draws make as much by chance [-]. */
const LEAST_TOLD = 0.1;

/** Quantiles of the layered answer at one mouth: oxygen, then gases, time by time. */
export interface Band {
  readonly p05: Float64Array;
  readonly p50: Float64Array;
  readonly p95: Float64Array;
  /** Quantiles of the worst that each draw reaches. */
  readonly peak: BandPeak;
}

export interface Bands {
  /** By mouth. */
  readonly bands: readonly Band[];
  readonly drivers: readonly Driver[];
  readonly chances: readonly Chance[];
}

/**
 * Band of the layered answer over all draws [-].
 *
 * Quantiles are of the quantity itself: the 5 % quantile of oxygen is its bad end, the 95 % quantile
 * of a gas is its bad end. Drivers are rank correlations of each input with the worst value.
 *
 * @param parts      answers of the draws in their order, from one thread or several
 * @param draws      the draws
 * @param mouths     mouths wanted
 * @param times      number of times
 * @param gasIds     gases of the answer in order
 * @param thresholds levels whose passing was followed
 * @returns one band per mouth, the drivers, and how often each level is passed
 * Source: hyndman-fan-1996, spearman-1904. Assumes: independent inputs. Accuracy: sampling; at 512
 * draws the 95 % quantile lies between ranks 476 and 496.
 */
export function layeredBand(
  parts: readonly DrawnValues[],
  draws: readonly Draw[],
  mouths: readonly DrawnMouth[],
  times: number,
  gasIds: readonly string[],
  thresholds: readonly AirThreshold[],
): Bands {
  const quantities = ['oxygenFraction', ...gasIds];
  const inputs = SAMPLED_INPUTS.map((name) => ({ name, values: draws.map((draw) => draw[name]) }));
  const bands: Band[] = [];
  const drivers: Driver[] = [];
  const chances: Chance[] = [];
  const known = new Map<Float32Array | undefined, Band>();
  for (const [m, { zone, heightM, isFloorCheck }] of mouths.entries()) {
    const worst = quantities.map((_, q) => gathered(parts, q, (part) => part.worst[m]));
    const values = parts[0]?.values[m];
    const band = known.get(values) ?? bandAt(parts, m, times, gasIds, worst);
    known.set(values, band);
    bands.push(band);
    for (const [q, quantity] of isFloorCheck ? [] : quantities.entries()) {
      const values = Array.from(worst[q] ?? []);
      for (const { name, values: input } of inputs) {
        const correlation = rankCorrelation(input, values);
        if (Math.abs(correlation) <= LEAST_TOLD) continue;
        drivers.push({ zone, quantity, input: name, rankCorrelation: correlation });
      }
    }
    for (const [l, { quantity, value }] of thresholds.entries()) {
      if (quantityColumn(quantity, gasIds) < 0) continue;
      const passed = gathered(parts, l, (part) => part.firstS[m])
        .sort()
        .filter(Number.isFinite);
      chances.push({
        zone,
        heightM,
        quantity,
        value,
        share: passed.length / draws.length,
        ...(passed.length > 0
          ? {
              firstS: {
                p05: sortedQuantile(passed, 0.05),
                p50: sortedQuantile(passed, 0.5),
                p95: sortedQuantile(passed, 0.95),
              },
            }
          : {}),
      });
    }
  }
  return { bands, drivers, chances };
}

/** The band at one place: quantiles time by time, and of the worst that each draw reaches. */
function bandAt(
  parts: readonly DrawnValues[],
  m: number,
  times: number,
  gasIds: readonly string[],
  worst: readonly Float64Array[],
): Band {
  const cells = times * (gasIds.length + 1);
  const band = {
    p05: new Float64Array(cells),
    p50: new Float64Array(cells),
    p95: new Float64Array(cells),
  };
  const all = new Float64Array(drawsOf(parts));
  for (let cell = 0; cell < cells; cell++) {
    gather(parts, cell, (part) => part.values[m], all);
    if (varies(all)) all.sort();
    band.p05[cell] = sortedQuantile(all, 0.05);
    band.p50[cell] = sortedQuantile(all, 0.5);
    band.p95[cell] = sortedQuantile(all, 0.95);
  }
  const sorted = worst.map((values) => values.slice().sort());
  const peakAt = (p: number) => ({
    oxygenFraction: sortedQuantile(sorted[0] ?? [], p),
    gasFraction: Object.fromEntries(
      gasIds.map((gas, g) => [gas, sortedQuantile(sorted[g + 1] ?? [], p)]),
    ),
  });
  return { ...band, peak: { p05: peakAt(0.05), p50: peakAt(0.5), p95: peakAt(0.95) } };
}

/** Whether a list has more than one value; most gases are nowhere for most of a day. */
function varies(values: Float64Array): boolean {
  const first = values[0];
  for (let i = 1; i < values.length; i++) if (values[i] !== first) return true;
  return false;
}

const drawsOf = (parts: readonly DrawnValues[]): number =>
  parts.reduce((sum, part) => sum + part.draws, 0);

/** One cell of all parts side by side. */
function gathered(
  parts: readonly DrawnValues[],
  cell: number,
  of: (part: DrawnValues) => ArrayLike<number> | undefined,
): Float64Array {
  const all = new Float64Array(drawsOf(parts));
  gather(parts, cell, of, all);
  return all;
}

function gather(
  parts: readonly DrawnValues[],
  cell: number,
  of: (part: DrawnValues) => ArrayLike<number> | undefined,
  into: Float64Array,
): void {
  let at = 0;
  for (const part of parts) {
    const values = of(part);
    for (let s = 0; s < part.draws; s++) into[at++] = values?.[cell * part.draws + s] ?? 0;
  }
}
