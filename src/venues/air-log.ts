import type { PlanVenue } from '../assessment/plan-file.js';
import type { ResolvedPlan } from '../assessment/resolved-plan.js';
import { DomainError, type ErrorDetail } from '../errors.js';
import { decayRate, type DecayResult } from '../science/room-air/decay-log.js';
import { positionSpread } from '../science/room-air/position-spread.js';
import { typedNumber } from '../web/forms/typed-number.js';
import { airLogTexts as words } from '../web/texts/en-air-log.js';
import type { AirLogForm } from './air-log-form.js';
import { readDecayLog, type Position, type WrittenLog } from './decay-log-text.js';
import { systemsServing } from './measured-air.js';

/** One place in the room worked out by itself. */
export interface PositionFit {
  readonly position: Position | 'mean';
  readonly fit: DecayResult;
}

/** What a log says about a space. */
export interface AirLogResult {
  readonly timesS: readonly number[];
  readonly readingsPpm: readonly number[];
  readonly isBackgroundGiven: boolean;
  readonly volumeM3: number;
  readonly fit: DecayResult;
  /** More than one only where the log has columns for low or high. */
  readonly positions: readonly PositionFit[];
  /** Fresh air to plan with: every place covered, volume and mixing included [m3/s]. */
  readonly planning: { readonly low: number; readonly high: number };
  readonly warnings: readonly string[];
}

export type AirLogOutcome =
  | { readonly result: AirLogResult; readonly problems: readonly [] }
  | { readonly result: undefined; readonly problems: readonly ErrorDetail[] };

/** Volume and mixing add this to the interval of the fit [-]. */
const volumeAndMixing = 0.05;
/** Readings at one moment that differ by more than this of their mean: the air is not mixed. */
const mostSpread = 0.1;

interface Numbers {
  readonly fromS: number;
  readonly untilS: number;
  readonly backgroundPpm: number | null;
  readonly volumeM3: number;
  readonly problems: readonly ErrorDetail[];
}

type NumberField = 'fromMin' | 'untilMin' | 'volumeM3' | 'backgroundPpm';

function numbersOf(form: AirLogForm, volumeOfSpace: number): Numbers {
  const problems: ErrorDetail[] = [];
  const number = (name: NumberField, label: string): number | undefined => {
    const text = form[name];
    if (text === undefined) return undefined;
    const typed = typedNumber(text);
    if ('value' in typed && typed.value >= 0) return typed.value;
    const problem = 'problem' in typed ? typed.problem : words.problems.number;
    problems.push({ path: `/${name}`, problem: `${label}: ${problem}` });
    return undefined;
  };
  const fromS = (number('fromMin', words.fromMin) ?? 0) * 60;
  const untilS = (number('untilMin', words.untilMin) ?? Infinity) * 60;
  const volumeM3 = number('volumeM3', words.volume) ?? volumeOfSpace;
  if (!(volumeM3 > 0)) {
    problems.push({ path: '/volumeM3', problem: `${words.volume}: ${words.problems.number}` });
  }
  const backgroundPpm = number('backgroundPpm', words.background) ?? null;
  return { fromS, untilS, backgroundPpm, volumeM3, problems };
}

interface Column {
  readonly position: Position | 'mean';
  readonly readingsPpm: readonly number[];
}

const positionNames: readonly Position[] = ['main', 'low', 'high'];

/** The columns of a log, the one to go by first: the main reading, or the mean of low and high. */
function columnsOf({ readingsPpm }: WrittenLog): readonly [Column, ...Column[]] {
  const columns = positionNames.flatMap((position): Column[] => {
    const readings = readingsPpm[position];
    return readings === undefined ? [] : [{ position, readingsPpm: readings }];
  });
  const [first, ...others] = columns;
  if (first === undefined) return [{ position: 'main', readingsPpm: [] }];
  if (first.position === 'main' || others.length === 0) return [first, ...others];
  const mean = first.readingsPpm.map(
    (_, i) =>
      columns.reduce((sum, column) => sum + (column.readingsPpm[i] ?? 0), 0) / columns.length,
  );
  return [{ position: 'mean', readingsPpm: mean }, first, ...others];
}

/** The part of a log between two times, its own beginning as time nought. */
function cutLog(log: WrittenLog, fromS: number, untilS: number): WrittenLog {
  const kept = log.timesS.flatMap((t, i) => (t >= fromS && t <= untilS ? [i] : []));
  const start = log.timesS[kept[0] ?? 0] ?? 0;
  const at = (values: readonly number[]): number[] => kept.map((i) => values[i] ?? 0);
  return {
    timesS: at(log.timesS).map((t) => t - start),
    readingsPpm: Object.fromEntries(
      Object.entries(log.readingsPpm).map(([position, values]) => [position, at(values)]),
    ),
  };
}

function venueWarnings(venue: PlanVenue, form: AirLogForm): readonly string[] {
  const warnings: string[] = [];
  const space = venue.spaces.find(({ id }) => id === form.space);
  const title = (id: string): string => venue.spaces.find((one) => one.id === id)?.title ?? id;
  if (Number(form.people ?? 0) > 0) {
    warnings.push(
      'People were in the room: with the background given the air seems slower than it is; fitted, their breath hides in the background. Log again in the empty room.',
    );
  }
  const returning = systemsServing(venue, form.space).filter(({ system }) => {
    const { recirculatedM3PerS: flow } = system;
    return flow !== undefined && flow !== 0;
  });
  if (returning.length > 0) {
    warnings.push(
      'The ventilation here sends air round: air that comes back from other rooms passes for fresh until they hold the gas as well. Fill and log all rooms that it serves together.',
    );
  }
  const ways = (venue.openings ?? []).filter(
    ({ from, to, openFraction }) =>
      openFraction !== 0 &&
      (from === form.space || to === form.space) &&
      from !== 'outside' &&
      to !== 'outside',
  );
  const rooms = [...new Set(ways.flatMap(({ from, to }) => [from, to]))].filter(
    (id) => id !== form.space,
  );
  if (rooms.length > 0) {
    warnings.push(
      `Air that came through an open way from ${rooms.map(title).join(', ')} counts as fresh in this log. It is not, once gas is there too.`,
    );
  }
  if ((space?.pockets ?? []).some(({ at }) => at === 'low')) {
    warnings.push('A log tells of the mixed air above, not of a pit or hollow in this floor.');
  }
  if (form.volumeM3 === undefined && space?.volumeM3 === undefined) {
    warnings.push(
      'Nobody measured the free volume: the air changes stand, the flow is as uncertain as the volume.',
    );
  }
  return warnings;
}

function positionWarnings(
  columns: readonly Column[],
  positions: readonly PositionFit[],
  backgroundPpm: number,
): readonly string[] {
  const measured = columns.filter(({ position }) => position !== 'mean');
  if (measured.length < 2) return [];
  const spread = positionSpread(
    measured.map(({ readingsPpm }) => readingsPpm),
    backgroundPpm,
  );
  const rates = positions.map(({ fit }) => fit.airChangesPerHour);
  const percent = (share: number): string => String(Math.round(share * 100));
  const warnings: string[] = [];
  if (spread > mostSpread) {
    warnings.push(
      `Low and high readings differ by up to ${percent(spread)} % of their mean: the air is not mixed. Run mixing fans, and begin the log later.`,
    );
  }
  if (Math.max(...rates) > (1 + mostSpread) * Math.min(...rates)) {
    warnings.push(
      'The places in the room clear at different rates: the interval to plan with covers the slowest.',
    );
  }
  return warnings;
}

/** Problems of the fit, told by the number of the reading. */
function toldProblems(thrown: unknown): readonly ErrorDetail[] {
  if (!(thrown instanceof DomainError)) throw thrown;
  const told = thrown.details.slice(0, 4).map(({ path, problem }) => {
    const reading = /^\/readingsPpm\/(\d+)$/.exec(path)?.[1];
    return {
      path: '/text',
      problem:
        reading === undefined ? problem : `Reading ${String(Number(reading) + 1)} ${problem}`,
    };
  });
  return [{ path: '/text', problem: `${thrown.message} ${thrown.hint}` }, ...told];
}

/** What a log says about a space of a venue, or everything that is wrong with it. */
export function airLogOutcome(
  form: AirLogForm,
  venue: PlanVenue,
  read: ResolvedPlan,
): AirLogOutcome {
  const refused = (problems: readonly ErrorDetail[]): AirLogOutcome => ({
    result: undefined,
    problems,
  });
  const space = read.spaces.find(({ id }) => id === form.space);
  if (space === undefined) return refused([{ path: '/space', problem: words.problems.space }]);
  const { fromS, untilS, backgroundPpm, volumeM3, problems } = numbersOf(form, space.volumeM3);
  const { log, problems: unread } = readDecayLog(form.file ?? form.text ?? '', form.timesIn);
  if (log === undefined || problems.length > 0) return refused([...unread, ...problems]);
  const { timesS, readingsPpm } = cutLog(log, fromS, untilS);
  if (timesS.length < 4) return refused([{ path: '/untilMin', problem: words.problems.cut }]);
  const columns = columnsOf({ timesS, readingsPpm });
  try {
    const positions = columns.map(({ position, readingsPpm: readings }) => ({
      position,
      fit: decayRate({ timesS, readingsPpm: readings, backgroundPpm, volumeM3 }),
    }));
    const [used] = columns;
    const fit = decayRate({ timesS, readingsPpm: used.readingsPpm, backgroundPpm, volumeM3 });
    const flow = fit.freshAirM3PerS;
    const low = Math.min(...positions.map((one) => one.fit.freshAirInterval95[0]));
    const high = Math.max(...positions.map((one) => one.fit.freshAirInterval95[1]));
    const extra = volumeAndMixing * flow;
    return {
      result: {
        timesS,
        readingsPpm: used.readingsPpm,
        isBackgroundGiven: backgroundPpm !== null,
        volumeM3,
        fit,
        positions: positions.length > 1 ? positions : [],
        planning: {
          low: Math.max(0, flow - Math.hypot(flow - low, extra)),
          high: flow + Math.hypot(high - flow, extra),
        },
        warnings: [
          ...fit.warnings,
          ...positionWarnings(columns, positions, fit.backgroundPpm),
          ...venueWarnings(venue, form),
        ],
      },
      problems: [],
    };
  } catch (thrown) {
    return refused(toldProblems(thrown));
  }
}
