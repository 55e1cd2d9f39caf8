import { describe, expect, it } from 'vitest';
import { readDecayLog, type TimeUnit } from '../../src/venues/decay-log-text.js';

const minutes = [0, 300, 600, 900];
const ppm = [1400, 1210.5, 1050, 920];

const logs: readonly (readonly [string, string])[] = [
  ['commas and headings', 'Time (min),CO2 (ppm)\n0,1400\n5,1210.5\n10,1050\n15,920\n'],
  ['semicolons and decimal commas', 'time [min];CO2\n0,0;1400\n5,0;1210,5\n10,0;1050\n15,0;920'],
  [
    'tabs, quotes, a byte order mark and Windows line ends',
    '\ufeff"elapsed min"\t"ppm"\r\n0\t1400\r\n5\t1210.5\r\n10\t1050\r\n15\t920\r\n',
  ],
  [
    'blanks, comments and empty lines',
    '# hall, fans on\ntime_s co2\n0 1400\n\n300 1210.5\n600 1050\n900 920',
  ],
  ['hours', 'hours;reading\n0;1400\n0,08333333333;1210,5\n0,1666666667;1050\n0,25;920'],
  ['clock times without headings', '19:04,1400\n19:09,1210.5\n19:14,1050\n19:19,920'],
  [
    'clock times with seconds past midnight',
    '23:55:00;1400\n00:00:00;1210,5\n00:05:00;1050\n00:10:00;920',
  ],
  [
    'times before and after noon',
    'clock,ppm\n11:55 am,1400\n12:00 pm,1210.5\n12:05 pm,1050\n12:10 pm,920',
  ],
  [
    'dates and times',
    'date and time,ppm\n2026-11-30 19:04:00,1400\n2026-11-30T19:09:00Z,1210.5\n2026-11-30 19:14:00,1050\n2026-11-30 19:19:00,920',
  ],
  [
    'dates with the year last',
    'Date;CO2\n30.11.2026 23:58;1400\n01.12.2026 00:03;1210,5\n01.12.2026 00:08;1050\n01.12.2026 00:13;920',
  ],
  ['percent', 'min;CO2 %\n0;0,14\n5;0,12105\n10;0,105\n15;0,092'],
  [
    'other columns beside',
    'No,Time min,Temperature,CO2\n1,0,20.1,1400\n2,5,20.2,1210.5\n3,10,20.2,1050\n4,15,20.1,920',
  ],
];

describe('a log as people write it', () => {
  it.each(logs)('is read with %s', (_, text) => {
    const { log, problems } = readDecayLog(text, 'asWritten');
    expect(problems).toEqual([]);
    expect(log?.timesS.map((t) => Math.round(t))).toEqual(minutes);
    log?.readingsPpm.main?.forEach((value, i) => {
      expect(value).toBeCloseTo(ppm[i] ?? 0, 6);
    });
    expect(log?.readingsPpm.main).toHaveLength(4);
  });

  it.each<readonly [TimeUnit, string]>([
    ['seconds', '0,1400\n300,1210.5\n600,1050\n900,920'],
    ['minutes', '0,1400\n5,1210.5\n10,1050\n15,920'],
    ['minutesAndSeconds', '00:00,1400\n05:00,1210.5\n10:00,1050\n15:00,920'],
  ])('counts %s where the person says so', (unit, text) => {
    expect(readDecayLog(text, unit).log?.timesS).toEqual(minutes);
  });

  it('keeps readings low and high in the room apart', () => {
    const text =
      'min,CO2 floor,CO2 ceiling,CO2\n0,1500,1300,1400\n5,1300,1100,1200\n10,1,2,3\n15,4,5,6';
    expect(readDecayLog(text, 'asWritten').log?.readingsPpm).toEqual({
      low: [1500, 1300, 1, 4],
      high: [1300, 1100, 2, 5],
      main: [1400, 1200, 3, 6],
    });
  });
});

const refusals: readonly (readonly [string, string, RegExp])[] = [
  ['nothing', '  \n', /The log is empty/],
  [
    'a word for a reading',
    'min,ppm\n0,1400\n5,high\n10,1000\n15,900',
    /Line 3: the reading "high" is not a number/,
  ],
  ['a missing reading', 'min;ppm\n0;1400\n5;\n10;1000\n15;900', /Line 3: the reading is missing/],
  [
    'a time that runs back',
    '# fans on\nmin;ppm\n0;1400\n5;1200\n4;1100\n9;1000\n12;900',
    /Line 5: the time 4 is not after/,
  ],
  [
    'times that count nobody knows what',
    '0,1400\n5,1200\n10,1000\n15,900',
    /Line 1: nothing says whether the times count/,
  ],
  [
    'a comma that may part thousands',
    'min;ppm\n0;1,400\n5;1,200\n10;1,000\n15;900',
    /Line 2: the reading "1,400" can be read two ways/,
  ],
  [
    'headings without a time',
    'place,ppm\nhall,1400',
    /Line 1: the headings name no column of times/,
  ],
  ['headings without a reading', 'min,dew point\n0,8', /Line 1: the headings name no column/],
  ['three lines', 'min,ppm\n0,1400\n5,1200\n9,1000', /has 3 readings: four are the least/],
  [
    'a negative reading',
    'min,ppm\n0,1400\n5,-3\n9,1000\n12,900',
    /Line 3: the reading -3 is below nothing/,
  ],
];

const monthFirst =
  'Date,ppm\n11/30/2026 23:58,1400\n12/01/2026 00:03,1210\n12/01/2026 00:08,1050\n12/01/2026 00:13,920';

describe('a log that cannot be read', () => {
  it.each(refusals)('is refused for %s, naming the line', (_, text, message) => {
    const { log, problems } = readDecayLog(text, 'asWritten');
    expect(log).toBeUndefined();
    expect(problems[0]?.problem).toMatch(message);
    expect(problems[0]?.path).toBe('/text');
  });

  it('is refused where a date read the wrong way round leaves a hole', () => {
    const { problems } = readDecayLog(monthFirst, 'asWritten');
    expect(problems[0]?.problem).toMatch(/Line 3: (the time .* is not after|more than 12 hours)/);
  });

  it('tells the first lines that are wrong and counts the rest', () => {
    const text = `min,ppm\n${Array.from({ length: 40 }, (_, i) => `${String(i)},x`).join('\n')}`;
    const { problems } = readDecayLog(text, 'asWritten');
    expect(problems).toHaveLength(9);
    expect(problems.at(-1)?.problem).toContain('32 more lines');
  });
});
