import { GRAVITY_M_PER_S2 } from './air-constants.js';

/** Critical flow over a broad edge [-]: (2/3)^(3/2). */
export const WEIR_CONSTANT = (2 / 3) ** 1.5;
/** The same in the grille form, rounded as its source states it [-]. */
const GRILLE_CONSTANT = 0.544;

/**
 * Reduced gravity of a layer with its own density as reference [m/s2], for weirs and grilles.
 *
 *   gw = g (rho_l - rho_a)/rho_l, not below 0
 *
 * @param layer density or molar mass of the layer [any unit]
 * @param above the same of the air above it [same unit]
 * @returns reduced gravity [m/s2]
 * Source: own-room-air (the inertia is the layer's own). Assumes: one temperature. Accuracy: exact.
 */
export function layerGravity(layer: number, above: number): number {
  return Math.max(0, (GRAVITY_M_PER_S2 * (layer - above)) / layer);
}

/**
 * Flow of a layer over an edge [m3/s].
 *
 *   Q = (2/3)^(3/2) W sqrt(gw) h^(3/2)
 *
 * @param widthM  width of the edge W [m]
 * @param gravity gw [m/s2], 0 or more
 * @param headM   depth above the edge h [m]; 0 or less: no flow
 * @returns flow [m3/s]
 * Source: own-room-air (critical flow). Assumes: still pool behind the edge. Accuracy: not stated.
 */
export function weirFlow(widthM: number, gravity: number, headM: number): number {
  return headM > 0 ? WEIR_CONSTANT * widthM * Math.sqrt(gravity * headM) * headM : 0;
}

/**
 * Time scale of a pool that drains over an edge [s].
 *
 *   tau = 2 A/((2/3)^(3/2) W sqrt(gw h0)) in h = h0/(1 + t/tau)^2
 *
 * @param areaM2  area of the pool A [m2]
 * @param widthM  width of the edge W [m]
 * @param gravity gw [m/s2]
 * @param depthM  depth at the start h0 [m]
 * @returns time scale [s]
 * Source: own-room-air. Assumes: no mixing, no inflow. Accuracy: exact for that law.
 */
export function drainTime(areaM2: number, widthM: number, gravity: number, depthM: number): number {
  return (2 * areaM2) / (WEIR_CONSTANT * widthM * Math.sqrt(gravity * depthM));
}

/**
 * Depth of a pool that drains over an edge [m].
 *
 *   h = h0/(1 + t/tau)^2
 *
 * @param depthM depth at the start h0 [m]
 * @param t      time [s]
 * @param drainTimeS tau [s]
 * @returns depth [m]
 * Source: own-room-air. Assumes: as drainTime. Accuracy: exact for that law.
 */
export function drainedDepth(depthM: number, t: number, drainTimeS: number): number {
  return depthM / (1 + t / drainTimeS) ** 2;
}

/**
 * Velocity at which turbulence exchanges a layer with the air above it [m/s].
 *
 *   w = 0.65 u/(1 + 0.2 Ri), Ri = g' h/u^2; 0 when u = 0
 *
 * @param speedMPerS  velocity scale of the turbulence u [m/s], 0 or more
 * @param gPrime      reduced gravity, air as reference [m/s2], 0 or more
 * @param depthM      layer depth h [m]
 * @returns velocity [m/s]
 * Source: robins-2001. Assumes: friction velocity as scale. Accuracy: fitted for Ri below 15;
 * beyond, an extrapolation whose error has no known sign.
 * @example turbulentExchange(0.03, 1.02, 0.05) // 0.0015810811
 */
export function turbulentExchange(speedMPerS: number, gPrime: number, depthM: number): number {
  if (speedMPerS <= 0) return 0;
  return (0.65 * speedMPerS) / (1 + (0.2 * gPrime * depthM) / speedMPerS ** 2);
}

/**
 * Flow of a layer that a supply jet carries off into the air above [m3/s].
 *
 *   E pi b^2 w, Fr = w/sqrt(b g'), E = 0.24 Fr^2 up to Fr 0.42/0.24, 0.42 Fr beyond
 *
 * @param radiusM    radius of the jet at the layer b [m], above 0
 * @param speedMPerS speed of the jet at the layer w [m/s], 0 or more
 * @param gPrime     reduced gravity of the layer [m/s2], 0 or more
 * @returns flow [m3/s]; 0 without contrast: there is then no layer to erode
 * Source: shrinivas-hunt-2014. Assumes: round jet, unconfined; weak and strong form joined where
 * they meet. Accuracy: confinement changes it; engineering use with measured b and w only.
 * @example jetErosion(0.5, 0.3, 0.5) // 0.0203575204
 */
export function jetErosion(radiusM: number, speedMPerS: number, gPrime: number): number {
  if (gPrime <= 0 || speedMPerS <= 0) return 0;
  const froude = speedMPerS / Math.sqrt(radiusM * gPrime);
  const entrainment = Math.min(0.24 * froude ** 2, 0.42 * froude);
  return entrainment * Math.PI * radiusM ** 2 * speedMPerS;
}

/** A low extract grille. */
export interface LowGrille {
  readonly flowM3PerS: number;
  readonly widthM: number;
  readonly topM: number;
}

/**
 * Radius around a grille within which its approach speed passes the wave speed of the layer [m].
 *
 *   r = sqrt(QL/(pi sqrt(gw h)))
 *
 * @param flowM3PerS extract QL [m3/s]
 * @param gravity    gw [m/s2], above 0
 * @param depthM     layer depth h [m], above 0
 * @returns radius [m]
 * Source: engineering-judgement (thin-layer limit). Assumes: layer lies to the grille. Accuracy:
 * judgement.
 */
export function grilleRadius(flowM3PerS: number, gravity: number, depthM: number): number {
  return Math.sqrt(flowM3PerS / (Math.PI * Math.sqrt(gravity * depthM)));
}

/**
 * What a low grille takes from a layer [m3/s]; the rest of its flow is air from above.
 *
 *   L = min(QL min(h/hg, 1), 0.544 (Wg + pi r) sqrt(gw) h^(3/2))
 *
 * @param grille  flow QL [m3/s], width Wg [m], top hg [m]
 * @param gravity gw [m/s2]
 * @param depthM  layer depth at the grille h [m]
 * @returns flow from the layer [m3/s]; 0 when any of them is 0
 * Source: engineering-judgement (critical flow towards the grille). Assumes: as grilleRadius.
 * Accuracy: judgement.
 */
export function grilleIntake(grille: LowGrille, gravity: number, depthM: number): number {
  if (grille.flowM3PerS <= 0 || gravity <= 0 || depthM <= 0) return 0;
  const plug = grille.flowM3PerS * Math.min(depthM / grille.topM, 1);
  const radius = grilleRadius(grille.flowM3PerS, gravity, depthM);
  const limit =
    GRILLE_CONSTANT * (grille.widthM + Math.PI * radius) * Math.sqrt(gravity * depthM) * depthM;
  return Math.min(plug, limit);
}

/**
 * First outflow of a tank of dense gas through a hole in its base [m3/s].
 *
 *   Q = Cd a sqrt(2 g'' h), g'' = g (rho - rho_a)/rho
 *
 * @param holeM2  area of the hole a [m2]
 * @param gravity g'' [m/s2]
 * @param depthM  depth of gas h [m]
 * @param dischargeCoefficient Cd [-]
 * @returns flow [m3/s]
 * Source: own-room-air (Torricelli with buoyancy). Assumes: unmixed gas. Accuracy: that of Cd.
 */
export function tankOutflow(
  holeM2: number,
  gravity: number,
  depthM: number,
  dischargeCoefficient: number,
): number {
  return dischargeCoefficient * holeM2 * Math.sqrt(2 * gravity * depthM);
}

/**
 * Time in which a tank of dense gas empties through a hole in its base [s].
 *
 *   2 At h0/Q0
 *
 * @param planM2   plan area of the tank At [m2]
 * @param depthM   depth at the start h0 [m]
 * @param outflowM3PerS first outflow Q0 [m3/s]
 * @returns time [s]
 * Source: own-room-air. Assumes: as tankOutflow. Accuracy: that of Cd.
 */
export function tankEmptyingTime(planM2: number, depthM: number, outflowM3PerS: number): number {
  return (2 * planM2 * depthM) / outflowM3PerS;
}
