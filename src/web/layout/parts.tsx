import type { ComponentChildren, VNode } from 'preact';
import type { DecisionWord, Figure } from '../../assessment/assessment.js';
import type { Rounding } from '../../assessment/figure-text.js';
import { quantityText, spanText } from '../../assessment/figure-text.js';
import { en } from '../texts/en.js';

/** The decision: a plain word in a ruled box. The rule's shape differs by word, not its colour only. */
export function DecisionBox(props: {
  readonly word: DecisionWord;
  readonly reason?: string | undefined;
  readonly label?: string | undefined;
}): VNode {
  return (
    <section class={`decision decision-${props.word}`} aria-label={props.label ?? 'Decision'}>
      {props.label !== undefined && <p class="decision-label">{props.label}</p>}
      <p class="decision-word">{en.decisions[props.word]}</p>
      {props.reason !== undefined && <p class="decision-reason">{props.reason}</p>}
    </section>
  );
}

/** A figure that can be opened: formula, method, inputs, source and range of validity. */
export function OpenableFigure(props: {
  readonly figure: Figure;
  readonly label?: string | undefined;
  readonly rounding?: Rounding | undefined;
}): VNode {
  const { figure, label, rounding } = props;
  const span = spanText(figure);
  const words = en.figure;
  return (
    <details class="figure">
      <summary>
        {label !== undefined && <span class="figure-label">{label} </span>}
        <strong>{quantityText(figure.value, figure.unit, rounding)}</strong>
        {span !== undefined && <span class="figure-span"> ({span})</span>}
        <span class="unseen"> {words.explain}</span>
      </summary>
      <dl>
        <dt>{words.formula}</dt>
        <dd class="formula">{figure.formula}</dd>
        <dt>{words.method}</dt>
        <dd>{figure.method}</dd>
        {figure.inputs.length > 0 && (
          <>
            <dt>{words.inputs}</dt>
            <dd>
              <ul>
                {figure.inputs.map((input) => (
                  <li key={input.name}>
                    {input.name}: {String(input.value)} {input.unit}
                    {input.origin !== undefined && ` (${en.origins[input.origin].toLowerCase()})`}
                  </li>
                ))}
              </ul>
            </dd>
          </>
        )}
        <dt>{words.source}</dt>
        <dd>{figure.source}</dd>
        <dt>{words.range}</dt>
        <dd>{figure.range}</dd>
      </dl>
    </details>
  );
}

/**
 * A table whose rows become blocks of labelled values on a narrow screen. The roles keep it a table
 * for who listens to it; where it is still too wide it scrolls in its own frame, by keyboard too.
 */
export function Table(props: {
  readonly caption: string;
  readonly columns: readonly string[];
  readonly rows: readonly (readonly ComponentChildren[])[];
  /** Whether the first cell of each row names it. */
  readonly rowHeads?: boolean | undefined;
  /** Said instead of an empty table. */
  readonly empty?: string | undefined;
}): VNode {
  if (props.rows.length === 0 && props.empty !== undefined) return <p>{props.empty}</p>;
  return (
    <div class="table-frame" role="region" aria-label={props.caption} tabIndex={0}>
      <table class="stacks" role="table">
        <caption>{props.caption}</caption>
        <thead role="rowgroup">
          <tr role="row">
            {props.columns.map((column) => (
              <th key={column} scope="col" role="columnheader">
                {column}
              </th>
            ))}
          </tr>
        </thead>
        <tbody role="rowgroup">
          {props.rows.map((cells, row) => (
            <tr key={row} role="row">
              {cells.map((cell, column) =>
                column === 0 && props.rowHeads === true ? (
                  <th key={column} scope="row" role="rowheader">
                    {cell}
                  </th>
                ) : (
                  <td key={column} role="cell" data-label={props.columns[column]}>
                    {cell}
                  </td>
                ),
              )}
            </tr>
          ))}
        </tbody>
      </table>
    </div>
  );
}
