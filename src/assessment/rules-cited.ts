import type { CitedRule } from './assessment.js';
import type { Caution, RulePack } from './catalogue-types.js';
import { conditionHolds, type FactValues } from './condition-holds.js';

const checkedWords: Readonly<Record<string, string>> = {
  'first-hand': 'text read',
  'second-hand': 'read in a quotation or summary',
  'from-memory': 'from memory, text not read',
  'common-practice': 'common practice, no source',
  judgement: 'judgement of this planner',
  calculated: 'worked out from its inputs',
};

/** The rules of a pack that apply to a plan, each with its edition and how its text was checked. */
export function rulesCited(pack: RulePack, facts: FactValues): readonly CitedRule[] {
  return pack.rules
    .filter((rule) => conditionHolds(rule.when, facts))
    .map((rule) => ({
      id: rule.id,
      instrument: rule.instrument,
      section: rule.title,
      edition: rule.edition,
      duty: rule.duty,
      why: rule.appliesWhen,
      checked: checkedWords[rule.checked] ?? rule.checked,
      confirm: rule.checked !== 'first-hand',
    }));
}

/** The cautions to print with a plan, standard ones first. */
export function cautionsFor(
  cautions: readonly Caution[],
  facts: FactValues,
): readonly { readonly id: string; readonly text: string }[] {
  const order = ['standard', 'gas', 'form', 'hazard', 'meter', 'emergency'];
  return cautions
    .filter((caution) => conditionHolds(caution.when, facts))
    .sort((a, b) => order.indexOf(a.group) - order.indexOf(b.group))
    .map(({ id, text }) => ({ id, text }));
}
