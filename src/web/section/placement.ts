import type { SectionView } from '../../assessment/assessment.js';

/** Where each space stands on the drawing: a vertical cut to one scale, in rows when it is long. */

export type SectionSpace = SectionView['spaces'][number];

export interface PlacedSpace {
  readonly space: SectionSpace;
  readonly x: number;
  readonly width: number;
  readonly row: number;
  /** Stands below the floor of this space. */
  readonly under: string | null;
}

export interface Row {
  /** Drawing height of the datum. */
  readonly datumY: number;
  readonly top: number;
  readonly bottom: number;
  readonly left: number;
  readonly right: number;
}

export interface Placement {
  readonly width: number;
  readonly height: number;
  /** Drawing units per metre. */
  readonly scale: number;
  readonly spaces: readonly PlacedSpace[];
  readonly rows: readonly Row[];
}

/** Width of a drawing on a page or a sheet. */
const usualWidth = 620;
const side = 12;
const rightSide = 58;
const titleRoom = 34;
const footRoom = 20;
/** Under a row whose pits carry their titles below. */
const deepFootRoom = 40;
const rowGap = 14;
const largestScale = 150;

/** How much drawing a reader's page or paper has room for. */
export interface SectionRoom {
  /** Greatest height of a row of spaces. */
  readonly tallestRow: number;
  /** A space narrower than this asks for one more row. */
  readonly narrowestSpace: number;
  /** Width of the drawing; that of a page where it is not said. */
  readonly width?: number;
}

/** The width of a phone. */
export const phoneRoom: SectionRoom = { tallestRow: 230, narrowestSpace: 70, width: 340 };

const pageRoom: SectionRoom = { tallestRow: 270, narrowestSpace: 70 };

const lengthOf = (space: SectionSpace): number => Math.max(space.lengthM, 0.5);
/** Level of the ceiling [m]: the mean clear height stands on the mean floor. */
export const roofLevel = (space: SectionSpace): number =>
  space.floorLevelM + space.floorRiseM / 2 + space.heightM;

/** Spaces that lie under another and open into it, with that other. */
function spacesBelow(view: SectionView): Map<string, string> {
  const below = new Map<string, string>();
  const byId = new Map(view.spaces.map((space) => [space.id, space]));
  for (const opening of view.openings) {
    const ends = [byId.get(opening.from), byId.get(opening.to)];
    const [one, other] = ends;
    if (one === undefined || other === undefined) continue;
    const [low, high] = one.floorLevelM <= other.floorLevelM ? [one, other] : [other, one];
    const fits = low.lengthM <= high.lengthM && low.id !== high.id;
    if (
      fits &&
      roofLevel(low) <= high.floorLevelM + 0.05 &&
      !below.has(low.id) &&
      !below.has(high.id)
    ) {
      below.set(low.id, high.id);
    }
  }
  return below;
}

/** Spaces divided into a number of rows of about the same length, in their order. */
function dividedRows(spaces: readonly SectionSpace[], count: number): SectionSpace[][] {
  const total = spaces.reduce((sum, space) => sum + lengthOf(space), 0);
  const rows: SectionSpace[][] = Array.from({ length: count }, () => []);
  let passed = 0;
  for (const space of spaces) {
    const middle = passed + lengthOf(space) / 2;
    const row = Math.min(count - 1, Math.floor((middle / total) * count));
    rows[row]?.push(space);
    passed += lengthOf(space);
  }
  return rows.filter((row) => row.length > 0);
}

/** The placement of all spaces; an empty view has an empty drawing. */
export function sectionPlacement(view: SectionView, limits: SectionRoom = pageRoom): Placement {
  const below = spacesBelow(view);
  const standing = view.spaces.filter((space) => !below.has(space.id));
  const drawingWidth = limits.width ?? usualWidth;
  const room = drawingWidth - side - rightSide;
  let rows: SectionSpace[][] = [];
  let scale = largestScale;
  const shortest = Math.min(...standing.map(lengthOf));
  for (let count = 1; count <= Math.max(1, Math.min(7, standing.length)); count += 1) {
    rows = dividedRows(standing, count);
    const longest = Math.max(
      ...rows.map((row) => row.reduce((sum, space) => sum + lengthOf(space), 0)),
    );
    scale = Math.min(largestScale, room / longest);
    if (shortest * scale >= limits.narrowestSpace) break;
  }
  const under = (id: string): SectionSpace[] =>
    view.spaces.filter((space) => below.get(space.id) === id);
  const extents = rows.map((row) => {
    const all = row.flatMap((space) => [space, ...under(space.id)]);
    return {
      top: Math.max(0, ...all.map(roofLevel)),
      bottom: Math.min(0, ...all.map((space) => space.floorLevelM)),
    };
  });
  const highest = Math.max(0.5, ...extents.map((extent) => extent.top - extent.bottom));
  scale = Math.min(scale, limits.tallestRow / highest);

  const placed: PlacedSpace[] = [];
  const placedRows: Row[] = [];
  let y = 0;
  rows.forEach((row, index) => {
    const extent = extents[index] ?? { top: 0, bottom: 0 };
    const top = y + titleRoom;
    const datumY = top + extent.top * scale;
    const bottom = datumY - extent.bottom * scale;
    let x = side;
    for (const space of row) {
      const width = lengthOf(space) * scale;
      placed.push({ space, x, width, row: index, under: null });
      // What lies below starts at the wall shared with the neighbour before it.
      let childX = x;
      for (const child of under(space.id)) {
        const childWidth = lengthOf(child) * scale;
        placed.push({ space: child, x: childX, width: childWidth, row: index, under: space.id });
        childX += childWidth + 6;
      }
      x += width;
    }
    placedRows.push({ datumY, top, bottom, left: side, right: x });
    const deep = row.some((space) => under(space.id).length > 0);
    y = bottom + (deep ? deepFootRoom : footRoom) + rowGap;
  });
  return {
    width: drawingWidth,
    height: Math.max(y - rowGap, 40),
    scale,
    spaces: placed,
    rows: placedRows,
  };
}

/** The view divided into views of at most this many rows, for paper of a fixed height. */
export function dividedViews<View extends SectionView>(
  view: View,
  mostRows: number,
  limits: SectionRoom = pageRoom,
): View[] {
  const placement = sectionPlacement(view, limits);
  if (placement.rows.length <= mostRows) return [view];
  const parts = Math.ceil(placement.rows.length / mostRows);
  const rowsEach = Math.ceil(placement.rows.length / parts);
  return Array.from({ length: parts }, (_, part) => {
    const ids = new Set(
      placement.spaces
        .filter((placed) => Math.floor(placed.row / rowsEach) === part)
        .map((placed) => placed.space.id),
    );
    return {
      ...view,
      spaces: view.spaces.filter((space) => ids.has(space.id)),
      openings: view.openings.filter((opening) => ids.has(opening.from) || ids.has(opening.to)),
      zones: view.zones.filter((zone) => ids.has(zone.space)),
      layers: view.layers.filter((layer) => ids.has(layer.space)),
      ...(view.meters && { meters: view.meters.filter((meter) => ids.has(meter.space)) }),
    };
  });
}
