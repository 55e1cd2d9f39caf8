import { describe, expect, it } from 'vitest';
import { recordMisses, referenceRecords } from '../support/reference-records.js';
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
      expect(recordMisses(record, answer(record.inputs))).toEqual([]);
    });
  }
});
