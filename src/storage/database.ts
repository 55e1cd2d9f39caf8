import { mkdirSync } from 'node:fs';
import { dirname } from 'node:path';
import { fileURLToPath } from 'node:url';
import { PrismaBetterSqlite3 } from '@prisma/adapter-better-sqlite3';
import { PrismaClient, type Prisma } from './generated/client.js';
import { applyMigrations, type MigrationReport } from './migrations.js';
import { storageFailure } from './storage-failure.js';

/** What a repository may do inside one write. */
export type Writing = Prisma.TransactionClient;
/** The same calls, on a connection that refuses every change. */
export type Reading = Prisma.TransactionClient;

const migrationsFolder = fileURLToPath(new URL('../../prisma/migrations', import.meta.url));

const busyTimeoutMs = 5000;
const writingPragmas = [
  'PRAGMA journal_mode = WAL',
  // A save that returned is on the disk, power cut or not. The adapter opens with NORMAL.
  'PRAGMA synchronous = FULL',
  'PRAGMA foreign_keys = ON',
  `PRAGMA busy_timeout = ${String(busyTimeoutMs)}`,
];
const readingPragmas = [
  'PRAGMA query_only = ON',
  'PRAGMA foreign_keys = ON',
  `PRAGMA busy_timeout = ${String(busyTimeoutMs)}`,
];

/** The driver adapter, with our settings on each connection that it opens. */
class SettledSqlite extends PrismaBetterSqlite3 {
  readonly #pragmas: readonly string[];

  constructor(file: string, pragmas: readonly string[]) {
    super({ url: file, timeout: busyTimeoutMs });
    this.#pragmas = pragmas;
  }

  override async connect(): ReturnType<PrismaBetterSqlite3['connect']> {
    const connection = await super.connect();
    await connection.executeScript(this.#pragmas.join(';\n'));
    return connection;
  }
}

/**
 * The open database. Writes queue up one behind the other on a connection of their own: the adapter
 * runs every call on one connection, so that a save made while another's transaction is open would
 * join it, be acknowledged, and vanish with it. Reads have a second connection and see only what is
 * committed.
 */
export class Database {
  readonly file: string;
  readonly migrated: MigrationReport;
  readonly #writer: PrismaClient;
  readonly #reader: PrismaClient;
  #lastWrite: Promise<unknown> = Promise.resolve();

  constructor(file: string, migrated: MigrationReport) {
    this.file = file;
    this.migrated = migrated;
    this.#writer = new PrismaClient({ adapter: new SettledSqlite(file, writingPragmas) });
    this.#reader = new PrismaClient({ adapter: new SettledSqlite(file, readingPragmas) });
  }

  async connect(): Promise<void> {
    await this.#told(async () => {
      await this.#writer.$connect();
      await this.#reader.$connect();
    });
  }

  /** The answer of a reading. */
  async read<T>(work: (db: Reading) => Promise<T>): Promise<T> {
    return this.#told(() => work(this.#reader));
  }

  /** Runs the work as one transaction: all of it is on the disk when this returns, or none of it. */
  async write<T>(work: (db: Writing) => Promise<T>): Promise<T> {
    const mine = this.#lastWrite.then(() =>
      this.#told(() => this.#writer.$transaction(work, { maxWait: 15_000, timeout: 15_000 })),
    );
    this.#lastWrite = mine.catch(() => undefined);
    return mine;
  }

  async close(): Promise<void> {
    await this.#lastWrite;
    await this.#reader.$disconnect();
    await this.#writer.$disconnect();
  }

  async #told<T>(work: () => Promise<T>): Promise<T> {
    try {
      return await work();
    } catch (error) {
      throw storageFailure(error, this.file);
    }
  }
}

/**
 * The database at this file, created or brought up to date.
 *
 * @throws {StorageUnavailable} when the file or its folder cannot be used, with what to do about it
 * @throws {Conflict} when the file was built by migrations that this version does not know
 */
export async function openDatabase(file: string): Promise<Database> {
  try {
    mkdirSync(dirname(file), { recursive: true, mode: 0o700 });
    const database = new Database(file, applyMigrations(file, migrationsFolder));
    await database.connect();
    return database;
  } catch (error) {
    throw storageFailure(error, file);
  }
}
