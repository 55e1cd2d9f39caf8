import { expect, test } from 'vitest';
import { loadCatalogue } from '../../src/catalogue/catalogue.js';

test('twenty demonstrations and six rule packs load from the templates of this project', () => {
  const catalogue = loadCatalogue();
  expect(catalogue.demonstrations).toHaveLength(20);
  expect(catalogue.rulePacks).toHaveLength(6);
});
