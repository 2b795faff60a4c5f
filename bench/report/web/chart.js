// One chart: lines with markers, limits as bars, straight markers across.
import { faint, font, ink, look, shown } from './series.js';

const isLog = (axis) => axis.scale === 'log';

// On a logarithmic axis a value of 0 has no place: such points are left out, and their upper limit stays.
function placeable(axis, value) {
  return value !== null && value !== undefined && (!isLog(axis) || value > 0);
}

function axisOption(axis, values, name) {
  const usable = values.filter((v) => placeable(axis, v));
  const option = {
    type: isLog(axis) ? 'log' : 'value',
    name: axis.label,
    nameLocation: 'middle',
    nameGap: name === 'x' ? 30 : 52,
    nameTextStyle: { color: ink, fontFamily: font, fontSize: 13 },
    axisLabel: { color: ink, fontFamily: font, formatter: shown, hideOverlap: true },
    axisLine: { show: true, lineStyle: { color: ink } },
    axisTick: { show: true, lineStyle: { color: ink } },
    splitLine: { lineStyle: { color: faint, width: 0.6 } },
    scale: true,
  };
  if (axis.low !== null) option.min = axis.low;
  if (axis.high !== null) option.max = axis.high;
  if (isLog(axis) && usable.length > 0) {
    const low = Math.min(...usable);
    const high = Math.max(...usable);
    if (name === 'x') {
      // Measured places are few: they are the ticks.
      option.min = low * 0.85;
      option.max = high * 1.18;
      const places = [...new Set(usable)].sort((a, b) => a - b);
      option.axisTick.customValues = places;
      option.axisLabel.customValues = places;
      option.splitLine = { show: false };
    }
  }
  return option;
}

// Limits as a bar with caps.
function limitsSeries(series, index, chart) {
  const colour = look(index).colour;
  const rows = series.points.filter((p) => p.high !== null && placeable(chart.y, p.high)).map((p) => [p.x, p.low, p.high]);
  return {
    type: 'custom',
    name: series.name,
    silent: true,
    data: rows,
    encode: { x: 0, y: [1, 2] },
    renderItem(params, api) {
      const high = api.coord([api.value(0), api.value(2)]);
      const low = placeable(chart.y, api.value(1)) ? api.coord([api.value(0), api.value(1)]) : [high[0], params.coordSys.y + params.coordSys.height];
      const bottom = Math.min(low[1], params.coordSys.y + params.coordSys.height);
      const style = { stroke: colour, lineWidth: 1.2, fill: 'none' };
      const line = (x1, y1, x2, y2) => ({ type: 'line', shape: { x1, y1, x2, y2 }, style });
      return {
        type: 'group',
        children: [line(high[0], high[1], high[0], bottom), line(high[0] - 3, high[1], high[0] + 3, high[1]), line(high[0] - 3, bottom, high[0] + 3, bottom)],
      };
    },
  };
}

function markerLines(markers) {
  return {
    silent: true,
    symbol: 'none',
    lineStyle: { color: ink, type: [3, 3], width: 1 },
    label: { formatter: (p) => p.name, color: ink, fontFamily: font, fontSize: 12, position: 'insideEndTop' },
    data: markers.map((m) => (m.vertical ? { name: m.label, xAxis: m.at } : { name: m.label, yAxis: m.at })),
  };
}

export function chartOption(chart) {
  const lines = chart.series.map((series, index) => ({
    type: 'line',
    name: series.name,
    data: series.points.filter((p) => placeable(chart.x, p.x) && placeable(chart.y, p.y)).map((p) => [p.x, p.y, p.low, p.high]),
    symbol: look(index).symbol,
    symbolSize: 8,
    itemStyle: { color: look(index).colour },
    lineStyle: { color: look(index).colour, type: look(index).dash, width: 2 },
    markLine: index === 0 && chart.markers.length > 0 ? markerLines(chart.markers) : undefined,
  }));
  const limits = chart.series.map((series, index) => limitsSeries(series, index, chart));
  const xs = chart.series.flatMap((s) => s.points.map((p) => p.x));
  const ys = chart.series.flatMap((s) => s.points.flatMap((p) => [p.y, p.low, p.high]));
  return {
    animation: false,
    textStyle: { fontFamily: font, color: ink },
    grid: { left: 76, right: 28, top: 46, bottom: 54 },
    legend: { top: 4, itemWidth: 46, itemHeight: 10, textStyle: { color: ink, fontFamily: font, fontSize: 13 }, data: chart.series.map((s) => s.name) },
    tooltip: {
      trigger: 'item',
      formatter: (p) => `${p.seriesName}<br>${chart.x.label}: ${shown(p.value[0])}<br>${chart.y.label}: ${shown(p.value[1])} (${shown(p.value[2])} to ${shown(p.value[3])})`,
    },
    xAxis: axisOption(chart.x, xs, 'x'),
    yAxis: axisOption(chart.y, ys, 'y'),
    series: [...lines, ...limits],
  };
}
