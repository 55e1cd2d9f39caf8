import fc from 'fast-check';
import { describe, expect, test } from 'vitest';
import { loadCatalogue } from '../../../src/catalogue/catalogue.js';
import { loadExamples } from '../../../src/catalogue/examples.js';
import { partsOf, planDocument, planTextsOf } from '../../../src/plans/plan-document.js';
import { planForm } from '../../../src/plans/plan-form.js';
import { venueForm } from '../../../src/venues/venue-form.js';
import type { FormFields } from '../../../src/web/forms/form-fields.js';
import { withoutRow, withRow, withRowsCounted } from '../../../src/web/views/form-rows.js';
import { formTexts } from '../../../src/web/views/form-texts.js';
import { formValue } from '../../../src/web/views/form-value.js';
import { sentForm } from '../../../src/web/views/sent-form.js';

const { policy } = loadCatalogue();
const examples = loadExamples();

/** Names that no description has, so that reading must refuse them. */
const strangers = fc.string({ minLength: 1, maxLength: 30 }).map((text) => `zz${text}`);

describe('a described form', () => {
  test.each(examples.map((file) => [file.venue.title, file] as const))(
    'gives back the plan of %s exactly, with the parts that it does not show',
    (_, file) => {
      const { document } = partsOf(file);
      const texts = planTextsOf({ ...document }, policy);
      const { value, problems } = formValue(texts, planForm);
      expect(problems).toEqual([]);
      expect(planDocument(value)).toEqual(document);
    },
  );

  test.each(examples.map(({ venue }) => [venue.title, venue] as const))(
    'gives back the venue %s exactly',
    (_, venue) => {
      const { value, problems } = formValue(formTexts({ ...venue }, venueForm), venueForm);
      expect(problems).toEqual([]);
      const filled = Object.entries(value).filter(
        ([, entry]) => !Array.isArray(entry) || entry.length > 0,
      );
      expect(Object.fromEntries(filled)).toEqual(venue);
    },
  );

  test('never makes a number out of blanks, whatever stays blank', () => {
    const [file] = examples;
    if (file === undefined) throw new Error('There is no example.');
    const texts = planTextsOf({ ...partsOf(file).document }, policy);
    const names = Object.keys(texts).filter((name) => !/(^|\.)(rest|row|id)$/.test(name));
    const numbersIn = (value: unknown): number[] =>
      typeof value === 'number'
        ? [value]
        : typeof value === 'object' && value !== null
          ? Object.values(value).flatMap(numbersIn)
          : [];
    const before = numbersIn(formValue(texts, planForm).value);
    fc.assert(
      fc.property(fc.subarray(names), fc.constantFrom('', ' ', '\t '), (blanked, blank) => {
        const sent = { ...texts, ...Object.fromEntries(blanked.map((name) => [name, blank])) };
        const after = numbersIn(sentForm(sent, planForm).value);
        const left = [...before];
        for (const number of after) {
          const at = left.indexOf(number);
          expect(at).toBeGreaterThanOrEqual(0);
          left.splice(at, 1);
        }
      }),
      { seed: 3, numRuns: 40 },
    );
  });

  test('refuses every field that it does not have', () => {
    fc.assert(
      fc.property(strangers, (name) => {
        const { problems } = sentForm({ title: 'Hall', [name]: '1' }, venueForm);
        expect(problems.some(({ problem }) => problem.includes('not a field'))).toBe(true);
      }),
      { seed: 5, numRuns: 60 },
    );
  });

  test('counts rows from zero without gaps, in their order, in lists within lists too', () => {
    const fields: FormFields = {
      'acts.7.title': 'second',
      'acts.2.title': 'first',
      'acts.7.sound.5.gas': 'He',
    };
    expect(withRowsCounted(fields, planForm)).toEqual({
      'acts.0.title': 'first',
      'acts.1.title': 'second',
      'acts.1.sound.0.gas': 'He',
    });
  });

  test('adds a row with an id that no other row has, and takes one away again', () => {
    const spec = { title: '', noun: '', empty: '', idPrefix: 'S', heading: [], fields: [] };
    const fields = { 'spaces.0.id': 'S1', 'openings.0.id': 'S2' };
    const added = withRow(fields, 'spaces', spec, { title: 'Pit' });
    expect(added.fields).toMatchObject({ 'spaces.1.id': 'S3', 'spaces.1.title': 'Pit' });
    expect(withoutRow(added.fields, added.row)).toEqual(fields);
  });
});
