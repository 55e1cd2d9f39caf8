import type { Composition } from '../science/gases/gas-library.js';
import type { SoundCase, Span } from './sound-context.js';

/** Below this small loudspeakers lose most of a tone. */
const smallSpeakerHz = 300;
/** Relaxation that begins here and above can be met by the partials of an audible note. */
const audibleRelaxation = { fromHz: 1000, toHz: 100_000 };

export const smallSpeakerRemark =
  'Telephones and small speakers lose much below 300 Hz: play the illustration on a full loudspeaker.';

function relaxationRemarks({ gases }: SoundCase, mixture: Composition): readonly string[] {
  return Object.keys(mixture).flatMap((id) => {
    const species = gases.species[id];
    const relaxation = species?.relaxation;
    if (species === undefined || relaxation === undefined) return [];
    const { frequencyMinHz } = relaxation;
    const { fromHz, toHz } = audibleRelaxation;
    if (frequencyMinHz < fromHz || frequencyMinHz > toHz) return [];
    return [`${species.name}: ${relaxation.effect}`];
  });
}

/** What else has to be known before promising a note. */
export function noteRemarks(given: {
  readonly one: SoundCase;
  readonly mixture: Composition;
  readonly notesHz: readonly number[];
  readonly isJet: boolean;
  readonly share: Span;
  readonly bagM3: number | null;
}): readonly string[] {
  const { one, mixture, notesHz, isJet, share, bagM3 } = given;
  return [
    ...(isJet
      ? [
          'Set the blowing pressure, not the flow, and blow with the gas, not by mouth: breath mixes in and the note drifts.',
        ]
      : []),
    'The level may differ from the one in air; it is not predicted.',
    'The gas must be as warm as the room: 1 K moves the note by about 3 cents. Let gas from a cylinder rest 2 to 5 minutes in the bag.',
    ...(bagM3 !== null && share.value > 0.9999
      ? ['Pure gas is never reached by flushing a bag: press it flat first.']
      : []),
    ...relaxationRemarks(one, mixture),
    ...(notesHz.some((f) => f < smallSpeakerHz) ? [smallSpeakerRemark] : []),
  ];
}
