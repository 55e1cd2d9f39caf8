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
    {
      kind: 'table',
      caption: '',
      empty: words.none,
      columns: [
        { title: words.rule, share: 2.9, align: 'left' },
        { title: words.edition, share: 1.5, align: 'left' },
        { title: words.duty, share: 4.1, align: 'left' },
        { title: words.status, share: 1.7, align: 'left' },
      ],
      rows: assessment.rulesCited.map((rule) => ({
        cells: [
          rule.instrument,
          rule.edition,
          [
            ...(rule.section === '' ? [] : [{ text: `${rule.section}: `, strong: true as const }]),
            { text: shortDuty(rule.duty) },
          ],
          [
            { text: rule.checked },
            ...(rule.confirm
              ? [
                  {
                    text: rule.checked === '' ? words.confirm : `; ${words.confirm}`,
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

/** Inputs with where they came from, so that a reader can doubt each. */
export function assumptionsPart(assessment: Assessment, texts: RiskTexts): Block[] {
  const words = texts.parts.assumptions;
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
