#include "bench/experiments/report_parts.hpp"

#include <fmt/format.h>
#include <fmt/ranges.h>

#include <algorithm>
#include <cmath>
#include <numeric>

#include "bench/experiments/live_figures.hpp"

namespace cistern {
namespace {

VerdictState state_of(const std::string& verdict) {
  if (verdict == "met") return VerdictState::Met;
  if (verdict == "not met") return VerdictState::NotMet;
  return verdict == "undecided" ? VerdictState::Undecided : VerdictState::NoRequirements;
}

std::size_t count_of(const Summary& summary, const std::string& verdict) {
  return static_cast<std::size_t>(std::count_if(summary.requirements.begin(), summary.requirements.end(),
                                                [&](const auto& r) { return r.verdict == verdict; }));
}

std::string verdict_sentence(const Summary& summary) {
  const std::size_t all = summary.requirements.size();
  if (all == 0) return "No requirements were stated; these are the figures.";
  if (summary.verdict == "met") return fmt::format("Met: all {} requirements hold.", all);
  std::string text =
      summary.verdict == "not met"
          ? fmt::format("Not met: {} of {} requirements", count_of(summary, "not met"), all)
          : fmt::format("Undecided: {} of {} requirements, for want of data", count_of(summary, "undecided"), all);
  if (summary.verdict == "not met" && count_of(summary, "undecided") > 0)
    text += fmt::format(", {} undecided", count_of(summary, "undecided"));
  return text + ".";
}

std::string number_or_dash(const std::optional<double>& value) { return value ? number_text(*value) : "-"; }

ReportTable requirement_table(const Summary& summary) {
  ReportTable table;
  table.heading = "Requirements";
  table.note =
      "Met when the one-sided limit at the stated confidence lies within the bound, not met when the other one lies "
      "beyond it, else undecided.";
  table.columns = {{"requirement", "", "", false},
                   {"bound", "", "", false},
                   {"value", "", "", true},
                   {"low", "", "one-sided limit", true},
                   {"high", "", "one-sided limit", true},
                   {"verdict", "", "", false},
                   {"reason", "", "", false}};
  for (const RequirementOutcome& r : summary.requirements) {
    table.rows.push_back(
        {r.name, r.bound, number_or_dash(r.value), number_or_dash(r.low), number_or_dash(r.high), r.verdict, r.reason});
  }
  return table;
}

template <typename Value>
std::string per_channel(const std::vector<Value>& values) {
  const bool all_equal = std::adjacent_find(values.begin(), values.end(), std::not_equal_to<>{}) == values.end();
  return all_equal ? fmt::format("{}", values.front()) : fmt::format("{}", fmt::join(values, ", "));
}

std::string condition_text(const ConditionSettings& c) {
  switch (c.kind) {
    case TriggerKind::Threshold: return fmt::format("level {} counts", per_channel(c.level_counts));
    case TriggerKind::TimeOverThreshold:
      return fmt::format("level {} counts, {} of {} samples", per_channel(c.level_counts), c.min_samples_over,
                         c.window_samples);
    case TriggerKind::BoxcarSum:
      return fmt::format("sum {} counts over {} samples", per_channel(c.sum_counts), c.length_samples);
  }
  return {};
}

std::string role_text(TriggerRole role) {
  return role == TriggerRole::Both ? "both" : role == TriggerRole::InService ? "in service" : "candidate";
}

/// Mean level of a variant in VEM, or its factor where there is no calibration.
double level_x(const RateVariant& variant, const StationFacts& facts) {
  const ConditionSettings& c = variant.settings.condition;
  const bool is_sum = c.kind == TriggerKind::BoxcarSum;
  const auto& calibration = is_sum ? facts.area_counts_per_vem : facts.height_counts_per_vem;
  if (!calibration) return variant.x;
  double sum = 0;
  for (std::size_t i = 0; i < calibration->size(); ++i)
    sum += static_cast<double>(is_sum ? c.sum_counts[i] : c.level_counts[i]) / (*calibration)[i];
  return sum / static_cast<double>(calibration->size());
}

std::string slope_text(const RateScan& scan, std::size_t trigger) {
  const auto slope = level_slope(scan, trigger);
  return slope ? fmt::format("slope {:.1f} ± {:.1f}", slope->value, slope->standard_error) : "";
}

ReportPoint rate_point(double x, const std::vector<std::int64_t>& counts, double block_s) {
  const BlockCounts blocks{counts, block_s};
  const RateEstimate estimate = estimate_rate(blocks, 0.95);
  return {x, estimate.rate_hz, estimate.two_sided.low, estimate.two_sided.high};
}

ReportChart scan_chart(const RateScan& scan, const StationPlan& plan, const StationFacts& facts, ScanAxis axis) {
  ReportChart chart;
  chart.y = {"background rate (Hz)", AxisScale::Logarithmic, {}, {}};
  for (std::size_t t = 0; t < plan.triggers.size(); ++t) {
    ReportSeries series;
    series.name = plan.triggers[t].name;
    if (axis == ScanAxis::Level) series.remark = slope_text(scan, t);
    for (std::size_t v = 0; v < scan.variants().size(); ++v) {
      const RateVariant& variant = scan.variants()[v];
      if (variant.trigger != t || variant.axis != axis || scan.firings_per_block(v).empty()) continue;
      series.points.push_back(rate_point(axis == ScanAxis::Level ? level_x(variant, facts) : variant.x,
                                         scan.firings_per_block(v), scan.time().block_s()));
    }
    if (!series.points.empty()) chart.series.push_back(std::move(series));
  }
  return chart;
}

/// Decades on both axes make a power law straight; levels at or below the baseline have no place on them.
AxisScale level_scale(const ReportChart& chart) {
  const auto is_positive = [](const ReportPoint& point) { return point.x > 0; };
  const bool all_positive = std::all_of(chart.series.begin(), chart.series.end(), [&](const ReportSeries& series) {
    return std::all_of(series.points.begin(), series.points.end(), is_positive);
  });
  return all_positive ? AxisScale::Logarithmic : AxisScale::Linear;
}

bool starts_with_any(const std::string& name, const std::vector<std::string>& quantities) {
  return std::any_of(quantities.begin(), quantities.end(),
                     [&](const std::string& quantity) { return name.rfind(quantity + ".", 0) == 0; });
}

}  // namespace

Report start_report(const Summary& summary) {
  Report report;
  report.title = summary.title;
  report.subtitle = fmt::format("cistern {} {} - scenario {} (digest {}), seed {}", summary.version, summary.command,
                                summary.scenario, summary.scenario_digest, summary.seed);
  report.verdict = {state_of(summary.verdict), verdict_sentence(summary), {}};
  for (const RequirementOutcome& r : summary.requirements) {
    if (r.verdict != "met")
      report.verdict.points.push_back(fmt::format("{} {}: {}, measured {}{}", r.name, r.verdict, r.bound,
                                                  number_or_dash(r.value), r.reason.empty() ? "" : "; " + r.reason));
  }
  if (!summary.requirements.empty()) report.blocks.emplace_back(requirement_table(summary));
  return report;
}

ReportTable trigger_table(const StationPlan& plan) {
  ReportTable table;
  table.heading = "Triggers as they ran";
  table.note = "In counts and samples; levels and sums are above baseline, and equal is enough.";
  table.columns = {{"trigger", "", "", false},
                   {"role", "", "", false},
                   {"kind", "", "", false},
                   {"condition", "", "", false},
                   {"majority", "channels", "", true},
                   {"hold-off", "samples", "", true},
                   {"prescale", "", "", true}};
  for (const TriggerSettings& t : plan.triggers) {
    const auto enabled = std::count(t.condition.channel_enabled.begin(), t.condition.channel_enabled.end(), true);
    table.rows.push_back({t.name, role_text(t.role), name_of(t.condition.kind), condition_text(t.condition),
                          fmt::format("{} of {}", t.condition.majority, enabled),
                          std::to_string(t.firing.hold_off_samples), std::to_string(t.firing.prescale)});
  }
  return table;
}

ReportTable figure_table(const std::string& heading, const std::string& note, const std::vector<Figure>& figures,
                         const std::vector<std::string>& quantities) {
  ReportTable table;
  table.heading = heading;
  table.note = note;
  table.columns = {{"figure", "", "", false},
                   {"value", "", "", true},
                   {"low", "", "two-sided 95 % limit", true},
                   {"high", "", "two-sided 95 % limit", true},
                   {"unit", "", "", false},
                   {"note", "", "", false}};
  for (const Figure& f : figures) {
    if (starts_with_any(f.name, quantities))
      table.rows.push_back(
          {f.name, number_or_dash(f.value), number_or_dash(f.low), number_or_dash(f.high), f.unit, f.note});
  }
  return table;
}

std::vector<ReportBlock> rate_charts(const RateScan& scan, const StationPlan& plan, const StationFacts& facts) {
  std::vector<ReportBlock> blocks;
  ReportChart levels = scan_chart(scan, plan, facts, ScanAxis::Level);
  levels.heading = "Background rate against level";
  levels.note =
      "Bars are 95 % limits. All points of a trigger share their live time, so they move together. The slope is d "
      "ln(rate) / d ln(level) at the level in use.";
  const bool calibrated = facts.height_counts_per_vem && facts.area_counts_per_vem;
  const char* label = calibrated ? "level, or sum, per channel (VEM)" : "factor on the level or sum";
  levels.x = {label, level_scale(levels), {}, {}};
  if (!levels.series.empty()) blocks.emplace_back(std::move(levels));
  ReportChart samples = scan_chart(scan, plan, facts, ScanAxis::SamplesOver);
  samples.heading = "Background rate against samples over";
  samples.note = "The minimum of samples over in the window that a channel needs; everything else as in use.";
  samples.x = {"samples over (samples)", AxisScale::Linear, {}, {}};
  if (!samples.series.empty()) blocks.emplace_back(std::move(samples));
  return blocks;
}

ReportText notes_block(const Summary& summary) { return {"Notes and limits of validity", summary.notes}; }

std::string synthetic_background_limits() {
  return "The synthetic background of this version holds atmospheric muons and electronic noise; electrons, photons, "
         "decay electrons and small showers "
         "are left out, so measured rates at low levels lie above these (docs/physics.md).";
}

std::string value_with_limits(const Figure& figure) {
  if (!figure.value) return "not measured";
  const std::string unit = figure.unit.empty() ? "" : " " + figure.unit;
  if (!figure.low || !figure.high) return number_text(*figure.value) + unit;
  return fmt::format("{} ({} to {}){}", number_text(*figure.value), number_text(*figure.low), number_text(*figure.high),
                     unit);
}

std::vector<std::string> verdict_lines(const Summary& summary) {
  std::vector<std::string> lines{verdict_sentence(summary)};
  for (const RequirementOutcome& r : summary.requirements) {
    lines.push_back(fmt::format(
        "  {:<10} {:<24} {}: {}", r.verdict, r.name, r.bound,
        r.value ? fmt::format("{} ({} to {})", number_text(*r.value), number_or_dash(r.low), number_or_dash(r.high))
                : "not measured"));
    if (!r.reason.empty()) lines.push_back("             " + r.reason);
  }
  return lines;
}

}  // namespace cistern
