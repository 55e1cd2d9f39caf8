import { describe, expect, it } from 'vitest';
import { assess } from '../../src/assessment/assess.js';
import { data, fogAct, hall } from '../support/plans.js';

describe('an ordinary safe demonstration passes and a bad one does not', () => {
  it('judges 0.5 kg of dry ice in a hall of 200 as Go when no more is brought', () => {
    const result = assess(hall({ acts: [fogAct('hall', 0.5, 0.5)] }), data);
    expect(result.decision.asFiled).toBe('go');
  });
  it('judges the same with a 5 kg box as Go with conditions', () => {
    const result = assess(hall({ acts: [fogAct('hall', 0.5, 5)] }), data);
    expect(result.decision.asFiled).toBe('goWithConditions');
  });
});
