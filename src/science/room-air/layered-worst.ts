import type { LayerCase, LayerMouth } from './layer-case.js';
import type { LayerParameters } from './layer-parameters.js';
import { zoneLayout } from './layer-zones.js';
import { MIDDLING } from './layer-extrapolation.js';
import { followLayers } from './layered-track.js';
import { keepWorse } from './mixed-values.js';
import { mouthReader } from './mouth-reader.js';

/** A mouth with its bound, row by row at the times of the runs: oxygen, then gases. */
export interface BoundedMouth {
  readonly at: LayerMouth;
  readonly bounds: Float64Array;
}

/**
 * The worst of several two-layer runs at each mouth, time by time [-].
 *
 * @param one    layers of a model
 * @param runs   what each run assumes, at least one
 * @param mouths mouths wanted
 * @param timesS rising times wanted [s]
 * @returns by mouth: lowest oxygen and highest gases, row by row
 * Source: own-room-air (adverse run). Assumes: as layerFlows. Accuracy: MIDDLING.
 */
export function worstLayered(
  one: LayerCase,
  runs: readonly LayerParameters[],
  mouths: readonly BoundedMouth[],
  timesS: readonly number[],
): readonly Float64Array[] {
  const width = one.columnsOf.length + 1;
  const layout = zoneLayout(one.network);
  const row = new Float64Array(width);
  const worst = mouths.map(() => new Float64Array(timesS.length * width));
  for (const [run, parameters] of runs.entries()) {
    const readers = mouths.map(({ at, bounds }, m) => ({
      read: mouthReader(one, at, parameters),
      bounds,
      into: worst[m] ?? row,
    }));
    let i = 0;
    followLayers(one.network, layout, parameters, timesS, MIDDLING, (t, _state, zones) => {
      for (const { read, bounds, into } of readers) {
        read(t, zones, bounds, i * width, row, 0);
        if (run === 0) into.set(row, i * width);
        else keepWorse(row, into, i * width, width);
      }
      i++;
    });
  }
  return worst;
}
