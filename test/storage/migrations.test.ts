import { execFileSync } from 'node:child_process';
import { createHash } from 'node:crypto';
import { appendFileSync, cpSync, mkdirSync, readdirSync, rmSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';
import Sqlite from 'better-sqlite3';
import { describe, expect, it } from 'vitest';
import { applyMigrations } from '../../src/storage/migrations.js';
import { freshFolder } from '../support/database.js';

const root = fileURLToPath(new URL('../..', import.meta.url));
const real = join(root, 'prisma', 'migrations');
const first = '20261201120000_first_rooms';

/** A database at the first migration, and a copy of the migrations that a test may change. */
function atFirst(): { file: string; folder: string; db: Sqlite.Database } {
  const base = freshFolder();
  const folder = join(base, 'migrations');
  mkdirSync(folder);
  cpSync(join(real, first), join(folder, first), { recursive: true });
  const file = join(base, 'stillair.db');
  applyMigrations(file, folder);
  return { file, folder, db: new Sqlite(file) };
}

function addMigration(folder: string, name: string, sql: string): void {
  mkdirSync(join(folder, name));
  writeFileSync(join(folder, name, 'migration.sql'), sql);
}

const addVenue = (db: Sqlite.Database) => {
  db.exec(`INSERT INTO "Venue" (id, name, site, updatedAt) VALUES ('v', 'Hall', '{}', '2026-12-01');
    INSERT INTO "Space" (id, venueId, key, title, position, data) VALUES ('s', 'v', 'hall', 'Hall', 0, '{}')`);
};

const columnsOf = (db: Sqlite.Database, table: string): unknown[] =>
  db.prepare(`SELECT name FROM pragma_table_info('${table}')`).pluck().all();

describe('migrations', () => {
  it('give exactly the schema that the database client is generated from', () => {
    const said = execFileSync('node', ['.scripts/migration.mjs', '--check'], {
      cwd: root,
      encoding: 'utf8',
    });

    expect(said).toBe('Schema and migrations agree.\n');
  });

  it('are recorded with the SHA-256 of their text, as the ordinary tool does', () => {
    const { db, folder } = atFirst();
    const sql = execFileSync('cat', [join(folder, first, 'migration.sql')]);

    const rows = db.prepare('SELECT * FROM "_prisma_migrations"').all();

    expect(rows).toEqual([
      expect.objectContaining({
        migration_name: first,
        checksum: createHash('sha256').update(sql).digest('hex'),
        rolled_back_at: null,
        applied_steps_count: 1,
        logs: null,
      }),
    ]);
  });

  it('change nothing and copy nothing when all are applied', () => {
    const { file, folder } = atFirst();

    expect(applyMigrations(file, folder)).toEqual({ applied: [] });
    expect(readdirSync(join(file, '..')).filter((name) => name.includes('before'))).toEqual([]);
  });

  it('copy the file aside before the first change, with what it held', () => {
    const { file, folder, db } = atFirst();
    addVenue(db);
    addMigration(folder, '20270101000000_wider', 'ALTER TABLE "Venue" ADD COLUMN "town" TEXT;');

    const { applied, copiedTo } = applyMigrations(file, folder);

    expect(applied).toEqual(['20270101000000_wider']);
    expect(copiedTo).toBe(`${file}.before-20270101000000_wider`);
    const copy = new Sqlite(copiedTo ?? '', { readonly: true });
    expect(copy.prepare('SELECT name FROM "Venue"').pluck().all()).toEqual(['Hall']);
    expect(columnsOf(copy, 'Venue')).not.toContain('town');
    expect(columnsOf(db, 'Venue')).toContain('town');
  });

  it('leave the file as it was when one of them fails half-way', () => {
    const { file, folder, db } = atFirst();
    addMigration(
      folder,
      '20270101000000_broken',
      'ALTER TABLE "Venue" ADD COLUMN "town" TEXT; ALTER TABLE "Nowhere" ADD COLUMN "x" TEXT;',
    );

    expect(() => applyMigrations(file, folder)).toThrow(/Nowhere/);

    expect(columnsOf(db, 'Venue')).not.toContain('town');
    expect(db.prepare('SELECT migration_name FROM "_prisma_migrations"').pluck().all()).toEqual([
      first,
    ]);
  });

  it('keep the rows that refer to a table which is rebuilt', () => {
    const { file, folder, db } = atFirst();
    addVenue(db);
    // The form in which the ordinary tool rebuilds a table: new one, copy, drop, rename.
    addMigration(
      folder,
      '20270101000000_rebuild',
      `PRAGMA defer_foreign_keys=ON;
      PRAGMA foreign_keys=OFF;
      CREATE TABLE "new_Venue" ("id" TEXT NOT NULL PRIMARY KEY, "name" TEXT NOT NULL, "site" JSONB NOT NULL,
        "version" INTEGER NOT NULL DEFAULT 1, "createdAt" DATETIME NOT NULL DEFAULT CURRENT_TIMESTAMP,
        "updatedAt" DATETIME NOT NULL);
      INSERT INTO "new_Venue" SELECT id, name, site, version, createdAt, updatedAt FROM "Venue";
      DROP TABLE "Venue";
      ALTER TABLE "new_Venue" RENAME TO "Venue";
      PRAGMA foreign_keys=ON;
      PRAGMA defer_foreign_keys=OFF;`,
    );

    applyMigrations(file, folder);

    expect(db.prepare('SELECT key FROM "Space"').pluck().all()).toEqual(['hall']);
  });

  it('refuse to leave rows without what they refer to', () => {
    const { file, folder, db } = atFirst();
    addVenue(db);
    addMigration(folder, '20270101000000_orphans', 'DELETE FROM "Venue";');

    expect(() => applyMigrations(file, folder)).toThrow(/would leave 1 rows without/);
    expect(db.prepare('SELECT count(*) FROM "Venue"').pluck().get()).toBe(1);
  });

  it('refuse a database that a newer version has changed', () => {
    const { file, folder } = atFirst();
    addMigration(folder, '20270101000000_newer', 'ALTER TABLE "Venue" ADD COLUMN "town" TEXT;');
    applyMigrations(file, folder);
    rmSync(join(folder, '20270101000000_newer'), { recursive: true });

    expect(() => applyMigrations(file, folder)).toThrow(/newer version of Stillair/);
  });

  it('refuse when the text of an applied one has changed', () => {
    const { file, folder } = atFirst();
    appendFileSync(join(folder, first, 'migration.sql'), '-- a small correction\n');

    expect(() => applyMigrations(file, folder)).toThrow(
      new RegExp(`${first} is not the one that the database`),
    );
  });

  it('refuse when one was begun and never finished', () => {
    const { file, folder, db } = atFirst();
    db.exec('UPDATE "_prisma_migrations" SET finished_at = NULL');

    expect(() => applyMigrations(file, folder)).toThrow(/never finished/);
  });

  it('refuse a database that belongs to another program', () => {
    const { folder } = atFirst();
    const file = join(freshFolder(), 'other.db');
    const other = new Sqlite(file);
    other.exec('CREATE TABLE invoices (id INTEGER)');

    expect(() => applyMigrations(file, folder)).toThrow(/tables that Stillair did not make/);
    expect(other.prepare('SELECT name FROM sqlite_master').pluck().all()).toEqual(['invoices']);
  });
});
