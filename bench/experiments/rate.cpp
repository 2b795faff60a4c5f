/// \file
/// `cistern rate`: the background rate of each trigger against its level and its samples over.
#include <fmt/format.h>

#include <cmath>
#include <memory>
#include <numeric>

#include "bench/experiments/live_figures.hpp"
#include "bench/experiments/report_parts.hpp"
#include "bench/experiments/run_options.hpp"
#include "bench/experiments/run_record.hpp"
#include "bench/report/report.hpp"
#include "bench/results/run_directory.hpp"

namespace cistern {
namespace {

std::string level_text(const RateVariant& variant) {
  const ConditionSettings& condition = variant.settings.condition;
  if (variant.axis == ScanAxis::SamplesOver) return fmt::format("{} samples over", condition.min_samples_over);
  if (condition.kind == TriggerKind::BoxcarSum) return fmt::format("sum {} counts", condition.sum_counts.front());
  return fmt::format("level {} counts", condition.level_counts.front());
}

std::vector<std::string> rate_lines(const RateScan& scan, const StationPlan& plan, const RateConfig& config,
                                    const std::vector<Figure>& figures) {
  std::vector<std::string> lines;
  for (std::size_t t = 0; t < plan.triggers.size(); ++t) {
    lines.push_back(fmt::format("{} ({})", plan.triggers[t].name, name_of(plan.triggers[t].condition.kind)));
    for (std::size_t v = 0; v < scan.variants().size(); ++v) {
      const RateVariant& variant = scan.variants()[v];
      if (variant.trigger != t) continue;
      const std::string scale = variant.axis == ScanAxis::Level ? fmt::format("x {:<5}", variant.x) : "       ";
      lines.push_back(fmt::format("  {} {:<24} {}", scale, level_text(variant), value_with_limits(figures[v])));
    }
    if (const auto slope = level_slope(scan, t)) {
      lines.push_back(
          fmt::format("  slope of ln(rate) against ln(level): {:.1f} +- {:.1f}", slope->value, slope->standard_error));
    }
    if (!config.target_rate_hz) continue;
    const auto factor = factor_for_rate(scan, t, *config.target_rate_hz);
    lines.push_back(factor ? fmt::format("  {} Hz at x {:.3f}", number_text(*config.target_rate_hz), *factor)
                           : fmt::format("  {} Hz is outside this scan", number_text(*config.target_rate_hz)));
  }
  return lines;
}

/// A row per point of the scan; `figures` start with the points in the order of the variants.
ReportTable rate_table(const RateScan& scan, const std::vector<Figure>& figures) {
  ReportTable table;
  table.heading = "Rates";
  table.note =
      "Background firings per second of live time, before any prescale. Limits are two-sided, 95 %, and allow for "
      "the variance over mean of the counts in blocks; summary.json has it for each.";
  table.columns = {{"figure", "", "the name by which a requirement may ask for it", false},
                   {"setting", "", "of the first channel", false},
                   {"firings", "", "", true},
                   {"rate", "Hz", "", true},
                   {"low", "Hz", "", true},
                   {"high", "Hz", "", true}};
  const auto text = [](const std::optional<double>& value) { return value ? number_text(*value) : "-"; };
  for (std::size_t v = 0; v < scan.variants().size(); ++v) {
    const auto& counts = scan.firings_per_block(v);
    const Figure& rate = figures[v];
    table.rows.push_back({rate.name, level_text(scan.variants()[v]),
                          std::to_string(std::accumulate(counts.begin(), counts.end(), std::int64_t{0})),
                          text(rate.value), text(rate.low), text(rate.high)});
  }
  return table;
}

}  // namespace

RunOutcome run_rate(const Scenario& scenario, const RunOptions& options) {
  require_tank("rate", scenario);
  const StationFacts facts = facts_of(scenario);
  const StationPlan plan = plan_station(scenario, facts);
  const TraceGenerator generator(scenario.generator, seed_of(scenario, options));
  const double live_time_s =
      options.effort == Effort::Quick ? scenario.rate.quick_live_time_s : scenario.rate.live_time_s;
  const LiveTimePlan time(live_time_s, scenario.rate.block_s, plan);
  RateScan scan(rate_variants(plan, scenario.rate), time);

  RunDirectory directory(options.out, identity_of("rate", scenario, options));
  CampaignPlan campaign{time.units(),
                        [&](std::int64_t unit) {
                          std::vector<std::unique_ptr<LiveObserver>> observers;
                          observers.push_back(scan.observe(unit));
                          return observe_live_unit(plan, generator, time, unit, std::move(observers));
                        },
                        [&](std::int64_t, std::string_view result) { scan.merge(unpack_observed(result, 1).front()); }};
  RunOutcome outcome;
  outcome.directory = directory.path();
  outcome.interrupted =
      run_campaign(campaign, kept_campaign(directory, "background", options)) == CampaignEnd::Interrupted;
  if (outcome.interrupted) {
    directory.keep_unfinished();
    return outcome;
  }
  outcome.summary = start_summary("rate", scenario, options);
  const auto measured = scan_figures(scan, plan);
  for (const MeasuredFigure& figure : measured) outcome.summary.figures.push_back(figure_of(figure));
  outcome.summary.notes = {synthetic_background_limits()};
  outcome.summary.requirements = judge_all(scenario.requirements, measured);
  outcome.summary.verdict = overall_verdict(outcome.summary.requirements);
  outcome.lines = rate_lines(scan, plan, scenario.rate, outcome.summary.figures);
  Report report = start_report(outcome.summary);
  for (ReportBlock& block : rate_charts(scan, plan, facts)) report.blocks.push_back(std::move(block));
  report.blocks.emplace_back(trigger_table(plan));
  report.blocks.emplace_back(rate_table(scan, outcome.summary.figures));
  report.blocks.emplace_back(
      figure_table("Slopes", "What a drift of gain does: at -10, one per cent of gain is ten per cent of rate.",
                   outcome.summary.figures, {"rate_slope"}));
  report.blocks.emplace_back(notes_block(outcome.summary));
  directory.write_file("report.html", render_report(report));
  directory.finish(outcome.summary);
  return outcome;
}

}  // namespace cistern
