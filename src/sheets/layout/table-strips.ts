import type { Column, Table, TableRow, Words } from '../document-tree.js';
import { setLines, textExtent, type SetLine, type Typesetter } from './lines.js';
import { hairline, ink, looks, type TextLook } from './look.js';
import type { Mark, Piece, Strip, StructureNode } from './marks.js';
import { lineMark, textStrips } from './text-strips.js';

const gutter = 9;
const padding = 3.6;

interface Frame {
  readonly x: number;
  readonly width: number;
  /** Height of a whole page, for rows that are longer than one. */
  readonly pageHeight: number;
}

/**
 * Widths of the columns [points]: their shares of the room, each at least as wide as its longest
 * word while the room allows.
 */
export function columnWidths(
  columns: readonly Column[],
  rows: readonly TableRow[],
  room: number,
  set: Typesetter,
): number[] {
  const total = columns.reduce((sum, column) => sum + column.share, 0);
  const wanted = columns.map((column) => (column.share / total) * room);
  const least = columns.map((column, index) => {
    const look = index === 0 ? looks.cellStrong : looks.cell;
    const words = rows.map((row) => textExtent(row.cells[index] ?? '', look, set).word);
    return Math.max(textExtent(column.title, looks.tableHead, set).word, ...words) + 0.5;
  });
  const widths = wanted.map((width, index) => Math.max(width, least[index] ?? 0));
  // What the wide words took is given back by the columns that have room to spare.
  const excess = widths.reduce((sum, width) => sum + width, 0) - room;
  const spare = widths.map((width, index) => Math.max(0, width - (least[index] ?? 0)));
  const allSpare = spare.reduce((sum, width) => sum + width, 0);
  if (excess > 0 && allSpare > 0) {
    const given = Math.min(excess, allSpare) / allSpare;
    spare.forEach((width, index) => {
      widths[index] = (widths[index] ?? 0) - given * width;
    });
  }
  const sum = widths.reduce((all, width) => all + width, 0);
  return sum > room + 0.01 ? widths.map((width) => (width * room) / sum) : widths;
}

interface Cell {
  readonly lines: readonly SetLine[];
  readonly look: TextLook;
  readonly x: number;
  readonly width: number;
  readonly align: 'left' | 'right';
  readonly node: StructureNode | null;
}

function cellMarks(cell: Cell, from: number, to: number, y: number): Mark[] {
  return cell.lines.slice(from, to).map((line, index) => {
    const indent = cell.align === 'right' ? cell.width - line.width : 0;
    return lineMark(line, cell.look, cell.x + indent, y + index * cell.look.leading);
  });
}

const rule = (frame: Frame, y: number, thickness: number, colour: string): Piece => ({
  node: null,
  marks: [
    { kind: 'line', x1: frame.x, y1: y, x2: frame.x + frame.width, y2: y, thickness, colour },
  ],
});

/** The strips of a table: caption, head, rows; the head is repeated on every page it reaches. */
export function tableStrips(
  table: Table,
  frame: Frame,
  parent: StructureNode,
  set: Typesetter,
  leastRowHeight = 0,
): Strip[] {
  const caption: StructureNode = { type: 'Caption', children: [] };
  const node: StructureNode = { type: 'Table', children: [] };
  if (table.rows.length === 0) {
    const paragraph: StructureNode = { type: 'P', children: [] };
    parent.children.push(paragraph);
    const words = [{ text: `${table.caption}: `, strong: true as const }, { text: table.empty }];
    return textStrips(words, looks.note, frame, paragraph, set, 5);
  }
  parent.children.push(node);
  if (table.caption !== '') node.children.push(caption);
  const room = frame.width - gutter * (table.columns.length - 1);
  const widths = columnWidths(table.columns, table.rows, room, set);
  const lefts = widths.map(
    (_, index) => frame.x + widths.slice(0, index).reduce((sum, width) => sum + width + gutter, 0),
  );
  const place = (index: number): { x: number; width: number; align: 'left' | 'right' } => ({
    x: lefts[index] ?? frame.x,
    width: widths[index] ?? 0,
    align: table.columns[index]?.align ?? 'left',
  });

  const headRow: StructureNode = { type: 'TR', children: [] };
  node.children.push({ type: 'THead', children: [headRow] });
  const body: StructureNode = { type: 'TBody', children: [] };
  node.children.push(body);
  const heads = table.columns.map((column, index): Cell => {
    const cell: StructureNode = { type: 'TH', scope: 'Column', children: [] };
    headRow.children.push(cell);
    return {
      ...place(index),
      look: looks.tableHead,
      lines: setLines(column.title, looks.tableHead, place(index).width, set),
      node: cell,
    };
  });
  const headLines = Math.max(...heads.map((cell) => cell.lines.length));
  const headHeight = headLines * looks.tableHead.leading + 2 * padding;
  const head = (tagged: boolean): Strip => ({
    height: headHeight,
    before: 0,
    keepWithNext: true,
    pieces: [
      ...heads.map((cell): Piece => ({
        node: tagged ? cell.node : null,
        // Heads of different length stand on the rule together.
        marks: cellMarks(
          cell,
          0,
          cell.lines.length,
          padding + (headLines - cell.lines.length) * looks.tableHead.leading,
        ),
      })),
      rule(frame, headHeight, 0.9, ink),
    ],
  });

  const strips: Strip[] = [
    ...textStrips(table.caption, looks.caption, frame, caption, set, 7).map((strip) => ({
      ...strip,
      keepWithNext: true,
    })),
    table.caption === '' ? { ...head(true), before: 4 } : head(true),
  ];
  const repeated = head(false);
  table.rows.forEach((row, rowIndex) => {
    const next = table.rows[rowIndex + 1];
    strips.push(
      ...rowStrips(row, rowIndex, {
        body,
        frame,
        set,
        repeated,
        place,
        columns: table.columns.length,
        leastHeight: leastRowHeight,
        ruled: next?.continues !== true,
        last: next === undefined,
      }),
    );
  });
  return strips;
}

interface RowSetting {
  readonly body: StructureNode;
  readonly frame: Frame;
  readonly set: Typesetter;
  readonly repeated: Strip;
  readonly place: (index: number) => { x: number; width: number; align: 'left' | 'right' };
  readonly columns: number;
  readonly leastHeight: number;
  readonly ruled: boolean;
  readonly last: boolean;
}

/** One strip per row; a row longer than a page is divided between lines. */
function rowStrips(row: TableRow, rowIndex: number, setting: RowSetting): Strip[] {
  const { frame, set, repeated, place } = setting;
  const rowNode: StructureNode = { type: 'TR', children: [] };
  setting.body.children.push(rowNode);
  const cells = Array.from({ length: setting.columns }, (_, index): Cell => {
    const node: StructureNode =
      index === 0 ? { type: 'TH', scope: 'Row', children: [] } : { type: 'TD', children: [] };
    rowNode.children.push(node);
    const words: Words = row.cells[index] ?? '';
    const look = index === 0 ? looks.cellStrong : looks.cell;
    return { ...place(index), look, lines: setLines(words, look, place(index).width, set), node };
  });
  const count = Math.max(1, ...cells.map((cell) => cell.lines.length));
  const leading = looks.cell.leading;
  const mostLines = Math.max(
    1,
    Math.floor((frame.pageHeight - repeated.height - 2 * padding) / leading),
  );
  const strips: Strip[] = [];
  for (let from = 0; from < count; from += mostLines) {
    const to = Math.min(count, from + mostLines);
    const height = Math.max(setting.leastHeight, (to - from) * leading + 2 * padding);
    const ends = to === count;
    const pieces: Piece[] = cells.map((cell) => ({
      node: cell.node,
      marks: cellMarks(cell, from, to, padding),
    }));
    if (setting.ruled || !ends) {
      pieces.push(rule(frame, height, setting.last && ends ? 0.6 : 0.4, hairline));
    }
    // The first two rows stay with the head, so that a head never stands alone.
    strips.push({
      height,
      before: 0,
      keepWithNext: (rowIndex === 0 && !setting.last && ends) || !(setting.ruled || !ends),
      pieces,
      repeated,
    });
  }
  return strips;
}
