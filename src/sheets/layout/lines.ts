import type { Words } from '../document-tree.js';
import { textRuns, type Glyphs, type Weight } from '../text-runs.js';
import type { PlacedRun } from './marks.js';

/** Measures text; the renderer passes in the real fonts, a test may pass in a ruler. */
export interface Typesetter extends Glyphs {
  readonly width: (text: string, font: string, size: number) => number;
}

export interface SetLine {
  /** x from the left edge of the line. */
  readonly runs: readonly PlacedRun[];
  readonly width: number;
}

interface Segment {
  readonly text: string;
  readonly font: string;
  readonly subscript: boolean;
  readonly width: number;
}

/** What stays together on a line; `gap` is the width of the space after it. */
interface Word {
  readonly segments: Segment[];
  width: number;
  gap: number;
  endsLine: boolean;
}

const subscriptSize = 0.72;
const subscriptDrop = 0.16;

function wordsOf(text: Words, weight: Weight, size: number, set: Typesetter): Word[] {
  const words: Word[] = [];
  let open: Word | null = null;
  const word = (): Word => {
    if (open === null) {
      open = { segments: [], width: 0, gap: 0, endsLine: false };
      words.push(open);
    }
    return open;
  };
  for (const run of textRuns(text, weight, set)) {
    // A line may end after a space, a hyphen, a dash or a slash, and must end at a line feed.
    for (const part of run.text.match(/\n| +|[^\n ]*?[-–—/](?=[^\n 0-9]{3})|[^\n ]+/g) ?? []) {
      if (part === '\n') {
        word().endsLine = true;
        open = null;
        continue;
      }
      const drawn = run.subscript ? size * subscriptSize : size;
      if (part.startsWith(' ')) {
        const last = words.at(-1);
        if (last !== undefined && !last.endsLine) {
          last.gap = set.width(' ', run.font, drawn);
          last.segments.push({ ...run, text: ' ', width: last.gap });
        }
        open = null;
        continue;
      }
      const current = word();
      const width = set.width(part, run.font, drawn);
      current.segments.push({ ...run, text: part, width });
      current.width += width;
      if (/[-–—/]$/.test(part)) open = null;
    }
  }
  return words;
}

/** The word divided between letters, so that no part is wider than the line. */
function dividedWord(long: Word, limit: number, size: number, set: Typesetter): Word[] {
  const parts: Word[] = [];
  let part: Word = { segments: [], width: 0, gap: 0, endsLine: false };
  for (const segment of long.segments) {
    const drawn = segment.subscript ? size * subscriptSize : size;
    for (const letter of segment.text) {
      const width = set.width(letter, segment.font, drawn);
      if (part.width + width > limit && part.segments.length > 0) {
        parts.push(part);
        part = { segments: [], width: 0, gap: 0, endsLine: false };
      }
      part.segments.push({ ...segment, text: letter, width });
      part.width += width;
    }
  }
  part.width -= long.gap;
  part.gap = long.gap;
  part.endsLine = long.endsLine;
  parts.push(part);
  return parts;
}

/** Neighbouring segments of one font drawn as one run. */
function placedRuns(words: readonly Word[], size: number): PlacedRun[] {
  const runs: (PlacedRun & { text: string })[] = [];
  let x = 0;
  let previous: Segment | null = null;
  for (const segment of words.flatMap((word) => word.segments)) {
    const last = runs.at(-1);
    const joins = previous?.font === segment.font && previous.subscript === segment.subscript;
    if (last !== undefined && joins) {
      last.text += segment.text;
    } else {
      runs.push({
        x,
        text: segment.text,
        font: segment.font,
        size: segment.subscript ? size * subscriptSize : size,
        drop: segment.subscript ? size * subscriptDrop : 0,
      });
    }
    x += segment.width;
    previous = segment;
  }
  return runs;
}

/** The lines of a text inside a width [points]; an empty text has no line. */
export function setLines(
  text: Words,
  look: { readonly weight: Weight; readonly size: number },
  width: number,
  set: Typesetter,
): SetLine[] {
  const lines: SetLine[] = [];
  let line: Word[] = [];
  let used = 0;
  const close = (): void => {
    const gap = line.at(-1)?.gap ?? 0;
    lines.push({ runs: placedRuns(line, look.size), width: used - gap });
    line = [];
    used = 0;
  };
  for (const whole of wordsOf(text, look.weight, look.size, set)) {
    const parts = whole.width > width ? dividedWord(whole, width, look.size, set) : [whole];
    for (const word of parts) {
      if (line.length > 0 && used + word.width > width) close();
      line.push(word);
      used += word.width + word.gap;
      if (word.endsLine) close();
    }
  }
  if (line.length > 0) close();
  return lines;
}

/** Widest unbreakable word and width on one line [points], for the columns of a table. */
export function textExtent(
  text: Words,
  look: { readonly weight: Weight; readonly size: number },
  set: Typesetter,
): { readonly word: number; readonly line: number } {
  let word = 0;
  let line = 0;
  let used = 0;
  for (const part of wordsOf(text, look.weight, look.size, set)) {
    word = Math.max(word, part.width);
    line = Math.max(line, used + part.width);
    used = part.endsLine ? 0 : used + part.width + part.gap;
  }
  return { word, line };
}
