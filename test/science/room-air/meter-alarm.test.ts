import { describe, expect, it } from 'vitest';
import { actionReading, alarmTime } from '../../../src/science/room-air/meter-alarm.js';

const timesS = [0, 1e-6, 600];

describe('alarm of a meter with a first-order lag', () => {
  it('shows 90 % of a step at its t90, so a level there alarms at t90 (definition of t90)', () => {
    const meter = { responseTimeS: 30, alarmLevel: 0.9, side: 'above' } as const;
    // The search ends at 1 ms.
    expect(alarmTime(timesS, [0, 1, 1], meter)).toBeCloseTo(30, 2);
  });

  it('sees a fall of oxygen to 0.15 pass 0.195 after tau ln(0.0595/0.045)', () => {
    const meter = { responseTimeS: 20, alarmLevel: 0.195, side: 'below' } as const;
    const exact = (20 / Math.LN10) * Math.log(0.0595 / 0.045);
    expect(alarmTime(timesS, [0.2095, 0.15, 0.15], meter)).toBeCloseTo(exact, 2);
  });

  it('runs behind a steady ramp by its time constant t90/ln 10', () => {
    const ramp = Array.from({ length: 601 }, (_, t) => t);
    const meter = { responseTimeS: 20, alarmLevel: 0.1, side: 'above' } as const;
    const level = ramp.map((t) => 2e-4 * t);
    // True at 500 s; after 57 time constants nothing is left of the start.
    expect(alarmTime(ramp, level, meter)).toBeCloseTo(500 + 20 / Math.LN10, 2);
  });

  it('alarms at once when it starts beyond the level, and never when the level is not passed', () => {
    const meter = { responseTimeS: 20, alarmLevel: 0.195, side: 'below' } as const;
    expect(alarmTime([5, 10], [0.19, 0.19], meter)).toBe(5);
    expect(alarmTime([0, 600], [0.2095, 0.196], meter)).toBeUndefined();
  });
});

describe('reading at which to act', () => {
  it('on a steady fall comes before the true oxygen is at the limit, whatever the lag', () => {
    for (const responseTimeS of [5, 20, 60, 120]) {
      for (const ratePerS of [1e-6, 1e-5, 1e-4]) {
        const alarmLevel = actionReading(0.18, 'below', [], responseTimeS, ratePerS);
        const endS = 0.05 / ratePerS;
        const at = alarmTime([0, endS], [0.2095, 0.2095 - ratePerS * endS], {
          responseTimeS,
          alarmLevel,
          side: 'below',
        });
        expect(0.2095 - ratePerS * (at ?? Infinity)).toBeGreaterThan(0.18);
      }
    }
  });

  it('lies above a limit of oxygen and below a limit of a gas by the same sum', () => {
    expect(actionReading(0.195, 'below', [0.003, -0.002], 20, 1e-5)).toBeCloseTo(0.2002, 12);
    expect(actionReading(0.015, 'above', [0.001, 0.0005], 60, 2e-5)).toBeCloseTo(0.0123, 12);
  });
});
