import { basename, join } from 'node:path';
import { fileURLToPath } from 'node:url';
import type { Catalogue } from '../assessment/catalogue-types.js';
import { cautionsIn, dataFilesIn } from './cautions.js';
import { demonstrationsOf } from './demonstrations.js';
import { frozen } from './frozen.js';
import { checklistsOf, controlsOf, policyOf, policyPaths, questionsOf } from './policy.js';
import { commonRulesOf, rulePackOf } from './rule-packs.js';

const TEMPLATES_DIR = fileURLToPath(new URL('../../templates', import.meta.url));

/** Ids of the gases that have a file in `gases/`; the gas library checks what stands in them. */
function gasIdsIn(folder: string): ReadonlySet<string> {
  return new Set(
    dataFilesIn(folder)
      .map((path) => basename(path).replace(/\.[a-z]+$/, ''))
      .filter((name) => /^[A-Z]/.test(name)),
  );
}

/**
 * Every word and number of `templates/` but the gases, checked against its schema and against each
 * other, frozen.
 *
 * @throws {InvalidInput} for the first file that cannot be used, with file, line and hint
 */
export function loadCatalogue(templatesDir: string = TEMPLATES_DIR): Catalogue {
  const gases = gasIdsIn(join(templatesDir, 'gases'));
  const paths = policyPaths(templatesDir);
  const policy = policyOf(paths.policy, gases);
  const checklists = checklistsOf(paths.checklists, gases);
  const controls = controlsOf(paths.controls, checklists);
  const questions = questionsOf(paths.questions);
  const cautions = cautionsIn(join(templatesDir, 'cautions'), gases);
  const ruleFiles = dataFilesIn(join(templatesDir, 'rules'));
  const commonRules = commonRulesOf(join(templatesDir, 'rules', 'common.yaml'), gases);
  const rulePacks = ruleFiles
    .filter((path) => basename(path) !== 'common.yaml')
    .map((path) => rulePackOf(path, { gases, policy }));
  const demonstrations = demonstrationsOf(dataFilesIn(join(templatesDir, 'demonstrations')), {
    gases,
    controls: new Set(controls.map(({ id }) => id)),
    cautions: new Set(cautions.map(({ id }) => id)),
    slots: new Set(checklists.slots.map(({ id }) => id)),
    breathingHeights: new Set(policy.breathingHeights.map(({ id }) => id)),
  });
  return frozen({
    demonstrations,
    rulePacks,
    commonRules,
    policy,
    controls,
    checklists,
    questions,
    cautions,
  });
}
