import { describe, expect, it } from 'vitest';
import { firstAlarm } from '../../../src/science/room-air/meter-place.js';

const meter = { responseTimeS: 20, alarmLevel: 0.05, side: 'above' } as const;
const timesS = [0, 100, 200, 300];

describe('where a meter alarms first', () => {
  it('is where the gas comes first, a response time after a step', () => {
    // A step to twice the alarm level shows half of it after tau ln 2, tau = t90/ln 10.
    const low = { timesS: [0, 50, 50 + 1e-9, 300], values: [0, 0, 0.1, 0.1] };
    const high = { timesS, values: [0, 0, 0.1, 0.1] };
    const found = firstAlarm([high, low], meter);
    expect(found?.index).toBe(1);
    expect(found?.atS).toBeCloseTo(50 + (20 / Math.LN10) * Math.LN2, 2);
  });

  it('is the first of equals, and none where no place comes to the level', () => {
    const rising = { timesS, values: [0, 0.1, 0.1, 0.1] };
    expect(firstAlarm([rising, rising], meter)?.index).toBe(0);
    expect(firstAlarm([{ timesS, values: [0, 0.04, 0.04, 0.04] }], meter)).toBeUndefined();
    expect(firstAlarm([], meter)).toBeUndefined();
  });
});
