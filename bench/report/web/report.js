// Draws every chart of the report from the data embedded beside it.
import { CustomChart, LineChart } from 'echarts/charts';
import { GridComponent, LegendComponent, MarkAreaComponent, MarkLineComponent, TooltipComponent } from 'echarts/components';
import { init, use } from 'echarts/core';
import { SVGRenderer } from 'echarts/renderers';

import { chartOption } from './chart.js';
import { traceHeight, traceOption } from './trace.js';

use([LineChart, CustomChart, GridComponent, LegendComponent, MarkLineComponent, MarkAreaComponent, TooltipComponent, SVGRenderer]);

const width = 920;
const pictures = JSON.parse(document.getElementById('report-data').textContent);

for (const figure of document.querySelectorAll('[data-picture]')) {
  const picture = pictures[Number(figure.dataset.picture)];
  const isTrace = picture.kind === 'trace';
  const chart = init(figure, null, { renderer: 'svg', width, height: isTrace ? traceHeight(picture) : 400 });
  chart.setOption(isTrace ? traceOption(picture) : chartOption(picture));
  figure.dataset.drawn = 'yes';
}
