import type { AirGasTable } from './air-gases.js';
import type { AirModel } from './air-model.js';
import type { AirSeries, SpaceLayers } from './air-result.js';
import { rowsAt } from './air-series.js';
import type { FlatTrack } from './answer-track.js';
import { layerCase, layerMouth } from './layer-case.js';
import { adverseLayers, usualLayers } from './layer-parameters.js';
import { layeredRows, spaceLayers } from './layered-answer.js';
import { layeredTrack } from './layered-track.js';
import { worstLayered } from './layered-worst.js';
import type { BoundMouth } from './zone-bound.js';

/** A mouth that the layers are asked for, with its bound. */
export interface AskedMouth {
  readonly mouth: BoundMouth;
  readonly floorLevelM: number | undefined;
  readonly bound: FlatTrack;
}

/** The two-layer answer at one mouth. */
export interface MouthLayers {
  readonly usual: FlatTrack;
  /** The worst of the runs without any mixing, at the same times; undefined where not asked for. */
  readonly adverse: Float64Array | undefined;
}

/** The usual two-layer run, and at each mouth the worst of those without any mixing. */
export interface LayerRuns {
  readonly mouths: readonly MouthLayers[];
  /** Largest share of a component that the usual run gained or lost [-]. */
  readonly balanceError: number;
  spaceLayers(space: number, timesS: readonly number[]): SpaceLayers;
}

/**
 * The two-layer answer of a model at its mouths.
 *
 * @param model   resolved input
 * @param gases   gas table
 * @param asked   mouths wanted
 * @param nodesS  rising times [s]
 * @param wantsAdverse whether the runs without any mixing are wanted
 * @returns the answers in the order of the mouths; undefined where nothing gathers as a layer
 * Source: own-room-air. Assumes: as layerFlows. Accuracy: FINE for the usual run, MIDDLING for the
 * others.
 */
export function layerRuns(
  model: AirModel,
  gases: AirGasTable,
  asked: readonly AskedMouth[],
  nodesS: Float64Array,
  wantsAdverse: boolean,
): LayerRuns | undefined {
  const one = layerCase(model, gases);
  const { network } = one;
  if (network.layers.length === 0) return undefined;
  const timesS = [...new Set(nodesS)];
  const overrides = model.input.layers ?? {};
  const usual = usualLayers(overrides);
  const track = layeredTrack(network, usual, timesS);
  const bounded = asked.map(({ mouth, floorLevelM, bound }) => ({
    at: layerMouth(model, mouth, floorLevelM),
    bounds: rowsAt(bound, timesS),
  }));
  const hasFalls = network.weirs.some((weir) => weir.b >= 0 && weir.sillA !== weir.sillB);
  const adverse = wantsAdverse
    ? worstLayered(
        one,
        adverseLayers(overrides, hasFalls, network.groupVolumesM3.length > 1),
        bounded,
        timesS,
      )
    : [];
  return {
    balanceError: track.balanceError,
    mouths: bounded.map(({ at, bounds }, m) => ({
      usual: layeredRows(one, track, at, usual, bounds),
      adverse: adverse[m],
    })),
    spaceLayers: (space, wantedS) => spaceLayers(one, track, space, model.gases, wantedS),
  };
}

/** Layers of a space in which none lies: everywhere the mixed air. */
export function noLayers({ oxygenFraction, gasFraction }: AirSeries): SpaceLayers {
  const none = oxygenFraction.map(() => 0);
  const same = { oxygenFraction, gasFraction };
  return {
    floorLayerDepthM: none,
    ceilingLayerDepthM: none,
    floorLayer: same,
    middle: same,
    ceilingLayer: same,
  };
}
