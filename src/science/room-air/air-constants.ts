/** Oxygen in dry outdoor air [-], as rounded throughout the room-air models. Source: iso-2533. */
export const OXYGEN_IN_DRY_AIR = 0.2095;
/** Carbon dioxide outdoors [-]. Source: engineering-judgement (rounded present-day mean). */
export const CARBON_DIOXIDE_OUTDOORS = 420e-6;
/** Standard acceleration of free fall as used in the models [m/s2]. */
export const GRAVITY_M_PER_S2 = 9.81;
/** Molar mass of dry air as rounded in the models [kg/mol]. Source: iso-2533. */
export const AIR_MOLAR_MASS_KG_PER_MOL = 0.02896;
/** Molar gas constant [J/(mol K)]. Source: si-2019. */
export const MOLAR_GAS_CONSTANT = 8.314462618;
/** State at which reference volumes are given. */
export const REFERENCE_TEMPERATURE_K = 293.15;
export const REFERENCE_PRESSURE_PA = 101325;
/** Mouth height of somebody fallen or picking something up, always evaluated [m]. */
export const FALLEN_HEIGHT_M = 0.2;
