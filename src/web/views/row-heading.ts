import type { FormState } from '../forms/fields.js';
import { viewTexts as words } from '../texts/en-views.js';
import { nameIn, type ChoiceLists, type FieldSpec, type Option } from './field-spec.js';

/** The choices of a field: its own, or the list it names. */
export function optionsOf(
  spec: Extract<FieldSpec, { kind: 'choice' }>,
  lists: ChoiceLists,
): readonly Option[] {
  return typeof spec.options === 'string' ? (lists[spec.options] ?? []) : spec.options;
}

/** What a field says in the heading of its row: its text with its unit, or nothing. */
export function fieldText(
  spec: FieldSpec,
  prefix: string,
  state: FormState,
  lists: ChoiceLists,
): string {
  const name = nameIn(prefix, spec.key);
  const text = state.values[name];
  switch (spec.kind) {
    case 'figure':
    case 'amount': {
      if (text === undefined) {
        return state.values[`${name}-origin`] === 'unknown' ? words.unknown : '';
      }
      const unit =
        spec.kind === 'figure'
          ? spec.unit.symbol
          : (spec.units.find(({ key }) => key === state.values[`${name}-unit`]) ?? spec.units[0])
              ?.label;
      return unit === undefined || unit === '' ? text : `${text}\u00a0${unit}`;
    }
    case 'number':
      return text === undefined ? '' : `${text}\u00a0${spec.unit.symbol}`.trim();
    case 'choice':
      return optionsOf(spec, lists).find(({ value }) => value === text)?.label ?? '';
    case 'yesNo':
      return text === 'yes' ? spec.yes : text === 'no' ? spec.no : '';
    case 'check':
    case 'rows':
    case 'kept':
      return '';
    case 'text':
    case 'longText':
    case 'date':
    case 'clock':
    case 'dayTime':
      return text ?? '';
  }
}
