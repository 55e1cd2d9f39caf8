import type { Assessment } from '../../assessment/assessment.js';
import type { Block, Column, TableRow } from '../document-tree.js';
import { filledText } from '../filled-text.js';
import { figureOnLine } from './figure-words.js';
import type { RiskTexts } from './risk-texts.js';

/** Rules by instrument, section and edition, and whether anyone read the current text. */
export function rulesPart(assessment: Assessment, texts: RiskTexts): Block[] {
  const words = texts.parts.rules;
  return [
    { kind: 'paragraph', look: 'small', words: words.intro, keepWithNext: true },
    ...(assessment.rulesCited.length === 0
      ? [{ kind: 'paragraph', look: 'note', words: words.none } as const]
      : ruleLists(assessment, texts)),
  ];
}

/** The rules by how far they were checked; numbered through. */
function ruleLists(assessment: Assessment, texts: RiskTexts): Block[] {
  const words = texts.parts.rules;
  const byStatus = new Map<string, Assessment['rulesCited'][number][]>();
  for (const rule of assessment.rulesCited) {
    const pattern = rule.confirm ? words.statusConfirm : words.status;
    const status = filledText(pattern, { checked: rule.checked });
    byStatus.set(status, [...(byStatus.get(status) ?? []), rule]);
  }
  let number = 0;
  return [...byStatus].flatMap(([status, rules]): Block[] => [
    {
      kind: 'paragraph',
      look: 'note',
      words: [{ text: status.replace(/^./, (letter) => letter.toUpperCase()), strong: true }],
      keepWithNext: true,
    },
    {
      kind: 'numbered',
      columns: 2,
      empty: '',
      items: rules.map((rule) => ({
        number: String((number += 1)),
        words: [
          { text: `${rule.instrument} `, strong: true },
          { text: `(${rule.edition}): ` },
          { text: [rule.section, shortDuty(rule.duty)].filter((part) => part !== '').join(': ') },
        ],
        detail: '',
      })),
    },
  ]);
}

/** The main clause of a duty; the whole of it stands in the rule pack and the workings. */
function shortDuty(duty: string): string {
  const [main = duty] = duty.split(/;\s/);
  return main === duty || main.endsWith('.') ? main : `${main}.`;
}

/** The standard cautions first, then those of single acts, each once. */
export function cautionsPart(assessment: Assessment, texts: RiskTexts): Block[] {
  const items = new Map(assessment.cautions.map(({ text }) => [text, text]));
  for (const act of assessment.acts) {
    for (const caution of act.cautions) {
      if (!items.has(caution)) items.set(caution, `${act.title}: ${caution}`);
    }
  }
  return [
    {
      kind: 'numbered',
      columns: 2,
      empty: texts.parts.cautions.none,
      items: [...items.values()].map((words, index) => ({
        number: String(index + 1),
        words,
        detail: '',
      })),
    },
  ];
}

/** What was not measured, by where it comes from. */
export function assumptionsPart(assessment: Assessment, texts: RiskTexts): Block[] {
  const words = texts.parts.assumptions;
  const byOrigin = new Map<string, Set<string>>();
  for (const { text, path, origin, figure } of assessment.assumptions) {
    const [what = text] = text.split(': ');
    const place = placeOf(assessment, path);
    const named = place === null || what.includes(place) ? what : `${place}: ${what}`;
    const key = texts.origins[origin];
    const value = figure === null ? '' : ` ${figureOnLine(figure)}`;
    byOrigin.set(key, (byOrigin.get(key) ?? new Set()).add(`${named}${value}`));
  }
  return [
    { kind: 'paragraph', look: 'small', words: words.intro, keepWithNext: true },
    {
      kind: 'list',
      look: 'note',
      empty: words.none,
      items: [...byOrigin].map(([origin, whats]) => [
        { text: `${origin}: `, strong: true },
        { text: `${[...whats].join('; ')}.` },
      ]),
    },
  ];
}

/** Inputs with where they came from, so that a reader can doubt each. */
export function inputsPart(assessment: Assessment, texts: RiskTexts): Block[] {
  const words = texts.parts.inputs;
  const { assumptions } = assessment;
  // A text that names its value needs no column for it.
  const withValues = assumptions.some((entry) => entry.figure !== null);
  const columns: Column[] = [
    { title: withValues ? words.what : words.whatAndValue, share: 4.4, align: 'left' },
    ...(withValues ? [{ title: words.figure, share: 1.5, align: 'right' } as const] : []),
    { title: words.origin, share: 0.9, align: 'left' },
    { title: words.source, share: 4, align: 'left' },
  ];
  const rows = assumptions.map((entry) => {
    // The text may give its reason after a colon: it belongs with the source.
    const [what = entry.text, why = ''] = entry.text.split(/:\s(.*)/s);
    const place = placeOf(assessment, entry.path);
    return {
      what: place === null || what.includes(place) ? what : `${place}: ${what}`,
      cells: [
        ...(withValues ? [entry.figure === null ? words.inText : figureOnLine(entry.figure)] : []),
        texts.origins[entry.origin],
        [why, entry.source].filter((part) => part !== '').join(' \u00b7 '),
      ],
    };
  });
  return [
    { kind: 'paragraph', look: 'small', words: words.intro, keepWithNext: true },
    { kind: 'table', caption: '', empty: words.none, columns, rows: mergedRows(rows) },
  ];
}

/** Title of the space or act that a pointer into the plan leads to. */
function placeOf(assessment: Assessment, path: string): string | null {
  const [, list, index] = /^\/(venue\/spaces|acts)\/(\d+)\//.exec(path) ?? [];
  const { section, acts } = assessment;
  const at = list === 'acts' ? acts : section.spaces;
  return list === undefined ? null : (at[Number(index)]?.title ?? null);
}

/** Inputs that were assumed alike in several places share a row. */
function mergedRows(
  rows: readonly { readonly what: string; readonly cells: readonly string[] }[],
): TableRow[] {
  const merged = new Map<string, { what: string[]; cells: readonly string[] }>();
  for (const { what, cells } of rows) {
    const key = cells.join('\n');
    const row = merged.get(key) ?? { what: [], cells };
    if (!row.what.includes(what)) row.what.push(what);
    merged.set(key, row);
  }
  return [...merged.values()].map(({ what, cells }) => ({ cells: [what.join('; '), ...cells] }));
}

export function validityPart(texts: RiskTexts): Block[] {
  const { lines } = texts.parts.validity;
  return [{ kind: 'list', look: 'note', items: lines, empty: '', together: true }];
}

/** Where it is signed, and what exactly was signed. */
export function signOffPart(assessment: Assessment, texts: RiskTexts): Block[] {
  const words = texts.parts.signOff;
  return [
    {
      kind: 'paragraph',
      look: 'note',
      keepWithNext: true,
      words: filledText(words.signed, {
        asFiled: texts.decisions[assessment.decision.asFiled],
        withControls: texts.decisions[assessment.decision.withControls],
        revision: assessment.revision,
        engine: assessment.engineVersion,
        hash: assessment.inputHash,
      }),
    },
    {
      kind: 'signOff',
      title: filledText(words.title, { revision: assessment.revision }),
      labels: words.columns,
      rows: words.rows.map((row) => ({ ...row, name: '', date: '' })),
    },
  ];
}
