import type { Composition, GasLibrary } from '../science/gases/gas-library.js';
import type { Range } from '../science/range.js';
import type { SoundResult } from './assessment.js';
import type { Policy } from './catalogue-types.js';
import type { PhysicalFigure, PlanAct, PlanSound } from './plan-file.js';
import type { PlanReader } from './plan-reader.js';
import type { ResolvedSite } from './resolved-plan.js';

/** What a sound is worked out from, besides the plan's own words about it. */
export interface SoundContext {
  readonly gases: GasLibrary;
  readonly policy: Policy;
  readonly site: ResolvedSite;
  readonly reader: PlanReader;
}

/** One sound of one act. */
export interface SoundCase extends SoundContext {
  readonly act: PlanAct;
  readonly sound: PlanSound;
  /** JSON Pointer of the sound in the plan. */
  readonly path: string;
}

export interface Span {
  readonly value: number;
  readonly low: number;
  readonly high: number;
}

type SoundFigure = {
  [K in keyof PlanSound]-?: PhysicalFigure extends Exclude<PlanSound[K], undefined> ? K : never;
}[keyof PlanSound];

const isUnknown = (raw: PhysicalFigure): boolean =>
  typeof raw !== 'number' && raw.value === undefined;

/** A figure of the sound with its range, or null where the plan is silent or does not know it. */
export function soundFigure(one: SoundCase, key: SoundFigure, range: Range): Span | null {
  const raw = one.sound[key];
  if (raw === undefined || isUnknown(raw)) return null;
  const path = `${one.path}/${key}`;
  const value = one.reader.number(raw, path, { range, worse: 'low' });
  const open = one.reader.open.get(path);
  return { value, low: open?.low ?? value, high: open?.high ?? value };
}

/** What is let into the instrument, air left out; null where that is nothing. */
export function letIn(sound: PlanSound): Composition | null {
  const stated = sound.composition ?? (sound.gas === undefined ? {} : { [sound.gas]: 1 });
  const gases = Object.entries(stated).filter(([id, share]) => id !== 'air' && share > 0);
  const sum = gases.reduce((total, [, share]) => total + share, 0);
  return sum === 0 ? null : Object.fromEntries(gases.map(([id, share]) => [id, share / sum]));
}

/** The gas in words: `helium`, or `helium and oxygen`. */
export function gasWords(gases: GasLibrary, mixture: Composition): string {
  return Object.keys(mixture)
    .map((id) => gases.species[id]?.name.toLowerCase() ?? id)
    .join(' and ');
}

/** A result without any number: the ground on which every other one is built. */
export function silentResult(one: SoundCase, words: string, saferWay: string): SoundResult {
  const { act, sound, gases } = one;
  const mixture = letIn(sound);
  return {
    act: act.id,
    title: mixture === null ? act.title : `${act.title}: ${gasWords(gases, mixture)}`,
    instrument: sound.instrument,
    follows: false,
    words,
    frequencyInAir: null,
    frequency: null,
    cents: null,
    note: null,
    noteInAir: null,
    isStopped: false,
    jet: [],
    voice: null,
    amount: null,
    amountByFlushing: null,
    smallestAudible: [],
    remarks: [],
    refusal: null,
    saferWay,
  };
}
