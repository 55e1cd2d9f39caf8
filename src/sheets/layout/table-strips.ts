import type { Column, Table, TableRow, Words } from '../document-tree.js';
import { setLines, textExtent, type SetLine, type Typesetter } from './lines.js';
import { hairline, ink, looks, type TextLook } from './look.js';
import type { Mark, Piece, Strip, StructureNode } from './marks.js';
import { lineMark, textStrips } from './text-strips.js';

const gutter = 7;
const padding = 1.5;
/** Width any word may claim [points]: enough for a figure with its unit. */
const leastClaim = 56;

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
    const longest = Math.max(textExtent(column.title, looks.tableHead, set).word, ...words) + 0.5;
    // One endless word must not starve the other columns: beyond this it is divided.
    return Math.min(longest, Math.max((wanted[index] ?? 0) * 1.3, leastClaim));
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
    const words: Words =
      table.caption === ''
        ? table.empty
        : [{ text: `${table.caption}: `, strong: true }, { text: table.empty }];
    return textStrips(
      words,
      table.caption === '' ? looks.body : looks.note,
      frame,
      paragraph,
      set,
      5,
    );
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
    ...textStrips(table.caption, looks.caption, frame, caption, set, 4).map((strip) => ({
      ...strip,
      keepWithNext: true,
    })),
    table.caption === '' ? { ...head(true), before: 4 } : head(true),
  ];
  const setting = { body, frame, set, repeated: head(false), place, leastHeight: leastRowHeight };
  const groups = rowGroups(table.rows);
  groups.forEach((rows, index) => {
    const last = index === groups.length - 1;
    const under = groupStrips(rows, table.columns.length, setting, last);
    // A short first row keeps the next one too, so that a head never stands almost alone.
    strips.push(
      ...under.map((strip) =>
        index === 0 && !last && under.length === 1 && strip.height < 3 * looks.cell.leading
          ? { ...strip, keepWithNext: true }
          : strip,
      ),
    );
  });
  return strips;
}

/** Each row with those that continue it. */
function rowGroups(rows: readonly TableRow[]): TableRow[][] {
  const groups: TableRow[][] = [];
  for (const row of rows) {
    const open = groups.at(-1);
    if (row.continues === true && open !== undefined) open.push(row);
    else groups.push([row]);
  }
  return groups;
}

interface Setting {
  readonly body: StructureNode;
  readonly frame: Frame;
  readonly set: Typesetter;
  readonly repeated: Strip;
  readonly place: (index: number) => { x: number; width: number; align: 'left' | 'right' };
  readonly leastHeight: number;
}

/** One strip per row under a common first cell; a row longer than a page is divided between lines. */
function groupStrips(
  rows: readonly TableRow[],
  columns: number,
  setting: Setting,
  last: boolean,
): Strip[] {
  const { frame, set, place } = setting;
  const leading = looks.cell.leading;
  const tallest = frame.pageHeight - setting.repeated.height;
  const mostLines = Math.max(1, Math.floor((tallest - 2 * padding) / leading));
  const head: StructureNode = {
    type: 'TH',
    scope: 'Row',
    children: [],
    ...(rows.length > 1 ? { rowSpan: rows.length } : {}),
  };
  const bands: { height: number; pieces: Piece[] }[] = [];
  rows.forEach((row, rowIndex) => {
    const node: StructureNode = { type: 'TR', children: rowIndex === 0 ? [head] : [] };
    setting.body.children.push(node);
    const cells = Array.from({ length: columns - 1 }, (_, offset): Cell => {
      const cell: StructureNode = { type: 'TD', children: [] };
      node.children.push(cell);
      const { x, width, align } = place(offset + 1);
      const lines = setLines(row.cells[offset + 1] ?? '', looks.cell, width, set);
      return { x, width, align, lines, look: looks.cell, node: cell };
    });
    const count = Math.max(1, ...cells.map((cell) => cell.lines.length));
    for (let from = 0; from < count; from += mostLines) {
      const to = Math.min(count, from + mostLines);
      bands.push({
        height: Math.max(setting.leastHeight, (to - from) * leading + 2 * padding),
        pieces: cells.map((cell) => ({
          node: cell.node,
          marks: cellMarks(cell, from, to, padding),
        })),
      });
    }
  });
  addFirstCell(rows[0]?.cells[0] ?? '', head, bands, setting, tallest);
  return bands.map((band, index): Strip => {
    const ends = index === bands.length - 1;
    return {
      height: band.height,
      before: 0,
      keepWithNext: !ends,
      pieces: ends
        ? [...band.pieces, rule(frame, band.height, last ? 0.6 : 0.4, hairline)]
        : band.pieces,
      repeated: setting.repeated,
    };
  });
}

/** The first cell runs down beside all rows of its group; the last row grows when it is longer. */
function addFirstCell(
  words: Words,
  node: StructureNode,
  bands: { height: number; pieces: Piece[] }[],
  setting: Setting,
  tallest: number,
): void {
  const look = looks.cellStrong;
  const { x, width } = setting.place(0);
  const lines = setLines(words, look, width, setting.set);
  let missing =
    lines.length * look.leading + 2 * padding - bands.reduce((sum, band) => sum + band.height, 0);
  while (missing > 0.01) {
    const band = bands.at(-1);
    if (band !== undefined && tallest - band.height > look.leading) {
      const grown = Math.min(missing, tallest - band.height);
      band.height += grown;
      missing -= grown;
    } else {
      bands.push({ height: 0, pieces: [] });
    }
  }
  let top = 0;
  for (const band of bands) {
    const marks = lines.flatMap((line, index) => {
      const y = padding + index * look.leading;
      return y >= top - 0.01 && y < top + band.height - 0.01
        ? [lineMark(line, look, x, y - top)]
        : [];
    });
    if (marks.length > 0) band.pieces.unshift({ node, marks });
    top += band.height;
  }
}
