import type { Policy } from '../assessment/catalogue-types.js';
import type { FormFields } from '../web/forms/form-fields.js';
import type { Option } from '../web/views/field-spec.js';
import { rowNumbersIn } from '../web/views/form-value.js';

const list = 'event.audience';

const heights = (policy: Policy) =>
  policy.breathingHeights.flatMap(({ id, title, heightM, declared }) =>
    heightM === null || !declared ? [] : [{ id, title, height: String(heightM.typical) }],
  );

/** The postures that a group may have, with the height of the mouth that goes with each. */
export function postureOptions(policy: Policy): readonly Option[] {
  return heights(policy).map(({ id, title, height }) => ({
    value: id,
    label: `${title}: ${height}\u00a0m`,
  }));
}

/** The form with a mouth height wherever only the posture was given. A height that was typed stays. */
export function withHeights(fields: FormFields, policy: Policy): FormFields {
  const known = new Map(heights(policy).map(({ id, height }) => [id, height]));
  const filled: Record<string, string | undefined> = { ...fields };
  for (const row of rowNumbersIn(fields, list)) {
    const at = `${list}.${String(row)}.zone`;
    filled[`${at}.heightM`] ??= known.get(fields[`${at}.posture`] ?? '');
  }
  return filled;
}

/** The form with the posture chosen whose usual height is the one entered. */
export function withPostures(fields: FormFields, policy: Policy): FormFields {
  const known = heights(policy);
  const filled: Record<string, string | undefined> = { ...fields };
  for (const row of rowNumbersIn(fields, list)) {
    const at = `${list}.${String(row)}.zone`;
    filled[`${at}.posture`] ??= known.find(({ height }) => height === fields[`${at}.heightM`])?.id;
  }
  return filled;
}
