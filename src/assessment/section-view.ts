import type { SpaceAir } from '../science/room-air/air-result.js';
import type { SectionView } from './assessment.js';
import type { Evaluation } from './evaluation.js';
import { outcomeFigure, plainFigure } from './figures.js';

/** Below this a mixed gas fraction is not worth hatching. */
const smallestDrawn = 5e-5;

/** Layers thinner than this are not drawn [m]. */
const thinnestDrawnM = 0.005;

/** What the section drawing shows of the planned day at one moment, seconds after midnight. */
export function sectionView(evaluation: Evaluation, atS: number, moment: string): SectionView {
  const { resolved, planned, dayResult, dayAir, plan } = evaluation;
  const found = dayResult.timesS.findIndex((t) => t + dayAir.window.startS >= atS);
  const index = found < 0 ? dayResult.timesS.length - 1 : found;
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
    layers: resolved.spaces.flatMap((space) =>
      layersOf(dayResult.spaces[space.id], index, {
        id: space.id,
        heightM: space.heightM,
        outdoors: resolved.site.carbonDioxideFraction,
      }),
    ),
    moment: `${clockText(atS)}, ${moment}`,
  };
}

/** Gas above outdoor air at one output time; oxygen is listed too where let out, but is no gas to hatch. */
function gasAt(
  fractions: Readonly<Record<string, readonly number[]>>,
  index: number,
  outdoors: number,
): number {
  return Object.entries(fractions)
    .filter(([gas]) => gas !== 'O2')
    .reduce(
      (sum, [gas, series]) =>
        sum + Math.max(0, (series[index] ?? 0) - (gas === 'CO2' ? outdoors : 0)),
      0,
    );
}

function layersOf(
  air: SpaceAir | undefined,
  index: number,
  space: { readonly id: string; readonly heightM: number; readonly outdoors: number },
): readonly SectionView['layers'][number][] {
  if (!air) return [];
  const layer = (at: 'floor' | 'ceiling' | 'whole', depthM: number, fraction: number) =>
    fraction < smallestDrawn || depthM < thinnestDrawnM
      ? []
      : [
          {
            space: space.id,
            at,
            depthM,
            gasFraction: plainFigure(fraction, 'gasFraction', {
              method: at === 'whole' ? 'well-mixed air' : 'two-layer model',
              formula: 'all gases above outdoor air, let out or breathed out',
              source: at === 'whole' ? 'own-room-air' : 'own-room-air',
            }),
          },
        ];
  const { layered, mixed } = air;
  if (!layered)
    return layer('whole', space.heightM, gasAt(mixed.gasFraction, index, space.outdoors));
  return [
    ...layer('whole', space.heightM, gasAt(layered.middle.gasFraction, index, space.outdoors)),
    ...layer(
      'floor',
      layered.floorLayerDepthM[index] ?? 0,
      gasAt(layered.floorLayer.gasFraction, index, space.outdoors),
    ),
    ...layer(
      'ceiling',
      layered.ceilingLayerDepthM[index] ?? 0,
      gasAt(layered.ceilingLayer.gasFraction, index, space.outdoors),
    ),
  ];
}

/** hh:mm of a time after midnight. */
function clockText(atS: number): string {
  const minutes = Math.floor(atS / 60);
  const two = (value: number) => String(value).padStart(2, '0');
  return `${two(Math.floor(minutes / 60) % 24)}:${two(minutes % 60)}`;
}
