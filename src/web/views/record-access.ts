/** A JSON object on its way between form and plan file. */
export type FormRecord = Record<string, unknown>;

export const isRecord = (value: unknown): value is FormRecord =>
  typeof value === 'object' && value !== null && !Array.isArray(value);

/** The value under a dotted key; undefined where the way there ends. */
export function valueAt(record: FormRecord, key: string): unknown {
  let here: unknown = record;
  for (const part of key.split('.')) {
    if (!isRecord(here) || !Object.hasOwn(here, part)) return undefined;
    here = here[part];
  }
  return here;
}

/** Sets the value under a dotted key, making the objects on the way. Keys come from descriptions. */
export function setAt(record: FormRecord, key: string, value: unknown): void {
  const parts = key.split('.');
  const last = parts.pop() ?? key;
  let here = record;
  for (const part of parts) {
    const next = here[part];
    const inner: FormRecord = isRecord(next) ? next : {};
    here[part] = inner;
    here = inner;
  }
  here[last] = value;
}
