import type {
  Block,
  BulletList,
  Facts,
  FigureBlock,
  Heading,
  NumberedList,
  SignOff,
} from '../document-tree.js';
import { decisionStrips } from './decision-strips.js';
import { setLines, type Typesetter } from './lines.js';
import { accent, baselineIn, looks } from './look.js';
import type { Mark, Piece, Strip, StructureNode } from './marks.js';
import { tableStrips } from './table-strips.js';
import { lineMark, lineMarks, textStrips } from './text-strips.js';

export interface Frame {
  readonly x: number;
  readonly width: number;
  readonly pageHeight: number;
}

const node = (type: string, more: Partial<StructureNode> = {}): StructureNode => ({
  type,
  children: [],
  ...more,
});

/** The strips of one block; its structure elements are added to the parent in reading order. */
export function blockStrips(
  block: Block,
  frame: Frame,
  parent: StructureNode,
  set: Typesetter,
): Strip[] {
  switch (block.kind) {
    case 'heading':
      return headingStrips(block, frame, parent, set);
    case 'paragraph': {
      const paragraph = node('P');
      parent.children.push(paragraph);
      const strips = textStrips(block.words, looks[block.look], frame, paragraph, set, 2.5);
      return block.keepWithNext === true
        ? strips.map((strip) => ({ ...strip, keepWithNext: true }))
        : strips;
    }
    case 'facts':
      return factStrips(block, frame, parent, set);
    case 'decision':
      return decisionStrips(block, frame, parent, set);
    case 'table':
      return tableStrips(block, frame, parent, set);
    case 'list':
      return bulletStrips(block, frame, parent, set);
    case 'numbered':
      return numberedStrips(block, frame, parent, set);
    case 'figure':
      return figureStrips(block, frame, parent, set);
    case 'signOff':
      return signOffStrips(block, frame, parent, set);
  }
}

function headingStrips(
  heading: Heading,
  frame: Frame,
  parent: StructureNode,
  set: Typesetter,
): Strip[] {
  const strips: Strip[] = [];
  if (heading.over !== undefined) {
    const over = node('P');
    parent.children.push(over);
    strips.push(...textStrips(heading.over, looks.over, frame, over, set, 0));
  }
  const text = heading.number === undefined ? heading.words : `${heading.number}  ${heading.words}`;
  const element = node(`H${String(heading.level)}`, heading.level < 3 ? { bookmark: text } : {});
  parent.children.push(element);
  const look =
    heading.level === 1 ? looks.title : heading.level === 2 ? looks.heading2 : looks.heading3;
  if (heading.level !== 2) {
    const before = heading.level === 1 ? 0 : 5;
    strips.push(...textStrips(heading.words, look, frame, element, set, before));
  } else {
    // A rule across the page opens each numbered part; its number hangs before the title.
    const hang = 24;
    const numbered = heading.number !== undefined;
    const x = numbered ? frame.x + hang : frame.x;
    const lines = setLines(heading.words, look, frame.width - hang, set);
    const marks: Mark[] = lineMarks(lines, look, x, 3);
    if (numbered) {
      marks.unshift(
        ...setLines(heading.number, look, frame.width, set).map((line) =>
          lineMark(line, look, frame.x, 3),
        ),
      );
    }
    strips.push({
      height: lines.length * look.leading + 4,
      before: 8,
      keepWithNext: true,
      pieces: [
        {
          node: null,
          marks: [
            {
              kind: 'line',
              x1: frame.x,
              y1: 0,
              x2: frame.x + frame.width,
              y2: 0,
              thickness: 1.1,
              colour: accent,
            },
          ],
        },
        { node: element, marks },
      ],
    });
  }
  return strips.map((strip) => ({ ...strip, keepWithNext: true }));
}

function factStrips(facts: Facts, frame: Frame, parent: StructureNode, set: Typesetter): Strip[] {
  const list = node('L');
  parent.children.push(list);
  const gap = 18;
  const widths = [(frame.width - gap) * 0.58, (frame.width - gap) * 0.42];
  const labelWidth = 84;
  const strips: Strip[] = [];
  for (let index = 0; index < facts.pairs.length; index += 2) {
    let height = 0;
    const pieces = facts.pairs.slice(index, index + 2).flatMap((pair, column) => {
      const width = widths[column] ?? 0;
      const x = column === 0 ? frame.x : frame.x + (widths[0] ?? 0) + gap;
      const item = node('LI');
      const label = node('Lbl');
      const body = node('LBody');
      item.children.push(label, body);
      list.children.push(item);
      const labelLines = setLines(pair.label, looks.label, labelWidth - 6, set);
      const bodyLines = setLines(pair.words, looks.cell, width - labelWidth, set);
      height = Math.max(
        height,
        labelLines.length * looks.label.leading,
        bodyLines.length * looks.cell.leading,
      );
      const drop = baselineIn(looks.cell) - baselineIn(looks.label);
      return [
        { node: label, marks: lineMarks(labelLines, looks.label, x, drop) },
        { node: body, marks: lineMarks(bodyLines, looks.cell, x + labelWidth, 0) },
      ];
    });
    strips.push({ height: height + 1.6, before: index === 0 ? 5 : 0, keepWithNext: true, pieces });
  }
  return strips;
}

function bulletStrips(
  list: BulletList,
  frame: Frame,
  parent: StructureNode,
  set: Typesetter,
): Strip[] {
  if (list.items.length === 0) return emptyStrips(list.empty, frame, parent, set);
  const element = node('L');
  parent.children.push(element);
  const indent = 13;
  const strips = list.items.flatMap((words) => {
    const item = node('LI');
    const body = node('LBody');
    item.children.push(body);
    element.children.push(item);
    const at = { x: frame.x + indent, width: frame.width - indent };
    const strips = textStrips(words, looks[list.look ?? 'body'], at, body, set, 2);
    const middle = baselineIn(looks[list.look ?? 'body']) - 2.8;
    return strips.map((strip, index) =>
      index > 0
        ? strip
        : {
            ...strip,
            pieces: [
              {
                node: null,
                marks: [
                  {
                    kind: 'line' as const,
                    x1: frame.x,
                    y1: middle,
                    x2: frame.x + 7,
                    y2: middle,
                    thickness: 1,
                    colour: accent,
                  },
                ],
              },
              ...strip.pieces,
            ],
          },
    );
  });
  if (list.together !== true) return strips;
  return strips.map((strip, index) => ({ ...strip, keepWithNext: index < strips.length - 1 }));
}

/** Tallest run of entries side by side in two columns [pt]: a page may end between two runs. */
const tallestRun = 84;

/** Numbered entries in one column, or in two that are read down, run by run. */
function numberedStrips(
  list: NumberedList,
  frame: Frame,
  parent: StructureNode,
  set: Typesetter,
): Strip[] {
  if (list.items.length === 0) return emptyStrips(list.empty, frame, parent, set);
  const element = node('L');
  parent.children.push(element);
  const { columns } = list;
  const gap = 16;
  const width = (frame.width - gap * (columns - 1)) / columns;
  const indent = 18;
  const look = columns === 1 ? looks.body : looks.note;
  const entries = list.items.map((entry) => {
    const item = node('LI');
    const label = node('Lbl');
    const body = node('LBody');
    item.children.push(label, body);
    element.children.push(item);
    const numberLook = { ...look, weight: 'strong' as const };
    const numbers = setLines(entry.number, numberLook, indent, set);
    const lines = setLines(entry.words, look, width - indent, set);
    const detail = setLines(entry.detail, looks.small, width - indent, set);
    return {
      height: lines.length * look.leading + detail.length * looks.small.leading,
      piecesAt: (x: number, y: number): Piece[] => [
        { node: label, marks: lineMarks(numbers, numberLook, x, y) },
        {
          node: body,
          marks: [
            ...lineMarks(lines, look, x + indent, y),
            ...lineMarks(detail, looks.small, x + indent, y + lines.length * look.leading),
          ],
        },
      ],
    };
  });
  if (columns === 1) {
    return entries.map(({ height, piecesAt }) => ({
      height,
      before: 2.5,
      keepWithNext: false,
      pieces: piecesAt(frame.x, 0),
    }));
  }
  return columnRuns(entries).map((run) => {
    const halves = evenHalves(run);
    return {
      height: Math.max(...halves.map(heightOf)),
      before: between,
      keepWithNext: false,
      pieces: halves.flatMap((half, column) =>
        half.flatMap((entry, index) =>
          entry.piecesAt(
            frame.x + column * (width + gap),
            index === 0 ? 0 : heightOf(half.slice(0, index)) + between,
          ),
        ),
      ),
    };
  });
}

const between = 1.4;

interface Entry {
  readonly height: number;
  piecesAt(x: number, y: number): Piece[];
}

/** Height of entries under each other. */
const heightOf = (entries: readonly Entry[]): number =>
  entries.reduce((sum, entry) => sum + entry.height, 0) + between * Math.max(0, entries.length - 1);

/** Entries in runs that fill two columns of the height of a run, or of one tall entry. */
function columnRuns(entries: readonly Entry[]): Entry[][] {
  const runs: Entry[][] = [];
  for (const entry of entries) {
    const open = runs.at(-1);
    if (open !== undefined && heightOf([...open, entry]) <= 2 * tallestRun) open.push(entry);
    else runs.push([entry]);
  }
  return runs;
}

/** A run cut in two where the taller half is lowest. */
function evenHalves(run: readonly Entry[]): [readonly Entry[], readonly Entry[]] {
  const cuts = Array.from({ length: run.length }, (_, index) => index + 1);
  const taller = (cut: number): number =>
    Math.max(heightOf(run.slice(0, cut)), heightOf(run.slice(cut)));
  const best = cuts.reduce((one, other) => (taller(other) < taller(one) ? other : one), 1);
  return [run.slice(0, best), run.slice(best)];
}

function emptyStrips(words: string, frame: Frame, parent: StructureNode, set: Typesetter): Strip[] {
  const paragraph = node('P');
  parent.children.push(paragraph);
  return textStrips(words, looks.note, frame, paragraph, set, 3);
}

function figureStrips(
  figure: FigureBlock,
  frame: Frame,
  parent: StructureNode,
  set: Typesetter,
): Strip[] {
  const element = node('Figure', { alt: figure.alt });
  const caption = node('P');
  parent.children.push(element, caption);
  const height = Math.min(frame.width / figure.aspect, frame.pageHeight * figure.tallest);
  const width = height * figure.aspect;
  const captionStrips = textStrips(figure.caption, looks.small, frame, caption, set, 2);
  return [
    {
      height,
      before: 5,
      keepWithNext: captionStrips.length > 0,
      pieces: [
        {
          node: element,
          marks: [{ kind: 'picture', svg: figure.svg, x: frame.x, y: 0, width, height }],
        },
      ],
    },
    ...captionStrips,
  ];
}

function signOffStrips(
  signOff: SignOff,
  frame: Frame,
  parent: StructureNode,
  set: Typesetter,
): Strip[] {
  const { labels } = signOff;
  const strips = tableStrips(
    {
      kind: 'table',
      caption: signOff.title,
      columns: [
        { title: labels.act, share: 2.3, align: 'left' },
        { title: labels.role, share: 2.2, align: 'left' },
        { title: labels.name, share: 2.6, align: 'left' },
        { title: labels.date, share: 1.5, align: 'left' },
        { title: labels.signature, share: 3, align: 'left' },
      ],
      rows: signOff.rows.map((row) => ({ cells: [row.act, row.role, row.name, row.date, ''] })),
      empty: '',
    },
    frame,
    parent,
    set,
    21,
  );
  // The whole block is signed at once: it never spans two pages.
  return strips.map((strip, index) => ({ ...strip, keepWithNext: index < strips.length - 1 }));
}
