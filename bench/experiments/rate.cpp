/// \file
/// `cistern rate`: the background rate of each trigger against its level and its samples over.
#include <fmt/format.h>

#include <cmath>
#include <memory>

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
  report.blocks.emplace_back(figure_table("Rates", "Background firings per second of live time, before any prescale.",
                                          outcome.summary.figures, {"background_rate", "rate_slope"}));
  report.blocks.emplace_back(notes_block(outcome.summary));
  directory.write_file("report.html", render_report(report));
  directory.finish(outcome.summary);
  return outcome;
}

}  // namespace cistern
