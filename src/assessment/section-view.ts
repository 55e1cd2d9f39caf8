import type { SectionView } from './assessment.js';
import type { Evaluation } from './evaluation.js';
import { outcomeFigure, plainFigure } from './figures.js';

/** Below this a mixed gas fraction is not worth hatching. */
const smallestDrawn = 5e-5;

/** What the section drawing shows, at the moment of the worst mixed value of the planned day. */
export function sectionView(evaluation: Evaluation, moment: string): SectionView {
  const { resolved, planned, dayResult, plan } = evaluation;
  const declared = planned.filter((outcome) => !outcome.floorCheck);
  return {
    spaces: resolved.spaces.map((space, index) => {
      const width = plan.venue.spaces[index]?.planWidthM;
      return {
        id: space.id,
        title: space.title,
        floorLevelM: space.floorLevelM,
        floorRiseM: space.floorRiseM,
        heightM: space.heightM,
        // Where no width for the drawing is stated a square plan stands in; the volume stays true.
        lengthM: width ?? Math.sqrt(space.floorAreaM2),
      };
    }),
    openings: resolved.openings.map(({ from, to, kind, sillLevelM, heightM }) => ({
      from,
      to,
      kind,
      sillLevelM,
      heightM,
    })),
    zones: resolved.groups.map((group) => {
      const own = declared.filter((outcome) => outcome.zone === group.id);
      const oxygen = own.find((outcome) => outcome.level.quantity === 'oxygenFraction');
      const gas = own
        .filter((outcome) => outcome.level.gas !== null)
        .sort((a, b) => (b.answers.mixed?.value ?? 0) - (a.answers.mixed?.value ?? 0))[0];
      return {
        id: group.id,
        title: group.title,
        space: group.space,
        levelM: group.floorLevelM + group.heightM,
        lowestOxygen: oxygen ? outcomeFigure(oxygen, 'bound', resolved) : null,
        highestGas: gas ? outcomeFigure(gas, 'bound', resolved) : null,
      };
    }),
    layers: resolved.spaces.flatMap((space): SectionView['layers'][number][] => {
      const fractions = dayResult.spaces[space.id]?.mixed.gasFraction ?? {};
      const outdoors = resolved.site.carbonDioxideFraction;
      const highest = Object.entries(fractions).map(
        ([gas, series]) => Math.max(0, ...series) - (gas === 'CO2' ? outdoors : 0),
      );
      const total = highest.reduce((sum, value) => sum + value, 0);
      if (total < smallestDrawn) return [];
      return [
        {
          space: space.id,
          at: 'whole',
          depthM: space.heightM,
          gasFraction: plainFigure(total, 'gasFraction', {
            method: 'well-mixed gas above outdoor air, highest of the planned day',
            formula: 'sum of all gases let out or breathed out',
            source: 'own-room-air',
          }),
        },
      ];
    }),
    moment,
  };
}
