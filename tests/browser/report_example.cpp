/// \file
/// Writes two reports that the browser test opens: report_example FOLDER. One with every kind of block, on
/// invented data; one whose every text tries to become markup.
#include <cmath>
#include <filesystem>
#include <fstream>
#include <iostream>

#include "bench/report/report.hpp"

namespace cistern {
namespace {

ReportTable requirements() {
  ReportTable table;
  table.heading = "Requirements";
  table.note = "Met when the one-sided limit lies within the bound; all numbers are invented.";
  table.columns = {{"requirement", "", "", false},
                   {"bound", "", "", false},
                   {"value", "", "", true},
                   {"low", "", "one-sided 95 % limit", true},
                   {"high", "", "one-sided 95 % limit", true},
                   {"verdict", "", "", false},
                   {"reason", "", "", false}};
  table.rows = {{"quiet", "tag rate at most 30 Hz", "21.4", "20.9", "21.9", "met", ""},
                {"finds-faint", "efficiency at least 0.9", "0.612", "0.598", "0.626", "not met", ""},
                {"quick", "delay at most 2000 ns", "1980", "1940", "2020", "undecided", ""}};
  return table;
}

ReportSeries turn_on(const std::string& name, double half_at, double steepness) {
  ReportSeries series{name, {}};
  for (const double size : {0.5, 0.75, 1.0, 1.5, 2.0, 3.0, 5.0}) {
    const double share = 1 / (1 + std::exp(-steepness * (std::log(size) - std::log(half_at))));
    const double half_width = 0.01 + 1.6 * std::sqrt(share * (1 - share) / 400);
    series.points.push_back({size, share, std::max(0.0, share - half_width), std::min(1.0, share + half_width)});
  }
  return series;
}

ReportChart efficiency() {
  ReportChart chart;
  chart.heading = "Efficiency against size";
  chart.note = "Share of the placed signals on which each subject fires. Bars are 95 % limits.";
  chart.x = {"true size (VEM)", AxisScale::Logarithmic, {}, {}};
  chart.y = {"efficiency", AxisScale::Linear, 0, 1};
  chart.series = {turn_on("station in service", 1.7, 6), turn_on("station with the candidate", 0.9, 5),
                  turn_on("tall", 2.4, 5), turn_on("broad", 1.7, 6)};
  return chart;
}

ReportSeries falling_rate(const std::string& name, double at_one, double slope, const std::string& remark) {
  ReportSeries series{name, {}, SeriesDraw::Line, remark};
  for (const double level : {0.5, 0.75, 1.0, 1.25, 1.5, 2.0}) {
    const double rate = at_one * std::pow(level, slope);
    const double spread = std::exp(0.5 / std::sqrt(rate));
    series.points.push_back({level, rate, rate / spread, rate * spread});
  }
  series.points.push_back({2.25, 0.08, 1e-7, 0.5});  // one firing: almost no lower limit
  series.points.push_back({2.5, 0, 0, 0.012});
  return series;
}

ReportChart rate() {
  ReportChart chart;
  chart.heading = "Background rate against level";
  chart.note = "An arrow hangs from the upper limit where nothing was seen.";
  chart.x = {"level (VEM)", AxisScale::Linear, {}, {}};
  chart.y = {"background rate (Hz)", AxisScale::Logarithmic, {}, {}};
  chart.series = {falling_rate("tall", 20, -7, "slope -7.0 ± 0.2"), falling_rate("broad", 90, -9, "slope -9.0 ± 0.3")};
  chart.markers = {{"level in use", 1.25, true}, {"budget", 30, false}};
  return chart;
}

ReportChart margins() {
  ReportChart chart;
  chart.heading = "Margins in counts";
  chart.x = {"best margin (counts)", AxisScale::Linear, {}, {}};
  chart.y = {"share of traces", AxisScale::Linear, 0, 1};
  ReportSeries share{"tall", {}, SeriesDraw::Step};
  ReportSeries expected{"expected", {}, SeriesDraw::Band};
  ReportSeries hand{"by hand", {}, SeriesDraw::Points};
  for (int i = 0; i <= 60; ++i) {
    const double x = -40 + 3 * i;
    const double y = 1 / (1 + std::exp((x - 45) / 20));
    share.points.push_back({x, y, {}, {}});
    expected.points.push_back({x, y, std::max(0.0, y - 0.08), std::min(1.0, y + 0.08)});
    if (i % 15 == 5) hand.points.push_back({x, 0.95 * y, 0.95 * y - 0.04, 0.95 * y + 0.04});
  }
  chart.series = {share, expected, hand};
  chart.markers = {{"fires", 0, true}};
  return chart;
}

std::vector<std::int16_t> pulse(int baseline, int height, int start) {
  std::vector<std::int16_t> codes;
  for (int s = 0; s < 240; ++s) {
    const double t = s - start;
    const double light = t < 0 ? 0 : height * (1 - std::exp(-t / 3)) * std::exp(-t / 16);
    codes.push_back(static_cast<std::int16_t>(baseline + (s * 7 + start) % 5 - 2 + std::lround(light)));
  }
  return codes;
}

ReportTrace trace() {
  ReportTrace trace;
  trace.heading = "A signal that only the candidate finds";
  trace.note = "An invented pulse.";
  trace.first_sample = 1000;
  for (int c = 0; c < 4; ++c) {
    const int baseline = 200 + 5 * c;
    trace.channels.push_back(
        {"channel " + std::to_string(c), pulse(baseline, 120 - 15 * c, 60 + c), baseline + 24.0, baseline});
  }
  trace.onset_sample = 1061;
  trace.firing_sample = 1082;
  trace.window_samples = 60;
  trace.trigger = "long";
  return trace;
}

ReportTable long_table() {
  ReportTable table;
  table.heading = "Delay from onset to firing";
  table.columns = {{"figure", "", "", false}, {"value", "ns", "", true}};
  for (int i = 0; i < 90; ++i)
    table.rows.push_back({"delay_median.long." + std::to_string(i), std::to_string(250 + i)});
  return table;
}

Report plain_report() {
  Report report;
  report.title = "An invented report";
  report.subtitle = "cistern 0.0.0 qualify - scenario invented.toml (digest 0000000000000000), seed 1";
  report.verdict = {VerdictState::NotMet,
                    "Not met: 1 of 3 requirements fails, 1 undecided.",
                    {"finds-faint not met: efficiency at least 0.9, measured 0.612",
                     "quick undecided: delay at most 2000 ns, measured 1980"}};
  report.blocks = {
      requirements(),
      ReportText{"What is compared", {"Nothing real: every number of this report is invented, to look at its layout."}},
      efficiency(),
      rate(),
      margins(),
      trace(),
      long_table(),
      ReportCaution{"High voltage at the tubes can kill. Follow local codes and leave such work to qualified people."}};
  return report;
}

constexpr const char* hostile =
    "</script><img src=x onerror=\"document.title='broken in'\"><b>{a|{b}}</b> & '\xe2\x80\xa8";

Report hostile_report() {
  Report report;
  report.title = report.subtitle = hostile;
  report.verdict = {VerdictState::Met, hostile, {hostile}};
  ReportChart chart = efficiency();
  chart.heading = chart.note = chart.x.label = chart.y.label = hostile;
  chart.series.resize(1);
  chart.series[0].name = chart.series[0].remark = hostile;
  chart.markers = {{hostile, 1, true}};
  ReportTrace one = trace();
  one.heading = one.note = one.trigger = one.channels[0].name = hostile;
  report.blocks = {ReportText{hostile, {hostile}}, ReportCaution{hostile}, chart, one,
                   ReportTable{hostile, hostile, {{hostile, hostile, hostile, false}}, {{hostile}}}};
  return report;
}

void write(const std::filesystem::path& path, const Report& report) {
  std::ofstream file(path, std::ios::binary);
  file << render_report(report);
  file.exceptions(std::ios::failbit | std::ios::badbit);
  file.flush();
}

}  // namespace
}  // namespace cistern

int main(int count, char** arguments) {
  if (count != 2) {
    std::cerr << "usage: report_example FOLDER\n";
    return 2;
  }
  const std::filesystem::path folder(arguments[1]);
  std::filesystem::create_directories(folder);
  cistern::write(folder / "plain.html", cistern::plain_report());
  cistern::write(folder / "hostile.html", cistern::hostile_report());
}
