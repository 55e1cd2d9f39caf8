import { venueSchema, type PlanFile, type PlanVenue } from '../assessment/plan-file.js';
import { referenceProblems } from '../assessment/plan-references.js';
import { planReader, type End } from '../assessment/plan-reader.js';
import { resolvedPlan, type ResolveContext } from '../assessment/resolve.js';
import type { ResolvedPlan } from '../assessment/resolved-plan.js';
import { schemaProblems } from '../assessment/schema-check.js';
import { DomainError, type ErrorDetail } from '../errors.js';

const inVenue = (details: readonly ErrorDetail[]): readonly ErrorDetail[] =>
  details
    .filter(({ path }) => path.startsWith('/venue'))
    .map(({ path, problem }) => ({ path: path.slice('/venue'.length), problem }));

/** A plan that says nothing but the venue, so that the venue can be read by itself. */
const emptyPlanAt = (venue: PlanVenue): PlanFile => ({
  schemaVersion: 1,
  event: {
    title: venue.title,
    performances: [{ startsAt: '12:00', durationMin: 60 }],
    audience: [],
  },
  venue,
  acts: [],
});

/** The venue by itself with every figure settled as it is stated, defaults filled in. */
export function venueAsRead(venue: PlanVenue, data: Omit<ResolveContext, 'reader'>): ResolvedPlan {
  return resolvedPlan(emptyPlanAt(venue), { reader: planReader(() => 'stated'), ...data });
}

/**
 * Everything that keeps a venue from being calculated with: shape, references, ranges at either end.
 * Paths are JSON Pointers into the venue.
 */
export function venueProblems(
  venue: PlanVenue,
  data: Omit<ResolveContext, 'reader'>,
): readonly ErrorDetail[] {
  const shape = schemaProblems(venueSchema, venue);
  if (shape.length > 0) return shape;
  const plan = emptyPlanAt(venue);
  const references = inVenue(referenceProblems(plan, data.gases));
  if (references.length > 0) return references;
  const ends: readonly End[] = ['stated', 'worst', 'best'];
  for (const end of ends) {
    try {
      resolvedPlan(plan, { reader: planReader(() => end), ...data });
    } catch (error) {
      if (!(error instanceof DomainError)) throw error;
      const places = inVenue(error.details);
      return places.length > 0 ? places : [{ path: '', problem: `${error.message} ${error.hint}` }];
    }
  }
  return [];
}
