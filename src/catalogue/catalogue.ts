import { basename, join } from 'node:path';
import { fileURLToPath } from 'node:url';
import type { Catalogue } from '../assessment/catalogue-types.js';
import { cautionsIn } from './cautions.js';
import { dataFilesIn } from './data-file.js';
import { demonstrationsOf } from './demonstrations.js';
import { frozen } from './frozen.js';
import { checklistsOf, controlsOf, policyOf, questionsOf } from './policy.js';
import { commonRulesOf, rulePackOf } from './rule-packs.js';

const TEMPLATES_DIR = fileURLToPath(new URL('../../templates', import.meta.url));

/** Names of the data files of a folder, which are the ids of what they hold. */
function idsIn(folder: string): readonly string[] {
  return dataFilesIn(folder).map((path) => basename(path).replace(/\.[a-z]+$/, ''));
}

/**
 * Every word and number of `templates/` but the gases, checked against its schema and against each
 * other, frozen.
 *
 * @throws {InvalidInput} for the first file that cannot be used, with file, line and hint
 */
export function loadCatalogue(templatesDir: string = TEMPLATES_DIR): Catalogue {
  const at = (...steps: readonly string[]) => join(templatesDir, ...steps);
  const names = {
    // A gas file is named by its symbol; shared tables beside them begin with a small letter.
    gases: new Set(idsIn(at('gases')).filter((name) => /^[A-Z]/.test(name))),
    demonstrations: new Set(idsIn(at('demonstrations'))),
  };
  const policy = policyOf(at('policy', 'default.yaml'), names);
  const checklists = checklistsOf(at('policy', 'checklists.yaml'), names);
  const controls = controlsOf(at('policy', 'controls.yaml'), checklists);
  const questions = questionsOf(at('policy', 'review-questions.yaml'));
  const cautions = cautionsIn(at('cautions'), names);
  const commonRules = commonRulesOf(at('rules', 'common.yaml'), names);
  const rulePacks = dataFilesIn(at('rules'))
    .filter((path) => basename(path) !== 'common.yaml')
    .map((path) => rulePackOf(path, { ...names, policy }));
  const demonstrations = demonstrationsOf(dataFilesIn(at('demonstrations')), {
    ...names,
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
