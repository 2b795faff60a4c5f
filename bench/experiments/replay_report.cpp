#include "bench/experiments/replay_report.hpp"

#include <fmt/format.h>

#include <algorithm>

#include "bench/experiments/report_parts.hpp"
#include "bench/experiments/signal_figures.hpp"
#include "bench/statistics/mcnemar.hpp"
#include "bench/statistics/quantiles.hpp"

namespace cistern {
namespace {

constexpr int points_per_curve = 60;

std::string quantile_text(const std::vector<double>& sorted, double fraction) {
  return sorted.empty() ? "-" : number_text(quantile_of(sorted, fraction));
}

/// Share of traces with a best margin of at least x.
ReportSeries margin_series(const std::string& name, std::vector<double> margins) {
  std::sort(margins.begin(), margins.end());
  ReportSeries series{name, {}};
  for (int i = 0; i <= points_per_curve; ++i) {
    // Margins are whole numbers: a curve through some of the values that occur.
    const double x = margins[(margins.size() - 1) * static_cast<std::size_t>(i) / points_per_curve];
    if (!series.points.empty() && series.points.back().x == x) continue;
    const auto below = std::lower_bound(margins.begin(), margins.end(), x) - margins.begin();
    series.points.push_back({x, 1 - static_cast<double>(below) / static_cast<double>(margins.size()), {}, {}});
  }
  return series;
}

}  // namespace

ReportTable recorded_table(const StationPlan& plan, const RecordedCounts& counts, const std::string& file) {
  ReportTable table;
  table.heading = "Recorded traces";
  table.note = fmt::format("{} traces, {} samples in all, from {}.", counts.traces, counts.samples, file);
  if (are_comparable(plan.triggers)) {
    table.note +=
        fmt::format(" {} traces fire both stations, {} only the one in service, {} only the candidate, {} neither.",
                    counts.pairs.both, counts.pairs.only_in_service, counts.pairs.only_candidate, counts.pairs.neither);
  }
  table.columns = {{"trigger", "", "", false},
                   {"firings", "", "with any status", true},
                   {"passed", "", "not disabled, held off, prescaled or busy", true},
                   {"traces that fired", "", "", true},
                   {"margin, 5 %", "", "of the best margins of the traces; at least 0 fires", true},
                   {"median", "", "", true},
                   {"95 %", "", "", true},
                   {"unit", "", "", false}};
  for (std::size_t t = 0; t < plan.triggers.size(); ++t) {
    const TriggerRecordedCounts& own = counts.triggers[t];
    auto margins = own.margins;
    std::sort(margins.begin(), margins.end());
    table.rows.push_back({plan.triggers[t].name, std::to_string(own.firings), std::to_string(own.passed),
                          std::to_string(own.traces_fired), quantile_text(margins, 0.05), quantile_text(margins, 0.5),
                          quantile_text(margins, 0.95), std::string(margin_unit(plan.triggers[t].condition.kind))});
  }
  return table;
}

std::vector<ReportChart> margin_charts(const StationPlan& plan, const RecordedCounts& counts) {
  std::vector<ReportChart> charts;
  for (const std::string_view unit : {"counts", "samples"}) {
    ReportChart chart;
    chart.heading = fmt::format("Margins in {}", unit);
    chart.note =
        "Share of the traces whose best margin is at least x. What lies right of 0 fires; the step from there to the "
        "left shows how many would be gained by an easier setting.";
    chart.x = {fmt::format("best margin ({})", unit), AxisScale::Linear, {}, {}};
    chart.y = {"share of traces", AxisScale::Linear, 0, 1};
    chart.markers = {{"fires", 0, true}};
    for (std::size_t t = 0; t < plan.triggers.size(); ++t) {
      if (margin_unit(plan.triggers[t].condition.kind) != unit || counts.triggers[t].margins.empty()) continue;
      chart.series.push_back(margin_series(plan.triggers[t].name, counts.triggers[t].margins));
    }
    if (!chart.series.empty()) charts.push_back(std::move(chart));
  }
  return charts;
}

std::vector<std::string> recorded_lines(const StationPlan& plan, const RecordedCounts& counts,
                                        const std::string& file) {
  std::vector<std::string> lines{fmt::format("  {}: {} traces, {} samples", file, counts.traces, counts.samples),
                                 fmt::format("  {:<16} {:>9} {:>9} {:>14} {:>22}", "trigger", "firings", "passed",
                                             "traces fired", "median best margin")};
  for (std::size_t t = 0; t < plan.triggers.size(); ++t) {
    const TriggerRecordedCounts& own = counts.triggers[t];
    auto margins = own.margins;
    std::sort(margins.begin(), margins.end());
    lines.push_back(fmt::format("  {:<16} {:>9} {:>9} {:>14} {:>14} {}", plan.triggers[t].name, own.firings, own.passed,
                                own.traces_fired, quantile_text(margins, 0.5),
                                margin_unit(plan.triggers[t].condition.kind)));
  }
  if (are_comparable(plan.triggers)) {
    const RecordedPairs& pairs = counts.pairs;
    lines.push_back(
        fmt::format("  stations: {} traces fire both, {} only the one in service, {} only the candidate, {} neither; "
                    "exact McNemar p {}",
                    pairs.both, pairs.only_in_service, pairs.only_candidate, pairs.neither,
                    p_value_text(mcnemar_exact(pairs.only_in_service, pairs.only_candidate))));
  }
  return lines;
}

std::vector<std::string> replay_lines(const StationPlan& plan, const RecordedCounts& counts, const std::string& file,
                                      const Summary& summary) {
  std::vector<std::string> lines;
  if (!summary.requirements.empty()) lines = verdict_lines(summary);
  for (std::string& line : recorded_lines(plan, counts, file)) lines.push_back(std::move(line));
  for (const std::string& note : summary.notes) lines.push_back("  note: " + note);
  return lines;
}

Report replay_report(const StationPlan& plan, const RecordedCounts& counts, const std::string& file,
                     const Summary& summary) {
  Report report = start_report(summary);
  if (summary.requirements.empty())
    report.verdict.sentence = fmt::format("{} traces replayed; no requirements were stated on them.", counts.traces);
  report.blocks.emplace_back(recorded_table(plan, counts, file));
  for (ReportChart& chart : margin_charts(plan, counts)) report.blocks.emplace_back(std::move(chart));
  report.blocks.emplace_back(trigger_table(plan));
  report.blocks.emplace_back(
      figure_table("Figures", "", summary.figures, {"background_rate", "fired_share", "gain", "margin_median"}));
  if (!summary.notes.empty()) report.blocks.emplace_back(notes_block(summary));
  return report;
}

}  // namespace cistern
