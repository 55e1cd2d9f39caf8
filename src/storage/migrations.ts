import { createHash, randomUUID } from 'node:crypto';
import {
  closeSync,
  existsSync,
  fsyncSync,
  openSync,
  readFileSync,
  readdirSync,
  renameSync,
  rmSync,
} from 'node:fs';
import { join } from 'node:path';
import Sqlite from 'better-sqlite3';
import { Conflict } from '../errors.js';

interface Migration {
  readonly name: string;
  readonly sql: string;
  readonly checksum: string;
}

interface AppliedRow {
  readonly migration_name: string;
  readonly checksum: string;
  readonly finished_at: unknown;
}

export interface MigrationReport {
  readonly applied: readonly string[];
  /** The copy made before the first change, when there was something to copy. */
  readonly copiedTo?: string;
}

// The record of the ordinary tool, column for column, so that it can take over where there is a network.
const recordTable = `CREATE TABLE IF NOT EXISTS "_prisma_migrations" (
    "id"                    TEXT PRIMARY KEY NOT NULL,
    "checksum"              TEXT NOT NULL,
    "finished_at"           DATETIME,
    "migration_name"        TEXT NOT NULL,
    "logs"                  TEXT,
    "rolled_back_at"        DATETIME,
    "started_at"            DATETIME NOT NULL DEFAULT current_timestamp,
    "applied_steps_count"   INTEGER UNSIGNED NOT NULL DEFAULT 0
)`;

function migrationsIn(folder: string): readonly Migration[] {
  return readdirSync(folder, { withFileTypes: true })
    .filter((entry) => entry.isDirectory())
    .map((entry) => entry.name)
    .sort()
    .map((name) => {
      const sql = readFileSync(join(folder, name, 'migration.sql'), 'utf8');
      return { name, sql, checksum: createHash('sha256').update(sql).digest('hex') };
    });
}

function tableNames(db: Sqlite.Database): readonly string[] {
  return db
    .prepare<[], { name: string }>(
      `SELECT name FROM sqlite_master WHERE type = 'table' AND name NOT LIKE 'sqlite_%'`,
    )
    .all()
    .map(({ name }) => name);
}

function appliedIn(db: Sqlite.Database): readonly AppliedRow[] {
  if (!tableNames(db).includes('_prisma_migrations')) return [];
  return db
    .prepare<[], AppliedRow>(
      'SELECT migration_name, checksum, finished_at FROM "_prisma_migrations" WHERE rolled_back_at IS NULL',
    )
    .all();
}

function refuseWhatWeCannotVouchFor(
  db: Sqlite.Database,
  known: readonly Migration[],
  file: string,
): void {
  const tables = tableNames(db);
  if (tables.length > 0 && !tables.includes('_prisma_migrations')) {
    throw new Conflict(
      `The database ${file} holds tables that Stillair did not make.`,
      'Set DATABASE_URL to a new file, or to the database of Stillair.',
    );
  }
  for (const row of appliedIn(db)) {
    const migration = known.find(({ name }) => name === row.migration_name);
    if (migration === undefined) {
      throw new Conflict(
        `The database ${file} was changed by a newer version of Stillair (migration ${row.migration_name}), which this version does not know.`,
        'Start the version that wrote it, or set DATABASE_URL to a copy made before that change (named "....before-..." in the same folder).',
      );
    }
    if (migration.checksum !== row.checksum) {
      throw new Conflict(
        `The migration ${row.migration_name} is not the one that the database ${file} was built with.`,
        `Restore prisma/migrations/${row.migration_name}/migration.sql as it was: a migration is never edited, a new one is added.`,
      );
    }
    if (row.finished_at === null) {
      throw new Conflict(
        `The migration ${row.migration_name} was begun on the database ${file} and never finished.`,
        'Put the copy made before it (named "....before-..." in the same folder) in its place, then start again.',
      );
    }
  }
}

/** A complete copy beside the original, on the disk before this returns. */
function copyAside(db: Sqlite.Database, file: string, before: string): string {
  let target = `${file}.before-${before}`;
  for (let count = 2; existsSync(target); count += 1) {
    target = `${file}.before-${before}-${String(count)}`;
  }
  const partial = `${target}.partial`;
  rmSync(partial, { force: true });
  db.prepare('VACUUM INTO ?').run(partial);
  const handle = openSync(partial, 'r+');
  fsyncSync(handle);
  closeSync(handle);
  renameSync(partial, target);
  return target;
}

function applyOne(db: Sqlite.Database, migration: Migration): void {
  const startedAt = Date.now();
  db.exec(migration.sql);
  const broken = db.pragma('foreign_key_check') as unknown[];
  if (broken.length > 0) {
    throw new Conflict(
      `The migration ${migration.name} would leave ${String(broken.length)} rows without what they refer to; nothing was changed.`,
      'Report this with the name of the migration; the database is as it was.',
    );
  }
  db.prepare(
    `INSERT INTO "_prisma_migrations" (id, checksum, migration_name, started_at, finished_at, applied_steps_count)
     VALUES (?, ?, ?, ?, ?, 1)`,
  ).run(randomUUID(), migration.checksum, migration.name, startedAt, Date.now());
}

/**
 * Brings the database file to the newest migration, each in a transaction of its own, with a copy of
 * the file made first when it already holds something.
 *
 * @throws {Conflict} when the file was built by migrations that are unknown here, or that have changed
 */
export function applyMigrations(file: string, folder: string): MigrationReport {
  const known = migrationsIn(folder);
  const db = new Sqlite(file);
  try {
    db.pragma('busy_timeout = 5000');
    db.pragma('journal_mode = WAL');
    db.pragma('synchronous = FULL');
    // Rebuilding a table drops the old one, which with foreign keys on would delete the rows that
    // refer to it. The pragma has no effect inside a transaction, so it is set here and the references
    // are checked before each commit instead.
    db.pragma('foreign_keys = OFF');
    refuseWhatWeCannotVouchFor(db, known, file);

    const done = new Set(appliedIn(db).map((row) => row.migration_name));
    const [first] = known.filter(({ name }) => !done.has(name));
    if (first === undefined) return { applied: [] };
    const copiedTo = done.size > 0 ? copyAside(db, file, first.name) : undefined;

    db.exec(recordTable);
    const applied: string[] = [];
    for (const migration of known) {
      // Asked again under the write lock: another start may have been quicker.
      const inOneGo = db.transaction(() => {
        if (appliedIn(db).some((row) => row.migration_name === migration.name)) return;
        applyOne(db, migration);
        applied.push(migration.name);
      });
      inOneGo.immediate();
    }
    return copiedTo === undefined ? { applied } : { applied, copiedTo };
  } finally {
    db.close();
  }
}
