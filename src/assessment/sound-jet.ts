import {
  bestIntonation,
  flueFlow,
  intonationNumber,
  jetRegime,
  jetSpeed,
  type JetRegime,
} from '../science/acoustics/jet-drive.js';
import {
  blowingPressureRange,
  cutUpRange,
  flueThicknessRange,
  mouthWidthRange,
} from '../science/acoustics/ranges.js';
import type { MixtureState } from '../science/gases/mixture-state.js';
import type { JetAnswer } from './assessment.js';
import { plainFigure } from './figures.js';
import { soundFigure, type SoundCase } from './sound-context.js';

const regimeWords = {
  speaks: 'the pipe speaks',
  mayNotSpeak: 'the pipe may not speak',
  mayOverblow: 'the pipe may overblow',
  overblows: 'the pipe overblows',
} as const satisfies Record<JetRegime, string>;

const supplyWords = {
  pressure: 'At the blowing pressure used in air',
  flow: 'At the flow used in air',
} as const;

/** How a pipe blown with the gas takes to it, at equal pressure and at equal flow. */
export function jetAnswers(
  one: SoundCase,
  air: MixtureState,
  gas: MixtureState,
  inAirHz: number,
  inGasHz: number,
): readonly JetAnswer[] {
  const pressure = soundFigure(one, 'blowingPressurePa', blowingPressureRange);
  const thickness = soundFigure(one, 'flueThicknessM', flueThicknessRange);
  const cutUp = soundFigure(one, 'cutUpM', cutUpRange);
  const width = soundFigure(one, 'mouthWidthM', mouthWidthRange);
  const described = pressure !== null && thickness !== null && cutUp !== null;
  const speedInAir = described ? jetSpeed(pressure.value, air.densityKgPerM3) : null;
  const inAir =
    described && speedInAir !== null
      ? intonationNumber(speedInAir, inAirHz, thickness.value, cutUp.value)
      : bestIntonation;
  return (['pressure', 'flow'] as const).map((supply) => {
    const speedGain = supply === 'flow' ? 1 : Math.sqrt(air.densityKgPerM3 / gas.densityKgPerM3);
    const number = (inAir * speedGain * inAirHz) / inGasHz;
    const speaks = jetRegime(number);
    const flow =
      described && speedInAir !== null && width !== null
        ? flueFlow(width.value, thickness.value, speedInAir * speedGain)
        : null;
    return {
      supply,
      speaks,
      words: `${supplyWords[supply]} ${regimeWords[speaks]}${described ? '' : ', if it was well voiced in air'}.`,
      intonation: plainFigure(number, 'ratio', {
        method: 'intonation number of the jet in the gas: weak below 1, best at 2, overblows at 3',
        formula: 'I = (V/f) sqrt(D/H^3), V = sqrt(2 P/rho)',
        source: 'ising-1971',
        range: described
          ? 'a plane jet; every pipe is voiced its own way'
          : 'the jet is not described: best drive in air is assumed',
        inputs: [
          { name: 'intonation number in air', value: inAir, unit: '' },
          { name: 'jet speed, gas over air', value: speedGain, unit: '' },
          { name: 'note, gas over air', value: inGasHz / inAirHz, unit: '' },
          ...(flow === null
            ? []
            : [{ name: 'flow through the flue, at most', value: flow, unit: 'm3/s' }]),
        ],
      }),
    };
  });
}
