import type { EChartsCoreOption } from 'echarts/core';
import { accent, hairline, ink, softInk } from '../web/section/ink.js';
import { airLogTexts as words } from '../web/texts/en-air-log.js';
import type { AirLogResult } from './air-log.js';

const fontFamily = 'Atkinson Hyperlegible, sans-serif';
/** More dots than this run together. */
const mostDots = 300;
const linePoints = 120;

/** Readings as dots, the fitted fall as a line, the background as a dashed line. */
export function decayCurve({ timesS, readingsPpm, fit }: AirLogResult): EChartsCoreOption {
  const every = Math.ceil(timesS.length / mostDots);
  const endS = timesS.at(-1) ?? 0;
  const dots = timesS.flatMap((t, i) => (i % every === 0 ? [[t / 60, readingsPpm[i] ?? 0]] : []));
  const line = Array.from({ length: linePoints + 1 }, (_, i) => {
    const t = (endS * i) / linePoints;
    const excess = fit.firstExcessPpm * Math.exp((-fit.airChangesPerHour * t) / 3600);
    return [t / 60, fit.backgroundPpm + excess];
  });
  const label = { fontFamily, fontSize: 12, color: ink };
  return {
    animation: false,
    backgroundColor: 'transparent',
    textStyle: { fontFamily, fontSize: 12 },
    grid: { left: 52, right: 24, top: 28, bottom: 40 },
    xAxis: {
      type: 'value',
      max: endS / 60,
      name: words.curveTime,
      nameLocation: 'middle',
      nameGap: 24,
      nameTextStyle: label,
      axisLine: { lineStyle: { color: ink, width: 1 } },
      axisTick: { show: true, lineStyle: { color: ink } },
      splitLine: { show: false },
      axisLabel: { ...label, showMaxLabel: false },
    },
    yAxis: {
      type: 'value',
      min: 0,
      name: 'CO2 [ppm]',
      nameTextStyle: { ...label, align: 'left', padding: [0, 0, 2, -44] },
      axisLine: { show: true, lineStyle: { color: ink, width: 1 } },
      splitLine: { show: true, lineStyle: { color: hairline, width: 0.4 } },
      axisLabel: label,
    },
    series: [
      {
        type: 'line',
        data: line,
        showSymbol: false,
        silent: true,
        lineStyle: { color: accent, width: 2, type: 'solid' },
        markLine: {
          silent: true,
          symbol: 'none',
          animation: false,
          data: [
            {
              yAxis: fit.backgroundPpm,
              lineStyle: { color: softInk, width: 1, type: [5, 3] },
              label: {
                ...label,
                position: 'insideStartTop',
                formatter: `${words.backgroundUsed} ${fit.backgroundPpm.toFixed(0)} ppm`,
              },
            },
          ],
        },
      },
      {
        type: 'line',
        data: dots,
        silent: true,
        showSymbol: true,
        symbol: 'circle',
        symbolSize: 5,
        itemStyle: { color: ink },
        lineStyle: { opacity: 0 },
      },
    ],
  };
}
