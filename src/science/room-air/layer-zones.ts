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
 * Reads a state into fractions, molar masses and depths; an empty layer has the air above it.
 *
 * @param network layers and upper zones
 * @param layout  layout of the state
 * @param excess  by component, excess over the molar mass of air in a layer [kg/mol]; a cold gas
 *   weighs more there than in the warm air above
 * @param state   state to read
 * @param into    written
 */
export function readZones(
  network: LayerNetwork,
  layout: ZoneLayout,
  excess: Float64Array,
  state: Float64Array,
  into: ZoneState,
): void {
  const { k, layers, held, amounts } = layout;
  const { fractions, molarMasses, depths } = into;
  const air = network.airMolarMassKgPerMol;
  for (let z = held - 1; z >= 0; z--) {
    const volume = state[z] ?? 0;
    const layer = z < layers ? network.layers[z] : undefined;
    if (layer) depths[z] = basinLevel(layer.basin, volume);
    const isEmpty = volume <= 0;
    const from = isEmpty && layer ? (layers + layer.group) * k : amounts + z * k;
    let molar = air;
    for (let c = 0; c < k; c++) {
      const x = isEmpty ? (fractions[from + c] ?? 0) : (state[from + c] ?? 0) / volume;
      fractions[z * k + c] = x;
      molar += x * (layer ? (excess[c] ?? 0) : (network.components[c]?.excessKgPerMol ?? 0));
    }
    molarMasses[z] = molar;
  }
}
