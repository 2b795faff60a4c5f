// One example trace: a strip per channel, with level, window, onset and firing drawn in.
import { cut, faint, font, ink, look, soft } from './series.js';

const stripHeight = 96;
const gap = 16;
const top = 44;
const footBar = 5;
const roomForNames = 240;
const small = { color: ink, fontFamily: font, fontSize: 11 };

export function traceHeight(trace) {
  return top + trace.channels.length * (stripHeight + gap) + 44;
}

export function traceOption(trace) {
  const option = { animation: false, textStyle: { fontFamily: font, color: ink }, grid: [], xAxis: [], yAxis: [], series: [] };
  const ns = (sample) => (sample - trace.first_sample) * 1000 / trace.sample_rate_mhz;
  trace.channels.forEach((channel, index) => {
    const isLast = index === trace.channels.length - 1;
    option.grid.push({ left: 80, right: 84, top: top + index * (stripHeight + gap), height: stripHeight, outerBoundsMode: 'none' });
    option.xAxis.push(timeAxis(index, isLast, ns(trace.first_sample + channel.codes.length)));
    option.yAxis.push(codeAxis(channel, index));
    option.series.push(codeLine(trace, channel, index, ns));
    if (channel.level !== null) option.series.push(overBars(trace, channel, index, ns));
  });
  return option;
}

function timeAxis(index, isLast, end) {
  return {
    type: 'value', gridIndex: index, min: 0, max: end, splitLine: { show: false },
    axisLabel: { ...small, show: isLast, hideOverlap: true }, axisTick: { show: isLast },
    axisLine: { onZero: false, lineStyle: { color: ink } },
    name: isLast ? 'time since the first sample shown (ns)' : '', nameLocation: 'middle', nameGap: 28, nameTextStyle: { ...small, fontSize: 13 },
  };
}

function codeAxis(channel, index) {
  return {
    type: 'value', gridIndex: index, scale: true, splitNumber: 3, axisLabel: small,
    splitLine: { lineStyle: { color: faint, width: 0.5 } }, axisLine: { show: true, lineStyle: { color: ink } },
    name: channel.name, nameLocation: 'middle', nameGap: 44, nameTextStyle: { ...small, fontSize: 12 },
    nameTruncate: { maxWidth: stripHeight },
  };
}

function codeLine(trace, channel, index, ns) {
  return {
    type: 'line', name: channel.name, xAxisIndex: index, yAxisIndex: index, step: 'middle', showSymbol: false, silent: true,
    lineStyle: { color: look(0).colour, width: 1.3 },
    data: channel.codes.map((code, s) => [ns(trace.first_sample + s), code]),
    markLine: { silent: true, symbol: 'none', data: marks(trace, channel, index === 0, ns) },
    markArea: windowArea(trace, index === 0, ns),
  };
}

const label = (text, more) => ({ ...small, formatter: () => text, position: 'end', ...more });

// The onset's name ends at its line and the firing's begins there, so that close ones do not meet.
function marks(trace, channel, isFirst, ns) {
  const found = [];
  if (channel.baseline !== null) {
    found.push({ yAxis: channel.baseline, lineStyle: { color: soft, type: [1, 4], width: 1 }, label: { show: false } });
  }
  if (channel.level !== null) {
    found.push({ yAxis: channel.level, lineStyle: { color: look(1).colour, type: [7, 4], width: 1.4 }, label: label(`level ${channel.level}`) });
  }
  if (trace.onset_sample !== null) {
    found.push({ xAxis: ns(trace.onset_sample), lineStyle: { color: ink, type: [2, 3], width: 1.2 }, label: label('onset', { show: isFirst, align: 'right' }) });
  }
  if (trace.firing_sample !== null) {
    found.push({ xAxis: ns(trace.firing_sample), lineStyle: { color: ink, type: 'solid', width: 2 }, label: label(cut(`${trace.trigger} fires`, roomForNames), { show: isFirst, align: 'left' }) });
  }
  return found;
}

function windowArea(trace, isFirst, ns) {
  if (trace.window_samples === null || trace.firing_sample === null) return undefined;
  const start = trace.firing_sample - trace.window_samples + 1;
  const from = Math.max(trace.first_sample, start);
  return {
    silent: true,
    itemStyle: { color: 'rgba(60, 66, 74, 0.10)', borderColor: soft, borderWidth: 0.6, borderType: [3, 3] },
    label: { ...small, show: isFirst, position: 'insideTopLeft', formatter: () => (start < from ? 'window, begins earlier' : 'window') },
    data: [[{ xAxis: ns(from) }, { xAxis: ns(trace.firing_sample) }]],
  };
}

// Runs of samples at or above the level, as [first, one past the last].
function runsOver(channel) {
  const runs = [];
  channel.codes.forEach((code, s) => {
    if (code < channel.level) return;
    if (runs.length > 0 && runs[runs.length - 1][1] === s) runs[runs.length - 1][1] = s + 1;
    else runs.push([s, s + 1]);
  });
  return runs;
}

// Bars at the foot of a strip: the samples that count as over, each half a sample to both sides of its instant.
function overBars(trace, channel, index, ns) {
  const at = (s) => Math.max(0, ns(trace.first_sample + s - 0.5));
  return {
    type: 'custom', xAxisIndex: index, yAxisIndex: index, silent: true,
    data: runsOver(channel).map(([from, to]) => [at(from), at(to), channel.level]),
    encode: { x: [0, 1], y: 2 },
    renderItem(params, api) {
      const [x] = api.coord([api.value(0), channel.level]);
      const [end] = api.coord([api.value(1), channel.level]);
      const y = params.coordSys.y + params.coordSys.height - footBar;
      return { type: 'rect', shape: { x, y, width: end - x, height: footBar }, style: { fill: look(1).colour } };
    },
  };
}
