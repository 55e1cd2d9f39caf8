import { LineChart } from 'echarts/charts';
import { GridComponent, MarkLineComponent } from 'echarts/components';
import { init, use, type EChartsCoreOption } from 'echarts/core';
import { LabelLayout } from 'echarts/features';
import { SVGRenderer } from 'echarts/renderers';

use([LineChart, GridComponent, MarkLineComponent, LabelLayout, SVGRenderer]);

/** The library's drawing without its running numbers, style sheets and style attributes. */
function settledSvg(svg: string): string {
  return svg
    .replace(/<style\b[\s\S]*?<\/style>/g, '')
    .replace(/ (?:class|ecmeta_\w+)="[^"]*"/g, '')
    .replace(/ style="([^"]*)"/g, (_whole, style: string) =>
      style
        .split(';')
        .map((rule) => rule.split(':'))
        .map(([name = '', value = '']) =>
          value === '' ? '' : ` ${name.trim()}="${value.trim().replace(/px$/, '')}"`,
        )
        .join(''),
    )
    .replace(/\bzr\d+-/g, 'chart-');
}

/**
 * A chart as SVG text, drawn without a browser. The same option gives the same text, and no style
 * attribute is left, so that a page may show it under a strict content policy.
 */
export function chartSvg(option: EChartsCoreOption, width: number, height: number): string {
  const chart = init(null, null, { renderer: 'svg', ssr: true, width, height });
  try {
    chart.setOption(option);
    return settledSvg(chart.renderToSVGString());
  } finally {
    // Without this the library's timers keep the process alive.
    chart.dispose();
  }
}
