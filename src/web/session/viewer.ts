import { createParamDecorator, SetMetadata, type ExecutionContext } from '@nestjs/common';
import { NotAllowed } from '../../errors.js';
import type { Account } from '../../storage/people.repository.js';
import type { PageRequest } from '../http/exchange.js';

/** The signed-in person, as far as a page needs to know. */
export interface Viewer extends Account {
  /** Goes into every form, and must come back with it. */
  readonly formToken: string;
}

export const openToStrangersKey = 'stillair:open-to-strangers';

/** Lets a handler answer somebody who is not signed in. Sign-in, the first link and health only. */
export const OpenToStrangers = () => SetMetadata(openToStrangersKey, true);

/** The signed-in person of this request. */
export const CurrentViewer = createParamDecorator(
  (_: unknown, context: ExecutionContext): Viewer => {
    const { viewer } = context.switchToHttp().getRequest<PageRequest>();
    if (viewer === undefined) throw new NotAllowed('You are not signed in.', 'Sign in first.');
    return viewer;
  },
);
