import { createParamDecorator, type ExecutionContext } from '@nestjs/common';
import type { PageReply } from './exchange.js';

/** Fires when the client of this request goes away before it has its answer. */
export const ClientSignal = createParamDecorator(
  (_: unknown, context: ExecutionContext): AbortSignal => {
    const { raw } = context.switchToHttp().getResponse<PageReply>();
    const gone = new AbortController();
    if (raw.destroyed) gone.abort();
    raw.once('close', () => {
      if (!raw.writableFinished) gone.abort();
    });
    return gone.signal;
  },
);
