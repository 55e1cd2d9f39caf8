import { plainToInstance, type ClassConstructor } from 'class-transformer';
import { validateSync } from 'class-validator';
import type { ErrorDetail } from '../../errors.js';
import { formTokenField } from './form-token.js';
import { formFields, type FormFields } from './form-fields.js';

/** A sent form: the typed object when nothing is wrong, and the texts to show again in any case. */
export type CheckedForm<T> =
  | { readonly form: T; readonly fields: FormFields; readonly problems: readonly [] }
  | {
      readonly form: undefined;
      readonly fields: FormFields;
      readonly problems: readonly ErrorDetail[];
    };

/** Checks the shape of a form against its class; what it means is for the core to check. */
export function checkedForm<T extends object>(
  form: ClassConstructor<T>,
  body: unknown,
): CheckedForm<T> {
  const fields = formFields(body);
  const values = Object.fromEntries(
    Object.entries(fields).filter(([name]) => name !== formTokenField),
  );
  const instance = plainToInstance(form, values);
  const problems = validateSync(instance, {
    whitelist: true,
    forbidNonWhitelisted: true,
    forbidUnknownValues: true,
    // Of several rules that a blank field breaks, the first one written says it best.
    stopAtFirstError: false,
  }).map(({ property, constraints = {} }) => ({
    path: `/${property}`,
    problem: Object.values(constraints).at(-1) ?? 'does not fit',
  }));
  return problems.length === 0
    ? { form: instance, fields, problems: [] }
    : { form: undefined, fields, problems };
}
