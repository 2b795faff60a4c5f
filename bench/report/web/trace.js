// One example trace: a strip per channel, with level, window, onset and firing drawn in.
import { faint, font, ink, look } from './series.js';

const stripHeight = 96;
const top = 40;

export function traceHeight(trace) {
  return top + trace.channels.length * (stripHeight + 14) + 44;
}

export function traceOption(trace) {
  const last = trace.channels.length - 1;
  const ns = (sample) => (sample - trace.first_sample) * 1000 / trace.sample_rate_mhz;
  const shared = { color: ink, fontFamily: font, fontSize: 11 };
  const option = { animation: false, textStyle: { fontFamily: font, color: ink }, grid: [], xAxis: [], yAxis: [], series: [] };
  trace.channels.forEach((channel, i) => {
    const end = ns(trace.first_sample + channel.codes.length);
    option.grid.push({ left: 76, right: 120, top: top + i * (stripHeight + 14), height: stripHeight });
    option.xAxis.push({
      type: 'value', gridIndex: i, min: 0, max: end, axisLabel: { ...shared, show: i === last },
      axisTick: { show: i === last }, splitLine: { show: false }, axisLine: { lineStyle: { color: ink } },
      name: i === last ? 'time in the picture (ns)' : '', nameLocation: 'middle', nameGap: 26, nameTextStyle: { ...shared, fontSize: 13 },
    });
    option.yAxis.push({
      type: 'value', gridIndex: i, scale: true, splitNumber: 3, axisLabel: shared, splitLine: { lineStyle: { color: faint, width: 0.5 } },
      name: i === 0 ? 'code (counts)' : '', nameTextStyle: { ...shared, fontSize: 12 }, axisLine: { show: true, lineStyle: { color: ink } },
    });
    option.series.push({
      type: 'line', name: channel.name, xAxisIndex: i, yAxisIndex: i, step: 'middle', showSymbol: false,
      lineStyle: { color: look(0).colour, width: 1.1 }, itemStyle: { color: look(0).colour },
      data: channel.codes.map((code, s) => [ns(trace.first_sample + s), code]),
      markLine: { silent: true, symbol: 'none', data: lines(trace, channel, i, ns), label: { ...shared, fontSize: 11 } },
      markArea: windowArea(trace, i, ns),
    });
  });
  return option;
}

function lines(trace, channel, i, ns) {
  const marks = [];
  if (channel.level !== null) {
    marks.push({ yAxis: channel.level, name: `${channel.name} level`, lineStyle: { color: look(1).colour, type: [7, 4], width: 1.4 }, label: { formatter: `${channel.name} level`, position: 'end' } });
  }
  if (trace.onset_sample !== null) {
    marks.push({ xAxis: ns(trace.onset_sample), lineStyle: { color: ink, type: [2, 3], width: 1 }, label: { show: i === 0, formatter: 'onset', position: 'end' } });
  }
  if (trace.firing_sample !== null) {
    marks.push({ xAxis: ns(trace.firing_sample), lineStyle: { color: ink, type: 'solid', width: 1.6 }, label: { show: i === 0, formatter: `${trace.trigger} fires`, position: 'end' } });
  }
  return marks;
}

function windowArea(trace, i, ns) {
  if (trace.window_samples === null || trace.firing_sample === null) return undefined;
  const from = Math.max(trace.first_sample, trace.firing_sample - trace.window_samples + 1);
  return {
    silent: true,
    itemStyle: { color: 'rgba(60, 66, 74, 0.10)', borderColor: '#6a7078', borderWidth: 0.6, borderType: [3, 3] },
    label: { show: i === 0, position: 'insideTopLeft', formatter: 'window', color: ink, fontFamily: font, fontSize: 11 },
    data: [[{ xAxis: ns(from) }, { xAxis: ns(trace.firing_sample) }]],
  };
}
