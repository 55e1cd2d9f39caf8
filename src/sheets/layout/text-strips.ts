import type { Words } from '../document-tree.js';
import { baselineIn, type TextLook } from './look.js';
import { setLines, type SetLine, type Typesetter } from './lines.js';
import type { Mark, Strip, StructureNode } from './marks.js';

/** The mark of one line whose top left corner is at x, y. */
export function lineMark(
  line: SetLine,
  look: TextLook,
  x: number,
  y: number,
  colour: string = look.colour,
): Mark {
  return {
    kind: 'text',
    baseline: y + baselineIn(look),
    runs: line.runs.map((run) => ({ ...run, x: run.x + x })),
    colour,
  };
}

/** The marks of lines under each other. */
export function lineMarks(lines: readonly SetLine[], look: TextLook, x: number, y: number): Mark[] {
  return lines.map((line, index) => lineMark(line, look, x, y + index * look.leading));
}

/** A text as strips of one line each, never leaving a single line alone on a page. */
export function textStrips(
  words: Words,
  look: TextLook,
  at: { readonly x: number; readonly width: number },
  node: StructureNode,
  set: Typesetter,
  before: number,
): Strip[] {
  const lines = setLines(words, look, at.width, set);
  return lines.map((line, index) => ({
    height: look.leading,
    before: index === 0 ? before : 0,
    keepWithNext: index < lines.length - 1 && (index === 0 || index === lines.length - 2),
    pieces: [{ node, marks: [lineMark(line, look, at.x, 0)] }],
  }));
}
