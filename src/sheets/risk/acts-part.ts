import type { ActResult, Assessment, ReleaseLine } from '../../assessment/assessment.js';
import { quantityText } from '../../web/format/figure-text.js';
import type { Block, TableRow } from '../document-tree.js';
import { filledText } from '../filled-text.js';
import { figureWords } from './figure-words.js';
import type { RiskTexts } from './risk-texts.js';

/** What is released in each act, planned and worst credible, and the word for act and space. */
export function actsPart(assessment: Assessment, texts: RiskTexts): Block[] {
  const words = texts.parts.acts;
  return [
    { kind: 'paragraph', look: 'small', words: words.intro, keepWithNext: true },
    {
      kind: 'table',
      caption: words.caption,
      empty: words.none,
      columns: [
        { title: words.act, share: 2.5, align: 'left' },
        { title: words.case, share: 1.2, align: 'left' },
        { title: words.release, share: 2.5, align: 'left' },
        { title: words.gas, share: 0.7, align: 'left' },
        { title: words.mass, share: 1.1, align: 'right' },
        { title: words.volume, share: 1.1, align: 'right' },
        { title: words.over, share: 1.1, align: 'right' },
      ],
      rows: assessment.acts.flatMap((act) => actRows(act, texts)),
    },
    {
      kind: 'table',
      caption: words.wordsCaption,
      empty: words.none,
      columns: [
        { title: words.what, share: 3, align: 'left' },
        { title: texts.parts.decision.asFiled, share: 2, align: 'left' },
        { title: texts.parts.decision.withControls, share: 2, align: 'left' },
      ],
      rows: [
        ...assessment.acts.map((act) => wordRow(act.title, act.decision, texts)),
        ...assessment.spaces.map((space) =>
          wordRow(filledText(words.space, { space: space.title }), space.decision, texts),
        ),
      ],
    },
    ...(assessment.spaces.length === 0
      ? []
      : [
          { kind: 'heading', level: 3, words: words.spacesCaption } as const,
          {
            kind: 'list',
            empty: words.none,
            items: assessment.spaces.map((space) =>
              filledText(words.spaceFacts, {
                space: space.title,
                volume: figureWords(space.volume).replaceAll('\n', ' '),
                freshAir: figureWords(space.freshAir).replaceAll('\n', ' '),
              }),
            ),
          } as const,
        ]),
  ];
}

function wordRow(what: string, pair: ActResult['decision'], texts: RiskTexts): TableRow {
  return {
    cells: [what, texts.decisions[pair.asFiled], texts.decisions[pair.withControls]],
  };
}

function actRows(act: ActResult, texts: RiskTexts): TableRow[] {
  const words = texts.parts.acts;
  const lines: { caseName: 'planned' | 'worstCredible'; line: ReleaseLine }[] = [
    ...act.planned.map((line) => ({ caseName: 'planned' as const, line })),
    ...act.worstCredible.map((line) => ({ caseName: 'worstCredible' as const, line })),
  ];
  const title = [
    { text: `${act.title}\n`, strong: true as const },
    { text: filledText(words.in, { space: act.spaceTitle }) },
  ];
  if (lines.length === 0) return [{ cells: [title, '–', words.none, '–', '–', '–', '–'] }];
  return lines.map(({ caseName, line }, index) => ({
    cells: [
      index === 0 ? title : '',
      texts.cases[caseName],
      line.title,
      line.gas,
      figureWords(line.mass),
      figureWords(line.volume),
      line.durationS === 0 ? words.atOnce : quantityText(line.durationS, 's'),
    ],
    ...(index === 0 ? {} : { continues: true as const }),
  }));
}
