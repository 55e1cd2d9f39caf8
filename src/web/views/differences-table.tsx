import type { VNode } from 'preact';
import { Table } from '../layout/parts.js';
import type { Difference } from './form-differences.js';

/** Somebody else saved first: both versions side by side, and the two ways out. */
export function Differences(props: {
  readonly differences: readonly Difference[];
  readonly words: {
    readonly title: string;
    readonly intro: string;
    readonly field: string;
    readonly theirs: string;
    readonly yours: string;
    readonly same: string;
    readonly takeTheirs: string;
  };
  readonly openSaved: string;
}): VNode {
  const { differences, words, openSaved } = props;
  const shown = (text: string) => (text === '' ? '\u2013' : text);
  return (
    <section class="conflict error-summary" role="alert" aria-labelledby="conflict-title">
      <h2 id="conflict-title">{words.title}</h2>
      <p>{words.intro}</p>
      <Table
        caption={words.field}
        columns={[words.field, words.theirs, words.yours]}
        rows={differences.map(({ where, theirs, yours }) => [where, shown(theirs), shown(yours)])}
        rowHeads
        empty={words.same}
      />
      <p>
        <a href={openSaved}>{words.takeTheirs}</a>
      </p>
    </section>
  );
}
