import { clockText } from '../../assessment/clock-text.js';
import type {
  CaseName,
  DayEvent,
  Figure,
  FigureUnit,
  ZoneResult,
  ZoneSeries,
} from '../../assessment/assessment.js';
import { quantityText } from '../../assessment/figure-text.js';
import { curveWords, type CurveWords } from './curve-words.js';

/** What one curve shows: a quantity of a zone over the day, its levels and the cues. */
export interface ZoneCurve {
  readonly title: string;
  readonly quantityTitle: string;
  readonly unit: FigureUnit;
  readonly series: readonly ZoneSeries[];
  readonly levels: readonly { readonly name: 'aim' | 'limit' | 'never'; readonly figure: Figure }[];
  readonly events: readonly DayEvent[];
  /** Acts with the number that marks them on every curve of the day. */
  readonly cues: readonly NumberedCue[];
  readonly shows: readonly DayEvent[];
}

/** An act with all its times of the day. */
export interface NumberedCue {
  readonly number: number;
  readonly title: string;
  readonly events: readonly DayEvent[];
}

/** The curve of one quantity and case of a zone, or null when no series was computed. */
export function zoneCurve(
  zone: ZoneResult,
  quantity: string,
  caseName: CaseName,
  events: readonly DayEvent[],
): ZoneCurve | null {
  const series = zone.series.filter(
    (entry) =>
      entry.quantity === quantity && entry.caseName === caseName && entry.timesS.length > 1,
  );
  const judged = zone.quantities.find(
    (entry) => entry.quantity === quantity && entry.caseName === caseName,
  );
  const answer = judged === undefined ? undefined : Object.values(judged.answers)[0];
  if (series.length === 0 || judged === undefined || answer === undefined) return null;
  const from = Math.min(...series.map((entry) => entry.timesS[0] ?? 0));
  const to = Math.max(...series.map((entry) => entry.timesS.at(-1) ?? 0));
  const isShown = (event: DayEvent): boolean => event.untilS >= from && event.atS <= to;
  return {
    title: zone.title,
    quantityTitle: judged.quantityTitle,
    unit: answer.unit,
    series: withoutRepeats(series),
    levels: (['aim', 'limit', 'never'] as const).flatMap((name) => {
      const figure = judged.levels[name];
      return figure === null ? [] : [{ name, figure }];
    }),
    events: events.filter(isShown),
    cues: numberedCues(events)
      .map((cue) => ({ ...cue, events: cue.events.filter(isShown) }))
      .filter((cue) => cue.events.length > 0),
    shows: events.filter((event) => event.act === null && isShown(event)),
  };
}

/** Where the band is drawn its bad end, or the mixed line, already is the layered answer that judges. */
function withoutRepeats(series: readonly ZoneSeries[]): readonly ZoneSeries[] {
  const hasBand = series.some((entry) => entry.answer === 'layeredP05');
  return hasBand ? series.filter((entry) => entry.answer !== 'layered') : series;
}

/** The acts of a day by title, numbered in the order of their first time. */
export function numberedCues(events: readonly DayEvent[]): readonly NumberedCue[] {
  const cues = new Map<string, DayEvent[]>();
  for (const event of events.toSorted((one, other) => one.atS - other.atS)) {
    if (event.act === null) continue;
    cues.set(event.title, [...(cues.get(event.title) ?? []), event]);
  }
  return [...cues].map(([title, of], index) => ({ number: index + 1, title, events: of }));
}

/** What the curve shows, in sentences: the worst of each answer and when, against each level. */
export function zoneCurveText(curve: ZoneCurve, words: CurveWords = curveWords): string {
  const worstIsLow = curve.unit === 'oxygenFraction';
  const answers = curve.series.map((series) => {
    let worst = 0;
    series.values.forEach((value, index) => {
      const known = series.values[worst] ?? value;
      if (worstIsLow ? value < known : value > known) worst = index;
    });
    const value = quantityText(series.values[worst] ?? 0, curve.unit);
    const at = clockText(series.timesS[worst] ?? 0);
    return `${words.answers[series.answer]} ${worstIsLow ? 'lowest' : 'highest'} ${value} at ${at}`;
  });
  const levels = curve.levels.map(
    (level) =>
      `${words.levels[level.name]} ${quantityText(level.figure.value, level.figure.unit, 'nearest')}`,
  );
  const events = curve.events.map((event) => `${event.title} from ${clockText(event.atS)}`);
  const parts = [
    `${curve.quantityTitle}, ${curve.title}: ${answers.join('; ')}`,
    ...(levels.length === 0 ? [] : [`Lines at ${levels.join(', ')}`]),
    ...(events.length === 0 ? [] : [`Marked: ${events.join('; ')}`]),
  ];
  return `${parts.join('. ')}.`;
}
