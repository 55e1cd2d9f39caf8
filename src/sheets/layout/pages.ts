import { movedMark, type Page, type Piece, type Strip } from './marks.js';

/** How high a strip and those that must follow it on the same page stand together. */
function groupHeight(strips: readonly Strip[], from: number): number {
  let height = 0;
  for (let index = from; index < strips.length; index += 1) {
    const strip = strips[index];
    if (strip === undefined) break;
    height += strip.height + (index === from ? 0 : strip.before);
    if (!strip.keepWithNext) break;
  }
  return height;
}

/**
 * Strips laid out on pages from the top [points]. A group that must stay together moves to the
 * next page whole; one that is higher than a page is let go at the page's end.
 */
export function laidPages(
  strips: readonly Strip[],
  body: { readonly top: number; readonly height: number },
): Page[] {
  const pages: { pieces: Piece[] }[] = [];
  let pieces: Piece[] = [];
  let y = 0;
  let open = false;
  const turn = (): void => {
    if (open) pages.push({ pieces });
    pieces = [];
    y = 0;
    open = true;
  };
  const put = (strip: Strip): void => {
    for (const piece of strip.pieces) {
      pieces.push({
        node: piece.node,
        marks: piece.marks.map((mark) => movedMark(mark, 0, body.top + y)),
      });
    }
    y += strip.height;
  };
  turn();
  let groupEnds = 0;
  strips.forEach((strip, index) => {
    const left = body.height - y;
    const before = y === 0 ? 0 : strip.before;
    let needed = strip.height;
    if (index >= groupEnds) {
      const together = groupHeight(strips, index);
      let end = index;
      while (strips[end]?.keepWithNext === true) end += 1;
      groupEnds = end + 1;
      if (together <= body.height) needed = together;
    }
    if (y > 0 && before + needed > left + 0.01) {
      turn();
      if (strip.repeated !== undefined) put(strip.repeated);
    } else {
      y += before;
    }
    put(strip);
  });
  pages.push({ pieces });
  return pages;
}
