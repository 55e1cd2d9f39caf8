import { sortedQuantile } from '../numerics/quantile.js';
import { rankCorrelation } from '../numerics/rank-correlation.js';
import type { AirGasTable } from './air-gases.js';
import type { AirInput } from './air-input.js';
import { flowSegments } from './air-flows.js';
import { airModel, type AirModel } from './air-model.js';
import type { Driver } from './air-result.js';
import { rowsOf, type QuantityRow } from './answer-track.js';
import { SAMPLED_INPUTS } from './input-distributions.js';
import { layerCase, layeredRows, type LayerMouth } from './layered-answer.js';
import { COARSE, layeredTrack } from './layered-track.js';
import { mixedTrack } from './mixed-track.js';
import { spaceTrack, type MixedRuns } from './mixed-values.js';
import { sampledInput, sampledLayers, uncertaintyDraws } from './sampled-input.js';

/** A mouth whose band is wanted, with the rows of its bound in the usual run. */
export interface BandMouth {
  readonly zone: string;
  readonly at: LayerMouth;
  readonly bounds: readonly QuantityRow[];
}

/** Quantiles of the layered answer at one mouth, row by row at the output times. */
export interface Band {
  readonly p05: readonly Float64Array[];
  readonly p50: readonly Float64Array[];
  readonly p95: readonly Float64Array[];
}

export interface Bands {
  readonly bands: readonly Band[];
  readonly drivers: readonly Driver[];
}

/**
 * Band of the layered answer from a Latin hypercube over the uncertain inputs [-].
 *
 * Quantiles are of the quantity itself: the 5 % quantile of oxygen is its bad end, the 95 % quantile
 * of a gas is its bad end. Drivers are rank correlations of each input with the worst value.
 *
 * @param input  the input, with `uncertainty`
 * @param gases  gas table
 * @param mouths mouths wanted
 * @param timesS output times
 * @param gasIds gases of the answer in order
 * @returns one band per mouth, and the drivers
 * Source: mckay-1979; distributions in DEFAULT_DISTRIBUTIONS. Assumes: independent inputs. Accuracy:
 * sampling; at 512 draws the 95 % quantile lies between ranks 476 and 496.
 */
export function layeredBands(
  input: AirInput,
  gases: AirGasTable,
  mouths: readonly BandMouth[],
  timesS: readonly number[],
  gasIds: readonly string[],
): Bands {
  const { uncertainty } = input;
  if (!uncertainty) return { bands: [], drivers: [] };
  const draws = uncertaintyDraws(uncertainty);
  const width = gasIds.length + 1;
  const count = draws.length;
  const cells = timesS.length * width;
  // One column of draws per mouth, time and quantity.
  const values = mouths.map(() => new Float32Array(cells * count));
  const worst = mouths.map(() =>
    Array.from({ length: width }, () => new Array<number>(count).fill(0)),
  );
  for (const [s, draw] of draws.entries()) {
    const model = airModel(sampledInput(input, draw), gases);
    const one = layerCase(model, gases);
    const parameters = sampledLayers(input, draw);
    const hasLayers = one.network.layers.length > 0;
    const track = hasLayers ? layeredTrack(one.network, parameters, timesS, COARSE) : undefined;
    const mixed = hasLayers ? undefined : mixedOf(model, timesS);
    for (const [m, mouth] of mouths.entries()) {
      const rows = track
        ? (layeredRows(one, track, mouth.at, parameters, mouth.bounds).pieces[0]?.rows ?? [])
        : mixed
          ? rowsOf(spaceTrack(model, mixed, mouth.at.mouth.space))
          : [];
      let at = 0;
      for (const [i, t] of timesS.entries()) {
        while ((rows[at + 1]?.t ?? Infinity) <= t) at++;
        const row = rows[at]?.values;
        for (let q = 0; q < width; q++) {
          const value = row?.[q] ?? 0;
          const store = values[m];
          if (store) store[(i * width + q) * count + s] = value;
          const peaks = worst[m]?.[q];
          if (!peaks) continue;
          const before = peaks[s] ?? 0;
          peaks[s] = i === 0 ? value : q === 0 ? Math.min(before, value) : Math.max(before, value);
        }
      }
    }
  }
  return {
    bands: values.map((store) => bandOf(store, timesS.length, width, count)),
    drivers: mouths.flatMap(({ zone }, m) =>
      ['oxygenFraction', ...gasIds].flatMap((quantity, q) =>
        SAMPLED_INPUTS.map((name) => ({
          zone,
          quantity,
          input: name,
          rankCorrelation: rankCorrelation(
            draws.map((draw) => draw[name]),
            worst[m]?.[q] ?? [],
          ),
        })).filter((driver) => Math.abs(driver.rankCorrelation) > 0.1),
      ),
    ),
  };
}

/** The mixed answer of a draw in which nothing lies as a layer. */
function mixedOf(model: AirModel, timesS: readonly number[]): MixedRuns {
  const options = {
    displacement: 'pushOut',
    useMixingVolume: false,
    wantsSlopes: false,
    wantsBetween: false,
  } as const;
  const segments = flowSegments(model, 'pushOut');
  return { displacement: 'pushOut', tracks: [mixedTrack(model, segments, timesS, options)] };
}

function bandOf(store: Float32Array, times: number, width: number, count: number): Band {
  const band = { p05: [], p50: [], p95: [] } as Record<keyof Band, Float64Array[]>;
  for (let i = 0; i < times; i++) {
    const rows = [0.05, 0.5, 0.95].map(() => new Float64Array(width));
    for (let q = 0; q < width; q++) {
      const from = (i * width + q) * count;
      const sorted = store.slice(from, from + count).sort();
      for (const [k, p] of [0.05, 0.5, 0.95].entries()) {
        const row = rows[k];
        if (row) row[q] = sortedQuantile(sorted, p);
      }
    }
    band.p05.push(rows[0] ?? new Float64Array(width));
    band.p50.push(rows[1] ?? new Float64Array(width));
    band.p95.push(rows[2] ?? new Float64Array(width));
  }
  return band;
}
