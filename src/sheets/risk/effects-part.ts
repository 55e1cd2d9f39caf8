import type { Assessment, Figure, HoldTime, SoundResult } from '../../assessment/assessment.js';
import { quantityText, spanText } from '../../assessment/figure-text.js';
import type { Block } from '../document-tree.js';
import { filledText } from '../filled-text.js';
import {
  actTitle,
  figureOnLine,
  figureOrDash,
  figureWords,
  levelWords,
  zoneTitle,
} from './figure-words.js';
import type { RiskTexts } from './risk-texts.js';

/** Size of a shift: of the note in cents, of a voice's formants in percent. */
const shiftWords = ({ cents, formantChange }: SoundResult['smallestAudible'][number]): string =>
  cents === null
    ? `${String(Math.round((formantChange ?? 0) * 100))}\u00a0%`
    : quantityText(cents, 'cents').replace('+', '');

/** What is heard, and the least gas that is still heard. */
export function soundPart(assessment: Assessment, texts: RiskTexts): Block[] {
  const words = texts.parts.sound;
  const { sound } = assessment;
  if (sound.length === 0) return [{ kind: 'paragraph', look: 'body', words: words.none }];
  const note = (value: SoundResult['note']): string =>
    value === null
      ? ''
      : filledText(words.note, { name: value.name, cents: quantityText(value.centsOff, 'cents') });
  const audible = (entry: SoundResult): string =>
    entry.smallestAudible
      .map((least) =>
        filledText(words.smallest, {
          cents: shiftWords(least),
          fraction: quantityText(least.gasFraction.value, least.gasFraction.unit),
          amount:
            least.amount === null
              ? ''
              : filledText(words.smallestAmount, {
                  amount: [least.amount, least.amountByFlushing]
                    .flatMap((figure) =>
                      figure === null ? [] : [quantityText(figure.value, figure.unit, 'up')],
                    )
                    .join(` ${words.orFlushed} `),
                }),
        }),
      )
      .join('\n');
  // Remarks are often those of several entries: each is said once, below the table.
  const scale = new Map(
    sound.flatMap((entry) =>
      entry.smallestAudible.map((least) => [
        shiftWords(least),
        filledText(words.scale, {
          cents: shiftWords(least),
          words: least.words,
        }),
      ]),
    ),
  );
  const remarks = new Set([
    ...sound.flatMap((entry) => [
      entry.words,
      ...(entry.voice === null
        ? []
        : [
            filledText(words.formants, {
              factor: figureOnLine(entry.voice.factor),
              air: entry.voice.formantsInAir.map((figure) => figureOnLine(figure)).join(', '),
              gas: entry.voice.formants.map((figure) => figureOnLine(figure)).join(', '),
            }),
          ]),
      ...entry.jet.map((answer) => answer.words),
      ...entry.remarks,
    ]),
    ...(scale.size === 0 ? [] : [[...scale.values()].join(' ')]),
    ...sound.map((entry) =>
      entry.saferWay === '' ? '' : filledText(words.safer, { words: entry.saferWay }),
    ),
  ]);
  remarks.delete('');
  return [
    {
      kind: 'table',
      caption: '',
      empty: words.none,
      columns: [
        { title: words.act, share: 2.2, align: 'left' },
        { title: words.instrument, share: 0.9, align: 'left' },
        { title: words.air, share: 1.1, align: 'right' },
        { title: words.gas, share: 2.3, align: 'right' },
        { title: words.shift, share: 1.3, align: 'right' },
        { title: words.least, share: 2.6, align: 'left' },
      ],
      rows: sound.map((entry) => ({
        cells: [
          entry.title,
          entry.instrument,
          `${figureOrDash(entry.frequencyInAir)}${note(entry.noteInAir)}`,
          entry.frequency === null
            ? '–'
            : `${quantityText(entry.frequency.value, entry.frequency.unit)}${note(entry.note)}${spanWords(entry.frequency)}`,
          entry.cents === null ? '–' : figureOnLine(entry.cents),
          audible(entry),
        ],
      })),
    },
    { kind: 'list', look: 'note', items: [...remarks], empty: words.none },
  ];
}

const spanWords = (figure: Figure): string => {
  const span = spanText(figure);
  return span === undefined ? '' : ` (${span})`;
};

type Amounts = [Assessment['largestAmounts'][number], ...Assessment['largestAmounts'][number][]];

/** Largest amounts that are the same and limited alike, told together. */
function largestAlike({ largestAmounts }: Assessment): Amounts[] {
  const groups = new Map<string, Amounts>();
  for (const amount of largestAmounts) {
    const { zone, limitedBy, mass, volume } = amount;
    const key = JSON.stringify([zone, limitedBy, mass.value, volume.value]);
    const known = groups.get(key);
    if (known === undefined) groups.set(key, [amount]);
    else known.push(amount);
  }
  return [...groups.values()];
}

type Holds = [HoldTime, ...HoldTime[]];

/** Hold times with the same time and remark, told together. */
function holdsAlike({ holdTimes }: Assessment): Holds[] {
  const groups = new Map<string, Holds>();
  for (const hold of holdTimes) {
    const key = JSON.stringify([hold.time?.value ?? null, hold.words]);
    const known = groups.get(key);
    if (known === undefined) groups.set(key, [hold]);
    else known.push(hold);
  }
  return [...groups.values()];
}

/** Largest amounts that pass, how long to wait, and the greenhouse effect where it counts. */
export function amountsPart(assessment: Assessment, texts: RiskTexts): Block[] {
  const words = texts.parts.amounts;
  const { climate } = assessment;
  // One remark on every hold time is said once, below them.
  const remarks = new Set(assessment.holdTimes.map((hold) => hold.words));
  const [onlyRemark = ''] = remarks;
  const sharedRemark = remarks.size === 1 && assessment.holdTimes.length > 1 ? onlyRemark : null;
  const titles = new Map(
    assessment.zones.flatMap((zone) =>
      zone.quantities.map((entry) => [entry.quantity, entry.quantityTitle]),
    ),
  );
  return [
    {
      kind: 'table',
      caption: words.largestCaption,
      empty: words.noLargest,
      columns: [
        { title: words.act, share: 5.4, align: 'left' },
        { title: words.gas, share: 1.1, align: 'left' },
        { title: words.limitedBy, share: 4, align: 'left' },
        { title: words.mass, share: 0.9, align: 'right' },
        { title: words.volume, share: 0.9, align: 'right' },
      ],
      rows: largestAlike(assessment).map(([entry, ...more]) => ({
        cells: [
          [entry, ...more]
            .map((one) =>
              filledText(words.actPlanned, {
                act: actTitle(assessment, one.act),
                planned: figureOnLine(one.planned),
              }),
            )
            .join('; '),
          [...new Set([entry, ...more].flatMap((one) => one.gas.split(', ')))].join(', '),
          `${zoneTitle(assessment, entry.zone)}: ${entry.limitedBy}`,
          figureWords(entry.mass, 'down'),
          figureWords(entry.volume, 'down'),
        ],
      })),
    },
    {
      kind: 'table',
      caption: words.holdCaption,
      empty: words.noHold,
      columns: [
        { title: words.space, share: 1.4, align: 'left' },
        { title: words.toLevel, share: 2, align: 'left' },
        { title: words.time, share: 1, align: 'right' },
        ...(sharedRemark === null
          ? [{ title: words.words, share: 5.6, align: 'left' } as const]
          : []),
      ],
      rows: holdsAlike(assessment).map(([hold, ...more]) => ({
        cells: [
          [...new Set([hold, ...more].map((one) => one.spaceTitle))].join(', '),
          [
            ...new Set(
              [hold, ...more].map(
                (one) => `${titles.get(one.quantity) ?? one.quantity} ${levelWords(one.toLevel)}`,
              ),
            ),
          ].join(', '),
          hold.time === null ? words.noTime : figureWords(hold.time),
          ...(sharedRemark === null ? [hold.words] : []),
        ],
      })),
    },
    ...(sharedRemark === null
      ? []
      : [{ kind: 'paragraph', look: 'note', words: sharedRemark } as const]),
    ...(climate === null
      ? []
      : [
          {
            kind: 'paragraph',
            look: 'note',
            words: filledText(words.climate, {
              instrument: climate.instrument,
              planned: quantityText(climate.planned.value, climate.planned.unit, 'up'),
              worst: quantityText(climate.worstCredible.value, climate.worstCredible.unit, 'up'),
            }),
          } as const,
        ]),
  ];
}
