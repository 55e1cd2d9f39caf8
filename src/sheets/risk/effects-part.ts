import type { Assessment, SoundResult } from '../../assessment/assessment.js';
import { quantityText } from '../../web/format/figure-text.js';
import type { Block } from '../document-tree.js';
import { filledText } from '../filled-text.js';
import { actTitle, figureOrDash, figureWords, levelWords, zoneTitle } from './figure-words.js';
import type { RiskTexts } from './risk-texts.js';

/** What is heard, and the least gas that is still heard. */
export function soundPart(assessment: Assessment, texts: RiskTexts): Block[] {
  const words = texts.parts.sound;
  const { sound } = assessment;
  if (sound.length === 0) return [{ kind: 'paragraph', look: 'body', words: words.none }];
  const note = (value: SoundResult['note']): string =>
    value === null
      ? ''
      : `\n${filledText(words.note, { name: value.name, cents: quantityText(value.centsOff, 'cents') })}`;
  const lines = sound.flatMap((entry) => [
    ...entry.smallestAudible.map((least) =>
      filledText(words.smallest, {
        act: entry.title,
        words: least.words,
        fraction: quantityText(least.gasFraction.value, least.gasFraction.unit),
        amount:
          least.amount === null
            ? ''
            : filledText(words.smallestAmount, {
                amount: quantityText(least.amount.value, least.amount.unit),
              }),
      }),
    ),
    ...(entry.saferWay === ''
      ? []
      : [filledText(words.safer, { act: entry.title, words: entry.saferWay })]),
  ]);
  return [
    {
      kind: 'table',
      caption: '',
      empty: words.none,
      columns: [
        { title: words.act, share: 2.2, align: 'left' },
        { title: words.instrument, share: 1.6, align: 'left' },
        { title: words.air, share: 1.5, align: 'right' },
        { title: words.gas, share: 1.5, align: 'right' },
        { title: words.shift, share: 1.2, align: 'right' },
        { title: words.words, share: 3, align: 'left' },
      ],
      rows: sound.map((entry) => ({
        cells: [
          entry.title,
          entry.instrument,
          `${figureOrDash(entry.frequencyInAir)}${note(entry.noteInAir)}`,
          `${figureOrDash(entry.frequency)}${note(entry.note)}`,
          figureOrDash(entry.cents),
          entry.words,
        ],
      })),
    },
    ...(lines.length === 0 ? [] : [{ kind: 'list', items: lines, empty: words.none } as const]),
  ];
}

/** Largest amounts that pass, how long to wait, and the greenhouse effect where it counts. */
export function amountsPart(assessment: Assessment, texts: RiskTexts): Block[] {
  const words = texts.parts.amounts;
  const { climate } = assessment;
  return [
    {
      kind: 'table',
      caption: words.largestCaption,
      empty: words.noLargest,
      columns: [
        { title: words.act, share: 2.4, align: 'left' },
        { title: words.gas, share: 0.7, align: 'left' },
        { title: words.zone, share: 2, align: 'left' },
        { title: words.limitedBy, share: 2.2, align: 'left' },
        { title: words.mass, share: 1.1, align: 'right' },
        { title: words.volume, share: 1.1, align: 'right' },
        { title: words.planned, share: 1.1, align: 'right' },
      ],
      rows: assessment.largestAmounts.map((entry) => ({
        cells: [
          actTitle(assessment, entry.act),
          entry.gas,
          zoneTitle(assessment, entry.zone),
          entry.limitedBy,
          figureWords(entry.mass, 'down'),
          figureWords(entry.volume, 'down'),
          figureWords(entry.planned),
        ],
      })),
    },
    {
      kind: 'table',
      caption: words.holdCaption,
      empty: words.noHold,
      columns: [
        { title: words.space, share: 2, align: 'left' },
        { title: words.quantity, share: 1.6, align: 'left' },
        { title: words.toLevel, share: 1, align: 'right' },
        { title: words.time, share: 1.2, align: 'right' },
        { title: words.words, share: 4, align: 'left' },
      ],
      rows: assessment.holdTimes.map((hold) => ({
        cells: [
          hold.spaceTitle,
          hold.quantity,
          levelWords(hold.toLevel),
          hold.time === null ? words.noTime : figureWords(hold.time),
          hold.words,
        ],
      })),
    },
    ...(climate === null
      ? []
      : [
          {
            kind: 'paragraph',
            look: 'body',
            words: filledText(words.climate, {
              instrument: climate.instrument,
              planned: quantityText(climate.planned.value, climate.planned.unit, 'up'),
              worst: quantityText(climate.worstCredible.value, climate.worstCredible.unit, 'up'),
            }),
          } as const,
        ]),
  ];
}
