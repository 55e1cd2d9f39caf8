import { describe, expect, it } from 'vitest';
import type { Database } from '../../src/storage/database.js';
import { PeopleRepository } from '../../src/storage/people.repository.js';
import { PlansRepository } from '../../src/storage/plans.repository.js';
import { VenuesRepository, type VenueContent } from '../../src/storage/venues.repository.js';
import { freshDatabase } from '../support/database.js';

const hall: VenueContent = {
  name: 'Assembly hall',
  site: { altitudeM: { value: 120, origin: 'supplied', on: '2026-03-01' } },
  spaces: [
    {
      key: 'hall',
      title: 'Hall',
      data: {
        floorAreaM2: { value: 180, low: 176, high: 184, origin: 'drawing' },
        heightM: 6,
        steps: [{ areaM2: 20, levelM: 0.8 }],
      },
    },
    { key: 'pit', title: 'Pit', data: { heightM: { origin: 'unknown' } } },
  ],
  openings: [{ key: 'door', title: 'Double door', data: { from: 'hall', to: 'outside' } }],
  airSystems: [],
  infiltrations: [{ key: 'leak', title: '', data: { airChangesPerHour: 0.1 } }],
  transfers: [],
};

const account = (database: Database) =>
  database.write((db) =>
    db.account.create({
      data: { email: 'a@example.org', name: 'A', role: 'coordinator', passwordHash: '-' },
    }),
  );

describe('venues', () => {
  it('come back with every row, in order, with provenance untouched', async () => {
    const venues = new VenuesRepository(await freshDatabase());

    const { id } = await venues.create(hall);

    expect(await venues.get(id)).toMatchObject({ ...hall, version: 1 });
  });

  it('keep the identity of a row whose key stays, and drop the rows left out', async () => {
    const database = await freshDatabase();
    const venues = new VenuesRepository(database);
    const { id } = await venues.create(hall);
    const idOfPit = () =>
      database.read((db) => db.space.findFirst({ where: { venueId: id, key: 'pit' } }));
    const before = await idOfPit();

    const [, pit] = hall.spaces;
    const saved = await venues.save(id, 1, { ...hall, spaces: pit ? [pit] : [], openings: [] });

    expect(saved).toMatchObject({ version: 2, openings: [] });
    expect(saved.spaces.map(({ key }) => key)).toEqual(['pit']);
    expect((await idOfPit())?.id).toBe(before?.id);
  });

  it('refuse a save that started from an older version, and keep the newer one', async () => {
    const venues = new VenuesRepository(await freshDatabase());
    const { id } = await venues.create(hall);
    await venues.save(id, 1, { ...hall, name: 'Great hall' });

    await expect(venues.save(id, 1, { ...hall, name: 'Small hall', spaces: [] })).rejects.toThrow(
      /changed by somebody else/,
    );
    expect(await venues.get(id)).toMatchObject({ name: 'Great hall', version: 2 });
  });

  it('let one of two saves from the same version through', async () => {
    const venues = new VenuesRepository(await freshDatabase());
    const { id } = await venues.create(hall);

    const outcomes = await Promise.allSettled(
      ['One', 'Two'].map((name) => venues.save(id, 1, { ...hall, name })),
    );

    expect(outcomes.map(({ status }) => status).sort()).toEqual(['fulfilled', 'rejected']);
    expect((await venues.get(id)).version).toBe(2);
  });

  it('are saved as a whole or not at all', async () => {
    const venues = new VenuesRepository(await freshDatabase());
    const { id } = await venues.create(hall);
    const spaces = [...hall.spaces, { key: 'bad', title: 'Bad', data: { heightM: Number.NaN } }];

    await expect(venues.save(id, 1, { ...hall, name: 'Half', spaces })).rejects.toMatchObject({
      code: 'invalid-input',
      details: [{ path: '/heightM', problem: 'is not a finite number' }],
    });
    expect(await venues.get(id)).toMatchObject({ ...hall, version: 1 });
  });

  it('refuse two rows of one kind with the same key', async () => {
    const venues = new VenuesRepository(await freshDatabase());
    const [space] = hall.spaces;
    const spaces = space ? [space, space] : [];

    await expect(venues.create({ ...hall, spaces })).rejects.toMatchObject({
      code: 'invalid-input',
      details: [{ path: '/spaces/1/id', problem: 'is used twice' }],
    });
    expect(await venues.count()).toBe(0);
  });

  it('cannot be removed while a plan uses them', async () => {
    const database = await freshDatabase();
    const venues = new VenuesRepository(database);
    const { id } = await venues.create(hall);
    const by = await account(database);
    const plans = new PlansRepository(database);
    const plan = await plans.create({ title: 'Plan', venueId: id, document: {} }, by.id);

    await expect(venues.remove(id, 1)).rejects.toThrow(/used by 1 plan\./);
    await plans.remove(plan.id, 1);
    await venues.remove(id, 1);

    await expect(venues.get(id)).rejects.toMatchObject({ code: 'not-found' });
    expect(await database.read((db) => db.space.count())).toBe(0);
  });
});

describe('plans', () => {
  it('come back as saved and list the newest change first with the name of the venue', async () => {
    const database = await freshDatabase();
    const by = await account(database);
    const venue = await new VenuesRepository(database).create(hall);
    const plans = new PlansRepository(database);
    const document = { event: { title: 'Open day' }, acts: [{ id: 'a', minute: 3.5 }] };
    const one = await plans.create({ title: 'One', venueId: venue.id, document }, by.id);
    await plans.create({ title: 'Two', venueId: null, document: {} }, by.id);
    await new Promise((resolve) => setTimeout(resolve, 5));

    await plans.save(one.id, 1, { title: 'One again', venueId: venue.id, document }, by.id);

    expect(await plans.get(one.id)).toMatchObject({ document, version: 2 });
    expect((await plans.list()).map(({ title, venueName }) => [title, venueName])).toEqual([
      ['One again', 'Assembly hall'],
      ['Two', null],
    ]);
    expect(await plans.list({ venueId: venue.id })).toHaveLength(1);
  });

  it('refuse a venue that does not exist and a save from an older version', async () => {
    const database = await freshDatabase();
    const by = await account(database);
    const plans = new PlansRepository(database);
    const content = { title: 'Plan', venueId: null, document: {} };

    await expect(plans.create({ ...content, venueId: 'gone' }, by.id)).rejects.toMatchObject({
      code: 'not-found',
    });
    const { id } = await plans.create(content, by.id);
    await plans.save(id, 1, content, by.id);
    await expect(plans.save(id, 1, content, by.id)).rejects.toMatchObject({ code: 'conflict' });
    await expect(plans.save('gone', 1, content, by.id)).rejects.toMatchObject({
      code: 'not-found',
    });
  });
});

describe('the first account', () => {
  const person = {
    email: 'Ada@Example.org',
    name: 'Ada Example',
    role: 'administrator',
    passwordHash: '-',
  } as const;
  const now = new Date('2026-12-01T12:00:00Z');
  const later = new Date('2026-12-02T12:00:00Z');

  it('is created once, even when two people follow the link at the same time', async () => {
    const people = new PeopleRepository(await freshDatabase());
    await people.replaceSetupLink('link', later);

    const outcomes = await Promise.allSettled(
      ['ada@example.org', 'eve@example.org'].map((email) =>
        people.createFirst('link', { ...person, email }, now),
      ),
    );

    expect(outcomes.map(({ status }) => status).sort()).toEqual(['fulfilled', 'rejected']);
    expect(await people.count()).toBe(1);
  });

  it('is not created by a link that has expired or was replaced', async () => {
    const people = new PeopleRepository(await freshDatabase());
    await people.replaceSetupLink('old', later);
    await people.replaceSetupLink('new', later);

    await expect(people.createFirst('old', person, now)).rejects.toMatchObject({
      code: 'not-allowed',
    });
    await expect(people.createFirst('new', person, later)).rejects.toMatchObject({
      code: 'not-allowed',
    });
    expect(await people.isSetupLinkOpen('new', now)).toBe(true);
    expect(await people.isSetupLinkOpen('new', later)).toBe(false);
  });

  it('is found by its email in any case of letters', async () => {
    const people = new PeopleRepository(await freshDatabase());
    await people.replaceSetupLink('link', later);
    await people.createFirst('link', person, now);

    expect(await people.findByEmail('ADA@example.ORG')).toMatchObject({
      email: 'ada@example.org',
      role: 'administrator',
    });
  });
});
