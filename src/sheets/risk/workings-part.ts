import type { Assessment, Figure } from '../../assessment/assessment.js';
import { driverGroups } from '../../assessment/driver-groups.js';
import { quantityText } from '../../assessment/figure-text.js';
import type { Block, TableRow } from '../document-tree.js';
import { filledText } from '../filled-text.js';
import { figureOnLine, levelWords } from './figure-words.js';
import type { RiskTexts } from './risk-texts.js';

/** The number that decides with its formula and every input, so that it can be redone by hand. */
export function numberPart(assessment: Assessment, texts: RiskTexts): Block[] {
  const words = texts.parts.number;
  const { governing } = assessment;
  if (governing === null) return [{ kind: 'paragraph', look: 'body', words: words.nothing }];
  const { figure, limit } = governing;
  return [
    {
      kind: 'table',
      caption: words.caption,
      empty: words.nothing,
      columns: [
        { title: words.name, share: 1.6, align: 'left' },
        { title: words.value, share: 6, align: 'left' },
      ],
      rows: [
        row(
          `${governing.quantity}, ${governing.zoneTitle}`,
          `${figureOnLine(figure)}, ${texts.answers[governing.answer]}, ${texts.cases[governing.caseName]}`,
        ),
        row(words.limit, `${levelWords(limit)}; ${limit.source}`),
        row(words.formula, figure.formula),
        ...figure.inputs.map((input) => row(input.name, inputWords(input, texts))),
        row(words.method, figure.method),
        row(words.source, figure.source),
        row(words.range, figure.range),
      ],
    },
  ];
}

const row = (name: string, value: string): TableRow => ({ cells: [name, value] });

function inputWords(input: Figure['inputs'][number], texts: RiskTexts): string {
  const value = `${String(input.value)} ${input.unit}`.trim();
  return input.origin === undefined
    ? value
    : filledText(texts.parts.number.origin, { value, origin: texts.origins[input.origin] });
}

/** How the band was drawn, and which uncertain inputs move it most. */
export function driversPart(assessment: Assessment, texts: RiskTexts): Block[] {
  const words = texts.parts.drivers;
  const { sampling } = assessment;
  if (sampling === null) return [{ kind: 'paragraph', look: 'body', words: words.notSampled }];
  return [
    {
      kind: 'paragraph',
      look: 'small',
      keepWithNext: true,
      words: filledText(words.sampled, {
        samples: String(sampling.samples),
        seed: String(sampling.seed),
      }),
    },
    {
      kind: 'table',
      caption: words.caption,
      empty: words.none,
      columns: [
        { title: words.zone, share: 3, align: 'left' },
        { title: words.quantity, share: 1.4, align: 'left' },
        { title: words.input, share: 6, align: 'left' },
      ],
      rows: driverGroups(assessment).map(({ zoneTitle, quantityTitle, drivers }) => ({
        cells: [
          zoneTitle,
          quantityTitle,
          drivers
            .map(
              ({ inputTitle, rankCorrelation }) =>
                `${inputTitle} ${quantityText(rankCorrelation, 'ratio')}`,
            )
            .join('; '),
        ],
      })),
    },
  ];
}

/** The decision table whole, with what applied, and what exactly was worked out. */
export function tablePart(assessment: Assessment, texts: RiskTexts): Block[] {
  const words = texts.parts.table;
  return [
    {
      kind: 'table',
      caption: words.caption,
      empty: '',
      columns: [
        { title: words.row, share: 0.5, align: 'left' },
        { title: words.test, share: 4, align: 'left' },
        { title: words.word, share: 1.4, align: 'left' },
        { title: words.where, share: 4, align: 'left' },
      ],
      rows: assessment.decisionTable.map((entry) => ({
        cells: [
          String(entry.row),
          entry.test,
          entry.word === null ? '–' : texts.decisions[entry.word],
          entry.fired ? entry.where || words.fired : '–',
        ],
      })),
    },
    {
      kind: 'paragraph',
      look: 'note',
      words: filledText(words.engine, {
        engine: assessment.engineVersion,
        hash: assessment.inputHash,
      }),
    },
  ];
}
