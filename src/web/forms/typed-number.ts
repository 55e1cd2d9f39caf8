/** A unit that people type and read, and the way to the SI unit of the stored figure. */
export interface ShownUnit {
  readonly symbol: string;
  /** SI value = typed value times factor, plus offset. */
  readonly factor: number;
  readonly offset?: number;
}

// Twelve digits keep what was typed and drop the tail that binary fractions add.
const settled = (value: number): number => Number(value.toPrecision(12));

export function siValue(typed: number, unit: ShownUnit): number {
  return settled(typed * unit.factor + (unit.offset ?? 0));
}

/** The text that a stored SI value had when it was typed. */
export function shownText(value: number, unit: ShownUnit): string {
  return String(settled((value - (unit.offset ?? 0)) / unit.factor));
}

export type TypedNumber = { readonly value: number } | { readonly problem: string };

/**
 * The number in a text, or what is wrong with it. A decimal comma is understood; a comma or a blank
 * that may part thousands is not guessed at, because a guess can be wrong by a factor of a thousand.
 */
export function typedNumber(text: string): TypedNumber {
  const plain = text.trim().replace('\u2212', '-');
  if (
    /^-?\d{1,3}([,.\u00a0\u202f ']\d{3}){2,}/.test(plain) ||
    /^-?[1-9]\d{0,2},\d{3}$/.test(plain)
  ) {
    return {
      problem: `"${text}" can be read two ways: write it without separators, such as 1500 or 1.5`,
    };
  }
  const number = plain.replace(',', '.');
  if (!/^-?(\d{1,12}(\.\d{0,12})?|\.\d{1,12})(e[+-]?\d{1,2})?$/i.test(number)) {
    return { problem: `"${text}" is not a number: write digits, such as 12 or 0.5` };
  }
  return { value: Number(number) };
}
