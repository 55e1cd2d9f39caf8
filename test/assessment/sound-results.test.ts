import type { TSchema } from 'typebox';
import { describe, expect, it } from 'vitest';
import type { Figure, SoundResult } from '../../src/assessment/assessment.js';
import { assessmentSchema } from '../../src/assessment/assessment-schema.js';
import type { PlanFile, PlanSound } from '../../src/assessment/plan-file.js';
import { planReader } from '../../src/assessment/plan-reader.js';
import { schemaProblems } from '../../src/assessment/schema-check.js';
import { soundResults } from '../../src/assessment/sound-results.js';
import { hasPreview, previewOf } from '../../src/assessment/sound-preview.js';
import { molarVolumeM3PerMol } from '../../src/science/gases/molar-volume.js';
import { sources } from '../../src/science/sources.js';
import { data, hall } from '../support/plans.js';

const site = {
  altitudeM: 0,
  pressurePa: 101_325,
  temperatureK: 293.15,
  relativeHumidity: 0.5,
  carbonDioxideFraction: 420e-6,
  molarVolumeM3PerMol: molarVolumeM3PerMol(293.15, 101_325),
};

type Act = PlanFile['acts'][number];

function heard(sound: PlanSound, more: Partial<Act> = {}): SoundResult {
  const act: Act = {
    id: 'pipe',
    title: 'Pipe',
    space: 'hall',
    releases: { planned: [], worstCredible: [] },
    sound: [sound],
    ...more,
  };
  const [result] = soundResults(hall({ acts: [act] }), {
    gases: data.gases,
    policy: data.catalogue.policy,
    site,
    reader: planReader(() => 'stated'),
  });
  if (result === undefined) throw new Error('no sound');
  return result;
}

const helium: PlanSound = { instrument: 'fluePipe', frequencyInAirHz: 315, gas: 'He' };
const heliox = { He: 0.79, O2: 0.21 };

/** Every figure anywhere in a result. */
function figuresOf(value: unknown): Figure[] {
  if (Array.isArray(value)) return value.flatMap(figuresOf);
  if (typeof value !== 'object' || value === null) return [];
  if ('formula' in value) return [value as Figure];
  return Object.values(value).flatMap(figuresOf);
}

const near = (value: number | undefined, expected: number, relative: number): void => {
  expect(Math.abs((value ?? NaN) / expected - 1)).toBeLessThan(relative);
};

const everySound: readonly PlanSound[] = [
  helium,
  { ...helium, surroundings: 'air', bagVolumeM3: 0.02 },
  { instrument: 'stoppedPipe', lengthM: 0.25, radiusM: 0.015, gas: 'CO2', bagVolumeM3: 0.02 },
  {
    instrument: 'fluePipe',
    lengthM: 0.4,
    radiusM: 0.015,
    mouthWidthM: 0.02,
    cutUpM: 0.006,
    gas: 'Ar',
  },
  { instrument: 'tube', lengthM: 1.2, radiusM: 0.04, gas: 'C3H8' },
  { instrument: 'helmholtz', volumeM3: 75e-5, neckLengthM: 0.07, neckRadiusM: 0.0095, gas: 'CO2' },
  { instrument: 'voice', speaker: 'man', vowel: 'a', composition: heliox },
  { instrument: 'voice', composition: { He: 1 } },
  { instrument: 'solidSource', gas: 'He' },
];

describe('every sound result', () => {
  it('fits the schema of an assessment', () => {
    // The schema is declared as that of the whole type, which hides its parts.
    const { sound } = (assessmentSchema as unknown as { properties: { sound: TSchema } })
      .properties;
    expect(
      schemaProblems(
        sound,
        everySound.map((sound) => heard(sound)),
      ),
    ).toEqual([]);
  });

  it('gives each figure a source of the bibliography, a formula and a range', () => {
    const figures = everySound.flatMap((sound) => figuresOf(heard(sound)));
    expect(figures.length).toBeGreaterThan(50);
    for (const figure of figures) {
      expect(Object.values(sources).map(({ title }) => title)).toContain(figure.source);
      expect(figure.formula).not.toBe('');
      expect(figure.range).not.toBe('');
      expect(Number.isFinite(figure.value)).toBe(true);
      expect(figure.low ?? figure.value).toBeLessThanOrEqual(figure.value);
      expect(figure.high ?? figure.value).toBeGreaterThanOrEqual(figure.value);
    }
  });
});

describe('pipes', () => {
  it('names the note in air and in helium: 315 Hz is D#4 +21 cents (sound dossier A6)', () => {
    const { noteInAir, note, frequency } = heard({ ...helium, gasFraction: 0.939 });
    expect(noteInAir?.name).toBe('D#4');
    expect(noteInAir?.centsOff).toBeCloseTo(21.4, 1);
    // A6: helium at 0.939 gives about 780 Hz, G5 -9 cents; share known to three digits, Sx 2.38.
    near(frequency?.value, 780, 2.5e-3);
    expect(note?.name).toBe('G5');
  });

  it('moves an immersed pipe by the ratios of the sound speed', () => {
    // Table of the sound dossier, section 0, 20 degC and 50 % humidity; last digit of the ratio.
    for (const [gas, ratio] of [
      ['He', 2.93],
      ['Ar', 0.927],
      // By the virial speeds of the same table, c_V/343.98.
      ['CO2', 266.6 / 343.98],
      ['SF6', 133.8 / 343.98],
    ] as const) {
      const { frequency, cents } = heard({ instrument: 'openPipe', frequencyInAirHz: 440, gas });
      near(frequency?.value, 440 * ratio, 2e-3);
      // The ratio has three digits, which is up to 1 cent, and 0.4 cents of real gas.
      expect(Math.abs((cents?.value ?? NaN) - 1200 * Math.log2(ratio))).toBeLessThan(1.5);
    }
  });

  it('lets a helium pipe with air at its ends fall short, as the dossier computes', () => {
    // A1: L 0.5 m, a 15 mm, helium filled: 2.42; immersed 2.93. Wall friction takes up to 1 %.
    const { frequency, frequencyInAir, words } = heard({
      instrument: 'openPipe',
      lengthM: 0.5,
      radiusM: 0.015,
      gas: 'He',
      surroundings: 'air',
      gasFraction: 1,
    });
    const inAir = frequencyInAir?.value ?? NaN;
    near((frequency?.value ?? NaN) / inAir, 2.42, 0.012);
    near((frequency?.high ?? NaN) / inAir, 2.93, 0.012);
    expect(words).toContain('between the two values');
  });

  it('lowers the helium ratio by wall friction where the radius is known', () => {
    // Kirchhoff's form by hand, data of snd-014, helium at 923 Hz: 0.981661/0.990885.
    const pure = { ...helium, gasFraction: 1 };
    const free = heard(pure).frequency?.value ?? NaN;
    const rubbed = heard({ ...pure, radiusM: 0.01 }).frequency?.value ?? NaN;
    expect(rubbed / free).toBeCloseTo(0.99069, 4);
  });

  it('widens the note of a flue pipe made from sizes by the doubt of its mouth', () => {
    const { frequencyInAir } = heard(everySound[3] ?? helium);
    expect(frequencyInAir?.low).toBeLessThan(frequencyInAir?.value ?? 0);
    expect(frequencyInAir?.high).toBeGreaterThan(frequencyInAir?.value ?? 0);
  });

  it('says that at equal flow helium may not speak and at equal pressure it speaks', () => {
    const { jet } = heard(helium);
    expect(jet.map(({ supply, speaks }) => [supply, speaks])).toEqual([
      ['pressure', 'speaks'],
      ['flow', 'mayNotSpeak'],
    ]);
    // A1: equal pressure scales the intonation number by sqrt(gamma_air/gamma_gas) = 0.916.
    near(jet[0]?.intonation.value, 2 * 0.916, 5e-3);
  });

  it('judges a described jet by its own numbers: sulfur hexafluoride at 500 Pa and at 800 Pa', () => {
    const blown = { cutUpM: 0.01, flueThicknessM: 0.0006, gas: 'SF6' };
    const at = (blowingPressurePa: number) =>
      heard({ ...helium, ...blown, blowingPressurePa }).jet[0];
    // Sound record snd-015: 2.246 in air and 2.54 in the gas.
    near(at(500)?.intonation.value, 2.54, 5e-3);
    expect(at(500)?.speaks).toBe('speaks');
    expect(at(800)?.speaks).toBe('overblows');
    expect(at(800)?.words).not.toContain('well voiced');
  });

  it('has no jet to speak of in tubes and bottles', () => {
    expect(heard(everySound[4] ?? helium).jet).toEqual([]);
    expect(heard(everySound[5] ?? helium).jet).toEqual([]);
  });

  it('takes neither a pitch nor a size from nowhere', () => {
    const { frequency, words } = heard({
      instrument: 'fluePipe',
      gas: 'He',
      frequencyInAirHz: { origin: 'unknown' },
    });
    expect(frequency).toBeNull();
    expect(words).toContain('neither');
  });
});

describe('amounts', () => {
  it('matches the smallest shares of the dossier for helium and carbon dioxide', () => {
    // A3: He 1.18, 11.3, 30.7 %; CO2 1.84, 19.2, 64 % (ideal gas; the virial equation differs by 1 %).
    const shares = (gas: string) =>
      heard({ ...helium, gas }).smallestAudible.map(({ gasFraction }) => gasFraction.value);
    [0.0118, 0.113, 0.307].forEach((share, index) => {
      near(shares('He')[index], share, 0.01);
    });
    [0.0184, 0.192, 0.64].forEach((share, index) => {
      near(shares('CO2')[index], share, 0.02);
    });
  });

  it('needs x V after squeezing and V ln(1/(1-x)) by flushing', () => {
    const { amount, amountByFlushing, smallestAudible } = heard({
      ...helium,
      bagVolumeM3: 0.1,
      gasFraction: 0.94,
    });
    expect(amount?.value).toBeCloseTo(0.094, 9);
    // A3: 2.8 volumes for 94 %.
    near(amountByFlushing?.value, 0.28, 0.01);
    const [least] = smallestAudible;
    near(least?.amount?.value, 0.1 * 0.0118, 0.01);
    expect(least?.amountByFlushing?.value).toBeGreaterThan(least?.amount?.value ?? 1);
  });

  it('offers no flushing for pure gas, and says why', () => {
    const { amountByFlushing, remarks } = heard({ ...helium, bagVolumeM3: 0.1, gasFraction: 1 });
    expect(amountByFlushing).toBeNull();
    expect(remarks.join(' ')).toContain('press it flat first');
  });
});

describe('remarks', () => {
  it('states relaxation for carbon dioxide and not for helium', () => {
    expect(heard({ ...helium, gas: 'CO2' }).remarks.join(' ')).toContain('5 kHz');
    expect(heard(helium).remarks.join(' ')).not.toContain('kHz');
  });

  it('warns of small speakers for low notes only, and never predicts a level', () => {
    expect(heard({ ...helium, gas: 'SF6' }).remarks.join(' ')).toContain('small speakers');
    expect(heard({ ...helium, frequencyInAirHz: 880 }).remarks.join(' ')).not.toContain(
      'small speakers',
    );
    expect(heard(helium).remarks.join(' ')).toContain('level may differ');
    expect(JSON.stringify(heard(helium))).not.toMatch(/\bdB\b/);
  });

  it.each([
    ['coupledReed', 'register'],
    ['freeReed', 'tongue'],
    ['solidSource', 'pitch stays'],
    ['lipWhistle', 'Do not promise'],
  ] as const)('says what a %s does, without a number', (instrument, words) => {
    const result = heard({ instrument, gas: 'He', frequencyInAirHz: 440 });
    expect(result.follows).toBe(false);
    expect(result.words).toContain(words);
    expect(figuresOf(result)).toEqual([]);
  });
});

describe('voices', () => {
  const voice: PlanSound = {
    instrument: 'voice',
    speaker: 'man',
    vowel: 'a',
    composition: heliox,
  };

  it('shifts the timbre and not the pitch in the breathable mixture', () => {
    const result = heard(voice);
    expect(result.frequency).toBeNull();
    expect(result.words).toContain('keeps about its pitch');
    // A2: k 1.743 in a full tract and 1245, 1882, 4245 Hz; ideal gas, so within 0.1 %.
    near(result.voice?.factor.value, 1.743, 1e-3);
    [1245, 1882, 4245].forEach((formant, index) => {
      near(result.voice?.formants[index]?.value, formant, 1.5e-3);
    });
    // A2: "1.1 to 1.3 in practice"; one breath of one litre makes 1.10 from a fifth of helium.
    expect(result.voice?.factor.low).toBeGreaterThan(1.05);
    expect(result.voice?.factor.low).toBeLessThan(1.15);
    expect(result.smallestAudible.map(({ formantChange }) => formantChange)).toEqual([0.05, 0.15]);
  });

  it.each([
    ['pure helium', { composition: { He: 1 } }],
    ['helium with too little oxygen', { composition: { He: 0.82, O2: 0.18 } }],
    ['much oxygen', { composition: { He: 0.7, O2: 0.3 } }],
    ['sulfur hexafluoride with full oxygen', { composition: { SF6: 0.79, O2: 0.21 } }],
    ['xenon with full oxygen', { composition: { Xe: 0.79, O2: 0.21 } }],
    ['helium by its id', { gas: 'He', composition: undefined }],
    ['a child', { speaker: 'child' }],
  ] as const)('refuses %s: a reason, an alternative, no number, no sound', (_name, change) => {
    const { composition, ...rest } = { ...voice, ...change };
    const result = heard({ ...rest, ...(composition && { composition }) });
    expect(result.refusal?.reason).not.toBe('');
    expect(result.refusal?.alternative).not.toBe('');
    expect(figuresOf(result)).toEqual([]);
    expect(hasPreview(result)).toBe(false);
    expect(previewOf(result)).toBeNull();
    expect(JSON.stringify(result)).not.toMatch(/minute|second|breaths/);
  });

  it('refuses the good mixture where the plan lets a volunteer breathe it', () => {
    const inhaled = [
      { by: 'volunteer', from: 'limpBag', composition: heliox, certified: true },
    ] as const;
    expect(heard(voice, { inhaled: [...inhaled] }).refusal).not.toBeNull();
  });
});

describe('previews', () => {
  it('are there for a note and a voice, of equal length, and loud within the safe level', () => {
    for (const sound of [helium, everySound[6] ?? helium]) {
      const pair = previewOf(heard(sound));
      expect(pair?.before.length).toBe(pair?.after.length);
      // -12 dB below full scale: 8231 of 32767 (A5).
      const peak = pair?.after.reduce((top, sample) => Math.max(top, Math.abs(sample)), 0) ?? 0;
      expect(peak).toBeGreaterThan(1000);
      expect(peak).toBeLessThanOrEqual(8231);
    }
  });

  it('are absent where there is nothing to hear', () => {
    expect(previewOf(heard({ instrument: 'freeReed', gas: 'He' }))).toBeNull();
    expect(previewOf(heard({ ...helium, frequencyInAirHz: 8000 }))).toBeNull();
  });
});
