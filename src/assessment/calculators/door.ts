import { DomainError, InvalidInput, type ErrorDetail } from '../../errors.js';
import { fitting } from '../schema-check.js';
import type { Calculator, CalculatorData } from './calculator.js';

/** Codes of the door: the domain's own, and `internal` for a fault of ours. */
export type DoorErrorCode = DomainError['code'] | 'internal';

export interface DoorError {
  readonly error: {
    readonly code: DoorErrorCode;
    readonly message: string;
    readonly hint: string;
    readonly details: readonly ErrorDetail[];
  };
}

/** Exit status and how grave it is; the gravest of an array decides. */
const exitStatus = {
  'not-computable': 1,
  internal: 1,
  'invalid-input': 2,
  'not-allowed': 2,
  'not-found': 2,
  conflict: 2,
  'out-of-range': 3,
} as const satisfies Record<DoorErrorCode, 1 | 2 | 3>;

const gravity = { 1: 3, 2: 2, 3: 1, 0: 0 } as const;

export interface DoorAnswer {
  readonly body: unknown;
  readonly status: 0 | 1 | 2 | 3;
  /** The unexpected faults, for the log of the caller; never printed to the user. */
  readonly faults: readonly unknown[];
}

/** The error object of every door for something thrown. */
export function doorError(thrown: unknown): DoorError {
  if (thrown instanceof DomainError) {
    const { code, message, hint, details } = thrown;
    return { error: { code, message, hint, details } };
  }
  return {
    error: {
      code: 'internal',
      message: 'The calculation met a fault of its own.',
      hint: 'Keep this input and report it; no result was produced.',
      details: [],
    },
  };
}

/** Exit status of an error object. */
export function statusOf(failure: DoorError): 1 | 2 | 3 {
  return exitStatus[failure.error.code];
}

/**
 * Runs one calculator on a document, or on each of an array of documents in order.
 * Never throws: what goes wrong is an error object in the place of the result.
 */
export function answer(
  calculator: Calculator,
  document: unknown,
  data: CalculatorData,
): DoorAnswer {
  const faults: unknown[] = [];
  let status: DoorAnswer['status'] = 0;
  const one = (input: unknown): unknown => {
    try {
      return calculator.run(fitting(calculator.input, input, `input of ${calculator.name}`), data);
    } catch (thrown) {
      const failure = doorError(thrown);
      if (failure.error.code === 'internal') faults.push(thrown);
      const own = statusOf(failure);
      if (gravity[own] > gravity[status]) status = own;
      return failure;
    }
  };
  const body = Array.isArray(document) ? document.map(one) : one(document);
  return { body, status, faults };
}

/** One JSON document from its text. */
export function parsedJson(text: string): unknown {
  if (text.trim() === '') {
    throw new InvalidInput(
      'The input is empty.',
      'Give one JSON document, as a file or on standard input.',
      [{ path: '', problem: 'is empty' }],
    );
  }
  try {
    return JSON.parse(text) as unknown;
  } catch (thrown) {
    const problem = thrown instanceof Error ? thrown.message : 'is not JSON';
    throw new InvalidInput(
      'The input is not valid JSON.',
      'Check brackets, quotes and commas at the place named.',
      [{ path: '', problem }],
    );
  }
}
