import { createParamDecorator, SetMetadata, type ExecutionContext } from '@nestjs/common';
import { NotAllowed } from '../../errors.js';
import type { PageRequest } from '../http/exchange.js';
import type { Viewer } from './signed-in-person.js';

export type { Viewer };

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
