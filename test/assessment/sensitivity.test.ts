import { describe, expect, it } from 'vitest';
import { decisionOrder, type SensitivityRow } from '../../src/assessment/assessment.js';
import type { ChosenControl } from '../../src/assessment/plan-file.js';
import { sensitivityRows } from '../../src/assessment/sensitivity.js';
import { contextFor, hallWithPit, sources } from '../support/controls.js';
import { hall } from '../support/plans.js';

/** What becomes of the planned day when one thing that carries it gives way. Common practice, no source. */

const nameOf = (gas: string) => gas;
const rank = (row: SensitivityRow | undefined) => decisionOrder.indexOf(row?.word ?? 'go');

describe('sensitivity', () => {
  const whole = hallWithPit(2, 2);
  // Nobody sits on the floor here: seats and pit alone.
  const plan = {
    ...whole,
    event: {
      ...whole.event,
      audience: whole.event.audience.filter(({ id }) => id !== 'mats'),
    },
  };
  const chosen: readonly ChosenControl[] = [
    { control: 'pit-extract', space: 'pit', value: 0.15 },
    { control: 'nobody-below', space: 'pit' },
  ];
  const credited = chosen.flatMap((one) => {
    const control = sources.controls.find(({ id }) => id === one.control);
    return control ? [{ control, chosen: one }] : [];
  });
  const rows = sensitivityRows(plan, credited, contextFor(plan, 'quick'), sources, nameOf);
  const row = (id: string) => rows.find((one) => one.id === id);

  it('names half the air, twice the release, fans off and each credited control failing alone', () => {
    expect(rows.map(({ id }) => id)).toEqual([
      'asJudged',
      'halfAir',
      'twiceRelease',
      'fansOff',
      'without:1',
      'without:2',
    ]);
    expect(row('without:2')?.title).toBe('without: Nobody in the pit or under the stage');
  });

  it('gives a word, and a number beside its level, to each', () => {
    for (const one of rows) {
      expect(one.figure?.value).toBeGreaterThan(0);
      expect(one.limit?.value).toBeGreaterThan(0);
      expect(one.zoneTitle).not.toBe('');
    }
  });

  it('never finds a better word with twice the release or without the extract', () => {
    expect(rank(row('twiceRelease'))).toBeGreaterThanOrEqual(rank(row('asJudged')));
    expect(rank(row('without:1'))).toBeGreaterThanOrEqual(rank(row('asJudged')));
  });

  it('finds a worse word without the fans, and without the extract of the pit', () => {
    expect(row('asJudged')?.word).toBe('goWithConditions');
    expect(row('fansOff')?.word).toBe('noGo');
    expect(row('without:1')?.word).toBe('noGo');
  });

  it('finds the players again where nobody clears the pit', () => {
    expect(row('without:2')?.zoneTitle).toBe('Players');
  });

  it('asks only for what a plan has', () => {
    const bare = hall();
    const ids = sensitivityRows(bare, [], contextFor(bare, 'quick'), sources, nameOf).map(
      ({ id }) => id,
    );
    expect(ids).toEqual(['asJudged', 'halfAir']);
  });
});
