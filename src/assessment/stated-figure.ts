import { InvalidInput } from '../errors.js';
import type { Origin, PhysicalFigure } from './plan-file.js';

/** A figure of the plan file after reading: known with its range, or admitted as unknown. */
export interface StatedFigure {
  readonly value: number | null;
  readonly low: number | null;
  readonly high: number | null;
  readonly origin: Origin;
  readonly note: string | null;
  readonly on: string | null;
}

/**
 * One physical figure read from the plan file [unit of its key].
 *
 * A bare number is taken as supplied. `unknown` must not carry a value; anything else must.
 *
 * @throws {InvalidInput} when value, range and origin contradict each other
 */
export function statedFigure(raw: PhysicalFigure, path: string): StatedFigure {
  if (typeof raw === 'number') {
    return { value: raw, low: null, high: null, origin: 'supplied', note: null, on: null };
  }
  const refuse = (problem: string, hint: string): never => {
    throw new InvalidInput(`The figure at ${path} contradicts itself: ${problem}.`, hint, [
      { path, problem },
    ]);
  };
  const origin = raw.origin ?? 'supplied';
  const { value = null, low = null, high = null } = raw;
  if (origin === 'unknown' && value !== null) {
    refuse(
      'it is marked unknown and has a value',
      'Give the origin of the value, or leave it out.',
    );
  }
  if (origin !== 'unknown' && value === null) {
    refuse('it has no value', 'Give a value, or mark the origin as unknown.');
  }
  if (low !== null && high !== null && low > high) {
    refuse('low is above high', 'Exchange low and high.');
  }
  if (value !== null && ((low !== null && value < low) || (high !== null && value > high))) {
    refuse('the value lies outside low and high', 'Widen the range, or correct the value.');
  }
  return { value, low, high, origin, note: raw.note ?? null, on: raw.on ?? null };
}
