import { Injectable } from '@nestjs/common';
import { Conflict, NotFound } from '../errors.js';
import { Database, type Reading } from './database.js';
import { jsonRecord, storedJson, type JsonRecord } from './rows.js';

export interface PlanContent {
  readonly title: string;
  readonly venueId: string | null;
  /** The plan file without its venue. */
  readonly document: JsonRecord;
}

export interface StoredPlan extends PlanContent {
  readonly id: string;
  readonly version: number;
  readonly createdById: string;
  readonly updatedById: string;
  readonly createdAt: Date;
  readonly updatedAt: Date;
}

export interface PlanSummary {
  readonly id: string;
  readonly title: string;
  readonly venueId: string | null;
  readonly venueName: string | null;
  readonly version: number;
  readonly updatedAt: Date;
}

async function stored(db: Reading, id: string): Promise<StoredPlan> {
  const plan = await db.plan.findUnique({ where: { id } });
  if (plan === null) throw noSuchPlan();
  return { ...plan, document: jsonRecord(plan.document) };
}

async function refuseUnknownVenue(db: Reading, venueId: string | null): Promise<void> {
  if (venueId === null) return;
  if ((await db.venue.count({ where: { id: venueId } })) > 0) return;
  throw new NotFound(
    'The venue of this plan no longer exists.',
    'Choose another venue for the plan, then save again.',
  );
}

const noSuchPlan = (): NotFound =>
  new NotFound('There is no such plan.', 'Open it from the list of plans.');

const changedMeanwhile = (): Conflict =>
  new Conflict(
    'This plan was changed by somebody else after you opened it; nothing of yours was saved.',
    'Open the plan again, compare, and enter your change once more.',
  );

/** Plans: a title, a venue and the document, each save from a named version. */
@Injectable()
export class PlansRepository {
  constructor(private readonly database: Database) {}

  /** Newest change first; of one venue when given. */
  async list(filter: { readonly venueId?: string } = {}): Promise<readonly PlanSummary[]> {
    const plans = await this.database.read((db) =>
      db.plan.findMany({
        where: filter,
        orderBy: [{ updatedAt: 'desc' }, { id: 'desc' }],
        omit: { document: true },
        include: { venue: { select: { name: true } } },
      }),
    );
    return plans.map(({ id, title, venueId, venue, version, updatedAt }) => ({
      id,
      title,
      venueId,
      venueName: venue?.name ?? null,
      version,
      updatedAt,
    }));
  }

  async count(): Promise<number> {
    return this.database.read((db) => db.plan.count());
  }

  /** @throws {NotFound} */
  async get(id: string): Promise<StoredPlan> {
    return this.database.read((db) => stored(db, id));
  }

  /** @throws {NotFound} when its venue does not exist */
  async create(content: PlanContent, accountId: string): Promise<StoredPlan> {
    return this.database.write(async (db) => {
      await refuseUnknownVenue(db, content.venueId);
      const { id } = await db.plan.create({
        data: {
          title: content.title,
          venueId: content.venueId,
          document: storedJson(content.document),
          createdById: accountId,
          updatedById: accountId,
        },
      });
      return stored(db, id);
    });
  }

  /**
   * @param version the version that the change was made from
   * @throws {Conflict} when the plan has moved on since; {NotFound}
   */
  async save(
    id: string,
    version: number,
    content: PlanContent,
    accountId: string,
  ): Promise<StoredPlan> {
    return this.database.write(async (db) => {
      await refuseUnknownVenue(db, content.venueId);
      const { count } = await db.plan.updateMany({
        where: { id, version },
        data: {
          title: content.title,
          venueId: content.venueId,
          document: storedJson(content.document),
          updatedById: accountId,
          version: { increment: 1 },
        },
      });
      if (count === 0) {
        throw (await db.plan.count({ where: { id } })) === 0 ? noSuchPlan() : changedMeanwhile();
      }
      return stored(db, id);
    });
  }

  /** @throws {Conflict} when the plan has moved on since; {NotFound} */
  async remove(id: string, version: number): Promise<void> {
    await this.database.write(async (db) => {
      const { count } = await db.plan.deleteMany({ where: { id, version } });
      if (count === 0) {
        throw (await db.plan.count({ where: { id } })) === 0 ? noSuchPlan() : changedMeanwhile();
      }
    });
  }
}
