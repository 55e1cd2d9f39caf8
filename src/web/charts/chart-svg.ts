import { LineChart } from 'echarts/charts';
import { GridComponent, MarkLineComponent } from 'echarts/components';
import { init, use, type EChartsCoreOption } from 'echarts/core';
import { LabelLayout } from 'echarts/features';
import { SVGRenderer } from 'echarts/renderers';

use([LineChart, GridComponent, MarkLineComponent, LabelLayout, SVGRenderer]);

/**
 * A chart as SVG text, drawn without a browser. The same option gives the same text: the running
 * numbers that the library puts into its names are taken out.
 */
export function chartSvg(option: EChartsCoreOption, width: number, height: number): string {
  const chart = init(null, null, { renderer: 'svg', ssr: true, width, height });
  try {
    chart.setOption(option);
    return chart.renderToSVGString().replace(/\bzr\d+-/g, 'chart-');
  } finally {
    // Without this the library's timers keep the process alive.
    chart.dispose();
  }
}
