import type { Governing } from './assessment.js';
import { hitReason } from './conditions.js';
import { worseWord, type Hit } from './decision-table.js';
import type { Evaluation } from './evaluation.js';
import { levelFigure, statisticFigure } from './figures.js';
import type { Knowledge } from './knowledge.js';
import { quantityWords } from './quantity-words.js';
import { spentShare } from './spent-share.js';
import type { ZoneOutcome } from './zone-outcomes.js';

type NameOf = (gas: string) => string;

export const zoneTitle = ({ floorCheck, group }: ZoneOutcome): string =>
  floorCheck ? `${group.title}, 0.2 m above the floor` : group.title;

/** The gravest hit; of several with the same word and row the one furthest past its level. */
export function gravestHit(hits: readonly Hit[]): Hit | null {
  const spent = (hit: Hit) => (hit.outcome ? spentShare(hit.outcome, hit.answer, hit.level) : 0);
  return hits.reduce<Hit | null>((gravest, hit) => {
    if (!gravest) return hit;
    if (hit.word !== gravest.word) {
      return worseWord(hit.word, gravest.word) === hit.word ? hit : gravest;
    }
    return hit.row === gravest.row && spent(hit) > spent(gravest) ? hit : gravest;
  }, null);
}

/** The gravest of the hits that stand on a number. */
export const gravestNumber = (hits: readonly Hit[]): Hit | null =>
  gravestHit(hits.filter(({ outcome }) => outcome !== null));

/** The number nearest to its aim on the planned day: the one to watch where nothing fails. */
export function closestToAim(
  { planned, resolved }: Pick<Evaluation, 'planned' | 'resolved'>,
  nameOf: NameOf,
): Omit<Governing, 'row' | 'reason'> | null {
  const closest = planned
    .filter((outcome) => outcome.judgedFully && outcome.answers.mixed)
    .map((outcome) => ({ outcome, spent: spentShare(outcome, 'mixed', 'aim') }))
    .sort((one, other) => other.spent - one.spent)[0]?.outcome;
  const figure = closest ? statisticFigure(closest, 'mixed', 'aim', resolved) : null;
  if (!closest || !figure) return null;
  return {
    zone: closest.zone,
    zoneTitle: zoneTitle(closest),
    quantity: quantityWords(closest.level, nameOf),
    answer: 'mixed',
    caseName: 'planned',
    figure,
    limit: levelFigure(closest.level, 'aim'),
  };
}

/** The number of a hit beside its level; null where it stands on none. */
export function numberOfHit(
  hit: Hit,
  { resolved }: Pick<Evaluation, 'resolved'>,
  nameOf: NameOf,
): Governing | null {
  const { outcome } = hit;
  if (!outcome) return null;
  const answer = outcome.answers[hit.answer] ? hit.answer : 'mixed';
  const figure = statisticFigure(outcome, answer, hit.level, resolved);
  if (!figure) return null;
  const limit = levelFigure(outcome.level, hit.level);
  return {
    zone: outcome.zone,
    zoneTitle: zoneTitle(outcome),
    quantity: quantityWords(outcome.level, nameOf),
    answer,
    caseName: hit.caseName,
    figure,
    limit,
    row: hit.row,
    reason: hitReason({ ...hit, answer }, figure, limit),
  };
}

/** The number that decides a plan, or that comes closest to its aim where none does. */
export function governingOf(known: Knowledge, nameOf: NameOf): Governing | null {
  const { hits } = known.shown;
  // A number says more than a refusal of the same gravity, and refusals stand on their own.
  const gravest = gravestHit(hits);
  const numbered = gravestNumber(hits);
  const hit = numbered?.word === gravest?.word ? numbered : gravest;
  if (hit?.outcome) return numberOfHit(hit, known.shown, nameOf);
  const closest = closestToAim(known.shown, nameOf);
  if (!closest) return null;
  // What decides is no number of a zone: the number nearest to its aim stands beside the reason.
  if (hit) return { ...closest, row: hit.row, reason: hitReason(hit, null, null) };
  if (known.word !== 'go') {
    return { ...closest, row: 10, reason: 'a figure that nobody knows has to be confirmed' };
  }
  return {
    ...closest,
    row: 12,
    reason: 'every level is met; this number comes closest to its aim',
  };
}
