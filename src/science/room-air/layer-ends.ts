import type { LayerFlows } from './layer-flows.js';
import type { LayerNetwork } from './layer-network.js';
import type { ZoneLayout } from './layer-zones.js';

/** Upper air below this share of its zone: the whole becomes one mixed zone [-]. */
const LEAST_UPPER_SHARE = 0.02;
/** Excess of the wrong sign, over the molar mass of air, at which a layer turns over [-]. */
const TURNED = 1e-6;
/** A layer below this depth has drained [m]. */
const DRAINED_M = 1e-7;
/** Oxygen and the carbon dioxide of the air come first among the components. */
const BACKGROUND_COMPONENTS = 2;

/** Layers that have ended join the air above them, in the state itself. */
export function joinEndedLayers(
  network: LayerNetwork,
  layout: ZoneLayout,
  excess: Float64Array,
  state: Float64Array,
  flows: LayerFlows,
  joined: Set<number>,
  joinContrast: number,
): void {
  const { k, layers, amounts } = layout;
  const unite = (l: number): void => {
    const zone = layers + (network.layers[l]?.group ?? 0);
    state[zone] = (state[zone] ?? 0) + (state[l] ?? 0);
    state[l] = 0;
    for (let c = 0; c < k; c++) {
      const to = amounts + zone * k + c;
      state[to] = (state[to] ?? 0) + (state[amounts + l * k + c] ?? 0);
      state[amounts + l * k + c] = 0;
    }
  };
  for (let l = 0; l < layers; l++) {
    const layer = network.layers[l];
    const volume = state[l] ?? 0;
    if (!layer || volume <= 0) continue;
    const g = layers + layer.group;
    const above = state[g] ?? 0;
    if (above < LEAST_UPPER_SHARE * (network.groupVolumesM3[layer.group] ?? 1)) {
      for (let other = 0; other < layers; other++) {
        const one = network.layers[other];
        if (one?.group !== layer.group) continue;
        if ((state[other] ?? 0) > 0) unite(other);
        joined.add(one.space);
      }
      continue;
    }
    const isFed = flows.isFed(l);
    let heavier = 0;
    let contrast = 0;
    for (let c = 0; c < k; c++) {
      const here = (state[amounts + l * k + c] ?? 0) / volume;
      const there = (state[amounts + g * k + c] ?? 0) / above;
      heavier += (excess[c] ?? 0) * here - (network.excessAbove[c] ?? 0) * there;
      // Behind oxygen and the carbon dioxide of the air stands what is released.
      if (c >= BACKGROUND_COMPONENTS) contrast += here - there;
    }
    const wrongWay = layer.side === 'ceiling' ? heavier : -heavier;
    const isTurned = wrongWay > TURNED * network.airMolarMassKgPerMol;
    const isDrained = volume < DRAINED_M * layer.basin.areaM2;
    if (isTurned || (!isFed && (isDrained || contrast < joinContrast))) unite(l);
  }
}
