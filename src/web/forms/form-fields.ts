/** The texts of a sent form by field name: the last one where a name came twice. */
export type FormFields = Readonly<Record<string, string | undefined>>;

/**
 * The fields of a form body, trimmed, blank ones left out: blank is missing, never zero. Passwords
 * are the exception to trimming, so their field names start with `password`.
 */
export function formFields(body: unknown): FormFields {
  const fields = Object.create(null) as Record<string, string | undefined>;
  if (typeof body !== 'object' || body === null) return fields;
  for (const [name, raw] of Object.entries(body)) {
    const values: readonly unknown[] = Array.isArray(raw) ? raw : [raw];
    const value = values.at(-1);
    if (typeof value !== 'string') continue;
    const text = name.startsWith('password') ? value : value.trim();
    if (text !== '') fields[name] = text;
  }
  return fields;
}

/** How many rows of a repeated group were sent: fields are named `prefix.0.name`, `prefix.1.name`. */
export function rowNumbers(fields: FormFields, prefix: string): readonly number[] {
  const numbers = new Set<number>();
  for (const name of Object.keys(fields)) {
    const [head, number = ''] = name.split('.');
    if (head === prefix && /^\d{1,4}$/.test(number)) numbers.add(Number(number));
  }
  return [...numbers].sort((a, b) => a - b);
}
