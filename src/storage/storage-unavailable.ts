import { DomainError } from '../errors.js';

/** The database cannot be used right now. Nobody's input is at fault, so the web answers 503. */
export class StorageUnavailable extends DomainError {
  constructor(message: string, hint: string, options: { readonly cause?: unknown } = {}) {
    super('not-computable', message, hint);
    this.name = 'StorageUnavailable';
    if (options.cause !== undefined) this.cause = options.cause;
  }
}
