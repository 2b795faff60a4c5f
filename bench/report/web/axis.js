// Axes of charts: titles with units, ticks on measured places or on decades.
import { faint, font, ink, shown } from './series.js';

const crowded = 14;
const plainDecades = { from: 1e-2, below: 1e4 };

export const isLog = (axis) => axis.scale === 'log';

/** On a logarithmic axis a value of 0 has no place: such points are left out, and their upper limit stays. */
export function placeable(axis, value) {
  return value !== null && value !== undefined && (!isLog(axis) || value > 0);
}

// Measured places are few: they are the ticks.
function measuredTicks(option, places) {
  option.min = places[0] * 0.85;
  option.max = places[places.length - 1] * 1.18;
  option.axisTick.customValues = places;
  option.axisLabel.customValues = places;
  option.splitLine = { show: false };
}

const tickText = (axis) => (value) => (isLog(axis) ? shown(value, 12, plainDecades) : shown(value, 12));

// Whole decades, with room below a limit that hangs down because its point has no place.
function decades(option, axis, values, places) {
  const hasHanging = values.some((value) => value !== null && !placeable(axis, value));
  if (axis.low === null) option.min = 10 ** Math.floor(Math.log10(places[0] / (hasHanging ? 4 : 1)) + 1e-9);
  if (axis.high === null) option.max = 10 ** Math.ceil(Math.log10(places[places.length - 1]) - 1e-9);
  option.minorTick = { show: true, splitNumber: 9, lineStyle: { color: ink, width: 0.6 } };
}

export function axisOption(axis, values, isHorizontal, nameWidth) {
  const option = {
    type: isLog(axis) ? 'log' : 'value',
    name: axis.label,
    nameLocation: 'middle',
    nameGap: isHorizontal ? 32 : 56,
    nameTextStyle: { color: ink, fontFamily: font, fontSize: 13 },
    axisLabel: { color: ink, fontFamily: font, fontSize: 12, formatter: tickText(axis), hideOverlap: true },
    axisLine: { show: true, onZero: false, lineStyle: { color: ink } },
    axisTick: { show: true, lineStyle: { color: ink } },
    splitLine: { lineStyle: { color: faint, width: 0.6 } },
    scale: true,
    boundaryGap: isHorizontal ? ['3%', '3%'] : undefined,
    nameTruncate: { maxWidth: nameWidth },
  };
  if (axis.low !== null) option.min = axis.low;
  if (axis.high !== null) option.max = axis.high;
  const places = [...new Set(values.filter((value) => placeable(axis, value)))].sort((a, b) => a - b);
  if (!isLog(axis) || places.length === 0) return option;
  const isFree = axis.low === null && axis.high === null;
  if (isHorizontal && isFree && places.length <= crowded) measuredTicks(option, places);
  else decades(option, axis, values, places);
  return option;
}
