import { airGasProblems, airInputProblems } from './air-problems.js';
import { InvalidInput, NotComputable } from '../../errors.js';
import type { AirGasTable } from './air-gases.js';
import type { AirInput, AirZone } from './air-input.js';
import type {
  AirAnswer,
  AirResult,
  AirSeries,
  Crossing,
  Extreme,
  GasBalance,
  HeightAir,
  LayeredSeries,
  OxygenExtreme,
  SpaceAir,
  ZoneAir,
} from './air-result.js';
import { FALLEN_HEIGHT_M } from './air-constants.js';
import { flowSegments, type Displacement } from './air-flows.js';
import { airModel, OXYGEN, type AirModel } from './air-model.js';
import { outputRows, seriesOf } from './air-series.js';
import { crossingsOf, gasMaxima, oxygenMinimum, type FlatTrack } from './answer-track.js';
import { bandedZones } from './air-band.js';
import { layerRuns, noLayers, type MouthLayers } from './layer-runs.js';
import { mixedTrack } from './mixed-track.js';
import { spaceTrack, type MixedRuns } from './mixed-values.js';
import { purePoolDepths } from './pure-pool.js';
import {
  boundMouth,
  boundReleases,
  boundTrack,
  FIRST_PASS_FROM_S,
  type BoundMouth,
  type BoundRelease,
} from './zone-bound.js';

export interface AirRunOptions {
  /** `straight`: the form in which a release only replaces air (the decision's M). */
  readonly displacement?: Displacement;
  /** False leaves the two-layer answer out; it never stands beside the straight form. */
  readonly layered?: boolean;
  /** False leaves out the runs without any mixing, the dearer part of the two-layer answer. */
  readonly adverse?: boolean;
}

/**
 * Oxygen and gas in every space and zone over time [-, Pa, mol].
 *
 *   mixed  dN/dt = A N + B, each space well mixed, mixture pushed out (mixedTrack)
 *   bound  mixed background + inventory bound of all gas that no reading closed (boundTrack)
 *
 * @param input   spaces, openings, air systems, releases, people and zones
 * @param gases   molar masses and diffusivities by gas id
 * @param options form of displacement; default exact push-out
 * @returns series at the output times, extremes and crossings between them, balance per gas
 * @throws {InvalidInput} naming every name, sum or geometry that does not hold together
 * Source: own-room-air. Assumes: constant pressure, ideal gas, each space well mixed (mixed) or a
 * level layer (bound), no wind. Accuracy: mixed is exact where flows are constant, else within 1e-6 of
 * the balance as stated.
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
  const runs = mixedRuns(model, nodes, displacement);
  const mixed = model.spaces.map((_, space) =>
    answerOf(spaceTrack(model, runs, space), model.gases),
  );
  const rows = outputRows(runs.tracks[0].timesS, timesS);
  const depths = purePoolDepths(model, releases);
  const wantsLayers = displacement === 'pushOut' && (options.layered ?? true);
  const isStraight = displacement === 'straight';
  const places = new Map<string, Place>();
  const placeOf = (zone: AirZone, heightM: number): Place => {
    const key = `${zone.space}\n${String(zone.floorLevelM)} ${String(heightM)}`;
    const known = places.get(key);
    if (known) return known;
    const space = model.indexOf.get(zone.space) ?? 0;
    const mouth = boundMouth(model, releases, space, zone.floorLevelM, heightM);
    const bound = onFirstUse(() => answerOf(boundTrack(model, runs, releases, mouth), model.gases));
    const boundSeries = onFirstUse(() => seriesOf(model, bound().track, rows));
    const { floorLevelM } = zone;
    const place = { index: places.size, mouth, floorLevelM, bound, boundSeries };
    places.set(key, place);
    return place;
  };
  const mouths = (input.zones ?? []).flatMap((zone) =>
    [zone.heightM, FALLEN_HEIGHT_M].map((heightM): Mouth => ({
      zone,
      heightM,
      place: placeOf(zone, heightM),
    })),
  );
  const layers = wantsLayers
    ? layerRuns(
        model,
        gases,
        [...places.values()].map(({ mouth, floorLevelM, bound }) => ({
          mouth,
          floorLevelM,
          bound: bound().track,
        })),
        runs.tracks[0].timesS,
        options.adverse ?? true,
      )
    : undefined;
  const layeredPlaces = new Map<number, LayeredPlace>();
  const layeredAt = wantsLayers
    ? ({ index, mouth }: Place): LayeredPlace => {
        const flat =
          mixed[mouth.space] ?? answerOf(spaceTrack(model, runs, mouth.space), model.gases);
        const found =
          layeredPlaces.get(index) ??
          layeredPlace(model, flat, layers?.mouths[index], rows, timesS);
        layeredPlaces.set(index, found);
        return found;
      }
    : undefined;
  const spaces: Record<string, SpaceAir> = {};
  for (const [i, space] of model.spaces.entries()) {
    const one = mixed[i];
    if (!one) continue;
    const series = seriesOf(model, one.track, rows);
    spaces[space.id] = {
      mixed: series,
      ...(wantsLayers ? { layered: layers?.spaceLayers(i, timesS) ?? noLayers(series) } : {}),
      purePoolDepthM: depths[i] ?? 0,
    };
  }
  const zones: Record<string, ZoneAir> = {};
  const crossings: Crossing[] = [];
  for (const [z, zone] of (input.zones ?? []).entries()) {
    const one = mixed[model.indexOf.get(zone.space) ?? 0];
    const series = spaces[zone.space]?.mixed;
    if (!one || !series) continue;
    const common = { model, mixed: one, mixedSeries: series, layered: layeredAt };
    const answerAt = (m: number): HeightAir | undefined => {
      const mouth = mouths[m];
      if (!mouth) return undefined;
      return heightAnswer(common, mouth, isStraight, crossings);
    };
    const own = answerAt(2 * z);
    const at02M = answerAt(2 * z + 1);
    if (own && at02M) zones[zone.id] = Object.assign(own, { at02M });
  }
  crossings.sort((a, b) => a.atS - b.atS);
  const answer = {
    timesS,
    spaces,
    zones,
    crossings,
    balance: gasBalances(model, runs, layers?.balanceError ?? 0),
  };
  if (!wantsLayers || !input.uncertainty) return answer;
  const asked = mouths.map(({ place }) => ({
    mouth: place.mouth,
    floorLevelM: place.floorLevelM,
    bound: place.bound().track,
  }));
  const flat = mixed.map(({ track }) => track);
  return { ...answer, ...bandedZones({ model, gases, asked, mixed: flat, timesS }, zones) };
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
    times.add(release.plan.startS + FIRST_PASS_FROM_S);
    times.add(release.passEndS);
  }
  return [...times].filter((t) => t <= model.input.durationS).sort((a, b) => a - b);
}

/** The well-mixed run; where a mixing factor is below 1 also the one in which it shrinks volumes. */
function mixedRuns(
  model: AirModel,
  nodesS: readonly number[],
  displacement: Displacement,
): MixedRuns {
  const { airSystems = [], thresholds = [] } = model.input;
  const poorMixing = airSystems.some((system) => (system.effectiveness ?? 1) < 1);
  const segments = flowSegments(model, displacement);
  const track = (useMixingVolume: boolean) =>
    mixedTrack(model, segments, nodesS, {
      displacement,
      useMixingVolume,
      wantsSlopes: displacement === 'pushOut' && !poorMixing,
      wantsBetween: thresholds.length > 0,
    });
  return { displacement, tracks: poorMixing ? [track(false), track(true)] : [track(false)] };
}

/** A track with its extremes, which several zones of one space share. */
interface Answer {
  readonly track: FlatTrack;
  readonly minimum: OxygenExtreme;
  readonly maximum: Readonly<Record<string, Extreme>>;
}

/** Where mouths are, with what several groups of people there share, as soon as it is asked for. */
interface Place {
  readonly index: number;
  readonly mouth: BoundMouth;
  readonly floorLevelM: number | undefined;
  readonly bound: () => Answer;
  readonly boundSeries: () => AirSeries;
}

/** A mouth of a zone. */
interface Mouth {
  readonly zone: AirZone;
  readonly heightM: number;
  readonly place: Place;
}

/** The layered answer at one place. */
interface LayeredPlace {
  readonly usual: Answer;
  readonly series: LayeredSeries;
}

/** What the mouths of a zone have in common. */
interface ZoneCommon {
  readonly model: AirModel;
  readonly mixed: Answer;
  readonly mixedSeries: AirSeries;
  /** The layered answer by place; undefined where none is wanted. */
  readonly layered: ((place: Place) => LayeredPlace) | undefined;
}

/** A track with its extremes. */
function answerOf(track: FlatTrack, gases: readonly string[]): Answer {
  return { track, minimum: oxygenMinimum(track), maximum: gasMaxima(track, gases) };
}

function heightAnswer(
  { model, mixed, mixedSeries, layered }: ZoneCommon,
  { zone, heightM, place }: Mouth,
  isStraight: boolean,
  crossings: Crossing[],
): HeightAir {
  const { bound, boundSeries } = place;
  const tracks = { mixed: () => mixed.track, bound: () => bound().track };
  if (isStraight) {
    addCrossings(model, zone, heightM, tracks, crossings);
    return {
      heightM,
      mixed: mixedSeries,
      get bound() {
        return boundSeries();
      },
      minimum: {
        mixed: mixed.minimum,
        get bound() {
          return bound().minimum;
        },
      },
      maximum: {
        mixed: mixed.maximum,
        get bound() {
          return bound().maximum;
        },
      },
    };
  }
  const common = { heightM, mixed: mixedSeries, bound: boundSeries() };
  const minimum = { mixed: mixed.minimum, bound: bound().minimum };
  const maximum = { mixed: mixed.maximum, bound: bound().maximum };
  if (!layered) {
    addCrossings(model, zone, heightM, tracks, crossings);
    return { ...common, minimum, maximum };
  }
  const { usual, series } = layered(place);
  addCrossings(model, zone, heightM, { ...tracks, layered: () => usual.track }, crossings);
  return {
    ...common,
    layered: series,
    minimum: { ...minimum, layered: usual.minimum },
    maximum: { ...maximum, layered: usual.maximum },
  };
}

/** The layered answer at a place; where nothing gathers as a layer it is the mixed one. */
function layeredPlace(
  model: AirModel,
  mixed: Answer,
  layers: MouthLayers | undefined,
  rows: Int32Array,
  timesS: readonly number[],
): LayeredPlace {
  const usual = layers ? answerOf(layers.usual, model.gases) : mixed;
  const shown = layers ? outputRows(usual.track.timesS, timesS) : rows;
  const { width, values } = usual.track;
  const adverse = layers ? layers.adverse : values;
  return {
    usual,
    series: {
      ...seriesOf(model, usual.track, shown),
      ...(adverse ? { adverse: seriesOf(model, { values: adverse, width }, shown) } : {}),
    },
  };
}

/**
 * A value worked out when it is first asked for. Of a straight run most callers want the mixed
 * answer alone, and its bound is the dearer part.
 */
function onFirstUse<T>(work: () => T): () => T {
  let known: { readonly value: T } | undefined;
  return () => {
    known ??= { value: work() };
    return known.value;
  };
}

function addCrossings(
  model: AirModel,
  zone: AirZone,
  heightM: number,
  tracks: Readonly<Partial<Record<AirAnswer, () => FlatTrack>>>,
  crossings: Crossing[],
): void {
  for (const { quantity, value } of model.input.thresholds ?? []) {
    const column = quantity === 'oxygenFraction' ? 0 : model.gases.indexOf(quantity) + 1;
    if (quantity !== 'oxygenFraction' && column === 0) continue;
    for (const answer of ['mixed', 'bound', 'layered'] as const) {
      const track = tracks[answer]?.();
      if (!track) continue;
      for (const found of crossingsOf(track, column, value)) {
        crossings.push({ zone: zone.id, heightM, answer, quantity, value, ...found });
      }
    }
  }
}

/** Share of a gas that may be missing from its balance before a run is not believed [-]. */
const MOST_IMBALANCE = 1e-6;

/**
 * What came in, left and stayed, per gas and for oxygen, from the mixed run without mixing volume; its
 * error is that of the layered run where that is larger.
 */
function gasBalances(
  model: AirModel,
  runs: MixedRuns,
  layeredError: number,
): Readonly<Record<string, GasBalance>> {
  const n = model.spaces.length;
  const m = model.components.length;
  const amounts = runs.tracks[0].last;
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
    const relativeError = Math.max(layeredError, into > 0 ? Math.abs(into - out - held) / into : 0);
    if (!(relativeError <= MOST_IMBALANCE)) {
      throw new NotComputable(
        `The balance of ${gas} does not close.`,
        'Look for a flow or an amount that is out of all proportion to its space.',
        [{ path: '/releases', problem: `${String(relativeError)} of it is missing` }],
      );
    }
    balances[gas] = {
      inMol: into / model.molarVolumeM3,
      outMol: out / model.molarVolumeM3,
      heldMol: held / model.molarVolumeM3,
      relativeError,
    };
  }
  return balances;
}
