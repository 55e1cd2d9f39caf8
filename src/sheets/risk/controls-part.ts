import type { Assessment, ControlResult } from '../../assessment/assessment.js';
import type { Block } from '../document-tree.js';
import { filledText } from '../filled-text.js';
import { actTitle, figureOrDash, figureWords, zoneTitle } from './figure-words.js';
import type { RiskTexts } from './risk-texts.js';

const levelOrder: readonly ControlResult['level'][] = [
  'eliminate',
  'substitute',
  'engineer',
  'organise',
  'protect',
];

/** Controls from leaving out to protecting the person, each with what it changed. */
export function controlsPart(assessment: Assessment, texts: RiskTexts): Block[] {
  const words = texts.parts.controls;
  const sorted = assessment.controls.toSorted(
    (one, other) => levelOrder.indexOf(one.level) - levelOrder.indexOf(other.level),
  );
  return [
    { kind: 'paragraph', look: 'small', words: words.intro, keepWithNext: true },
    {
      kind: 'table',
      caption: '',
      empty: words.none,
      columns: [
        { title: words.control, share: 2.6, align: 'left' },
        { title: words.level, share: 1.2, align: 'left' },
        { title: words.act, share: 1.6, align: 'left' },
        { title: words.chosen, share: 0.8, align: 'left' },
        { title: words.before, share: 1, align: 'right' },
        { title: words.after, share: 1, align: 'right' },
        { title: words.words, share: 2.6, align: 'left' },
      ],
      rows: sorted.map((control) => ({
        cells: [
          control.title,
          texts.controlLevels[control.level],
          control.act === null ? words.wholePlan : actTitle(assessment, control.act),
          control.chosen ? words.yes : words.no,
          figureOrDash(control.before),
          control.credited ? figureOrDash(control.after) : words.noCredit,
          control.words,
        ],
      })),
    },
  ];
}

/** The conditions of the decision, numbered, each tied to its act and to the day's checklist. */
export function conditionsPart(assessment: Assessment, texts: RiskTexts): Block[] {
  const words = texts.parts.conditions;
  return [
    { kind: 'paragraph', look: 'small', words: words.intro, keepWithNext: true },
    {
      kind: 'numbered',
      empty: words.none,
      items: assessment.conditions.map((condition) => ({
        number: String(condition.number),
        words: [
          { text: condition.text, strong: true },
          { text: condition.blocksStart ? ` ${words.blocks}` : '' },
        ],
        detail: [
          ...(condition.checklistLine === ''
            ? []
            : [filledText(words.onTheDay, { line: condition.checklistLine })]),
          [
            ...(condition.act === null
              ? []
              : [filledText(words.act, { act: actTitle(assessment, condition.act) })]),
            ...(condition.zone === null
              ? []
              : [filledText(words.zone, { zone: zoneTitle(assessment, condition.zone) })]),
            filledText(words.row, { row: String(condition.row) }),
          ].join(' '),
        ].join('\n'),
      })),
    },
  ];
}

/** What was refused and what was found. */
export function findingsPart(assessment: Assessment, texts: RiskTexts): Block[] {
  const words = texts.parts.findings;
  return [
    {
      kind: 'table',
      caption: words.refusalsCaption,
      empty: words.noRefusals,
      columns: [
        { title: words.act, share: 2, align: 'left' },
        { title: words.reason, share: 3, align: 'left' },
        { title: words.alternative, share: 3, align: 'left' },
      ],
      rows: assessment.refusals.map((refusal) => ({
        cells: [actTitle(assessment, refusal.act), refusal.reason, refusal.alternative],
      })),
    },
    {
      kind: 'table',
      caption: words.findingsCaption,
      empty: words.noFindings,
      columns: [
        { title: words.kind, share: 1, align: 'left' },
        { title: words.text, share: 7, align: 'left' },
      ],
      rows: assessment.findings.map((finding) => ({
        cells: [texts.findingKinds[finding.kind], finding.text],
      })),
    },
  ];
}

/** The few answers that would change the word. */
export function questionsPart(assessment: Assessment, texts: RiskTexts): Block[] {
  const words = texts.parts.questions;
  return [
    {
      kind: 'table',
      caption: '',
      empty: words.none,
      columns: [
        { title: words.question, share: 4, align: 'left' },
        { title: words.best, share: 1.6, align: 'left' },
        { title: words.worst, share: 1.6, align: 'left' },
        { title: words.suffices, share: 1.2, align: 'right' },
      ],
      rows: assessment.questionsThatDecide.map((entry) => ({
        cells: [
          entry.question,
          texts.decisions[entry.wordAtBest],
          texts.decisions[entry.wordAtWorst],
          entry.suffices === null ? '–' : figureWords(entry.suffices),
        ],
      })),
    },
  ];
}
