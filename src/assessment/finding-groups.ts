import type { Assessment, Finding } from './assessment.js';
import { sentence } from './sentence.js';

/** Findings of one kind that end in the same words, told once. */
export interface FindingGroup {
  readonly kind: Finding['kind'];
  readonly code: string;
  /** What differs, each once, with the places of its entries. */
  readonly items: readonly { readonly text: string; readonly path: string }[];
  /** The sentences in which all of them end; empty for a finding that stands alone. */
  readonly shared: string;
}

const order: readonly Finding['kind'][] = ['danger', 'caution', 'plausibility', 'note'];

const sentencesOf = (text: string): string[] => text.split(/(?<=[.!?])\s+(?=\p{Lu})/u);

/** How many sentences at the end all texts share, leaving each at least one of its own. */
function sharedEnd(all: readonly (readonly string[])[]): number {
  const [first = [], ...rest] = all;
  const shortest = Math.min(...all.map((sentences) => sentences.length)) - 1;
  let count = 0;
  while (count < shortest && rest.every((other) => other.at(-1 - count) === first.at(-1 - count))) {
    count += 1;
  }
  return count;
}

/** What all texts say of different subjects, each before a colon; null where they differ in more. */
function sharedAfterSubject(texts: readonly string[]): string | null {
  const rests = new Set(texts.map((text) => text.slice(text.indexOf(': ') + 2)));
  const [rest = ''] = rests;
  return rests.size === 1 && texts.every((text) => text.includes(': ')) ? rest : null;
}

/** The findings for reading: the gravest first, those alike together, repeated ones once. */
export function findingGroups({ findings }: Pick<Assessment, 'findings'>): FindingGroup[] {
  const groups = new Map<string, Finding[]>();
  for (const finding of findings) {
    const key = `${finding.kind} ${finding.code}`;
    const known = groups.get(key) ?? [];
    if (known.some(({ text }) => text === finding.text)) continue;
    groups.set(key, [...known, finding]);
  }
  return [...groups.values()]
    .flatMap((all): FindingGroup[] => {
      const [first] = all;
      if (first === undefined) return [];
      const { kind, code } = first;
      const said = all.length === 1 ? null : sharedAfterSubject(all.map(({ text }) => text));
      if (said !== null) {
        const items = all.map(({ text, path }) => ({
          text: text.slice(0, text.indexOf(': ')),
          path,
        }));
        return [{ kind, code, items, shared: sentence(said) }];
      }
      const sentences = all.map(({ text }) => sentencesOf(text));
      const shared = all.length === 1 ? 0 : sharedEnd(sentences);
      return [
        {
          kind,
          code,
          items: all.map(({ path }, index) => ({
            text: (sentences[index] ?? []).slice(0, shared === 0 ? undefined : -shared).join(' '),
            path,
          })),
          shared: shared === 0 ? '' : (sentences[0] ?? []).slice(-shared).join(' '),
        },
      ];
    })
    .toSorted((one, other) => order.indexOf(one.kind) - order.indexOf(other.kind));
}
