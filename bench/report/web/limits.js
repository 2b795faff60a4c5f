// Limits of measured points: bars with caps, arrows where nothing was seen, and bands.
import { placeable } from './axis.js';
import { look } from './series.js';

const capHalf = 4;
const arrowLength = 20;

const line = (x1, y1, x2, y2, style) => ({ type: 'line', shape: { x1, y1, x2, y2 }, style });

// From the upper limit down: the value lies somewhere below, off a logarithmic axis.
function arrowDown(x, y, style) {
  const tip = y + arrowLength;
  return [line(x, y, x, tip, style), line(x - capHalf, tip - 6, x, tip, style), line(x + capHalf, tip - 6, x, tip, style)];
}

function bar(x, top, bottom, isOpen, style) {
  const parts = [line(x, top, x, bottom, style)];
  if (!isOpen) parts.push(line(x - capHalf, bottom, x + capHalf, bottom, style));
  return parts;
}

export function limitBars(series, chart) {
  const rows = series.points
    .filter((p) => placeable(chart.x, p.x) && placeable(chart.y, p.high))
    .map((p) => [p.x, placeable(chart.y, p.low) ? p.low : p.high, p.high, placeable(chart.y, p.y) ? 1 : 0, placeable(chart.y, p.low) ? 1 : 0]);
  const style = { stroke: look(series.look).colour, lineWidth: 1.3, fill: 'none' };
  return {
    type: 'custom',
    name: series.name,
    silent: true,
    clip: true,
    itemStyle: { color: look(series.look).colour },
    data: rows,
    encode: { x: 0, y: [1, 2] },
    renderItem(params, api) {
      const [x, top] = api.coord([api.value(0), api.value(2)]);
      const floor = params.coordSys.y + params.coordSys.height;
      const low = api.coord([api.value(0), api.value(1)])[1];
      const hasValue = api.value(3) === 1;
      const hasLow = api.value(4) === 1 && low <= floor;
      const body = hasValue ? bar(x, top, hasLow ? low : floor, !hasLow, style) : arrowDown(x, top, style);
      return { type: 'group', children: [line(x - capHalf, top, x + capHalf, top, style), ...body] };
    },
  };
}

/** The area from low to high, as one shape. */
export function band(series, chart) {
  const points = series.points.filter((p) => placeable(chart.x, p.x) && placeable(chart.y, p.low) && placeable(chart.y, p.high));
  const { colour } = look(series.look);
  return {
    type: 'custom',
    name: series.name,
    silent: true,
    clip: true,
    itemStyle: { color: colour },
    data: points.map((p) => [p.x, p.low, p.high]),
    encode: { x: 0, y: [1, 2] },
    renderItem(params, api) {
      if (params.dataIndexInside > 0) return undefined;
      const edge = (side) => points.map((p) => api.coord([p.x, p[side]]));
      const style = { fill: colour, fillOpacity: 0.16, stroke: colour, lineWidth: 0.8, lineDash: [2, 2] };
      return { type: 'polygon', shape: { points: [...edge('high'), ...edge('low').reverse()] }, style };
    },
  };
}
