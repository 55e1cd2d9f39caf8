import type { ActResult, Assessment, ReleaseLine } from '../../assessment/assessment.js';
import { quantityText } from '../../assessment/figure-text.js';
import type { Block, TableRow } from '../document-tree.js';
import { filledText } from '../filled-text.js';
import { figureOnLine } from './figure-words.js';
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
        { title: words.act, share: 2.6, align: 'left' },
        { title: words.planned, share: 3.6, align: 'left' },
        { title: words.worst, share: 3.6, align: 'left' },
      ],
      rows: assessment.acts.map((act) => actRow(act, texts)),
    },
    {
      kind: 'table',
      caption: words.spacesCaption,
      empty: words.none,
      columns: [
        { title: words.space, share: 3, align: 'left' },
        { title: words.freeVolume, share: 1.2, align: 'right' },
        { title: words.freshAir, share: 2, align: 'right' },
        { title: texts.parts.decision.asFiled, share: 1.9, align: 'left' },
        { title: texts.parts.decision.withControls, share: 2, align: 'left' },
      ],
      rows: assessment.spaces.map((space) => ({
        cells: [
          space.title,
          figureOnLine(space.volume),
          figureOnLine(space.freshAir),
          texts.decisions[space.decision.asFiled],
          texts.decisions[space.decision.withControls],
        ],
      })),
    },
  ];
}

/** Releases alike but for a number at the end of their titles, such as a session, in one line. */
function repeatsTogether(lines: readonly ReleaseLine[], texts: RiskTexts): ReleaseLine[] {
  const groups = new Map<string, ReleaseLine[]>();
  for (const line of lines) {
    const title = line.title.replace(/\s*\d+$/, '');
    const { gas, mass, volume, durationS } = line;
    const key = JSON.stringify([title, gas, mass.value, volume.value, durationS]);
    groups.set(key, [...(groups.get(key) ?? []), line]);
  }
  return [...groups.values()].flatMap((alike) => {
    const [first] = alike;
    if (first === undefined) return [];
    if (alike.length === 1) return [first];
    const title = first.title.replace(/,?(\s+\p{L}+)?\s*\d+$/u, '');
    const number = String(alike.length);
    return [{ ...first, title: filledText(texts.parts.acts.times, { number, title }) }];
  });
}

function actRow(act: ActResult, texts: RiskTexts): TableRow {
  const words = texts.parts.acts;
  const title = [
    { text: `${act.title}\n`, strong: true as const },
    {
      text: filledText(
        act.decision.asFiled === act.decision.withControls ? words.in : words.inChanged,
        {
          space: act.spaceTitle,
          asFiled: texts.decisions[act.decision.asFiled],
          withControls: texts.decisions[act.decision.withControls],
        },
      ),
    },
  ];
  return {
    cells: [title, releaseWords(act.planned, texts), releaseWords(act.worstCredible, texts)],
  };
}

/** Releases under each other, each with its gas, amount and how fast it comes. */
function releaseWords(lines: readonly ReleaseLine[], texts: RiskTexts): string {
  const words = texts.parts.acts;
  if (lines.length === 0) return words.none;
  return repeatsTogether(lines, texts)
    .map((line) =>
      filledText(words.line, {
        title: line.title,
        gas: line.gas,
        mass: figureOnLine(line.mass),
        volume: figureOnLine(line.volume),
        over:
          line.durationS === 0
            ? words.atOnce
            : filledText(words.over, { time: quantityText(line.durationS, 's') }),
      }),
    )
    .join('\n');
}
