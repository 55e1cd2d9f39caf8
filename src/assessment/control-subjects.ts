import type { LargestAmount, SoundResult } from './assessment.js';
import type { Hit } from './decision-table.js';
import type { Evaluation } from './evaluation.js';
import { gravestNumber } from './governing.js';
import type { Subject } from './standing.js';

/** More acts than this are not searched for controls: the gravest come first. */
const mostSubjects = 3;

const keyOf = ({ act, space }: Subject): string => act ?? `in ${space}`;

/**
 * What controls are sought for: what the governing number belongs to, then every act that a number
 * refuses. A space stands for itself where no act is to blame.
 */
export function controlSubjects({ hits, resolved }: Evaluation): readonly Subject[] {
  const subjectOf = (hit: Hit): Subject | null => {
    const act = resolved.acts.find(({ id }) => id === hit.acts[0]);
    if (act) return { act: act.id, space: act.space };
    return hit.space === null || hit.acts.length > 0 ? null : { act: null, space: hit.space };
  };
  const governing = gravestNumber(hits);
  const refused = hits.filter(({ word, outcome }) => word === 'noGo' && outcome !== null);
  const found = new Map<string, Subject>();
  for (const hit of [...(governing ? [governing] : []), ...refused]) {
    const subject = subjectOf(hit);
    if (subject && !found.has(keyOf(subject))) found.set(keyOf(subject), subject);
  }
  return [...found.values()].slice(0, mostSubjects);
}

/**
 * The share of its planned amount that an act could do with: down to the smallest audible one where it
 * makes sound, else the largest that passes. Zero where no amount passes, null where that is no less
 * than planned.
 */
export function enoughShare(
  act: string | null,
  sound: readonly SoundResult[],
  largest: readonly LargestAmount[],
): number | null {
  const audible = sound
    .filter((one) => one.act === act)
    .flatMap(({ amount, smallestAudible }) => {
      const least = smallestAudible.flatMap((one) => (one.amount ? [one.amount.value] : []));
      return amount && amount.value > 0 && least.length > 0
        ? [Math.min(...least) / amount.value]
        : [];
    });
  const passing = largest
    .filter((one) => one.act === act && one.planned.value > 0)
    .map(({ mass, planned }) => mass.value / planned.value);
  const shares = audible.length > 0 ? audible : passing;
  if (shares.length === 0) return null;
  const share = Math.max(...shares);
  return share < 1 ? share : null;
}
