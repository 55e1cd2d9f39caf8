import type { DocumentTree, Size } from '../document-tree.js';
import { blockStrips } from './block-strips.js';
import { setLines, type SetLine, type Typesetter } from './lines.js';
import { bodyHeight, bodyWidth, hairline, looks, papers, type Paper } from './look.js';
import type { Mark, Page, Piece, StructureNode } from './marks.js';
import { laidPages } from './pages.js';
import { lineMark } from './text-strips.js';

export interface LaidSheet {
  readonly paper: Paper;
  readonly root: StructureNode;
  readonly pages: readonly Page[];
}

/** A sheet decided to the last point: pages of marks and the structure they belong to. */
export function laidSheet(tree: DocumentTree, size: Size, set: Typesetter): LaidSheet {
  const paper = papers[size];
  const frame = { x: paper.left, width: bodyWidth(paper), pageHeight: bodyHeight(paper) };
  const root: StructureNode = { type: 'Document', children: [] };
  const strips = tree.blocks.flatMap((block) => blockStrips(block, frame, root, set));
  const pages = laidPages(strips, { top: paper.top, height: frame.pageHeight });
  return {
    paper,
    root,
    pages: pages.map((page, index) => ({
      pieces: [...page.pieces, runningLines(tree, paper, index + 1, pages.length, set)],
    })),
  };
}

/** The first line of a text that fits, with three dots where it was cut. */
function fittedLine(text: string, width: number, set: Typesetter): SetLine {
  const whole = setLines(text.replaceAll('\n', ' '), looks.running, Infinity, set)[0];
  if (whole === undefined) return { runs: [], width: 0 };
  if (whole.width <= width) return whole;
  const letters = Array.from(text);
  while (letters.length > 1) {
    letters.splice(Math.floor(letters.length * 0.95));
    const cut = setLines(`${letters.join('').trimEnd()}...`, looks.running, Infinity, set)[0];
    if (cut !== undefined && cut.width <= width) return cut;
  }
  return { runs: [], width: 0 };
}

/** Header and footer: outside the structure, since they only repeat what the sheet says. */
function runningLines(
  tree: DocumentTree,
  paper: Paper,
  page: number,
  pages: number,
  set: Typesetter,
): Piece {
  const width = bodyWidth(paper);
  const right = paper.width - paper.right;
  const line = (y: number): Mark => ({
    kind: 'line',
    x1: paper.left,
    y1: y,
    x2: right,
    y2: y,
    thickness: 0.4,
    colour: hairline,
  });
  const pair = (left: string, rightText: string, y: number): Mark[] => {
    const end = fittedLine(rightText, width * 0.45, set);
    const start = fittedLine(left, width - end.width - 16, set);
    return [
      lineMark(start, looks.running, paper.left, y),
      lineMark(end, looks.running, right - end.width, y),
    ];
  };
  const footer = tree.footerRight.replace('{page}', String(page)).replace('{pages}', String(pages));
  const footerTop = paper.height - paper.bottom + 13;
  return {
    node: null,
    running: true,
    marks: [
      ...pair(tree.headerLeft, tree.headerRight, 26),
      line(40),
      line(footerTop - 5),
      ...pair(tree.footerLeft, footer, footerTop),
    ],
  };
}
