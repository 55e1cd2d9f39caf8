import type { EChartsCoreOption } from 'echarts/core';
import type { ZoneSeries } from '../../assessment/assessment.js';
import { quantityText } from '../../assessment/figure-text.js';
import { accent, hairline, ink, softInk } from '../section/ink.js';
import {
  levelsDrawn,
  timeAxis,
  valueAxis,
  type CurveSize,
  type TimeAxis,
  type ValueAxis,
} from './curve-scale.js';
import { curveWords, type CurveWords } from './curve-words.js';
import { clockText } from '../../assessment/clock-text.js';
import type { ZoneCurve } from './zone-curve.js';

/** One option object for the page's picture and for the drawing of a sheet. */

const fontFamily = 'Atkinson Hyperlegible, sans-serif';

/** Told apart by dash and thickness first, by colour last. */
const strokes: Record<ZoneSeries['answer'], { type: number[] | 'solid'; width: number }> = {
  mixed: { type: 'solid', width: 2.2 },
  bound: { type: [9, 4], width: 1.8 },
  layered: { type: [2, 3], width: 2 },
  layeredP50: { type: [9, 3, 2, 3], width: 1.8 },
  layeredP05: { type: 'solid', width: 0.7 },
  layeredP95: { type: 'solid', width: 0.7 },
};
const levelStrokes = {
  aim: { type: [1, 4], width: 1.1 },
  limit: { type: [5, 3], width: 1.1 },
  never: { type: 'solid', width: 1.5 },
} as const;

const label = { fontFamily, fontSize: 11, color: ink };

/** What every line of the chart shares; only names at the right end are moved apart. */
const quiet = { type: 'line', showSymbol: false, silent: true } as const;
const named = (text: string) => ({
  endLabel: { show: true, ...label, formatter: text, distance: 6, lineHeight: 13 },
  labelLayout: { moveOverlap: 'shiftY' },
});

const isBandEnd = (answer: ZoneSeries['answer']): boolean => /P05|P95/.test(answer);

/** The chart of a curve: lines by answer, levels by name, cues by number, shows as bars. */
export function curveOption(
  curve: ZoneCurve,
  size: CurveSize,
  words: CurveWords = curveWords,
): EChartsCoreOption {
  const time = timeAxis(curve, size);
  const value = valueAxis(curve);
  return {
    animation: false,
    backgroundColor: 'transparent',
    textStyle: { fontFamily, fontSize: 11 },
    grid: { left: size.left, right: size.right, top: size.top, bottom: size.bottom },
    xAxis: {
      type: 'value',
      min: time.from,
      // The lines end with the plot, so that their names stand clear of it.
      max: time.to,
      interval: time.step,
      axisLine: { onZero: false, lineStyle: { color: ink, width: 1 } },
      axisTick: { show: true, lineStyle: { color: ink } },
      splitLine: { show: false },
      axisLabel: {
        ...label,
        formatter: (at: number) => clockText(at),
        showMinLabel: time.from % time.step === 0,
        showMaxLabel: time.to % time.step === 0,
        // The names of the shows stand between the axis and its times.
        margin: curve.shows.length > 0 ? 20 : 8,
      },
    },
    yAxis: {
      type: 'value',
      name: `${curve.quantityTitle} [${value.unit}]`,
      nameTextStyle: { ...label, align: 'left', padding: [0, 0, 12, 8 - size.left] },
      min: value.from,
      max: value.to,
      interval: value.step,
      axisLine: { show: true, lineStyle: { color: ink, width: 1 } },
      splitLine: { show: true, lineStyle: { color: hairline, width: 0.4 } },
      axisLabel: label,
    },
    series: [
      ...bandSeries(curve, value.factor),
      ...levelSeries(curve, time, value, words),
      ...curve.series.map((series) => ({
        ...quiet,
        name: words.answers[series.answer],
        data: series.timesS.map((at, index) => [at, (series.values[index] ?? 0) * value.factor]),
        itemStyle: { color: series.answer === 'bound' ? ink : accent },
        lineStyle: {
          ...strokes[series.answer],
          color: series.answer === 'bound' ? ink : accent,
        },
        ...(isBandEnd(series.answer) ? {} : named(words.ends[series.answer])),
      })),
      markSeries(curve, time, value, size, words),
    ],
  };
}

function levelSeries(
  curve: ZoneCurve,
  time: TimeAxis,
  { factor }: ValueAxis,
  words: CurveWords,
): object[] {
  return levelsDrawn(curve).map(({ name, figure }) => {
    const at = figure.value * factor;
    const text = `${words.levels[name]} ${quantityText(figure.value, figure.unit, 'nearest')}`;
    return {
      ...quiet,
      name: text,
      data: [
        [time.from, at],
        [time.to, at],
      ],
      itemStyle: { color: softInk },
      lineStyle: { ...levelStrokes[name], color: softInk },
      ...named(text),
      endLabel: { ...named(text).endLabel, color: softInk },
    };
  });
}

/** Share of the plot that a letter of a cue's number takes. */
const letterWidth = 7;

interface CueMark {
  readonly atS: number;
  readonly untilS: number;
  text: string;
}

/** Cues with their numbers; numbers that would touch stand together at the first of them. */
function cueMarks(curve: ZoneCurve, { from, to }: TimeAxis, plotWidth: number): CueMark[] {
  const marks = curve.cues
    .flatMap(({ number, events }) =>
      events.map((event): CueMark => ({
        atS: Math.max(from, event.atS),
        untilS: Math.min(to, event.untilS),
        text: String(number),
      })),
    )
    .toSorted((one, other) => one.atS - other.atS);
  let open: CueMark | undefined;
  for (const mark of marks) {
    const width = ((open?.text.length ?? 0) + 1) * letterWidth;
    if (open !== undefined && ((mark.atS - open.atS) / (to - from)) * plotWidth < width) {
      if (!open.text.split('\u00a0').includes(mark.text)) open.text += `\u00a0${mark.text}`;
      mark.text = '';
    } else {
      open = mark;
    }
  }
  return marks;
}

/** Acts along the upper edge, shows along the lower one. */
function markSeries(
  curve: ZoneCurve,
  time: TimeAxis,
  value: ValueAxis,
  size: CurveSize,
  words: CurveWords,
): object {
  const plotWidth = size.width - size.left - size.right;
  const hidden = { opacity: 0 };
  const bar = (atS: number, untilS: number, y: number, width: number, text: object) => [
    {
      coord: [Math.max(time.from, atS), y],
      lineStyle: { color: ink, width, type: 'solid' },
      ...text,
    },
    { coord: [Math.min(time.to, untilS), y] },
  ];
  const noText = { label: { show: false } };
  const wideEnough = (atS: number, untilS: number, text: string): boolean =>
    ((untilS - atS) / (time.to - time.from)) * plotWidth > text.length * 6;
  return {
    ...quiet,
    data: [[time.from, value.from]],
    lineStyle: hidden,
    markLine: {
      silent: true,
      symbol: 'none',
      animation: false,
      data: [
        ...cueMarks(curve, time, plotWidth).flatMap((cue) => [
          {
            xAxis: cue.atS,
            lineStyle: { color: hairline, width: 0.6, type: 'solid' },
            label: {
              ...label,
              show: cue.text !== '',
              position: 'end',
              distance: 4,
              align: 'left',
              padding: [0, 0, 0, -3],
              formatter: cue.text,
            },
          },
          bar(cue.atS, cue.untilS, value.to, 3, noText),
        ]),
        ...curve.shows.map(({ atS, untilS }, index) => {
          const text = `${words.show} ${String(index + 1)}`;
          const short = wideEnough(atS, untilS, text) ? text : String(index + 1);
          return bar(atS, untilS, value.from, 4, {
            label: { ...label, position: 'insideMiddleBottom', distance: 4, formatter: short },
          });
        }),
      ],
    },
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
  const shared = { ...quiet, stack: 'band', stackStrategy: 'all', lineStyle: { opacity: 0 } };
  return [
    { ...shared, data: points(least) },
    { ...shared, data: points(width), areaStyle: { color: hairline, opacity: 0.45 } },
  ];
}
