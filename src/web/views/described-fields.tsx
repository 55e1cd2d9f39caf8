import type { VNode } from 'preact';
import {
  CheckField,
  fieldId,
  problemOf,
  SelectField,
  TextArea,
  TextField,
  type FormState,
} from '../forms/fields.js';
import { FigureField } from '../forms/figure-field.js';
import { viewTexts as words } from '../texts/en-views.js';
import {
  nameIn,
  restField,
  rowMark,
  type ChoiceLists,
  type FieldSpec,
  type RowSpec,
} from './field-spec.js';
import { rowNumbersIn } from './form-value.js';
import { fieldText, optionsOf } from './row-heading.js';

interface Described {
  readonly state: FormState;
  readonly lists: ChoiceLists;
  /** Row that was just added: it opens, and the page jumps to it. */
  readonly opened?: string | undefined;
}

function Kept(props: { readonly name: string; readonly state: FormState }): VNode | null {
  const value = props.state.values[props.name];
  return value === undefined ? null : <input type="hidden" name={props.name} value={value} />;
}

function AmountField(
  props: Described & {
    readonly name: string;
    readonly spec: Extract<FieldSpec, { kind: 'amount' }>;
  },
): VNode {
  const { name, spec, state } = props;
  return (
    <div class="amount">
      <FigureField name={name} label={spec.label} hint={spec.hint} unit="" state={state} />
      <SelectField
        name={`${name}-unit`}
        label={words.unit}
        state={state}
        options={spec.units.map(({ key, label }) => ({ value: key, label }))}
      />
    </div>
  );
}

function DescribedField(
  props: Described & { readonly prefix: string; readonly spec: FieldSpec },
): VNode | null {
  const { prefix, spec, state, lists, opened } = props;
  const name = nameIn(prefix, spec.key);
  switch (spec.kind) {
    case 'rows':
      return <Rows list={name} spec={spec.rows} state={state} lists={lists} opened={opened} />;
    case 'kept':
      return <Kept name={name} state={state} />;
    case 'check':
      return <CheckField name={name} label={spec.label} hint={spec.hint} state={state} />;
    case 'figure':
      return (
        <FigureField
          name={name}
          label={spec.label}
          hint={spec.hint}
          unit={spec.unit.symbol}
          state={state}
        />
      );
    case 'amount':
      return <AmountField {...props} name={name} spec={spec} />;
    case 'choice': {
      const blank = spec.blank === undefined ? [] : [{ value: '', label: spec.blank }];
      const options = optionsOf(spec, lists);
      const chosen = state.values[name];
      // What was chosen before stays visible, even when the list no longer has it.
      const gone =
        chosen === undefined || options.some(({ value }) => value === chosen)
          ? []
          : [{ value: chosen, label: chosen }];
      return (
        <SelectField
          name={name}
          label={spec.label}
          hint={spec.hint}
          state={state}
          options={[...blank, ...options, ...gone]}
        />
      );
    }
    case 'yesNo':
      return (
        <SelectField
          name={name}
          label={spec.label}
          hint={spec.hint}
          state={state}
          options={[
            { value: '', label: spec.blank },
            { value: 'yes', label: spec.yes },
            { value: 'no', label: spec.no },
          ]}
        />
      );
    case 'longText':
      return <TextArea name={name} label={spec.label} hint={spec.hint} state={state} />;
    case 'text':
    case 'number':
    case 'date':
    case 'clock':
    case 'dayTime':
      return (
        <TextField
          name={name}
          label={spec.label}
          hint={spec.hint}
          state={state}
          type={spec.kind === 'date' ? 'date' : spec.kind === 'clock' ? 'time' : 'text'}
          inputMode={spec.kind === 'number' ? 'decimal' : undefined}
          unit={spec.kind === 'number' ? spec.unit.symbol || undefined : undefined}
          required={spec.required}
        />
      );
  }
}

/** The fields of one record, in the order of their description. */
export function DescribedFields(
  props: Described & { readonly specs: readonly FieldSpec[]; readonly prefix?: string },
): VNode {
  const { specs, prefix = '', ...described } = props;
  return (
    <>
      <div class="fields">
        {specs
          .filter(({ kind }) => kind !== 'rows')
          .map((spec) => (
            <DescribedField key={spec.key} {...described} prefix={prefix} spec={spec} />
          ))}
      </div>
      <Kept name={nameIn(prefix, restField)} state={described.state} />
      {specs
        .filter(({ kind }) => kind === 'rows')
        .map((spec) => (
          <DescribedField key={spec.key} {...described} prefix={prefix} spec={spec} />
        ))}
    </>
  );
}

function RemoveButton(props: { readonly row: string; readonly what: string }): VNode {
  return (
    <button type="submit" name="do" value={`remove:${props.row}`} class="quiet">
      {words.remove}
      <span class="unseen"> {props.what}</span>
    </button>
  );
}

function Row(
  props: Described & { readonly row: string; readonly number: number; readonly spec: RowSpec },
): VNode {
  const { row, number, spec, state, lists, opened } = props;
  const texts = spec.heading.map((key) => {
    const field = spec.fields.find((entry) => entry.key === key);
    return field === undefined ? '' : fieldText(field, row, state, lists);
  });
  const [own = '', ...others] = texts;
  const facts = others.filter((text) => text !== '');
  const title = own === '' ? `${spec.noun} ${String(number)}` : own;
  const problem = problemOf(state, row);
  const isWrong =
    problem !== undefined || state.problems.some(({ path }) => path.startsWith(`/${row}.`));
  const isOpen = isWrong || opened === row || opened?.startsWith(`${row}.`) === true;
  const content = (
    <>
      {problem !== undefined && <p class="problem">{problem}</p>}
      <input type="hidden" name={nameIn(row, rowMark)} value="on" />
      <Kept name={nameIn(row, 'id')} state={state} />
      <DescribedFields
        specs={spec.fields}
        prefix={row}
        state={state}
        lists={lists}
        opened={opened}
      />
      <p class="row-end">
        <RemoveButton row={row} what={title} />
      </p>
    </>
  );
  if (spec.flat === true) {
    return (
      <fieldset class="row flat" id={fieldId(row)}>
        <legend class="unseen">{title}</legend>
        {content}
      </fieldset>
    );
  }
  return (
    <details class={isWrong ? 'row row-wrong' : 'row'} id={fieldId(row)} open={isOpen}>
      <summary>
        <span class="row-title">{title}</span>
        {facts.length > 0 && (
          <span class={facts.length > 3 ? 'row-facts long' : 'row-facts'}>
            {facts.map((text, at) => (
              <span key={at}>
                {at > 0 && ' \u00b7 '}
                {text}
              </span>
            ))}
          </span>
        )}
      </summary>
      {content}
    </details>
  );
}

/** A repeated group: its rows, each folded to one line until opened, and a button for another one. */
export function Rows(
  props: Described & {
    readonly list: string;
    readonly spec: RowSpec;
    /** Instead of the plain button, such as a choice from the catalogue. */
    readonly adding?: VNode | undefined;
  },
): VNode {
  const { list, spec, state, lists, opened, adding } = props;
  const numbers = rowNumbersIn(state.values, list);
  const problem = problemOf(state, list);
  const headingId = `${fieldId(list)}-title`;
  const isInner = spec.within === true || /\.\d+\./.test(list);
  return (
    <section class="rows" aria-labelledby={headingId} id={fieldId(list)}>
      {isInner ? <h3 id={headingId}>{spec.title}</h3> : <h2 id={headingId}>{spec.title}</h2>}
      {spec.hint !== undefined && <p class="hint">{spec.hint}</p>}
      {problem !== undefined && <p class="problem">{problem}</p>}
      {numbers.length === 0 && <p class="none">{spec.empty}</p>}
      {numbers.map((number, index) => (
        <Row
          key={number}
          row={nameIn(list, String(number))}
          number={index + 1}
          spec={spec}
          state={state}
          lists={lists}
          opened={opened}
        />
      ))}
      <p class="row-add">
        {adding ?? (
          <button type="submit" name="do" value={`add:${list}`} class="second">
            {words.add} {spec.noun}
          </button>
        )}
      </p>
    </section>
  );
}
