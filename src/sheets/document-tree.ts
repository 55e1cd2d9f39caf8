/**
 * A sheet before it has pages: what is said, in order, with its meaning and without its look.
 * The PDF and a web preview are drawn from the same tree; tests read it without either.
 */

/** A piece of a line with one weight. Subscripts of gas formulas are found when it is drawn. */
export interface Span {
  readonly text: string;
  readonly strong?: true;
}

/** Plain text, or spans where the weight changes. A line feed starts a new line. */
export type Words = string | readonly Span[];

export type Size = 'a4' | 'letter';
export type SheetStatus = 'draft' | 'approved' | 'superseded';

export interface DocumentTree {
  readonly title: string;
  /** BCP 47, such as `en`. */
  readonly lang: string;
  readonly revision: string;
  readonly status: SheetStatus;
  /** The word laid across every page that is not approved; null on an approved sheet. */
  readonly mark: string | null;
  /** Kind of sheet, in the running header. */
  readonly sheetName: string;
  readonly subject: string;
  readonly keywords: string;
  readonly headerLeft: string;
  readonly headerRight: string;
  readonly footerLeft: string;
  /** With `{page}` and `{pages}`. */
  readonly footerRight: string;
  readonly blocks: readonly Block[];
}

export type Block =
  | Heading
  | Paragraph
  | Facts
  | DecisionBox
  | Table
  | BulletList
  | NumberedList
  | FigureBlock
  | SignOff;

export interface Heading {
  readonly kind: 'heading';
  readonly level: 1 | 2 | 3;
  readonly words: string;
  /** Small line above a level 1 heading. */
  readonly over?: string;
  readonly number?: string;
}

export interface Paragraph {
  readonly kind: 'paragraph';
  readonly words: Words;
  readonly look: 'body' | 'small' | 'note';
  readonly keepWithNext?: true;
}

/** Pairs of a label and what it says, set in columns. */
export interface Facts {
  readonly kind: 'facts';
  readonly title: string;
  readonly pairs: readonly { readonly label: string; readonly words: Words }[];
}

/** Shapes stand beside the decision word, so that no reader depends on colour. */
export type DecisionShape = 'go' | 'goWithConditions' | 'notEnoughKnown' | 'noGo';

export interface DecisionBox {
  readonly kind: 'decision';
  readonly words: readonly {
    readonly label: string;
    readonly word: string;
    readonly shape: DecisionShape;
  }[];
  /** The governing number and its limit, large; null when nothing governs. */
  readonly number: {
    readonly label: string;
    readonly value: string;
    readonly against: string;
  } | null;
  readonly lines: readonly Words[];
}

export type Align = 'left' | 'right';

export interface Column {
  readonly title: string;
  /** Share of the width against its neighbours. */
  readonly share: number;
  readonly align: Align;
}

export interface TableRow {
  readonly cells: readonly Words[];
  /** Belongs to the row above: its first cell is not read, the one above spans it. */
  readonly continues?: true;
}

export interface Table {
  readonly kind: 'table';
  /** Spoken summary and visible caption. */
  readonly caption: string;
  readonly columns: readonly Column[];
  readonly rows: readonly TableRow[];
  /** Said instead of the table when it has no rows. */
  readonly empty: string;
}

export interface BulletList {
  readonly kind: 'list';
  readonly items: readonly Words[];
  readonly empty: string;
  readonly look?: 'body' | 'note';
  /** Never divided between two pages. */
  readonly together?: true;
}

export interface NumberedList {
  readonly kind: 'numbered';
  /** Two columns are set in smaller type. */
  readonly columns: 1 | 2;
  readonly items: readonly {
    readonly number: string;
    readonly words: Words;
    readonly detail: string;
  }[];
  readonly empty: string;
}

export interface FigureBlock {
  readonly kind: 'figure';
  readonly svg: string;
  /** Says what the picture shows, numbers included. */
  readonly alt: string;
  readonly caption: string;
  /** Width to height of the picture. */
  readonly aspect: number;
  /** Greatest height, as a share of the page. */
  readonly tallest: number;
}

export interface SignOff {
  readonly kind: 'signOff';
  readonly title: string;
  readonly labels: {
    readonly act: string;
    readonly role: string;
    readonly name: string;
    readonly date: string;
    readonly signature: string;
  };
  readonly rows: readonly {
    readonly act: string;
    readonly role: string;
    readonly name: string;
    readonly date: string;
  }[];
}
