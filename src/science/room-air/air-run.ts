import { airGasProblems, airInputProblems } from './air-problems.js';
import { InvalidInput } from '../../errors.js';
import type { AirGasTable } from './air-gases.js';
import type { AirInput, AirZone } from './air-input.js';
import type {
  AirResult,
  AirSeries,
  Crossing,
  GasBalance,
  HeightAir,
  SpaceAir,
  SpaceLayers,
  ZoneAir,
} from './air-result.js';
import { FALLEN_HEIGHT_M, OXYGEN_IN_DRY_AIR } from './air-constants.js';
import type { Displacement } from './air-flows.js';
import { airModel, OXYGEN, type AirModel } from './air-model.js';
import { crossingsOf, gasMaxima, oxygenMinimum, type AnswerTrack } from './answer-track.js';
import {
  layerCase,
  layeredRows,
  layerMouth,
  spaceLayers,
  type LayerCase,
} from './layered-answer.js';
import { adverseLayers, usualLayers, type LayerParameters } from './layer-parameters.js';
import { layeredTrack, type LayerTrack } from './layered-track.js';
import { layeredBands, type Band, type BandMouth } from './layered-band.js';
import { mixedTrack } from './mixed-track.js';
import {
  pieceRows,
  quantitiesOf,
  runFractions,
  spaceFractions,
  worseOf,
  type MixedRuns,
  type QuantityRow,
} from './mixed-values.js';
import { purePoolDepths } from './pure-pool.js';
import { oxygenPartialPressure } from './water-vapour.js';
import {
  boundMouth,
  boundReleases,
  FIRST_PASS_FROM_S,
  firstPassEnd,
  writeZoneBound,
  type BoundMouth,
  type BoundRelease,
} from './zone-bound.js';

export interface AirRunOptions {
  /** `straight`: the form in which a release only replaces air (the decision's M). */
  readonly displacement?: Displacement;
  /** False leaves the two-layer answer out; it never stands beside the straight form. */
  readonly layered?: boolean;
}

/**
 * Oxygen and gas in every space and zone over time [-, Pa, mol].
 *
 *   mixed  dN/dt = A N + B, each space well mixed, mixture pushed out (mixedTrack)
 *   bound  mixed background + inventory bound of the current episode (writeZoneBound)
 *
 * @param input   spaces, openings, air systems, releases, people and zones
 * @param gases   molar masses and diffusivities by gas id
 * @param options form of displacement; default exact push-out
 * @returns series at the output times, extremes and crossings between them, balance per gas
 * @throws {InvalidInput} naming every name, sum or geometry that does not hold together
 * Source: own-room-air. Assumes: constant pressure, ideal gas, each space well mixed (mixed) or a
 * level layer (bound), no wind. Accuracy: mixed is exact to 1e-8 for the balance as stated.
 */
export function airRun(
  input: AirInput,
  gases: AirGasTable,
  options: AirRunOptions = {},
): AirResult {
  const problems = [...airInputProblems(input), ...airGasProblems(input, gases)];
  const first = problems[0];
  if (first) {
    throw new InvalidInput(
      `The air input does not hold together at ${first.path}: ${first.problem}.`,
      'Correct the places listed under details.',
      problems,
    );
  }
  const displacement = options.displacement ?? 'pushOut';
  const model = airModel(input, gases);
  const timesS = outputTimes(input);
  const releases = boundReleases(model);
  const nodes = nodeTimes(model, releases, timesS);
  const poorMixing = (input.airSystems ?? []).some((system) => (system.effectiveness ?? 1) < 1);
  const runs: MixedRuns = {
    displacement,
    tracks: [
      mixedTrack(model, nodes, displacement, false),
      ...(poorMixing ? [mixedTrack(model, nodes, displacement, true)] : []),
    ],
  };
  const mixed = model.spaces.map((_, space) => mixedAnswer(model, runs, space));
  const depths = purePoolDepths(model, releases);
  const wantsLayers = displacement === 'pushOut' && (options.layered ?? true);
  const layers = wantsLayers ? layerRuns(model, gases, mixed[0]) : undefined;
  const spaces: Record<string, SpaceAir> = {};
  for (const [i, space] of model.spaces.entries()) {
    const track = mixed[i];
    if (!track) continue;
    spaces[space.id] = {
      mixed: seriesOf(model, track, timesS),
      ...(layers ? { layered: layersOfSpace(model, layers, i, track, timesS) } : {}),
      purePoolDepthM: depths[i] ?? 0,
    };
  }
  const zones: Record<string, ZoneAir> = {};
  const crossings: Crossing[] = [];
  for (const zone of input.zones ?? []) {
    const index = model.indexOf.get(zone.space) ?? 0;
    const track = mixed[index];
    const series = spaces[zone.space]?.mixed;
    if (!track || !series) continue;
    const place = {
      model,
      runs,
      releases,
      zone,
      mixed: track,
      mixedSeries: series,
      timesS,
      layers,
    };
    zones[zone.id] = {
      ...heightAnswer(place, zone.heightM, crossings),
      at02M: heightAnswer(place, FALLEN_HEIGHT_M, crossings),
    };
  }
  crossings.sort((a, b) => a.atS - b.atS);
  const answer = { timesS, spaces, zones, crossings, balance: gasBalances(model, runs) };
  if (!wantsLayers || !input.uncertainty) return answer;
  return { ...answer, ...withBands(model, gases, runs, releases, zones, timesS) };
}

function outputTimes(input: AirInput): readonly number[] {
  const count = Math.floor(input.durationS / input.outputIntervalS + 1e-9);
  const times = Array.from({ length: count + 1 }, (_, i) => i * input.outputIntervalS);
  const last = times.at(-1) ?? 0;
  if (last < input.durationS * (1 - 1e-9)) times.push(input.durationS);
  return times;
}

/** Output times and the moments at which a first pass is steepest or over. */
function nodeTimes(
  model: AirModel,
  releases: readonly BoundRelease[],
  timesS: readonly number[],
): readonly number[] {
  const times = new Set(timesS);
  for (const release of releases) {
    if (release.gathering !== 'below' || !release.startsLayered) continue;
    const area = model.spaces[release.plan.space]?.curve.floorAreaM2 ?? 0;
    times.add(release.plan.startS + FIRST_PASS_FROM_S);
    times.add(firstPassEnd(release, area));
  }
  return [...times].filter((t) => t <= model.input.durationS).sort((a, b) => a - b);
}

function mixedAnswer(model: AirModel, runs: MixedRuns, space: number): AnswerTrack {
  const count = runs.tracks[0]?.length ?? 0;
  return {
    pieces: Array.from({ length: count }, (_, piece) => ({
      rows: pieceRows(model, runs, piece, space),
      valuesAt: (t: number) =>
        runFractions(model, runs, piece, space, t)
          .map((fractions) => quantitiesOf(model, fractions))
          .reduce(worseOf),
    })),
  };
}

/** What a mouth in a zone needs to be answered. */
interface ZonePlace {
  readonly model: AirModel;
  readonly runs: MixedRuns;
  readonly releases: readonly BoundRelease[];
  readonly zone: AirZone;
  readonly mixed: AnswerTrack;
  readonly mixedSeries: AirSeries;
  readonly timesS: readonly number[];
  readonly layers: LayerRuns | undefined;
}

/** The zones with the band of their layered answer, and what drives it. */
function withBands(
  model: AirModel,
  gases: AirGasTable,
  runs: MixedRuns,
  releases: readonly BoundRelease[],
  zones: Readonly<Record<string, ZoneAir>>,
  timesS: readonly number[],
): Pick<AirResult, 'zones' | 'drivers'> {
  const input = model.input;
  const places = (input.zones ?? []).flatMap((zone) =>
    [zone.heightM, FALLEN_HEIGHT_M].map((heightM) => ({ zone, heightM })),
  );
  const mouths = places.map(({ zone, heightM }): BandMouth => {
    const space = model.indexOf.get(zone.space) ?? 0;
    const mouth = boundMouth(model, releases, space, zone.floorLevelM, heightM);
    const bound = boundAnswer({ model, runs, releases }, mouth);
    return {
      zone: heightM === zone.heightM ? zone.id : '',
      at: layerMouth(model, mouth, zone.floorLevelM),
      bounds: bound.pieces.flatMap((piece) => piece.rows),
    };
  });
  const { bands, drivers } = layeredBands(input, gases, mouths, timesS, model.gases);
  const seriesAt = (rows: readonly Float64Array[]): AirSeries =>
    seriesOf(
      model,
      {
        pieces: [
          {
            rows: rows.map((values, i) => ({ t: timesS[i] ?? 0, values, slopes: undefined })),
            valuesAt: () => new Float64Array(0),
          },
        ],
      },
      timesS,
    );
  const banded = (height: HeightAir, band: Band | undefined): HeightAir =>
    band && height.layered
      ? {
          ...height,
          layered: {
            ...height.layered,
            p05: seriesAt(band.p05),
            p50: seriesAt(band.p50),
            p95: seriesAt(band.p95),
          },
        }
      : height;
  return {
    zones: Object.fromEntries(
      (input.zones ?? []).flatMap((zone, i) => {
        const air = zones[zone.id];
        if (!air) return [];
        const at02M = banded(air.at02M, bands[2 * i + 1]);
        return [[zone.id, { ...air, ...banded(air, bands[2 * i]), at02M }]];
      }),
    ),
    drivers: drivers.filter((driver) => driver.zone !== ''),
  };
}

interface LayerRun {
  readonly parameters: LayerParameters;
  readonly track: LayerTrack;
}

/** The usual two-layer run and those without any mixing. */
interface LayerRuns {
  readonly one: LayerCase;
  /** Undefined where nothing gathers as a layer: then the mixed answer is the layered one. */
  readonly usual: LayerRun | undefined;
  readonly adverse: readonly LayerRun[];
}

function layerRuns(model: AirModel, gases: AirGasTable, rows: AnswerTrack | undefined): LayerRuns {
  const one = layerCase(model, gases);
  const times = new Set(rows?.pieces.flatMap((piece) => piece.rows.map((row) => row.t)) ?? []);
  const timesS = [...times].sort((a, b) => a - b);
  const { network } = one;
  const overrides = model.input.layers ?? {};
  const hasFalls = network.weirs.some((weir) => weir.b >= 0 && weir.sillA !== weir.sillB);
  const run = (parameters: LayerParameters): LayerRun => ({
    parameters,
    track: layeredTrack(one.network, parameters, timesS),
  });
  if (network.layers.length === 0) return { one, usual: undefined, adverse: [] };
  return {
    one,
    usual: run(usualLayers(overrides)),
    adverse: adverseLayers(overrides, hasFalls, network.groupVolumesM3.length > 1).map(run),
  };
}

function layersOfSpace(
  model: AirModel,
  layers: LayerRuns,
  space: number,
  mixed: AnswerTrack,
  timesS: readonly number[],
): SpaceLayers {
  if (layers.usual) {
    return spaceLayers(layers.one, layers.usual.track, space, model.gases, timesS);
  }
  const none = timesS.map(() => 0);
  const { oxygenFraction, gasFraction } = seriesOf(model, mixed, timesS);
  const same = { oxygenFraction, gasFraction };
  return {
    floorLayerDepthM: none,
    ceilingLayerDepthM: none,
    floorLayer: same,
    middle: same,
    ceilingLayer: same,
  };
}

function boundAnswer(
  place: Pick<ZonePlace, 'model' | 'runs' | 'releases'>,
  mouth: BoundMouth,
): AnswerTrack {
  const { model, runs, releases } = place;
  const width = model.gases.length + 1;
  const boundOf = (t: number, fractions: Float64Array): Float64Array => {
    const values = new Float64Array(width);
    writeZoneBound(model, releases, mouth, t, fractions, values);
    return values;
  };
  const pieces = runs.tracks[0] ?? [];
  return {
    pieces: pieces.map((piece, at) => {
      const isLast = at + 1 === pieces.length;
      return {
        rows: piece.nodes.map((node, i): QuantityRow => {
          // At the end of a piece nothing of the next one has been released yet.
          const t = i + 1 === piece.nodes.length && !isLast ? justBefore(node.t) : node.t;
          const values = runs.tracks
            .flatMap((track) => {
              const one = track[at]?.nodes[i];
              if (!one) return [];
              return [
                boundOf(
                  t,
                  spaceFractions(
                    model,
                    one.amounts,
                    one.capacities,
                    mouth.space,
                    runs.displacement,
                  ),
                ),
              ];
            })
            .reduce(worseOf);
          return { t: node.t, values, slopes: undefined };
        }),
        valuesAt: (t: number) =>
          runFractions(model, runs, at, mouth.space, t)
            .map((fractions) => boundOf(t, fractions))
            .reduce(worseOf),
      };
    }),
  };
}

function justBefore(t: number): number {
  return t - 1e-9 * Math.max(1, t);
}

function heightAnswer(place: ZonePlace, heightM: number, crossings: Crossing[]): HeightAir {
  const { model, zone, mixed, mixedSeries, timesS, releases } = place;
  const mouth = boundMouth(
    model,
    releases,
    model.indexOf.get(zone.space) ?? 0,
    zone.floorLevelM,
    heightM,
  );
  const bound = boundAnswer(place, mouth);
  const layered = layeredAnswers(place, mouth, bound);
  const answers = [
    ['mixed', mixed],
    ['bound', bound],
    ...(layered ? ([['layered', layered.usual]] as const) : []),
  ] as const;
  for (const { quantity, value } of model.input.thresholds ?? []) {
    const column = quantity === 'oxygenFraction' ? 0 : model.gases.indexOf(quantity) + 1;
    if (quantity !== 'oxygenFraction' && column === 0) continue;
    for (const [answer, track] of answers) {
      for (const found of crossingsOf(track, column, value)) {
        crossings.push({ zone: zone.id, heightM, answer, quantity, value, ...found });
      }
    }
  }
  const common = {
    heightM,
    mixed: mixedSeries,
    bound: seriesOf(model, bound, timesS),
  };
  const minimum = { mixed: oxygenMinimum(mixed), bound: oxygenMinimum(bound) };
  const maximum = {
    mixed: gasMaxima(mixed, model.gases),
    bound: gasMaxima(bound, model.gases),
  };
  if (!layered) return { ...common, minimum, maximum };
  return {
    ...common,
    layered: {
      ...seriesOf(model, layered.usual, timesS),
      adverse: seriesOf(model, layered.adverse, timesS),
    },
    minimum: { ...minimum, layered: oxygenMinimum(layered.usual) },
    maximum: { ...maximum, layered: gasMaxima(layered.usual, model.gases) },
  };
}

/** The usual two-layer answer at a mouth, and the worst of the runs without any mixing. */
function layeredAnswers(
  place: ZonePlace,
  mouth: BoundMouth,
  bound: AnswerTrack,
): { readonly usual: AnswerTrack; readonly adverse: AnswerTrack } | undefined {
  const { model, zone, layers } = place;
  if (!layers) return undefined;
  if (!layers.usual) return { usual: place.mixed, adverse: place.mixed };
  const at = layerMouth(model, mouth, zone.floorLevelM);
  const bounds = bound.pieces.flatMap((piece) => piece.rows);
  const rowsOf = (run: LayerRun): AnswerTrack =>
    layeredRows(layers.one, run.track, at, run.parameters, bounds);
  return { usual: rowsOf(layers.usual), adverse: worstTrack(layers.adverse.map(rowsOf)) };
}

/** The worse of several answers at each row; all have the same times. */
function worstTrack(tracks: readonly AnswerTrack[]): AnswerTrack {
  const all = tracks.map((track) => track.pieces.flatMap((piece) => piece.rows));
  const [first = []] = all;
  const rows = first.map((row, i): QuantityRow => ({
    t: row.t,
    values: all.map((one) => one[i]?.values ?? row.values).reduce(worseOf),
    slopes: undefined,
  }));
  return { pieces: [{ rows, valuesAt: () => new Float64Array(0) }] };
}

/** The rows at the output times; at a jump the state after it. */
function seriesOf(model: AirModel, track: AnswerTrack, timesS: readonly number[]): AirSeries {
  const { pressurePa } = model.input.ambient;
  const rows = track.pieces.flatMap((piece) => piece.rows);
  const oxygenFraction: number[] = [];
  const oxygenPartialPressurePa: number[] = [];
  const gasFraction = model.gases.map((): number[] => []);
  let at = 0;
  for (const t of timesS) {
    while ((rows[at + 1]?.t ?? Infinity) <= t) at++;
    const values = rows[at]?.values ?? new Float64Array(model.gases.length + 1);
    const oxygen = values[0] ?? 0;
    oxygenFraction.push(oxygen);
    oxygenPartialPressurePa.push(
      oxygenPartialPressure(
        oxygen,
        Math.max(0, 1 - oxygen / OXYGEN_IN_DRY_AIR),
        pressurePa,
        model.vapourPressurePa,
      ),
    );
    for (const [i, column] of gasFraction.entries()) column.push(values[i + 1] ?? 0);
  }
  return {
    oxygenFraction,
    oxygenPartialPressurePa,
    gasFraction: Object.fromEntries(model.gases.map((gas, i) => [gas, gasFraction[i] ?? []])),
  };
}

/** What came in, left and stayed, per gas and for oxygen, from the run without mixing volume. */
function gasBalances(model: AirModel, runs: MixedRuns): Readonly<Record<string, GasBalance>> {
  const n = model.spaces.length;
  const m = model.components.length;
  const amounts = runs.tracks[0]?.at(-1)?.nodes.at(-1)?.amounts ?? new Float64Array((n + 2) * m);
  const balances: Record<string, GasBalance> = {};
  for (const gas of new Set(['O2', ...model.gases])) {
    let held = 0;
    let out = 0;
    let into = 0;
    for (const [k, one] of model.components.entries()) {
      if (gas === 'O2' ? k !== OXYGEN : one.gas !== gas) continue;
      for (let i = 0; i < n; i++) held += amounts[i * m + k] ?? 0;
      out += amounts[n * m + k] ?? 0;
      into += amounts[(n + 1) * m + k] ?? 0;
    }
    balances[gas] = {
      inMol: into / model.molarVolumeM3,
      outMol: out / model.molarVolumeM3,
      heldMol: held / model.molarVolumeM3,
      relativeError: into > 0 ? Math.abs(into - out - held) / into : 0,
    };
  }
  return balances;
}
