import type { EChartsCoreOption } from 'echarts/core';
import type { FigureUnit, ZoneSeries } from '../../assessment/assessment.js';
import { quantityText } from '../format/figure-text.js';
import { accent, hairline, ink, softInk } from '../section/ink.js';
import { curveWords, type CurveWords } from './curve-words.js';
import { clockText, numberedCues, type ZoneCurve } from './zone-curve.js';

/** One option object for the browser's chart and for the drawing of a sheet. */

const fontFamily = 'Atkinson Hyperlegible, sans-serif';

/** Told apart by dash and thickness first, by colour last. */
const strokes: Record<ZoneSeries['answer'], { type: number[] | 'solid'; width: number }> = {
  mixed: { type: 'solid', width: 2.2 },
  bound: { type: [9, 4], width: 1.8 },
  layered: { type: [2, 3], width: 2 },
  layeredP50: { type: [9, 3, 2, 3], width: 1.8 },
  layeredP05: { type: 'solid', width: 0.6 },
  layeredP95: { type: 'solid', width: 0.6 },
};
const levelDash = { aim: [1, 4], limit: [5, 3], never: 'solid' } as const;

const steps = [60, 120, 300, 600, 900, 1800, 3600, 7200, 14_400, 21_600];

interface Shown {
  readonly factor: number;
  readonly name: string;
}

/** Percent for oxygen and for much gas, ppm for little. */
function shownUnit(unit: FigureUnit, greatest: number): Shown {
  if (unit === 'oxygenFraction') return { factor: 100, name: '%' };
  if (unit === 'gasFraction') {
    return greatest < 0.01 ? { factor: 1e6, name: 'ppm' } : { factor: 100, name: '%' };
  }
  return { factor: 1, name: '' };
}

/** Share of the height that the name of a level takes. */
const levelNameHeight = 0.09;

/** Levels with their names; names that would touch stand together at the first of them. */
function namedLevels(
  levels: ZoneCurve['levels'],
  height: number,
  words: CurveWords,
): (ZoneCurve['levels'][number] & { text: string })[] {
  const named = levels.map((level) => ({
    ...level,
    text: `${words.levels[level.name]} ${quantityText(level.figure.value, level.figure.unit, 'nearest')}`,
  }));
  named.forEach((level, index) => {
    const nearer = named
      .slice(0, index)
      .find(
        (other) =>
          other.text !== '' &&
          Math.abs(other.figure.value - level.figure.value) < levelNameHeight * height,
      );
    if (nearer === undefined) return;
    nearer.text += `, ${level.text}`;
    level.text = '';
  });
  return named;
}

/** Share of the width that the name of a level takes. */
const levelNameShare = 0.17;
/** Share of the width that a letter of a cue's number takes. */
const cueLetterShare = 0.015;

interface CueMark {
  readonly atS: number;
  text: string;
}

/** Cues with their numbers; numbers that would touch stand together at the first of them. */
function cueMarks(curve: ZoneCurve, from: number, to: number): CueMark[] {
  const marks = numberedCues(curve.events)
    .flatMap((cue) =>
      cue.events.map((event): CueMark => ({
        atS: Math.max(from, event.atS),
        text: String(cue.number),
      })),
    )
    .toSorted((one, other) => one.atS - other.atS);
  let open: CueMark | undefined;
  for (const mark of marks) {
    const width = ((open?.text.length ?? 0) + 1) * cueLetterShare;
    if (open !== undefined && (mark.atS - open.atS) / (to - from) < width) {
      if (!open.text.split('\u00a0').includes(mark.text)) open.text += `\u00a0${mark.text}`;
      mark.text = '';
    } else {
      open = mark;
    }
  }
  return marks;
}

/** The chart of a curve: lines by answer, levels with their names, cues with their numbers. */
export function curveOption(curve: ZoneCurve, words: CurveWords = curveWords): EChartsCoreOption {
  const values = curve.series.flatMap((series) => series.values);
  const shown = shownUnit(curve.unit, Math.max(...values));
  const from = Math.min(...curve.series.map((series) => series.timesS[0] ?? 0));
  const to = Math.max(...curve.series.map((series) => series.timesS.at(-1) ?? 0));
  const step = steps.find((seconds) => (to - from) / seconds <= 9) ?? 43_200;
  const oxygen = curve.unit === 'oxygenFraction';
  const greatest = Math.max(...values) * shown.factor;
  // A level far above the curve would flatten it: it is named in the text instead.
  const levels = curve.levels.filter(
    (level) => oxygen || level.figure.value * shown.factor <= greatest * 2.5,
  );
  const levelValues = levels.map((level) => level.figure.value * shown.factor);
  const least = Math.min(...values.map((value) => value * shown.factor), ...levelValues);
  const most = Math.max(greatest, ...levelValues);
  const pad = (most - least) * 0.12 || 0.1;
  const nice = (value: number, way: 'down' | 'up'): number => {
    const unit = 10 ** Math.floor(Math.log10(Math.max(most - least, 1e-9)));
    return (way === 'down' ? Math.floor(value / unit) : Math.ceil(value / unit)) * unit;
  };
  const cues = cueMarks(curve, from, to);
  // The names of the levels stand at the left, before the first cue.
  const firstCue = cues[0]?.atS ?? to;
  let start = Math.floor(from / step) * step;
  while ((firstCue - start) / (to - start) < levelNameShare && from - start < 3 * step) {
    start -= step;
  }
  const named = namedLevels(levels, (most - (oxygen ? least : 0)) / shown.factor, words);
  const label = { fontFamily, fontSize: 11, color: ink };
  const first = curve.series.find((series) => series.answer === 'mixed') ?? curve.series[0];
  return {
    animation: false,
    backgroundColor: 'transparent',
    textStyle: { fontFamily, fontSize: 11 },
    grid: { left: 52, right: 108, top: 34, bottom: 34 },
    xAxis: {
      type: 'value',
      min: start,
      // The lines end with the plot, so that their names stand clear of it.
      max: to,
      interval: step,
      axisLine: { lineStyle: { color: ink, width: 1 } },
      axisTick: { show: true, lineStyle: { color: ink } },
      splitLine: { show: false },
      axisLabel: { ...label, formatter: (value: number) => clockText(value), showMaxLabel: false },
    },
    yAxis: {
      type: 'value',
      name: `${curve.quantityTitle} [${shown.name}]`,
      nameTextStyle: { ...label, align: 'left', padding: [0, 0, 4, -44] },
      min: oxygen ? Number(nice(least - pad, 'down').toFixed(6)) : 0,
      max: oxygen ? 21 : Number(nice(most + pad, 'up').toFixed(6)),
      axisLine: { show: true, lineStyle: { color: ink, width: 1 } },
      splitLine: { show: true, lineStyle: { color: hairline, width: 0.4 } },
      axisLabel: label,
    },
    series: [
      ...bandSeries(curve, shown.factor),
      ...curve.series.map((series) => ({
        type: 'line',
        name: words.answers[series.answer],
        data: series.timesS.map((time, index) => [
          time,
          (series.values[index] ?? 0) * shown.factor,
        ]),
        showSymbol: false,
        silent: true,
        itemStyle: { color: series.answer === 'bound' ? ink : accent },
        lineStyle: {
          ...strokes[series.answer],
          color: series.answer === 'bound' ? ink : accent,
        },
        endLabel: {
          show: !/P05|P95/.test(series.answer),
          ...label,
          formatter: words.answers[series.answer],
          distance: 6,
          lineHeight: 14,
        },
        labelLayout: { moveOverlap: 'shiftY' },
        ...(series === first
          ? {
              markLine: {
                silent: true,
                symbol: 'none',
                animation: false,
                data: [
                  ...named.map((level) => ({
                    yAxis: level.figure.value * shown.factor,
                    lineStyle: {
                      color: ink,
                      width: level.name === 'never' ? 1.4 : 1,
                      type: levelDash[level.name],
                    },
                    label: {
                      ...label,
                      position: 'insideStartTop',
                      show: level.text !== '',
                      formatter: level.text,
                    },
                  })),
                  ...cues.map((cue) => ({
                    xAxis: cue.atS,
                    lineStyle: { color: softInk, width: 0.6, type: 'solid' },
                    label: {
                      ...label,
                      show: cue.text !== '',
                      position: 'end',
                      distance: 2,
                      formatter: cue.text,
                    },
                  })),
                ],
              },
            }
          : {}),
      })),
    ],
  };
}

/** The band between the two ends of the layered answer, as a pale area under the lines. */
function bandSeries(curve: ZoneCurve, factor: number): object[] {
  const low = curve.series.find((series) => series.answer === 'layeredP05');
  const high = curve.series.find((series) => series.answer === 'layeredP95');
  if (low === undefined || high === undefined) return [];
  const points = (values: readonly number[]): number[][] =>
    low.timesS.map((time, index) => [time, (values[index] ?? 0) * factor]);
  const least = low.values.map((value, index) => Math.min(value, high.values[index] ?? value));
  const width = low.values.map((value, index) => Math.abs((high.values[index] ?? value) - value));
  const hidden = { opacity: 0 };
  const shared = {
    type: 'line',
    stack: 'band',
    showSymbol: false,
    silent: true,
    lineStyle: hidden,
  };
  return [
    { ...shared, data: points(least), stackStrategy: 'all' },
    {
      ...shared,
      data: points(width),
      stackStrategy: 'all',
      areaStyle: { color: hairline, opacity: 0.45 },
    },
  ];
}
