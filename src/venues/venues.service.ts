import { Injectable } from '@nestjs/common';
import { fitting } from '../assessment/schema-check.js';
import { venueSchema, type PlanVenue } from '../assessment/plan-file.js';
import type { ResolvedPlan } from '../assessment/resolved-plan.js';
import { CatalogueData } from '../catalogue/catalogue.module.js';
import { InvalidInput, type ErrorDetail } from '../errors.js';
import {
  VenuesRepository,
  type StoredVenue,
  type VenueSummary,
} from '../storage/venues.repository.js';
import { planVenue, venueContent } from './venue-mapper.js';
import { venueAsRead, venueProblems } from './venue-check.js';

export interface SavedVenue {
  readonly id: string;
  readonly version: number;
  readonly updatedAt: Date;
  readonly venue: PlanVenue;
}

const saved = (stored: StoredVenue): SavedVenue => ({
  id: stored.id,
  version: stored.version,
  updatedAt: stored.updatedAt,
  venue: planVenue(stored),
});

/** Venues as plan-file values, kept as rows. */
@Injectable()
export class VenuesService {
  constructor(
    private readonly repository: VenuesRepository,
    private readonly data: CatalogueData,
  ) {}

  async list(): Promise<readonly VenueSummary[]> {
    return this.repository.list();
  }

  async count(): Promise<number> {
    return this.repository.count();
  }

  /** @throws {NotFound} */
  async get(id: string): Promise<SavedVenue> {
    return saved(await this.repository.get(id));
  }

  /** Everything that is wrong with a venue, by its place in the venue. */
  problemsOf(venue: PlanVenue): readonly ErrorDetail[] {
    return venueProblems(venue, this.#context());
  }

  /** The figures that a plan would use here: those entered, and the defaults for the rest. */
  asRead(venue: PlanVenue): ResolvedPlan {
    return venueAsRead(venue, this.#context());
  }

  /** @throws {InvalidInput} when the venue cannot be calculated with */
  async create(venue: PlanVenue): Promise<SavedVenue> {
    return saved(await this.repository.create(venueContent(this.#checked(venue))));
  }

  /** @throws {Conflict} when somebody saved it since `version`; {NotFound}; {InvalidInput} */
  async save(id: string, version: number, venue: PlanVenue): Promise<SavedVenue> {
    return saved(await this.repository.save(id, version, venueContent(this.#checked(venue))));
  }

  /** @throws {Conflict} while plans use it, or when it has moved on; {NotFound} */
  async remove(id: string, version: number): Promise<void> {
    await this.repository.remove(id, version);
  }

  #context() {
    const { gases, catalogue } = this.data;
    return { gases, policy: catalogue.policy, controls: catalogue.controls };
  }

  #checked(venue: PlanVenue): PlanVenue {
    const fit = fitting(venueSchema, venue, 'venue');
    const problems = this.problemsOf(fit);
    const [first] = problems;
    if (first === undefined) return fit;
    throw new InvalidInput(
      `The venue cannot be used: ${first.path} ${first.problem}.`,
      'Correct the places listed under details.',
      problems,
    );
  }
}
