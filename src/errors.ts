/**
 * The failures a caller is expected to understand. Every one says what is wrong, where, and what to
 * do next. Anything that is not a DomainError is a fault of ours.
 */
export type ErrorCode =
  'not-found' | 'invalid-input' | 'out-of-range' | 'conflict' | 'not-allowed' | 'not-computable';

/** One place in the input and what is wrong with it; `path` in JSON Pointer form, '' for the whole. */
export interface ErrorDetail {
  readonly path: string;
  readonly problem: string;
}

export class DomainError extends Error {
  readonly code: ErrorCode;
  readonly hint: string;
  readonly details: readonly ErrorDetail[];

  constructor(
    code: ErrorCode,
    message: string,
    hint: string,
    details: readonly ErrorDetail[] = [],
  ) {
    super(message);
    this.name = 'DomainError';
    this.code = code;
    this.hint = hint;
    this.details = details;
  }
}

/** The input has the wrong shape, or two parts of it contradict each other. */
export class InvalidInput extends DomainError {
  constructor(message: string, hint: string, details: readonly ErrorDetail[] = []) {
    super('invalid-input', message, hint, details);
    this.name = 'InvalidInput';
  }
}

/** A value lies outside the range in which the model holds; the range stands in the details. */
export class OutOfRange extends DomainError {
  constructor(message: string, hint: string, details: readonly ErrorDetail[] = []) {
    super('out-of-range', message, hint, details);
    this.name = 'OutOfRange';
  }
}

/** Something that is refused on principle or by role. */
export class NotAllowed extends DomainError {
  constructor(message: string, hint: string, details: readonly ErrorDetail[] = []) {
    super('not-allowed', message, hint, details);
    this.name = 'NotAllowed';
  }
}

/** The model has no answer here, or the solver did not reach one. */
export class NotComputable extends DomainError {
  constructor(message: string, hint: string, details: readonly ErrorDetail[] = []) {
    super('not-computable', message, hint, details);
    this.name = 'NotComputable';
  }
}

/** The thing asked for does not exist, or not for this reader. */
export class NotFound extends DomainError {
  constructor(message: string, hint: string, details: readonly ErrorDetail[] = []) {
    super('not-found', message, hint, details);
    this.name = 'NotFound';
  }
}

/** Somebody else changed it first, or it already exists. */
export class Conflict extends DomainError {
  constructor(message: string, hint: string, details: readonly ErrorDetail[] = []) {
    super('conflict', message, hint, details);
    this.name = 'Conflict';
  }
}
