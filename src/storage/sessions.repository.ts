import { Injectable } from '@nestjs/common';
import { Database } from './database.js';
import type { Account } from './people.repository.js';

export interface StoredSession {
  readonly id: string;
  readonly account: Account;
  readonly expiresAt: Date;
  readonly lastSeenAt: Date;
}

/** Who is signed in. A session is known by the hash of its token; the token itself is never kept. */
@Injectable()
export class SessionsRepository {
  constructor(private readonly database: Database) {}

  /** The session, unless it has expired. */
  async find(tokenHash: string, now: Date): Promise<StoredSession | undefined> {
    const session = await this.database.read((db) =>
      db.session.findUnique({
        where: { id: tokenHash, expiresAt: { gt: now } },
        include: { account: { omit: { passwordHash: true } } },
      }),
    );
    if (session === null) return undefined;
    const { id, email, name, role } = session.account;
    return {
      id: session.id,
      account: { id, email, name, role },
      expiresAt: session.expiresAt,
      lastSeenAt: session.lastSeenAt,
    };
  }

  /** Opens a session and, in the same step, closes the one it replaces and clears out expired ones. */
  async open(
    tokenHash: string,
    accountId: string,
    times: { readonly now: Date; readonly expiresAt: Date },
    replaces?: string,
  ): Promise<void> {
    await this.database.write(async (db) => {
      await db.session.deleteMany({ where: { expiresAt: { lte: times.now } } });
      if (replaces !== undefined) await db.session.deleteMany({ where: { id: replaces } });
      await db.session.create({
        data: { id: tokenHash, accountId, expiresAt: times.expiresAt, lastSeenAt: times.now },
      });
    });
  }

  async touch(tokenHash: string, now: Date, expiresAt: Date): Promise<void> {
    await this.database.write((db) =>
      db.session.updateMany({
        where: { id: tokenHash },
        data: { lastSeenAt: now, expiresAt },
      }),
    );
  }

  async close(tokenHash: string): Promise<void> {
    await this.database.write((db) => db.session.deleteMany({ where: { id: tokenHash } }));
  }
}
