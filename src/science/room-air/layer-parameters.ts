import type { AirLayerOverrides } from './air-input.js';
import { PLUME_ENTRAINMENT, plumeConstant } from './plume.js';
import { LEAST_SMEAR_M } from './smear.js';

/** What a two-layer run assumes beyond the input. */
export interface LayerParameters {
  /** First dilution of every release [-]; undefined: by its manner. */
  readonly sourceDilution: number | undefined;
  /** Velocity scale of the turbulence u [m/s]. */
  readonly turbulenceMPerS: number;
  /** Exchange by people walking w_x [m/s]. */
  readonly walkingMPerS: number;
  readonly smearM: number;
  /** Share of the free-fall entrainment eps [-]. */
  readonly fallEntrainment: number;
  /** Entrainment at the edge of what is let go at once, alpha [-]. */
  readonly edgeEntrainment: number;
  /** Where surplus leaves: 0 from above, 1 from the layer. */
  readonly surplusFromLayer: number;
  /** 1: diffusion smears the layer; 0: it does not. */
  readonly diffusion: 0 | 1;
  readonly plumeConstant: number;
  /** 1: supply jets stir a layer as stated; 0: they do not. */
  readonly jets: 0 | 1;
  /** Contrast below which an unfed layer joins the air above it [-]. */
  readonly joinContrast: number;
}

/** Velocity scale of the turbulence, about a tenth of the air speed of a room [m/s]. */
export const USUAL_TURBULENCE_M_PER_S = 0.01;
const USUAL_FALL_ENTRAINMENT = 0.17;
const USUAL_EDGE_ENTRAINMENT = 0.4;

/** Contrast below which an old layer is no longer told from the air above it [-]. */
const SAME_AIR = 1e-4;

/** The usual run: medians of the default distributions, with the overrides of the input. */
export function usualLayers(overrides: AirLayerOverrides = {}): LayerParameters {
  return {
    sourceDilution: overrides.sourceDilution,
    turbulenceMPerS: overrides.turbulenceVelocityMPerS ?? USUAL_TURBULENCE_M_PER_S,
    walkingMPerS: overrides.walkingExchangeMPerS ?? 0,
    smearM: overrides.smearHeightM ?? LEAST_SMEAR_M,
    fallEntrainment: overrides.fallEntrainment ?? USUAL_FALL_ENTRAINMENT,
    // A stated first dilution is taken to hold what the edge entrains.
    edgeEntrainment:
      overrides.edgeEntrainment ??
      (overrides.sourceDilution === undefined ? USUAL_EDGE_ENTRAINMENT : 0),
    surplusFromLayer: 0,
    diffusion: 1,
    plumeConstant: plumeConstant(PLUME_ENTRAINMENT),
    jets: 1,
    joinContrast: SAME_AIR,
  };
}

/**
 * The runs without any mixing of which the worst is shown: no turbulence, no smear, no walking;
 * over the range of fall entrainment, of source dilution and of where surplus leaves.
 */
export function adverseLayers(
  overrides: AirLayerOverrides,
  hasFalls: boolean,
  hasNeighbours: boolean,
): readonly LayerParameters[] {
  const usual = usualLayers(overrides);
  const dilutions = overrides.sourceDilution === undefined ? [1, 10] : [overrides.sourceDilution];
  const falls =
    overrides.fallEntrainment !== undefined || !hasFalls ? [usual.fallEntrainment] : [0.03, 0.1, 1];
  // Where surplus leaves matters to the neighbours, whatever the fall: once is enough for each.
  const middleFall = falls[Math.floor(falls.length / 2)] ?? usual.fallEntrainment;
  return dilutions.flatMap((sourceDilution) =>
    falls.flatMap((fallEntrainment) =>
      (hasNeighbours && fallEntrainment === middleFall ? [0, 1] : [0]).map((surplusFromLayer) => ({
        ...usual,
        sourceDilution,
        fallEntrainment,
        edgeEntrainment: 0,
        surplusFromLayer,
        turbulenceMPerS: 0,
        walkingMPerS: 0,
        diffusion: 0 as const,
        jets: 0 as const,
      })),
    ),
  );
}
