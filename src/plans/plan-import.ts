import { planFileSchema, type PlanFile } from '../assessment/plan-file.js';
import { schemaProblems } from '../assessment/schema-check.js';
import { parsedDataText } from '../catalogue/data-file.js';
import { InvalidInput } from '../errors.js';

/**
 * A plan file from its text, JSON or YAML.
 *
 * @throws {InvalidInput} with the line of everything that does not fit
 */
export function importedPlan(text: string): PlanFile {
  const file = parsedDataText(text, 'The plan file');
  const problems = schemaProblems(planFileSchema, file.value).map(({ path, problem }) => ({
    path,
    problem: `line ${String(file.lineOf(path))}: ${path === '' ? 'the file' : path} ${problem}`,
  }));
  const [first] = problems;
  if (first !== undefined) {
    throw new InvalidInput(
      `This is not a plan file that Stillair can use: ${first.problem}.`,
      'Correct the places listed; nothing was brought in.',
      problems,
    );
  }
  return file.value as PlanFile;
}
