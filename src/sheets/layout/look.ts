import { accent, hairline, ink, softInk } from '../../web/section/ink.js';
import type { Size } from '../document-tree.js';
import type { Weight } from '../text-runs.js';

/** Paper and ink: every length (points) of a sheet in one place; colours are those of the drawings. */

export { accent, hairline, ink, softInk };
export const markGrey = '#edebe6';

export interface Paper {
  readonly width: number;
  readonly height: number;
  readonly left: number;
  readonly right: number;
  readonly top: number;
  readonly bottom: number;
}

const margins = { left: 40, right: 40, top: 48, bottom: 46 };
export const papers: Record<Size, Paper> = {
  a4: { width: 595.28, height: 841.89, ...margins },
  letter: { width: 612, height: 792, ...margins },
};

export const bodyWidth = (paper: Paper): number => paper.width - paper.left - paper.right;
export const bodyHeight = (paper: Paper): number => paper.height - paper.top - paper.bottom;

export interface TextLook {
  readonly size: number;
  /** Distance from baseline to baseline. */
  readonly leading: number;
  readonly weight: Weight;
  readonly colour: string;
}

export const looks = {
  title: { size: 18, leading: 21.5, weight: 'strong', colour: ink },
  over: { size: 9, leading: 12.5, weight: 'strong', colour: accent },
  heading2: { size: 11.5, leading: 14.5, weight: 'strong', colour: accent },
  heading3: { size: 9, leading: 12, weight: 'strong', colour: ink },
  body: { size: 9, leading: 11.4, weight: 'regular', colour: ink },
  small: { size: 8, leading: 9.7, weight: 'regular', colour: softInk },
  note: { size: 8, leading: 9.7, weight: 'regular', colour: ink },
  label: { size: 8, leading: 10.4, weight: 'strong', colour: softInk },
  caption: { size: 8.4, leading: 11, weight: 'strong', colour: ink },
  cell: { size: 8, leading: 9.6, weight: 'regular', colour: ink },
  cellStrong: { size: 8, leading: 9.6, weight: 'strong', colour: ink },
  tableHead: { size: 8, leading: 9.6, weight: 'strong', colour: softInk },
  decision: { size: 19, leading: 23, weight: 'strong', colour: ink },
  number: { size: 23, leading: 27, weight: 'strong', colour: ink },
  running: { size: 8, leading: 10.6, weight: 'regular', colour: softInk },
} as const satisfies Record<string, TextLook>;

/** Height of the letters above the baseline and below it, as shares of the size. */
const ascent = 0.95;
const descent = 0.29;

/** Distance from the top of a line to its baseline. */
export const baselineIn = (look: TextLook): number =>
  (look.leading - (ascent + descent) * look.size) / 2 + ascent * look.size;
