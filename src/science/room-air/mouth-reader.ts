import { GRAVITY_M_PER_S2 } from './air-constants.js';
import { spaceAt } from './air-model.js';
import { bodyHeatShare } from './body-heat.js';
import type { LayerCase, LayerMouth } from './layer-case.js';
import type { LayerParameters } from './layer-parameters.js';
import type { ZoneState } from './layer-zones.js';
import { LEAST_REPORTED_M, reportedFraction, smearHeight } from './smear.js';

/**
 * Writes what the two-layer answer shows at a mouth at one moment: oxygen, then each gas [-].
 *
 * @param t     time [s], not before that of the call before
 * @param zones fractions, depths and molar masses at that time
 * @param bound oxygen and gases of the inventory bound at the mouth, from an index on
 * @param out   written from an index on
 * @param mixed well-mixed oxygen and gases of the run that the bound belongs to, from the index of the
 *   bound on. Where the air above the layers holds more than that, as in a draw with less fresh air,
 *   the bound is moved by as much.
 */
export type MouthReader = (
  t: number,
  zones: ZoneState,
  bound: Float64Array,
  boundAt: number,
  out: Float64Array,
  outAt: number,
  mixed?: Float64Array,
) => void;

interface LayerHere {
  readonly zone: number;
  readonly side: 'floor' | 'ceiling';
  readonly diffusivityM2PerS: number;
  /** From the base of the layer to the mouth [m]. */
  readonly distanceM: number;
  /** When releases reach the mouth as a layer, rising, and until when each is a first pass [s]. */
  readonly fromS: Float64Array;
  readonly untilS: Float64Array;
}

/**
 * What a mouth breathes of the two-layer answer, moment by moment.
 *
 *   max(xu, min(xl, bound)) where a layer with its smear reaches the mouth, else xu; of a weak layer
 *   body heat lifts a share to any mouth, xu + (xl - xu) (h/z)^(3/4), which the bound does not cut
 *   (bodyHeatShare), no more than the bound cuts while the first pass lasts
 *
 * @param one        layers of a model
 * @param at         mouth
 * @param parameters what the run assumes: the least smear is one of it
 * @returns reader, to be asked in rising time: smear grows from when a layer was last gone
 * Source: own-room-air (reporting at breathing height, rule on body heat). Assumes: level layers.
 * Accuracy: judgement.
 */
export function mouthReader(
  one: LayerCase,
  at: LayerMouth,
  parameters: LayerParameters,
): MouthReader {
  const { network, releases, columnsOf } = one;
  const { space } = at.mouth;
  const { curve } = spaceAt(network.model, space);
  const k = network.components.length;
  const upper = network.layers.length + (network.groupOf[space] ?? 0);
  const width = columnsOf.length + 1;
  const columns = columnsOf.flatMap((list, q) => list.map((column) => ({ q: q + 1, column })));
  const quantities = Int32Array.from(columns, ({ q }) => q);
  const components = Int32Array.from(columns, ({ column }) => column);
  const started = releases
    .map((release) => ({
      from: Math.max(release.plan.startS, release.reachS[space] ?? Infinity),
      until: release.plan.space === space ? release.passEndS : release.plan.startS,
      side: release.gathering === 'above' ? 'ceiling' : 'floor',
    }))
    .sort((a, b) => a.from - b.from);
  const here = network.layers.flatMap((layer, zone): LayerHere[] => {
    if (layer.space !== space) return [];
    const passes = started.filter((pass) => pass.side === layer.side);
    return [
      {
        zone,
        side: layer.side,
        diffusivityM2PerS: layer.diffusivityM2PerS,
        distanceM: layer.side === 'floor' ? at.levelM : curve.heightM - at.levelM,
        fromS: Float64Array.from(passes, ({ from }) => from),
        untilS: Float64Array.from(passes, ({ until }) => until),
      },
    ];
  });
  const bornS = new Float64Array(here.length).fill(Number.NaN);
  /** How many of the passes have begun, and when the last of those ends. */
  const begun = new Int32Array(here.length);
  const passEndS = new Float64Array(here.length).fill(-Infinity);
  const above = new Float64Array(width);
  const inside = new Float64Array(width);
  const read = (zones: ZoneState, zone: number, into: Float64Array): void => {
    const from = zone * k;
    into.fill(0);
    into[0] = zones.fractions[from] ?? 0;
    for (let i = 0; i < components.length; i++) {
      const q = quantities[i] ?? 0;
      const sum = (into[q] ?? 0) + (zones.fractions[from + (components[i] ?? 0)] ?? 0);
      into[q] = sum > 1 ? 1 : sum;
    }
  };
  return (t, zones, bound, boundAt, out, outAt, mixed) => {
    read(zones, upper, above);
    for (let q = 0; q < width; q++) out[outAt + q] = above[q] ?? 0;
    for (let i = 0; i < here.length; i++) {
      const layer = here[i];
      if (!layer) continue;
      const depth = zones.depths[layer.zone] ?? 0;
      if (depth < LEAST_REPORTED_M) {
        bornS[i] = Number.NaN;
        continue;
      }
      let next = begun[i] ?? 0;
      let endS = passEndS[i] ?? -Infinity;
      while ((layer.fromS[next] ?? Infinity) <= t)
        endS = Math.max(endS, layer.untilS[next++] ?? endS);
      begun[i] = next;
      passEndS[i] = endS;
      const isFirstPass = endS > t;
      const latest = next > 0 ? (layer.fromS[next - 1] ?? -Infinity) : -Infinity;
      // A layer seen for the first time is as old as the release that made it.
      if (Number.isNaN(bornS[i])) bornS[i] = Number.isFinite(latest) ? latest : t;
      const smear = smearHeight(
        layer.diffusivityM2PerS,
        t - (bornS[i] ?? t),
        parameters.smearM,
        isFirstPass ? depth : 0,
      );
      const sign = layer.side === 'floor' ? 1 : -1;
      const heavier =
        sign * ((zones.molarMasses[layer.zone] ?? 0) - (zones.molarMasses[upper] ?? 0));
      const gPrime = (GRAVITY_M_PER_S2 * heavier) / network.airMolarMassKgPerMol;
      const lifted =
        layer.side === 'floor' ? bodyHeatShare(gPrime, depth - at.floorM, at.mouth.heightM) : 0;
      const isReached = depth + smear >= layer.distanceM;
      if (!isReached && lifted <= 0) continue;
      read(zones, layer.zone, inside);
      const airAbove = above[0] ?? 0;
      const oxygen = inside[0] ?? 0;
      const less = mixed ? Math.max(0, (mixed[boundAt] ?? 0) - airAbove) : 0;
      const least = isFirstPass ? oxygen : Math.max(oxygen, (bound[boundAt] ?? 0) - less);
      out[outAt] = Math.min(
        out[outAt] ?? 1,
        isReached ? least : airAbove,
        airAbove + lifted * (oxygen - airAbove),
      );
      for (let q = 1; q < width; q++) {
        const xl = inside[q] ?? 0;
        const xu = above[q] ?? 0;
        const more = mixed ? Math.max(0, xu - (mixed[boundAt + q] ?? 0)) : 0;
        const limit = isFirstPass ? 1 : (bound[boundAt + q] ?? 1) + more;
        out[outAt + q] = Math.max(
          out[outAt + q] ?? 0,
          reportedFraction(xl, xu, limit, depth, smear, layer.distanceM),
          xu + lifted * (xl - xu),
        );
      }
    }
  };
}
