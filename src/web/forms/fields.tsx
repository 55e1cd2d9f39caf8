import type { ComponentChildren, JSX, VNode } from 'preact';
import type { ErrorDetail } from '../../errors.js';
import type { Viewer } from '../session/viewer.js';
import { en } from '../texts/en.js';
import { formTokenField } from './form-token.js';

/** What a form shows again: the texts that were typed, and what is wrong with them. */
export interface FormState {
  readonly values: Readonly<Record<string, string | undefined>>;
  /** `path` is `/` and the name of the field. */
  readonly problems: readonly ErrorDetail[];
}

export const emptyForm: FormState = { values: {}, problems: [] };

/** Id of a field in the page; names may hold dots and dashes. */
export const fieldId = (name: string): string => `field-${name.replaceAll(/[^\w-]/g, '_')}`;

export function problemOf(state: FormState, name: string): string | undefined {
  return state.problems.find(({ path }) => path === `/${name}`)?.problem;
}

/** Everything that is wrong, above the form, each line a link to its field. */
export function ErrorSummary(props: { readonly problems: readonly ErrorDetail[] }): VNode | null {
  if (props.problems.length === 0) return null;
  return (
    <section class="error-summary" role="alert" aria-labelledby="error-summary-title" tabIndex={-1}>
      <h2 id="error-summary-title">{en.errorSummary}</h2>
      <ul>
        {props.problems.map(({ path, problem }) => (
          <li key={`${path} ${problem}`}>
            {path.length > 1 ? <a href={`#${fieldId(path.slice(1))}`}>{problem}</a> : problem}
          </li>
        ))}
      </ul>
    </section>
  );
}

/** A form that carries the token of the session it was rendered for. */
export function Form(props: {
  readonly action: string;
  readonly viewer?: Viewer | undefined;
  readonly id?: string | undefined;
  readonly children: ComponentChildren;
}): VNode {
  return (
    // Our messages stand beside the fields, in our words; the browser's own would hide them.
    <form method="post" action={props.action} id={props.id} novalidate>
      {props.viewer && <input type="hidden" name={formTokenField} value={props.viewer.formToken} />}
      {props.children}
    </form>
  );
}

interface FieldFrame {
  readonly name: string;
  readonly label: string;
  readonly state: FormState;
  readonly hint?: string | undefined;
}

/** Ids of hint and message, for the control to point at. */
function describedBy({ name, hint, state }: FieldFrame): string | undefined {
  const id = fieldId(name);
  const parts = [
    hint === undefined ? undefined : `${id}-hint`,
    problemOf(state, name) === undefined ? undefined : `${id}-error`,
  ].filter((part) => part !== undefined);
  return parts.length === 0 ? undefined : parts.join(' ');
}

function Framed(props: FieldFrame & { readonly children: ComponentChildren }): VNode {
  const id = fieldId(props.name);
  const problem = problemOf(props.state, props.name);
  return (
    <div class={problem === undefined ? 'field' : 'field field-wrong'}>
      <label for={id}>{props.label}</label>
      {props.hint !== undefined && (
        <p class="hint" id={`${id}-hint`}>
          {props.hint}
        </p>
      )}
      {problem !== undefined && (
        <p class="problem" id={`${id}-error`}>
          <span class="unseen">{en.errorPrefix} </span>
          {problem}
        </p>
      )}
      {props.children}
    </div>
  );
}

export interface TextFieldProps extends FieldFrame {
  readonly type?: 'text' | 'email' | 'password' | 'date' | 'time' | undefined;
  readonly autocomplete?: 'username' | 'current-password' | 'new-password' | 'name' | undefined;
  readonly required?: boolean | undefined;
  readonly inputMode?: 'decimal' | 'numeric' | undefined;
  /** Shown right after the control. */
  readonly unit?: string | undefined;
}

/** One line of text, with what was typed kept. A password is never sent back. */
export function TextField(props: TextFieldProps): VNode {
  const { name, state, type = 'text' } = props;
  // The type of the element is a union by kind of input, which one component for several kinds is not.
  const attributes = {
    id: fieldId(name),
    name,
    type,
    value: type === 'password' ? undefined : state.values[name],
    autocomplete: props.autocomplete,
    inputMode: props.inputMode,
    'aria-required': props.required ? 'true' : undefined,
    'aria-invalid': problemOf(state, name) === undefined ? undefined : 'true',
    'aria-describedby': describedBy(props),
  } as JSX.IntrinsicElements['input'];
  return (
    <Framed {...props}>
      <span class="control">
        <input {...attributes} />
        {props.unit !== undefined && <span class="unit">{props.unit}</span>}
      </span>
    </Framed>
  );
}

/** Several lines of text. */
export function TextArea(props: FieldFrame & { readonly rows?: number | undefined }): VNode {
  const { name, state } = props;
  return (
    <Framed {...props}>
      <textarea
        id={fieldId(name)}
        name={name}
        rows={props.rows ?? 3}
        aria-invalid={problemOf(state, name) === undefined ? undefined : 'true'}
        aria-describedby={describedBy(props)}
        value={state.values[name] ?? ''}
      />
    </Framed>
  );
}

/** One of a few. */
export function SelectField(
  props: FieldFrame & {
    readonly options: readonly { readonly value: string; readonly label: string }[];
  },
): VNode {
  const { name, state, options } = props;
  const chosen = state.values[name] ?? '';
  return (
    <Framed {...props}>
      <select
        id={fieldId(name)}
        name={name}
        aria-invalid={problemOf(state, name) === undefined ? undefined : 'true'}
        aria-describedby={describedBy(props)}
      >
        {options.map(({ value, label }) => (
          <option key={value} value={value} selected={value === chosen}>
            {label}
          </option>
        ))}
      </select>
    </Framed>
  );
}

/** Yes or no. Sends `on`, or nothing. */
export function CheckField(props: FieldFrame): VNode {
  const { name, state, label, hint } = props;
  const id = fieldId(name);
  return (
    <div class="field check">
      <input
        id={id}
        name={name}
        type="checkbox"
        checked={state.values[name] === 'on'}
        aria-describedby={describedBy(props)}
      />
      <label for={id}>{label}</label>
      {hint !== undefined && (
        <p class="hint" id={`${id}-hint`}>
          {hint}
        </p>
      )}
    </div>
  );
}
