// One chart: lines with markers, limits, straight markers across, a legend and tooltips.
import { axisOption, isLog, placeable } from './axis.js';
import { band, limitBars } from './limits.js';
import { cut, escaped, font, ink, letterWidth, look, shown } from './series.js';

const manyPoints = 25;
const decadeBelow = 10;
const legendRow = 22;
const legendSample = 46;

// A line that lies on another one shows beside it: the ones below are wider, their markers larger.
const lineWidth = (order) => Math.max(1.5, 3.6 - 0.7 * order);
const symbolSize = (order) => Math.max(6, 11 - 1.7 * order);

function lineSeries(series, order, chart) {
  const { colour, dash, symbol } = look(series.look);
  const points = series.points.filter((p) => placeable(chart.x, p.x) && placeable(chart.y, p.y));
  const stride = points.length > manyPoints ? Math.ceil(points.length / 10) : 1;
  return {
    type: 'line',
    name: series.name,
    step: series.draw === 'step' ? 'end' : false,
    data: points.map((p, i) => ({ value: [p.x, p.y, p.low, p.high], symbol: i % stride === 0 ? symbol : 'none' })),
    symbol,
    symbolSize: symbolSize(order),
    showAllSymbol: true,
    itemStyle: { color: colour },
    lineStyle: { color: colour, type: dash, width: series.draw === 'points' ? 0 : lineWidth(order) },
  };
}

function markerLines(markers) {
  const label = { formatter: (mark) => mark.name, color: ink, fontFamily: font, fontSize: 12 };
  return {
    type: 'line',
    data: [],
    markLine: {
      silent: true,
      symbol: 'none',
      lineStyle: { color: ink, type: [3, 3], width: 1.2 },
      data: markers.map((m) => (m.vertical
        ? { name: m.label, xAxis: m.at, label: { ...label, position: 'end' } }
        : { name: m.label, yAxis: m.at, label: { ...label, position: 'insideEndTop' } })),
    },
  };
}

function tooltip(chart) {
  return {
    trigger: 'item',
    confine: true,
    textStyle: { color: ink, fontFamily: font, fontSize: 13 },
    formatter(point) {
      const [x, y, low, high] = point.value;
      const limits = high === null ? '' : ` (${shown(low)} to ${shown(high)})`;
      return [`<strong>${escaped(point.seriesName)}</strong>`, `${escaped(chart.x.label)}: ${shown(x)}`, `${escaped(chart.y.label)}: ${shown(y)}${limits}`].join('<br>');
    },
  };
}

const legendText = (series, width) => cut(series.remark ? `${series.name} (${series.remark})` : series.name, width - legendSample - 40);

const legendEntry = (series) => (series.draw === 'band' ? { name: series.name, icon: 'rect', itemStyle: { opacity: 0.3 } } : { name: series.name });

function legendRows(chart, width) {
  const widths = chart.series.map((series) => legendSample + 26 + letterWidth * legendText(series, width).length);
  return Math.max(1, Math.ceil(widths.reduce((sum, one) => sum + one, 0) / width));
}

// What the upright axis has to span. On decades a low limit far below all values would push the curves together:
// its bar runs off the axis instead.
function heights(chart) {
  const points = chart.series.flatMap((series) => series.points);
  const values = points.flatMap((p) => [p.y, p.high]);
  const lows = points.map((p) => p.low);
  if (!isLog(chart.y)) return [...values, ...lows];
  const lowest = Math.min(...values.filter((value) => placeable(chart.y, value)));
  return [...values, ...lows.filter((low) => low >= lowest / decadeBelow)];
}

export function chartOption(chart, width, height) {
  const xs = chart.series.flatMap((series) => series.points.map((p) => p.x));
  const texts = new Map(chart.series.map((series) => [series.name, legendText(series, width)]));
  const hasUprights = chart.markers.some((marker) => marker.vertical);
  const series = chart.series.flatMap((one, order) => (one.draw === 'band' ? [band(one, chart)] : [lineSeries(one, order, chart), limitBars(one, chart)]));
  return {
    animation: false,
    textStyle: { fontFamily: font, color: ink },
    grid: { left: 80, right: 28, top: 20 + legendRow * legendRows(chart, width) + (hasUprights ? 18 : 0), bottom: 56, outerBoundsMode: 'none' },
    legend: {
      top: 4,
      itemWidth: legendSample,
      itemHeight: 10,
      textStyle: { color: ink, fontFamily: font, fontSize: 13 },
      data: chart.series.map(legendEntry),
      formatter: (name) => texts.get(name),
    },
    tooltip: tooltip(chart),
    xAxis: axisOption(chart.x, xs, true, width - 110),
    yAxis: axisOption(chart.y, heights(chart), false, height - 60),
    series: chart.markers.length > 0 ? [...series, markerLines(chart.markers)] : series,
  };
}
