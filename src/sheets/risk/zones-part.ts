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
    { kind: 'paragraph', look: 'small', words: words.intro, keepWithNext: true },
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

/** Each different set of levels once, with all whom it is for. */
function levelTable(zones: readonly ZoneResult[], texts: RiskTexts): Table {
  const words = texts.parts.zones;
  const sets = new Map<string, { title: string; kinds: Set<string>; levels: string[] }>();
  for (const zone of zones) {
    for (const { quantityTitle: title, levels: of } of zone.quantities) {
      if (of.aim === null && of.limit === null && of.never === null) continue;
      const levels = [of.aim, of.limit, of.never].map((figure) =>
        figure === null ? '–' : levelWords(figure),
      );
      const key = [title, ...levels].join('\n');
      const set = sets.get(key) ?? { title, kinds: new Set(), levels };
      set.kinds.add(words.kinds[zone.kind]);
      sets.set(key, set);
    }
  }
  const rows = [...sets.values()].map(({ title, kinds, levels }) => ({
    cells: [title, [...kinds].join(', '), ...levels],
  }));
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
    rows,
    empty: words.none,
  };
}

function crossingTable(zones: readonly ZoneResult[], texts: RiskTexts): Table {
  const words = texts.parts.zones;
  return {
    kind: 'table',
    caption: words.crossingsCaption,
    columns: [
      { title: texts.parts.amounts.zone, share: 2.6, align: 'left' },
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
