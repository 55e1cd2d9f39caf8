import type { ErrorDetail } from '../errors.js';
import { typedNumber } from '../web/forms/typed-number.js';

/** What the numbers of the time column count. `asWritten`: the heading or a clock time says it. */
export type TimeUnit = 'asWritten' | 'seconds' | 'minutes' | 'hours' | 'minutesAndSeconds';

/** Where in the room a column was read. */
export type Position = 'main' | 'low' | 'high';

/** A log as it was written down: times from its first line, readings by position. */
export interface WrittenLog {
  readonly timesS: readonly number[];
  readonly readingsPpm: Partial<Readonly<Record<Position, readonly number[]>>>;
}

export type ReadLog =
  | { readonly log: WrittenLog; readonly problems: readonly [] }
  | { readonly log: undefined; readonly problems: readonly ErrorDetail[] };

interface Line {
  readonly number: number;
  readonly cells: readonly string[];
}

const daySeconds = 86_400;
const secondsOf = { seconds: 1, minutes: 60, hours: 3600 } as const;
/** No log of a decay has a hole like this; a date read the wrong way round has [s]. */
const longestGapS = 12 * 3600;
/** More lines than this are no log of a room. */
const mostLines = 20_000;
/** Problems told at once: more of them have one cause. */
const mostTold = 8;

/** The sign between two cells: a tab or semicolon where there is one, so that commas are decimal. */
function separatorOf(lines: readonly string[]): RegExp {
  const holding = (sign: string): number => lines.filter((line) => line.includes(sign)).length;
  const most = lines.length / 2;
  if (holding('\t') > most) return /\t/;
  if (holding(';') > most) return /;/;
  if (holding(',') > most) return /,/;
  return /\s+/;
}

const unquoted = (cell: string): string => cell.trim().replaceAll(/^"|"$/g, '').trim();

function linesOf(text: string): readonly Line[] {
  const written = text
    .replace(/^\ufeff/, '')
    .split(/\r\n|\r|\n/)
    .map((line, index) => ({ number: index + 1, line: line.trim() }))
    .filter(({ line }) => line !== '' && !line.startsWith('#') && !/^sep=.$/i.test(line));
  const separator = separatorOf(written.map(({ line }) => line));
  return written.map(({ number, line }) => ({
    number,
    cells: line.split(separator).map(unquoted),
  }));
}

const clock = /^(\d{1,3}):(\d{2})(?::(\d{2})(?:[.,]\d+)?)?\s*([ap])?\.?m?\.?$/i;
const dated = /^(\d{4})-(\d{2})-(\d{2})$|^(\d{1,2})[./](\d{1,2})[./](\d{4})$/;

/** Seconds of a clock time, or undefined. With minutes and seconds alone `12:30` is 750 s. */
function clockSeconds(text: string, unit: TimeUnit): number | undefined {
  const [, first, second, third, half] = clock.exec(text) ?? [];
  if (first === undefined || second === undefined) return undefined;
  if (unit === 'minutesAndSeconds' && third === undefined) {
    return Number(first) * 60 + Number(second);
  }
  const noon = half === undefined ? 0 : half.toLowerCase() === 'p' ? 12 : 0;
  const hours = half === undefined ? Number(first) : (Number(first) % 12) + noon;
  return hours * 3600 + Number(second) * 60 + Number(third ?? 0);
}

/** Seconds since a fixed day of a date with a clock time, or undefined. */
function datedSeconds(text: string): number | undefined {
  const [, day = '', , time = ''] = /^(\S+?)(T|,?\s+)(.+?)Z?$/.exec(text) ?? [];
  const [, year, month, date, date2, month2, year2] = dated.exec(day) ?? [];
  const seconds = clockSeconds(time, 'asWritten');
  if (seconds === undefined || (year ?? year2) === undefined) return undefined;
  // With a year last the day stands first, unless the second number can be no month.
  const isMonthFirst = Number(month2 ?? 0) > 12;
  const inYear = isMonthFirst ? date2 : month2;
  const ofMonth = isMonthFirst ? month2 : date2;
  const at = Date.UTC(Number(year ?? year2), Number(month ?? inYear) - 1, Number(date ?? ofMonth));
  return at / 1000 + seconds;
}

/** What the heading of the time column says that its numbers count. */
function headingUnit(heading: string): keyof typeof secondsOf | undefined {
  const words = heading.toLowerCase().split(/[^a-z]+/);
  const has = (...names: readonly string[]): boolean => names.some((name) => words.includes(name));
  if (has('min', 'mins', 'minute', 'minutes')) return 'minutes';
  if (has('s', 'sec', 'secs', 'second', 'seconds')) return 'seconds';
  return has('h', 'hr', 'hrs', 'hour', 'hours') ? 'hours' : undefined;
}

interface Columns {
  readonly time: number;
  readonly readings: Partial<Record<Position, number>>;
  readonly timeUnit: keyof typeof secondsOf | undefined;
  /** 10 000 where the heading says per cent. */
  readonly ppmPerUnit: number;
}

const named = {
  time: /\b(time|elapsed|clock|date|minutes?|min|seconds?|sec|hours?)\b/i,
  low: /\b(low|lower|floor|bottom)\b/i,
  high: /\b(high|upper|ceiling|top)\b/i,
  main: /\b(co2|co₂|carbon dioxide|ppm|readings?|breathing|middle|tracer|value)\b/i,
} as const;

/** Columns by their headings; without headings the first is the time and the second the reading. */
function columnsOf(heading: readonly string[] | undefined): Columns | undefined {
  if (heading === undefined) {
    return { time: 0, readings: { main: 1 }, timeUnit: undefined, ppmPerUnit: 1 };
  }
  const plain = heading.map((cell) => cell.replaceAll('_', ' '));
  const find = (name: keyof typeof named, taken: readonly number[]): number =>
    plain.findIndex((cell, at) => !taken.includes(at) && named[name].test(cell));
  const time = find('time', []);
  if (time < 0) return undefined;
  const low = find('low', [time]);
  const high = find('high', [time, low]);
  const main = find('main', [time, low, high]);
  const readings = {
    ...(main >= 0 && { main }),
    ...(low >= 0 && { low }),
    ...(high >= 0 && { high }),
  };
  const columns = Object.values(readings);
  if (columns.length === 0) return undefined;
  const isPercent = columns.every((at) => /%|per ?cent/i.test(plain[at] ?? ''));
  return {
    time,
    readings,
    timeUnit: headingUnit(plain[time] ?? ''),
    ppmPerUnit: isPercent ? 10_000 : 1,
  };
}

const startsAsTime = (cell: string): boolean => /^[+-]?\d/.test(cell);

/** A comma that cannot part thousands anywhere in the log: then every comma is decimal. */
const hasDecimalCommas = (lines: readonly Line[]): boolean =>
  lines.some(({ cells }) => cells.some((cell) => /^-?\d+,(\d{1,2}|\d{4,})$/.test(cell)));

function numberIn(cell: string, decimalComma: boolean): number | string {
  const bare = cell.replace(/(?<=\d)\s*(ppm|%|s|sec|min|h)$/i, '');
  const number = decimalComma ? bare.replace(',', '.') : bare;
  const typed = typedNumber(number);
  return 'value' in typed ? typed.value : typed.problem.replace(`"${number}"`, `"${cell}"`);
}

/**
 * A log of readings from text: a column of times and one to three of readings, parted by tabs,
 * semicolons, commas or blanks, with or without headings.
 *
 * Problems name the line of the text. What can be read two ways is not guessed at.
 */
export function readDecayLog(text: string, unit: TimeUnit): ReadLog {
  const problems: ErrorDetail[] = [];
  const wrong = (line: number | undefined, problem: string): void => {
    problems.push({
      path: '/text',
      problem: line === undefined ? problem : `Line ${String(line)}: ${problem}`,
    });
  };
  const refused = (): ReadLog => ({ log: undefined, problems });

  const lines = linesOf(text);
  const [first] = lines;
  if (first === undefined) {
    wrong(undefined, 'The log is empty: choose a file, or paste its lines');
    return refused();
  }
  if (lines.length > mostLines) {
    wrong(
      undefined,
      `The log has more than ${String(mostLines)} lines: leave out what is not needed`,
    );
    return refused();
  }
  const hasHeading = !first.cells.some(startsAsTime);
  const columns = columnsOf(hasHeading ? first.cells : undefined);
  if (columns === undefined) {
    wrong(
      first.number,
      'the headings name no column of times and readings: call them time and CO2',
    );
    return refused();
  }
  const rows = hasHeading ? lines.slice(1) : lines;
  const decimalComma = hasDecimalCommas(rows);
  const counts = unit === 'asWritten' || unit === 'minutesAndSeconds' ? columns.timeUnit : unit;

  const times: number[] = [];
  const readings: Partial<Record<Position, number[]>> = {};
  let days = 0;
  for (const { number, cells } of rows) {
    const cell = cells[columns.time] ?? '';
    const onDay = datedSeconds(cell);
    let at = onDay ?? clockSeconds(cell, unit);
    if (at === undefined) {
      const count = numberIn(cell, decimalComma);
      if (typeof count === 'string') {
        wrong(number, cell === '' ? 'the time is missing' : `the time ${count}`);
        continue;
      }
      if (counts === undefined) {
        wrong(
          number,
          'nothing says whether the times count seconds, minutes or hours: choose it below, or write it in the heading',
        );
        return refused();
      }
      at = count * secondsOf[counts];
    } else if (onDay === undefined) {
      // A log that runs past midnight begins again at 0:00.
      const before = times.at(-1);
      if (before !== undefined && at + days * daySeconds < before - daySeconds / 2) days += 1;
      at += days * daySeconds;
    }
    const before = times.at(-1);
    if (before !== undefined && at <= before) {
      wrong(number, `the time ${cell} is not after the one before it`);
      continue;
    }
    if (before !== undefined && at - before > longestGapS) {
      wrong(number, `more than 12 hours lie between ${cell} and the line before: check the times`);
      continue;
    }
    times.push(at);
    for (const [position, column] of Object.entries(columns.readings) as [Position, number][]) {
      const reading = cells[column] ?? '';
      const value = numberIn(reading, decimalComma);
      if (typeof value === 'string') {
        wrong(number, reading === '' ? 'the reading is missing' : `the reading ${value}`);
      } else if (value < 0) {
        wrong(number, `the reading ${reading} is below nothing`);
      } else {
        (readings[position] ??= []).push(value * columns.ppmPerUnit);
      }
    }
  }
  if (problems.length === 0 && times.length < 4) {
    wrong(
      undefined,
      `The log has ${String(times.length)} readings: four are the least, eight or more are better`,
    );
  }
  if (problems.length > mostTold) {
    const more = problems.length - mostTold;
    problems.splice(mostTold);
    wrong(undefined, `and ${String(more)} more lines like these`);
  }
  if (problems.length > 0) return refused();
  const start = times[0] ?? 0;
  return { log: { timesS: times.map((at) => at - start), readingsPpm: readings }, problems: [] };
}
