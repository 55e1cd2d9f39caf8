import type { Static, TSchema } from 'typebox';
import type { GasLibrary } from '../../science/gases/gas-library.js';

/** What every calculator may draw on besides its input: checked, frozen data. */
export interface CalculatorData {
  readonly gases: GasLibrary;
}

/**
 * One pure calculation behind every door (command line, HTTP, pages).
 * `input` and `output` are JSON Schema, the single description of the bodies.
 */
export interface Calculator<I extends TSchema = TSchema, O extends TSchema = TSchema> {
  readonly name: string;
  readonly input: I;
  readonly output: O;
  run(input: Static<I>, data: CalculatorData): Static<O>;
}
