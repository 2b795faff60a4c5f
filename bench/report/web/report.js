// Draws every chart of the report from the data embedded beside it, as wide as there is room.
import { CustomChart, LineChart } from 'echarts/charts';
import { GridComponent, LegendComponent, MarkAreaComponent, MarkLineComponent, TooltipComponent } from 'echarts/components';
import { init, use } from 'echarts/core';
import { SVGRenderer } from 'echarts/renderers';

import { chartOption } from './chart.js';
import { traceHeight, traceOption } from './trace.js';

use([LineChart, CustomChart, GridComponent, LegendComponent, MarkLineComponent, MarkAreaComponent, TooltipComponent, SVGRenderer]);

const widthMin = 340;
const widthMax = 920;
const paperWidth = 670; // A4 less its margins

const pictures = JSON.parse(document.getElementById('report-data').textContent);
const drawn = [...document.querySelectorAll('[data-picture]')].map((place) => {
  const picture = pictures[Number(place.dataset.picture)];
  return { place, picture, chart: init(place, null, { renderer: 'svg', width: widthMax, height: 400 }) };
});

function draw(one, width) {
  const isTrace = one.picture.kind === 'trace';
  const height = isTrace ? traceHeight(one.picture) : Math.round(Math.max(300, Math.min(420, width * 0.46)));
  one.chart.resize({ width, height });
  one.chart.setOption(isTrace ? traceOption(one.picture) : chartOption(one.picture, width, height), { notMerge: true });
  one.place.dataset.drawn = 'yes';
}

function drawAll() {
  for (const one of drawn) draw(one, Math.max(widthMin, Math.min(widthMax, one.place.clientWidth)));
}

let pending = 0;
window.addEventListener('resize', () => {
  cancelAnimationFrame(pending);
  pending = requestAnimationFrame(drawAll);
});
window.addEventListener('beforeprint', () => drawn.forEach((one) => draw(one, paperWidth)));
window.addEventListener('afterprint', drawAll);
drawAll();
