import { GRAVITY_M_PER_S2, AIR_MOLAR_MASS_KG_PER_MOL } from '../science/room-air/air-constants.js';
import { streamClearance, streamFraction } from '../science/room-air/local-flow.js';
import type { Finding } from './assessment.js';
import { plainFigure } from './figures.js';
import { shortText } from './quantity-words.js';
import type { ResolvedAct, ResolvedGroup, ResolvedPlan, ResolvedRelease } from './resolved-plan.js';

/** A stream thinner than this where mouths are is not worth a line [-]. */
const worthALine = 0.01;

interface Stream {
  readonly fraction: number;
  readonly distanceM: number;
  readonly group: ResolvedGroup;
  readonly falls: boolean;
}

/** What a mouth at the height of a group meets on the axis of a release; null outside its way. */
function streamAt(
  release: ResolvedRelease,
  group: ResolvedGroup,
  plan: ResolvedPlan,
): Stream | null {
  const space = plan.spaces.find((one) => one.id === release.space);
  if (!space || release.heightM === null || release.durationS <= 0 || release.burned) return null;
  if (group.space !== release.space || group.count <= 0 || release.amountMol <= 0) return null;
  const molarMass = release.massKg / release.amountMol;
  const roomK = space.temperatureK ?? plan.site.temperatureK;
  const ratio = ((molarMass / AIR_MOLAR_MASS_KG_PER_MOL) * roomK) / (release.temperatureK ?? roomK);
  const falls = ratio > 1;
  const distanceM =
    (space.floorLevelM + release.heightM - group.floorLevelM - group.heightM) * (falls ? 1 : -1);
  if (distanceM < 0) return null;
  const flow = (release.amountMol * plan.site.molarVolumeM3PerMol) / release.durationS;
  const fraction = streamFraction(flow, GRAVITY_M_PER_S2 * Math.abs(ratio - 1), distanceM);
  return { fraction, distanceM, group, falls };
}

function worstStream(act: ResolvedAct, plan: ResolvedPlan): Stream | null {
  const all = act.planned.flatMap((release) =>
    plan.groups.flatMap((group) => streamAt(release, group, plan) ?? []),
  );
  return all.reduce<Stream | null>(
    (worst, one) => (worst === null || one.fraction > worst.fraction ? one : worst),
    null,
  );
}

/**
 * Acts whose rising or falling gas passes a breathing height: what a mouth inside the stream meets
 * is no matter of the room, neither of its layers nor of its bound.
 */
export function streamFindings(plan: ResolvedPlan): readonly Finding[] {
  return plan.acts.flatMap((act, index): Finding[] => {
    const stream = worstStream(act, plan);
    if (!stream || stream.fraction < worthALine) return [];
    const share = shortText(
      plainFigure(stream.fraction, 'gasFraction', {
        method: 'gas fraction on the axis of a rising or falling stream',
        formula: 'min(1, 2 q/Q_p), Q_p = C B^(1/3) z^(5/3)',
        source: 'morton-taylor-turner-1956',
      }),
    );
    const apart = (Math.ceil(streamClearance(stream.distanceM) * 10) / 10).toFixed(1);
    const way = stream.falls ? 'falling' : 'rising';
    return [
      {
        code: 'local-flow',
        kind: 'caution',
        path: `/acts/${String(index)}`,
        text: `${act.title}: a mouth inside the ${way} gas at the height of ${stream.group.title} meets up to ${share}. Keep every face at least ${apart} m from its axis.`,
      },
    ];
  });
}
