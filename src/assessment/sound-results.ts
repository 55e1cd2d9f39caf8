import { noteRatio, type GasInAir } from '../science/acoustics/gas-fraction.js';
import { centsBetween, noteOf } from '../science/acoustics/pitch.js';
import { gasBySqueezing, shareForShift } from '../science/acoustics/smallest-amount.js';
import type { GasLibrary } from '../science/gases/gas-library.js';
import type { Figure, SoundResult } from './assessment.js';
import type { Policy } from './catalogue-types.js';
import { plainFigure } from './figures.js';
import type { PlanAct, PlanFile, PlanSound } from './plan-file.js';
import { planRanges } from './plan-ranges.js';
import type { PlanReader } from './plan-reader.js';
import type { ResolvedSite } from './resolved-plan.js';

interface SoundContext {
  readonly gases: GasLibrary;
  readonly policy: Policy;
  readonly site: ResolvedSite;
  readonly reader: PlanReader;
}

const soundIds = ['pitchAudible', 'pitchClear', 'pitchLarge'] as const;

const source = 'virial-sound-speed';
const immersedRange = 'instrument wholly inside the gas and blown with it, -10 to 45 degC';

/** The gas of a sound set-up that is not air, when there is exactly one. */
function soundGas(sound: PlanSound): string | null {
  if (sound.gas !== undefined) return sound.gas === 'air' ? null : sound.gas;
  const gases = Object.keys(sound.composition ?? {}).filter((gas) => gas !== 'air');
  return gases.length === 1 ? (gases[0] ?? null) : null;
}

function shareOf(sound: PlanSound, gas: string, path: string, { reader }: SoundContext) {
  const fallback = { value: 1, low: 0.9, high: 1, source: 'plan-default', why: 'pure gas' };
  const stated = sound.composition?.[gas];
  const spec = { range: planRanges.gasFraction, worse: 'low', fallback } as const;
  const raw = sound.gasFraction ?? stated;
  const value = reader.number(raw, `${path}/gasFraction`, spec);
  const open = reader.open.get(`${path}/gasFraction`);
  return { value, low: open?.low ?? value, high: open?.high ?? value };
}

function pitchInGas(
  act: PlanAct,
  sound: PlanSound,
  gas: string,
  path: string,
  context: SoundContext,
): SoundResult {
  const { gases, policy, site, reader } = context;
  const inAir = reader.number(sound.frequencyInAirHz, `${path}/frequencyInAirHz`, {
    range: planRanges.frequencyHz,
    worse: 'low',
  });
  const share = shareOf(sound, gas, path, context);
  const room: GasInAir = {
    gas,
    temperatureK: site.temperatureK,
    pressurePa: site.pressurePa,
    relativeHumidity: site.relativeHumidity,
  };
  const ratioAt = noteRatio(gases, room);
  const frequencyAt = (x: number) => inAir * ratioAt(x);
  const ends = [frequencyAt(share.low), frequencyAt(share.high)];
  const standsInAir = sound.surroundings === 'air';
  const frequencyHz = frequencyAt(share.value);
  const inputs = [
    { name: 'pitch in room air', value: inAir, unit: 'Hz' },
    { name: `share of ${gas} inside`, value: share.value, unit: 'mol/mol' },
    { name: 'room temperature', value: site.temperatureK, unit: 'K' },
    { name: 'site pressure', value: site.pressurePa, unit: 'Pa' },
  ];
  const words = {
    method: 'note moves with the speed of sound of the gas inside',
    formula: 'f = f(air) x c(gas)/c(air), c from the virial equation of state',
    source,
    range: standsInAir
      ? 'ends in room air: the real note lies between this one and the note in air'
      : immersedRange,
    inputs,
  };
  // With the ends in room air the truth lies between the note in air and the immersed note.
  const spread = standsInAir ? [inAir, ...ends] : ends;
  const frequency: Figure = {
    ...plainFigure(frequencyHz, 'Hz', words),
    low: Math.min(...spread),
    high: Math.max(...spread),
  };
  const centsOf = (f: number) => centsBetween(inAir, f);
  const cents: Figure = {
    ...plainFigure(centsOf(frequencyHz), 'cents', {
      ...words,
      formula: 'cents = 1200 log2(f/f(air))',
    }),
    low: Math.min(...spread.map(centsOf)),
    high: Math.max(...spread.map(centsOf)),
  };
  const bagM3 =
    sound.bagVolumeM3 === undefined
      ? null
      : reader.number(sound.bagVolumeM3, `${path}/bagVolumeM3`, {
          range: planRanges.gasVolumeM3,
          worse: 'high',
        });
  const smallestAudible = soundIds.flatMap((id) => {
    const row = policy.sound.find((candidate) => candidate.id === id);
    const smallest = row ? shareForShift(gases, room, row.value) : null;
    if (!row || smallest === null) return [];
    return [
      {
        words: row.text,
        cents: row.value,
        gasFraction: plainFigure(smallest, 'gasFraction', {
          method: 'smallest share that moves the note this far',
          formula: 'c(x)/c(air) = 2^(cents/1200), solved for x',
          source,
          range: immersedRange,
          inputs,
        }),
        amount:
          bagM3 === null || bagM3 === 0
            ? null
            : plainFigure(gasBySqueezing(bagM3, smallest), 'm3', {
                method: 'gas for a bag pressed flat first',
                formula: 'gas = x times bag volume',
                source: 'well-mixed-dilution',
                inputs: [{ name: 'bag volume', value: bagM3, unit: 'm3' }],
              }),
      },
    ];
  });
  return {
    act: act.id,
    title: `${act.title}: ${gas}`,
    instrument: sound.instrument,
    follows: true,
    words: standsInAir
      ? 'The note moves towards the value shown; with its ends in room air it will not reach it.'
      : 'The note moves with the speed of sound of the gas.',
    frequencyInAir: plainFigure(inAir, 'Hz', {
      method: 'as stated in the plan',
      formula: 'measured or marked on the instrument',
      source: 'plan',
    }),
    frequency,
    cents,
    note: noteOf(frequencyHz),
    noteInAir: noteOf(inAir),
    smallestAudible,
    saferWay:
      'Play a recording of the effect, or use less gas down to the smallest share that is heard.',
  };
}

const withoutPitch = (act: PlanAct, sound: PlanSound): SoundResult => ({
  act: act.id,
  title: act.title,
  instrument: sound.instrument,
  follows: false,
  words:
    sound.instrument === 'voice'
      ? 'A voice keeps about its pitch; its timbre shifts, because the resonances of mouth and throat move.'
      : 'No gas is named inside the instrument, so nothing changes its note.',
  frequencyInAir: null,
  frequency: null,
  cents: null,
  note: null,
  noteInAir: null,
  smallestAudible: [],
  saferWay: 'A recording shows the same effect without any gas.',
});

/** What the audience hears, act by act. */
export function soundResults(plan: PlanFile, context: SoundContext): readonly SoundResult[] {
  return plan.acts.flatMap((act, actIndex) =>
    (act.sound ?? []).map((sound, index) => {
      const gas = soundGas(sound);
      const path = `/acts/${String(actIndex)}/sound/${String(index)}`;
      if (gas === null || sound.instrument === 'voice' || sound.frequencyInAirHz === undefined) {
        return withoutPitch(act, sound);
      }
      return pitchInGas(act, sound, gas, path, context);
    }),
  );
}
