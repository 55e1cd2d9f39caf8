import type { JSX } from 'preact';
import { renderToString } from 'preact-render-to-string';
import type { SectionView } from '../../assessment/assessment.js';
import { figureText, quantityText } from '../../assessment/figure-text.js';
import { hatchPath, polygonPart, polygonPath, two, type Point } from './hatch.js';
import { accent, ink, softInk } from './ink.js';
import { drawnWidth, freeBox, type LabelBox } from './label-placement.js';
import { lengthText, levelText } from './level-text.js';
import type { MomentView } from './moment-view.js';
import {
  roofLevel,
  sectionPlacement,
  type PlacedSpace,
  type Placement,
  type SectionRoom,
} from './placement.js';
import { sectionText } from './section-text.js';
import { sectionWords, type SectionWords } from './section-words.js';

export interface SectionOptions {
  /** Colour behind labels: that of the page or paper. */
  readonly paper?: string;
  readonly words?: SectionWords;
  readonly room?: SectionRoom;
}

const size = 11.5;
const small = 10;
const lineHeight = 15;
const family = 'Atkinson Hyperlegible, sans-serif';

const hatches = {
  floor: { angleDeg: 45, spacing: 6, dash: undefined },
  ceiling: { angleDeg: 135, spacing: 6, dash: undefined },
  whole: { angleDeg: 90, spacing: 7, dash: '1.2 6' },
} as const;

interface Corners {
  readonly polygon: readonly Point[];
  readonly left: number;
  readonly right: number;
  readonly roofY: number;
  /** Drawing height of the floor at a place. */
  readonly floorY: (x: number) => number;
}

function cornersOf(placed: PlacedSpace, placement: Placement): Corners {
  const datumY = placement.rows[placed.row]?.datumY ?? 0;
  const yOf = (level: number): number => datumY - level * placement.scale;
  const { space } = placed;
  const left = placed.x;
  const right = placed.x + placed.width;
  const low = yOf(space.floorLevelM);
  const high = yOf(space.floorLevelM + space.floorRiseM);
  const roofY = yOf(roofLevel(space));
  return {
    left,
    right,
    roofY,
    floorY: (x) => low + ((high - low) * (x - left)) / (right - left),
    polygon: [
      { x: left, y: roofY },
      { x: right, y: roofY },
      { x: right, y: high },
      { x: left, y: low },
    ],
  };
}

interface Text {
  readonly x: number;
  readonly y: number;
  readonly text: string;
  readonly strong?: boolean;
  readonly anchor?: 'start' | 'middle' | 'end';
  readonly fontSize?: number;
  readonly colour?: string;
}

const label = (text: Text): JSX.Element => (
  <text
    x={two(text.x)}
    y={two(text.y)}
    font-size={text.fontSize ?? size}
    font-weight={text.strong === true ? 'bold' : 'normal'}
    text-anchor={text.anchor ?? 'start'}
    fill={text.colour ?? ink}
  >
    {text.text}
  </text>
);

const stroke = (d: string, colour: string, width: number, dash?: string): JSX.Element => (
  <path d={d} fill="none" stroke={colour} stroke-width={width} stroke-dasharray={dash} />
);

const segment = (x1: number, y1: number, x2: number, y2: number): string =>
  `M${two(x1)} ${two(y1)}L${two(x2)} ${two(y2)}`;

/** Entries for names that do not fit where they belong. */
type Key = { readonly sign: string; readonly text: string }[];

/** The title of a space above its ceiling, or a number with the title in the key. */
function spaceTitle(placed: PlacedSpace, corners: Corners, key: Key): JSX.Element {
  const middle = (corners.left + corners.right) / 2;
  const fits = drawnWidth(placed.space.title, size) * 1.06 <= placed.width - 4;
  let text = placed.space.title;
  if (!fits) {
    text = String(key.filter((entry) => /^\d/.test(entry.sign)).length + 1);
    key.push({ sign: text, text: placed.space.title });
  }
  // A pit has its neighbour's floor for a ceiling: its title stands under its own floor.
  const low = Math.max(corners.floorY(corners.left), corners.floorY(corners.right));
  return placed.under === null
    ? label({ x: middle, y: corners.roofY - 8, text, strong: true, anchor: 'middle' })
    : label({ x: middle, y: low + 13, text, strong: true, anchor: 'middle' });
}

/** Where along a raked floor people can breathe at this height: 0.2 to 2.1 m above it. */
function reach(corners: Corners, y: number, scale: number): { left: number; right: number } {
  const { left, right, floorY } = corners;
  const fall = floorY(right) - floorY(left);
  if (Math.abs(fall) < 0.01) return { left, right };
  const at = (heightM: number): number => {
    const x = left + ((y + heightM * scale - floorY(left)) / fall) * (right - left);
    return Math.min(right, Math.max(left, x));
  };
  const ends = [at(0.2), at(2.1)].toSorted((one, other) => one - other);
  const [from = left, to = right] = ends;
  return to - from < 12
    ? { left: Math.min(from, right - 12), right: Math.max(to, left + 12) }
    : { left: from, right: to };
}

/** A few heads at breathing height, standing on the floor: only to show whose height it is. */
function people(
  corners: Corners,
  y: number,
  scale: number,
  along: { readonly left: number; readonly right: number },
  turn: number,
  paper: string,
): JSX.Element[] {
  const radius = Math.min(6, Math.max(2.2, 0.11 * scale));
  const width = along.right - along.left;
  // Each breathing height of a space has its own places, so that one stem never stands for two.
  const first = along.left + radius + 4 + width * (turn % 4) * 0.12;
  return [0, 1, 2].flatMap((place) => {
    const x = first + place * radius * 4;
    if (x > along.left + width * 0.6) return [];
    const floor = corners.floorY(x);
    if (floor - y < radius * 2.4) return [];
    return [
      <circle
        cx={two(x)}
        cy={two(y)}
        r={two(radius)}
        fill={paper}
        stroke={accent}
        stroke-width={1}
      />,
      stroke(segment(x, y + radius, x, floor), accent, 0.8),
    ];
  });
}

/**
 * Openings between neighbours are gaps in their wall; others are seen behind the cut, with where they
 * lead written over them: `taken` tells by space where that stands.
 */
function openings(
  view: SectionView | MomentView,
  placement: Placement,
  corners: ReadonlyMap<string, Corners>,
  paper: string,
  words: SectionWords,
): { readonly parts: JSX.Element[]; readonly taken: ReadonlyMap<string, readonly LabelBox[]> } {
  const placed = new Map(placement.spaces.map((entry) => [entry.space.id, entry]));
  const taken = new Map<string, LabelBox[]>();
  const parts = view.openings.flatMap((opening) => {
    const one = placed.get(opening.from) ?? placed.get(opening.to);
    if (one === undefined) return [];
    const otherId = one.space.id === opening.from ? opening.to : opening.from;
    const other = placed.get(otherId);
    const datumY = placement.rows[one.row]?.datumY ?? 0;
    const bottom = datumY - opening.sillLevelM * placement.scale;
    const top = bottom - opening.heightM * placement.scale;
    const own = corners.get(one.space.id);
    if (own === undefined) return [];
    const stacked = one.under === otherId || other?.under === one.space.id;
    if (other !== undefined && stacked) {
      const low = one.under === null ? corners.get(other.space.id) : own;
      if (low === undefined) return [];
      const length = Math.min(opening.heightM * placement.scale, low.right - low.left);
      const middle = (low.left + low.right) / 2;
      const gap = segment(middle - length / 2, low.roofY, middle + length / 2, low.roofY);
      return [stroke(gap, paper, 4), stroke(gap, ink, 0.8, '2 4')];
    }
    const wall = other?.row === one.row ? sharedWall(one, other) : outerWall(one, placement);
    if (wall !== null) {
      return [
        stroke(segment(wall, top, wall, bottom), paper, 5),
        stroke(segment(wall - 4, top, wall + 4, top), ink, 1),
        stroke(segment(wall - 4, bottom, wall + 4, bottom), ink, 1),
      ];
    }
    const width = Math.min(0.9 * placement.scale, (own.right - own.left) * 0.3);
    const x = own.right - width - 8;
    const where = other === undefined ? words.outside : other.space.title;
    const long = drawnWidth(where, small);
    const isNamed = long < own.right - own.left - 10;
    if (isNamed) {
      const box = { x: x + width - long, y: top - 6, width: long, height: small + 2 };
      taken.set(one.space.id, [...(taken.get(one.space.id) ?? []), box]);
    }
    return [
      <rect
        x={two(x)}
        y={two(top)}
        width={two(width)}
        height={two(bottom - top)}
        fill="none"
        stroke={softInk}
        stroke-width={0.8}
      />,
      ...(isNamed
        ? [
            label({
              x: x + width,
              y: top - 3,
              text: where,
              anchor: 'end',
              fontSize: small,
              colour: softInk,
            }),
          ]
        : []),
    ];
  });
  return { parts, taken };
}

function sharedWall(one: PlacedSpace, other: PlacedSpace): number | null {
  if (Math.abs(one.x + one.width - other.x) < 0.01) return other.x;
  return Math.abs(other.x + other.width - one.x) < 0.01 ? one.x : null;
}

function outerWall(one: PlacedSpace, placement: Placement): number | null {
  const row = placement.rows[one.row];
  if (row === undefined) return null;
  if (Math.abs(one.x + one.width - row.right) < 0.01) return row.right;
  return Math.abs(one.x - row.left) < 0.01 ? row.left : null;
}

const niceLengths = [0.5, 1, 2, 5, 10, 20, 50, 100];

/** A bar of a round length, with its middle marked. */
function scaleBar(scale: number, x: number, y: number): JSX.Element[] {
  const length = niceLengths.findLast((metres) => metres * scale <= 150) ?? 0.5;
  const width = length * scale;
  return [
    stroke(segment(x, y, x + width, y), ink, 1.2),
    ...[0, 0.5, 1].map((share) =>
      stroke(segment(x + share * width, y - 4, x + share * width, y), ink, 1.2),
    ),
    label({ x, y: y + 13, text: '0', fontSize: small, colour: softInk }),
    label({
      x: x + width,
      y: y + 13,
      text: `${String(length)}\u00a0m`,
      fontSize: small,
      anchor: 'middle',
      colour: softInk,
    }),
  ];
}

/** The hatches that occur, each with what it means, in as many lines as they need. */
function hatchKey(
  view: SectionView | MomentView,
  words: SectionWords,
  at: { readonly x: number; readonly y: number; readonly right: number },
): { readonly parts: JSX.Element[]; readonly bottom: number } {
  const used = (['floor', 'ceiling', 'whole'] as const).filter((at) =>
    view.layers.some((layer) => layer.at === at),
  );
  let left = at.x;
  let y = at.y;
  const parts = used.flatMap((position) => {
    const text = words.layers[position];
    const width = 32 + drawnWidth(text, small);
    if (left > at.x && left + width > at.right) {
      left = at.x;
      y += 19;
    }
    const box = [
      { x: left, y: y - 11 },
      { x: left + 26, y: y - 11 },
      { x: left + 26, y: y + 2 },
      { x: left, y: y + 2 },
    ];
    const hatch = hatches[position];
    const drawn = [
      stroke(hatchPath(box, hatch.angleDeg, hatch.spacing), softInk, 0.9, hatch.dash),
      stroke(polygonPath(box), softInk, 0.8),
      label({ x: left + 32, y, text, fontSize: small }),
    ];
    left += width + 14;
    return drawn;
  });
  return { parts, bottom: y };
}

/** The venue as a vertical cut, to scale, with breathing heights, gas and the lowest oxygen. */
export function SectionDrawing(props: {
  readonly view: SectionView | MomentView;
  readonly options?: SectionOptions;
}): JSX.Element {
  const { svg } = drawnSection(props.view, props.options ?? {});
  return svg;
}

/** The drawing as a text for a sheet or an image, with its size. */
export function sectionSvg(
  view: SectionView | MomentView,
  options: SectionOptions = {},
): { readonly svg: string; readonly width: number; readonly height: number } {
  const { svg, width, height } = drawnSection(view, options);
  return { svg: renderToString(svg), width, height };
}

function drawnSection(
  view: SectionView | MomentView,
  options: SectionOptions,
): { readonly svg: JSX.Element; readonly width: number; readonly height: number } {
  const words = options.words ?? sectionWords;
  const paper = options.paper ?? '#ffffff';
  const placement = sectionPlacement(view, options.room);
  const key: Key = [];
  const corners = new Map(
    placement.spaces.map((placed) => [placed.space.id, cornersOf(placed, placement)]),
  );
  const opened = openings(view, placement, corners, paper, words);
  const gas: JSX.Element[] = [];
  const walls: JSX.Element[] = [];
  const heights: JSX.Element[] = [];
  for (const placed of placement.spaces) {
    const own = corners.get(placed.space.id);
    if (own === undefined) continue;
    const taken = opened.taken.get(placed.space.id) ?? [];
    const drawn = spaceContents(view, placed, own, placement, { words, paper, key, taken });
    gas.push(...drawn.gas);
    heights.push(...drawn.heights);
    walls.push(stroke(polygonPath(own.polygon), ink, 1.8), spaceTitle(placed, own, key));
  }
  const datum = placement.rows.flatMap((row) => [
    stroke(segment(row.left - 8, row.datumY, row.right + 10, row.datumY), softInk, 0.7, '9 3 2 3'),
    label({
      x: row.right + 13,
      y: row.datumY + 3.5,
      text: words.datum,
      fontSize: small,
      colour: softInk,
    }),
  ]);
  const barY = placement.height + 12;
  const hatched = hatchKey(view, words, { x: 176, y: barY + 2, right: placement.width });
  const keyTop = Math.max(barY + 36, hatched.bottom + 24);
  const drawnKey = keyLines(key, keyTop, placement.width);
  const height = keyTop + drawnKey.height - (drawnKey.height === 0 ? 12 : 4);
  const svg = (
    <svg
      xmlns="http://www.w3.org/2000/svg"
      viewBox={`0 0 ${two(placement.width)} ${two(height)}`}
      width={two(placement.width)}
      height={two(height)}
      role="img"
      aria-label={sectionText(view, words)}
      font-family={family}
    >
      {datum}
      {gas}
      {walls}
      {opened.parts}
      {heights}
      {view.spaces.length === 0
        ? label({ x: 12, y: 24, text: words.empty })
        : [...scaleBar(placement.scale, 12, barY), ...hatched.parts]}
      {drawnKey.lines}
    </svg>
  );
  return { svg, width: placement.width, height };
}

/** Names that did not fit, in columns under the drawing: long ones together, short ones beside them. */
function keyLines(
  key: Key,
  top: number,
  width: number,
): { readonly lines: JSX.Element[]; readonly height: number } {
  const room = width - 24;
  const widthOf = (entry: Key[number]): number => drawnWidth(entry.text, small) * 0.92 + 34;
  const long = key.filter((entry) => widthOf(entry) > room / 2);
  const short = key.filter((entry) => widthOf(entry) <= room / 2);
  const longWidth = Math.max(0, ...long.map(widthOf));
  const shortWidth = Math.max(1, ...short.map(widthOf));
  const besideCount = Math.min(3, Math.floor((room - longWidth) / shortWidth));
  // Short ones stand beside the long ones where there is room, else in columns below them.
  const isBeside = besideCount > 0;
  const left = isBeside ? longWidth : 0;
  const down = isBeside ? 0 : long.length;
  const count = isBeside ? besideCount : Math.max(1, Math.min(3, Math.floor(room / shortWidth)));
  const each = Math.max(1, Math.ceil(short.length / count));
  const entry = (one: Key[number], x: number, row: number): JSX.Element[] => {
    const y = top + row * 14;
    return [
      label({ x, y, text: one.sign, strong: true, fontSize: small }),
      label({ x: x + 22, y, text: one.text, fontSize: small }),
    ];
  };
  const lines = [
    ...long.flatMap((one, row) => entry(one, 12, row)),
    ...short.flatMap((one, index) => {
      const column = Math.floor(index / each);
      return entry(one, 12 + left + (column * (room - left)) / count, down + (index % each));
    }),
  ];
  const rows = Math.max(long.length, down + Math.min(short.length, each));
  return { lines, height: rows * 14 };
}

interface Setting {
  readonly words: SectionWords;
  readonly paper: string;
  readonly key: Key;
  /** Places in the space that other words stand on. */
  readonly taken: readonly LabelBox[];
}

/** Gas, breathing heights and their labels in one space. */
function spaceContents(
  view: SectionView | MomentView,
  placed: PlacedSpace,
  own: Corners,
  placement: Placement,
  setting: Setting,
): { readonly gas: JSX.Element[]; readonly heights: JSX.Element[] } {
  const { scale } = placement;
  const datumY = placement.rows[placed.row]?.datumY ?? 0;
  const gas: JSX.Element[] = [];
  const heights: JSX.Element[] = [];
  const labels: JSX.Element[] = [];
  const taken: LabelBox[] = [];
  const inner = { left: own.left + 5, right: own.right - 5 };
  const lowest = Math.max(own.floorY(own.left), own.floorY(own.right));
  const within = { ...inner, top: own.roofY + 2, bottom: lowest - 1 };
  const room = inner.right - inner.left;
  const boxed = (box: LabelBox, text: string, strong: boolean): void => {
    labels.push(
      <rect
        x={two(box.x - 2)}
        y={two(box.y - box.height / 2)}
        width={two(box.width + 4)}
        height={two(box.height)}
        fill={setting.paper}
      />,
      label({ x: box.x + box.width, y: box.y + 4, text, anchor: 'end', strong }),
    );
  };

  const layerLabels: {
    text: string;
    told: string;
    at: keyof typeof hatches;
    polygon: readonly Point[];
  }[] = [];
  for (const layer of view.layers.filter((entry) => entry.space === placed.space.id)) {
    const hatch = hatches[layer.at];
    const edge =
      layer.at === 'floor'
        ? datumY - (placed.space.floorLevelM + layer.depthM) * scale
        : own.roofY + layer.depthM * scale;
    const polygon =
      layer.at === 'whole'
        ? own.polygon
        : polygonPart(own.polygon, edge, layer.at === 'floor' ? 'below' : 'above');
    gas.push(stroke(hatchPath(polygon, hatch.angleDeg, hatch.spacing), softInk, 0.9, hatch.dash));
    if (layer.at !== 'whole') gas.push(stroke(polygonPath(polygon), softInk, 0.8));
    const depth =
      layer.at === 'whole' ? '' : `, ${lengthText(layer.depthM)}\u00a0${setting.words.deep}`;
    const amount = `${figureText(layer.gasFraction)}${depth}`;
    layerLabels.push({
      text: `${setting.words.gas}\u00a0${amount}`,
      told: `${setting.words.places[layer.at]} ${amount}`,
      at: layer.at,
      polygon,
    });
  }

  const meters = meterMarks(view, placed, own, datumY, scale, setting);
  heights.push(...meters.marks);
  taken.push(...setting.taken, ...meters.taken);

  const zones = view.zones
    .filter((zone) => zone.space === placed.space.id)
    .toSorted((one, other) => one.levelM - other.levelM);
  zones.forEach((zone, turn) => {
    const y = datumY - zone.levelM * scale;
    const value = breathedText(view, zone, setting.words);
    const full = `${zone.title}\u00a0\u00a0${value}`;
    let sign: string | undefined;
    const keyed = (): string => {
      if (sign !== undefined) return sign;
      sign = keySign(setting.key);
      const told = `${zone.title}, ${levelText(zone.levelM)}: ${setting.words.oxygen} ${value}`;
      // Without the bound where the drawing is narrow: the numbers beside it have both.
      const fits = drawnWidth(told, small) + 46 <= placement.width;
      setting.key.push({ sign, text: fits ? told : told.replace(/ \(.*/, '') });
      return sign;
    };
    let text = full;
    if (drawnWidth(full, size) > room * 0.78) {
      text = `${keyed()}\u00a0\u00a0${value.replace(/ \(.*/, '')}`;
      if (drawnWidth(text, size) > room) text = keyed();
    }
    const along = reach(own, y, scale);
    // A label never hides the line of a raked floor while there is air to stand in.
    const inAir = (at: LabelBox): boolean =>
      at.y + at.height / 2 <= Math.min(own.floorY(at.x), own.floorY(at.x + at.width));
    const wantedFor = (words: string) => ({
      y,
      width: drawnWidth(words, size),
      height: lineHeight,
    });
    const placeFor = (words: string): LabelBox | null => {
      const wanted = wantedFor(words);
      const near = {
        ...within,
        left: Math.max(inner.left, Math.min(along.left, inner.right - wanted.width)),
        right: Math.min(inner.right, Math.max(along.right, inner.left + wanted.width)),
      };
      return (
        freeBox(wanted, near, taken, 'right', inAir) ??
        freeBox(wanted, within, taken, 'right', inAir) ??
        freeBox(wanted, within, taken, 'right')
      );
    };
    let box = placeFor(text);
    // Where the number has no place of its own, the sign alone stands there and the key tells it.
    if (box === null) {
      text = keyed();
      const wanted = wantedFor(text);
      box = placeFor(text) ?? { ...wanted, x: inner.right - wanted.width };
    }
    taken.push(box);
    heights.push(stroke(segment(along.left + 2, y, along.right - 2, y), accent, 1, '6 3'));
    heights.push(...people(own, y, scale, along, turn, setting.paper));
    if (Math.abs(box.y - y) > 1) {
      const x = Math.min(box.x + box.width / 2, along.right - 4);
      const edge = box.y + (box.y < y ? 1 : -1) * (lineHeight / 2);
      heights.push(stroke(segment(x, edge, x, y), accent, 0.8));
    }
    boxed(box, text, true);
  });

  // Zones come first: their numbers decide. A gas label without a place goes to the key.
  for (const { text, told, at, polygon } of layerLabels) {
    const width = drawnWidth(text, size);
    const middle = polygon.reduce((sum, point) => sum + point.y, 0) / Math.max(1, polygon.length);
    const y = at === 'ceiling' ? own.roofY + 11 : Math.min(middle, lowest - 9);
    const box =
      width <= room ? freeBox({ y, width, height: lineHeight }, within, taken, 'left') : null;
    if (box === null) {
      setting.key.push({ sign: '', text: `${placed.space.title}: ${told}` });
    } else {
      taken.push(box);
      boxed(box, text, false);
    }
  }

  floorLabel(placed, own, { within, taken, room, boxed: labels, paper: setting.paper });
  return { gas, heights: [...heights, ...labels] };
}

/** The oxygen of a zone as it is written: that of the moment, else the lowest of the day. */
export function breathedText(
  view: SectionView | MomentView,
  zone: SectionView['zones'][number],
  words: SectionWords,
): string {
  if ('breathed' in view) return view.breathed[zone.id] ?? words.noNumber;
  if (zone.lowestOxygen === null) return words.noNumber;
  return quantityText(zone.lowestOxygen.value, zone.lowestOxygen.unit);
}

/** Meters where they hang: a small box on the right wall, named in the key. */
function meterMarks(
  view: SectionView,
  placed: PlacedSpace,
  own: Corners,
  datumY: number,
  scale: number,
  { words, paper, key }: Setting,
): { readonly marks: JSX.Element[]; readonly taken: LabelBox[] } {
  const taken: LabelBox[] = [];
  const meters = (view.meters ?? []).filter((meter) => meter.space === placed.space.id);
  const marks = meters.flatMap(({ title, levelM }, index) => {
    const number = key.filter(({ sign }) => sign.startsWith('M')).length + 1;
    const sign = `M${String(number)}`;
    key.push({ sign, text: `${words.meter}: ${title}, ${levelText(levelM)}` });
    const x = own.left + 6 + index * 30;
    const y = Math.min(datumY - levelM * scale, own.floorY(x) - 4);
    taken.push({ x: x - 4, y, width: 26, height: 12 });
    return [
      <rect
        x={two(x - 3.5)}
        y={two(y - 3.5)}
        width={7}
        height={7}
        fill={paper}
        stroke={ink}
        stroke-width={1.2}
      />,
      stroke(segment(x - 3.5, y + 3.5, x + 3.5, y - 3.5), ink, 1.2),
      <rect x={two(x + 5)} y={two(y - 6)} width={17} height={11} fill={paper} />,
      label({ x: x + 6, y: y + 3.5, text: sign, fontSize: small }),
    ];
  });
  return { marks, taken };
}

/** The level of the floor: under a pit, else inside just above the floor where there is room. */
function floorLabel(
  placed: PlacedSpace,
  own: Corners,
  at: {
    readonly within: Parameters<typeof freeBox>[1];
    readonly taken: readonly LabelBox[];
    readonly room: number;
    readonly boxed: JSX.Element[];
    readonly paper: string;
  },
): void {
  const text = `floor ${levelText(placed.space.floorLevelM)}`;
  const width = drawnWidth(text, small);
  if (width > at.room) return;
  const floor = own.floorY(own.left);
  const style = { text, fontSize: small, colour: softInk };
  if (placed.under !== null) {
    const middle = (own.left + own.right) / 2;
    at.boxed.push(label({ ...style, x: middle, y: floor + 26, anchor: 'middle' }));
    return;
  }
  const wanted = { y: floor - 8, width, height: 12 };
  // Inside a raked space a label would hide the floor line: the datum shows its level instead.
  if (Math.abs(own.floorY(own.right) - floor) > 1) return;
  const box = freeBox(wanted, at.within, at.taken, 'left', (place) => place.y === wanted.y);
  if (box === null) return;
  at.boxed.push(
    <rect
      x={two(box.x - 1)}
      y={two(box.y - 6)}
      width={two(width + 2)}
      height={12}
      fill={at.paper}
    />,
    label({ ...style, x: box.x, y: box.y + 3.5 }),
  );
}

/** a, b, ... z, aa, ab, ... in the order of appearance. */
function keySign(key: Key): string {
  const index = key.filter((entry) => /^[a-z]/.test(entry.sign)).length;
  const letter = (at: number): string => String.fromCharCode(97 + (at % 26));
  return index < 26 ? letter(index) : `${letter(Math.floor(index / 26) - 1)}${letter(index)}`;
}
