import { Injectable } from '@nestjs/common';
import { PeopleRepository, type Account } from '../storage/people.repository.js';
import { freshToken, tokenHash } from '../web/session/token.js';
import { passwordHash } from './password.js';

const lifeMs = 24 * 3_600_000;

export interface FirstAccount {
  readonly name: string;
  readonly email: string;
  readonly password: string;
}

/** The one-time link by which the first person gets in. */
@Injectable()
export class FirstLinkService {
  constructor(private readonly people: PeopleRepository) {}

  /** Path of a new link, which replaces any earlier one; nothing once there is an account. */
  async renew(): Promise<string | undefined> {
    if ((await this.people.count()) > 0) return undefined;
    const token = freshToken();
    await this.people.replaceSetupLink(tokenHash(token), new Date(Date.now() + lifeMs));
    return `/first/${token}`;
  }

  async isOpen(token: string): Promise<boolean> {
    return this.people.isSetupLinkOpen(tokenHash(token), new Date());
  }

  /** @throws {NotAllowed} when the link is used, expired or unknown */
  async createAdministrator(token: string, account: FirstAccount): Promise<Account> {
    return this.people.createFirst(
      tokenHash(token),
      {
        name: account.name,
        email: account.email,
        role: 'administrator',
        passwordHash: await passwordHash(account.password),
      },
      new Date(),
    );
  }
}
