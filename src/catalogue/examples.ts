import { fileURLToPath } from 'node:url';
import { planFileSchema, type PlanFile } from '../assessment/plan-file.js';
import { checked, dataFilesIn, readDataFile } from './data-file.js';

const examplesDir = fileURLToPath(new URL('../../templates/examples', import.meta.url));

/**
 * The invented example plans with their venues, in the order of their file names.
 *
 * @throws {InvalidInput} for the first file that is no plan file, with file, line and hint
 */
export function loadExamples(folder: string = examplesDir): readonly PlanFile[] {
  return dataFilesIn(folder).map((path) =>
    checked(readDataFile(path), planFileSchema, 'example plan'),
  );
}
