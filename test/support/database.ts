import { mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { onTestFinished } from 'vitest';
import { openDatabase, type Database } from '../../src/storage/database.js';

/** A folder of its own, gone when the test is over. */
export function freshFolder(): string {
  const folder = mkdtempSync(join(tmpdir(), 'stillair-'));
  onTestFinished(() => {
    rmSync(folder, { recursive: true, force: true });
  });
  return folder;
}

/** A new database, built by the migrations as at a real first start, closed when the test is over. */
export async function freshDatabase(): Promise<Database> {
  const database = await openDatabase(join(freshFolder(), 'stillair.db'));
  onTestFinished(() => database.close());
  return database;
}
