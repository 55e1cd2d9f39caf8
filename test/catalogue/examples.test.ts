import { describe, expect, test } from 'vitest';
import { checkedPlan } from '../../src/assessment/assess.js';
import { engineVersion } from '../../src/assessment/engine-version.js';
import { loadCatalogue } from '../../src/catalogue/catalogue.js';
import { loadExamples } from '../../src/catalogue/examples.js';
import { loadGasLibrary } from '../../src/catalogue/gas-library.js';

const data = { gases: loadGasLibrary(), catalogue: loadCatalogue(), engineVersion };

describe('the example plans', () => {
  test('are two, each a plan file whose references lead somewhere', () => {
    const examples = loadExamples();
    expect(examples.map(({ venue }) => venue.title)).toEqual([
      'Brackenfell Primary',
      'Lanternfold',
    ]);
    for (const example of examples) expect(checkedPlan(example, data)).toBe(example);
  });

  test('name demonstrations of the catalogue and packs that exist', () => {
    const demonstrations = new Set(data.catalogue.demonstrations.map(({ id }) => id));
    const packs = new Set(data.catalogue.rulePacks.map(({ id }) => id));
    for (const { acts, venue } of loadExamples()) {
      for (const { catalogueId } of acts) expect(demonstrations).toContain(catalogueId);
      expect(packs).toContain(venue.site.rulePack);
    }
  });

  test('use invented pitches: none of those that the reference scenarios name', () => {
    const pitches = loadExamples().flatMap(({ acts }) =>
      acts.flatMap(({ sound = [] }) =>
        sound.flatMap(({ frequencyInAirHz }) => frequencyInAirHz ?? []),
      ),
    );
    expect(pitches.length).toBeGreaterThan(0);
    for (const pitch of pitches) expect([145, 315, 780]).not.toContain(pitch);
  });
});
