import type { AirGasTable } from './air-gases.js';
import { spaceAt, type AirModel } from './air-model.js';
import { layerNetwork, withoutPulses, type LayerNetwork } from './layer-network.js';
import { boundReleases, type BoundMouth, type BoundRelease } from './zone-bound.js';

/** The layers of a model, ready to be run with several sets of parameters. */
export interface LayerCase {
  readonly network: LayerNetwork;
  readonly releases: readonly BoundRelease[];
  /** By gas of the model: the components that make it up. */
  readonly columnsOf: readonly (readonly number[])[];
}

/** The layers of a model, with releases at once spread over the seconds a current needs to form. */
export function layerCase(model: AirModel, gases: AirGasTable): LayerCase {
  const continuous = withoutPulses(model);
  const releases = boundReleases(continuous);
  const network = layerNetwork(continuous, gases, releases);
  return {
    network,
    releases,
    columnsOf: model.gases.map((gas) =>
      network.components.flatMap((one, c) =>
        gas === 'O2' ? (c === 0 ? [0] : []) : one.gas === gas && c !== 0 ? [c] : [],
      ),
    ),
  };
}

/** A mouth as the layers see it. */
export interface LayerMouth {
  readonly mouth: BoundMouth;
  /** Mouth and the own floor above the lowest floor of the space [m]. */
  readonly levelM: number;
  readonly floorM: number;
}

/** A mouth above its own floor, referred to the lowest floor of its space. */
export function layerMouth(model: AirModel, mouth: BoundMouth, floorLevelM?: number): LayerMouth {
  const { curve } = spaceAt(model, mouth.space);
  const floorM = (floorLevelM ?? curve.floorLevelM) - curve.floorLevelM;
  return { mouth, floorM, levelM: floorM + mouth.heightM };
}
