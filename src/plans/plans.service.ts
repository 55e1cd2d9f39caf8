import { Injectable } from '@nestjs/common';
import { canonicalize } from 'json-canonicalize';
import { planFileSchema, type PlanFile, type PlanVenue } from '../assessment/plan-file.js';
import { schemaProblems } from '../assessment/schema-check.js';
import { referenceProblems } from '../assessment/plan-references.js';
import type { Demonstration } from '../assessment/catalogue-types.js';
import { CatalogueData } from '../catalogue/catalogue.module.js';
import { InvalidInput, type ErrorDetail } from '../errors.js';
import { PlansRepository, type PlanSummary, type StoredPlan } from '../storage/plans.repository.js';
import type { JsonRecord } from '../storage/rows.js';
import { VenuesService, type SavedVenue } from '../venues/venues.service.js';
import { actFromDemonstration, siteState, type DraftAct } from './act-from-catalogue.js';
import { AssessmentsService, type Outcome } from './assessments.service.js';
import { partsOf, planFile } from './plan-document.js';

/** A plan at its venue, as both are saved. */
export interface SavedPlan {
  readonly plan: StoredPlan;
  readonly venue: SavedVenue | undefined;
  readonly file: PlanFile;
}

/** With what was worked out from both, or null while that is still going on. */
export interface OpenPlan<O extends Outcome | null = Outcome> extends SavedPlan {
  readonly outcome: O;
}

/** What may still be missing while a plan is being written. Everything else wrong is refused. */
const isStillMissing = ({ problem }: ErrorDetail): boolean =>
  problem === 'is missing' || problem.includes('fewer than');

const titleOf = (document: JsonRecord): string => {
  const { event } = document;
  const title =
    typeof event === 'object' && event !== null && 'title' in event ? event.title : undefined;
  return typeof title === 'string' && title !== '' ? title : 'Plan without a name';
};

/** Plans: documents kept apart from their venue, assessed together with it. */
@Injectable()
export class PlansService {
  constructor(
    private readonly plans: PlansRepository,
    private readonly venues: VenuesService,
    private readonly assessments: AssessmentsService,
    private readonly data: CatalogueData,
  ) {}

  async list(): Promise<readonly PlanSummary[]> {
    return this.plans.list();
  }

  /**
   * @param signal fires when the one who asked has gone: an assessment nobody waits for is dropped
   * @throws {NotFound}
   */
  async open(id: string, signal?: AbortSignal): Promise<OpenPlan> {
    const saved = await this.read(id);
    const outcome = await this.assessments.outcomeOf(saved.file, { signal, latestOf: id });
    return { ...saved, outcome };
  }

  /** @throws {NotFound} */
  async read(id: string): Promise<SavedPlan> {
    const plan = await this.plans.get(id);
    const venue = plan.venueId === null ? undefined : await this.venues.get(plan.venueId);
    return { plan, venue, file: planFile(plan.document, venue?.venue) };
  }

  /** A saved plan with its outcome, or null in its place when that takes longer than the patience. */
  async within(saved: SavedPlan, patienceMs: number): Promise<OpenPlan<Outcome | null>> {
    const { id } = saved.plan;
    return { ...saved, outcome: await this.assessments.outcomeWithin(saved.file, id, patienceMs) };
  }

  /**
   * What keeps this document from being saved. Parts may still be missing; what is there must make
   * sense. Paths are JSON Pointers into the plan file.
   */
  problemsOf(document: JsonRecord): readonly ErrorDetail[] {
    return schemaProblems(planFileSchema, planFile(document, undefined)).filter(
      (problem) => !isStillMissing(problem),
    );
  }

  /** Everything that still has to be entered before this plan can be worked out. */
  missingIn(file: PlanFile): readonly ErrorDetail[] {
    const shape = schemaProblems(planFileSchema, file);
    return shape.length > 0 ? shape : referenceProblems(file, this.data.gases);
  }

  /** @throws {NotFound} when the venue does not exist; {InvalidInput} */
  async create(
    document: JsonRecord,
    venueId: string | null,
    accountId: string,
  ): Promise<StoredPlan> {
    this.#refuse(document);
    return this.plans.create({ title: titleOf(document), venueId, document }, accountId);
  }

  /** @throws {Conflict} when somebody saved it since `version`; {NotFound}; {InvalidInput} */
  async save(
    id: string,
    version: number,
    content: { readonly document: JsonRecord; readonly venueId: string | null },
    accountId: string,
  ): Promise<StoredPlan> {
    this.#refuse(content.document);
    return this.plans.save(
      id,
      version,
      { title: titleOf(content.document), ...content },
      accountId,
    );
  }

  /** @throws {Conflict} when it has moved on; {NotFound} */
  async remove(id: string, version: number): Promise<void> {
    await this.plans.remove(id, version);
  }

  /**
   * A plan and its venue from a plan file. A venue that is here already, figure for figure, is used
   * again.
   */
  async bringIn(file: PlanFile, accountId: string): Promise<StoredPlan> {
    const { document, venue } = partsOf(file);
    const known = await this.#sameVenue(venue);
    const { id, version } = known ?? (await this.venues.create(venue));
    try {
      return await this.create(document, id, accountId);
    } catch (error) {
      // Nothing half-saved: without its plan the fresh venue goes as well.
      if (known === undefined) await this.venues.remove(id, version);
      throw error;
    }
  }

  /** A demonstration of the catalogue as it would be shown at this venue. */
  draftAct(demonstration: Demonstration, venue: PlanVenue | undefined): DraftAct {
    const { gases, catalogue } = this.data;
    const site = siteState(venue ?? { title: '', site: {}, spaces: [] }, catalogue.policy);
    return actFromDemonstration(demonstration, site, gases);
  }

  async #sameVenue(venue: PlanVenue): Promise<SavedVenue | undefined> {
    const shape = ({ id: _id, ...content }: PlanVenue): string =>
      canonicalize(JSON.parse(JSON.stringify(content)));
    const wanted = shape(venue);
    for (const { id, name } of await this.venues.list()) {
      if (name !== venue.title) continue;
      const saved = await this.venues.get(id);
      if (shape(saved.venue) === wanted) return saved;
    }
    return undefined;
  }

  #refuse(document: JsonRecord): void {
    const problems = this.problemsOf(document);
    const [first] = problems;
    if (first === undefined) return;
    throw new InvalidInput(
      `The plan cannot be saved: ${first.path} ${first.problem}.`,
      'Correct the places listed under details.',
      problems,
    );
  }
}
