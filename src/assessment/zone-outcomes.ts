import { highestRollingMean, type WindowedMean } from '../science/exposure/rolling-mean.js';
import type {
  AirResult,
  AirSeries,
  HeightAir,
  LayeredSeries,
} from '../science/room-air/air-result.js';
import type { AirCase } from './air-case.js';
import type { Answer, CaseName } from './assessment.js';
import { fails, type JudgedLevel, type LevelName, type Statistic } from './levels.js';
import type { ResolvedGroup } from './resolved-plan.js';

/** One answer to one quantity in one zone: its worst value, and which levels it fails. */
export interface AnswerOutcome {
  readonly value: number;
  /** Seconds after midnight. */
  readonly atS: number;
  readonly statistics: Readonly<Partial<Record<Statistic, number>>>;
  readonly fails: Readonly<Record<LevelName, boolean>>;
  /** Seconds after midnight at which the level is first passed by its momentary value. */
  readonly firstPast: Readonly<Partial<Record<LevelName, number>>>;
  readonly series: readonly number[];
}

export interface ZoneOutcome {
  readonly zone: string;
  readonly group: ResolvedGroup;
  readonly heightM: number;
  /** True for 0.2 m above the floor: fallen, picking something up. */
  readonly floorCheck: boolean;
  /** False where 0.2 m is judged against Never only; toddlers live at that height. */
  readonly judgedFully: boolean;
  readonly caseName: CaseName;
  readonly level: JudgedLevel;
  readonly answers: Readonly<Partial<Record<Answer, AnswerOutcome>>>;
  readonly timesS: readonly number[];
  /** The ends of the layered answer that 5 and 95 in 100 draws stay below, where it was sampled. */
  readonly band?: { readonly p05: readonly number[]; readonly p95: readonly number[] };
  /** Lowest wet partial pressure of oxygen by answer [Pa]. */
  readonly oxygenPressurePa: Readonly<Partial<Record<Answer, number>>>;
}

/** A show longer than this is held to its worst hour [s]. */
const longestShowWindowS = 3600;

type Windows = Readonly<Record<Statistic, number>>;

/** Highest means by series and window: zones of one space share their mixed series. */
type KnownMeans = Map<readonly number[], Map<number, WindowedMean>>;

/** Averaging windows [s]; 0: the momentary value. A mean over the show never thins out a short one. */
function windowsOf(showS: number): Windows {
  return {
    minimum: 0,
    peak: 0,
    mean1Min: 60,
    mean15Min: 900,
    meanShow: Math.min(longestShowWindowS, showS),
  };
}

interface Track {
  readonly series: readonly number[];
  /** The extreme between output times too, where the air model reports one. */
  readonly extreme: { readonly value: number; readonly atS: number } | null;
}

function seriesOf(air: AirSeries, level: JudgedLevel): readonly number[] | null {
  // Where oxygen is let out the bound has two ends: its lowest, and as a gas its highest total.
  if (level.gas === null) {
    return level.failsWhen === 'above'
      ? (air.gasFraction.O2 ?? air.oxygenFraction)
      : air.oxygenFraction;
  }
  const fraction = air.gasFraction[level.gas];
  if (!fraction) return null;
  return level.scale === 1 ? fraction : fraction.map((value) => value / level.scale);
}

function statisticOf(
  statistic: Statistic,
  timesS: readonly number[],
  values: readonly number[],
  windows: Windows,
  known: KnownMeans,
): { value: number; atS: number } {
  const window = windows[statistic];
  if (window > 0) {
    const means = known.get(values) ?? new Map<number, WindowedMean>();
    const mean = means.get(window) ?? highestRollingMean(timesS, values, window);
    known.set(values, means.set(window, mean));
    return mean;
  }
  let best = { value: values[0] ?? 0, atS: timesS[0] ?? 0 };
  values.forEach((value, i) => {
    const better = statistic === 'minimum' ? value < best.value : value > best.value;
    if (better) best = { value, atS: timesS[i] ?? 0 };
  });
  return best;
}

function extremeOf(height: HeightAir, answer: 'mixed' | 'bound' | 'layered', level: JudgedLevel) {
  if (level.failsWhen === 'below') {
    const lowest = height.minimum[answer];
    return lowest ? { value: lowest.oxygenFraction, atS: lowest.atS } : null;
  }
  const gas = level.gas ?? 'O2';
  const highest = height.maximum[answer]?.[gas];
  return highest ? { value: highest.value / level.scale, atS: highest.atS } : null;
}

function answerOutcome(
  timesS: readonly number[],
  { series: values, extreme }: Track,
  level: JudgedLevel,
  originS: number,
  windows: Windows,
  known: KnownMeans,
): AnswerOutcome {
  const names: readonly LevelName[] = ['aim', 'limit', 'never'];
  const statistics: Partial<Record<Statistic, number>> = {};
  const failed = { aim: false, limit: false, never: false };
  const firstPast: Partial<Record<LevelName, number>> = {};
  for (const name of names) {
    const { statistic } = level[name];
    const sampled = statisticOf(statistic, timesS, values, windows, known).value;
    const momentary = windows[statistic] === 0 ? extreme?.value : undefined;
    const value = momentary === undefined ? sampled : worseValue(sampled, momentary, level);
    statistics[statistic] = value;
    failed[name] = fails(level, name, value);
    const at = values.findIndex((sample) => fails(level, name, sample));
    // Somewhere between this sample and the one before: the earlier one is the cautious reading.
    const time = timesS[Math.max(0, at - 1)];
    if (at >= 0 && time !== undefined) firstPast[name] = time + originS;
  }
  const sampled = statisticOf(
    level.failsWhen === 'below' ? 'minimum' : 'peak',
    timesS,
    values,
    windows,
    known,
  );
  const between = extreme ?? sampled;
  const worst =
    worseValue(between.value, sampled.value, level) === between.value ? between : sampled;
  return {
    value: worst.value,
    atS: worst.atS + originS,
    statistics,
    fails: failed,
    firstPast,
    series: values,
  };
}

const worseValue = (a: number, b: number, level: JudgedLevel): number =>
  level.failsWhen === 'below' ? Math.min(a, b) : Math.max(a, b);

function worseTrack(a: Track, b: Track, level: JudgedLevel): Track {
  const extremes = [a.extreme, b.extreme].filter((one) => one !== null);
  const [first, second] = extremes;
  const extreme =
    first && second
      ? worseValue(first.value, second.value, level) === first.value
        ? first
        : second
      : (first ?? null);
  return {
    series: a.series.map((value, i) => worseValue(value, b.series[i] ?? value, level)),
    extreme,
  };
}

function bandOf(height: HeightAir, level: JudgedLevel): Pick<ZoneOutcome, 'band'> {
  const { p05, p95 } = height.layered ?? {};
  const low = p05 && seriesOf(p05, level);
  const high = p95 && seriesOf(p95, level);
  return low && high ? { band: { p05: low, p95: high } } : {};
}

/** The worst that draws reach at an end of their band, at the time at which that end is worst. */
function peakOf(
  { peak }: LayeredSeries,
  end: 'p05' | 'p95',
  level: JudgedLevel,
  series: readonly number[],
  timesS: readonly number[],
): Track['extreme'] {
  const values = peak?.[end];
  if (!values) return null;
  const isOxygen = level.gas === null && level.failsWhen === 'below';
  const value = isOxygen ? values.oxygenFraction : values.gasFraction[level.gas ?? 'O2'];
  if (value === undefined) return null;
  const { atS } = statisticOf(
    level.failsWhen === 'below' ? 'minimum' : 'peak',
    timesS,
    series,
    windowsOf(0),
    new Map(),
  );
  return { value: isOxygen ? value : value / level.scale, atS };
}

/** The answers at one height, by name; the layered answer L is the worse of M and the layered P95. */
function answersAt(
  height: HeightAir,
  straight: HeightAir,
  level: JudgedLevel,
  floorCheck: boolean,
  timesS: readonly number[],
): Partial<Record<Answer, Track>> {
  const found: Partial<Record<Answer, Track>> = {};
  const track = (series: readonly number[] | null, extreme: Track['extreme']): Track | null =>
    series ? { series, extreme } : null;
  const mixed = track(seriesOf(straight.mixed, level), extremeOf(straight, 'mixed', level));
  if (!mixed) return found;
  found.mixed = mixed;
  const bound = track(seriesOf(height.bound, level), extremeOf(height, 'bound', level));
  if (bound) found.bound = worseTrack(bound, mixed, level);
  const { layered } = height;
  if (layered) {
    const one = track(seriesOf(layered, level), extremeOf(height, 'layered', level));
    // Either end of the band may be the bad one, by quantity; both are looked at. Where nothing was
    // sampled the run without any mixing stands beside the usual one at the heights people have; at
    // 0.2 m that run is the passing front, and the bound with its first pass judges it.
    const ends = (['p05', 'p95'] as const).flatMap((end) => {
      const series = layered[end] && seriesOf(layered[end], level);
      return series ? [{ series, extreme: peakOf(layered, end, level, series, timesS) }] : [];
    });
    const others =
      ends.length > 0 || !layered.adverse || floorCheck
        ? []
        : [track(seriesOf(layered.adverse, level), null)];
    const tracks = (ends.length > 0 ? ends : [one, ...others]).filter((found) => found !== null);
    found.layered = tracks.reduce((worst, end) => worseTrack(worst, end, level), mixed);
    const median = layered.p50 ? track(seriesOf(layered.p50, level), null) : one;
    if (median) found.layeredP50 = median;
    // The bound is worked out with the air as stated; a draw with less of it may lie beyond.
    if (found.bound) found.bound = worseTrack(found.bound, found.layered, level);
  }
  return found;
}

/**
 * What every zone breathes in one case, quantity by quantity, at the declared height and at 0.2 m.
 *
 * @param result   the exact run: bound and layered are read from it
 * @param straight the same input by straight displacement: the mixed answer is read from it
 */
export function zoneOutcomes(
  air: AirCase,
  result: AirResult,
  straight: AirResult,
  caseName: CaseName,
  groups: readonly ResolvedGroup[],
  levelsOf: (group: ResolvedGroup) => readonly JudgedLevel[],
): readonly ZoneOutcome[] {
  const originS = air.window.startS;
  const windows = windowsOf(air.shortestShowS);
  const known: KnownMeans = new Map();
  const timesS = result.timesS.map((t) => t + originS);
  return groups.flatMap((group) => {
    const exact = result.zones[group.id];
    const plain = straight.zones[group.id];
    if (!exact || !plain) return [];
    const heights = [
      { height: exact, straightHeight: plain, floorCheck: false },
      { height: exact.at02M, straightHeight: plain.at02M, floorCheck: true },
    ];
    return heights.flatMap(({ height, straightHeight, floorCheck }) =>
      levelsOf(group).flatMap((level): ZoneOutcome[] => {
        const series = answersAt(height, straightHeight, level, floorCheck, result.timesS);
        if (!series.mixed) return [];
        const answers: Partial<Record<Answer, AnswerOutcome>> = {};
        for (const [answer, one] of Object.entries(series) as [Answer, Track][]) {
          answers[answer] = answerOutcome(result.timesS, one, level, originS, windows, known);
        }
        return [
          {
            zone: group.id,
            group,
            heightM: height.heightM,
            floorCheck,
            judgedFully: !floorCheck || group.ageGroup === 'toddler',
            caseName,
            level,
            answers,
            timesS,
            ...bandOf(height, level),
            oxygenPressurePa:
              level.quantity === 'oxygenFraction'
                ? {
                    mixed: Math.min(...straightHeight.mixed.oxygenPartialPressurePa),
                    bound: Math.min(...height.bound.oxygenPartialPressurePa),
                    ...(height.layered
                      ? { layered: Math.min(...height.layered.oxygenPartialPressurePa) }
                      : {}),
                  }
                : {},
          },
        ];
      }),
    );
  });
}
