import type { Assessment, Condition } from './assessment.js';
import { sentence } from './sentence.js';

/** What is asked at one place; acts are empty where it holds throughout. */
export interface PlaceAsks {
  /** Zone or space; empty for a condition that names none. */
  readonly place: string;
  readonly asks: readonly { readonly text: string; readonly acts: readonly string[] }[];
}

/** Conditions that ask the same of several places or acts, told once. */
export interface ConditionGroup {
  readonly numbers: readonly number[];
  readonly row: number;
  readonly blocksStart: boolean;
  /** What is asked of all of them. */
  readonly head: string;
  /** A remark that every one of them carried; empty for none. */
  readonly remark: string;
  /** What differs from place to place; empty for a condition that stands alone. */
  readonly places: readonly PlaceAsks[];
  readonly checklist: readonly string[];
  /** The acts of all of them; empty where they are told place by place. */
  readonly acts: readonly string[];
}

interface Entry {
  readonly condition: Condition;
  readonly place: string;
  readonly text: string;
}

const withoutStop = (words: string): string => words.replace(/\.$/, '');

/** The words without the place that opens them. */
function withoutPlace(words: string, place: string): string {
  return place !== '' && words.startsWith(place)
    ? words.slice(place.length).replace(/^[:,]\s*/, '')
    : words;
}

/** The clauses before the first one in which the texts differ. */
function commonClauses(texts: readonly string[], separator: string): string {
  const [first = [], ...rest] = texts.map((text) => text.split(separator));
  const differs = first.findIndex((part, index) => rest.some((other) => other[index] !== part));
  return first.slice(0, differs === -1 ? first.length : differs).join(separator);
}

/** What stands in brackets at the end of every text that has any, where all say the same. */
function commonRemark(texts: readonly string[]): string {
  const remarks = new Set(texts.flatMap((text) => /\(([^()]+)\)$/.exec(text)?.[1] ?? []));
  const [only = ''] = remarks;
  return remarks.size === 1 ? only : '';
}

function actTitles(assessment: Assessment, entries: readonly Entry[]): string[] {
  const ids = new Set(entries.flatMap(({ condition }) => condition.act ?? []));
  return [...ids].map((id) => assessment.acts.find((act) => act.id === id)?.title ?? id);
}

/** Texts that are asked of one place, each once with its acts. */
function placesOf(
  assessment: Assessment,
  entries: readonly Entry[],
  tail: (text: string) => string,
): PlaceAsks[] {
  const places = new Map<string, Map<string, Entry[]>>();
  for (const entry of entries) {
    const asks = places.get(entry.place) ?? new Map<string, Entry[]>();
    places.set(entry.place, asks);
    const text = tail(entry.text);
    asks.set(text, [...(asks.get(text) ?? []), entry]);
  }
  return [...places].map(([place, asks]) => ({
    place,
    asks: [...asks]
      .filter(([text]) => text !== '')
      .map(([text, of]) => ({
        text,
        // What is asked throughout needs no list of acts for which it is asked as well.
        acts: of.some(({ condition }) => condition.act === null) ? [] : actTitles(assessment, of),
      })),
  }));
}

function groupOf(assessment: Assessment, entries: readonly Entry[], first: Entry): ConditionGroup {
  const { row, blocksStart } = first.condition;
  const numbers = entries.map(({ condition }) => condition.number);
  const acts = actTitles(assessment, entries);
  if (entries.length === 1) {
    const { text, checklistLine } = first.condition;
    const checklist = checklistLine === '' ? [] : [checklistLine];
    return { numbers, row, blocksStart, head: text, remark: '', places: [], checklist, acts };
  }
  const texts = entries.map(({ text }) => withoutStop(text));
  const remark = commonRemark(texts);
  const bare = (text: string): string => withoutStop(text).replace(` (${remark})`, '');
  const head = commonClauses(texts.map(bare), '; ');
  const places = placesOf(assessment, entries, (text) =>
    bare(text).slice(head.length).replace(/^; /, ''),
  );
  const throughout = new Set(places.flatMap(({ asks }) => asks.map((ask) => ask.acts.join('\n'))));
  const lines = entries.map(({ condition, place }) => withoutPlace(condition.checklistLine, place));
  const common = commonClauses(lines, ', ') || commonClauses(lines, '; ');
  const each =
    common === '' ? [...new Set(entries.map((entry) => entry.condition.checklistLine))] : [common];
  return {
    numbers,
    row,
    blocksStart,
    head: `${sentence(head)}.`,
    remark: remark === '' ? '' : `${sentence(remark)}.`,
    places:
      throughout.size > 1
        ? places
        : places.map(({ place, asks }) => ({
            place,
            asks: asks.map(({ text }) => ({ text, acts: [] })),
          })),
    checklist: each.filter((line) => line !== '').map(sentence),
    acts: throughout.size > 1 ? [] : acts,
  };
}

/**
 * The conditions for reading: those that block the start first, and those with the same row, weight
 * and first clause together, place by place.
 */
export function conditionGroups(assessment: Assessment): ConditionGroup[] {
  const groups = new Map<string, Entry[]>();
  for (const condition of assessment.conditions) {
    // A condition opens with its zone or, where it is asked of a floor, with its space.
    const places = [
      ...assessment.zones.filter(({ id }) => id === condition.zone).map(({ title }) => title),
      ...assessment.spaces.map(({ title }) => title),
    ];
    const place = places.find((title) => condition.text.startsWith(`${title}: `)) ?? '';
    const text = withoutPlace(condition.text, place);
    const [clause = ''] = text.split('; ');
    const key = JSON.stringify([condition.row, condition.blocksStart, clause]);
    groups.set(key, [...(groups.get(key) ?? []), { condition, place, text }]);
  }
  return [...groups.values()]
    .flatMap((entries) => entries.slice(0, 1).map((first) => groupOf(assessment, entries, first)))
    .toSorted((one, other) => Number(other.blocksStart) - Number(one.blocksStart));
}

/** One line per place: its name, then what is asked, each with the acts it is asked for. */
export function placeLine({ place, asks }: PlaceAsks): string {
  const asked = asks.map(({ text, acts }) =>
    acts.length === 0 ? text : `${text} (${acts.join('; ')})`,
  );
  return [place, asked.join('; ')].filter((part) => part !== '').join(': ');
}

/** Numbers in words: `3-5, 8`. */
export function numberRanges(numbers: readonly number[]): string {
  const ranges: { from: number; to: number }[] = [];
  for (const number of numbers.toSorted((one, other) => one - other)) {
    const open = ranges.at(-1);
    if (open !== undefined && number === open.to + 1) open.to = number;
    else ranges.push({ from: number, to: number });
  }
  return ranges
    .map(({ from, to }) => (from === to ? String(from) : `${String(from)}–${String(to)}`))
    .join(', ');
}
