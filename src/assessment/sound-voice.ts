import { breathingRefusal } from '../science/acoustics/breathing-gate.js';
import { mixtureShareForFormants } from '../science/acoustics/formant-share.js';
import {
  formantInGas,
  oneBreathShare,
  speakingPitchHz,
  tractState,
  vowelFormants,
  wallResonanceHz,
} from '../science/acoustics/voice.js';
import type { Composition } from '../science/gases/gas-library.js';
import { speciesFractions } from '../science/gases/mixture-terms.js';
import type { Figure, SmallestAudible, SoundResult, VoiceAnswer } from './assessment.js';
import { plainFigure } from './figures.js';
import { refusalIds } from './refusals.js';
import { silentResult, type SoundCase } from './sound-context.js';
import { smallSpeakerRemark } from './sound-remarks.js';

const formantIds = ['formantAudible', 'formantClear'] as const;
const saferWay =
  'Play the two sounds of the illustration or a recording: nobody breathes anything.';
const noReason = 'No person breathes a demonstration gas.';

interface VoiceRefusal {
  readonly reason: string;
  readonly alternative: string;
}

/** Why this voice is not worked out, or null. Asked before anything is computed. */
function voiceRefusal(one: SoundCase, composition: Composition): VoiceRefusal | null {
  const { act, gases, policy, sound } = one;
  const oxygen = speciesFractions(gases, composition, 0).O2 ?? 0;
  // The gas alone, as if all else about its breathing were in order.
  const atBest = {
    by: 'presenter',
    from: 'limpBag',
    composition,
    certified: true,
    trainedNamedAdult: true,
    analysedOxygenFraction: oxygen,
  } as const;
  const [gravest] = [...(act.inhaled ?? []), atBest].flatMap((inhalation) =>
    refusalIds(inhalation, policy, gases),
  );
  const row = policy.refusals.find(({ id }) => id === gravest);
  const alternative =
    row?.alternative ??
    'Put the instrument in the bag, play a recording, or use a certified breathable mixture.';
  if (gravest !== undefined) return { reason: row?.reason ?? noReason, alternative };
  const reason = breathingRefusal(gases, composition);
  if (reason !== null) return { reason, alternative };
  return sound.speaker === 'child'
    ? { reason: 'Children do not breathe demonstration gases.', alternative }
    : null;
}

const blend = (mixture: Composition, share: number): Composition => {
  const blended: Record<string, number> = { air: 1 - share };
  for (const [id, fraction] of Object.entries(mixture)) {
    blended[id] = (blended[id] ?? 0) + fraction * share;
  }
  return blended;
};

function voiceAnswer(one: SoundCase, mixture: Composition): VoiceAnswer {
  const { gases, site, sound } = one;
  const speaker = sound.speaker ?? 'man';
  const vowel = sound.vowel ?? 'a';
  const p = site.pressurePa;
  const air = tractState(gases, { air: 1 }, p);
  const shares = [1, oneBreathShare()];
  const tracts = shares.map((share) => {
    const gas = tractState(gases, blend(mixture, share), p);
    return {
      factor: gas.speedOfSoundMPerS / air.speedOfSoundMPerS,
      gammaRatio: gas.heatCapacityRatio / air.heatCapacityRatio,
    };
  });
  const inputs = [
    { name: 'mixture', value: Object.keys(mixture).join(', '), unit: '' },
    { name: 'tract', value: 310.15, unit: 'K' },
    { name: 'site pressure', value: p, unit: 'Pa' },
    { name: 'share in the lung after one normal breath', value: oneBreathShare(), unit: '1' },
  ];
  const range =
    'value: tract full of the mixture, 37 degC and wet; other end: after one normal breath of it';
  const spanned = (values: readonly number[], unit: 'Hz' | 'ratio', method: string): Figure => ({
    ...plainFigure(values[0] ?? 0, unit, {
      method,
      formula:
        unit === 'ratio'
          ? 'k = c(gas)/c(air), both at 37 degC and saturated'
          : 'F(gas)^2 = k^2 (F^2 - Fw^2) + gamma(gas)/gamma(air) Fw^2',
      source: 'stevens-1998',
      range,
      inputs:
        unit === 'ratio'
          ? inputs
          : [...inputs, { name: 'wall resonance Fw', value: wallResonanceHz[speaker], unit: 'Hz' }],
    }),
    low: Math.min(...values),
    high: Math.max(...values),
  });
  const formantsInAirHz = vowelFormants[vowel][speaker];
  return {
    speaker,
    vowel,
    fundamentalHz: speakingPitchHz[speaker],
    factor: spanned(
      tracts.map(({ factor }) => factor),
      'ratio',
      'factor of the higher resonances of mouth and throat',
    ),
    formantsInAir: formantsInAirHz.map((value) =>
      plainFigure(value, 'Hz', {
        method: 'mean of a group of speakers',
        formula: 'measured',
        source: 'peterson-barney-1952',
        range: 'people differ by 5 to 25 %',
        inputs: [
          { name: 'speaker', value: speaker, unit: '' },
          { name: 'vowel', value: vowel, unit: '' },
        ],
      }),
    ),
    formants: formantsInAirHz.map((value) =>
      spanned(
        tracts.map(({ factor, gammaRatio }) =>
          formantInGas(value, factor, gammaRatio, wallResonanceHz[speaker]),
        ),
        'Hz',
        'resonance of mouth and throat in the mixture, with yielding walls',
      ),
    ),
  };
}

function smallestShares(one: SoundCase, mixture: Composition): readonly SmallestAudible[] {
  return formantIds.flatMap((id): SmallestAudible[] => {
    const row = one.policy.sound.find((candidate) => candidate.id === id);
    const share = row
      ? mixtureShareForFormants(one.gases, mixture, one.site.pressurePa, row.value)
      : null;
    if (!row || share === null) return [];
    return [
      {
        words: row.text,
        cents: null,
        formantChange: row.value,
        gasFraction: plainFigure(share, 'gasFraction', {
          method: 'smallest share of the mixture in the tract that moves the timbre this far',
          formula: 'c(x)/c(air) = 1 + change, or 1 - change in a heavy mixture, solved for x',
          source: 'kewley-port-watson-1994',
          range: 'tract wholly filled, higher resonances',
          inputs: [{ name: 'change', value: row.value, unit: '1' }],
        }),
        amount: null,
        amountByFlushing: null,
      },
    ];
  });
}

/** What a voice does in a breathable mixture: the pitch stays, the timbre shifts. */
export function voiceResult(one: SoundCase, composition: Composition): SoundResult {
  const refusal = voiceRefusal(one, composition);
  if (refusal !== null) {
    return {
      ...silentResult(one, `Refused. ${refusal.reason}`, refusal.alternative),
      refusal,
    };
  }
  const voice = voiceAnswer(one, composition);
  return {
    ...silentResult(
      one,
      'The voice keeps about its pitch (people may drift a semitone or two); its timbre shifts, because the resonances of mouth and throat move.',
      saferWay,
    ),
    voice,
    smallestAudible: smallestShares(one, composition),
    remarks: [
      'After one normal breath the shift is far smaller than in a mouth full of the mixture: expect the near end of the range.',
      'The level may differ; it is not predicted.',
      ...(voice.fundamentalHz < 300 ? [smallSpeakerRemark] : []),
    ],
  };
}
