import type { AirInput } from '../../src/science/room-air/air-input.js';
import type { AirResult } from '../../src/science/room-air/air-result.js';
import { airRun } from '../../src/science/room-air/air-run.js';
import { checkGases, checkInput } from '../support/air-fixture.js';

export type Answers = Readonly<
  Record<string, (inputs: Readonly<Record<string, unknown>>) => Readonly<Record<string, unknown>>>
>;

/** The inputs of one record, read with the shape the question gives them. */
// The record's question states the shape; the caller names it once.
// eslint-disable-next-line @typescript-eslint/no-unnecessary-type-parameters -- a named cast
export function read<T>(inputs: Readonly<Record<string, unknown>>): T {
  return inputs as T;
}

function run(parts: Parameters<typeof checkInput>[0]): AirResult {
  // The records ask for the mixed answer; some run on for weeks.
  return airRun(checkInput(parts), checkGases, { layered: false });
}

/** A box of a volume, 1 m high, so that the floor area is the volume. */
function box(id: string, volumeM3: number): AirInput['spaces'][number] {
  return { id, floorAreaM2: volumeM3, heightM: 1 };
}

function gasAt(result: AirResult, space: string, gas: string, t: number): number {
  const at = result.timesS.findIndex((one) => Math.abs(one - t) < 1e-6);
  return result.spaces[space]?.mixed.gasFraction[gas]?.[at] ?? Number.NaN;
}

function oxygenAt(result: AirResult, space: string, t: number): number {
  const at = result.timesS.findIndex((one) => Math.abs(one - t) < 1e-6);
  return result.spaces[space]?.mixed.oxygenFraction[at] ?? Number.NaN;
}

const LONG = 4e6;

/** Records answered by the run itself. */
export const mixedAnswers: Answers = {
  'AC-W01': (inputs) => {
    const i = read<{
      room_volume_m3: number;
      fresh_supply_m3_per_s: number;
      release_m3_per_s: number;
      release_duration_s: number;
      t1_s: number;
      t2_s: number;
    }>(inputs);
    const parts = {
      durationS: i.t2_s,
      outputIntervalS: i.t1_s,
      spaces: [box('a', i.room_volume_m3)],
      airSystems: [{ space: 'a', drive: 'supply', freshAirM3PerS: i.fresh_supply_m3_per_s }],
      releases: [
        {
          space: 'a',
          gas: 'Ar',
          volumeM3: i.release_m3_per_s * i.release_duration_s,
          durationS: i.release_duration_s,
        },
      ],
    } as const;
    const result = run(parts);
    const straight = airRun(checkInput(parts), checkGases, { displacement: 'straight' });
    return {
      gas_fraction_t1: gasAt(result, 'a', 'Ar', i.t1_s),
      oxygen_fraction_t1: oxygenAt(result, 'a', i.t1_s),
      gas_fraction_t2: gasAt(result, 'a', 'Ar', i.t2_s),
      gas_fraction_t1_small_release_approx: gasAt(straight, 'a', 'Ar', i.t1_s),
    };
  },
  'AC-W02': (inputs) => {
    const i = read<{
      room_volume_m3: number;
      extract_m3_per_s: number;
      release_m3_per_s: number;
      t1_s: number;
      large_release_m3_per_s: number;
    }>(inputs);
    const parts = (flow: number, end: number) => ({
      durationS: end,
      spaces: [box('a', i.room_volume_m3)],
      airSystems: [{ space: 'a', drive: 'extract' as const, freshAirM3PerS: i.extract_m3_per_s }],
      releases: [{ space: 'a', gas: 'Ar', volumeM3: flow * end, durationS: end }],
    });
    return {
      gas_fraction_t1: gasAt(run(parts(i.release_m3_per_s, i.t1_s)), 'a', 'Ar', i.t1_s),
      gas_fraction_steady: gasAt(run(parts(i.release_m3_per_s, LONG)), 'a', 'Ar', LONG),
      gas_fraction_steady_large_release: gasAt(
        run(parts(i.large_release_m3_per_s, LONG)),
        'a',
        'Ar',
        LONG,
      ),
    };
  },
  'AC-W05': (inputs) => {
    const i = read<{
      room_volume_m3: number;
      fresh_air_m3_per_s: number;
      initial_release_m3_per_s: number;
      release_decay_time_s: number;
      times_s: readonly number[];
    }>(inputs);
    const result = run({
      durationS: 900,
      outputIntervalS: 60,
      spaces: [box('a', i.room_volume_m3)],
      airSystems: [{ space: 'a', drive: 'supply', freshAirM3PerS: i.fresh_air_m3_per_s }],
      releases: [
        {
          space: 'a',
          gas: 'Ar',
          volumeM3: i.initial_release_m3_per_s * i.release_decay_time_s,
          profile: 'decaying',
          timeConstantS: i.release_decay_time_s,
        },
      ],
    });
    return { gas_fraction: i.times_s.map((t) => gasAt(result, 'a', 'Ar', t)) };
  },
  'AC-W06': (inputs) => {
    const i = read<{
      room_volume_m3: number;
      fresh_supply_m3_per_s: number;
      stage_start_s: readonly number[];
      stage_end_s: readonly number[];
      stage_release_m3_per_s: readonly number[];
      oxygen_threshold_fraction: number;
    }>(inputs);
    const result = run({
      durationS: 3000,
      outputIntervalS: 50,
      thresholds: [{ quantity: 'oxygenFraction', value: i.oxygen_threshold_fraction }],
      spaces: [box('a', i.room_volume_m3)],
      zones: [{ id: 'z', space: 'a', heightM: 0.5 }],
      airSystems: [{ space: 'a', drive: 'supply', freshAirM3PerS: i.fresh_supply_m3_per_s }],
      releases: i.stage_release_m3_per_s.map((flow, at) => {
        const startS = i.stage_start_s[at] ?? 0;
        const durationS = (i.stage_end_s[at] ?? 0) - startS;
        return { space: 'a', gas: 'Ar', volumeM3: flow * durationS, startS, durationS };
      }),
    });
    return {
      gas_fraction_stage_ends: i.stage_end_s.map((t) => gasAt(result, 'a', 'Ar', t)),
      oxygen_crossing_times_s: result.crossings
        .filter((one) => one.answer === 'mixed' && one.heightM === 0.5)
        .map((one) => one.atS),
      min_oxygen_fraction: result.zones.z?.minimum.mixed.oxygenFraction,
    };
  },
  'AC-W07': (inputs) => {
    const i = read<{
      total_supply_m3_per_s: number;
      recirculated_fraction: number;
      leakage_m3_per_s: number;
      mixing_factor: number;
      release_m3_per_s: number;
    }>(inputs);
    const volume = 100;
    const parts = {
      durationS: LONG,
      spaces: [box('a', volume)],
      airSystems: [
        {
          space: 'a',
          drive: 'supply',
          freshAirM3PerS: (1 - i.recirculated_fraction) * i.total_supply_m3_per_s,
          recirculatedM3PerS: i.recirculated_fraction * i.total_supply_m3_per_s,
          effectiveness: i.mixing_factor,
        },
      ],
      infiltration: [{ space: 'a', airChangesPerHour: (i.leakage_m3_per_s / volume) * 3600 }],
      releases: [{ space: 'a', gas: 'He', volumeM3: i.release_m3_per_s * LONG, durationS: LONG }],
    } as const;
    const exact = gasAt(run(parts), 'a', 'He', LONG);
    const straight = airRun(checkInput(parts), checkGases, { displacement: 'straight' });
    return {
      effective_fresh_m3_per_s: i.release_m3_per_s / exact - i.release_m3_per_s,
      gas_fraction_exact: exact,
      gas_fraction_small_release: gasAt(straight, 'a', 'He', LONG),
      // A filter holds back no helium: the run knows no other way out than outdoor air.
      filter_effect_factor:
        exact /
        gasAt(
          run({ ...parts, airSystems: [{ ...parts.airSystems[0], recirculatedM3PerS: 0 }] }),
          'a',
          'He',
          LONG,
        ),
    };
  },
  'AC-W08': (inputs) => {
    const i = read<{
      volume_m3: number;
      fresh_air_m3_per_s: number;
      dry_ice_mass_kg: number;
      dry_ice_loss_per_hour: number;
      persons: number;
      co2_per_person_m3_per_s: number;
      respiratory_quotient: number;
      outdoor_co2_fraction: number;
      times_s: readonly number[];
    }>(inputs);
    const end = 7200;
    const massKg = (i.dry_ice_mass_kg * i.dry_ice_loss_per_hour * end) / 3600;
    const input: AirInput = {
      ambient: {
        temperatureK: 293.15,
        pressurePa: 101325,
        relativeHumidity: 0,
        carbonDioxideFraction: i.outdoor_co2_fraction,
      },
      durationS: end,
      outputIntervalS: 1800,
      spaces: [box('a', i.volume_m3)],
      infiltration: [
        { space: 'a', airChangesPerHour: (i.fresh_air_m3_per_s / i.volume_m3) * 3600 },
      ],
      releases: [{ space: 'a', gas: 'CO2', massKg, durationS: end }],
      occupants: [
        {
          space: 'a',
          count: i.persons,
          carbonDioxideM3PerS: i.co2_per_person_m3_per_s,
          respiratoryQuotient: i.respiratory_quotient,
        },
      ],
    };
    const result = airRun(input, checkGases);
    const released = result.balance.CO2?.inMol ?? Number.NaN;
    const others =
      (i.volume_m3 * i.outdoor_co2_fraction +
        end * i.fresh_air_m3_per_s * i.outdoor_co2_fraction +
        end * i.persons * i.co2_per_person_m3_per_s) /
      0.02405511687;
    return {
      co2_fraction: i.times_s.map((t) => gasAt(result, 'a', 'CO2', t)),
      oxygen_fraction: i.times_s.map((t) => oxygenAt(result, 'a', t)),
      dry_ice_gas_flow_m3_per_s: ((released - others) * 0.02405511687) / end,
    };
  },
  'AC-N01': (inputs) => {
    const i = read<{
      volumes_m3: readonly [number, number];
      door_exchange_m3_per_s: number;
      fresh_supply_m3_per_s: readonly [number, number];
      release_room1_m3_per_s: number;
      release_duration_s: number;
      times_s: readonly number[];
    }>(inputs);
    const parts = (releaseS: number, end: number) => ({
      durationS: end,
      outputIntervalS: end === LONG ? LONG : 900,
      spaces: [box('a', i.volumes_m3[0]), box('b', i.volumes_m3[1])],
      airSystems: [
        { space: 'a', drive: 'supply' as const, freshAirM3PerS: i.fresh_supply_m3_per_s[0] },
        { space: 'b', drive: 'supply' as const, freshAirM3PerS: i.fresh_supply_m3_per_s[1] },
      ],
      transfers: [
        { from: 'a', to: 'b', flowM3PerS: i.door_exchange_m3_per_s },
        { from: 'b', to: 'a', flowM3PerS: i.door_exchange_m3_per_s },
      ],
      releases: [
        {
          space: 'a',
          gas: 'Ar',
          volumeM3: i.release_room1_m3_per_s * releaseS,
          durationS: releaseS,
        },
      ],
    });
    const result = run(parts(i.release_duration_s, 2700));
    const endless = run(parts(LONG, LONG));
    const both = (from: AirResult, t: number) => ['a', 'b'].map((id) => gasAt(from, id, 'Ar', t));
    return {
      gas_fraction_t1: both(result, i.times_s[0] ?? 0),
      gas_fraction_t2: both(result, i.times_s[1] ?? 0),
      gas_fraction_steady: both(endless, LONG),
    };
  },
  'AC-N02': (inputs) => {
    const i = read<{
      volumes_m3: readonly [number, number, number];
      flow_stage_to_auditorium_m3_per_s: number;
      flow_auditorium_to_stage_m3_per_s: number;
      flow_auditorium_to_foyer_m3_per_s: number;
      flow_foyer_to_auditorium_m3_per_s: number;
      fresh_supply_m3_per_s: readonly [number, number, number];
      release_stage_m3_per_s: number;
      release_duration_s: number;
      times_s: readonly number[];
    }>(inputs);
    const ids = ['s', 'a', 'f'] as const;
    const parts = (releaseS: number, end: number, outputIntervalS: number, start?: string) => ({
      durationS: end,
      outputIntervalS,
      spaces: ids.map((id, at) => ({
        ...box(id, i.volumes_m3[at] ?? 1),
        initial: id === start ? { Ar: 0.5 } : {},
      })),
      airSystems: ids.map((id, at) => ({
        space: id,
        drive: 'supply' as const,
        freshAirM3PerS: i.fresh_supply_m3_per_s[at] ?? 0,
      })),
      transfers: [
        { from: 's', to: 'a', flowM3PerS: i.flow_stage_to_auditorium_m3_per_s },
        { from: 'a', to: 's', flowM3PerS: i.flow_auditorium_to_stage_m3_per_s },
        { from: 'a', to: 'f', flowM3PerS: i.flow_auditorium_to_foyer_m3_per_s },
        { from: 'f', to: 'a', flowM3PerS: i.flow_foyer_to_auditorium_m3_per_s },
      ],
      releases:
        releaseS > 0
          ? [
              {
                space: 's',
                gas: 'Ar',
                volumeM3: i.release_stage_m3_per_s * releaseS,
                durationS: releaseS,
              },
            ]
          : [],
    });
    const result = run(parts(i.release_duration_s, 2400, 600));
    const endless = run(parts(LONG, LONG, LONG));
    const all = (from: AirResult, t: number) => ids.map((id) => gasAt(from, id, 'Ar', t));
    // The propagator over one step from three starts; its eigenvalues are e^(lambda t).
    const step = 600;
    const columns = ids.map((start) =>
      all(run(parts(0, step, step, start)), step).map((x) => x / 0.5),
    );
    return {
      gas_fraction_t1: all(result, i.times_s[0] ?? 0),
      gas_fraction_t2: all(result, i.times_s[1] ?? 0),
      gas_fraction_steady: all(endless, LONG),
      eigenvalues_release_off_per_s: realEigenvalues3(columns)
        .map((value) => Math.log(value) / step)
        .sort((a, b) => a - b),
    };
  },
  'AC-G05': (inputs) => {
    const i = read<{
      room_volume_m3: number;
      fresh_supply_m3_per_s: number;
      mixing_factor: number;
      release_m3_per_s: number;
      release_duration_s: number;
      times_s: readonly number[];
    }>(inputs);
    const parts = (volume: number, fresh: number, effectiveness: number) => ({
      durationS: 900,
      outputIntervalS: 300,
      spaces: [box('a', volume)],
      airSystems: [{ space: 'a', drive: 'supply' as const, freshAirM3PerS: fresh, effectiveness }],
      releases: [
        {
          space: 'a',
          gas: 'Ar',
          volumeM3: i.release_m3_per_s * i.release_duration_s,
          durationS: i.release_duration_s,
        },
      ],
    });
    const series = (result: AirResult) => i.times_s.map((t) => gasAt(result, 'a', 'Ar', t));
    const effective = i.mixing_factor * i.fresh_supply_m3_per_s;
    return {
      run_1: series(run(parts(i.room_volume_m3, effective, 1))),
      run_2: series(run(parts(i.mixing_factor * i.room_volume_m3, effective, 1))),
      reported: series(run(parts(i.room_volume_m3, i.fresh_supply_m3_per_s, i.mixing_factor))),
    };
  },
};

/** Eigenvalues of a 3 by 3 matrix with real ones, from its characteristic cubic. */
function realEigenvalues3(columns: readonly (readonly number[])[]): number[] {
  const m = (i: number, j: number): number => columns[j]?.[i] ?? 0;
  const trace = m(0, 0) + m(1, 1) + m(2, 2);
  const minors =
    m(0, 0) * m(1, 1) -
    m(0, 1) * m(1, 0) +
    m(0, 0) * m(2, 2) -
    m(0, 2) * m(2, 0) +
    m(1, 1) * m(2, 2) -
    m(1, 2) * m(2, 1);
  const determinant =
    m(0, 0) * (m(1, 1) * m(2, 2) - m(1, 2) * m(2, 1)) -
    m(0, 1) * (m(1, 0) * m(2, 2) - m(1, 2) * m(2, 0)) +
    m(0, 2) * (m(1, 0) * m(2, 1) - m(1, 1) * m(2, 0));
  const p = minors - trace ** 2 / 3;
  const q = (-2 * trace ** 3) / 27 + (trace * minors) / 3 - determinant;
  const radius = 2 * Math.sqrt(-p / 3);
  const angle = Math.acos((3 * q) / (p * radius)) / 3;
  return [0, 1, 2].map((k) => radius * Math.cos(angle - (2 * Math.PI * k) / 3) + trace / 3);
}
