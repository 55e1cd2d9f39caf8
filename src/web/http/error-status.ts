import type { ErrorCode } from '../../errors.js';

/** The only table from code to HTTP status. */
export const errorStatus = {
  'not-found': 404,
  'invalid-input': 422,
  'out-of-range': 422,
  conflict: 409,
  'not-allowed': 403,
  'not-computable': 422,
} as const satisfies Record<ErrorCode, number>;
