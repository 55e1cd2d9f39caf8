import { InvalidInput } from '../errors.js';

/**
 * The template with every {slot} filled.
 *
 * @throws {InvalidInput} for a slot without a value: a sheet with a hole in it is not printed
 */
export function filledText(template: string, slots: Readonly<Record<string, string>>): string {
  return template.replace(/\{(\w+)\}/g, (_whole, name: string) => {
    const value = slots[name];
    if (value === undefined) {
      throw new InvalidInput(
        `The wording "${template}" has a slot {${name}} that nothing fills.`,
        `Use only these slots here: ${Object.keys(slots).join(', ') || 'none'}.`,
        [{ path: '', problem: `unknown slot {${name}}` }],
      );
    }
    return value;
  });
}
