import type { Range } from '../../science/range.js';
import type { ShownUnit } from '../forms/typed-number.js';

/**
 * A form described as data. From one description come the page, the texts that fill it in again, and
 * the value that was typed, so the three cannot disagree. A field is named like its place in the
 * plan file: `/spaces/0/heightM` is the field `spaces.0.heightM`.
 */

export interface Option {
  readonly value: string;
  readonly label: string;
}

interface Named {
  /** Key in the record; dots lead into objects inside it. */
  readonly key: string;
  readonly label: string;
  readonly hint?: string;
  readonly required?: boolean;
}

/** Lists that depend on the rest of the form or on the catalogue, by name. */
export type ChoiceLists = Readonly<Record<string, readonly Option[]>>;

export type FieldSpec =
  | (Named & { readonly kind: 'text' | 'longText' | 'date' | 'clock' })
  /** Seconds after midnight, shown as hh:mm. */
  | (Named & { readonly kind: 'dayTime' })
  | (Named & {
      readonly kind: 'number';
      readonly unit: ShownUnit;
      readonly min?: number;
      readonly max?: number;
      readonly whole?: boolean;
    })
  | (Named & { readonly kind: 'figure'; readonly unit: ShownUnit; readonly range?: Range })
  /** One figure under one of several keys, told apart by its unit. */
  | (Named & { readonly kind: 'amount'; readonly units: readonly AmountUnit[] })
  | (Named & {
      readonly kind: 'choice';
      readonly options: readonly Option[] | string;
      /** Label of the empty choice; none: the first option is the preset. */
      readonly blank?: string;
    })
  | (Named & { readonly kind: 'check' })
  /** True, false, or not stated: for questions where silence does not mean no. */
  | (Named & {
      readonly kind: 'yesNo';
      readonly yes: string;
      readonly no: string;
      readonly blank: string;
    })
  | { readonly kind: 'kept'; readonly key: string }
  | { readonly kind: 'rows'; readonly key: string; readonly rows: RowSpec };

export interface AmountUnit {
  readonly key: string;
  readonly unit: ShownUnit;
  readonly label: string;
  readonly range?: Range;
}

/** A repeated group: each row is one object of a list. */
export interface RowSpec {
  readonly title: string;
  /** What one row is called, for its heading and buttons. */
  readonly noun: string;
  readonly hint?: string;
  /** Said while there is no row. */
  readonly empty: string;
  readonly fields: readonly FieldSpec[];
  /** Rows that are named elsewhere get a short id of this letter and a number. */
  readonly idPrefix?: string;
  /** Texts of a fresh row. */
  readonly preset?: Readonly<Record<string, string>>;
  /** Keys whose texts stand in the heading of a row; the first one names it. */
  readonly heading: readonly string[];
  /** Stands within a section that has a heading of its own. */
  readonly within?: boolean;
  /** Rows are short enough to stay open. */
  readonly flat?: boolean;
}

/** Everything the description does not show travels along in this hidden field, as JSON. */
export const restField = 'rest';

/** Hidden in each row, so that a row left blank is not lost on the way. */
export const rowMark = 'row';

export const nameIn = (prefix: string, key: string): string =>
  prefix === '' ? key : `${prefix}.${key}`;
