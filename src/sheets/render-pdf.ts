import PDFDocument from 'pdfkit';
import svgToPdf from 'svg-to-pdfkit';
import { NotComputable } from '../errors.js';
import type { DocumentTree, Size } from './document-tree.js';
import type { Typesetter } from './layout/lines.js';
import { markGrey, type Paper } from './layout/look.js';
import type { Mark, Page, Piece, StructureNode } from './layout/marks.js';
import { laidSheet, type LaidSheet } from './layout/sheet-pages.js';
import { fontBytes, fontChain, fontKeys } from './sheet-fonts.js';
import { escaped, svgWithFonts } from './svg-fonts.js';

/** The only file that knows the PDF library: it draws decided pages and tags them. */

export interface PdfOptions {
  readonly size: Size;
  /** Date written into the file: the same input and date give the same bytes. */
  readonly date: Date;
  /** Longest time a sheet may take [ms]; default 20 000. */
  readonly timeoutMs?: number;
  /** Milliseconds of a clock, to keep to the timeout; default the clock of the machine. */
  readonly now?: () => number;
}

/** Members of the library's document that its types leave out. */
interface Inner {
  readonly _font: { readonly font: { hasGlyphForCodePoint(codePoint: number): boolean } };
  info: Record<string, unknown>;
  endMetadata(): void;
}

interface InnerElement {
  readonly dictionary: { readonly data: Record<string, unknown> };
}

const faulty = 'The sheet could not be drawn in time.';

/** The sheet as a tagged PDF. */
export function renderPdf(tree: DocumentTree, options: PdfOptions): Promise<Uint8Array> {
  return new Promise((resolve, reject) => {
    const now = options.now ?? Date.now;
    const deadline = now() + (options.timeoutMs ?? 20_000);
    const checkTime = (): void => {
      if (now() > deadline) {
        throw new NotComputable(
          faulty,
          'Print the sheet again; if it fails again, divide the plan into smaller ones.',
        );
      }
    };
    const pdf = openedDocument(tree, options);
    const chunks: Uint8Array[] = [];
    pdf.on('data', (chunk: Uint8Array) => chunks.push(chunk));
    pdf.on('end', () => {
      resolve(Uint8Array.from(Buffer.concat(chunks)));
    });
    pdf.on('error', reject);
    try {
      const set = typesetter(pdf);
      const sheet = laidSheet(tree, options.size, set);
      drawSheet(pdf, sheet, tree.mark, set, checkTime);
      pdf.end();
    } catch (error) {
      reject(error instanceof Error ? error : new Error(String(error)));
    }
  });
}

function openedDocument(tree: DocumentTree, options: PdfOptions): PDFKit.PDFDocument {
  const pdf = new PDFDocument({
    size: options.size === 'a4' ? 'A4' : 'LETTER',
    margin: 0,
    autoFirstPage: false,
    pdfVersion: '1.7',
    // The library's types do not know this subset yet.
    subset: 'PDF/UA' as unknown as 'PDF/A-2a',
    tagged: true,
    displayTitle: true,
    lang: tree.lang,
    info: {
      Title: tree.title,
      Author: 'Stillair',
      Creator: 'Stillair',
      Producer: 'Stillair',
      Subject: tree.subject,
      Keywords: tree.keywords,
      CreationDate: options.date,
      ModDate: options.date,
    },
  });
  // The library copies these texts into XML as they are; by then the plain ones are already written.
  const inner = pdf as unknown as Inner;
  const endMetadata = inner.endMetadata.bind(pdf);
  inner.endMetadata = () => {
    inner.info = Object.fromEntries(
      Object.entries(inner.info).map(([key, value]) => [
        key,
        typeof value === 'string' ? escaped(value) : value,
      ]),
    );
    endMetadata();
  };
  for (const key of fontKeys) pdf.registerFont(key, fontBytes(key));
  return pdf;
}

/** Measuring with the fonts that will be drawn; each font is opened when first needed. */
function typesetter(pdf: PDFKit.PDFDocument): Typesetter {
  const widths = new Map<string, number>();
  const covered = new Map<string, boolean>();
  return {
    chain: fontChain,
    has: (font, codePoint) => {
      const key = `${font} ${String(codePoint)}`;
      let known = covered.get(key);
      if (known === undefined) {
        pdf.font(font);
        known = (pdf as unknown as Inner)._font.font.hasGlyphForCodePoint(codePoint);
        covered.set(key, known);
      }
      return known;
    },
    width: (text, font, size) => {
      const key = `${font}\n${text}`;
      let unit = widths.get(key);
      if (unit === undefined) {
        unit = pdf.font(font).fontSize(1000).widthOfString(text) / 1000;
        widths.set(key, unit);
      }
      return unit * size;
    },
  };
}

type Content = ReturnType<PDFKit.PDFDocument['markStructureContent']>;
type Element = ReturnType<PDFKit.PDFDocument['struct']>;
type Contents = Map<StructureNode, Content[]>;

function drawSheet(
  pdf: PDFKit.PDFDocument,
  sheet: LaidSheet,
  mark: string | null,
  set: Typesetter,
  checkTime: () => void,
): void {
  const contents: Contents = new Map();
  const boxes = new Map<StructureNode, [number, number, number, number]>();
  for (const page of sheet.pages) {
    checkTime();
    pdf.addPage();
    if (mark !== null) drawMark(pdf, mark, sheet.paper, set);
    drawPage(pdf, page, contents, boxes, set);
  }
  const root = builtStructure(pdf, sheet.root, contents, boxes);
  pdf.addStructure(root);
  root.end();
}

/** The word across the page, pale enough to read through. */
function drawMark(pdf: PDFKit.PDFDocument, word: string, paper: Paper, set: Typesetter): void {
  const font = 'strong';
  const size = Math.min(170, 620 / set.width(word, font, 1));
  const width = set.width(word, font, size);
  pdf.markContent('Artifact', { type: 'Page' });
  pdf.save();
  pdf.translate(paper.width / 2, paper.height / 2).rotate(-54);
  pdf.font(font).fontSize(size).fillColor(markGrey);
  pdf.text(word, -width / 2, size * 0.34, { lineBreak: false, baseline: 'alphabetic' });
  pdf.restore();
  pdf.endMarkedContent();
}

/** Neighbouring pieces of one element become one marked content. */
function drawPage(
  pdf: PDFKit.PDFDocument,
  page: Page,
  contents: Contents,
  boxes: Map<StructureNode, [number, number, number, number]>,
  set: Typesetter,
): void {
  let open: StructureNode | null | undefined;
  const close = (): void => {
    if (open !== undefined) pdf.endMarkedContent();
    open = undefined;
  };
  for (const piece of page.pieces) {
    if (piece.marks.length === 0) continue;
    if (piece.node !== open || piece.running === true) {
      close();
      start(pdf, piece, contents);
      open = piece.node;
    }
    for (const mark of piece.marks) {
      drawMarkOf(pdf, mark, set);
      if (mark.kind === 'picture' && piece.node !== null) {
        boxes.set(piece.node, [mark.x, mark.y, mark.x + mark.width, mark.y + mark.height]);
      }
    }
  }
  close();
}

function start(pdf: PDFKit.PDFDocument, piece: Piece, contents: Contents): void {
  const { node } = piece;
  if (node === null) {
    pdf.markContent('Artifact', { type: piece.running === true ? 'Pagination' : 'Layout' });
    return;
  }
  if (node.bookmark !== undefined && !contents.has(node)) pdf.outline.addItem(node.bookmark);
  const content = pdf.markStructureContent(node.type);
  contents.set(node, [...(contents.get(node) ?? []), content]);
}

function drawMarkOf(pdf: PDFKit.PDFDocument, mark: Mark, set: Typesetter): void {
  switch (mark.kind) {
    case 'text':
      pdf.fillColor(mark.colour);
      for (const run of mark.runs) {
        pdf.font(run.font).fontSize(run.size);
        pdf.text(run.text, run.x, mark.baseline + run.drop, {
          lineBreak: false,
          baseline: 'alphabetic',
        });
      }
      return;
    case 'line':
      pdf.lineWidth(mark.thickness).strokeColor(mark.colour);
      pdf.moveTo(mark.x1, mark.y1).lineTo(mark.x2, mark.y2).stroke();
      return;
    case 'path':
      pdf.save().translate(mark.x, mark.y).path(mark.data).lineWidth(mark.thickness);
      if (mark.fill !== null && mark.stroke !== null) pdf.fillAndStroke(mark.fill, mark.stroke);
      else if (mark.fill !== null) pdf.fill(mark.fill);
      else pdf.stroke(mark.stroke ?? undefined);
      pdf.restore();
      return;
    case 'picture':
      svgToPdf(pdf, svgWithFonts(mark.svg, set), mark.x, mark.y, {
        width: mark.width,
        height: mark.height,
        assumePt: true,
        fontCallback: (family) => (family in fontNames ? family : 'regular'),
      });
  }
}

const fontNames: Readonly<Record<string, true>> = Object.fromEntries(
  fontKeys.map((key) => [key, true as const]),
);

/** The structure elements, children after their own content, in the order of the layout. */
function builtStructure(
  pdf: PDFKit.PDFDocument,
  node: StructureNode,
  contents: Contents,
  boxes: ReadonlyMap<StructureNode, [number, number, number, number]>,
): Element {
  const bbox = boxes.get(node);
  // Scope, box and placement are options of the library that its types leave out.
  const options: object = {
    ...(node.alt === undefined ? {} : { alt: node.alt }),
    ...(node.scope === undefined ? {} : { scope: node.scope }),
    ...(bbox === undefined ? {} : { bbox, placement: 'Block' }),
  };
  const element = pdf.struct(node.type, options);
  if (node.rowSpan !== undefined) {
    const { data } = (element as unknown as InnerElement).dictionary;
    data.A = { O: 'Table', Scope: node.scope, RowSpan: node.rowSpan };
  }
  for (const content of contents.get(node) ?? []) element.add(content);
  for (const child of node.children) element.add(builtStructure(pdf, child, contents, boxes));
  return element;
}
