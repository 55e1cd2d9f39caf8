import type { ErrorDetail } from '../../errors.js';
import { checkedForm } from '../forms/checked-form.js';
import { formFields, type FormFields } from '../forms/form-fields.js';
import { formTokenField } from '../forms/form-token.js';
import { viewTexts as words } from '../texts/en-views.js';
import type { FieldSpec } from './field-spec.js';
import { knownFieldNames, rowSpecAt, withoutRow, withRow, withRowsCounted } from './form-rows.js';
import { formValue, rowNumbersIn, type FormValue } from './form-value.js';
import { SavingForm } from './saving-form.js';

export type Command =
  | { readonly kind: 'save' }
  | { readonly kind: 'add' | 'remove'; readonly at: string }
  | { readonly kind: 'addDemonstration' };

/** A described form as it was sent. */
export interface SentForm extends FormValue {
  readonly fields: FormFields;
  readonly command: Command;
  /** Version that the change was made from. */
  readonly version: number | undefined;
}

const headFields = ['version', 'do'] as const;

function commandOf(text: string | undefined): Command {
  if (text === 'addDemonstration') return { kind: 'addDemonstration' };
  const [kind, at = ''] = (text ?? 'save').split(':');
  return kind === 'add' || kind === 'remove' ? { kind, at } : { kind: 'save' };
}

/**
 * The form that was sent: what was typed, the value it states, and everything wrong with either. A
 * field that is not of this form is refused, not dropped.
 *
 * @param page names of fields that belong to the page but not to the value, and what is filled in
 *   before the value is read
 */
export function sentForm(
  body: unknown,
  specs: readonly FieldSpec[],
  page: {
    readonly beside?: readonly string[];
    readonly filled?: (fields: FormFields) => FormFields;
  } = {},
): SentForm {
  const { beside = [], filled = (fields: FormFields) => fields } = page;
  const sent = formFields(body);
  const head = checkedForm(
    SavingForm,
    Object.fromEntries(headFields.map((name) => [name, sent[name]])),
  );
  const apart: readonly string[] = [...headFields, formTokenField];
  const content = Object.fromEntries(
    Object.entries(sent).filter(([name]) => !apart.includes(name)),
  );
  const fields = filled(withRowsCounted(content, specs));
  const known = knownFieldNames(fields, specs);
  const strangers: readonly ErrorDetail[] = Object.keys(fields)
    .filter((name) => !known.has(name) && !beside.includes(name))
    .map((name) => ({ path: '', problem: `\u201c${name.slice(0, 80)}\u201d ${words.damaged}` }));
  const { value, problems } = formValue(fields, specs);
  return {
    fields,
    command: head.form === undefined ? { kind: 'save' } : commandOf(head.form.do),
    version: head.form?.version,
    value,
    problems: [
      ...head.problems.map(({ problem }) => ({ path: '', problem })),
      ...strangers,
      ...problems,
    ],
  };
}

/** The form after adding or removing a row, with the row to show first. */
export function afterRowCommand(
  { fields, command }: SentForm,
  specs: readonly FieldSpec[],
): { readonly fields: FormFields; readonly opened: string | undefined } {
  if (command.kind === 'remove') {
    const cut = command.at.lastIndexOf('.');
    const exists = rowNumbersIn(fields, command.at.slice(0, cut)).includes(
      Number(command.at.slice(cut + 1)),
    );
    const at = command.at.slice(0, command.at.lastIndexOf('.'));
    return {
      fields: exists ? withoutRow(fields, command.at) : fields,
      opened: at.includes('.') ? at.slice(0, at.split('.', 2).join('.').length) : undefined,
    };
  }
  if (command.kind !== 'add') return { fields, opened: undefined };
  const spec = rowSpecAt(specs, command.at);
  if (spec === undefined) return { fields, opened: undefined };
  const added = withRow(fields, command.at, spec);
  return { fields: added.fields, opened: added.row };
}
