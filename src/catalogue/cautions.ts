import { readdirSync } from 'node:fs';
import { join } from 'node:path';
import { cautionsFileSchema, type Caution } from '../assessment/catalogue-types.js';
import { checked, readDataFile, refuseFaults } from './data-file.js';
import { repeatedIdFaults, whenFaults } from './references.js';

/** Data files of a folder in the order of their names. */
export function dataFilesIn(folder: string): readonly string[] {
  return readdirSync(folder)
    .filter((name) => /\.(ya?ml|json)$/.test(name))
    .sort()
    .map((name) => join(folder, name));
}

/** The cautions of every file in `cautions/`; an id may be used once only. */
export function cautionsIn(folder: string, gases: ReadonlySet<string>): readonly Caution[] {
  const all: Caution[] = [];
  for (const path of dataFilesIn(folder)) {
    const file = readDataFile(path);
    const { cautions } = checked(file, cautionsFileSchema, 'list of cautions');
    const known = new Set(all.map(({ id }) => id));
    refuseFaults(file, 'list of cautions', [
      ...repeatedIdFaults(cautions, '/cautions'),
      ...whenFaults(cautions, '/cautions', gases),
      ...cautions.flatMap(({ id }, i) =>
        known.has(id)
          ? [
              {
                path: `/cautions/${String(i)}/id`,
                problem: `the id "${id}" stands in another file`,
                hint: 'Give each caution its own id.',
              },
            ]
          : [],
      ),
    ]);
    all.push(...cautions);
  }
  return all;
}
