import { Injectable, type CanActivate, type ExecutionContext } from '@nestjs/common';
import { Settings } from '../../config.js';
import { NotAllowed } from '../../errors.js';
import type { PageRequest } from '../http/exchange.js';
import { formTokenField } from '../forms/form-token.js';
import { isSameText } from './token.js';

const harmless = new Set(['GET', 'HEAD', 'OPTIONS']);

/**
 * Keeps other sites from acting in a signed-in person's name. A changing request must come from our
 * own pages as far as the browser tells, and a form must carry the token of the session it was
 * rendered for. Runs after the session guard.
 */
@Injectable()
export class SameSiteGuard implements CanActivate {
  constructor(private readonly settings: Settings) {}

  canActivate(context: ExecutionContext): boolean {
    const request = context.switchToHttp().getRequest<PageRequest>();
    if (harmless.has(request.method)) return true;
    if (!this.#isFromOurPages(request)) {
      throw new NotAllowed(
        'This came from another site, so nothing was done.',
        'Open the page in Stillair itself and try again there.',
      );
    }
    if (request.viewer === undefined || this.#carriesProof(request, request.viewer.formToken)) {
      return true;
    }
    throw new NotAllowed(
      'This form was opened under another sign-in, so nothing was saved.',
      'Go back, load the page again, and send the form once more.',
    );
  }

  #isFromOurPages({ headers, host }: PageRequest): boolean {
    const site = headers['sec-fetch-site'];
    if (site !== undefined && site !== 'same-origin' && site !== 'none') return false;
    const { origin } = headers;
    if (origin === undefined) return true;
    if (origin === this.settings.publicUrl) return true;
    return URL.canParse(origin) && new URL(origin).host === host;
  }

  #carriesProof(request: PageRequest, token: string): boolean {
    // A foreign page can send a form without asking, but JSON only after a permission we never give.
    const type = request.headers['content-type'] ?? '';
    if (/^application\/json\b/i.test(type)) return true;
    const body = request.body as Readonly<Record<string, unknown>> | null | undefined;
    const sent = body?.[formTokenField] ?? request.headers['x-form-token'];
    return typeof sent === 'string' && isSameText(sent, token);
  }
}
