import { describe, expect, it } from 'vitest';
import { recordMisses, referenceRecords } from '../support/reference-records.js';
import { layerAnswers } from './air-layer-answers.js';
import { mixedAnswers } from './air-mixed-answers.js';
import { formulaAnswers } from './air-formula-answers.js';

const answers = { ...mixedAnswers, ...formulaAnswers, ...layerAnswers };

/** Answered by the source terms of releases, not by room air. */
const elsewhere = new Set(['AC-S01', 'AC-S02', 'AC-S04']);

/** Owed: the two-layer model and sampling. */
const owed = new Set([
  'AC-D08',
  'AC-D09',
  'AC-D19',
  'AC-D20',
  'AC-G02',
  'AC-G03',
  'AC-U01',
  'AC-P01',
  'AC-P02',
]);

describe('air checks, each with the source named in its record', () => {
  const records = referenceRecords('air-checks.json', 'checks');

  it('has 63 records and an answer for every one of room air', () => {
    expect(records).toHaveLength(63);
    expect(
      records
        .map((record) => record.id)
        .filter((id) => !(id in answers) && !elsewhere.has(id) && !owed.has(id)),
    ).toEqual([]);
  });

  for (const record of records) {
    const answer = answers[record.id];
    if (!answer) continue;
    it(`${record.id} is met within its tolerance (${record.source})`, () => {
      expect(recordMisses(record, answer(record.inputs))).toEqual([]);
    });
  }
});
