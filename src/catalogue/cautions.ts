import { cautionsFileSchema, type Caution } from '../assessment/catalogue-types.js';
import { checked, dataFilesIn, readDataFile, refuseFaults } from './data-file.js';
import { repeatedIdFaults, whenFaults, type KnownNames } from './references.js';

/** The cautions of every file in `cautions/`; an id may be used once only. */
export function cautionsIn(folder: string, names: KnownNames): readonly Caution[] {
  const all: Caution[] = [];
  for (const path of dataFilesIn(folder)) {
    const file = readDataFile(path);
    const { cautions } = checked(file, cautionsFileSchema, 'list of cautions');
    const known = new Set(all.map(({ id }) => id));
    refuseFaults(file, 'list of cautions', [
      ...repeatedIdFaults(cautions, '/cautions'),
      ...whenFaults(cautions, '/cautions', names),
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
