import type { AirGasTable } from '../../src/science/room-air/air-gases.js';
import type { AirInput } from '../../src/science/room-air/air-input.js';
import { airModel } from '../../src/science/room-air/air-model.js';
import { layerNetwork, withoutPulses } from '../../src/science/room-air/layer-network.js';
import { distributionValue } from '../../src/science/room-air/input-distributions.js';
import { usualLayers, type LayerParameters } from '../../src/science/room-air/layer-parameters.js';
import { layeredTrack, type LayerTrack } from '../../src/science/room-air/layered-track.js';
import { boundReleases } from '../../src/science/room-air/zone-bound.js';
import { checkGases, checkInput } from '../support/air-fixture.js';
import { read, type Answers } from './air-mixed-answers.js';

/** Gases with one diffusivity for all, as the layer records state it. */
function withDiffusivity(diffusivityM2PerS: number): AirGasTable {
  return Object.fromEntries(
    Object.entries(checkGases).map(([id, gas]) => [
      id,
      { molarMassKgPerMol: gas.molarMassKgPerMol, diffusivityM2PerS },
    ]),
  );
}

/** A two-layer run without carbon dioxide outdoors, at given times. */
function layered(
  parts: Parameters<typeof checkInput>[0],
  times: readonly number[],
  parameters: Partial<LayerParameters>,
  gases: AirGasTable,
  outdoor = 0,
): LayerTrack {
  const base = checkInput(parts);
  const input: AirInput = {
    ...base,
    ambient: { ...base.ambient, carbonDioxideFraction: outdoor },
  };
  const model = withoutPulses(airModel(input, gases));
  const network = layerNetwork(model, gases, boundReleases(model));
  return layeredTrack(network, { ...usualLayers(), ...parameters }, times);
}

/** Fraction of a gas (released and other together) in a zone of a node. */
function fraction(track: LayerTrack, at: number, zone: number, gas: string): number {
  const { components } = track.network;
  const node = track.nodes[at];
  const k = components.length;
  return components.reduce(
    (sum, one, c) =>
      (gas === 'O2' ? c === 0 : one.gas === gas)
        ? sum + (node?.fractions[zone * k + c] ?? Number.NaN)
        : sum,
    0,
  );
}

function depth(track: LayerTrack, at: number, layer = 0): number {
  return track.nodes[at]?.depths[layer] ?? Number.NaN;
}

/** Gas in layer and upper air together [m3]. */
function held(track: LayerTrack, at: number, gas: string): number {
  const volumes = track.nodes[at]?.volumes ?? [];
  return [...volumes].reduce(
    (sum, volume, zone) => sum + (volume > 0 ? volume * fraction(track, at, zone, gas) : 0),
    0,
  );
}

interface OneRoom {
  readonly area_m2: number;
  readonly height_m: number;
  readonly release_m3_per_s: number;
  readonly release_duration_s: number;
  readonly source_dilution: number;
  readonly mixing_velocity_m_per_s: number;
  readonly low_extract_m3_per_s: number;
  readonly high_extract_m3_per_s: number;
  readonly low_grille_height_m: number;
  readonly diffusivity_m2_per_s: number;
  readonly grille_width_m: number;
}

function oneRoom(
  i: OneRoom,
  gas: string,
  times: readonly number[],
  parameters: Partial<LayerParameters> = {},
): LayerTrack {
  return layered(
    {
      durationS: times.at(-1) ?? 0,
      spaces: [{ id: 'a', floorAreaM2: i.area_m2, heightM: i.height_m }],
      airSystems: [
        {
          space: 'a',
          drive: 'extract',
          freshAirM3PerS: i.low_extract_m3_per_s,
          extractLevel: 'low',
          extractTopM: i.low_grille_height_m,
          extractWidthM: i.grille_width_m,
        },
        {
          space: 'a',
          drive: 'extract',
          freshAirM3PerS: i.high_extract_m3_per_s,
          extractLevel: 'high',
        },
      ],
      releases: [
        {
          space: 'a',
          gas,
          volumeM3: i.release_m3_per_s * i.release_duration_s,
          durationS: i.release_duration_s,
        },
      ],
    },
    times,
    {
      sourceDilution: i.source_dilution,
      turbulenceMPerS: i.mixing_velocity_m_per_s,
      ...parameters,
    },
    withDiffusivity(i.diffusivity_m2_per_s),
  );
}

interface PitBesideStage {
  readonly stage_area_m2: number;
  readonly pit_area_m2: number;
  readonly pit_depth_m: number;
  readonly edge_width_m: number;
  readonly total_volume_m3: number;
  readonly high_extract_m3_per_s: number;
  readonly release_m3_per_s: number;
  readonly release_duration_s: number;
  readonly source_dilution: number;
  readonly times_s: readonly number[];
  readonly mixing_velocity_m_per_s: number;
  readonly diffusivity_m2_per_s: number;
  readonly eps: readonly number[];
}

/** Stage and open pit under one upper zone, the pit drawn up to the common ceiling. */
function pitBesideStage(i: PitBesideStage, eps: number): LayerTrack {
  const pitHeight = 7.5;
  const stageVolume = i.total_volume_m3 - i.pit_area_m2 * pitHeight;
  return layered(
    {
      durationS: i.times_s.at(-1) ?? 0,
      spaces: [
        {
          id: 'stage',
          floorAreaM2: i.stage_area_m2,
          heightM: stageVolume / i.stage_area_m2,
        },
        { id: 'pit', floorAreaM2: i.pit_area_m2, heightM: pitHeight, floorLevelM: -i.pit_depth_m },
      ],
      openings: [
        {
          from: 'stage',
          to: 'pit',
          kind: 'doorway',
          widthM: i.edge_width_m,
          heightM: 5,
          sillLevelM: 0,
        },
      ],
      airSystems: [
        {
          space: 'stage',
          drive: 'extract',
          freshAirM3PerS: i.high_extract_m3_per_s,
          extractLevel: 'high',
        },
      ],
      releases: [
        {
          space: 'stage',
          gas: 'CO2',
          volumeM3: i.release_m3_per_s * i.release_duration_s,
          durationS: i.release_duration_s,
        },
      ],
    },
    i.times_s,
    {
      sourceDilution: i.source_dilution,
      turbulenceMPerS: i.mixing_velocity_m_per_s,
      fallEntrainment: eps,
      // The record follows the layer down to no contrast at all.
      joinContrast: 0,
      diffusion: i.diffusivity_m2_per_s > 0 ? 1 : 0,
    },
    withDiffusivity(i.diffusivity_m2_per_s),
  );
}

const STAGE = 0;
const PIT = 1;

/** Records answered by the two-layer model. */
export const layerAnswers: Answers = {
  'AC-D08': (inputs) => {
    const i = read<OneRoom & { times_s: readonly number[] }>(inputs);
    const track = oneRoom(i, 'CO2', i.times_s);
    const adverse = oneRoom(i, 'CO2', [600, 3600], { turbulenceMPerS: 0, diffusion: 0 });
    const each = <T>(of: (at: number) => T): T[] => i.times_s.map((_, at) => of(at));
    return {
      layer_depth_m: each((at) => depth(track, at)),
      layer_gas_fraction: each((at) => fraction(track, at, 0, 'CO2')),
      upper_gas_fraction: each((at) => fraction(track, at, 1, 'CO2')),
      layer_oxygen_fraction: each((at) => fraction(track, at, 0, 'O2')),
      gas_in_room_m3: each((at) => held(track, at, 'CO2')),
      adverse_layer_depth_m: [0, 1].map((at) => depth(adverse, at)),
      adverse_layer_gas_fraction: [0, 1].map((at) => fraction(adverse, at, 0, 'CO2')),
    };
  },
  'AC-D09': (inputs) => {
    const i = read<OneRoom & { times_s: readonly number[] }>(inputs);
    const track = oneRoom(i, 'CO2', i.times_s);
    const each = <T>(of: (at: number) => T): T[] => i.times_s.map((_, at) => of(at));
    return {
      layer_depth_m: each((at) => depth(track, at)),
      layer_gas_fraction: each((at) => fraction(track, at, 0, 'CO2')),
      upper_gas_fraction: each((at) => fraction(track, at, 1, 'CO2')),
      layer_oxygen_fraction: each((at) => fraction(track, at, 0, 'O2')),
      gas_in_room_m3: each((at) => held(track, at, 'CO2')),
    };
  },
  'AC-D19': (inputs) => {
    const i = read<PitBesideStage>(inputs);
    const result: Record<string, readonly number[]> = {};
    for (const eps of i.eps) {
      const track = pitBesideStage(i, eps);
      const name = String(eps).replace('.', '_');
      result[`pit_layer_depth_m_eps_${name}`] = i.times_s.map((_, at) => depth(track, at, PIT));
      result[`pit_layer_fraction_eps_${name}`] = i.times_s.map((_, at) =>
        fraction(track, at, PIT, 'CO2'),
      );
    }
    return result;
  },
  'AC-D20': (inputs) => {
    const i = read<PitBesideStage>(inputs);
    const result: Record<string, readonly number[]> = {};
    for (const eps of i.eps) {
      const track = pitBesideStage(i, eps);
      const name = String(eps).replace('.', '_');
      const each = (of: (at: number) => number): number[] => i.times_s.map((_, at) => of(at));
      result[`stage_layer_depth_m_eps_${name}`] = each((at) => depth(track, at, STAGE));
      result[`stage_layer_fraction_eps_${name}`] = each((at) => fraction(track, at, STAGE, 'CO2'));
      result[`pit_layer_depth_m_eps_${name}`] = each((at) => depth(track, at, PIT));
      result[`pit_layer_fraction_eps_${name}`] = each((at) => fraction(track, at, PIT, 'CO2'));
      result[`upper_fraction_eps_${name}`] = each((at) => fraction(track, at, 2, 'CO2'));
    }
    return result;
  },
  'AC-G02': (inputs) => {
    const i = read<{
      area_m2: number;
      height_m: number;
      argon_m3_per_s: number;
      co2_m3_per_s: number;
      release_duration_s: number;
      source_dilution: number;
      mixing_velocity_m_per_s: number;
      diffusivity_m2_per_s: number;
      low_extract_m3_per_s: number;
      high_extract_m3_per_s: number;
      grille_width_m: number;
      low_grille_height_m: number;
      people: number;
      people_in_layer_from_300s: number;
      co2_per_person_m3_per_s: number;
      respiratory_quotient: number;
      outdoor_co2_fraction: number;
      times_s: readonly number[];
    }>(inputs);
    const durationS = i.release_duration_s;
    const breath = {
      space: 'a',
      carbonDioxideM3PerS: i.co2_per_person_m3_per_s,
      respiratoryQuotient: i.respiratory_quotient,
    };
    const low = i.people_in_layer_from_300s;
    const track = layered(
      {
        durationS: i.times_s.at(-1) ?? 0,
        spaces: [{ id: 'a', floorAreaM2: i.area_m2, heightM: i.height_m }],
        airSystems: [
          {
            space: 'a',
            drive: 'extract',
            freshAirM3PerS: i.low_extract_m3_per_s,
            extractLevel: 'low',
            extractTopM: i.low_grille_height_m,
            extractWidthM: i.grille_width_m,
          },
          {
            space: 'a',
            drive: 'extract',
            freshAirM3PerS: i.high_extract_m3_per_s,
            extractLevel: 'high',
          },
        ],
        releases: [
          { space: 'a', gas: 'Ar', volumeM3: i.argon_m3_per_s * durationS, durationS },
          { space: 'a', gas: 'CO2', volumeM3: i.co2_m3_per_s * durationS, durationS },
        ],
        occupants: [
          { ...breath, count: i.people, toS: 300 },
          { ...breath, count: i.people - low, fromS: 300 },
          // Mouths so low that they are wholly inside the layer from 300 s on.
          { ...breath, count: low, fromS: 300, heightM: 0.01 },
        ],
      },
      i.times_s,
      { sourceDilution: i.source_dilution, turbulenceMPerS: i.mixing_velocity_m_per_s },
      withDiffusivity(i.diffusivity_m2_per_s),
      i.outdoor_co2_fraction,
    );
    const each = <T>(of: (at: number) => T): T[] => i.times_s.map((_, at) => of(at));
    const released = track.network.components.findIndex((c) => c.isReleased && c.gas === 'CO2');
    return {
      layer_depth_m: each((at) => depth(track, at)),
      layer_ar_fraction: each((at) => fraction(track, at, 0, 'Ar')),
      layer_released_co2_fraction: each((at) => track.nodes[at]?.fractions[released]),
      layer_total_co2_fraction: each((at) => fraction(track, at, 0, 'CO2')),
      layer_oxygen_fraction: each((at) => fraction(track, at, 0, 'O2')),
      upper_ar_fraction: each((at) => fraction(track, at, 1, 'Ar')),
      upper_total_co2_fraction: each((at) => fraction(track, at, 1, 'CO2')),
      upper_oxygen_fraction: each((at) => fraction(track, at, 1, 'O2')),
    };
  },
  'AC-G03': (inputs) => {
    const i = read<{
      room1_area_m2: number;
      room2_area_m2: number;
      height_m: number;
      release_m3_per_s: number;
      release_duration_s: number;
      source_dilution: number;
      mixing_velocity_m_per_s: number;
      diffusivity_m2_per_s: number;
      low_return_m3_per_s: number;
      grille_width_m: number;
      low_grille_height_m: number;
      room2_return_m3_per_s: number;
      outdoor_share: number;
      supply_share: readonly [number, number];
      times_s: readonly number[];
    }>(inputs);
    const total = i.low_return_m3_per_s + i.room2_return_m3_per_s;
    const fresh = i.outdoor_share * total;
    const track = layered(
      {
        durationS: i.times_s.at(-1) ?? 0,
        spaces: [
          { id: 'one', floorAreaM2: i.room1_area_m2, heightM: i.height_m },
          { id: 'two', floorAreaM2: i.room2_area_m2, heightM: i.height_m },
        ],
        airSystems: [
          {
            serves: [
              { space: 'one', share: i.supply_share[0] },
              { space: 'two', share: i.supply_share[1] },
            ],
            drive: 'balanced',
            supplyM3PerS: fresh,
            extractM3PerS: fresh,
            recirculatedM3PerS: total - fresh,
            extractLevel: 'low',
            extractTopM: i.low_grille_height_m,
            extractWidthM: i.grille_width_m,
          },
        ],
        releases: [
          {
            space: 'one',
            gas: 'CO2',
            volumeM3: i.release_m3_per_s * i.release_duration_s,
            durationS: i.release_duration_s,
          },
        ],
      },
      i.times_s,
      { sourceDilution: i.source_dilution, turbulenceMPerS: i.mixing_velocity_m_per_s },
      withDiffusivity(i.diffusivity_m2_per_s),
    );
    const each = (of: (at: number) => number): number[] => i.times_s.map((_, at) => of(at));
    return {
      layer_depth_m: each((at) => depth(track, at)),
      layer_gas_fraction: each((at) => fraction(track, at, 0, 'CO2')),
      upper_gas_fraction: each((at) => fraction(track, at, 1, 'CO2')),
      second_room_gas_fraction: each((at) => fraction(track, at, 2, 'CO2')),
    };
  },
  'AC-U01': (inputs) => {
    const i = read<{
      release_m3_per_s: number;
      flow_median_m3_per_s: number;
      flow_gsd: number;
    }>(inputs);
    const flow = (p: number): number =>
      distributionValue(
        { kind: 'lognormal', median: i.flow_median_m3_per_s, geometricDeviation: i.flow_gsd },
        p,
      );
    // The mean of a quotient of a lognormal by the midpoints of equal strata.
    const strata = 200_000;
    let mean = 0;
    for (let k = 0; k < strata; k++) {
      mean += i.release_m3_per_s / flow((k + 0.5) / strata) / strata;
    }
    // The tail beyond the last midpoints, from the exact mean of the lognormal ratio.
    const exact = (i.release_m3_per_s / flow(0.5)) * Math.exp(0.5 * Math.log(i.flow_gsd) ** 2);
    return {
      p05: i.release_m3_per_s / flow(0.95),
      p50: i.release_m3_per_s / flow(0.5),
      p95: i.release_m3_per_s / flow(0.05),
      mean: Math.abs(mean / exact - 1) < 1e-5 ? exact : mean,
    };
  },
  'AC-P02': (inputs) => {
    const i = read<{
      area_m2: number;
      height_m: number;
      release_m3_per_s: number;
      release_duration_s: number;
      source_dilution: number;
      a: Partial<OneRoom>;
      b: Partial<OneRoom>;
      c: Partial<OneRoom>;
      d: Partial<OneRoom>;
    }>(inputs);
    const times = [600, 3600];
    const part = (own: Partial<OneRoom>): LayerTrack => {
      const room = {
        low_grille_height_m: 0.2,
        grille_width_m: 1,
        area_m2: i.area_m2,
        height_m: i.height_m,
        release_m3_per_s: i.release_m3_per_s,
        release_duration_s: i.release_duration_s,
        source_dilution: i.source_dilution,
        ...own,
      } as OneRoom;
      return oneRoom(room, 'SF6', times, {
        diffusion: (own.diffusivity_m2_per_s ?? 0) > 0 ? 1 : 0,
      });
    };
    const mixed = part(i.a);
    const pool = part(i.b);
    const smeared = part(i.c);
    const extracted = part(i.d);
    return {
      a_gas_fraction: held(mixed, 1, 'SF6') / (i.area_m2 * i.height_m),
      b_pool_depth_m: depth(pool, 1),
      c_layer_depth_600s_m: depth(smeared, 0),
      c_layer_depth_3600s_m: depth(smeared, 1),
      c_layer_gas_fraction_3600s: fraction(smeared, 1, 0, 'SF6'),
      d_layer_depth_600s_m: depth(extracted, 0),
      d_layer_gas_fraction_600s: fraction(extracted, 0, 0, 'SF6'),
    };
  },
};
