import type { PlanVenue } from '../assessment/plan-file.js';
import type { CatalogueData } from '../catalogue/catalogue.module.js';
import type { FormFields } from '../web/forms/form-fields.js';
import { planTexts as words } from '../web/texts/en-plans.js';
import type { ChoiceLists, Option } from '../web/views/field-spec.js';
import { rowNumbersIn } from '../web/views/form-value.js';
import { sentence } from '../assessment/sentence.js';
import { postureOptions } from './breathing-heights.js';

/** Rows of the form that other rows can name: their ids with their titles as typed. */
function namedRows(fields: FormFields, list: string): readonly Option[] {
  return rowNumbersIn(fields, list).flatMap((row) => {
    const value = fields[`${list}.${String(row)}.id`];
    const label = fields[`${list}.${String(row)}.title`] ?? value;
    return value === undefined || label === undefined ? [] : [{ value, label }];
  });
}

/** Everything that can be chosen on the plan page. */
export function planLists(
  fields: FormFields,
  venue: PlanVenue | undefined,
  { catalogue, gases }: CatalogueData,
): ChoiceLists {
  const spaces = (venue?.spaces ?? []).map(({ id, title }) => ({ value: id, label: title ?? id }));
  return {
    spaces,
    places: [
      ...spaces,
      { value: 'outside', label: words.stock.outside },
      { value: 'lift', label: words.stock.lift },
      { value: 'vehicle', label: words.stock.vehicle },
    ],
    gases: Object.values(gases.species).map(({ id, name }) => ({
      value: id,
      label: sentence(name),
    })),
    breathingHeights: postureOptions(catalogue.policy),
    acts: namedRows(fields, 'acts'),
    stock: namedRows(fields, 'stock'),
    controls: catalogue.controls.map(({ id, title }) => ({ value: id, label: title })),
    demonstrations: catalogue.demonstrations.map(({ id, title }) => ({
      value: id,
      label: title,
    })),
  };
}
