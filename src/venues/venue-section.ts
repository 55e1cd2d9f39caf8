import type { SectionView } from '../assessment/assessment.js';
import type { PhysicalFigure, PlanVenue } from '../assessment/plan-file.js';

/** The number to draw with: the value, or the middle of the bounds, or nothing. */
function drawn(figure: PhysicalFigure | undefined): number | undefined {
  if (figure === undefined || typeof figure === 'number') return figure;
  if (figure.value !== undefined) return figure.value;
  const { low, high } = figure;
  return low !== undefined && high !== undefined ? (low + high) / 2 : (low ?? high);
}

/**
 * The venue alone as a section, before any plan: spaces and openings that have their sizes. A space
 * of unknown size is left out rather than guessed.
 */
export function venueSection(venue: PlanVenue): SectionView {
  const spaces = venue.spaces.flatMap((space) => {
    const area = drawn(space.floorAreaM2);
    const heightM = drawn(space.heightM);
    if (area === undefined || heightM === undefined || area <= 0 || heightM <= 0) return [];
    return [
      {
        id: space.id,
        title: space.title ?? space.id,
        floorLevelM: drawn(space.floorLevelM) ?? 0,
        floorRiseM: drawn(space.floorRiseM) ?? 0,
        heightM,
        lengthM: space.planWidthM ?? Math.sqrt(area),
      },
    ];
  });
  const levels = new Map(spaces.map(({ id, floorLevelM }) => [id, floorLevelM]));
  const openings = (venue.openings ?? []).flatMap((opening) => {
    const heightM = drawn(opening.heightM);
    const isDrawn = (id: string) => id === 'outside' || levels.has(id);
    if (heightM === undefined || !isDrawn(opening.from) || !isDrawn(opening.to)) return [];
    const floor = Math.max(...[opening.from, opening.to].map((id) => levels.get(id) ?? -1000));
    return [
      {
        from: opening.from,
        to: opening.to,
        kind: opening.kind,
        sillLevelM: drawn(opening.sillLevelM) ?? floor,
        heightM,
      },
    ];
  });
  return { spaces, openings, zones: [], layers: [], moment: '' };
}
