// Saves plans and venues as fast as it can and says on standard output what was acknowledged, until it
// is killed. Started by the kill test in a process of its own.
import 'reflect-metadata';
import { writeSync } from 'node:fs';
import { openDatabase } from '../../src/storage/database.js';
import { PlansRepository } from '../../src/storage/plans.repository.js';
import { VenuesRepository, type VenueContent } from '../../src/storage/venues.repository.js';

const [file = '', accountId = ''] = process.argv.slice(2);
const database = await openDatabase(file);
const plans = new PlansRepository(database);
const venues = new VenuesRepository(database);

/** Straight to the descriptor: nothing stays behind in a buffer when the process dies. */
const acknowledge = (kind: string, id: string, version: number): void => {
  writeSync(1, `${kind} ${id} ${String(version)}\n`);
};

const planOf = (version: number) => ({
  title: `Version ${String(version)}`,
  venueId: null,
  document: { version, filler: 'x'.repeat(3000) },
});

const venueOf = (version: number): VenueContent => ({
  name: `Version ${String(version)}`,
  site: { version },
  spaces: ['hall', 'pit', 'stage'].map((key) => ({ key, title: key, data: { version } })),
  openings: [{ key: 'door', title: 'Door', data: { version } }],
  airSystems: [],
  infiltrations: [],
  transfers: [],
});

async function savePlans(): Promise<never> {
  for (;;) {
    let plan = await plans.create(planOf(1), accountId);
    acknowledge('plan', plan.id, plan.version);
    for (let saves = 0; saves < 20; saves += 1) {
      plan = await plans.save(plan.id, plan.version, planOf(plan.version + 1), accountId);
      acknowledge('plan', plan.id, plan.version);
    }
  }
}

async function saveVenues(): Promise<never> {
  for (;;) {
    let venue = await venues.create(venueOf(1));
    acknowledge('venue', venue.id, venue.version);
    for (let saves = 0; saves < 20; saves += 1) {
      venue = await venues.save(venue.id, venue.version, venueOf(venue.version + 1));
      acknowledge('venue', venue.id, venue.version);
    }
  }
}

await Promise.all([savePlans(), savePlans(), saveVenues()]);
