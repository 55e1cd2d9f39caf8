import { clockText } from './clock-text.js';
import type { AirResult, SpaceAir } from '../science/room-air/air-result.js';
import type { Figure, SectionLayer, SectionMoment, SectionOfDay } from './assessment.js';
import { worseWord, type Hit } from './decision-table.js';
import type { Evaluation, WorstCase } from './evaluation.js';
import { outcomeFigure, plainFigure, unitOf } from './figures.js';
import { quantityWords } from './quantity-words.js';
import type { ResolvedPlan } from './resolved-plan.js';
import type { ZoneOutcome } from './zone-outcomes.js';

/** Below this a mixed gas fraction is not worth hatching. */
const smallestDrawn = 5e-5;

/** Layers thinner than this are not drawn [m]. */
const thinnestDrawnM = 0.005;

/** Most cues that are offered as moments; beyond it the ends of cues are left out first. */
const mostCues = 40;

/** The section of the planned day at one moment, seconds after midnight, and its other moments. */
export function sectionView(
  evaluation: Evaluation,
  atS: number,
  moment: string,
  nameOf: (gas: string) => string,
): SectionOfDay {
  const { resolved, planned, dayResult, dayAir, plan } = evaluation;
  const declared = planned.filter((outcome) => !outcome.floorCheck);
  const day: CaseAir = {
    caseName: 'planned',
    result: dayResult,
    startS: dayAir.window.startS,
    outcomes: planned,
  };
  const worst = worstMoment(evaluation);
  const moments = [
    ...cuesOf(evaluation).map((cue) => ({ ...cue, kind: 'cue' as const, air: day })),
    { atS, title: moment, kind: 'worst' as const, air: day },
  ].sort((one, other) => one.atS - other.atS);
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
    layers: layersAt(day, atS, resolved),
    moment: `${clockText(atS)}, ${moment}`,
    meters: metersOf(evaluation),
    moments: [...moments, ...(worst ? [worst] : [])].map(({ air, ...one }) => ({
      ...one,
      caseName: air.caseName,
      layers: layersAt(air, one.atS, resolved),
      zones: zonesAt(air, one.atS, resolved, nameOf),
    })),
  };
}

/** The air of one case over its own window. */
interface CaseAir {
  readonly caseName: SectionMoment['caseName'];
  readonly result: AirResult;
  readonly startS: number;
  readonly outcomes: readonly ZoneOutcome[];
}

interface Cue {
  readonly atS: number;
  readonly title: string;
}

/** Begins and ends of the acts, those of one time together. */
function cuesOf({ resolved }: Evaluation): readonly Cue[] {
  const begins = resolved.acts.flatMap((act) =>
    act.startsS.map((atS) => ({ atS, title: `${act.title} begins` })),
  );
  const ends = resolved.acts.flatMap((act) =>
    act.startsS.map((atS) => ({ atS: atS + act.durationS, title: `${act.title} ends` })),
  );
  const cues = begins.length + ends.length > mostCues ? begins : [...ends, ...begins];
  const byTime = new Map<number, string[]>();
  for (const { atS, title } of cues) byTime.set(atS, [...(byTime.get(atS) ?? []), title]);
  return [...byTime]
    .map(([atS, titles]) => ({ atS, title: titles.join(', ') }))
    .sort((one, other) => one.atS - other.atS)
    .slice(0, mostCues);
}

/** Of the worst credible cases the moment that decides most: the gravest word, the earliest row. */
function worstMoment({
  hits,
  worst,
}: Evaluation): (Cue & { readonly kind: 'worst'; readonly air: CaseAir }) | null {
  const gravest = hits
    .filter((hit) => hit.caseName === 'worstCredible' && hit.outcome?.floorCheck === false)
    .reduce<Hit | null>((known, hit) => {
      if (known === null) return hit;
      if (hit.word !== known.word)
        return worseWord(hit.word, known.word) === hit.word ? hit : known;
      return hit.row < known.row ? hit : known;
    }, null);
  const holds = (one: WorstCase) => one.outcomes.some((outcome) => outcome === gravest?.outcome);
  const found = worst.find(holds) ?? worst[0];
  if (!found) return null;
  const { outcome, answer } = gravest ?? {};
  const own = answer === undefined ? undefined : outcome?.answers[answer];
  const atS = own?.atS ?? found.outcomes[0]?.answers.bound?.atS ?? found.startS;
  return {
    atS,
    kind: 'worst',
    title: `the worst of: ${found.title}`,
    air: {
      caseName: 'worstCredible',
      result: found.result,
      startS: found.air.window.startS,
      outcomes: found.outcomes,
    },
  };
}

/** Meters that have a place, at the level where they hang. */
function metersOf({ plan, resolved }: Evaluation): SectionOfDay['meters'] & object {
  return (plan.meters ?? []).flatMap(({ id, title, space: place, heightM }) => {
    const space = resolved.spaces.find((candidate) => candidate.id === place);
    if (!space || heightM === undefined) return [];
    const levelM = space.floorLevelM + heightM;
    return [{ id, title: title ?? id, space: space.id, levelM }];
  });
}

/** The output time at or after a moment. */
function indexAt({ result, startS }: CaseAir, atS: number): number {
  const found = result.timesS.findIndex((t) => t + startS >= atS);
  return found < 0 ? result.timesS.length - 1 : found;
}

function layersAt(air: CaseAir, atS: number, resolved: ResolvedPlan): readonly SectionLayer[] {
  const index = indexAt(air, atS);
  return resolved.spaces.flatMap((space) =>
    layersOf(air.result.spaces[space.id], index, {
      id: space.id,
      heightM: space.heightM,
      outdoors: resolved.site.carbonDioxideFraction,
    }),
  );
}

const momentWords = {
  formula: 'the series of the zone at this moment',
  source: 'own-room-air',
} as const;

/** What every zone breathes at one moment, as the page and the sheet print it on the drawing. */
function zonesAt(
  air: CaseAir,
  atS: number,
  resolved: ResolvedPlan,
  nameOf: (gas: string) => string,
): SectionMoment['zones'] {
  const index = indexAt(air, atS);
  const declared = air.outcomes.filter((outcome) => !outcome.floorCheck);
  const valueOf = (outcome: ZoneOutcome, answer: 'judged' | 'bound'): number | undefined => {
    const { layered, mixed, bound } = outcome.answers;
    return (answer === 'bound' ? bound : (layered ?? mixed))?.series[index];
  };
  const figureOf = (outcome: ZoneOutcome, answer: 'judged' | 'bound'): Figure | null => {
    const value = valueOf(outcome, answer);
    if (value === undefined) return null;
    const method =
      answer === 'bound' ? 'bound' : outcome.answers.layered ? 'layered' : 'well mixed';
    return plainFigure(value * outcome.level.scale, unitOf(outcome.level), {
      method,
      ...momentWords,
    });
  };
  return resolved.groups.map(({ id }) => {
    const own = declared.filter((outcome) => outcome.zone === id);
    const oxygen = own.find((outcome) => outcome.level.quantity === 'oxygenFraction');
    const shareOfLimit = (outcome: ZoneOutcome): number =>
      (valueOf(outcome, 'judged') ?? 0) / outcome.level.limit.value;
    const gas = own
      .filter((outcome) => outcome.level.gas !== null)
      .toSorted((one, other) => shareOfLimit(other) - shareOfLimit(one))[0];
    return {
      id,
      oxygen: oxygen ? figureOf(oxygen, 'judged') : null,
      oxygenBound: oxygen ? figureOf(oxygen, 'bound') : null,
      gas: gas ? figureOf(gas, 'judged') : null,
      gasTitle: gas ? quantityWords(gas.level, nameOf) : null,
    };
  });
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
): readonly SectionLayer[] {
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
              source: 'own-room-air',
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
