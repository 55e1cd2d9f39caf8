import type { Assessment } from '../../assessment/assessment.js';
import type { Block } from '../document-tree.js';
import { filledText } from '../filled-text.js';
import { figureWords } from './figure-words.js';
import type { RiskTexts } from './risk-texts.js';

/** Rules by instrument, section and edition, and whether anyone read the current text. */
export function rulesPart(assessment: Assessment, texts: RiskTexts): Block[] {
  const words = texts.parts.rules;
  return [
    { kind: 'paragraph', look: 'small', words: words.intro, keepWithNext: true },
    {
      kind: 'table',
      caption: '',
      empty: words.none,
      columns: [
        { title: words.rule, share: 2.2, align: 'left' },
        { title: words.edition, share: 1.1, align: 'left' },
        { title: words.duty, share: 3, align: 'left' },
        { title: words.why, share: 2, align: 'left' },
        { title: words.status, share: 1.8, align: 'left' },
      ],
      rows: assessment.rulesCited.map((rule) => ({
        cells: [
          `${rule.instrument} ${rule.section}`.trim(),
          rule.edition,
          rule.duty,
          rule.why,
          [
            { text: rule.checked },
            ...(rule.confirm
              ? [
                  {
                    text: `${rule.checked === '' ? '' : '\n'}${words.confirm}`,
                    strong: true as const,
                  },
                ]
              : []),
          ],
        ],
      })),
    },
  ];
}

export function cautionsPart(assessment: Assessment, texts: RiskTexts): Block[] {
  const ofActs = assessment.acts.flatMap((act) =>
    act.cautions.map((caution) => `${act.title}: ${caution}`),
  );
  const items = [...assessment.cautions.map((caution) => caution.text), ...ofActs];
  return [{ kind: 'list', items: [...new Set(items)], empty: texts.parts.cautions.none }];
}

/** Inputs with where they came from, so that a reader can doubt each. */
export function assumptionsPart(assessment: Assessment, texts: RiskTexts): Block[] {
  const words = texts.parts.assumptions;
  return [
    { kind: 'paragraph', look: 'small', words: words.intro, keepWithNext: true },
    {
      kind: 'table',
      caption: '',
      empty: words.none,
      columns: [
        { title: words.what, share: 3.6, align: 'left' },
        { title: words.figure, share: 1.4, align: 'right' },
        { title: words.origin, share: 1.2, align: 'left' },
        { title: words.source, share: 2.6, align: 'left' },
      ],
      rows: assessment.assumptions.map((entry) => ({
        cells: [
          entry.text,
          entry.figure === null ? words.noFigure : figureWords(entry.figure),
          texts.origins[entry.origin],
          entry.source,
        ],
      })),
    },
  ];
}

export function validityPart(texts: RiskTexts): Block[] {
  return [{ kind: 'list', items: texts.parts.validity.lines, empty: '', together: true }];
}

/** Where it is signed, and what exactly was signed. */
export function signOffPart(assessment: Assessment, texts: RiskTexts): Block[] {
  const words = texts.parts.signOff;
  return [
    {
      kind: 'signOff',
      title: filledText(words.title, { revision: assessment.revision }),
      labels: words.columns,
      rows: words.rows.map((row) => ({ ...row, name: '', date: '' })),
    },
    {
      kind: 'paragraph',
      look: 'small',
      words: [
        `${words.identityTitle}: ${words.engine} ${assessment.engineVersion}.`,
        `${words.hash}: ${filledText(words.hashWords, { hash: assessment.inputHash })}`,
      ].join('\n'),
    },
  ];
}
