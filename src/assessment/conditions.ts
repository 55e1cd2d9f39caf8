import type { Condition, Figure } from './assessment.js';
import type { Hit, HitReason } from './decision-table.js';
import { levelFigure } from './figures.js';
import { answerWords, shortText, stopText } from './quantity-words.js';
import type { StopReading } from './stop-reading.js';

interface Wording {
  readonly text: (where: string, quantity: string, stop: string, mouth: string) => string;
  readonly line: (where: string, quantity: string, stop: string, mouth: string) => string;
  readonly blocksStart: boolean;
}

const reading: Wording = {
  text: (where, quantity, stop, mouth) =>
    `${where}: read ${quantity} ${mouth} at the end of each gas cue; stop at ${stop}.`,
  line: (where, quantity, stop, mouth) => `${where}, ${mouth}: ${quantity} read, not past ${stop}`,
  blocksStart: false,
};

/** What each kind of hit asks for; refusals and No-go rows ask for a change, not for a condition. */
const wordings: Partial<Record<HitReason, Wording>> = {
  layeredPastAim: {
    text: (where, quantity, stop, mouth) =>
      `${where}: a ${quantity} meter of the right cell ${mouth}, watched during every gas cue; stop at ${stop}.`,
    line: (where, quantity, stop, mouth) =>
      `${where}: ${quantity} meter hung ${mouth}, alarm heard, stop number ${stop}`,
    blocksStart: true,
  },
  boundPastLimit: reading,
  boundPastNever: {
    text: (where, quantity, stop, mouth) =>
      `${where}: clear this zone before the cue, or cap the amount; read ${quantity} ${mouth} at the cue end; stop at ${stop}.`,
    line: (where, quantity, stop, mouth) =>
      `${where}: zone clear of people or amount capped; ${quantity} read ${mouth}, not past ${stop}`,
    blocksStart: true,
  },
  floorPastNever: {
    text: (where) =>
      `${where}: keep the run-out on the floor clear; a spotter watches it; nobody sits or lies there.`,
    line: (where) => `${where}: floor kept clear, spotter in place`,
    blocksStart: true,
  },
  worstNeverInTime: {
    text: (where, quantity, stop, mouth) =>
      `${where}: cap the inventory; alarm for ${quantity} ${mouth} at ${stop}; the house leaves at the alarm, as practised.`,
    line: (where, quantity, stop, mouth) =>
      `${where}: inventory capped; ${quantity} alarm ${mouth} set to ${stop}; exit practised`,
    blocksStart: true,
  },
  worstPastLimit: {
    text: (where, quantity, stop, mouth) =>
      `${where}: container restrained or with a shut-off in reach; the house leaves when ${quantity} ${mouth} passes ${stop}.`,
    line: (where, quantity, stop) =>
      `${where}: container restrained, shut-off tried, leave at ${quantity} ${stop}`,
    blocksStart: true,
  },
  fansOffPastLimit: {
    text: (where) => `${where}: fresh air proven on the day; the act does not run with fans off.`,
    line: (where) => `${where}: air system seen running in the agreed mode`,
    blocksStart: true,
  },
  onlyAssumed: {
    text: () => 'Every figure of the room is assumed: take one reading before doors.',
    line: () => 'One reading of oxygen and carbon dioxide at the lowest seats before doors',
    blocksStart: true,
  },
};

/** The stop number as the meter shows it, error and delay of the meter taken off. */
function stopWords(hit: Hit, reading: StopReading | null): string {
  if (!hit.outcome || !reading) return '';
  const { level } = hit.outcome;
  const figure = levelFigure(level, 'limit');
  if (reading.value === null) {
    return level.failsWhen === 'below'
      ? 'any fall from clean air, as no meter answers in time'
      : 'any rise from clean air, as no meter answers in time';
  }
  const stop = stopText({ ...figure, value: reading.value });
  if (level.quantity !== 'oxygenFraction') return stop;
  return `${stop} (clean air here reads ${shortText({ ...figure, value: reading.cleanAir })})`;
}

const mouthWords = (heightM: number, floorCheck: boolean): string =>
  floorCheck ? '0.2 m above the floor' : `at ${heightM.toFixed(2)} m`;

/** The numbered conditions of a plan, one for each zone, act and kind of hit. */
export function conditionsOf(
  hits: readonly Hit[],
  names: {
    readonly quantity: (hit: Hit) => string;
    readonly space: (id: string) => string;
    /** The reading at which to act on a hit, with the error of the meter taken off. */
    readonly stop: (hit: Hit) => StopReading | null;
  },
): readonly Condition[] {
  const seen = new Set<string>();
  const conditions: Condition[] = [];
  for (const hit of hits) {
    const wording = wordings[hit.reason];
    if (!wording || hit.word !== 'goWithConditions') continue;
    const { outcome } = hit;
    const where = outcome
      ? hit.reason === 'floorPastNever'
        ? names.space(outcome.group.space)
        : outcome.group.title
      : 'Everywhere';
    const stop = stopWords(hit, names.stop(hit));
    const mouth = outcome ? mouthWords(outcome.heightM, outcome.floorCheck) : '';
    const quantity = names.quantity(hit);
    const text = wording.text(where, quantity, stop, mouth);
    const act = hit.acts.length === 1 ? (hit.acts[0] ?? null) : null;
    const key = hit.reason === 'floorPastNever' ? text : `${text} ${act ?? ''}`;
    if (seen.has(key)) continue;
    seen.add(key);
    conditions.push({
      number: conditions.length + 1,
      row: hit.row,
      act,
      zone: outcome?.zone ?? null,
      text,
      checklistLine: wording.line(where, quantity, stop, mouth),
      blocksStart: wording.blocksStart,
    });
  }
  return conditions;
}

const reasonText: Record<HitReason, string> = {
  refused: 'refused',
  placeFails: 'a leak in a store, lift or vehicle passes the limit',
  mixedPastAim: 'the planned release fails the aim even with the air stirred through the room',
  layeredPastLimit: 'the planned release fails the limit in a layer',
  layeredPastNever: 'the planned release passes never for a short time in a layer',
  medianPastAim: 'the planned release fails the aim in the middle of the layered band',
  layeredPastAim: 'the planned release fails the aim at the upper end of the layered band',
  noMeter: 'the planned release fails the aim in a layer and no fitting meter hangs there',
  boundPastLimit: 'the bound passes the limit',
  boundPastNever: 'the bound passes never',
  floorPastNever: 'the floor passes never for someone who has fallen or bends down',
  worstMixedPastLimit: 'the worst credible release fails the limit in an occupied space',
  worstNeverTooSoon: 'the worst credible release passes never before the house can leave',
  worstNeverInTime: 'the worst credible release passes never after the house has left',
  worstPastLimit: 'the worst credible release passes a level in a layer or by the bound',
  fansOffPastNever: 'with fans off the planned release passes never',
  fansOffPastLimit: 'with fans off the planned release passes the limit',
  onlyAssumed: 'only assumed figures stand behind the result',
};

/** One line that says why a row fired. */
export function hitReason(hit: Hit, value: Figure | null, limit: Figure | null): string {
  if (hit.detail !== '') return hit.detail;
  const numbers =
    value && limit
      ? ` (${shortText(value)} ${answerWords[hit.answer]} against ${shortText(limit)})`
      : '';
  return `${reasonText[hit.reason]}${numbers}`;
}
