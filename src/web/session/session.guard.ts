import { Injectable, type CanActivate, type ExecutionContext } from '@nestjs/common';
import { Reflector } from '@nestjs/core';
import { NotAllowed } from '../../errors.js';
import type { PageRequest } from '../http/exchange.js';
import { SessionsService } from './sessions.service.js';
import { openToStrangersKey } from './viewer.js';

/** Somebody asked for a page without being signed in; the filter sends a browser to sign-in. */
export class SignInNeeded extends NotAllowed {
  constructor() {
    super('You are not signed in.', 'Sign in, then try again.');
    this.name = 'SignInNeeded';
  }
}

/** Nobody who is not signed in gets past, unless the handler says that it answers strangers. */
@Injectable()
export class SessionGuard implements CanActivate {
  constructor(
    private readonly reflector: Reflector,
    private readonly sessions: SessionsService,
  ) {}

  async canActivate(context: ExecutionContext): Promise<boolean> {
    const request = context.switchToHttp().getRequest<PageRequest>();
    const viewer = await this.sessions.viewerOf(request);
    if (viewer !== undefined) {
      request.viewer = viewer;
      return true;
    }
    const open = this.reflector.getAllAndOverride<boolean | undefined>(openToStrangersKey, [
      context.getHandler(),
      context.getClass(),
    ]);
    if (open === true) return true;
    throw new SignInNeeded();
  }
}
