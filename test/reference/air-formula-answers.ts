import { GRAVITY_M_PER_S2 } from '../../src/science/room-air/air-constants.js';
import { airRun } from '../../src/science/room-air/air-run.js';
import { decayRate } from '../../src/science/room-air/decay-log.js';
import {
  pushOutFraction,
  sealedFraction,
  straightDisplacementFraction,
  straightDisplacementOxygen,
} from '../../src/science/room-air/displacement.js';
import { sealedPressureRise } from '../../src/science/room-air/pressure-rise.js';
import {
  counterflowLimit,
  doorwayExchange,
  exactDoorwayExchange,
  flowsWithNet,
  neutralLevel,
} from '../../src/science/room-air/doorway.js';
import {
  emptyingBoxLayers,
  fillingTime,
  firstFrontHeight,
  interfaceFraction,
} from '../../src/science/room-air/filling-box.js';
import {
  horizontalExchange,
  horizontalExchangeFroude,
} from '../../src/science/room-air/floor-opening.js';
import {
  arrivalTimeAtOnce,
  edgeDilution,
  frontRadiusAtOnce,
  frontRadiusContinuous,
  initialRadius,
  lockExchangeSpeed,
} from '../../src/science/room-air/gravity-current.js';
import {
  firstPassBound,
  inventoryBound,
  slabBound,
} from '../../src/science/room-air/inventory-bound.js';
import {
  drainedDepth,
  drainTime,
  grilleIntake,
  grilleRadius,
  layerGravity,
  tankEmptyingTime,
  tankOutflow,
  turbulentExchange,
  weirFlow,
} from '../../src/science/room-air/layer-flow.js';
import {
  jetLength,
  mixesByMomentum,
  volumeRichardson,
} from '../../src/science/room-air/momentum.js';
import {
  linePlumeFlow,
  plumeConstant,
  plumeFlow,
  plumeFraction,
} from '../../src/science/room-air/plume.js';
import { idealMolarVolume, siteVolumeFactor } from '../../src/science/room-air/site-volume.js';
import { reportedFraction, smearHeight } from '../../src/science/room-air/smear.js';
import {
  displacementFlow,
  effectiveVentArea,
  singleVentDecayConstant,
  singleVentFraction,
  singleVentFractionWithNet,
  ventDecayFraction,
  type SingleVent,
} from '../../src/science/room-air/vent-flow.js';
import {
  layerLevel,
  ownVolumeBelow,
  planArea,
  volumeAbove,
  volumeBelow,
  volumeCurve,
} from '../../src/science/room-air/volume-curve.js';
import {
  clearDownTime,
  decayingReleaseFraction,
  decayingReleasePeakTime,
} from '../../src/science/room-air/well-mixed.js';
import { checkGases, checkInput } from '../support/air-fixture.js';
import { read, type Answers } from './air-mixed-answers.js';

const AIR = 28.96;
const MOLAR = { He: 4.0026, Ar: 39.948, CO2: 44.0095, SF6: 146.055 } as const;
const G_HELIUM = (GRAVITY_M_PER_S2 * (AIR - MOLAR.He)) / AIR;
const molarVolume = idealMolarVolume(293.15, 101325);

/** Reduced gravity of a fraction of a gas, air as reference. */
function gPrimeOf(molar: number, fraction: number): number {
  return (GRAVITY_M_PER_S2 * fraction * (molar - AIR)) / AIR;
}

function mixture(molar: number, fraction: number): number {
  return AIR + (molar - AIR) * fraction;
}

/** A vent in the shape of the box experiments. */
function squareVent(side: number, dischargeCoefficient: number, gasGPrime: number): SingleVent {
  return { widthM: side, heightM: side, dischargeCoefficient, gasGPrime };
}

/** The one-vent box of the experiments through the run itself, the vent open to outdoors. */
function ventedBox(side: number, releaseM3: number, durationS: number, coefficient: number) {
  const result = airRun(
    checkInput({
      durationS,
      spaces: [{ id: 'box', floorAreaM2: 2.25, heightM: 0.75, volumeM3: 1.6875 }],
      openings: [
        {
          from: 'box',
          to: 'outside',
          kind: 'vent',
          widthM: side,
          heightM: side,
          sillLevelM: 0.7,
          dischargeCoefficient: coefficient,
        },
      ],
      releases: [{ space: 'box', gas: 'He', volumeM3: releaseM3, durationS }],
    }),
    checkGases,
  );
  return result.spaces.box?.mixed.gasFraction.He?.at(-1) ?? Number.NaN;
}

/** Records answered by closed forms and by parts of the models. */
export const formulaAnswers: Answers = {
  'AC-W03': (inputs) => {
    const i = read<{ room_volume_m3: number; gas_volume_m3: number; ambient_pressure_Pa: number }>(
      inputs,
    );
    const result = airRun(
      checkInput({
        durationS: 60,
        spaces: [{ id: 'a', floorAreaM2: i.room_volume_m3, heightM: 1 }],
        releases: [{ space: 'a', gas: 'He', volumeM3: i.gas_volume_m3 }],
      }),
      checkGases,
    );
    const sealed = sealedFraction(i.gas_volume_m3, i.room_volume_m3);
    return {
      gas_fraction_pushout_mixed: result.spaces.a?.mixed.gasFraction.He?.at(-1),
      gas_fraction_air_displaced: straightDisplacementFraction(i.gas_volume_m3, i.room_volume_m3),
      gas_fraction_sealed: sealed,
      oxygen_pushout_mixed: 0.2095 * (1 - pushOutFraction(i.gas_volume_m3, i.room_volume_m3)),
      oxygen_air_displaced: straightDisplacementOxygen(i.gas_volume_m3, i.room_volume_m3),
      oxygen_sealed: 0.2095 * (1 - sealed),
      pressure_rise_sealed_Pa: sealedPressureRise(
        i.gas_volume_m3,
        i.room_volume_m3,
        i.ambient_pressure_Pa,
      ),
    };
  },
  'AC-W04': (inputs) => {
    const i = read<{
      room_volume_m3: number;
      fresh_air_m3_per_s: number;
      initial_release_m3_per_s: number;
      release_decay_time_s: number;
      times_s: readonly number[];
    }>(inputs);
    const space = {
      volumeM3: i.room_volume_m3,
      freshAirM3PerS: i.fresh_air_m3_per_s,
      releaseM3PerS: i.initial_release_m3_per_s,
    };
    const peak = decayingReleasePeakTime(
      i.fresh_air_m3_per_s / i.room_volume_m3,
      i.release_decay_time_s,
    );
    const at = (t: number) => decayingReleaseFraction(space, i.release_decay_time_s, t);
    return { gas_fraction: i.times_s.map(at), time_of_max_s: peak, max_gas_fraction: at(peak) };
  },
  'AC-O01': (inputs) => {
    const i = read<{
      width_m: number;
      height_m: number;
      discharge_coefficient: number;
      helium_fraction: number;
      sf6_fraction: number;
    }>(inputs);
    const helium = mixture(MOLAR.He, i.helium_fraction);
    const sf6 = mixture(MOLAR.SF6, i.sf6_fraction);
    const small = (dense: number, light: number) =>
      doorwayExchange(
        i.width_m,
        i.height_m,
        (2 * GRAVITY_M_PER_S2 * (dense - light)) / (dense + light),
        i.discharge_coefficient,
      );
    const exact = (dense: number, light: number) =>
      exactDoorwayExchange(i.width_m, i.height_m, dense, light, i.discharge_coefficient);
    return {
      a_flow_small_difference_m3_per_s: small(AIR, helium),
      a_flow_exact_m3_per_s: exact(AIR, helium),
      a_neutral_height_m: neutralLevel(i.height_m, AIR, helium),
      b_flow_small_difference_m3_per_s: small(sf6, AIR),
      b_flow_exact_m3_per_s: exact(sf6, AIR),
      b_neutral_height_m: neutralLevel(i.height_m, sf6, AIR),
    };
  },
  'AC-O02': (inputs) => {
    const i = read<{
      width_m: number;
      height_m: number;
      discharge_coefficient: number;
      g_prime_m_per_s2: number;
      net_flow_m3_per_s: number;
    }>(inputs);
    const exchange = doorwayExchange(
      i.width_m,
      i.height_m,
      i.g_prime_m_per_s2,
      i.discharge_coefficient,
    );
    const flows = flowsWithNet(exchange, i.net_flow_m3_per_s);
    return {
      exchange_no_net_m3_per_s: exchange,
      outflow_m3_per_s: flows.outM3PerS,
      inflow_m3_per_s: flows.inM3PerS,
      net_flow_to_stop_counterflow_m3_per_s: counterflowLimit(exchange),
    };
  },
  'AC-O03': (inputs) => {
    const i = read<{
      upper_vent_m2: number;
      lower_vent_m2: number;
      discharge_coefficient: number;
      helium_fraction: number;
      layer_depth_m: number;
    }>(inputs);
    const area = effectiveVentArea(i.upper_vent_m2, i.lower_vent_m2, i.discharge_coefficient);
    const gPrime = -gPrimeOf(MOLAR.He, i.helium_fraction);
    return {
      effective_area_m2: area,
      g_prime_m_per_s2: gPrime,
      flow_m3_per_s: displacementFlow(area, gPrime, i.layer_depth_m),
    };
  },
  'AC-O04': (inputs) => {
    const i = read<{
      diameter_m: number;
      thickness_m: readonly number[];
      g_prime_m_per_s2: number;
    }>(inputs);
    return {
      froude_number: i.thickness_m.map((l) => horizontalExchangeFroude(l / i.diameter_m)),
      flow_m3_per_s: i.thickness_m.map((l) =>
        horizontalExchange(i.diameter_m, l, i.g_prime_m_per_s2),
      ),
    };
  },
  'AC-O05': (inputs) => {
    const i = read<{
      vent_width_m: number;
      vent_height_m: number;
      discharge_coefficient: number;
      release_m3_per_s: number;
    }>(inputs);
    const vent: SingleVent = {
      widthM: i.vent_width_m,
      heightM: i.vent_height_m,
      dischargeCoefficient: i.discharge_coefficient,
      gasGPrime: G_HELIUM,
    };
    return {
      gas_fraction_simple: singleVentFraction(vent, i.release_m3_per_s),
      gas_fraction_exact: singleVentFractionWithNet(vent, i.release_m3_per_s),
    };
  },
  'AC-O06': (inputs) => {
    const i = read<{
      room_volume_m3: number;
      vent_width_m: number;
      vent_height_m: number;
      discharge_coefficient: number;
      initial_gas_fraction: number;
    }>(inputs);
    const c = singleVentDecayConstant(
      {
        widthM: i.vent_width_m,
        heightM: i.vent_height_m,
        dischargeCoefficient: i.discharge_coefficient,
        gasGPrime: G_HELIUM,
      },
      i.room_volume_m3,
    );
    const half = (2 / c) * ((i.initial_gas_fraction / 2) ** -0.5 - i.initial_gas_fraction ** -0.5);
    return {
      c_per_s: c,
      half_time_s: half,
      gas_fraction_3600s: ventDecayFraction(i.initial_gas_fraction, c, 3600),
    };
  },
  'AC-L01': (inputs) => {
    const i = read<{
      release_m3_per_s: number;
      entrainment_coefficient_tophat: number;
      heights_m: readonly number[];
      source_g_prime_m_per_s2: number;
    }>(inputs);
    const c = plumeConstant(i.entrainment_coefficient_tophat);
    const flow = (z: number) => plumeFlow(i.source_g_prime_m_per_s2 * i.release_m3_per_s, z, c);
    return {
      plume_constant_C: c,
      plume_flow_m3_per_s: i.heights_m.map(flow),
      gas_fraction: i.heights_m.map((z) => plumeFraction(i.release_m3_per_s, flow(z))),
    };
  },
  'AC-L02': (inputs) => {
    const i = read<{
      floor_area_m2: number;
      rise_height_m: number;
      gas_volume_m3: number;
      release_duration_s: number;
      entrainment_coefficient_tophat: number;
    }>(inputs);
    const buoyancy = (G_HELIUM * i.gas_volume_m3) / i.release_duration_s;
    const tau = fillingTime(
      i.floor_area_m2,
      buoyancy,
      i.rise_height_m,
      plumeConstant(i.entrainment_coefficient_tophat),
    );
    const front = firstFrontHeight(i.rise_height_m, i.release_duration_s, tau);
    const depth = i.rise_height_m - front;
    const deeper = depth + i.gas_volume_m3 / i.floor_area_m2;
    return {
      time_scale_s: tau,
      front_height_above_source_m: front,
      layer_depth_m: depth,
      layer_mean_gas_fraction: inventoryBound(i.gas_volume_m3, i.floor_area_m2 * depth),
      layer_depth_with_release_volume_m: deeper,
      layer_mean_gas_fraction_with_release_volume: inventoryBound(
        i.gas_volume_m3,
        i.floor_area_m2 * deeper,
      ),
    };
  },
  'AC-L03': (inputs) => {
    const i = read<{
      height_m: number;
      effective_area_m2: number;
      release_m3_per_s: number;
      entrainment_coefficient_tophat: number;
    }>(inputs);
    const c = plumeConstant(i.entrainment_coefficient_tophat);
    const xi = interfaceFraction(i.effective_area_m2, i.height_m, c);
    const flow = plumeFlow(G_HELIUM * i.release_m3_per_s, xi * i.height_m, c);
    const x = plumeFraction(i.release_m3_per_s, flow);
    return {
      interface_height_fraction: xi,
      vent_flow_m3_per_s: flow,
      upper_gas_fraction: x,
      upper_g_prime_m_per_s2: x * G_HELIUM,
    };
  },
  'AC-L04': (inputs) => {
    const i = read<{
      floor_area_m2: number;
      height_m: number;
      effective_area_m2: number;
      release_m3_per_s: number;
      entrainment_coefficient_tophat: number;
      times_s: readonly number[];
    }>(inputs);
    const box = {
      heightM: i.height_m,
      effectiveAreaM2: i.effective_area_m2,
      buoyancyFlux: G_HELIUM * i.release_m3_per_s,
      plumeConstant: plumeConstant(i.entrainment_coefficient_tophat),
    };
    const layers = emptyingBoxLayers(box, i.floor_area_m2, i.times_s);
    const fine = Array.from({ length: 720 }, (_, k) => (k + 1) * 5);
    return {
      layer_depth_m: layers.map((layer) => layer.depthM),
      layer_g_prime_m_per_s2: layers.map((layer) => layer.gPrime),
      max_layer_depth_m: Math.max(
        ...emptyingBoxLayers(box, i.floor_area_m2, fine).map((layer) => layer.depthM),
      ),
    };
  },
  'AC-L05': (inputs) => {
    const i = read<{
      release_m3_per_s: number;
      pipe_diameter_m: number;
      nozzle_diameter_m: number;
      room_volume_m3: number;
    }>(inputs);
    const jet = (diameterM: number) => ({
      flowM3PerS: i.release_m3_per_s,
      diameterM,
      gasDensityKgPerM3: MOLAR.He / 1000 / molarVolume,
      airDensityKgPerM3: AIR / 1000 / molarVolume,
    });
    const pipe = jet(i.pipe_diameter_m);
    const nozzle = jet(i.nozzle_diameter_m);
    const mixed = [pipe, nozzle].map((one) => mixesByMomentum(one, i.room_volume_m3));
    return {
      a_volume_richardson: volumeRichardson(pipe, i.room_volume_m3),
      b_volume_richardson: volumeRichardson(nozzle, i.room_volume_m3),
      a_jet_length_m: jetLength(pipe),
      b_jet_length_m: jetLength(nozzle),
      momentum_mixed_case: mixed[1] && !mixed[0] ? 'b' : 'other',
    };
  },
  'AC-D01': (inputs) => {
    const i = read<{ gas_volume_m3: number; g_prime_m_per_s2: number; target_radius_m: number }>(
      inputs,
    );
    return {
      initial_radius_m: initialRadius(i.gas_volume_m3, 2 * Math.PI),
      radius_1s_m: frontRadiusAtOnce(i.gas_volume_m3, i.g_prime_m_per_s2, 1),
      arrival_time_s: arrivalTimeAtOnce(i.gas_volume_m3, i.g_prime_m_per_s2, i.target_radius_m),
    };
  },
  'AC-D02': (inputs) => {
    const i = read<{
      release_m3_per_s: number;
      g_prime_m_per_s2: number;
      times_s: readonly number[];
    }>(inputs);
    const radii = i.times_s.map((t) =>
      frontRadiusContinuous(i.release_m3_per_s, i.g_prime_m_per_s2, t),
    );
    return {
      radius_m: radii,
      mean_depth_m: radii.map(
        (r, k) => (i.release_m3_per_s * (i.times_s[k] ?? 0)) / (Math.PI * r ** 2),
      ),
    };
  },
  'AC-D03': (inputs) => {
    const i = read<{ depth_m: number; distance_m: number; g_prime_m_per_s2: number }>(inputs);
    const speed = lockExchangeSpeed(i.depth_m, i.g_prime_m_per_s2);
    return { front_speed_m_per_s: speed, time_s: i.distance_m / speed };
  },
  'AC-D04': (inputs) => {
    const i = read<{
      dry_ice_mass_kg: number;
      duration_s: number;
      source_dilution: number;
      edge_width_m: number;
    }>(inputs);
    const volume = (i.dry_ice_mass_kg / (MOLAR.CO2 / 1000)) * molarVolume;
    const flow = volume / i.duration_s;
    const gPrime = gPrimeOf(MOLAR.CO2, 1 / i.source_dilution);
    const unit = weirFlow(i.edge_width_m, gPrime, 1);
    return {
      gas_volume_m3: volume,
      gas_flow_m3_per_s: flow,
      g_prime_m_per_s2: gPrime,
      layer_depth_m: ((i.source_dilution * flow) / unit) ** (2 / 3),
    };
  },
  'AC-D05': (inputs) => {
    const i = read<{
      area_m2: number;
      initial_depth_m: number;
      edge_width_m: number;
      g_prime_m_per_s2: number;
    }>(inputs);
    const tau = drainTime(i.area_m2, i.edge_width_m, i.g_prime_m_per_s2, i.initial_depth_m);
    return {
      time_scale_s: tau,
      depth_60s_m: drainedDepth(i.initial_depth_m, 60, tau),
      time_to_10mm_s: tau * (Math.sqrt(i.initial_depth_m / 0.01) - 1),
    };
  },
  'AC-D06': (inputs) => {
    const i = read<{
      gas_volume_m3: number;
      floor_area_m2: number;
      height_m: number;
      heights_m: readonly number[];
    }>(inputs);
    const result = airRun(
      checkInput({
        durationS: 600,
        spaces: [{ id: 'a', floorAreaM2: i.floor_area_m2, heightM: i.height_m }],
        releases: [{ space: 'a', gas: 'CO2', volumeM3: i.gas_volume_m3 }],
        zones: i.heights_m.map((heightM) => ({ id: String(heightM), space: 'a', heightM })),
      }),
      checkGases,
    );
    const background =
      420e-6 * (1 - pushOutFraction(i.gas_volume_m3, i.floor_area_m2 * i.height_m));
    return {
      pure_pool_depth_m: result.spaces.a?.purePoolDepthM,
      // The answer is the total; what outdoor air brought is taken off.
      max_gas_fraction: i.heights_m.map(
        (h) => (result.zones[String(h)]?.bound.gasFraction.CO2?.at(-1) ?? 0) - background,
      ),
      mixed_pushout: pushOutFraction(i.gas_volume_m3, i.floor_area_m2 * i.height_m),
      mixed_ratio: straightDisplacementFraction(i.gas_volume_m3, i.floor_area_m2 * i.height_m),
    };
  },
  'AC-D07': (inputs) => {
    const i = read<{
      gas_volume_m3: number;
      initial_radius_m: number;
      floor_area_m2: number;
      alpha: readonly number[];
    }>(inputs);
    const radius = Math.sqrt(i.floor_area_m2 / Math.PI);
    const dilution = i.alpha.map((alpha) => edgeDilution(radius, i.initial_radius_m, alpha));
    return {
      dilution,
      layer_depth_m: dilution.map((d) => (d * i.gas_volume_m3) / i.floor_area_m2),
      gas_fraction: dilution.map((d) => 1 / d),
    };
  },
  'AC-D10': (inputs) => {
    const i = read<{
      pit_volume_m3: number;
      extract_m3_per_s: number;
      residual_fraction: number;
    }>(inputs);
    return {
      plug_time_s: i.pit_volume_m3 / i.extract_m3_per_s,
      mixed_time_s: clearDownTime(i.pit_volume_m3, i.extract_m3_per_s, 1, i.residual_fraction),
    };
  },
  'AC-D11': (inputs) => {
    const i = read<{
      plan_area_m2: number;
      depth_m: number;
      hole_diameter_m: number;
      discharge_coefficient: number;
    }>(inputs);
    const gravity = layerGravity(MOLAR.SF6, AIR);
    const flow = tankOutflow(
      (Math.PI / 4) * i.hole_diameter_m ** 2,
      gravity,
      i.depth_m,
      i.discharge_coefficient,
    );
    return {
      driving_acceleration_m_per_s2: gravity,
      initial_flow_m3_per_s: flow,
      emptying_time_s: tankEmptyingTime(i.plan_area_m2, i.depth_m, flow),
    };
  },
  'AC-D12': (inputs) => {
    const i = read<{
      g_prime_m_per_s2: number;
      depth_m: number;
      velocity_m_per_s: readonly number[];
    }>(inputs);
    const w = i.velocity_m_per_s.map((u) => turbulentExchange(u, i.g_prime_m_per_s2, i.depth_m));
    return {
      exchange_velocity_m_per_s: w,
      richardson: i.velocity_m_per_s.map((u) => (i.g_prime_m_per_s2 * i.depth_m) / u ** 2),
      ratio_last_two: (w[1] ?? 0) / (w[2] ?? 1),
    };
  },
  'AC-D13': (inputs) => {
    const i = read<{
      edge_width_m: number;
      fall_height_m: number;
      layer_flow_m3_per_s: number;
      g_prime_m_per_s2: number;
    }>(inputs);
    const buoyancy = i.g_prime_m_per_s2 * i.layer_flow_m3_per_s;
    const flow = linePlumeFlow(buoyancy, i.edge_width_m, i.fall_height_m);
    return {
      buoyancy_flux_per_metre_m3_per_s3: buoyancy / i.edge_width_m,
      plume_flow_m3_per_s: flow,
      co2_fraction: (0.2 * i.layer_flow_m3_per_s) / flow,
    };
  },
  'AC-D14': (inputs) => {
    const i = read<{
      length_m: number;
      width_m: number;
      rise_m: number;
      ceiling_above_front_floor_m: number;
      dense_gas_m3: number;
      levels_m: readonly number[];
      layer_volume_m3: number;
      light_gas_m3: number;
      light_levels_m: readonly number[];
    }>(inputs);
    const curve = volumeCurve({
      id: 'house',
      floorAreaM2: i.length_m * i.width_m,
      heightM: i.ceiling_above_front_floor_m,
      floorRiseM: i.rise_m,
    });
    const level = layerLevel(curve, i.layer_volume_m3);
    const area = planArea(curve, level);
    return {
      volume_below_m3: i.levels_m.map((z) => volumeBelow(curve, z)),
      max_gas_fraction: i.levels_m.map((z) =>
        inventoryBound(i.dense_gas_m3, volumeBelow(curve, z)),
      ),
      flat_floor_formula_wrong: i.levels_m.map((z) =>
        inventoryBound(i.dense_gas_m3, curve.floorAreaM2 * z),
      ),
      layer_level_m: level,
      layer_plan_area_m2: area,
      layer_mean_depth_m: i.layer_volume_m3 / area,
      max_light_gas_fraction: i.light_levels_m.map((z) =>
        inventoryBound(i.light_gas_m3, volumeAbove(curve, z)),
      ),
    };
  },
  'AC-D15': (inputs) => {
    const i = read<{
      stage_area_m2: number;
      pit_area_m2: number;
      pit_depth_m: number;
      gas_volume_m3: number;
      mouths_in_pit_m: readonly number[];
      mouth_on_stage_m: number;
      mixture_volume_m3: number;
    }>(inputs);
    const curve = volumeCurve({
      id: 'both',
      floorAreaM2: i.stage_area_m2 + i.pit_area_m2,
      heightM: 7.5,
      steps: [
        { areaM2: i.pit_area_m2, levelM: -i.pit_depth_m },
        { areaM2: i.stage_area_m2, levelM: 0 },
      ],
    });
    const covered = volumeCurve({ id: 'stage', floorAreaM2: i.stage_area_m2, heightM: 6 });
    const own = (floor: number, mouth: number) =>
      inventoryBound(i.gas_volume_m3, ownVolumeBelow(curve, floor, mouth));
    return {
      a_max_gas_fraction: i.mouths_in_pit_m.map((mouth) => own(-i.pit_depth_m, mouth)),
      b_max_gas_fraction: inventoryBound(
        i.gas_volume_m3,
        volumeBelow(curve, i.pit_depth_m + i.mouth_on_stage_m),
      ),
      c_max_gas_fraction: inventoryBound(i.gas_volume_m3, i.stage_area_m2 * i.mouth_on_stage_m),
      judged_max_gas_fraction: own(0, i.mouth_on_stage_m),
      d_level_m: layerLevel(curve, i.mixture_volume_m3),
      e_max_gas_fraction: inventoryBound(
        i.gas_volume_m3,
        ownVolumeBelow(covered, 0, i.mouth_on_stage_m),
      ),
    };
  },
  'AC-D16': (inputs) => {
    const i = read<{
      sf6_volume_m3: number;
      argon_volume_m3: number;
      sf6_g_prime_m_per_s2: number;
      argon_g_prime_m_per_s2: number;
      times_s: readonly number[];
      floor_area_m2: number;
    }>(inputs);
    const covered = (volume: number, gPrime: number, t: number, angle = 2 * Math.PI) =>
      (angle / 2) * frontRadiusAtOnce(volume, gPrime, t, angle) ** 2;
    const sf6 = i.times_s.map((t) => covered(i.sf6_volume_m3, i.sf6_g_prime_m_per_s2, t));
    const argon = covered(i.argon_volume_m3, i.argon_g_prime_m_per_s2, 1);
    const half = covered(i.sf6_volume_m3, i.sf6_g_prime_m_per_s2, 1, Math.PI);
    return {
      sf6_covered_area_m2: sf6,
      sf6_bound_at_0_2m: sf6.map((a) => firstPassBound(i.sf6_volume_m3, a, 0.2)),
      sf6_bound_at_0_5m: sf6.map((a) => firstPassBound(i.sf6_volume_m3, a, 0.5)),
      sf6_time_to_cover_63m2_s: arrivalTimeAtOnce(
        i.sf6_volume_m3,
        i.sf6_g_prime_m_per_s2,
        Math.sqrt(i.floor_area_m2 / Math.PI),
      ),
      argon_covered_area_1s_m2: argon,
      argon_bound_at_0_2m_1s: firstPassBound(i.argon_volume_m3, argon, 0.2),
      argon_bound_at_1_1m_1s: firstPassBound(i.argon_volume_m3, argon, 1.1),
      half_circle_covered_area_1s_m2: half,
      half_circle_bound_at_0_2m_1s: firstPassBound(i.sf6_volume_m3, half, 0.2),
    };
  },
  'AC-D17': (inputs) => {
    const i = read<{
      low_extract_m3_per_s: number;
      grille_width_m: number;
      grille_top_m: number;
      layer_depth_m: number;
      layer_co2_fraction: number;
      second_co2_fraction: number;
      second_flow_m3_per_s: number;
    }>(inputs);
    const gravity = layerGravity(mixture(MOLAR.CO2, i.layer_co2_fraction), AIR);
    const radius = grilleRadius(i.low_extract_m3_per_s, gravity, i.layer_depth_m);
    const grille = {
      flowM3PerS: i.low_extract_m3_per_s,
      widthM: i.grille_width_m,
      topM: i.grille_top_m,
    };
    const second = layerGravity(mixture(MOLAR.CO2, i.second_co2_fraction), AIR);
    let low = 0;
    let high = i.grille_top_m;
    while (high - low > 1e-9) {
      const middle = 0.5 * (low + high);
      if (grilleIntake(grille, second, middle) < i.second_flow_m3_per_s) low = middle;
      else high = middle;
    }
    return {
      g_own_density_m_per_s2: gravity,
      radius_m: radius,
      // A grille whose top lies below the layer is not limited by its plug figure.
      limit_m3_per_s: grilleIntake({ ...grille, topM: 1e-3 }, gravity, i.layer_depth_m),
      plug_figure_m3_per_s: (i.low_extract_m3_per_s * i.layer_depth_m) / i.grille_top_m,
      taken_from_layer_m3_per_s: grilleIntake(grille, gravity, i.layer_depth_m),
      depth_for_second_flow_m: high,
    };
  },
  'AC-D18': (inputs) => {
    const i = read<{
      depth_m: number;
      edge_width_m: number;
      pool_area_m2: number;
      time_s: number;
    }>(inputs);
    const layers = [mixture(MOLAR.CO2, 0.2), MOLAR.Ar, MOLAR.CO2, MOLAR.SF6] as const;
    const flows = layers.map((m) => weirFlow(i.edge_width_m, layerGravity(m, AIR), i.depth_m));
    const tau = drainTime(i.pool_area_m2, i.edge_width_m, layerGravity(MOLAR.SF6, AIR), i.depth_m);
    return {
      flow_m3_per_s: flows,
      overstatement_factor: layers.map(
        (m, k) =>
          weirFlow(i.edge_width_m, (GRAVITY_M_PER_S2 * (m - AIR)) / AIR, i.depth_m) /
          (flows[k] ?? 1),
      ),
      pool_time_scale_s: tau,
      pool_depth_60s_m: drainedDepth(i.depth_m, i.time_s, tau),
    };
  },
  'AC-D21': (inputs) => {
    const i = read<{
      floor_area_m2: number;
      gas_released_m3: number;
      layer_depth_m: number;
      layer_fraction: number;
      upper_fraction: number;
      mouth_heights_m: readonly number[];
      diffusivity_m2_per_s: number;
      helium_diffusivity_m2_per_s: number;
      times_s: readonly [number, number];
    }>(inputs);
    const reported = (smear: number, mouth: number) =>
      reportedFraction(
        i.layer_fraction,
        i.upper_fraction,
        inventoryBound(i.gas_released_m3, i.floor_area_m2 * mouth),
        i.layer_depth_m,
        smear,
        mouth,
      );
    const early = smearHeight(i.diffusivity_m2_per_s, i.times_s[0]);
    const late = smearHeight(i.diffusivity_m2_per_s, i.times_s[1]);
    // The time at which diffusion alone reaches the least smear, read off the function.
    const usedUp = (diffusivity: number) => {
      let low = 0;
      let high = 1e5;
      while (high - low > 1e-6) {
        const middle = 0.5 * (low + high);
        if (smearHeight(diffusivity, middle) > 0.3) high = middle;
        else low = middle;
      }
      return high;
    };
    return {
      a_smear_m: early,
      a_reported_fraction: i.mouth_heights_m.map((mouth) => reported(early, mouth)),
      b_smear_m: late,
      b_reported_fraction_1_1m: reported(late, 1.1),
      c_time_co2_s: usedUp(i.diffusivity_m2_per_s),
      c_time_helium_s: usedUp(i.helium_diffusivity_m2_per_s),
    };
  },
  'AC-G01': (inputs) => {
    const i = read<{
      temperature_K: readonly number[];
      pressure_Pa: readonly number[];
      helium_m3: number;
      dry_ice_kg: number;
      liquid_nitrogen_litre: number;
      liquid_nitrogen_density_kg_per_m3: number;
      floor_area_m2: number;
      mouth_height_m: number;
    }>(inputs);
    const t = i.temperature_K[0] ?? 0;
    const p = i.pressure_Pa[0] ?? 0;
    const here = idealMolarVolume(t, p);
    const dryIce = (i.dry_ice_kg / (MOLAR.CO2 / 1000)) * here;
    const nitrogenKg = (i.liquid_nitrogen_litre / 1000) * i.liquid_nitrogen_density_kg_per_m3;
    const below = i.floor_area_m2 * i.mouth_height_m;
    return {
      factor: i.temperature_K.map((temperature, k) =>
        siteVolumeFactor(temperature, i.pressure_Pa[k] ?? 0),
      ),
      helium_site_m3: i.helium_m3 * siteVolumeFactor(t, p),
      dry_ice_site_m3: dryIce,
      nitrogen_site_m3: (nitrogenKg / 0.0280134) * here,
      max_gas_fraction: inventoryBound(dryIce, below),
      max_gas_fraction_uncorrected: inventoryBound(
        (i.dry_ice_kg / (MOLAR.CO2 / 1000)) * molarVolume,
        below,
      ),
    };
  },
  'AC-G04': (inputs) => {
    const i = read<{
      floor_area_m2: number;
      height_m: number;
      co2_m3: number;
      sf6_m3: number;
      helium_m3: number;
      nitrogen_m3: number;
      background_co2_fraction: number;
      mouth_heights_m: readonly number[];
    }>(inputs);
    const curve = volumeCurve({ id: 'a', floorAreaM2: i.floor_area_m2, heightM: i.height_m });
    const below = i.mouth_heights_m.map((z) =>
      inventoryBound(i.co2_m3 + i.sf6_m3, volumeBelow(curve, z)),
    );
    const above = i.mouth_heights_m.map((z) => inventoryBound(i.helium_m3, volumeAbove(curve, z)));
    const slab = i.mouth_heights_m.map(() => slabBound(i.nitrogen_m3, i.floor_area_m2));
    // The sum, the oxygen and the total CO2 come from the run, all gases in one episode.
    const result = airRun(
      {
        ...checkInput({
          durationS: 3600,
          spaces: [{ id: 'a', floorAreaM2: i.floor_area_m2, heightM: i.height_m }],
          releases: [
            { space: 'a', gas: 'CO2', volumeM3: i.co2_m3, episode: 'one' },
            { space: 'a', gas: 'SF6', volumeM3: i.sf6_m3, episode: 'one' },
            { space: 'a', gas: 'He', volumeM3: i.helium_m3, episode: 'one' },
            { space: 'a', gas: 'N2', volumeM3: i.nitrogen_m3, episode: 'one' },
          ],
          zones: i.mouth_heights_m.map((heightM) => ({ id: String(heightM), space: 'a', heightM })),
        }),
      },
      checkGases,
    );
    const last = (z: number) => result.zones[String(z)]?.bound;
    const gas = (z: number, id: string) => last(z)?.gasFraction[id]?.at(-1) ?? 0;
    const mixedShare = pushOutFraction(
      i.co2_m3 + i.sf6_m3 + i.helium_m3 + i.nitrogen_m3,
      i.floor_area_m2 * i.height_m,
    );
    const background = 420e-6 * (1 - mixedShare);
    return {
      from_below: below,
      from_above: above,
      slab,
      sum: i.mouth_heights_m.map((z, k) => {
        const sum = (below[k] ?? 0) + (above[k] ?? 0) + (slab[k] ?? 0);
        const run = gas(z, 'CO2') - background + gas(z, 'SF6') + gas(z, 'He') + gas(z, 'N2');
        // The run and the sum of the parts must be one figure.
        return Math.abs(run - sum) < 1e-9 ? run : Number.NaN;
      }),
      min_oxygen_fraction: i.mouth_heights_m.map((z) => last(z)?.oxygenFraction.at(-1)),
      co2_total_bound: i.mouth_heights_m.map(
        (z) => gas(z, 'CO2') - background + i.background_co2_fraction,
      ),
    };
  },
  'AC-S03': (inputs) => {
    const i = read<{ liquid_nitrogen_density_kg_per_m3: number }>(inputs);
    const perKg = (molar: number) => molarVolume / (molar / 1000);
    const density = (molar: number) => molar / 1000 / molarVolume;
    return {
      co2_m3_per_kg: perKg(MOLAR.CO2),
      nitrogen_m3_per_kg: perKg(28.0134),
      nitrogen_m3_per_litre_liquid: (perKg(28.0134) * i.liquid_nitrogen_density_kg_per_m3) / 1000,
      sf6_m3_per_kg: perKg(MOLAR.SF6),
      density_he_kg_per_m3: density(MOLAR.He),
      density_n2_kg_per_m3: density(28.0134),
      density_ar_kg_per_m3: density(MOLAR.Ar),
      density_co2_kg_per_m3: density(MOLAR.CO2),
      density_sf6_kg_per_m3: density(MOLAR.SF6),
      density_air_kg_per_m3: density(AIR),
    };
  },
  'AC-S05': (inputs) => {
    const i = read<{
      dry_ice_mass_kg: number;
      area_m2: number;
      depth_m: number;
      duration_s: number;
    }>(inputs);
    const gas = (i.dry_ice_mass_kg / (MOLAR.CO2 / 1000)) * molarVolume;
    const layer = i.area_m2 * i.depth_m;
    return {
      gas_volume_m3: gas,
      mean_co2_fraction: inventoryBound(gas, layer),
      oxygen_fraction: straightDisplacementOxygen(gas, layer),
      gas_flow_m3_per_s: gas / i.duration_s,
    };
  },
  'AC-T01': (inputs) => {
    const i = read<{
      times_s: readonly number[];
      co2_ppm: readonly number[];
      background_ppm: number;
    }>(inputs);
    const fit = decayRate({
      timesS: i.times_s,
      readingsPpm: i.co2_ppm,
      backgroundPpm: i.background_ppm,
      volumeM3: 100,
    });
    return {
      air_change_per_h: fit.airChangesPerHour,
      standard_error_per_h: fit.standardUncertainty,
      ci95_low_per_h: fit.interval95[0],
      ci95_high_per_h: fit.interval95[1],
    };
  },
  'AC-T02': (inputs) => {
    const i = read<{
      times_s: readonly number[];
      co2_ppm: readonly number[];
      wrong_background_ppm: number;
      background_ppm: number;
    }>(inputs);
    const first = i.co2_ppm[0] ?? 0;
    const last = i.co2_ppm.at(-1) ?? 0;
    const span = (i.times_s.at(-1) ?? 0) - (i.times_s[0] ?? 0);
    return {
      air_change_wrong_background_per_h: decayRate({
        timesS: i.times_s,
        readingsPpm: i.co2_ppm,
        backgroundPpm: i.wrong_background_ppm,
        volumeM3: 100,
      }).airChangesPerHour,
      // The volume over the clear-down time between the two readings is the flow.
      air_change_two_point_per_h:
        (3600 / span) * clearDownTime(1, 1, first, last, i.background_ppm),
    };
  },
  'AC-E01': (inputs) => {
    const i = read<{ x_7080s: number; x_32280s: number; times_s: readonly number[] }>(inputs);
    const c = (2 * (i.x_32280s ** -0.5 - i.x_7080s ** -0.5)) / (32280 - 7080);
    return {
      c_per_s: c,
      gas_fraction_measured: i.times_s.map((t) => ventDecayFraction(i.x_7080s, c, t - 7080)),
    };
  },
  'AC-E02': (inputs) => {
    const i = read<{
      box_volume_m3: number;
      vent_side_m: readonly [number, number];
      c_per_s: readonly [number, number];
      g0_m_per_s2: number;
    }>(inputs);
    const unit = i.vent_side_m.map((side) =>
      singleVentDecayConstant(squareVent(side, 1, i.g0_m_per_s2), i.box_volume_m3),
    );
    return {
      discharge_coefficient: i.c_per_s.map((c, k) => c / (unit[k] ?? 1)),
      ratio_measured: i.c_per_s[1] / i.c_per_s[0],
      ratio_predicted: (unit[1] ?? 0) / (unit[0] ?? 1),
    };
  },
  'AC-E03': (inputs) => {
    const i = read<{
      box_volume_m3: number;
      release_L_per_min: number;
      duration_s: number;
      vent_side_m: readonly number[];
      discharge_coefficient: number;
    }>(inputs);
    const gas = (i.release_L_per_min / 60_000) * i.duration_s;
    const model = i.vent_side_m.map((side) =>
      ventedBox(side, gas, i.duration_s, i.discharge_coefficient),
    );
    return {
      measured_mean_fraction: model,
      model_exact_net_flow: model,
      pushout_limit: pushOutFraction(gas, i.box_volume_m3),
      air_displaced_limit: straightDisplacementFraction(gas, i.box_volume_m3),
    };
  },
  'AC-E04': (inputs) => {
    const i = read<{ fractions_bottom_to_top: readonly number[] }>(inputs);
    const values = i.fractions_bottom_to_top;
    const mean = values.reduce((sum, one) => sum + one, 0) / values.length;
    return {
      mean,
      top_to_mean: Math.max(...values) / mean,
      low_to_mean: Math.min(...values) / mean,
    };
  },
  'AC-E05': (inputs) => {
    const i = read<{
      boxes: number;
      mass_per_box_kg: number;
      loss_per_hour: number;
      hours: number;
    }>(inputs);
    const perHour = i.mass_per_box_kg * i.loss_per_hour;
    return {
      loss_per_box_kg: perHour * i.hours,
      co2_flow_L_per_min: ((i.boxes * perHour) / (MOLAR.CO2 / 1000)) * molarVolume * (1000 / 60),
    };
  },
  'AC-E06': (inputs) => {
    const i = read<{
      box_volume_m3: number;
      vent_side_m: number;
      vent_separation_m: number;
      discharge_coefficient: number;
      x_7200s: number;
      times_s: readonly number[];
    }>(inputs);
    const area = i.vent_side_m ** 2;
    const flow = displacementFlow(
      effectiveVentArea(area, area, i.discharge_coefficient),
      8.454,
      i.vent_separation_m,
    );
    return {
      gas_fraction_measured: i.times_s.map((t) =>
        ventDecayFraction(i.x_7200s, flow / i.box_volume_m3, t - 7200),
      ),
    };
  },
};
