import type { Account } from '../../storage/people.repository.js';

/** The signed-in person, as far as a page needs to know. */
export interface Viewer extends Account {
  /** Goes into every form, and must come back with it. */
  readonly formToken: string;
}
