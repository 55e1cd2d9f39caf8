import { spawn } from 'node:child_process';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';
import Sqlite from 'better-sqlite3';
import { expect, it } from 'vitest';
import { openDatabase } from '../../src/storage/database.js';
import { PlansRepository } from '../../src/storage/plans.repository.js';
import { VenuesRepository } from '../../src/storage/venues.repository.js';
import { freshFolder } from '../support/database.js';

const root = fileURLToPath(new URL('../..', import.meta.url));
const kills = Number(process.env.STILLAIR_KILLS ?? 10);

/** Numbers in [0, 1) that are the same on every run (mulberry32; Tommy Ettinger, public domain). */
function seeded(seed: number): () => number {
  let state = seed;
  return () => {
    state = (state + 0x6d2b79f5) | 0;
    let t = Math.imul(state ^ (state >>> 15), 1 | state);
    t = (t + Math.imul(t ^ (t >>> 7), 61 | t)) ^ t;
    return ((t ^ (t >>> 14)) >>> 0) / 4_294_967_296;
  };
}

interface Acknowledged {
  readonly plans: Map<string, number>;
  readonly venues: Map<string, number>;
  count: number;
}

/** Lets a process save, and kills it so long after it has acknowledged so many saves. */
async function saveUntilKilled(
  file: string,
  accountId: string,
  when: { readonly saves: number; readonly thenMs: number },
  acknowledged: Acknowledged,
): Promise<void> {
  const child = spawn(
    process.execPath,
    ['--import', './.scripts/run-source.mjs', 'test/support/saving-child.ts', file, accountId],
    { cwd: root, stdio: ['ignore', 'pipe', 'pipe'] },
  );
  let said = '';
  let complaints = '';
  let doomed = false;
  child.stderr.on('data', (chunk: Buffer) => (complaints += chunk.toString()));
  child.stdout.on('data', (chunk: Buffer) => {
    said += chunk.toString();
    if (doomed || said.split('\n').length <= when.saves) return;
    doomed = true;
    setTimeout(() => child.kill('SIGKILL'), when.thenMs);
  });
  const signal = await new Promise((resolve) => {
    child.on('close', (_, by) => {
      resolve(by);
    });
  });
  expect(signal, complaints).toBe('SIGKILL');

  // The last line may be cut off: what was not said in full was not acknowledged.
  for (const line of said.split('\n').slice(0, -1)) {
    const [kind, id = '', version] = line.split(' ');
    const versions = kind === 'plan' ? acknowledged.plans : acknowledged.venues;
    versions.set(id, Math.max(versions.get(id) ?? 0, Number(version)));
    acknowledged.count += 1;
  }
}

it(
  `loses no acknowledged save and keeps the file whole over ${String(kills)} kills with SIGKILL`,
  { timeout: 60_000 + kills * 30_000 },
  async () => {
    const file = join(freshFolder(), 'stillair.db');
    const first = await openDatabase(file);
    const account = await first.write((db) =>
      db.account.create({
        data: { email: 'a@example.org', name: 'A', role: 'coordinator', passwordHash: '-' },
      }),
    );
    await first.close();
    const random = seeded(20_261_201);
    const acknowledged: Acknowledged = { plans: new Map(), venues: new Map(), count: 0 };

    for (let kill = 0; kill < kills; kill += 1) {
      const when = { saves: 1 + Math.floor(random() * 40), thenMs: random() * 60 };
      await saveUntilKilled(file, account.id, when, acknowledged);

      const checked = new Sqlite(file);
      expect(checked.pragma('integrity_check', { simple: true })).toBe('ok');
      expect(checked.pragma('foreign_key_check')).toEqual([]);
      checked.close();

      const database = await openDatabase(file);
      const plans = new PlansRepository(database);
      const venues = new VenuesRepository(database);
      for (const [id, version] of acknowledged.plans) {
        const plan = await plans.get(id);
        expect(plan.version).toBeGreaterThanOrEqual(version);
        expect(plan.document.version).toBe(plan.version);
      }
      for (const [id, version] of acknowledged.venues) {
        const venue = await venues.get(id);
        expect(venue.version).toBeGreaterThanOrEqual(version);
        // All rows of one save, never a mixture of two.
        const rows = [...venue.spaces, ...venue.openings].map(({ data }) => data.version);
        expect(rows).toEqual([1, 2, 3, 4].map(() => venue.version));
      }
      await database.close();
    }
    expect(acknowledged.count).toBeGreaterThan(kills);
    console.info(
      `${String(kills)} kills, ${String(acknowledged.count)} acknowledged saves, none lost`,
    );
  },
);
