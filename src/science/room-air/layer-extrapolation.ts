import type { LayerFlows } from './layer-flows.js';
import type { LayerNetwork } from './layer-network.js';
import { implicitStep } from './layer-step.js';
import type { ZoneLayout } from './layer-zones.js';
import { LEAST_REPORTED_M } from './smear.js';

/** How closely the layers are followed. */
export interface LayerAccuracy {
  /** Error a step may make, relative to what is there [-]. */
  readonly relative: number;
  /** Columns of the extrapolation: its order. */
  readonly order: 2 | 3 | 4;
}

/** Single runs: their error is far below it, as the column before the last one is held to it. */
export const FINE: LayerAccuracy = { relative: 1e-3, order: 3 };
/** The bracket without any mixing, of which only the worst is shown. */
export const MIDDLING: LayerAccuracy = { relative: 5e-3, order: 2 };
/** One of many runs of a band, whose inputs are known to a few per cent at best. */
export const COARSE: LayerAccuracy = { relative: 1e-2, order: 2 };

/** Depth [m] and fraction [-] that a step may miss at a relative error of 1. */
const DEPTH_SCALE_M = 0.1;
const FRACTION_SCALE = 0.01;

/** A step with its error over what is allowed; above 1 it must be taken again, shorter. */
export type ExtrapolatedStep = (
  flows: LayerFlows,
  t: number,
  h: number,
  state: Float64Array,
  next: Float64Array,
) => number;

/**
 * A step of the layers by extrapolation: linearly implicit Euler (implicitStep) with 1, 2, 3 .. parts;
 * the difference of the last two columns is its error.
 */
export function extrapolatedStep(
  network: LayerNetwork,
  layout: ZoneLayout,
  accuracy: LayerAccuracy,
): ExtrapolatedStep {
  const { k, layers, held, amounts, size } = layout;
  const step = implicitStep(layout, network.outdoor);
  const { order, relative } = accuracy;
  const columns = Array.from({ length: order }, () => new Float64Array(size));
  const part = new Float64Array(size);
  const column = (i: number): Float64Array => columns[i] ?? part;
  const areas = Float64Array.from(network.layers, (layer) => layer.basin.areaM2);

  /** Largest difference of two results over what is allowed; NaN where the first is out of range. */
  const difference = (a: Float64Array, b: Float64Array): number => {
    let worst = 0;
    for (let z = 0; z < held; z++) {
      const volume = a[z] ?? 0;
      const other = b[z] ?? 0;
      if (volume < 0) return Number.NaN;
      if (volume <= 0 && other <= 0) continue;
      const scale = Math.max(volume, other);
      const change = volume - other;
      let weight = 1;
      if (z < layers) {
        const area = areas[z] ?? 1;
        worst = Math.max(worst, Math.abs(change) / (scale + DEPTH_SCALE_M * area));
        // The fraction of a layer that is not reported need not be followed closely.
        weight = Math.min(1, scale / (LEAST_REPORTED_M * area));
      }
      const from = amounts + z * k;
      for (let c = 0; c < k; c++) {
        const amount = a[from + c] ?? 0;
        if (amount < -1e-12 || amount > volume + 1e-12) return Number.NaN;
        const x = volume > 0 ? amount / volume : 0;
        const off = Math.abs(amount - (b[from + c] ?? 0) - x * change) / scale;
        worst = Math.max(worst, (weight * off) / (x + FRACTION_SCALE));
      }
    }
    return worst / relative;
  };

  return (flows, t, h, state, next) => {
    for (let j = 0; j < order; j++) {
      const parts = j + 1;
      let now = state;
      for (let i = 0; i < parts; i++) {
        const length = h / parts;
        const target = (parts - i) % 2 === 1 ? column(j) : part;
        const table =
          i === 0 ? flows.fromStart(t, length, state) : flows.at(t + i * length, length, now);
        if (!step(table, length, now, target)) return 1e6;
        now = target;
      }
      for (let i = j; i > 0; i--) {
        const weight = 1 / (parts / i - 1);
        const right = column(i);
        const left = column(i - 1);
        for (let at = 0; at < size; at++) {
          const value = right[at] ?? 0;
          left[at] = value + weight * (value - (left[at] ?? 0));
        }
      }
    }
    const error = difference(column(0), column(1));
    if (!Number.isNaN(error)) {
      next.set(column(0));
      return error;
    }
    // The finest of the parts is a mean of means: it never leaves the range.
    next.set(column(order - 1));
    return difference(next, column(order - 2));
  };
}
