import type {
  Answer,
  Assessment,
  CaseName,
  Figure,
  ZoneQuantity,
  ZoneResult,
} from '../../assessment/assessment.js';
import { clockText } from '../../assessment/clock-text.js';
import { quantityText } from '../../assessment/figure-text.js';
import { lengthText } from '../../web/section/level-text.js';
import type { Block, Table, TableRow } from '../document-tree.js';
import { filledText } from '../filled-text.js';
import { levelWords } from './figure-words.js';
import type { RiskTexts } from './risk-texts.js';
import {
  floorChecks,
  gravestStanding,
  isLowBad,
  zoneGroups,
  type ZoneGroup,
} from './zone-groups.js';

/** What people breathe: declared heights, the floor, the levels, and when one is passed. */
export function zonesPart(assessment: Assessment, texts: RiskTexts): Block[] {
  const words = texts.parts.zones;
  const { zones } = assessment;
  const groups = zoneGroups(zones);
  const floors = floorChecks(zones);
  const remarks = [
    ...notComputed(zones, texts),
    ...leftOut([...groups, ...floors], texts),
    ...floorNote(floors, texts),
  ];
  return [
    { kind: 'paragraph', look: 'small', words: words.intro, keepWithNext: true },
    answerTable(groups, words.caption, words.zone, texts, (group) => [
      {
        text: `${group.zones.map((zone) => zone.title).join('; ')}\n`,
        strong: true,
      },
      {
        text: filledText(words.where, {
          space: group.first.spaceTitle,
          height: lengthText(group.first.heightM),
        }),
      },
    ]),
    ...(remarks.length === 0
      ? []
      : [{ kind: 'list', look: 'note', items: remarks, empty: words.none } as const]),
    levelTable(zones, texts),
    ...crossingBlocks(assessment, groups, texts),
  ];
}

/** The check near the floor, with its numbers. */
export function floorPart(assessment: Assessment, texts: RiskTexts): Block[] {
  const words = texts.parts.zones;
  const groups = zoneGroups(assessment.zones);
  const floors = floorChecks(assessment.zones);
  if (groups.length + floors.length === 0) {
    return [{ kind: 'paragraph', look: 'body', words: texts.parts.floor.none }];
  }
  return [
    answerTable(
      groups,
      texts.parts.floor.caption,
      words.zone,
      texts,
      (group) => [{ text: group.zones.map((zone) => zone.title).join('; '), strong: true }],
      ['planned', 'fansOff'],
    ),
    answerTable(floors, words.floorCaption, words.floorSpace, texts, (group) => [
      { text: group.first.spaceTitle, strong: true },
    ]),
  ];
}

/** How each space stands near its floor, in a line. */
function floorNote(floors: readonly ZoneGroup[], texts: RiskTexts): string[] {
  if (floors.length === 0) return [];
  const byStanding = new Map<string, string[]>();
  for (const { first, quantities } of floors) {
    const standing = texts.standings[gravestStanding(quantities)];
    byStanding.set(standing, [...(byStanding.get(standing) ?? []), first.spaceTitle]);
  }
  const spaces = [...byStanding].map(([standing, names]) => `${names.join(', ')} ${standing}`);
  return [filledText(texts.parts.zones.floorNote, { spaces: spaces.join('; ') })];
}

/** Zones without a number, those for the same reason together. */
function notComputed(zones: readonly ZoneResult[], texts: RiskTexts): string[] {
  const byReason = new Map<string, string[]>();
  for (const zone of zones) {
    if (zone.notComputed === null) continue;
    byReason.set(zone.notComputed, [...(byReason.get(zone.notComputed) ?? []), zone.title]);
  }
  return [...byReason].map(([reason, titles]) =>
    filledText(texts.parts.zones.notComputed, { zone: titles.join('; '), words: reason }),
  );
}

const shownCases: readonly CaseName[] = ['planned', 'worstCredible'];

/** Quantities of a group in their order, each with its entry in every case. */
function byQuantity(group: ZoneGroup): Map<string, Partial<Record<CaseName, ZoneQuantity>>> {
  const found = new Map<string, Partial<Record<CaseName, ZoneQuantity>>>();
  for (const entry of group.quantities) {
    found.set(entry.quantity, { ...found.get(entry.quantity), [entry.caseName]: entry });
  }
  return found;
}

/** Anything but oxygen is left out where every answer of every case meets its aim. */
function isLeftOut(quantity: string, entries: Partial<Record<CaseName, ZoneQuantity>>): boolean {
  if (isLowBad(quantity)) return false;
  return Object.values(entries).every(({ answers, levels, standing }) => {
    const level = levels.aim ?? levels.limit;
    return (
      level !== null &&
      standing === 'meets aim' &&
      Object.values(answers).every((figure) => figure.value <= level.value)
    );
  });
}

/** One line for each quantity left out somewhere, with the highest number it reached there. */
function leftOut(groups: readonly ZoneGroup[], texts: RiskTexts): string[] {
  const words = texts.parts.zones;
  const lines = new Map<string, { entry: ZoneQuantity; figure: Figure; group: ZoneGroup }>();
  let rows = 0;
  for (const group of groups) {
    for (const [quantity, entries] of byQuantity(group)) {
      rows += 1;
      if (!isLeftOut(quantity, entries)) continue;
      for (const entry of Object.values(entries)) {
        for (const figure of Object.values(entry.answers)) {
          const known = lines.get(quantity);
          if (known === undefined || figure.value > known.figure.value) {
            lines.set(quantity, { entry, figure, group });
          }
        }
      }
    }
  }
  if (rows === 0) return [];
  return [...lines.values()].map(({ entry, figure, group }) =>
    filledText(words.leftOut, {
      quantity: entry.quantityTitle,
      highest: numberWords(figure, entry.quantity),
      zone: group.first.title,
      aim: levelWords(entry.levels.aim ?? entry.levels.limit ?? figure),
    }),
  );
}

/** A number rounded towards the side that harms: only the lack of oxygen is rounded down. */
const numberWords = (figure: Figure, quantity: string): string =>
  quantityText(figure.value, figure.unit, isLowBad(quantity) ? 'down' : 'up');

function answerTable(
  groups: readonly ZoneGroup[],
  caption: string,
  head: string,
  texts: RiskTexts,
  title: (group: ZoneGroup) => TableRow['cells'][number],
  cases: readonly CaseName[] = shownCases,
): Table {
  const words = texts.parts.zones;
  const answers = (['mixed', 'layered', 'bound'] as const).filter(
    (answer) =>
      answer !== 'layered' ||
      groups.some((group) => group.quantities.some((entry) => entry.answers.layered !== undefined)),
  );
  const rows = groups.flatMap((group) =>
    [...byQuantity(group)]
      .filter(([quantity, entries]) => !isLeftOut(quantity, entries))
      .map(([quantity, entries], index): TableRow => {
        const cells = [
          index === 0 ? title(group) : '',
          Object.values(entries)[0]?.quantityTitle ?? quantity,
          ...cases.flatMap((caseName) =>
            answers.map((answer) => answerWords(entries[caseName], answer, texts)),
          ),
          ...cases.map((caseName) => standingWords(entries[caseName], texts)),
        ];
        return index === 0 ? { cells } : { cells, continues: true };
      }),
  );
  const number = (name: string) => ({ title: name, share: 1, align: 'right' as const });
  return {
    kind: 'table',
    caption,
    columns: [
      { title: head, share: 2.8, align: 'left' },
      { title: words.quantity, share: 1.5, align: 'left' },
      ...cases.flatMap((caseName) => answers.map((answer) => number(words[caseName][answer]))),
      ...cases.map((caseName) => ({
        title: words.stands[caseName],
        share: 1.2,
        align: 'left' as const,
      })),
    ],
    rows,
    empty: words.none,
  };
}

/** An answer; below the mixed one its oxygen pressure, below the layered one a differing median. */
function answerWords(entry: ZoneQuantity | undefined, answer: Answer, texts: RiskTexts): string {
  const figure = entry?.answers[answer];
  if (entry === undefined || figure === undefined) return '–';
  const value = numberWords(figure, entry.quantity);
  if (answer === 'mixed' && entry.partialPressure !== undefined) {
    const { value: pressure, unit } = entry.partialPressure;
    return `${value}\n${quantityText(pressure, unit, 'down')}`;
  }
  const middle = entry.answers.layeredP50;
  if (answer !== 'layered' || middle === undefined) return value;
  const median = numberWords(middle, entry.quantity);
  return median === value
    ? value
    : `${value}\n${filledText(texts.parts.zones.median, { value: median })}`;
}

const standingWords = (entry: ZoneQuantity | undefined, texts: RiskTexts): string =>
  entry === undefined ? '–' : texts.standings[entry.standing];

/** Each different set of levels once, with all whom it is for and where it comes from. */
function levelTable(zones: readonly ZoneResult[], texts: RiskTexts): Table {
  const words = texts.parts.zones;
  interface LevelSet {
    readonly title: string;
    readonly kinds: Set<string>;
    readonly levels: readonly string[];
    readonly sources: readonly string[];
  }
  const sets = new Map<string, LevelSet>();
  for (const zone of zones) {
    for (const { quantityTitle: title, levels: of } of zone.quantities) {
      const all = [of.aim, of.limit, of.never];
      const known = all.flatMap((figure) => figure ?? []);
      if (known.length === 0) continue;
      const levels = all.map((figure) => (figure === null ? '–' : levelWords(figure)));
      const sources = known.map((figure) => figure.source);
      const key = [title, ...levels].join('\n');
      const set = sets.get(key) ?? { title, kinds: new Set(), levels, sources };
      if (zone.kind !== 'floorLevelCheck') set.kinds.add(words.kinds[zone.kind]);
      sets.set(key, set);
    }
  }
  return {
    kind: 'table',
    caption: words.levelsCaption,
    columns: [
      { title: words.levelSource, share: 6, align: 'left' },
      { title: words.kind, share: 0.9, align: 'left' },
      { title: texts.levels.aim, share: 0.8, align: 'right' },
      { title: texts.levels.limit, share: 0.8, align: 'right' },
      { title: texts.levels.never, share: 0.8, align: 'right' },
    ],
    rows: [...sets.values()].flatMap((set, index, all) => {
      // The sets of one quantity stand together, with all their sources once.
      const same = all.filter(({ title }) => title === set.title);
      if (all.findIndex(({ title }) => title === set.title) !== index) return [];
      const sources = [...new Set(same.flatMap((entry) => entry.sources))].join('; ');
      return same.map(({ title, kinds, levels }, row): TableRow => ({
        cells: [
          row === 0 ? [{ text: `${title}\n`, strong: true }, { text: sources }] : '',
          [...kinds].join(', '),
          ...levels,
        ],
        ...(row === 0 ? {} : { continues: true }),
      }));
    }),
    empty: words.none,
  };
}

interface Passing {
  readonly at: Figure;
  readonly quantityTitle: string;
  readonly answer: Answer;
}

/** The earliest passing of a level in the worst credible case, whatever quantity and answer. */
function earliest(group: ZoneGroup, level: 'limit' | 'never'): Passing | null {
  const passings = group.quantities
    .filter((entry) => entry.caseName === 'worstCredible')
    .flatMap(({ crossings, quantityTitle }) =>
      crossings
        .filter((crossing) => crossing.level === level)
        .map(({ at, answer }): Passing => ({ at, quantityTitle, answer })),
    );
  const [first = null] = passings.toSorted((one, other) => one.at.value - other.at.value);
  return first;
}

/** When the worst credible case passes Limit and Never, beside the practised escape time. */
function crossingBlocks(
  assessment: Assessment,
  groups: readonly ZoneGroup[],
  texts: RiskTexts,
): Block[] {
  const words = texts.parts.zones;
  const escape = assessment.assumptions.find((entry) => entry.path === '/event/escapeTimeS');
  const cells = (passing: Passing | null): string[] =>
    passing === null
      ? [words.notPassed, '–']
      : [
          clockText(passing.at.value, 'seconds'),
          `${passing.quantityTitle}, ${texts.answers[passing.answer]}`,
        ];
  // Zones that pass at the same times share a row.
  const titles = new Map<string, { title: string[]; passed: string[] }>();
  for (const group of groups) {
    const limit = earliest(group, 'limit');
    const never = earliest(group, 'never');
    if (limit === null && never === null) continue;
    const passed = [...cells(limit), ...cells(never)];
    const key = passed.join('\n');
    const row = titles.get(key) ?? { title: [], passed };
    row.title.push(...group.zones.map((zone) => zone.title));
    titles.set(key, row);
  }
  const rows = [...titles.values()].map(({ title, passed }) => ({
    cells: [title.join('; '), ...passed],
  }));
  return [
    ...(rows.length === 0
      ? []
      : [
          {
            kind: 'paragraph',
            look: 'note',
            keepWithNext: true,
            words:
              escape?.figure == null
                ? words.escapeByHand
                : filledText(words.escape, {
                    time: quantityText(escape.figure.value, escape.figure.unit),
                    origin: texts.origins[escape.origin],
                  }),
          } as const,
        ]),
    {
      kind: 'table',
      caption: words.crossingsCaption,
      columns: [
        { title: words.zone, share: 2.6, align: 'left' },
        { title: words.limitAt, share: 0.8, align: 'right' },
        { title: words.by, share: 2.6, align: 'left' },
        { title: words.neverAt, share: 0.8, align: 'right' },
        { title: words.by, share: 2.6, align: 'left' },
      ],
      rows,
      empty: words.noCrossings,
    },
  ];
}
