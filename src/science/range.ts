import { OutOfRange, InvalidInput } from '../errors.js';

/** A documented range of validity: used by the guard, the forms and the docs alike. */
export interface Range {
  readonly min: number;
  readonly max: number;
  readonly unit: string;
  /** What the quantity is, in words for a message. */
  readonly name: string;
}

/**
 * The value itself, once it is finite and inside its range [same unit].
 *
 * @param value the number to check [unit of the range]
 * @param range the documented range
 * @param path  JSON Pointer of the value in the caller's input
 * @throws {InvalidInput} when not a finite number
 * @throws {OutOfRange} when outside the range; the range stands in the details
 */
export function inRange(value: number, range: Range, path: string): number {
  // First of all the usual case: this guard stands in every inner loop.
  if (value >= range.min && value <= range.max) return value;
  const subject = range.name.charAt(0).toUpperCase() + range.name.slice(1);
  if (!Number.isFinite(value)) {
    throw new InvalidInput(
      `${subject} is not a finite number.`,
      `Give ${range.name} as a plain number in ${range.unit}.`,
      [{ path, problem: `not a finite number: ${String(value)}` }],
    );
  }
  const limits = `${String(range.min)} to ${String(range.max)} ${range.unit}`.trim();
  throw new OutOfRange(
    `${subject} ${String(value)} ${range.unit} is outside the range of the model.`.replace(
      '  ',
      ' ',
    ),
    `Use a value from ${limits}.`,
    [{ path, problem: `outside ${limits}` }],
  );
}
