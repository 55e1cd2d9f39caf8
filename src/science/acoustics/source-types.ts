import type { SourceKey } from '../sources.js';

/** How far the pitch of a sound source follows the sound speed of the gas around or in it. */
export type Following = 'full' | 'between' | 'partial' | 'equalPressure' | 'none' | 'timbre';

export interface SourceType {
  readonly id: string;
  readonly name: string;
  readonly following: Following;
  /** What to expect, for the sound card. */
  readonly expectation: string;
  readonly source: SourceKey;
}

/** Which sources move with the gas and which do not. */
export const sourceTypes: readonly SourceType[] = [
  {
    id: 'pipeInBag',
    name: 'flue, stopped or pan pipe inside the bag, blown with the gas of the bag',
    following: 'full',
    expectation: 'The note moves with the sound speed. Keep the blowing pressure, not the flow.',
    source: 'ising-1971',
  },
  {
    id: 'drivenTube',
    name: 'tube or bottle filled and immersed, sounded by loudspeaker or tap',
    following: 'full',
    expectation: 'The resonance moves with the sound speed; no jet can fail.',
    source: 'outside-gas-mass',
  },
  {
    id: 'pipeInAir',
    name: 'pipe blown with the gas while standing in air',
    following: 'between',
    expectation: 'The note lands between the value for air at the ends and the immersed one.',
    source: 'outside-gas-mass',
  },
  {
    id: 'mouthBlownInBag',
    name: 'pipe in the bag blown by mouth',
    following: 'partial',
    expectation: 'Breath mixes in and the note drifts. Feed the jet from the bag instead.',
    source: 'well-mixed-dilution',
  },
  {
    id: 'coupledReed',
    name: 'clarinet, oboe, brass',
    following: 'partial',
    expectation: 'Reed or lips must follow the bore: partial, full, or a jump of register.',
    source: 'reed-practice',
  },
  {
    id: 'freeReed',
    name: 'accordion, harmonica, organ reed',
    following: 'none',
    expectation: 'The tongue sets the note: a few cents at most; the timbre shifts.',
    source: 'reed-practice',
  },
  {
    id: 'edgeTone',
    name: 'edge-tone or pea whistle without resonator',
    following: 'equalPressure',
    expectation: 'At equal pressure the note goes as one over the root of the density.',
    source: 'ising-1971',
  },
  {
    id: 'lipWhistle',
    name: 'whistling with the lips',
    following: 'none',
    expectation: 'Not predictable, reported unchanged. Do not promise a change.',
    source: 'mackay-1993',
  },
  {
    id: 'voice',
    name: 'voice',
    following: 'timbre',
    expectation: 'The pitch stays about the same; the formants, and so the timbre, move.',
    source: 'stevens-1998',
  },
  {
    id: 'solidSource',
    name: 'string, bell, fork, loudspeaker',
    following: 'none',
    expectation: 'The pitch stays; a light gas makes it fainter, a heavy gas louder.',
    source: 'driven-source-level',
  },
];
