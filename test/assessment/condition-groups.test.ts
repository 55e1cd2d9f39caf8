import { describe, expect, it } from 'vitest';
import type { Condition } from '../../src/assessment/assessment.js';
import { conditionGroups, numberRanges, placeLine } from '../../src/assessment/condition-groups.js';
import { assessmentFixture } from '../support/assessment-fixture.js';

const [zone] = assessmentFixture.zones;
const [act] = assessmentFixture.acts;
const title = zone?.title ?? '';
const condition = (changes: Partial<Condition>): Condition => ({
  number: 1,
  row: 8,
  act: null,
  zone: zone?.id ?? null,
  text: `${title}: container chained; leave at oxygen 19.0 %.`,
  checklistLine: `${title}: chain tried`,
  blocksStart: true,
  ...changes,
});
const grouped = (...conditions: Condition[]) =>
  conditionGroups({ ...assessmentFixture, conditions });

describe('conditions for reading', () => {
  it('stand with those that block the start first, each keeping its numbers', () => {
    const groups = grouped(
      condition({ number: 1, row: 4, blocksStart: false }),
      condition({ number: 2 }),
    );
    expect(groups.map(({ numbers }) => numbers)).toEqual([[2], [1]]);
  });

  it('say what is asked of one place throughout only once, without its acts', () => {
    const [group] = grouped(
      condition({ number: 1, act: act?.id ?? null }),
      condition({ number: 2 }),
    );
    expect(group?.numbers).toEqual([1, 2]);
    expect(group?.head).toBe('Container chained; leave at oxygen 19.0 %.');
    expect(group?.places.map(placeLine)).toEqual([title]);
  });

  it('keep different stops of one place apart, with the act of each', () => {
    const [group] = grouped(
      condition({ number: 1 }),
      condition({
        number: 2,
        act: act?.id ?? null,
        text: `${title}: container chained; leave at oxygen 19.5 %.`,
      }),
    );
    expect(group?.places.map(placeLine)).toEqual([
      `${title}: leave at oxygen 19.0 %; leave at oxygen 19.5 % (${act?.title ?? ''})`,
    ]);
  });

  it('say a remark that all of them carry once', () => {
    const clean = '(clean air here reads 20.6 %)';
    const [group] = grouped(
      condition({ number: 1, text: `${title}: container chained; leave at 19.0 % ${clean}.` }),
      condition({ number: 2, text: `${title}: container chained; leave at 19.5 % ${clean}.` }),
    );
    expect(group?.remark).toBe('Clean air here reads 20.6 %.');
    expect(group?.places.map(placeLine)).toEqual([`${title}: leave at 19.0 %; leave at 19.5 %`]);
  });

  it('are numbered in ranges', () => {
    expect(numberRanges([5, 3, 4, 8])).toBe('3–5, 8');
  });
});
