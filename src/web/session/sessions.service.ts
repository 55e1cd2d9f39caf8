// Adds cookies to the types of request and reply.
import type {} from '@fastify/cookie';
import { Injectable } from '@nestjs/common';
import { Settings } from '../../config.js';
import type { Account } from '../../storage/people.repository.js';
import { SessionsRepository } from '../../storage/sessions.repository.js';
import type { PageReply, PageRequest } from '../http/exchange.js';
import { formTokenOf, freshToken, tokenHash } from './token.js';
import type { Viewer } from './viewer.js';

const minuteMs = 60_000;
/** How often being active is written down. More would write to the disk with every page. */
const touchEveryMs = 5 * minuteMs;

/** Opens, recognises and closes the sessions that signed-in people have. */
@Injectable()
export class SessionsService {
  constructor(
    private readonly sessions: SessionsRepository,
    private readonly settings: Settings,
  ) {}

  /** Whoever the cookie of this request belongs to, or nobody. */
  async viewerOf(request: PageRequest): Promise<Viewer | undefined> {
    const token = this.#tokenOf(request);
    if (token === undefined) return undefined;
    const now = new Date();
    const session = await this.sessions.find(tokenHash(token), now);
    if (session === undefined) return undefined;
    if (now.getTime() - session.lastSeenAt.getTime() > touchEveryMs) {
      await this.sessions.touch(session.id, now, this.#endFrom(now));
    }
    return { ...session.account, formToken: formTokenOf(token) };
  }

  /** Signs the account in under a token that nobody has seen before, whatever the browser sent. */
  async open(request: PageRequest, reply: PageReply, account: Account): Promise<void> {
    const token = freshToken();
    const now = new Date();
    const earlier = this.#tokenOf(request);
    await this.sessions.open(
      tokenHash(token),
      account.id,
      { now, expiresAt: this.#endFrom(now) },
      earlier === undefined ? undefined : tokenHash(earlier),
    );
    void reply.setCookie(this.#cookieName, token, this.#cookieRules);
  }

  async close(request: PageRequest, reply: PageReply): Promise<void> {
    const token = this.#tokenOf(request);
    if (token !== undefined) await this.sessions.close(tokenHash(token));
    void reply.clearCookie(this.#cookieName, this.#cookieRules);
  }

  get #isSecure(): boolean {
    return this.settings.publicUrl?.startsWith('https:') ?? false;
  }

  get #cookieName(): string {
    // A browser keeps this prefix to cookies that this very host set over an encrypted connection.
    return this.#isSecure ? '__Host-stillair' : 'stillair';
  }

  get #cookieRules() {
    return { path: '/', httpOnly: true, sameSite: 'lax', secure: this.#isSecure } as const;
  }

  #tokenOf(request: PageRequest): string | undefined {
    const token = request.cookies[this.#cookieName];
    return token !== undefined && /^[\w-]{43}$/.test(token) ? token : undefined;
  }

  #endFrom(now: Date): Date {
    return new Date(now.getTime() + this.settings.sessionHours * 60 * minuteMs);
  }
}
