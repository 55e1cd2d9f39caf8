import type { DecisionBox, DecisionShape } from '../document-tree.js';
import { setLines, type Typesetter } from './lines.js';
import { ink, looks, softInk } from './look.js';
import type { Mark, Piece, Strip, StructureNode } from './marks.js';
import { lineMarks } from './text-strips.js';

/**
 * A sign for each decision word, told apart by outline alone: an open ring, a ring with a bar to
 * step over, a broken ring, a crossed square.
 */
const shapes: Record<DecisionShape, { readonly data: string; readonly filled: boolean }> = {
  go: { data: 'M9 0A9 9 0 1 1 9 18A9 9 0 1 1 9 0Z', filled: false },
  goWithConditions: {
    data: 'M9 0A9 9 0 1 1 9 18A9 9 0 1 1 9 0Z M4.5 7.2H13.5 M4.5 10.8H13.5',
    filled: false,
  },
  notEnoughKnown: {
    data: 'M7.4 0.2A9 9 0 0 0 0.2 7.4 M0.2 10.6A9 9 0 0 0 7.4 17.8 M10.6 17.8A9 9 0 0 0 17.8 10.6 M17.8 7.4A9 9 0 0 0 10.6 0.2',
    filled: false,
  },
  noGo: { data: 'M0.8 0.8H17.2V17.2H0.8Z M4.6 4.6L13.4 13.4 M13.4 4.6L4.6 13.4', filled: false },
};

const inset = 11;
const frameThickness = 1.6;

/** The ruled box of the decision: the words, the governing number, the reason. */
export function decisionStrips(
  box: DecisionBox,
  at: { readonly x: number; readonly width: number },
  parent: StructureNode,
  set: Typesetter,
): Strip[] {
  const section: StructureNode = { type: 'Sect', children: [] };
  parent.children.push(section);
  const strips: Strip[] = [];
  const inner = { x: at.x + inset, width: at.width - 2 * inset };
  const add = (height: number, pieces: readonly Piece[]): void => {
    strips.push({ height, before: 0, keepWithNext: true, pieces });
  };

  add(inset - 2, []);
  const columnWidth = inner.width / Math.max(1, box.words.length);
  const wordPieces: Piece[] = [];
  let wordsHeight = 0;
  box.words.forEach((entry, index) => {
    const x = inner.x + index * columnWidth;
    const node: StructureNode = { type: 'P', children: [] };
    section.children.push(node);
    const label = setLines(entry.label, looks.label, columnWidth - 12, set);
    const word = setLines(entry.word, looks.decision, columnWidth - 40, set);
    const labelHeight = label.length * looks.label.leading + 2;
    wordPieces.push({
      node,
      marks: [
        ...lineMarks(label, looks.label, x, 0),
        ...lineMarks(word, looks.decision, x + 27, labelHeight),
      ],
    });
    wordPieces.push({
      node: null,
      marks: [
        {
          kind: 'path',
          data: shapes[entry.shape].data,
          x: x + 1,
          y: labelHeight + 3.5,
          fill: null,
          stroke: ink,
          thickness: 1.7,
        },
      ],
    });
    wordsHeight = Math.max(wordsHeight, labelHeight + word.length * looks.decision.leading);
  });
  add(wordsHeight + 6, wordPieces);

  if (box.number !== null) {
    const node: StructureNode = { type: 'P', children: [] };
    section.children.push(node);
    const label = setLines(box.number.label, looks.label, inner.width, set);
    const value = setLines(box.number.value, looks.number, inner.width, set);
    const valueWidth = Math.max(...value.map((line) => line.width), 0);
    const against = setLines(box.number.against, looks.body, inner.width - valueWidth - 14, set);
    const labelHeight = label.length * looks.label.leading;
    const valueHeight = value.length * looks.number.leading;
    const againstHeight = against.length * looks.body.leading;
    // The limit stands beside the number, on its baseline when it is one line.
    const againstTop = labelHeight + Math.max(0, valueHeight - againstHeight - 5);
    add(Math.max(labelHeight + valueHeight, againstTop + againstHeight) + 4, [
      {
        node: null,
        marks: [
          {
            kind: 'line',
            x1: inner.x,
            y1: -1,
            x2: inner.x + inner.width,
            y2: -1,
            thickness: 0.5,
            colour: softInk,
          },
        ],
      },
      {
        node,
        marks: [
          ...lineMarks(label, looks.label, inner.x, 5),
          ...lineMarks(value, looks.number, inner.x, labelHeight + 4),
          ...lineMarks(against, looks.body, inner.x + valueWidth + 14, againstTop + 4),
        ],
      },
    ]);
    add(3, []);
  }

  for (const line of box.lines) {
    const node: StructureNode = { type: 'P', children: [] };
    section.children.push(node);
    for (const set1 of setLines(line, looks.body, inner.width, set)) {
      add(looks.body.leading, [{ node, marks: lineMarks([set1], looks.body, inner.x, 0) }]);
    }
    add(3.5, []);
  }
  add(inset - 6, []);
  return framed(strips, at);
}

/** The strips with a ruled frame around all of them, open where a page ends. */
function framed(
  strips: readonly Strip[],
  at: { readonly x: number; readonly width: number },
): Strip[] {
  const right = at.x + at.width;
  return strips.map((strip, index) => {
    const first = index === 0;
    const last = index === strips.length - 1;
    const edge = (x1: number, y1: number, x2: number, y2: number): Mark => ({
      kind: 'line',
      x1,
      y1,
      x2,
      y2,
      thickness: frameThickness,
      colour: ink,
    });
    const marks = [edge(at.x, 0, at.x, strip.height), edge(right, 0, right, strip.height)];
    const corner = frameThickness / 2;
    if (first) marks.push(edge(at.x - corner, 0, right + corner, 0));
    if (last) marks.push(edge(at.x - corner, strip.height, right + corner, strip.height));
    return {
      ...strip,
      before: first ? 10 : 0,
      keepWithNext: !last,
      pieces: [...strip.pieces, { node: null, marks }],
    };
  });
}
