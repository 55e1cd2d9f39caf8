import type { Assessment, Condition } from '../../assessment/assessment.js';
import { actTitle, zoneTitle } from './figure-words.js';

/** Conditions that ask the same of several zones or acts, told once. */
export interface ConditionGroup {
  readonly numbers: readonly number[];
  readonly row: number;
  readonly blocksStart: boolean;
  /** What is asked of all of them. */
  readonly head: string;
  /** What differs from zone to zone, each with its zone; empty for a condition that stands alone. */
  readonly details: readonly string[];
  readonly checklist: readonly string[];
  readonly acts: readonly string[];
}

const capital = (words: string): string => `${words.charAt(0).toUpperCase()}${words.slice(1)}`;

/** The words without the zone that opens them. */
function withoutZone(words: string, zone: string): string {
  return zone !== '' && words.startsWith(zone)
    ? words.slice(zone.length).replace(/^[:,]\s*/, '')
    : words;
}

/** The clauses before the first one in which the texts differ. */
function commonClauses(texts: readonly string[], separator: string): string {
  const [first = [], ...rest] = texts.map((text) => text.split(separator));
  const differs = first.findIndex((part, index) => rest.some((other) => other[index] !== part));
  return first.slice(0, differs === -1 ? first.length : differs).join(separator);
}

/** The conditions in their order; those with the same first clause, row and weight together. */
export function conditionGroups(assessment: Assessment): ConditionGroup[] {
  const groups = new Map<string, { condition: Condition; zone: string; text: string }[]>();
  for (const condition of assessment.conditions) {
    // A condition opens with its zone or, where it is asked of a floor, with its space.
    const places = [
      ...(condition.zone === null ? [] : [zoneTitle(assessment, condition.zone)]),
      ...assessment.spaces.map((space) => space.title),
    ];
    const zone = places.find((place) => condition.text.startsWith(`${place}: `)) ?? '';
    const text = withoutZone(condition.text, zone);
    const [clause = ''] = text.split('; ');
    const key = JSON.stringify([condition.row, condition.blocksStart, clause]);
    groups.set(key, [...(groups.get(key) ?? []), { condition, zone, text }]);
  }
  return [...groups.values()].flatMap((all) => {
    const [first] = all;
    if (first === undefined) return [];
    const numbers = all.map(({ condition }) => condition.number);
    const acts = [
      ...new Set(
        all.flatMap(({ condition }) =>
          condition.act === null ? [] : [actTitle(assessment, condition.act)],
        ),
      ),
    ];
    const { row, blocksStart } = first.condition;
    const shared = { numbers, row, blocksStart, acts };
    if (all.length === 1) {
      const { text, checklistLine } = first.condition;
      return [
        {
          ...shared,
          head: text,
          details: [],
          checklist: checklistLine === '' ? [] : [checklistLine],
        },
      ];
    }
    const head = commonClauses(
      all.map(({ text }) => text.replace(/\.$/, '')),
      '; ',
    );
    const tails = new Map<string, Set<string>>();
    for (const { zone, text } of all) {
      const tail = text.replace(/\.$/, '').slice(head.length).replace(/^; /, '');
      tails.set(zone, (tails.get(zone) ?? new Set()).add(tail));
    }
    const details = [...tails].map(
      ([zone, of]) => `${[zone, [...of].join('; ')].filter((part) => part !== '').join(': ')}.`,
    );
    const lines = all.map(({ condition, zone }) => withoutZone(condition.checklistLine, zone));
    const common = commonClauses(lines, ', ') || commonClauses(lines, '; ');
    const checklist =
      common === '' ? [...new Set(all.map(({ condition }) => condition.checklistLine))] : [common];
    return [
      {
        ...shared,
        head: `${capital(head)}.`,
        details,
        checklist: checklist.filter((line) => line !== '').map(capital),
      },
    ];
  });
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
