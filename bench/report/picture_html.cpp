#include "bench/report/picture_html.hpp"

#include <fmt/format.h>

#include <algorithm>

#include "bench/report/html_text.hpp"
#include "bench/report/table_html.hpp"

namespace cistern {
namespace {

using Rows = std::vector<std::vector<std::string>>;

std::string figure_html(int number, const std::string& label, const std::string& caption) {
  const std::string below = caption.empty() ? "" : fmt::format("<figcaption>{}</figcaption>", html_text(caption));
  return fmt::format(
      "<figure><div data-picture=\"{}\" role=\"img\" aria-label=\"{}\"></div>"
      "<noscript><p>The picture needs scripting; its numbers are in the table below.</p></noscript>{}</figure>\n",
      number, html_text(label), below);
}

std::string numbers_html(const std::vector<ReportColumn>& columns, const Rows& rows, const std::string& heading) {
  return fmt::format("<details><summary>Numbers of this picture</summary>\n{}</details>\n",
                     table_html(columns, rows, heading + ": numbers"));
}

std::string chart_label(const ReportChart& chart) {
  std::string names;
  for (const ReportSeries& series : chart.series) names += (names.empty() ? "" : ", ") + series.name;
  return fmt::format("Chart of {} against {}, for {}", chart.y.label, chart.x.label, names);
}

Rows chart_rows(const ReportChart& chart) {
  Rows rows;
  for (const ReportSeries& series : chart.series) {
    for (const ReportPoint& point : series.points) {
      rows.push_back({series.name, number_or_dash(point.x), number_or_dash(point.y),
                      point.low ? number_or_dash(point.low) : "", point.high ? number_or_dash(point.high) : ""});
    }
  }
  return rows;
}

std::string levels_text(const ReportTrace& trace) {
  std::string levels;
  for (const ReportTraceChannel& channel : trace.channels) {
    if (channel.level) levels += fmt::format("{}{} {:g}", levels.empty() ? "" : ", ", channel.name, *channel.level);
  }
  return levels.empty()
             ? ""
             : fmt::format(" Levels (dashed) in counts: {}; bars at the foot mark the samples at or above.", levels);
}

/// What is drawn, so that it can be read without colour, without the drawing, and aloud.
std::string trace_words(const ReportTrace& trace) {
  std::string words = "Code of each channel (stepped line).";
  if (trace.onset_sample) words += fmt::format(" Onset (dotted) at sample {}.", *trace.onset_sample);
  if (trace.firing_sample)
    words += fmt::format(" Trigger {} fires (thick line) at sample {}.", trace.trigger, *trace.firing_sample);
  if (trace.window_samples) words += fmt::format(" Its window of {} samples is grey.", *trace.window_samples);
  return words + levels_text(trace) +
         fmt::format(" The picture starts at sample {}, at {:g} MHz.", trace.first_sample, trace.sample_rate_mhz);
}

std::size_t longest_channel(const ReportTrace& trace) {
  std::size_t longest = 0;
  for (const ReportTraceChannel& channel : trace.channels) longest = std::max(longest, channel.codes.size());
  return longest;
}

std::string trace_numbers(const ReportTrace& trace) {
  std::vector<ReportColumn> columns{{"sample", "", "", true}};
  for (const ReportTraceChannel& channel : trace.channels) columns.push_back({channel.name, "counts", "", true});
  Rows rows(longest_channel(trace));
  for (std::size_t s = 0; s < rows.size(); ++s) {
    rows[s].push_back(std::to_string(trace.first_sample + static_cast<std::int64_t>(s)));
    for (const ReportTraceChannel& channel : trace.channels) {
      rows[s].push_back(s < channel.codes.size() ? std::to_string(channel.codes[s]) : "");
    }
  }
  return numbers_html(columns, rows, trace.heading);
}

}  // namespace

std::string chart_html(const ReportChart& chart, int number) {
  const std::vector<ReportColumn> columns{{"series", "", "", false},
                                          {chart.x.label, "", "", true},
                                          {chart.y.label, "", "", true},
                                          {"low", "", "", true},
                                          {"high", "", "", true}};
  return figure_html(number, chart_label(chart), "") + numbers_html(columns, chart_rows(chart), chart.heading);
}

std::string trace_html(const ReportTrace& trace, int number) {
  return figure_html(number, trace.heading, trace_words(trace)) + trace_numbers(trace);
}

}  // namespace cistern
