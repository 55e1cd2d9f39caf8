import { chmodSync, chownSync, readFileSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import Sqlite from 'better-sqlite3';
import { describe, expect, it } from 'vitest';
import { openDatabase } from '../../src/storage/database.js';
import { PlansRepository } from '../../src/storage/plans.repository.js';
import { freshDatabase, freshFolder } from '../support/database.js';

describe('the connections of the database', () => {
  it('write in WAL mode, synchronous FULL, foreign keys on, waiting 5 s for a lock', async () => {
    const database = await freshDatabase();
    const pragma = (name: string) =>
      database.write((db) => db.$queryRawUnsafe<Record<string, unknown>[]>(`PRAGMA ${name}`));

    const values = await Promise.all(
      ['journal_mode', 'synchronous', 'foreign_keys', 'busy_timeout'].map(pragma),
    );

    // synchronous: 0 OFF, 1 NORMAL, 2 FULL (SQLite documentation, "PRAGMA synchronous").
    expect(values.map(([row]) => String(Object.values(row ?? {})[0]))).toEqual([
      'wal',
      '2',
      '1',
      '5000',
    ]);
  });

  it('refuse a change on the reading side', async () => {
    const database = await freshDatabase();

    await expect(
      database.read((db) => db.venue.create({ data: { name: 'Hall', site: {} } })),
    ).rejects.toThrow();
    expect(await database.read((db) => db.venue.count())).toBe(0);
  });

  it('show a reader nothing of a transaction that is still open', async () => {
    const database = await freshDatabase();
    let seenMeanwhile: number | undefined;

    await database.write(async (db) => {
      await db.venue.create({ data: { name: 'Hall', site: {} } });
      seenMeanwhile = await database.read((other) => other.venue.count());
    });

    expect(seenMeanwhile).toBe(0);
    expect(await database.read((db) => db.venue.count())).toBe(1);
  });

  it('keep a save that was made while another, failing one was under way', async () => {
    const database = await freshDatabase();
    const failing = database.write(async (db) => {
      await db.venue.create({ data: { name: 'Lost', site: {} } });
      await new Promise((resolve) => setTimeout(resolve, 50));
      throw new Error('changed my mind');
    });
    const kept = database.write((db) => db.venue.create({ data: { name: 'Kept', site: {} } }));

    await expect(failing).rejects.toThrow('changed my mind');
    await kept;

    const venues = await database.read((db) => db.venue.findMany());
    expect(venues.map(({ name }) => name)).toEqual(['Kept']);
  });

  it('report a full disk in words, keep what was saved, and save again once there is room', async () => {
    const database = await freshDatabase();
    const plans = new PlansRepository(database);
    const account = await database.write((db) =>
      db.account.create({
        data: { email: 'a@example.org', name: 'A', role: 'coordinator', passwordHash: '-' },
      }),
    );
    const content = (size: number) => ({
      title: 'Plan',
      venueId: null,
      document: { text: 'x'.repeat(size) },
    });
    const before = await plans.create(content(10), account.id);
    const limit = (pages: number) =>
      database.write((db) => db.$queryRawUnsafe(`PRAGMA max_page_count = ${String(pages)}`));
    // SQLite answers a file that may not grow with the same SQLITE_FULL as a disk without room.
    await limit(1);

    await expect(plans.save(before.id, 1, content(2_000_000), account.id)).rejects.toMatchObject({
      name: 'StorageUnavailable',
      message: expect.stringContaining('no room left') as unknown,
      hint: expect.stringContaining('Free some space') as unknown,
    });
    expect((await plans.get(before.id)).document).toEqual({ text: 'xxxxxxxxxx' });

    await limit(1_000_000);
    const after = await plans.save(before.id, 1, content(2_000_000), account.id);
    expect(after.version).toBe(2);
  });
});

/** Runs the work as somebody whom file permissions bind: they do not bind the superuser. */
async function asOrdinaryPerson<T>(folder: string, work: () => Promise<T>): Promise<T> {
  const nobody = 65_534;
  if (process.getuid?.() !== 0) return work();
  chownSync(folder, nobody, nobody);
  process.seteuid?.(nobody);
  try {
    return await work();
  } finally {
    process.seteuid?.(0);
  }
}

describe('opening a database', () => {
  it('says so when the folder may not be written', async () => {
    const folder = freshFolder();
    chmodSync(folder, 0o555);
    const file = join(folder, 'stillair.db');

    await asOrdinaryPerson(folder, () =>
      expect(openDatabase(file)).rejects.toMatchObject({
        name: 'StorageUnavailable',
        message: `The database ${file} cannot be opened.`,
        hint: expect.stringContaining('DATABASE_URL') as unknown,
      }),
    );
    await asOrdinaryPerson(folder, () =>
      expect(openDatabase(join(folder, 'data', 'stillair.db'))).rejects.toMatchObject({
        name: 'StorageUnavailable',
        message: `The database ${join(folder, 'data', 'stillair.db')} may not be written.`,
      }),
    );
  });

  it('says so when the file in a read-only folder exists but may not be written', async () => {
    const folder = freshFolder();
    const file = join(folder, 'stillair.db');
    await (await openDatabase(file)).close();
    chmodSync(file, 0o444);
    chmodSync(folder, 0o555);

    await asOrdinaryPerson(folder, () =>
      expect(openDatabase(file)).rejects.toMatchObject({
        name: 'StorageUnavailable',
        message: expect.stringMatching(/may not be written|cannot be opened/) as unknown,
      }),
    );
  });

  it('says so when the file is not a database', async () => {
    const file = join(freshFolder(), 'notes.db');
    writeFileSync(file, 'these are my notes, please leave them alone'.repeat(100));

    await expect(openDatabase(file)).rejects.toMatchObject({
      name: 'StorageUnavailable',
      message: `The file ${file} is damaged or is not a database.`,
    });
    expect(readFileSync(file, 'utf8')).toMatch(/^these are my notes/);
  });

  it('says so when the folder cannot be made', async () => {
    const folder = freshFolder();
    writeFileSync(join(folder, 'data'), '');
    const file = join(folder, 'data', 'stillair.db');

    await expect(openDatabase(file)).rejects.toMatchObject({
      name: 'StorageUnavailable',
      message: `The database ${file} cannot be opened.`,
    });
  });

  it('says so when another program holds the lock', async () => {
    const file = join(freshFolder(), 'stillair.db');
    const other = new Sqlite(file);
    other.exec('BEGIN EXCLUSIVE');

    await expect(openDatabase(file)).rejects.toMatchObject({
      name: 'StorageUnavailable',
      message: `The database ${file} is locked by another program.`,
    });
    other.close();
  });
});
