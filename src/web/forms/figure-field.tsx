import type { JSX, VNode } from 'preact';
import { en } from '../texts/en.js';
import { fieldId, problemOf, type FormState } from './fields.js';
import { origins } from './figure-form.js';

interface FigureFieldProps {
  readonly name: string;
  readonly label: string;
  readonly state: FormState;
  readonly unit: string;
  readonly hint?: string | undefined;
}

function Part(props: {
  readonly field: FigureFieldProps;
  readonly part: string;
  readonly label: string;
  readonly type?: 'text' | 'date';
  readonly hasUnit?: boolean;
}): VNode {
  const { field, part, label, type = 'text', hasUnit = false } = props;
  const id = fieldId(part);
  const problem = problemOf(field.state, part);
  const hintId = field.hint === undefined ? undefined : `${fieldId(field.name)}-hint`;
  // The type of the element is a union by kind of input, which one component for two kinds is not.
  const attributes = {
    id,
    name: part,
    type,
    value: field.state.values[part],
    inputMode: hasUnit ? 'decimal' : undefined,
    'aria-invalid': problem === undefined ? undefined : 'true',
    'aria-describedby': problem === undefined ? hintId : `${id}-error`,
  } as JSX.IntrinsicElements['input'];
  return (
    <span class={problem === undefined ? 'part' : 'part field-wrong'}>
      <label for={id}>{label}</label>
      {problem !== undefined && (
        <span class="problem" id={`${id}-error`}>
          {problem}
        </span>
      )}
      <span class="control">
        <input {...attributes} />
        {hasUnit && field.unit !== '' && <span class="unit">{field.unit}</span>}
      </span>
    </span>
  );
}

/**
 * A physical figure with its bounds and where it comes from: a value, a range, or "don't know".
 * Bounds and date fold away until they are used, so a table of figures stays readable.
 */
export function FigureField(props: FigureFieldProps): VNode {
  const { name, label, hint, state } = props;
  const words = en.figure;
  const id = fieldId(name);
  const detailParts = [`${name}-low`, `${name}-high`, `${name}-on`, `${name}-by`, `${name}-note`];
  const isOpen = detailParts.some((part) => problemOf(state, part) !== undefined);
  const [low, high, on, by, note] = detailParts.map((part) => state.values[part]);
  const bounds = low === undefined && high === undefined ? [] : [`${low ?? ''}\u2013${high ?? ''}`];
  const stated = [...bounds, on, by, note].filter((text) => text !== undefined);
  const chosen = state.values[`${name}-origin`] ?? '';
  const originId = fieldId(`${name}-origin`);
  return (
    <fieldset class="figure-field">
      <legend>{label}</legend>
      {hint !== undefined && (
        <p class="hint" id={`${id}-hint`}>
          {hint}
        </p>
      )}
      <div class="figure-main">
        <Part field={props} part={name} label={words.value} hasUnit />
        <span class="part">
          <label for={originId}>{words.origin}</label>
          <select id={originId} name={`${name}-origin`}>
            <option value="">{words.notStated}</option>
            {origins.map((origin) => (
              <option key={origin} value={origin} selected={origin === chosen}>
                {en.origins[origin]}
              </option>
            ))}
          </select>
        </span>
      </div>
      <details class="figure-more" open={isOpen}>
        <summary>
          {stated.length === 0 ? words.more : stated.join(', ')}
          <span class="unseen">: {label}</span>
        </summary>
        <Part field={props} part={`${name}-low`} label={words.low} hasUnit />
        <Part field={props} part={`${name}-high`} label={words.high} hasUnit />
        <Part field={props} part={`${name}-on`} label={words.on} type="date" />
        <Part field={props} part={`${name}-by`} label={words.by} />
        <Part field={props} part={`${name}-note`} label={words.note} />
      </details>
    </fieldset>
  );
}
