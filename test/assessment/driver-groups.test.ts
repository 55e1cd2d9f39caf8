import { describe, expect, it } from 'vitest';
import type { DriverResult } from '../../src/assessment/assessment.js';
import { driverGroups } from '../../src/assessment/driver-groups.js';
import { assessmentFixture } from '../support/assessment-fixture.js';

const { zones } = assessmentFixture;
const [zone] = zones;
const driver = (input: string, rankCorrelation: number, quantity: string): DriverResult => ({
  zone: zone?.id ?? '',
  zoneTitle: zone?.title ?? '',
  quantity,
  input,
  inputTitle: input,
  rankCorrelation,
});

describe('inputs that drive an answer', () => {
  it('are the three strongest of each judged quantity, whichever way they move it', () => {
    const oxygen = zone?.quantities[0]?.quantity ?? '';
    const groups = driverGroups({
      zones,
      drivers: [
        driver('weak', 0.2, oxygen),
        driver('middle', 0.4, oxygen),
        driver('strong', -0.9, oxygen),
        driver('fair', 0.3, oxygen),
        driver('strong', 0.9, 'a gas that nobody judges'),
      ],
    });
    expect(groups.map(({ drivers }) => drivers.map(({ input }) => input))).toEqual([
      ['strong', 'middle', 'fair'],
    ]);
  });
});
