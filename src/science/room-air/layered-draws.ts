import type { AirGasTable } from './air-gases.js';
import { flowSegments } from './air-flows.js';
import type { AirInput, AirThreshold } from './air-input.js';
import { airModel, type AirModel } from './air-model.js';
import { rowsAt } from './air-series.js';
import { layerCase, type LayerMouth } from './layer-case.js';
import { zoneLayout } from './layer-zones.js';
import { COARSE } from './layer-extrapolation.js';
import { followLayers } from './layered-track.js';
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
  /** The same of the well-mixed answer in its space. */
  readonly mixed: Float64Array;
}

/** What a share of the draws gave: mouth by mouth, one column per draw. */
export interface DrawnValues {
  readonly draws: number;
  /** By mouth: value at (time, quantity, draw); mouths at one place share one list. */
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
  const levels = thresholds
    .map(({ quantity, value }, l) => ({ l, column: quantityColumn(quantity, gasIds), value }))
    .filter(({ column }) => column >= 0);
  // Mouths at one place have one answer; groups of people often share a place.
  const places = mouths.filter((mouth, m) => m === placeOf(mouths, mouth));
  const stores = places.map(() => ({
    values: new Float32Array(timesS.length * width * count),
    worst: new Float64Array(width * count),
    firstS: new Float64Array(thresholds.length * count).fill(Infinity),
  }));
  const row = new Float64Array(width);
  const keep = (m: number, s: number, i: number): void => {
    const store = stores[m];
    if (!store) return;
    const { values, worst, firstS } = store;
    const from = i * width * count + s;
    for (let q = 0; q < width; q++) {
      const value = row[q] ?? 0;
      values[from + q * count] = value;
      const at = q * count + s;
      const before = worst[at] ?? 0;
      if (i === 0 || (q === 0 ? value < before : value > before)) worst[at] = value;
    }
    for (const level of levels) {
      const at = level.l * count + s;
      if (firstS[at] !== Infinity) continue;
      const now = row[level.column] ?? 0;
      if (level.column === 0 ? now < level.value : now > level.value) firstS[at] = timesS[i] ?? 0;
    }
  };
  for (const [s, draw] of draws.entries()) {
    const model = airModel(sampledInput(input, draw), gases);
    const one = layerCase(model, gases);
    if (one.network.layers.length === 0) {
      readMixed(model, places, timesS, row, (m, i) => {
        keep(m, s, i);
      });
      continue;
    }
    const parameters = sampledLayers(input, draw);
    const readers = places.map(({ at, bounds, mixed }) => ({
      read: mouthReader(one, at, parameters),
      bounds,
      mixed,
    }));
    let i = 0;
    followLayers(
      one.network,
      zoneLayout(one.network),
      parameters,
      timesS,
      COARSE,
      (t, _state, zones) => {
        for (let m = 0; m < readers.length; m++) {
          const reader = readers[m];
          if (!reader) continue;
          reader.read(t, zones, reader.bounds, i * width, row, 0, reader.mixed);
          keep(m, s, i);
        }
        i++;
      },
    );
  }
  const storeOf = (mouth: DrawnMouth) => {
    const store = stores[places.indexOf(mouths[placeOf(mouths, mouth)] ?? mouth)];
    if (!store) throw new RangeError(`no place for ${mouth.zone}`);
    return store;
  };
  const all = mouths.map(storeOf);
  return {
    draws: count,
    values: all.map(({ values }) => values),
    worst: all.map(({ worst }) => worst),
    firstS: all.map(({ firstS }) => firstS),
  };
}

/** Index of the first mouth at the same place: what lies there is the same for both [-]. */
function placeOf(mouths: readonly DrawnMouth[], mouth: DrawnMouth): number {
  return mouths.findIndex(
    ({ at }) =>
      at.mouth.space === mouth.at.mouth.space &&
      at.levelM === mouth.at.levelM &&
      at.floorM === mouth.at.floorM,
  );
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
    const rows = rowsAt(spaceTrack(model, runs, mouth.at.mouth.space), timesS);
    for (let i = 0; i < timesS.length; i++) {
      row.set(rows.subarray(i * row.length, (i + 1) * row.length));
      keep(m, i);
    }
  }
}
