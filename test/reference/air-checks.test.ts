import { afterAll, describe, expect, it } from 'vitest';
import {
  recordDeviations,
  recordMisses,
  referenceRecords,
  type Deviation,
} from '../support/reference-records.js';
import { layerAnswers } from './air-layer-answers.js';
import { mixedAnswers } from './air-mixed-answers.js';
import { formulaAnswers } from './air-formula-answers.js';

const answers = { ...mixedAnswers, ...formulaAnswers, ...layerAnswers };

/** Answered by the source terms of releases, not by room air. */
const elsewhere = new Set(['AC-S01', 'AC-S02', 'AC-S04']);

/** A property over random rooms, tested beside the layers. */
const properties = new Set(['AC-P01']);

describe('air checks, each with the source named in its record', () => {
  const records = referenceRecords('air-checks.json', 'checks');

  const deviations: (Deviation & { readonly id: string })[] = [];

  it('has 63 records and an answer for every one of room air', () => {
    expect(records).toHaveLength(63);
    expect(
      records
        .map((record) => record.id)
        .filter((id) => !(id in answers) && !elsewhere.has(id) && !properties.has(id)),
    ).toEqual([]);
  });

  for (const record of records) {
    const answer = answers[record.id];
    if (!answer) continue;
    it(`${record.id} is met within its tolerance (${record.source})`, () => {
      const computed = answer(record.inputs);
      deviations.push(
        ...recordDeviations(record, computed).map((one) => ({ id: record.id, ...one })),
      );
      expect(recordMisses(record, computed)).toEqual([]);
    });
  }

  // AIR_REPORT=1 prints the experiments with what was computed, and the worst of the rest.
  afterAll(() => {
    if (process.env.AIR_REPORT === undefined) return;
    const line = ({ id, path, expected, actual, used }: (typeof deviations)[number]) =>
      `${id} ${path}: ${String(expected)} stated, ${actual.toPrecision(5)} computed, ${(100 * used).toFixed(0)} % of the tolerance`;
    const experiments = deviations.filter(({ id }) => id.startsWith('AC-E'));
    const worst = deviations.toSorted((a, b) => b.used - a.used).slice(0, 20);
    const report = ['experiments', ...experiments.map(line), 'worst', ...worst.map(line)];
    process.stdout.write(`${report.join('\n')}\n`);
  });
});
