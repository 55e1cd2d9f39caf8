export interface Point {
  readonly x: number;
  readonly y: number;
}

/** The part of a convex polygon on the inner side of a horizontal line. */
export function polygonPart(
  polygon: readonly Point[],
  y: number,
  side: 'below' | 'above',
): Point[] {
  // y grows downwards on a drawing: below the line means a greater y.
  const inside = (point: Point): boolean => (side === 'below' ? point.y >= y : point.y <= y);
  const kept: Point[] = [];
  polygon.forEach((from, index) => {
    const to = polygon[(index + 1) % polygon.length] ?? from;
    if (inside(from)) kept.push(from);
    if (inside(from) !== inside(to)) {
      const share = (y - from.y) / (to.y - from.y);
      kept.push({ x: from.x + share * (to.x - from.x), y });
    }
  });
  return kept;
}

/** Where the line x cos a + y sin a = c runs inside a convex polygon: two points, or none. */
function chord(polygon: readonly Point[], cos: number, sin: number, c: number): Point[] {
  const crossings: Point[] = [];
  polygon.forEach((from, index) => {
    const to = polygon[(index + 1) % polygon.length] ?? from;
    const atFrom = from.x * cos + from.y * sin - c;
    const atTo = to.x * cos + to.y * sin - c;
    if (atFrom < 0 === atTo < 0) return;
    const share = atFrom / (atFrom - atTo);
    crossings.push({ x: from.x + share * (to.x - from.x), y: from.y + share * (to.y - from.y) });
  });
  return crossings.length === 2 ? crossings : [];
}

/**
 * Parallel lines that fill a convex polygon, as SVG path data: plain strokes, so that browser, print
 * and grey copies show the same hatch.
 *
 * @param angleDeg direction of the normal of the lines [degree]
 * @param spacing  distance between lines [user units], above 0
 */
export function hatchPath(polygon: readonly Point[], angleDeg: number, spacing: number): string {
  if (polygon.length < 3) return '';
  const angle = (angleDeg * Math.PI) / 180;
  const cos = Math.cos(angle);
  const sin = Math.sin(angle);
  const reach = polygon.map((point) => point.x * cos + point.y * sin);
  const first = Math.ceil(Math.min(...reach) / spacing) * spacing;
  const last = Math.max(...reach);
  const parts: string[] = [];
  for (let c = first; c <= last; c += spacing) {
    const [from, to] = chord(polygon, cos, sin, c);
    if (from === undefined || to === undefined) continue;
    parts.push(`M${two(from.x)} ${two(from.y)}L${two(to.x)} ${two(to.y)}`);
  }
  return parts.join('');
}

/** A coordinate with at most two decimals. */
export const two = (value: number): string => String(Number(value.toFixed(2)));

/** A closed polygon as SVG path data. */
export const polygonPath = (polygon: readonly Point[]): string =>
  `${polygon.map((point, index) => `${index === 0 ? 'M' : 'L'}${two(point.x)} ${two(point.y)}`).join('')}Z`;
