import type { AirGasTable } from './air-gases.js';
import { flowSegments } from './air-flows.js';
import type { AirInput, AirThreshold } from './air-input.js';
import { airModel, type AirModel } from './air-model.js';
import { layerCase, type LayerMouth } from './layer-case.js';
import { zoneLayout } from './layer-zones.js';
import { COARSE, followLayers } from './layered-track.js';
import { mixedTrack } from './mixed-track.js';
import { spaceTrack } from './mixed-values.js';
import { mouthReader } from './mouth-reader.js';
import { sampledInput, sampledLayers, type Draw } from './sampled-input.js';

/** A mouth whose band is wanted, with its bound in the usual run at the times of the draws. */
export interface DrawnMouth {
  readonly zone: string;
  readonly heightM: number;
  /** 0.2 m above the floor of the zone: what drives it is not told. */
  readonly isFloorCheck: boolean;
  readonly at: LayerMouth;
  /** Oxygen, then gases, row by row at the times of the draws. */
  readonly bounds: Float64Array;
}

/** What a share of the draws gave: mouth by mouth, one column per draw. */
export interface DrawnValues {
  readonly draws: number;
  /** By mouth: value at (time, quantity, draw). */
  readonly values: readonly Float32Array[];
  /** By mouth: worst value at (quantity, draw): lowest oxygen, highest gas. */
  readonly worst: readonly Float64Array[];
  /** By mouth: first time past a threshold at (threshold, draw) [s]; infinite where never. */
  readonly firstS: readonly Float64Array[];
}

/**
 * Column of a quantity in an answer [-].
 *
 *   oxygen, then gases
 *
 * @param quantity `oxygenFraction` or a gas id
 * @param gases    gases of the answer in order
 * @returns column [-]; -1 where the answer lacks it
 * Source: own-derivation. Assumes: nothing. Accuracy: exact.
 * @example quantityColumn('CO2', ['CO2', 'He']) // 1
 */
export function quantityColumn(quantity: string, gases: readonly string[]): number {
  if (quantity === 'oxygenFraction') return 0;
  const at = gases.indexOf(quantity);
  return at < 0 ? -1 : at + 1;
}

/**
 * Runs the two-layer model once for each draw of its uncertain inputs [-].
 *
 * The draws of a band may be shared out over several threads; the answers are joined by layeredBand.
 *
 * @param input      the input as stated
 * @param gases      gas table
 * @param draws      draws to run
 * @param mouths     mouths wanted
 * @param timesS     rising times wanted [s]
 * @param gasIds     gases of the answer in order
 * @param thresholds levels whose first passing is wanted
 * @returns values at the mouths, worst values and first passings
 * Source: mckay-1979; distributions in DEFAULT_DISTRIBUTIONS. Assumes: independent inputs.
 * Accuracy: COARSE for each run.
 */
export function layeredDraws(
  input: AirInput,
  gases: AirGasTable,
  draws: readonly Draw[],
  mouths: readonly DrawnMouth[],
  timesS: readonly number[],
  gasIds: readonly string[],
  thresholds: readonly AirThreshold[],
): DrawnValues {
  const width = gasIds.length + 1;
  const count = draws.length;
  const levels = thresholds.map(({ quantity, value }) => ({
    column: quantityColumn(quantity, gasIds),
    value,
  }));
  const values = mouths.map(() => new Float32Array(timesS.length * width * count));
  const worst = mouths.map(() => new Float64Array(width * count));
  const firstS = mouths.map(() => new Float64Array(levels.length * count).fill(Infinity));
  const row = new Float64Array(width);
  const keep = (m: number, s: number, i: number): void => {
    const store = values[m];
    const peaks = worst[m];
    const firsts = firstS[m];
    if (!store || !peaks || !firsts) return;
    for (let q = 0; q < width; q++) {
      const value = row[q] ?? 0;
      store[(i * width + q) * count + s] = value;
      const at = q * count + s;
      const before = peaks[at] ?? 0;
      const isWorse = i === 0 || (q === 0 ? value < before : value > before);
      if (isWorse) peaks[at] = value;
    }
    for (const [l, { column, value }] of levels.entries()) {
      if (column < 0 || Number.isFinite(firsts[l * count + s])) continue;
      const now = row[column] ?? 0;
      if (column === 0 ? now < value : now > value) firsts[l * count + s] = timesS[i] ?? 0;
    }
  };
  for (const [s, draw] of draws.entries()) {
    const model = airModel(sampledInput(input, draw), gases);
    const one = layerCase(model, gases);
    if (one.network.layers.length === 0) {
      readMixed(model, mouths, timesS, row, (m, i) => {
        keep(m, s, i);
      });
      continue;
    }
    const parameters = sampledLayers(input, draw);
    const readers = mouths.map(({ at }) => mouthReader(one, at, parameters));
    let i = 0;
    followLayers(
      one.network,
      zoneLayout(one.network),
      parameters,
      timesS,
      COARSE,
      (t, _state, zones) => {
        for (const [m, { bounds }] of mouths.entries()) {
          readers[m]?.(t, zones, bounds, i * width, row, 0);
          keep(m, s, i);
        }
        i++;
      },
    );
  }
  return { draws: count, values, worst, firstS };
}

/** The mixed answer of a draw in which nothing lies as a layer. */
function readMixed(
  model: AirModel,
  mouths: readonly DrawnMouth[],
  timesS: readonly number[],
  row: Float64Array,
  keep: (mouth: number, time: number) => void,
): void {
  const options = {
    displacement: 'pushOut',
    useMixingVolume: false,
    wantsSlopes: false,
    wantsBetween: false,
  } as const;
  const track = mixedTrack(model, flowSegments(model, 'pushOut'), timesS, options);
  const runs = { displacement: 'pushOut' as const, tracks: [track] as const };
  for (const [m, mouth] of mouths.entries()) {
    const flat = spaceTrack(model, runs, mouth.at.mouth.space);
    let at = 0;
    for (const [i, t] of timesS.entries()) {
      while ((flat.timesS[at + 1] ?? Infinity) <= t) at++;
      row.set(flat.values.subarray(at * flat.width, (at + 1) * flat.width));
      keep(m, i);
    }
  }
}
