import type {
  Assessment,
  CaseName,
  ZoneQuantity,
  ZoneResult,
} from '../../assessment/assessment.js';
import { clockText } from '../../web/charts/zone-curve.js';
import { lengthText } from '../../web/section/level-text.js';
import type { Block, Column, Table, TableRow } from '../document-tree.js';
import { filledText } from '../filled-text.js';
import { figureOrDash, levelWords } from './figure-words.js';
import type { RiskTexts } from './risk-texts.js';

const cases: readonly CaseName[] = ['planned', 'worstCredible', 'fansOff'];

/** Every breathing zone in every case, the levels, and when a level is passed. */
export function zonesPart(assessment: Assessment, texts: RiskTexts): Block[] {
  const words = texts.parts.zones;
  const { zones } = assessment;
  const used = cases.filter((caseName) =>
    zones.some((zone) => zone.quantities.some((entry) => entry.caseName === caseName)),
  );
  const notComputed = zones.flatMap((zone) =>
    zone.notComputed === null
      ? []
      : [filledText(words.notComputed, { zone: zone.title, words: zone.notComputed })],
  );
  return [
    { kind: 'paragraph', look: 'small', words: words.intro },
    ...(used.length === 0
      ? [{ kind: 'paragraph', look: 'body', words: words.none } as const]
      : used.map((caseName) => caseTable(zones, caseName, texts))),
    ...(notComputed.length === 0
      ? []
      : [{ kind: 'list', items: notComputed, empty: words.none } as const]),
    levelTable(zones, texts),
    crossingTable(zones, texts),
  ];
}

/** The zones of one case; columns for the layered answer only when it exists. */
function caseTable(zones: readonly ZoneResult[], caseName: CaseName, texts: RiskTexts): Table {
  const words = texts.parts.zones;
  const entries = zones.flatMap((zone) =>
    zone.quantities.filter((entry) => entry.caseName === caseName),
  );
  const answers = (['mixed', 'layered', 'layeredP50', 'bound'] as const).filter((answer) =>
    entries.some((entry) => entry.answers[answer] !== undefined),
  );
  const withPressure = entries.some((entry) => entry.partialPressure !== undefined);
  const columns: Column[] = [
    { title: words.zone, share: 2.9, align: 'left' },
    { title: words.quantity, share: 1.5, align: 'left' },
    ...answers.map((answer) => ({ title: words[answer], share: 1.25, align: 'right' as const })),
    ...(withPressure ? [{ title: words.pressure, share: 1.15, align: 'right' as const }] : []),
    { title: words.standing, share: 1.9, align: 'left' },
  ];
  const cellsOf = (entry: ZoneQuantity): string[] => [
    entry.quantityTitle,
    ...answers.map((answer) => figureOrDash(entry.answers[answer])),
    ...(withPressure ? [figureOrDash(entry.partialPressure, 'down')] : []),
    texts.standings[entry.standing],
  ];
  const rows = zones.flatMap((zone) => {
    const where = filledText(words.where, {
      space: zone.spaceTitle,
      height: lengthText(zone.heightM),
    });
    return zone.quantities
      .filter((entry) => entry.caseName === caseName)
      .map((entry, index): TableRow => {
        const title = [{ text: `${zone.title}\n`, strong: true as const }, { text: where }];
        return index === 0
          ? { cells: [title, ...cellsOf(entry)] }
          : { cells: ['', ...cellsOf(entry)], continues: true };
      });
  });
  const caption = filledText(words.caption, { case: texts.cases[caseName] });
  return { kind: 'table', caption, columns, rows, empty: words.none };
}

/** Each different set of levels once. */
function levelTable(zones: readonly ZoneResult[], texts: RiskTexts): Table {
  const words = texts.parts.zones;
  const rows = new Map<string, TableRow>();
  for (const zone of zones) {
    for (const { quantityTitle, levels } of zone.quantities) {
      if (levels.aim === null && levels.limit === null && levels.never === null) continue;
      const cells = [
        quantityTitle,
        words.kinds[zone.kind],
        ...(['aim', 'limit', 'never'] as const).map((name) => {
          const figure = levels[name];
          return figure === null ? '–' : levelWords(figure);
        }),
      ];
      rows.set(cells.join('\n'), { cells });
    }
  }
  return {
    kind: 'table',
    caption: words.levelsCaption,
    columns: [
      { title: words.quantity, share: 2, align: 'left' },
      { title: words.kind, share: 2, align: 'left' },
      { title: texts.levels.aim, share: 1, align: 'right' },
      { title: texts.levels.limit, share: 1, align: 'right' },
      { title: texts.levels.never, share: 1, align: 'right' },
    ],
    rows: [...rows.values()],
    empty: words.none,
  };
}

function crossingTable(zones: readonly ZoneResult[], texts: RiskTexts): Table {
  const words = texts.parts.zones;
  return {
    kind: 'table',
    caption: words.crossingsCaption,
    columns: [
      { title: words.zone, share: 2.6, align: 'left' },
      { title: texts.parts.acts.case, share: 1.5, align: 'left' },
      { title: words.quantity, share: 1.5, align: 'left' },
      { title: words.answer, share: 1.6, align: 'left' },
      { title: words.level, share: 0.8, align: 'left' },
      { title: words.at, share: 0.7, align: 'right' },
    ],
    rows: zones.flatMap((zone) =>
      zone.quantities.flatMap((entry) =>
        entry.crossings.map((crossing) => ({
          cells: [
            zone.title,
            texts.cases[entry.caseName],
            entry.quantityTitle,
            texts.answers[crossing.answer],
            texts.levels[crossing.level],
            clockText(crossing.at.value),
          ],
        })),
      ),
    ),
    empty: words.noCrossings,
  };
}
