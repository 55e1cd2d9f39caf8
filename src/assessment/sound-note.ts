import { noteRatio, type GasInAir } from '../science/acoustics/gas-fraction.js';
import { centsBetween, noteOf } from '../science/acoustics/pitch.js';
import { shareForShift } from '../science/acoustics/smallest-amount.js';
import type { Composition } from '../science/gases/gas-library.js';
import { mixtureState, type MixtureInput } from '../science/gases/mixture-state.js';
import type { Figure, FigureInput, SmallestAudible, SoundResult } from './assessment.js';
import { plainFigure } from './figures.js';
import { planRanges } from './plan-ranges.js';
import { bagAmounts, bagVolume } from './sound-amount.js';
import { gasWords, silentResult, type SoundCase, type Span } from './sound-context.js';
import { instrumentInAir, type Instrument } from './sound-instrument.js';
import { jetAnswers } from './sound-jet.js';
import { noteRemarks } from './sound-remarks.js';

const audibleIds = ['pitchAudible', 'pitchClear', 'pitchLarge'] as const;

const saferWay =
  'Play the two sounds of the illustration or a recording, or use less gas: down to the smallest share that is still heard.';

function shareOf({ sound, path, reader }: SoundCase): Span {
  const stated = Object.entries(sound.composition ?? {});
  const ofMixture = stated.reduce((sum, [id, share]) => (id === 'air' ? sum : sum + share), 0);
  const fallback = { value: 1, low: 0.9, high: 1, source: 'plan', why: 'pure gas' };
  const raw = sound.gasFraction ?? (ofMixture > 0 && ofMixture < 1 ? ofMixture : undefined);
  const spec = { range: planRanges.gasFraction, worse: 'low', fallback } as const;
  const value = reader.number(raw, `${path}/gasFraction`, spec);
  const open = reader.open.get(`${path}/gasFraction`);
  return { value, low: open?.low ?? value, high: open?.high ?? value };
}

function instrumentWords(standsInAir: boolean, isMeasured: boolean): string {
  if (!standsInAir) return 'The note moves with the speed of sound of the gas.';
  return isMeasured
    ? 'The ends see room air, so the note lands between the two values shown.'
    : 'The ends see room air, so the note lands between the two values shown; the lower one is for the widest usual bore.';
}

interface NoteInputs {
  readonly inputs: readonly FigureInput[];
  readonly range: string;
  readonly formula: string;
}

function noteInputs(
  one: SoundCase,
  instrument: Instrument,
  gasName: string,
  share: Span,
  standsInAir: boolean,
): NoteInputs {
  const { site } = one;
  const friction = instrument.radiusM === undefined ? '' : ' x wall friction';
  return {
    inputs: [
      { name: 'note in room air', value: instrument.inAir.value, unit: 'Hz' },
      { name: `share of ${gasName} inside`, value: share.value, unit: 'mol/mol' },
      ...(instrument.radiusM === undefined
        ? []
        : [{ name: 'inner radius', value: instrument.radiusM, unit: 'm' }]),
      { name: 'temperature of room and gas', value: site.temperatureK, unit: 'K' },
      { name: 'site pressure', value: site.pressurePa, unit: 'Pa' },
      { name: 'relative humidity', value: site.relativeHumidity, unit: '' },
    ],
    formula: standsInAir
      ? `f = f(air) x c(gas)/c(air)${friction} x end factor: 1 when immersed, less or more with air at the ends`
      : `f = f(air) x c(gas)/c(air)${friction}, c from the virial equation of state`,
    range: standsInAir
      ? 'ends in room air, -10 to 45 degC: between air at the ends and immersed'
      : 'instrument wholly inside the gas and blown with it, -10 to 45 degC',
  };
}

function smallestShares(
  one: SoundCase,
  given: GasInAir,
  bagM3: number | null,
  words: NoteInputs,
): readonly SmallestAudible[] {
  return audibleIds.flatMap((id): SmallestAudible[] => {
    const row = one.policy.sound.find((candidate) => candidate.id === id);
    const share = row ? shareForShift(one.gases, given, row.value) : null;
    if (!row || share === null) return [];
    return [
      {
        words: row.text,
        cents: row.value,
        formantChange: null,
        gasFraction: plainFigure(share, 'gasFraction', {
          method: 'smallest share of gas that moves the note this far',
          formula: 'f(x)/f(air) = 2^(cents/1200), solved for x',
          source: 'pitch-inversion',
          range: words.range,
          inputs: words.inputs,
        }),
        ...bagAmounts(bagM3, share),
      },
    ];
  });
}

/** What a pipe, bottle or tube does with a gas inside. */
export function noteResult(one: SoundCase, mixture: Composition): SoundResult {
  const { gases, sound, site } = one;
  const { temperatureK, pressurePa, relativeHumidity } = site;
  const conditions = { temperatureK, pressurePa, relativeHumidity };
  const room: MixtureInput = { composition: { air: 1 }, ...conditions };
  const air = mixtureState(gases, room);
  const instrument = instrumentInAir(one, air, room);
  if (instrument === null) {
    return silentResult(
      one,
      'The note moves with the speed of sound, but neither its note in air nor its sizes are given.',
      saferWay,
    );
  }
  const { inAir, radiusM, resonator } = instrument;
  const standsInAir = sound.surroundings === 'air';
  const share = shareOf(one);
  const immersed: GasInAir = {
    gas: Object.keys(mixture)[0] ?? 'air',
    mixture,
    ...conditions,
    ...(radiusM === undefined ? {} : { radiusM, frequencyInAirHz: inAir.value }),
  };
  const standing: GasInAir =
    standsInAir && resonator !== null ? { ...immersed, endsInAir: resonator } : immersed;
  const ratios = [noteRatio(gases, standing), noteRatio(gases, immersed)];
  const ratio = ratios[0]?.(share.value) ?? 1;
  const ends = ratios.flatMap((ratioAt) => [ratioAt(share.low), ratioAt(share.high)]);
  // A bottle known by its note alone: nothing tells how much the air at its neck weighs.
  if (standsInAir && resonator === null) ends.push(1);
  const words = noteInputs(one, instrument, gasWords(gases, mixture), share, standsInAir);
  const figure = { method: 'note of the same instrument in the gas', source: 'virial-sound-speed' };
  const airEnds = [inAir.low ?? inAir.value, inAir.high ?? inAir.value];
  const frequency: Figure = {
    ...plainFigure(inAir.value * ratio, 'Hz', { ...figure, ...words }),
    low: Math.min(...airEnds) * Math.min(...ends),
    high: Math.max(...airEnds) * Math.max(...ends),
  };
  const shift = (r: number) => centsBetween(1, r);
  const cents: Figure = {
    ...plainFigure(shift(ratio), 'cents', {
      ...words,
      method: 'interval between the two notes',
      formula: 'cents = 1200 log2(f/f(air))',
      source: 'equal-temperament-iso-16',
    }),
    low: shift(Math.min(...ends)),
    high: shift(Math.max(...ends)),
  };
  const inside: Record<string, number> = { air: 1 - share.value };
  for (const [id, part] of Object.entries(mixture)) inside[id] = part * share.value;
  const gas = mixtureState(gases, { composition: inside, ...conditions });
  const isJet = ['openPipe', 'stoppedPipe', 'fluePipe'].includes(sound.instrument);
  const jet = isJet ? jetAnswers(one, air, gas, inAir.value, frequency.value) : [];
  const bagM3 = bagVolume(one);
  return {
    ...silentResult(one, instrumentWords(standsInAir, instrument.isMeasured), saferWay),
    follows: true,
    frequencyInAir: inAir,
    frequency,
    cents,
    note: noteOf(frequency.value),
    noteInAir: noteOf(inAir.value),
    isStopped: instrument.isStopped,
    jet,
    ...bagAmounts(bagM3, share.value),
    smallestAudible: smallestShares(one, standing, bagM3, words),
    remarks: noteRemarks({
      one,
      mixture,
      notesHz: [inAir.value, frequency.value],
      isJet,
      share,
      bagM3,
    }),
  };
}
