/** A label that wants to stand at a height, and where it came to stand. */
export interface LabelBox {
  readonly x: number;
  /** Middle of the label. */
  readonly y: number;
  readonly width: number;
  readonly height: number;
}

/** Width of a text on a drawing, from the mean width of a letter: fonts are not measured here. */
export const drawnWidth = (text: string, size: number): number =>
  Array.from(text).length * size * 0.54;

const overlaps = (one: LabelBox, other: LabelBox): boolean =>
  Math.abs(one.y - other.y) < (one.height + other.height) / 2 + 0.5 &&
  one.x < other.x + other.width + 3 &&
  other.x < one.x + one.width + 3;

/**
 * The free place nearest to the wanted height: first along the line, from right to left or left to
 * right, then a step up or down; `free` may refuse a place. Null when there is none.
 */
export function freeBox(
  wanted: { readonly y: number; readonly width: number; readonly height: number },
  within: {
    readonly left: number;
    readonly right: number;
    readonly top: number;
    readonly bottom: number;
  },
  taken: readonly LabelBox[],
  from: 'left' | 'right',
  free: (box: LabelBox) => boolean = () => true,
): LabelBox | null {
  const room = Math.max(0, within.right - within.left - wanted.width);
  const columns = Math.max(1, Math.floor(room / (wanted.width + 4)) + 1);
  const step = wanted.height + 1;
  for (let move = 0; move < 24; move += 1) {
    // Up first: a label above its line hides nothing of the air below it.
    const shift = (move % 2 === 1 ? -1 : 1) * Math.ceil(move / 2) * step;
    const y = wanted.y + shift;
    if (y - wanted.height / 2 < within.top || y + wanted.height / 2 > within.bottom) continue;
    for (let column = 0; column < columns; column += 1) {
      const offset = Math.min(room, column * (wanted.width + 4));
      const x = from === 'left' ? within.left + offset : within.right - wanted.width - offset;
      const box = { x, y, width: wanted.width, height: wanted.height };
      if (!taken.some((other) => overlaps(box, other)) && free(box)) return box;
    }
  }
  return null;
}
