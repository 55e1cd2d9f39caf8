import Type, { type Static } from 'typebox';
import { InvalidInput } from '../../errors.js';
import { refuseUnbreathable } from '../../science/acoustics/breathing-gate.js';
import {
  airAtEndsFactor,
  bottleOf,
  immersedNote,
  pipeColumn,
  pipeColumnFromNote,
  type PipeKind,
  type Resonator,
} from '../../science/acoustics/instrument.js';
import {
  bestIntonation,
  intonationNumber,
  jetRegime,
  jetSpeed,
} from '../../science/acoustics/jet-drive.js';
import { centsBetween, noteOf } from '../../science/acoustics/pitch.js';
import { tonePreview, vowelPreview, type PreviewPair } from '../../science/acoustics/preview.js';
import {
  blowingPressureRange,
  flueThicknessRange,
  frequencyRange,
} from '../../science/acoustics/ranges.js';
import {
  formantInGas,
  speakingPitchHz,
  tractState,
  vowelFormants,
  wallResonanceHz,
} from '../../science/acoustics/voice.js';
import { wallFactorOfGas } from '../../science/acoustics/wall-friction.js';
import type { GasLibrary } from '../../science/gases/gas-library.js';
import { mixtureState, type MixtureState } from '../../science/gases/mixture-state.js';
import { inRange, type Range } from '../../science/range.js';
import type { Calculator, CalculatorData } from './calculator.js';
import { compositionSchema, humiditySchema, pressureSchema, temperatureSchema } from './gas.js';

const closed = { additionalProperties: false };
const size = (description: string) => Type.Optional(Type.Number({ description }));

export const surroundingsSchema = Type.Enum(['immersed', 'air'], {
  description:
    'immersed: the gas is inside and all round; air: the pipe stands in room air; default immersed',
});

const input = Type.Object(
  {
    instrument: Type.Enum(['openPipe', 'stoppedPipe', 'fluePipe', 'helmholtz', 'tube', 'voice'], {
      description:
        'openPipe, stoppedPipe: plain pipes; fluePipe: open pipe with a mouth; helmholtz: bottle; tube: driven by loudspeaker or tap; voice',
    }),
    lengthM: size('body length of a pipe or tube [m], 0.01 to 12'),
    radiusM: size('inner radius of a pipe or tube [m], 0.001 to 0.5'),
    mouthWidthM: size('width of the mouth of a flue pipe [m], 0.001 to 1'),
    cutUpM: size('height of the mouth of a flue pipe [m], 0.0005 to 0.5'),
    isClosedAtOneEnd: Type.Optional(
      Type.Boolean({ description: 'tube: one end closed; default false, both open' }),
    ),
    volumeM3: size('volume of a Helmholtz resonator [m3], 1e-6 to 1'),
    neckLengthM: size('length of its neck [m], 0 to 2'),
    neckRadiusM: size('inner radius of its neck [m], 0.001 to 0.5'),
    frequencyInAirHz: size('its note in room air, instead of sizes [Hz], 16 to 16000'),
    composition: compositionSchema,
    surroundings: Type.Optional(surroundingsSchema),
    temperatureK: temperatureSchema,
    pressurePa: pressureSchema,
    relativeHumidity: Type.Optional(humiditySchema),
    wallFriction: Type.Optional(
      Type.Boolean({
        description:
          'count friction at the wall of a pipe of known radius, which lowers the note; default false',
      }),
    ),
    blowing: Type.Optional(
      Type.Enum(['pressure', 'flow'], {
        description: 'what the supply keeps the same in air and gas; default pressure',
      }),
    ),
    blowingPressurePa: size('blowing pressure in air above the room [Pa], 1 to 10000'),
    flueThicknessM: size('thickness of the flue [m], 0.00001 to 0.01'),
    speaker: Type.Optional(Type.Enum(['man', 'woman', 'child'])),
    vowel: Type.Optional(
      Type.Enum(['i', 'ae', 'a', 'u'], { description: 'as in heed, had, hod, who’d' }),
    ),
    formantsInAirHz: Type.Optional(
      Type.Array(Type.Number(), {
        minItems: 1,
        maxItems: 5,
        description: 'formants in air instead of speaker and vowel [Hz], above the wall resonance',
      }),
    ),
  },
  { ...closed, title: 'sound: input' },
);

const pipeOutput = Type.Object(
  {
    frequencyHz: Type.Number({ description: 'note in the gas [Hz]' }),
    frequencyInAirHz: Type.Number({ description: 'note in the room air [Hz]' }),
    ratio: Type.Number({ description: 'frequencyHz over frequencyInAirHz [1]' }),
    cents: Type.Number({ description: 'the same as an interval [cent]' }),
    note: Type.Object(
      {
        name: Type.String({ description: 'nearest note, A4 = 440 Hz' }),
        centsOff: Type.Number({ description: 'distance from it [cent]' }),
      },
      closed,
    ),
    low: Type.Optional(
      Type.Number({ description: 'where the ends see air: lower end of the interval [Hz]' }),
    ),
    high: Type.Optional(
      Type.Number({ description: 'where the ends see air: upper end of the interval [Hz]' }),
    ),
    speaks: Type.Enum(['speaks', 'mayNotSpeak', 'mayOverblow', 'overblows', 'notJetDriven'], {
      description: 'how a jet-driven pipe takes to its jet',
    }),
  },
  closed,
);

const voiceOutput = Type.Object(
  {
    fundamentalRatio: Type.Literal(1, { description: 'the pitch stays about the same' }),
    formantFactor: Type.Number({ description: 'sound speed over that of air, in the tract [1]' }),
    formantsHz: Type.Array(Type.Number(), { description: 'formants in a tract full of gas [Hz]' }),
    formantRatios: Type.Array(Type.Number(), { description: 'each over the formant in air [1]' }),
  },
  closed,
);

const output = Type.Union([pipeOutput, voiceOutput], { title: 'sound: output' });

type SoundInput = Static<typeof input>;
type PipeSound = Static<typeof pipeOutput>;
type VoiceSound = Static<typeof voiceOutput>;

function required(given: SoundInput, keys: readonly (keyof SoundInput)[]): never {
  const absent = keys.filter((key) => given[key] === undefined);
  throw new InvalidInput(
    `The ${given.instrument} is not described: ${absent.join(', ')} missing.`,
    'Give its sizes, or frequencyInAirHz for a pipe or bottle inside its gas.',
    absent.map((key) => ({ path: `/${key}`, problem: 'is missing' })),
  );
}

/** The resonator as described, or null where only its note in air is known. */
function resonatorOf(given: SoundInput, kind: PipeKind | 'helmholtz'): Resonator | null {
  if (kind === 'helmholtz') {
    const { volumeM3, neckLengthM, neckRadiusM } = given;
    if (volumeM3 !== undefined && neckLengthM !== undefined && neckRadiusM !== undefined) {
      return { shape: 'bottle', bottle: bottleOf({ volumeM3, neckLengthM, neckRadiusM }) };
    }
    if (given.frequencyInAirHz !== undefined) return null;
    return required(given, ['volumeM3', 'neckLengthM', 'neckRadiusM']);
  }
  const { lengthM, radiusM, mouthWidthM, cutUpM, isClosedAtOneEnd } = given;
  if (lengthM === undefined && given.frequencyInAirHz !== undefined) return null;
  if (lengthM === undefined || radiusM === undefined)
    return required(given, ['lengthM', 'radiusM']);
  if (kind === 'fluePipe' && (mouthWidthM === undefined || cutUpM === undefined)) {
    return required(given, ['mouthWidthM', 'cutUpM']);
  }
  const sizes = {
    lengthM,
    radiusM,
    ...(mouthWidthM === undefined ? {} : { mouthWidthM }),
    ...(cutUpM === undefined ? {} : { cutUpM }),
    ...(isClosedAtOneEnd === undefined ? {} : { isClosedAtOneEnd }),
  };
  return { shape: 'column', column: pipeColumn(kind, sizes) };
}

/** The resonator whose ends see air, where only the note in air is known. */
function resonatorFromNote(
  given: SoundInput,
  kind: PipeKind | 'helmholtz',
  f: number,
  c: number,
): Resonator {
  if (kind === 'helmholtz') return required(given, ['volumeM3', 'neckLengthM', 'neckRadiusM']);
  const closedTube = kind === 'tube' && given.isClosedAtOneEnd === true;
  return {
    shape: 'column',
    column: pipeColumnFromNote(closedTube ? 'stoppedPipe' : kind, f, c, given.radiusM),
  };
}

function optionalInRange(value: number | undefined, range: Range, path: string) {
  return value === undefined ? undefined : inRange(value, range, path);
}

function regimeOf(
  given: SoundInput,
  kind: PipeKind | 'helmholtz',
  air: MixtureState,
  gas: MixtureState,
  ratio: number,
  frequencyHz: number,
): PipeSound['speaks'] {
  if (kind === 'helmholtz' || kind === 'tube') return 'notJetDriven';
  const speedGain =
    given.blowing === 'flow' ? 1 : Math.sqrt(air.densityKgPerM3 / gas.densityKgPerM3);
  const P = optionalInRange(given.blowingPressurePa, blowingPressureRange, '/blowingPressurePa');
  const D = optionalInRange(given.flueThicknessM, flueThicknessRange, '/flueThicknessM');
  const H = given.cutUpM;
  if (P === undefined || D === undefined || H === undefined) {
    return jetRegime((bestIntonation * speedGain) / ratio);
  }
  const V = jetSpeed(P, air.densityKgPerM3) * speedGain;
  return jetRegime(intonationNumber(V, frequencyHz, D, H));
}

function pipeSound(given: SoundInput, kind: PipeKind | 'helmholtz', gases: GasLibrary): PipeSound {
  const { composition, temperatureK, pressurePa } = given;
  const conditions = { temperatureK, pressurePa, relativeHumidity: given.relativeHumidity ?? 0 };
  const roomAir = { composition: { air: 1 }, ...conditions };
  const gasInside = { composition, ...conditions };
  const air = mixtureState(gases, roomAir);
  const gas = mixtureState(gases, gasInside);
  const resonator = resonatorOf(given, kind);
  const freeInAir =
    given.frequencyInAirHz === undefined
      ? resonator && immersedNote(resonator, air.speedOfSoundMPerS)
      : inRange(given.frequencyInAirHz, frequencyRange, '/frequencyInAirHz');
  if (freeInAir === null) return required(given, ['lengthM', 'radiusM']);

  const a = given.wallFriction === true ? given.radiusM : undefined;
  // A note that was given was heard in the real pipe: friction is in it already.
  const heardInAir =
    a === undefined || given.frequencyInAirHz !== undefined
      ? freeInAir
      : freeInAir * wallFactorOfGas(gases, roomAir, a, freeInAir);
  const noteWith = (freeRatio: number): number => {
    if (a === undefined) return heardInAir * freeRatio;
    const friction =
      wallFactorOfGas(gases, gasInside, a, freeInAir * freeRatio) /
      wallFactorOfGas(gases, roomAir, a, freeInAir);
    return heardInAir * freeRatio * friction;
  };

  const immersedRatio = gas.speedOfSoundMPerS / air.speedOfSoundMPerS;
  const immersed = noteWith(immersedRatio);
  let frequencyHz = immersed;
  let interval: { low: number; high: number } | null = null;
  if (given.surroundings === 'air') {
    const standing = resonator ?? resonatorFromNote(given, kind, freeInAir, air.speedOfSoundMPerS);
    const factor = airAtEndsFactor(standing, air.densityKgPerM3 / gas.densityKgPerM3);
    frequencyHz = noteWith(immersedRatio * factor);
    interval = { low: Math.min(frequencyHz, immersed), high: Math.max(frequencyHz, immersed) };
  }
  const ratio = frequencyHz / heardInAir;
  return {
    frequencyHz,
    frequencyInAirHz: heardInAir,
    ratio,
    cents: centsBetween(heardInAir, frequencyHz),
    note: noteOf(frequencyHz),
    ...(interval ?? {}),
    speaks: regimeOf(given, kind, air, gas, ratio, frequencyHz),
  };
}

interface SpokenVowel {
  readonly formantsInAirHz: readonly number[];
  readonly wallHz: number;
}

function spokenVowel(given: SoundInput): SpokenVowel {
  const { speaker, vowel, formantsInAirHz } = given;
  const wallHz = wallResonanceHz[speaker ?? 'man'];
  if (formantsInAirHz !== undefined) {
    formantsInAirHz.forEach((formant, index) => {
      inRange(formant, frequencyRange, `/formantsInAirHz/${String(index)}`);
    });
    return { formantsInAirHz, wallHz };
  }
  if (speaker === undefined || vowel === undefined) return required(given, ['speaker', 'vowel']);
  return { formantsInAirHz: vowelFormants[vowel][speaker], wallHz };
}

function voiceSound(given: SoundInput, gases: GasLibrary): VoiceSound {
  // First of all: what may not be breathed is refused before anything is computed.
  refuseUnbreathable(gases, given.composition, given.speaker);
  const { formantsInAirHz, wallHz } = spokenVowel(given);
  const conditions = {
    composition: { air: 1 },
    temperatureK: given.temperatureK,
    pressurePa: given.pressurePa,
    relativeHumidity: given.relativeHumidity ?? 0,
  };
  // The room's own conditions are checked although the tract has its own.
  mixtureState(gases, conditions);
  const air = tractState(gases, { air: 1 }, given.pressurePa);
  const gas = tractState(gases, given.composition, given.pressurePa);
  const formantFactor = gas.speedOfSoundMPerS / air.speedOfSoundMPerS;
  const gammaRatio = gas.heatCapacityRatio / air.heatCapacityRatio;
  const formantsHz = formantsInAirHz.map((formant) =>
    formantInGas(formant, formantFactor, gammaRatio, wallHz),
  );
  return {
    fundamentalRatio: 1,
    formantFactor,
    formantsHz,
    formantRatios: formantsHz.map(
      (formant, index) => formant / (formantsInAirHz[index] ?? formant),
    ),
  };
}

/** Note of a pipe or bottle, or formants of a voice, in a gas. */
export const soundCalculator: Calculator<typeof input, typeof output> = {
  name: 'sound',
  input,
  output,
  run(given, { gases }) {
    return given.instrument === 'voice'
      ? voiceSound(given, gases)
      : pipeSound(given, given.instrument, gases);
  },
};

/**
 * The pair of previews that belongs to a sound input: before in air, after in the gas.
 *
 * @throws what the calculator itself throws: nothing refused is made audible
 */
export function soundPreview(given: SoundInput, { gases }: CalculatorData): PreviewPair {
  if (given.instrument !== 'voice') {
    const { frequencyInAirHz, frequencyHz } = pipeSound(given, given.instrument, gases);
    const isStopped =
      given.instrument === 'stoppedPipe' ||
      (given.instrument === 'tube' && given.isClosedAtOneEnd === true);
    return tonePreview(frequencyInAirHz, frequencyHz, isStopped);
  }
  const { formantsHz, formantFactor } = voiceSound(given, gases);
  return vowelPreview({
    vowel: given.vowel ?? 'a',
    fundamentalHz: speakingPitchHz[given.speaker ?? 'man'],
    formantsInAirHz: spokenVowel(given).formantsInAirHz,
    formantsInGasHz: formantsHz,
    formantFactor,
  });
}
