import type { Assessment } from '../../assessment/assessment.js';
import { quantityText } from '../../assessment/figure-text.js';
import type { Block } from '../document-tree.js';
import { filledText } from '../filled-text.js';
import { levelWords } from './figure-words.js';
import type { RiskTexts } from './risk-texts.js';

/** The word as filed and with controls, the number that decides, and why. */
export function decisionPart(assessment: Assessment, texts: RiskTexts): Block[] {
  const words = texts.parts.decision;
  const { decision, governing } = assessment;
  return [
    {
      kind: 'decision',
      words: [
        {
          label: words.asFiled,
          word: texts.decisions[decision.asFiled],
          shape: decision.asFiled,
        },
        {
          label: words.withControls,
          word: texts.decisions[decision.withControls],
          shape: decision.withControls,
        },
      ],
      number:
        governing === null
          ? null
          : {
              label: filledText(words.governing, {
                quantity: governing.quantity,
                zone: governing.zoneTitle,
              }),
              value: quantityText(governing.figure.value, governing.figure.unit),
              against: filledText(words.against, {
                answer: texts.answers[governing.answer],
                case: texts.cases[governing.caseName],
                limit: levelWords(governing.limit),
              }),
            },
      lines: [
        governing === null
          ? words.nothing
          : filledText(words.row, { row: String(governing.row), reason: governing.reason }),
        words.closing,
      ],
    },
  ];
}
