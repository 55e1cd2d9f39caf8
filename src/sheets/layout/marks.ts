/**
 * What a page is drawn from: marks in points, y downwards, each belonging to one element of the
 * structure or, with `node: null`, to nothing a reader needs (rules, running lines).
 */

/** An element of the structure tree; `type` is a standard structure type of PDF 1.7. */
export interface StructureNode {
  readonly type: string;
  readonly alt?: string;
  readonly scope?: 'Column' | 'Row';
  /** Rows of a table that a row header stands for, when more than one. */
  readonly rowSpan?: number;
  /** Title of a bookmark that leads here. */
  readonly bookmark?: string;
  readonly children: StructureNode[];
}

export interface PlacedRun {
  readonly x: number;
  readonly text: string;
  readonly font: string;
  readonly size: number;
  /** Points below the baseline. */
  readonly drop: number;
}

export type Mark =
  | {
      readonly kind: 'text';
      readonly baseline: number;
      readonly runs: readonly PlacedRun[];
      readonly colour: string;
    }
  | {
      readonly kind: 'line';
      readonly x1: number;
      readonly y1: number;
      readonly x2: number;
      readonly y2: number;
      readonly thickness: number;
      readonly colour: string;
    }
  | {
      readonly kind: 'path';
      /** SVG path data relative to x, y. */
      readonly data: string;
      readonly x: number;
      readonly y: number;
      readonly fill: string | null;
      readonly stroke: string | null;
      readonly thickness: number;
    }
  | {
      readonly kind: 'picture';
      readonly svg: string;
      readonly x: number;
      readonly y: number;
      readonly width: number;
      readonly height: number;
    };

export interface Piece {
  readonly node: StructureNode | null;
  readonly marks: readonly Mark[];
  /** A running header or footer. */
  readonly running?: true;
}

/** A horizontal band that is never divided; a block is a stack of them. */
export interface Strip {
  readonly height: number;
  /** Space above, dropped at the top of a page. */
  readonly before: number;
  readonly keepWithNext: boolean;
  /** y runs from the top of the strip. */
  readonly pieces: readonly Piece[];
  /** Drawn first when this strip starts a page: the head of a divided table. */
  readonly repeated?: Strip;
}

export interface Page {
  readonly pieces: readonly Piece[];
}

/** The mark moved down and right. */
export function movedMark(mark: Mark, dx: number, dy: number): Mark {
  switch (mark.kind) {
    case 'text':
      return {
        ...mark,
        baseline: mark.baseline + dy,
        runs: dx === 0 ? mark.runs : mark.runs.map((run) => ({ ...run, x: run.x + dx })),
      };
    case 'line':
      return { ...mark, x1: mark.x1 + dx, x2: mark.x2 + dx, y1: mark.y1 + dy, y2: mark.y2 + dy };
    case 'path':
    case 'picture':
      return { ...mark, x: mark.x + dx, y: mark.y + dy };
  }
}
