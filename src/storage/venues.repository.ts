import { Injectable } from '@nestjs/common';
import { Conflict, InvalidInput, NotFound } from '../errors.js';
import { Database, type Reading, type Writing } from './database.js';
import { jsonRecord, storedJson, type JsonRecord } from './rows.js';

/** One row of a venue's table; `key` is its id in the plan file, `data` the rest of that object. */
export interface VenueRow {
  readonly key: string;
  readonly title: string;
  readonly data: JsonRecord;
}

const kinds = ['spaces', 'openings', 'airSystems', 'infiltrations', 'transfers'] as const;
type Kind = (typeof kinds)[number];

export interface VenueContent extends Readonly<Record<Kind, readonly VenueRow[]>> {
  readonly name: string;
  readonly site: JsonRecord;
}

export interface StoredVenue extends VenueContent {
  readonly id: string;
  readonly version: number;
  readonly createdAt: Date;
  readonly updatedAt: Date;
}

export interface VenueSummary {
  readonly id: string;
  readonly name: string;
  readonly version: number;
  readonly updatedAt: Date;
  readonly spaceCount: number;
  readonly planCount: number;
}

const inOrder = { orderBy: { position: 'asc' } } as const;
const whole = {
  spaces: inOrder,
  openings: inOrder,
  airSystems: inOrder,
  infiltrations: inOrder,
  transfers: inOrder,
} as const;

function refuseRepeatedKeys(content: VenueContent): void {
  for (const kind of kinds) {
    const seen = new Set<string>();
    content[kind].forEach(({ key }, index) => {
      if (!seen.has(key)) {
        seen.add(key);
        return;
      }
      throw new InvalidInput(
        `Two rows under ${kind} have the short name "${key}".`,
        'Give each row a short name of its own.',
        [{ path: `/${kind}/${String(index)}/id`, problem: 'is used twice' }],
      );
    });
  }
}

const columns = (row: VenueRow, position: number) => ({
  title: row.title,
  position,
  data: storedJson(row.data),
});

/** What all row tables have in common, so that one routine saves any of them. */
interface RowTable {
  deleteMany(args: {
    where: { venueId: string; key: { notIn: string[] } };
  }): PromiseLike<{ count: number }>;
  upsert(args: {
    where: { venueId_key: { venueId: string; key: string } };
    create: { venueId: string; key: string } & ReturnType<typeof columns>;
    update: ReturnType<typeof columns>;
  }): PromiseLike<unknown>;
}

async function saveRows(table: RowTable, venueId: string, rows: readonly VenueRow[]) {
  await table.deleteMany({ where: { venueId, key: { notIn: rows.map(({ key }) => key) } } });
  for (const [position, row] of rows.entries()) {
    const values = columns(row, position);
    await table.upsert({
      where: { venueId_key: { venueId, key: row.key } },
      create: { venueId, key: row.key, ...values },
      update: values,
    });
  }
}

async function saveAllRows(db: Writing, venueId: string, content: VenueContent): Promise<void> {
  await saveRows(db.space, venueId, content.spaces);
  await saveRows(db.opening, venueId, content.openings);
  await saveRows(db.airSystem, venueId, content.airSystems);
  await saveRows(db.infiltration, venueId, content.infiltrations);
  await saveRows(db.transfer, venueId, content.transfers);
}

async function stored(db: Reading, id: string): Promise<StoredVenue | undefined> {
  const venue = await db.venue.findUnique({ where: { id }, include: whole });
  if (venue === null) return undefined;
  const rows = (list: typeof venue.spaces): readonly VenueRow[] =>
    list.map(({ key, title, data }) => ({ key, title, data: jsonRecord(data) }));
  return {
    id: venue.id,
    name: venue.name,
    site: jsonRecord(venue.site),
    version: venue.version,
    createdAt: venue.createdAt,
    updatedAt: venue.updatedAt,
    spaces: rows(venue.spaces),
    openings: rows(venue.openings),
    airSystems: rows(venue.airSystems),
    infiltrations: rows(venue.infiltrations),
    transfers: rows(venue.transfers),
  };
}

const noSuchVenue = (): NotFound =>
  new NotFound('There is no such venue.', 'Open it from the list of venues.');

const changedMeanwhile = (): Conflict =>
  new Conflict(
    'This venue was changed by somebody else after you opened it; nothing of yours was saved.',
    'Open the venue again, compare, and enter your change once more.',
  );

/** Venues with their spaces, openings and air: each saved as a whole or not at all. */
@Injectable()
export class VenuesRepository {
  constructor(private readonly database: Database) {}

  /** Every venue by name, without its rows. */
  async list(): Promise<readonly VenueSummary[]> {
    const venues = await this.database.read((db) =>
      db.venue.findMany({
        orderBy: [{ name: 'asc' }, { id: 'asc' }],
        include: { _count: { select: { spaces: true, plans: true } } },
      }),
    );
    return venues.map(({ id, name, version, updatedAt, _count }) => ({
      id,
      name,
      version,
      updatedAt,
      spaceCount: _count.spaces,
      planCount: _count.plans,
    }));
  }

  async count(): Promise<number> {
    return this.database.read((db) => db.venue.count());
  }

  /** @throws {NotFound} */
  async get(id: string): Promise<StoredVenue> {
    const venue = await this.database.read((db) => stored(db, id));
    if (venue === undefined) throw noSuchVenue();
    return venue;
  }

  /** @throws {InvalidInput} when two rows of one kind share a key */
  async create(content: VenueContent): Promise<StoredVenue> {
    refuseRepeatedKeys(content);
    return this.database.write(async (db) => {
      const { id } = await db.venue.create({
        data: { name: content.name, site: storedJson(content.site) },
      });
      await saveAllRows(db, id, content);
      const venue = await stored(db, id);
      if (venue === undefined) throw noSuchVenue();
      return venue;
    });
  }

  /**
   * Replaces the content, keeping the rows whose keys stay.
   *
   * @param version the version that the change was made from
   * @throws {Conflict} when the venue has moved on since; {NotFound}; {InvalidInput} for repeated keys
   */
  async save(id: string, version: number, content: VenueContent): Promise<StoredVenue> {
    refuseRepeatedKeys(content);
    return this.database.write(async (db) => {
      const { count } = await db.venue.updateMany({
        where: { id, version },
        data: {
          name: content.name,
          site: storedJson(content.site),
          version: { increment: 1 },
        },
      });
      if (count === 0) {
        throw (await db.venue.count({ where: { id } })) === 0 ? noSuchVenue() : changedMeanwhile();
      }
      await saveAllRows(db, id, content);
      const venue = await stored(db, id);
      if (venue === undefined) throw noSuchVenue();
      return venue;
    });
  }

  /** @throws {Conflict} while plans use it, or when it has moved on; {NotFound} */
  async remove(id: string, version: number): Promise<void> {
    await this.database.write(async (db) => {
      const plans = await db.plan.count({ where: { venueId: id } });
      if (plans > 0) {
        throw new Conflict(
          `This venue is used by ${String(plans)} ${plans === 1 ? 'plan' : 'plans'}.`,
          'Move those plans to another venue or delete them first.',
        );
      }
      const { count } = await db.venue.deleteMany({ where: { id, version } });
      if (count === 0) {
        throw (await db.venue.count({ where: { id } })) === 0 ? noSuchVenue() : changedMeanwhile();
      }
    });
  }
}
