import { FALLEN_HEIGHT_M } from './air-constants.js';
import type { AirGasTable } from './air-gases.js';
import type { AirUncertainty } from './air-input.js';
import type { AirModel } from './air-model.js';
import type { AirResult, AirSeries, HeightAir, ZoneAir } from './air-result.js';
import { rowsAt, seriesOf } from './air-series.js';
import type { FlatTrack } from './answer-track.js';
import { layerMouth } from './layer-case.js';
import type { AskedMouth } from './layer-runs.js';
import { layeredBand, type Band } from './layered-band.js';
import { layeredDraws, type DrawnMouth } from './layered-draws.js';
import { uncertaintyDraws } from './sampled-input.js';

/** Most values that the draws of one run may keep at a time: about 60 MB. */
const MOST_VALUES = 15e6;
/** Fewest times at which a band is worked out, however many draws and mouths there are. */
const LEAST_TIMES = 60;

/** What the band of a run is made from. */
export interface BandSource {
  readonly model: AirModel;
  readonly gases: AirGasTable;
  /** The mouths of each zone: at its own height, then 0.2 m above its floor. */
  readonly asked: readonly AskedMouth[];
  /** By space: the mixed air as stated. */
  readonly mixed: readonly FlatTrack[];
  readonly timesS: readonly number[];
}

/** A band ready to be drawn: who wants it and when. */
export interface BandQuestion {
  readonly mouths: readonly DrawnMouth[];
  /** Times of the draws: output times, thinned where they are many, and ends of releases. */
  readonly timesS: readonly number[];
}

/** The mouths and times of the band of a run. */
export function bandQuestion(
  { model, asked, mixed, timesS }: BandSource,
  uncertainty: AirUncertainty,
): BandQuestion {
  const places = (model.input.zones ?? []).flatMap((zone) =>
    [zone.heightM, FALLEN_HEIGHT_M].map((heightM, i) => ({ zone, heightM, isFloorCheck: i > 0 })),
  );
  const width = model.gases.length + 1;
  const most = Math.max(
    LEAST_TIMES,
    Math.floor(MOST_VALUES / (places.length * width * uncertainty.samples)),
  );
  const wanted = bandTimes(model, timesS, most);
  const known = new Map<FlatTrack, Float64Array>();
  const rowsOf = (track: FlatTrack): Float64Array => {
    const rows = known.get(track) ?? rowsAt(track, wanted);
    known.set(track, rows);
    return rows;
  };
  const mouths = asked.flatMap(({ mouth, floorLevelM, bound }, i): DrawnMouth[] => {
    const place = places[i];
    const flat = mixed[mouth.space];
    if (!place || !flat) return [];
    const { zone, heightM, isFloorCheck } = place;
    const at = layerMouth(model, mouth, floorLevelM);
    const [bounds, air] = [rowsOf(bound), rowsOf(flat)];
    return [{ zone: zone.id, heightM, isFloorCheck, at, bounds, mixed: air }];
  });
  return { mouths, timesS: wanted };
}

/** Output times, thinned evenly, with the ends of releases: there most gas is in the air. */
function bandTimes(model: AirModel, timesS: readonly number[], most: number): readonly number[] {
  const every = Math.max(1, Math.ceil(timesS.length / most));
  const times = new Set(timesS.filter((_, i) => i % every === 0));
  const last = timesS.at(-1);
  if (last !== undefined) times.add(last);
  for (const { endS } of model.releases) if (endS <= model.input.durationS) times.add(endS);
  return [...times].sort((a, b) => a - b);
}

/**
 * The zones with the band of their layered answer, what drives it, and how often thresholds are
 * passed.
 */
export function bandedZones(
  source: BandSource,
  zones: Readonly<Record<string, ZoneAir>>,
): Pick<AirResult, 'zones' | 'drivers' | 'chances'> {
  const { model, gases, timesS } = source;
  const { uncertainty, thresholds = [], zones: asked = [] } = model.input;
  if (!uncertainty) return { zones };
  const question = bandQuestion(source, uncertainty);
  const { mouths } = question;
  const draws = uncertaintyDraws(uncertainty);
  const drawn = layeredDraws(
    model.input,
    gases,
    draws,
    mouths,
    question.timesS,
    model.gases,
    thresholds,
  );
  const { bands, drivers, chances } = layeredBand(
    [drawn],
    draws,
    mouths,
    question.timesS.length,
    model.gases,
    thresholds,
  );
  const banded = (height: HeightAir, band: Band | undefined): HeightAir => {
    if (!band || !height.layered) return height;
    const at = (values: Float64Array): AirSeries =>
      seriesAt(model, values, question.timesS, timesS);
    return {
      ...height,
      layered: {
        ...height.layered,
        p05: at(band.p05),
        p50: at(band.p50),
        p95: at(band.p95),
        peak: band.peak,
      },
    };
  };
  return {
    zones: Object.fromEntries(
      asked.flatMap((zone, i) => {
        const air = zones[zone.id];
        if (!air) return [];
        const at02M = banded(air.at02M, bands[2 * i + 1]);
        return [[zone.id, { ...air, ...banded(air, bands[2 * i]), at02M }]];
      }),
    ),
    drivers,
    chances,
  };
}

/** A quantile brought to the output times, straight between the times of the draws. */
function seriesAt(
  model: AirModel,
  values: Float64Array,
  drawnS: readonly number[],
  timesS: readonly number[],
): AirSeries {
  const width = model.gases.length + 1;
  const all = new Float64Array(timesS.length * width);
  let at = 0;
  for (const [i, t] of timesS.entries()) {
    while ((drawnS[at + 1] ?? Infinity) <= t) at++;
    const from = drawnS[at] ?? t;
    const to = drawnS[at + 1] ?? from;
    const share = to > from ? Math.min(1, Math.max(0, (t - from) / (to - from))) : 0;
    for (let q = 0; q < width; q++) {
      const before = values[at * width + q] ?? 0;
      const after = values[(at + 1) * width + q] ?? before;
      all[i * width + q] = before + share * (after - before);
    }
  }
  const rows = Int32Array.from(timesS, (_, i) => i);
  return seriesOf(model, { values: all, width }, rows);
}
