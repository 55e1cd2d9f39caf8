import { describe, expect, it } from 'vitest';
import { assess } from '../../src/assessment/assess.js';
import type { Assessment, Finding } from '../../src/assessment/assessment.js';
import { durationWords } from '../../src/assessment/duration-words.js';
import type { PlanFile } from '../../src/assessment/plan-file.js';
import { smallReleaseFraction } from '../../src/science/room-air/well-mixed.js';
import { data, hall } from '../support/plans.js';

/** A room of 200 m3 that leaks nothing, with one quiet person and oxygen judged alone. */
function room(changes: Partial<PlanFile>, freshAirM3PerS?: number): PlanFile {
  const base = hall();
  return {
    ...base,
    event: {
      ...base.event,
      performances: [{ startsAt: '10:00', durationMin: 60 }],
      audience: base.event.audience.map((group) => ({ ...group, count: 0 })),
    },
    venue: {
      ...base.venue,
      spaces: [
        {
          id: 'hall',
          title: 'Room',
          floorAreaM2: { value: 50, origin: 'measured' },
          heightM: { value: 4, origin: 'measured' },
          volumeM3: { value: 200, origin: 'measured' },
        },
      ],
      infiltration: [{ space: 'hall', airChangesPerHour: { value: 0, origin: 'measured' } }],
      ...(freshAirM3PerS !== undefined && {
        airSystems: [
          {
            id: 'fan',
            drive: 'supply' as const,
            space: 'hall',
            freshAirM3PerS: { value: freshAirM3PerS, origin: 'measured' as const },
            effectiveness: 1,
          },
        ],
      }),
    },
    ...changes,
  };
}

/** Nitrogen let out steadily, or at once where it lasts 0 s. */
function nitrogen(volumeM3: number, durationS: number, worstM3 = 0.001): PlanFile['acts'][number] {
  return {
    id: 'nitrogen',
    title: 'Nitrogen',
    space: 'hall',
    minute: 0,
    durationMin: 60,
    releases: {
      planned: [{ gas: 'N2', volumeM3, durationS, manner: 'jet', heightM: 1.5 }],
      worstCredible: [
        { gas: 'N2', volumeM3: worstM3, durationS: 600, manner: 'jet', heightM: 1.5 },
      ],
    },
  };
}

const found = (result: Assessment, code: string): Finding | undefined =>
  result.findings.find((finding) => finding.code === code);
const numberIn = (text: string, pattern: RegExp): number => Number(pattern.exec(text)?.[1]);

/** Oxygen aim of the policy, as the result itself tells it [-]. */
function oxygenAim(result: Assessment): number {
  const quantity = result.zones[0]?.quantities.find((one) => one.quantity === 'oxygenFraction');
  return quantity?.levels.aim?.value ?? NaN;
}

describe('least fresh air for a plan', () => {
  // An hour of 9 L/s: x = q/Q (1 - exp(-Q t/V)) must stay below 1 - aim/0.2095.
  const released = 0.009;
  const exactLeast = (aim: number): number => {
    let low = 1e-4;
    let high = 1;
    const space = { volumeM3: 200, releaseM3PerS: released };
    for (let i = 0; i < 60; i += 1) {
      const middle = (low + high) / 2;
      const x = smallReleaseFraction({ ...space, freshAirM3PerS: middle }, 3600);
      if (x > 1 - aim / 0.2095) low = middle;
      else high = middle;
    }
    return high;
  };

  it.each([
    ['turned up from too little', 0.05, 'caution'],
    ['turned down from plenty', 0.6, 'note'],
    ['where there is no fan yet', undefined, 'caution'],
  ])('is that of the closed form, %s', (_, planned, kind) => {
    const result = assess(room({ acts: [nitrogen(released * 3600, 3600)] }, planned), data);
    const finding = found(result, 'least-fresh-air');
    const least = numberIn(finding?.text ?? '', /Least fresh air: (\d+) L\/s/);
    const exact = exactLeast(oxygenAim(result)) * 1000;
    // Two digits upwards, and a search that ends within 3 %.
    expect(least).toBeGreaterThanOrEqual(exact * 0.999);
    expect(least).toBeLessThan(exact * 1.04 + 10 ** Math.floor(Math.log10(exact) - 1));
    expect(finding?.kind).toBe(kind);
  });

  it('says so where no fan could be enough: gas let out at once', () => {
    const result = assess(room({ acts: [nitrogen(20, 0)] }, 0.2), data);
    expect(found(result, 'least-fresh-air')?.text).toContain('not even 2000 L/s');
  });

  it('says so where none is needed', () => {
    const result = assess(room({ acts: [nitrogen(0.1, 60)] }, 0.2), data);
    expect(found(result, 'least-fresh-air')?.text).toContain('without a fan');
  });
});

describe('repeats per day', () => {
  it('are those of the geometric series of what is carried over', () => {
    const air = 0.02;
    const gas = 4;
    const result = assess(room({ acts: [nitrogen(gas, 0)] }, air), data);
    const finding = found(result, 'repeats-per-day');
    const every = numberIn(finding?.text ?? '', /every (\d+) min/) * 60;
    // Each show adds v/V; a share exp(-Q T/V) of what was there is left at the next.
    const left = Math.exp((-air * every) / 200);
    const most = 1 - oxygenAim(result) / 0.2095;
    let fraction = 0;
    let count = 0;
    for (;;) {
      fraction = fraction * left + gas / 200;
      if (fraction > most) break;
      count += 1;
    }
    expect(count).toBeGreaterThan(1);
    expect(count).toBeLessThan(9);
    expect(numberIn(finding?.text ?? '', /given (\d+) times/)).toBe(count);
  });

  it('are none where the first show misses an aim, and all that fit where little is left', () => {
    const none = assess(room({ acts: [nitrogen(20, 0)] }, 0.2), data);
    expect(found(none, 'repeats-per-day')?.text).toContain('the first show alone misses');
    const all = assess(room({ acts: [nitrogen(0.5, 0)] }, 0.5), data);
    expect(found(all, 'repeats-per-day')?.text).toContain('no more fit into the day');
  });
});

describe('time to the limit against the time to leave', () => {
  const slip = (escapeTimeS?: number) => {
    const { event, ...rest } = room({ acts: [nitrogen(0.001, 60, 60)] });
    const { escapeTimeS: _practised, ...others } = event;
    const plan = { ...rest, event: { ...others, ...(escapeTimeS && { escapeTimeS }) } };
    return assess(plan, data);
  };

  it('is the time at which the displaced air passes the limit', () => {
    const result = slip(60);
    const text = found(result, 'time-to-limit')?.text ?? '';
    const limit = result.zones[0]?.quantities.find(
      ({ quantity, caseName }) => quantity === 'oxygenFraction' && caseName === 'worstCredible',
    )?.levels.limit?.value;
    // 0.1 m3/s into 200 m3 without fresh air: oxygen falls on a straight line.
    const exact = ((1 - (limit ?? NaN) / 0.2095) * 200) / 0.1;
    const told =
      numberIn(text, /passed (\d+) (?:s|min) after/) * (/passed \d+ min/.test(text) ? 60 : 1);
    // Output every 30 s, and minutes told downwards.
    expect(Math.abs(told - exact)).toBeLessThan(62);
  });

  it('is enough where people leave quickly, too little where they do not, unknown unpractised', () => {
    expect(found(slip(5), 'time-to-limit')).toMatchObject({ kind: 'note' });
    expect(found(slip(1200), 'time-to-limit')).toMatchObject({ kind: 'caution' });
    expect(found(slip(1200), 'time-to-limit')?.text).toContain('too long to rely on');
    expect(found(slip(), 'time-to-limit')?.text).toContain('Nobody has practised');
  });

  it('rounds down what is left, and nothing is said where no limit is passed', () => {
    expect([59.9, 119, 120, 3599, 7200].map(durationWords)).toEqual([
      '59 s',
      '119 s',
      '2 min',
      '59 min',
      '2 h',
    ]);
    const calm = assess(room({ acts: [nitrogen(0.001, 60, 0.01)] }), data);
    expect(found(calm, 'time-to-limit')).toBeUndefined();
    expect(found(calm, 'meter-place')).toBeUndefined();
  });
});

describe('meters', () => {
  const meter = (responseTimeS: number) => ({
    id: 'm',
    title: 'Oxygen',
    gas: 'O2',
    cellType: 'partialPressure' as const,
    space: 'hall',
    heightM: 1.2,
    responseTimeS,
  });
  const withMeter = (responseTimeS: number) =>
    found(
      assess(room({ acts: [nitrogen(0.001, 60, 60)], meters: [meter(responseTimeS)] }), data),
      'meter-alarm',
    );

  it('alarm before the limit where they answer quickly, in the slip that passes it', () => {
    expect(withMeter(20)).toMatchObject({ kind: 'note', path: '/meters/0' });
    expect(withMeter(20)?.text).toMatch(
      /alarms \d+ \w+ after it begins, \d+ \w+ before people pass/,
    );
  });

  it('are told where they alarm first', () => {
    const result = assess(room({ acts: [nitrogen(0.001, 60, 60)] }), data);
    expect(found(result, 'meter-place')?.text).toMatch(/hung .* above the floor at .*alarms first/);
  });
});
