import { basinLevel } from './layer-geometry.js';
import type { LayerNetwork } from './layer-network.js';

/**
 * Where everything lies in the state of the layers.
 *
 * Volumes first (layers, then upper zones), then the amounts of the components zone by zone, then
 * what has gone outdoors and what has come in. Volumes and amounts in m3 at ambient conditions. A
 * unit that mixes what several spaces give back is a zone without volume; it has no state.
 */
export interface ZoneLayout {
  readonly k: number;
  readonly layers: number;
  /** Layers and upper zones. */
  readonly held: number;
  /** Those and the mixers of recirculating units. */
  readonly zones: number;
  /** First component of zone 0. */
  readonly amounts: number;
  readonly out: number;
  readonly into: number;
  readonly size: number;
}

/** Layout of the state of a network: counts, and the offsets that follow from them. */
export function zoneLayout(network: LayerNetwork): ZoneLayout {
  const k = network.components.length;
  const layers = network.layers.length;
  const held = layers + network.groupVolumesM3.length;
  const zones = held + (network.model.input.airSystems ?? []).length;
  const out = held + held * k;
  return { k, layers, held, zones, amounts: held, out, into: out + k, size: out + 2 * k };
}

/** Fractions, molar masses and depths of all zones at one state. */
export interface ZoneState {
  readonly fractions: Float64Array;
  readonly molarMasses: Float64Array;
  /** Level of each layer above its own base [m]. */
  readonly depths: Float64Array;
}

/** Work space of the size that a layout needs, for readZones to fill. */
export function emptyZoneState(layout: ZoneLayout): ZoneState {
  return {
    fractions: new Float64Array(layout.held * layout.k),
    molarMasses: new Float64Array(layout.held),
    depths: new Float64Array(layout.layers),
  };
}

/**
 * Reads what drives the flows at a state: molar masses and depths; an empty layer weighs what the air
 * above it weighs.
 *
 * @param network layers and upper zones
 * @param layout  layout of the state
 * @param excess  by component, excess over the molar mass of air in a layer [kg/mol]; a cold gas
 *   weighs more there than in the warm air above
 * @param state   state to read
 * @param into    its molar masses and depths are written
 */
export function readDensities(
  network: LayerNetwork,
  layout: ZoneLayout,
  excess: Float64Array,
  state: Float64Array,
  into: ZoneState,
): void {
  const { k, layers, held, amounts } = layout;
  const { molarMasses, depths } = into;
  const air = network.airMolarMassKgPerMol;
  const { excessAbove } = network;
  for (let z = held - 1; z >= 0; z--) {
    const volume = state[z] ?? 0;
    const isLayer = z < layers;
    if (isLayer) {
      const layer = network.layers[z];
      if (!layer) continue;
      if (volume <= 0) {
        depths[z] = 0;
        molarMasses[z] = molarMasses[layers + layer.group] ?? air;
        continue;
      }
      depths[z] = basinLevel(layer.basin, volume);
    }
    const weights = isLayer ? excess : excessAbove;
    const from = amounts + z * k;
    let sum = 0;
    for (let c = 0; c < k; c++) sum += (state[from + c] ?? 0) * (weights[c] ?? 0);
    molarMasses[z] = volume > 0 ? air + sum / volume : air;
  }
}

/** Reads a state whole: what drives the flows, and the fractions, within 0 and 1. */
export function readZones(
  network: LayerNetwork,
  layout: ZoneLayout,
  excess: Float64Array,
  state: Float64Array,
  into: ZoneState,
): void {
  readDensities(network, layout, excess, state, into);
  const { k, layers, held, amounts } = layout;
  const { fractions } = into;
  for (let z = held - 1; z >= 0; z--) {
    const volume = state[z] ?? 0;
    const above = z < layers ? layers + (network.layers[z]?.group ?? 0) : z;
    for (let c = 0; c < k; c++) {
      const x =
        volume > 0 ? (state[amounts + z * k + c] ?? 0) / volume : (fractions[above * k + c] ?? 0);
      fractions[z * k + c] = x < 0 ? 0 : x > 1 ? 1 : x;
    }
  }
}
