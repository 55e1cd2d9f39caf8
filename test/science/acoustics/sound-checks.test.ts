import { describe, expect, it } from 'vitest';
import { loadGasLibrary } from '../../../src/catalogue/gas-library.js';
import { breathingRefusal } from '../../../src/science/acoustics/breathing-gate.js';
import { mouthEnd, topEnd, unflangedEnd } from '../../../src/science/acoustics/end-correction.js';
import { formantResonator } from '../../../src/science/acoustics/formant-filter.js';
import {
  noteRatio,
  noteSensitivity,
  shareForRatio,
} from '../../../src/science/acoustics/gas-fraction.js';
import { bottleOf, pipeColumn } from '../../../src/science/acoustics/instrument.js';
import { flueFlow, intonationNumber, jetSpeed } from '../../../src/science/acoustics/jet-drive.js';
import { centsBetween, noteOf } from '../../../src/science/acoustics/pitch.js';
import { fadeSamples, tonePreview } from '../../../src/science/acoustics/preview.js';
import { purityFromNote } from '../../../src/science/acoustics/purity.js';
import {
  bottleResonance,
  columnResonance,
  filledColumnResonance,
} from '../../../src/science/acoustics/resonator.js';
import {
  gasByFlushing,
  gasBySqueezing,
  shareForShift,
} from '../../../src/science/acoustics/smallest-amount.js';
import {
  aWeighting,
  boundaryTransmission,
  drivenSourceLevel,
} from '../../../src/science/acoustics/sound-level.js';
import { formantInGas, oneBreathShare, tractState } from '../../../src/science/acoustics/voice.js';
import { wallFactor } from '../../../src/science/acoustics/wall-friction.js';
import { waterFractionOfAir } from '../../../src/science/gases/humid-air.js';
import { mixtureState } from '../../../src/science/gases/mixture-state.js';
import { molarMassKgPerMol } from '../../../src/science/gases/molar-mass.js';
import { molarVolumeM3PerMol } from '../../../src/science/gases/molar-volume.js';
import { fromSi } from '../../../src/science/quantity.js';
import { recordsOf } from '../../support/gas-records.js';
import {
  alveolarOxygenMmHg,
  barometricMmHg,
  inspiredOxygenMmHg,
  saturationPercent,
  uptakeInBody,
  washout,
} from '../../support/lungs-oxygen.js';

type Answer = number | string | boolean | readonly string[];
interface Tolerance {
  readonly rel?: number;
  readonly abs?: number;
  readonly exact?: boolean;
  readonly meaning?: string;
}
interface SoundRecord {
  readonly id: string;
  readonly question: string;
  readonly inputs: Readonly<Record<string, number | string | readonly number[]>>;
  readonly expected: Readonly<Record<string, Answer>>;
  readonly tolerance: Readonly<Record<string, Tolerance>>;
  readonly source: string;
  readonly status: string;
}

const library = loadGasLibrary();
const records = recordsOf('sound-checks.json') as readonly SoundRecord[];
const room = { temperatureK: 293.15, pressurePa: 101_325 };
const humidRoom = { ...room, relativeHumidity: 0.5 };

const state = (composition: Record<string, number>, conditions = humidRoom as typeof room) =>
  mixtureState(library, { composition, ...conditions });

/** Density of the ideal mixture, the records' Model I. */
const idealDensity = (composition: Record<string, number>) =>
  molarMassKgPerMol(library, composition) / molarVolumeM3PerMol(room.temperatureK, room.pressurePa);

const idealAir = () => state({ air: 1 }).idealSpeedOfSoundMPerS;

const inAir = (gas: string) => ({ gas, ...humidRoom, model: 'ideal' as const });

/** Ideal state in a warm, wet tract. */
function tract(dry: Record<string, number>) {
  const { idealSpeedOfSoundMPerS: c, heatCapacityRatio: gamma } = tractState(library, dry, 101_325);
  return { c, gamma };
}

type Inputs = Readonly<Record<string, number>>;

const refusedWords = 'refused';

/** What the project answers to each record, by the record's own keys. */
const answers: Readonly<
  Record<string, (inputs: Inputs, record: SoundRecord) => Record<string, Answer>>
> = {
  'snd-001': () => ({
    gamma: state({ He: 1 }).heatCapacityRatio,
    sound_speed_m_per_s: state({ He: 1 }).idealSpeedOfSoundMPerS,
    density_kg_per_m3: idealDensity({ He: 1 }),
  }),
  'snd-002': () => ({
    molar_mass_kg_per_mol: molarMassKgPerMol(library, { air: 1 }),
    gamma: state({ air: 1 }, room).heatCapacityRatio,
    sound_speed_m_per_s: state({ air: 1 }, room).idealSpeedOfSoundMPerS,
  }),
  'snd-003': () => ({
    water_mole_fraction: waterFractionOfAir(library, 293.15, 101_325, 0.5),
    sound_speed_m_per_s: idealAir(),
  }),
  'snd-004': () => ({
    gamma: state({ SF6: 1 }).heatCapacityRatio,
    sound_speed_model_I_m_per_s: state({ SF6: 1 }).idealSpeedOfSoundMPerS,
    sound_speed_model_V_m_per_s: state({ SF6: 1 }).speedOfSoundMPerS,
  }),
  'snd-005': () => {
    const mixture = state({ He: 0.9, air: 0.1 });
    return {
      molar_mass_kg_per_mol: mixture.molarMassKgPerMol,
      gamma: mixture.heatCapacityRatio,
      sound_speed_m_per_s: mixture.idealSpeedOfSoundMPerS,
      ratio_to_humid_air: mixture.idealSpeedOfSoundMPerS / idealAir(),
    };
  },
  'snd-006': () => {
    const mixture = { He: 0.79, O2: 0.21 };
    const c = state(mixture, room).idealSpeedOfSoundMPerS;
    return {
      sound_speed_m_per_s: c,
      density_kg_per_m3: idealDensity(mixture),
      ratio_to_dry_air: c / state({ air: 1 }, room).idealSpeedOfSoundMPerS,
    };
  },
  'snd-007': () => {
    const mixture = { SF6: 0.8, O2: 0.2 };
    return {
      gamma: state(mixture).heatCapacityRatio,
      sound_speed_m_per_s: state(mixture).idealSpeedOfSoundMPerS,
      density_kg_per_m3: idealDensity(mixture),
      density_ratio_to_dry_air: idealDensity(mixture) / idealDensity({ air: 1 }),
    };
  },
  'snd-008': () => ({
    sound_speed_model_I_m_per_s: state({ CO2: 1 }).idealSpeedOfSoundMPerS,
    sound_speed_model_V_m_per_s: state({ CO2: 1 }).speedOfSoundMPerS,
  }),
  'snd-009': ({ length_m: lengthM = 0, radius_m: radiusM = 0 }) => {
    const column = pipeColumn('openPipe', { lengthM, radiusM });
    const f_air_Hz = columnResonance(column, idealAir(), 1);
    const f_helium_Hz = columnResonance(column, state({ He: 1 }).idealSpeedOfSoundMPerS, 1);
    return { f_air_Hz, f_helium_Hz, ratio: f_helium_Hz / f_air_Hz };
  },
  'snd-010': ({ length_m: lengthM = 0, radius_m: radiusM = 0 }) => {
    const column = pipeColumn('stoppedPipe', { lengthM, radiusM });
    const c = state({ SF6: 1 }).idealSpeedOfSoundMPerS;
    return { f1_Hz: columnResonance(column, c, 1), f2_Hz: columnResonance(column, c, 2) };
  },
  'snd-011': (inputs) => {
    const radiusM = (inputs.bore_diameter_m ?? 0) / 2;
    const mouthWidthM = inputs.mouth_width_m ?? 0;
    const cutUpM = inputs.cut_up_m ?? 0;
    const lengthM = inputs.body_length_m ?? 0;
    const column = pipeColumn('fluePipe', { lengthM, radiusM, mouthWidthM, cutUpM });
    return {
      mouth_correction_m: mouthEnd(radiusM, mouthWidthM, cutUpM),
      top_correction_m: topEnd(radiusM),
      f1_Hz: columnResonance(column, inputs.sound_speed_m_per_s ?? 0, 1),
    };
  },
  'snd-012': (inputs) => {
    const bottle = bottleOf({
      volumeM3: inputs.volume_m3 ?? 0,
      neckRadiusM: inputs.neck_radius_m ?? 0,
      neckLengthM: inputs.neck_length_m ?? 0,
    });
    return {
      f_air_Hz: bottleResonance(bottle, inputs.sound_speed_air_m_per_s ?? 0, 1),
      f_co2_Hz: bottleResonance(bottle, inputs.sound_speed_co2_m_per_s ?? 0, 1),
    };
  },
  'snd-013': ({ length_m: lengthM = 0, radius_m: radiusM = 0 }) => {
    const column = pipeColumn('openPipe', { lengthM, radiusM });
    expect(column.endCorrectionsM[0]).toBe(unflangedEnd(radiusM));
    const c = state({ He: 1 }).idealSpeedOfSoundMPerS;
    const airDensity = state({ air: 1 }).molarMassKgPerMol;
    const ratio = airDensity / molarMassKgPerMol(library, { He: 1 });
    const f = filledColumnResonance(column, c, ratio);
    return {
      f_helium_in_air_Hz: f,
      ratio_to_air: f / filledColumnResonance(column, idealAir(), 1),
      ratio_if_immersed: c / idealAir(),
    };
  },
  'snd-014': (inputs) => {
    const a = inputs.radius_m ?? 0;
    const of = (gas: string) =>
      wallFactor(
        a,
        inputs[`f_${gas}_Hz`] ?? 0,
        inputs[`nu_${gas}_m2_per_s`] ?? 0,
        inputs[`gamma_${gas}`] ?? 0,
        inputs[`prandtl_${gas}`] ?? 0,
      );
    return {
      factor_air: of('air'),
      factor_helium: of('helium'),
      ratio_factor: of('helium') / of('air'),
    };
  },
  'snd-015': (inputs) => {
    const gases = ['air', 'helium', 'sf6'];
    const speeds = gases.map((gas) =>
      jetSpeed(inputs.blowing_pressure_Pa ?? 0, inputs[`density_${gas}_kg_per_m3`] ?? 0),
    );
    const numbers = gases.map((gas, index) => {
      const f =
        ((inputs.f_air_Hz ?? 0) * (inputs[`c_${gas}_m_per_s`] ?? 0)) / (inputs.c_air_m_per_s ?? 0);
      return intonationNumber(
        speeds[index] ?? 0,
        f,
        inputs.flue_thickness_m ?? 0,
        inputs.cut_up_m ?? 0,
      );
    });
    const [air = 0, helium = 0, sf6 = 0] = numbers;
    return {
      ...Object.fromEntries(gases.map((gas, index) => [`v_${gas}_m_per_s`, speeds[index] ?? 0])),
      ising_air: air,
      ising_helium: helium,
      ising_sf6: sf6,
      ising_ratio_helium: helium / air,
      ising_ratio_sf6: sf6 / air,
    };
  },
  'snd-016': (inputs) => {
    const litres = (gas: string) =>
      fromSi(
        flueFlow(
          inputs.flue_width_m ?? 0,
          inputs.flue_thickness_m ?? 0,
          jetSpeed(inputs.blowing_pressure_Pa ?? 0, inputs[`density_${gas}_kg_per_m3`] ?? 0),
        ),
        'L/s',
      );
    return {
      flow_air_L_per_s: litres('air'),
      flow_helium_L_per_s: litres('helium'),
      helium_used_L: litres('helium') * (inputs.duration_s ?? 0),
    };
  },
  'snd-017': (inputs) => {
    const purity = practicePurity(inputs, 'He', 'ideal');
    return {
      frequency_ratio: (inputs.f_gas_Hz ?? 0) / (inputs.f_air_Hz ?? 1),
      helium_mole_fraction: purity.gasFraction,
      air_mole_fraction: purity.airFraction,
      sensitivity_dlnf_dx: purity.sensitivity,
      u_helium_mole_fraction: purity.standardUncertainty,
    };
  },
  'snd-018': (inputs) => {
    const ideal = practicePurity(inputs, 'SF6', 'ideal');
    return {
      frequency_ratio: (inputs.f_gas_Hz ?? 0) / (inputs.f_air_Hz ?? 1),
      sf6_mole_fraction_model_I: ideal.gasFraction,
      sf6_mole_fraction_model_V: practicePurity(inputs, 'SF6', 'virial').gasFraction,
      sensitivity_dlnf_dx: ideal.sensitivity,
      u_sf6_mole_fraction: ideal.standardUncertainty,
    };
  },
  'snd-019': (inputs) => {
    const answer = purityFromNote(library, {
      ...inAir('He'),
      frequencyInAirHz: inputs.f_air_Hz ?? 0,
      frequencyMeasuredHz: inputs.f_gas_Hz ?? 0,
    });
    return {
      measured_ratio: (inputs.f_gas_Hz ?? 0) / (inputs.f_air_Hz ?? 1),
      largest_possible_ratio: noteRatio(library, inAir('He'))(1),
      verdict: answer.possible ? 'possible' : `impossible: ${answer.suspects.join('; ')}`,
    };
  },
  'snd-020': (inputs) => {
    const ratio = inputs.frequency_ratio ?? 0;
    const cold = { ...inAir('He'), gasTemperatureK: inputs.gas_temperature_K ?? 0 };
    return {
      helium_mole_fraction: shareForRatio(ratio, noteRatio(library, cold)) ?? Number.NaN,
      helium_mole_fraction_if_temperature_ignored:
        shareForRatio(ratio, noteRatio(library, inAir('He'))) ?? Number.NaN,
    };
  },
  'snd-021': () => {
    const share = (gas: string, cents: number) =>
      shareForShift(library, inAir(gas), cents) ?? Number.NaN;
    return {
      helium_10_cents: share('He', 10),
      helium_100_cents: share('He', 100),
      sf6_10_cents: share('SF6', 10),
      sf6_100_cents: share('SF6', 100),
      co2_10_cents: share('CO2', 10),
      co2_100_cents: share('CO2', 100),
    };
  },
  'snd-022': () =>
    Object.fromEntries(
      ['He', 'Ar', 'Kr', 'Xe', 'CO2', 'SF6'].map((gas) => [
        `cents_${gas}`,
        centsBetween(1, noteRatio(library, inAir(gas))(1)),
      ]),
    ),
  'snd-047': (inputs) => {
    const left = inputs.squeezed_air_fraction ?? 0;
    const gas = gasBySqueezing(1, 1 - left);
    return {
      flush_volumes: gasByFlushing(1, inputs.target_fraction ?? 0),
      residual_air_after_squeeze: 1 - gas,
      gas_volumes_after_squeeze: gas,
    };
  },
  'snd-023': (inputs) => {
    const voice = formants(inputs, { He: 0.79, O2: 0.21 });
    return {
      k: voice.k,
      wall_factor: voice.gammaRatio,
      F1_gas_Hz: voice.shifted[0] ?? 0,
      F2_gas_Hz: voice.shifted[1] ?? 0,
      F3_gas_Hz: voice.shifted[2] ?? 0,
      f0_gas_Hz: inputs.f0_Hz ?? 0,
    };
  },
  'snd-024': (inputs) => {
    const voice = formants(inputs, { SF6: 0.8, O2: 0.2 });
    const [F1 = 0, F2 = 0, F3 = 0] = voice.shifted;
    return {
      k: voice.k,
      wall_factor: voice.gammaRatio,
      F1_gas_Hz: F1,
      F2_gas_Hz: F2,
      F3_gas_Hz: F3,
      F1_ratio: F1 / (inputs.F1_air_Hz ?? 1),
      F2_ratio: F2 / (inputs.F2_air_Hz ?? 1),
    };
  },
  'snd-025': () => ({
    k_saturated_tract: tract({ He: 1 }).c / tract({ air: 1 }).c,
    dry_room_ratio:
      state({ He: 1 }, room).idealSpeedOfSoundMPerS /
      state({ air: 1 }, room).idealSpeedOfSoundMPerS,
    f0_ratio: 1,
  }),
  'snd-026': (inputs) => {
    const w = washout(inputs.frc_L ?? 0, inputs.dead_space_L ?? 0, inputs.inspired_volume_L ?? 0);
    // The product knows one breath only, and agrees with it.
    expect(oneBreathShare()).toBeCloseTo(1 - w, 12);
    const factor = (breaths: number) => {
      const share = 1 - w ** breaths;
      const blend = { He: 0.79 * share, O2: 0.21 * share, air: 1 - share };
      return tract(blend).c / tract({ air: 1 }).c;
    };
    return {
      w,
      helium_fraction_n1: 0.79 * (1 - w),
      helium_fraction_n3: 0.79 * (1 - w ** 3),
      k_n1: factor(1),
      k_n3: factor(3),
    };
  },
  'snd-027': (_inputs, { inputs }) => {
    const frequencies = inputs.frequencies_Hz as readonly number[];
    const [one = 0, other = 0] = frequencies;
    const named = frequencies.flatMap((f): [string, Answer][] => [
      [`note_${String(f)}`, noteOf(f).name],
      [`cents_off_${String(f)}`, noteOf(f).centsOff],
    ]);
    return {
      ...(Object.fromEntries(named) as Record<string, Answer>),
      interval_first_to_second_cents: centsBetween(one, other),
    };
  },
  'snd-028': (inputs) => {
    const air = { rho: inputs.density_air_kg_per_m3 ?? 0, c: inputs.c_air_m_per_s ?? 0 };
    const gas = {
      rho: inputs.density_helium_kg_per_m3 ?? 0,
      c: inputs.c_helium_m_per_s ?? 0,
    };
    return {
      Z_air: air.rho * air.c,
      Z_helium: gas.rho * gas.c,
      transmission_dB: boundaryTransmission(gas.rho * gas.c, air.rho * air.c),
      monopole_dB: drivenSourceLevel('monopole', gas, air),
      dipole_dB: drivenSourceLevel('dipole', gas, air),
    };
  },
  'snd-029': () => ({
    A_145_dB: aWeighting(145),
    A_315_dB: aWeighting(315),
    A_780_dB: aWeighting(780),
    change_145_dB: aWeighting(145) - aWeighting(315),
    change_780_dB: aWeighting(780) - aWeighting(315),
  }),
  'snd-030': filterAnswer,
  'snd-031': filterAnswer,
  'snd-032': () => {
    const { before } = tonePreview(440, 440, false);
    return {
      peak_sample: before.reduce((top, sample) => Math.max(top, Math.abs(sample)), 0),
      fade_samples: fadeSamples,
    };
  },
  'snd-033': (inputs) => {
    const alveolar = alveolarOxygenMmHg(inputs.oxygen_fraction ?? 0, 760, 40, 0.8);
    return {
      PIO2_mmHg: inspiredOxygenMmHg(inputs.oxygen_fraction ?? 0, 760),
      PAO2_mmHg: alveolar,
      saturation_percent: saturationPercent(alveolar),
    };
  },
  'snd-034': (inputs) => {
    const barometric = barometricMmHg(inputs.altitude_m ?? 0);
    const alveolar = alveolarOxygenMmHg(0.21, barometric, 40, 0.8);
    return {
      barometric_mmHg: barometric,
      PIO2_mmHg: inspiredOxygenMmHg(0.21, barometric),
      PAO2_mmHg: alveolar,
      saturation_percent: saturationPercent(alveolar),
    };
  },
  'snd-035': (_inputs, { inputs }) =>
    Object.fromEntries(
      (inputs.po2_mmHg as readonly number[]).map((p) => [`s${String(p)}`, saturationPercent(p)]),
    ),
  'snd-036': (inputs) => {
    const frc = inputs.frc_L ?? 0;
    const w = washout(frc, inputs.dead_space_L ?? 0, (inputs.tlc_L ?? 0) - frc);
    const start = inputs.start_po2_mmHg ?? 0;
    const mixture = inputs.mixture_inspired_po2_mmHg ?? 0;
    const verdict = (gas: Record<string, number>) =>
      breathingRefusal(library, gas) === null
        ? 'not refused on oxygen grounds (trained presenter rules still apply)'
        : refusedWords;
    return {
      w,
      po2_after_oxygen_free_mmHg: start * w,
      saturation_after_oxygen_free_percent: saturationPercent(start * w),
      po2_after_mixture_mmHg: mixture + (start - mixture) * w,
      verdict_oxygen_free: verdict({ He: 1 }),
      verdict_mixture: verdict({ He: 0.79, O2: 0.21 }),
    };
  },
  'snd-037': (inputs) => {
    const uptake = uptakeInBody(inputs.vo2_stpd_L_per_min ?? 0, 760);
    const minutes = (inputs.hold_s ?? 0) / 60;
    return {
      vo2_btps_L_per_min: uptake,
      fall_mmHg: ((760 - 47) * uptake * minutes) / (inputs.lung_volume_L ?? 1),
    };
  },
  'snd-038': (_inputs, { inputs }) => {
    const fractions = inputs.oxygen_fractions as readonly number[];
    const [a = 0, b = 0, c = 0, d = 0] = fractions.map((x) => alveolarOxygenMmHg(x, 760, 40, 0.8));
    return {
      pao2_21: a,
      pao2_19p5: b,
      pao2_16: c,
      pao2_12: d,
      verdicts: fractions.map((x) =>
        breathingRefusal(library, { He: 1 - x, O2: x }) === null ? 'ok' : refusedWords,
      ),
    };
  },
  'snd-039': (inputs) => {
    const density = idealDensity({ SF6: 0.8, O2: 0.2 });
    return {
      density_g_per_L: density,
      times_dry_air: density / idealDensity({ air: 1 }),
      fraction_of_recommended: density / (inputs.recommended_g_per_L ?? 1),
    };
  },
  'snd-040': (inputs) => {
    const x = inputs.fraction ?? 0;
    const refusals = ['Xe', 'N2O'].map((gas) => breathingRefusal(library, { [gas]: x, O2: 1 - x }));
    expect(refusals).not.toContain(null);
    return {
      xenon_mac_multiple: x / (inputs.mac_xenon_atm ?? 1),
      n2o_mac_multiple: x / (inputs.mac_n2o_atm ?? 1),
      xenon_awake_multiple: x / (inputs.mac_awake_xenon_atm ?? 1),
      n2o_awake_multiple: x / (inputs.mac_awake_n2o_atm ?? 1),
      verdict: `refused: ${String(refusals[0])}`,
    };
  },
  'snd-041': (inputs) => {
    const factor = (inputs.reading_percent ?? 0) / (inputs.true_percent ?? 1);
    const actual = (inputs.displayed_percent ?? 0) / factor;
    return {
      over_reading_factor: factor,
      true_percent_at_display: actual,
      // A meter that shows fresh air where a mixture would be refused is not accepted.
      acceptable: breathingRefusal(library, { He: 1 - actual / 100, O2: actual / 100 }) === null,
    };
  },
  'snd-042': (inputs) => {
    const oxygen = (inputs.oxygen_air_percent ?? 0) * (1 - (inputs.co2_percent ?? 0) / 100);
    // The supply limits refuse it although the oxygen alarm stays silent.
    expect(breathingRefusal(library, { air: 0.95, CO2: 0.05 })).not.toBeNull();
    return { oxygen_percent: oxygen, alarm: oxygen < (inputs.alarm_percent ?? 0) };
  },
  'snd-043': (inputs) => {
    const limit = inputs.limit_cmH2O ?? 1;
    const balloon = fromSi(inputs.balloon_Pa ?? 0, 'cmH2O');
    const regulator = fromSi(inputs.regulator_Pa ?? 0, 'cmH2O');
    return {
      balloon_cmH2O: balloon,
      regulator_cmH2O: regulator,
      balloon_multiple: balloon / limit,
      regulator_multiple: regulator / limit,
      verdict: Math.min(balloon, regulator) > limit ? 'refuse both' : 'not refused',
    };
  },
  'snd-044': (inputs) => {
    const start = inputs.start_K ?? 0;
    const cents = (change: number) => centsBetween(1, Math.sqrt((start + change) / start));
    return {
      helium_cents: cents(inputs.helium_change_K ?? 0),
      sf6_cents: cents(inputs.sf6_change_K ?? 0),
    };
  },
  'snd-045': (inputs) => {
    const barometric = barometricMmHg(inputs.altitude_m ?? 0);
    return {
      barometric_mmHg: barometric,
      equivalent_oxygen_percent: (20.95 * (barometric - 47)) / 713,
    };
  },
  'snd-046': (inputs) => {
    const temperatureK = inputs.breath_temperature_K ?? 0;
    const water = waterFractionOfAir(library, temperatureK, 101_325, 1);
    const dry = { N2: 0.79, O2: 0.165, CO2: 0.036, Ar: 0.009 };
    const wet = Object.fromEntries(Object.entries(dry).map(([id, x]) => [id, x * (1 - water)]));
    const breath = mixtureState(library, {
      composition: { ...wet, H2O: water },
      temperatureK,
      pressurePa: 101_325,
    });
    const c = breath.idealSpeedOfSoundMPerS;
    return { c_breath_m_per_s: c, shift_cents: centsBetween(idealAir(), c) };
  },
};

function practicePurity(inputs: Inputs, gas: string, model: 'ideal' | 'virial') {
  const given = { ...inAir(gas), model };
  const purity = purityFromNote(library, {
    ...given,
    frequencyInAirHz: inputs.f_air_Hz ?? 0,
    frequencyMeasuredHz: inputs.f_gas_Hz ?? 0,
    standardUncertaintyHz: inputs.u_f_gas_Hz ?? 0,
    standardUncertaintyInAirHz: inputs.u_f_air_Hz ?? 0,
    standardUncertaintyK: inputs.u_temperature_K ?? 0,
  });
  if (!purity.possible) throw new Error(purity.suspects.join('; '));
  expect(noteSensitivity(purity.gasFraction, noteRatio(library, given))).toBe(purity.sensitivity);
  return purity;
}

function formants(inputs: Inputs, dry: Record<string, number>) {
  const gas = tract(dry);
  const air = tract({ air: 1 });
  const k = gas.c / air.c;
  const gammaRatio = gas.gamma / air.gamma;
  const wall = inputs.wall_resonance_Hz ?? 0;
  const shifted = [1, 2, 3].map((n) =>
    formantInGas(inputs[`F${String(n)}_air_Hz`] ?? 0, k, gammaRatio, wall),
  );
  return { k, gammaRatio, shifted };
}

function filterAnswer(inputs: Inputs): Record<string, Answer> {
  const F = inputs.centre_Hz ?? 0;
  const fs = inputs.sample_rate_Hz ?? 1;
  const { A, B, C } = formantResonator(F, inputs.bandwidth_Hz ?? 0, fs);
  const turn = (2 * Math.PI * F) / fs;
  const real = 1 - B * Math.cos(turn) - C * Math.cos(2 * turn);
  const imaginary = B * Math.sin(turn) + C * Math.sin(2 * turn);
  return { A, B, C, gain_at_centre_dB: 20 * Math.log10(A / Math.hypot(real, imaginary)) };
}

function expectWithin(actual: Answer | undefined, expected: Answer, tolerance: Tolerance): void {
  if (tolerance.rel !== undefined || tolerance.abs !== undefined) {
    const error = Math.abs(Number(actual) - Number(expected));
    expect(error).toBeLessThanOrEqual(
      tolerance.abs ?? (tolerance.rel ?? 0) * Math.abs(Number(expected)),
    );
    return;
  }
  if (tolerance.exact === true) {
    expect(actual).toEqual(expected);
    return;
  }
  // Wording is free; the sense is a refusal, an impossibility or a permission.
  const sense = /^(impossible|refuse|not refused)/.exec(String(expected))?.[0] ?? 'no sense';
  expect(String(actual)).toContain(sense);
}

it('the transcription holds 47 records, each with source and status, and each is answered', () => {
  expect(records).toHaveLength(47);
  for (const { id, source, status } of records) {
    expect(source).not.toBe('');
    expect(status).not.toBe('');
    expect(Object.keys(answers)).toContain(id);
  }
});

describe('sound and breathing records', () => {
  it.each(records.map((record) => [record.id, record.question, record] as const))(
    '%s within its tolerance: %s',
    (id, _question, record) => {
      const answer = answers[id]?.(record.inputs as Inputs, record) ?? {};
      for (const [key, expected] of Object.entries(record.expected)) {
        expectWithin(answer[key], expected, record.tolerance[key] ?? {});
      }
    },
  );
});
