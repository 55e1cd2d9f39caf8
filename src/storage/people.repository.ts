import { Injectable } from '@nestjs/common';
import { Conflict, NotAllowed } from '../errors.js';
import { Database } from './database.js';
import type { Role } from './generated/client.js';

export type { Role };

export interface Account {
  readonly id: string;
  readonly email: string;
  readonly name: string;
  readonly role: Role;
}

export interface AccountWithPassword extends Account {
  readonly passwordHash: string;
}

export type NewAccount = Omit<AccountWithPassword, 'id'>;

const shown = { id: true, email: true, name: true, role: true } as const;

/** Accounts and the link that creates the first of them. */
@Injectable()
export class PeopleRepository {
  constructor(private readonly database: Database) {}

  async count(): Promise<number> {
    return this.database.read((db) => db.account.count());
  }

  async list(): Promise<readonly Account[]> {
    return this.database.read((db) =>
      db.account.findMany({ select: shown, orderBy: [{ name: 'asc' }, { id: 'asc' }] }),
    );
  }

  async findByEmail(email: string): Promise<AccountWithPassword | undefined> {
    const account = await this.database.read((db) =>
      db.account.findUnique({
        where: { email: email.toLowerCase() },
        select: { ...shown, passwordHash: true },
      }),
    );
    return account ?? undefined;
  }

  /** Makes this the only link that can create the first account. */
  async replaceSetupLink(tokenHash: string, expiresAt: Date): Promise<void> {
    await this.database.write(async (db) => {
      await db.setupLink.deleteMany({ where: { usedAt: null } });
      await db.setupLink.create({ data: { id: tokenHash, expiresAt } });
    });
  }

  async isSetupLinkOpen(tokenHash: string, now: Date): Promise<boolean> {
    return this.database.read(
      async (db) =>
        (await db.account.count()) === 0 &&
        (await db.setupLink.count({
          where: { id: tokenHash, usedAt: null, expiresAt: { gt: now } },
        })) > 0,
    );
  }

  /**
   * The first account, for the holder of the link. The link is used up with it, in one transaction:
   * two people who follow it at once do not both get in.
   *
   * @throws {NotAllowed} when the link is used, expired or unknown; {Conflict} when an account exists
   */
  async createFirst(tokenHash: string, account: NewAccount, now: Date): Promise<Account> {
    return this.database.write(async (db) => {
      const { count } = await db.setupLink.updateMany({
        where: { id: tokenHash, usedAt: null, expiresAt: { gt: now } },
        data: { usedAt: now },
      });
      if (count === 0) {
        throw new NotAllowed(
          'This link has been used, or has expired.',
          'Sign in, or start Stillair again to have a new link printed on its terminal.',
        );
      }
      if ((await db.account.count()) > 0) {
        throw new Conflict('The first account exists already.', 'Sign in with it.');
      }
      return db.account.create({
        data: { ...account, email: account.email.toLowerCase() },
        select: shown,
      });
    });
  }
}
