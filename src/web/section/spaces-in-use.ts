import type { SectionMoment, SectionView } from '../../assessment/assessment.js';

/** A view without the spaces where nobody is, nothing happens and no gas comes; and their names. */
export function spacesInUse(
  section: SectionView,
  acts: readonly { readonly space: string }[],
  moments: readonly SectionMoment[],
): { readonly view: SectionView; readonly leftOut: readonly string[] } {
  const gas = [section, ...moments].flatMap(({ layers }) => layers);
  const used = new Set([...section.zones, ...gas, ...acts].map(({ space }) => space));
  const kept = section.spaces.filter((space) => used.has(space.id));
  if (kept.length === 0) return { view: section, leftOut: [] };
  const ids = new Set(kept.map((space) => space.id));
  // An opening into a space that is not drawn would look like one to the outside.
  const drawn = (id: string): boolean =>
    ids.has(id) || !section.spaces.some((space) => space.id === id);
  return {
    view: {
      ...section,
      spaces: kept,
      openings: section.openings.filter((opening) => drawn(opening.from) && drawn(opening.to)),
    },
    leftOut: section.spaces.filter((space) => !ids.has(space.id)).map((space) => space.title),
  };
}
