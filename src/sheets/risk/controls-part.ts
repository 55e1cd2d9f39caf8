import type { Assessment, ControlResult } from '../../assessment/assessment.js';
import { findingGroups, type FindingGroup } from '../../assessment/finding-groups.js';
import type { Block, Words } from '../document-tree.js';
import { filledText } from '../filled-text.js';
import {
  conditionGroups,
  numberRanges,
  placeLine,
  type ConditionGroup,
} from '../../assessment/condition-groups.js';
import { actTitle, figureOrDash, figureWords } from './figure-words.js';
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
    ...(sorted.some((control) => control.chosen)
      ? [{ kind: 'paragraph', look: 'small', words: words.intro, keepWithNext: true } as const]
      : []),
    {
      kind: 'table',
      caption: words.chosenCaption,
      empty: words.none,
      columns: [
        { title: words.control, share: 2.6, align: 'left' },
        { title: words.level, share: 1, align: 'left' },
        { title: words.act, share: 1.8, align: 'left' },
        { title: words.before, share: 0.9, align: 'right' },
        { title: words.after, share: 0.9, align: 'right' },
        { title: words.words, share: 3.4, align: 'left' },
      ],
      rows: sorted
        .filter((control) => control.chosen)
        .map((control) => ({
          cells: [
            control.title,
            texts.controlLevels[control.level],
            control.act === null ? words.wholePlan : actTitle(assessment, control.act),
            figureOrDash(control.before),
            control.credited ? figureOrDash(control.after) : words.noCredit,
            control.words,
          ],
        })),
    },
    ...(sorted.every((control) => control.chosen)
      ? []
      : [{ kind: 'paragraph', look: 'note', words: words.more } as const]),
  ];
}

/** What the catalogue offers and the plan has not taken. */
export function offeredPart(assessment: Assessment, texts: RiskTexts): Block[] {
  const offered = assessment.controls.filter((control) => !control.chosen);
  const items = offeredLines(assessment, offered, texts);
  return [{ kind: 'list', look: 'note', items, empty: texts.parts.offered.none }];
}

/** One line per act with the titles of the controls it could still take. */
function offeredLines(
  assessment: Assessment,
  controls: readonly ControlResult[],
  texts: RiskTexts,
): Words[] {
  const words = texts.parts.controls;
  const byAct = new Map<string, Set<string>>();
  for (const { act, title } of controls) {
    const name = act === null ? words.wholePlan : actTitle(assessment, act);
    byAct.set(name, (byAct.get(name) ?? new Set()).add(title));
  }
  return [...byAct].map(([act, titles]) => [
    { text: `${act}: `, strong: true },
    { text: `${[...titles].join('; ')}.` },
  ]);
}

/** The conditions of the decision, each with its line of the day's checklist. */
export function conditionsPart(assessment: Assessment, texts: RiskTexts): Block[] {
  const words = texts.parts.conditions;
  return [
    { kind: 'paragraph', look: 'small', words: words.intro, keepWithNext: true },
    {
      kind: 'numbered',
      columns: 1,
      empty: words.none,
      items: conditionGroups(assessment).map((group, index) => ({
        number: String(index + 1),
        words: [
          { text: group.head, strong: true },
          ...(group.blocksStart ? [{ text: ` ${words.blocks}` }] : []),
          ...(group.remark === '' ? [] : [{ text: ` ${group.remark}` }]),
          ...placeLines(group).map((line) => ({ text: `\n${line}.` })),
        ],
        detail: [
          ...group.checklist.map((line) => filledText(words.onTheDay, { line })),
          ...(group.acts.length === 0
            ? []
            : [filledText(words.act, { act: group.acts.join('; ') })]),
          filledText(group.numbers.length > 1 ? words.rowMany : words.row, {
            row: String(group.row),
            numbers: numberRanges(group.numbers),
          }),
        ]
          .join(' ')
          .replaceAll('..', '.'),
      })),
    },
  ];
}

/** A line per place; bare names of places stand in one line. */
function placeLines({ places }: ConditionGroup): string[] {
  const lines = places.map(placeLine);
  return places.every(({ asks }) => asks.length === 0) && lines.length > 0
    ? [lines.join('; ')]
    : lines;
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
      kind: 'list',
      look: 'note',
      empty: words.noFindings,
      items: findingGroups(assessment).map(({ kind, items, shared }) => [
        { text: `${texts.findingKinds[kind]}: `, strong: true },
        { text: findingWords(items, shared) },
      ]),
    },
  ];
}

/** What differs between findings alike, then what they share. */
function findingWords(items: FindingGroup['items'], shared: string): string {
  const texts = items.map(({ text }) => text.replace(/\.$/, ''));
  const all = `${texts.join('; ')}.`;
  return shared === '' ? all : `${all} ${shared}`;
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
