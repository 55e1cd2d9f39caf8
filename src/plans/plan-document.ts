import type { PlanFile, PlanVenue } from '../assessment/plan-file.js';
import type { Policy } from '../assessment/catalogue-types.js';
import type { JsonRecord } from '../storage/rows.js';
import type { FormFields } from '../web/forms/form-fields.js';
import { formTexts } from '../web/views/form-texts.js';
import { isRecord, type FormRecord } from '../web/views/record-access.js';
import { withPostures } from './breathing-heights.js';
import { planForm } from './plan-form.js';

/** The lists that stay in a plan file even when they are empty. */
const lasting = new Set(['acts', 'performances', 'audience', 'planned', 'worstCredible']);

/** A copy without empty lists, empty objects and the helping fields of the page. */
function tidy(value: unknown): unknown {
  if (Array.isArray(value)) return value.map(tidy);
  if (!isRecord(value)) return value;
  const kept = Object.entries(value).flatMap(([key, entry]): [string, unknown][] => {
    if (key === 'posture') return [];
    const inner = tidy(entry);
    if (Array.isArray(inner) && inner.length === 0 && !lasting.has(key)) return [];
    if (isRecord(inner) && Object.keys(inner).length === 0) return [];
    return [[key, inner]];
  });
  return Object.fromEntries(kept);
}

/** The document that is stored: the plan file without its venue. */
export function planDocument(value: FormRecord): JsonRecord {
  const { event, acts, ...rest } = value;
  return tidy({
    ...rest,
    schemaVersion: 1,
    event: { performances: [], audience: [], ...(isRecord(event) ? event : {}) },
    acts: (Array.isArray(acts) ? acts : []).map((act: unknown) => {
      const record = isRecord(act) ? act : {};
      const releases = isRecord(record.releases) ? record.releases : {};
      return { ...record, releases: { planned: [], worstCredible: [], ...releases } };
    }),
  }) as JsonRecord;
}

/** The plan file of a stored plan at its venue: what is assessed and what is exported. */
export function planFile(document: JsonRecord, venue: PlanVenue | undefined): PlanFile {
  return { ...document, ...(venue && { venue }) } as unknown as PlanFile;
}

/** The document of a plan file, and its venue apart. */
export function partsOf(file: PlanFile): {
  readonly document: JsonRecord;
  readonly venue: PlanVenue;
} {
  const { venue, ...document } = file;
  return { document, venue };
}

/** The texts that fill the plan page. */
export function planTextsOf(document: JsonRecord, policy: Policy): FormFields {
  return withPostures(formTexts({ ...document }, planForm), policy);
}
