#include "bench/experiments/live_figures.hpp"

#include <fmt/format.h>

#include <cmath>
#include <numeric>

namespace cistern {
namespace {

std::int64_t total(const std::vector<std::int64_t>& counts) {
  return std::accumulate(counts.begin(), counts.end(), std::int64_t{0});
}

/// Only the joined blocks: an empty run has counted nothing yet.
BlockCounts joined_blocks(const std::vector<std::int64_t>& counts, double live_time_s, double block_s) {
  const auto joined = static_cast<std::ptrdiff_t>(std::llround(live_time_s / block_s));
  return {{counts.begin(), counts.begin() + joined}, block_s};
}

void add_set_figures(const BackgroundRun& run, TriggerSet set, double sample_rate_hz,
                     std::vector<MeasuredFigure>& figures) {
  const SetTotals& totals = run.totals(set);
  const std::string subject(name_of(set));
  const double live_s = run.live_time_s();
  figures.push_back({"tag_rate." + subject, "Hz", "captures started, each of which becomes one tag",
                     RateBasis{joined_blocks(totals.captures_per_block, live_s, run.time().block_s())}});
  figures.push_back({"busy_loss." + subject, "",
                     "firings that found no free capture buffer, of those not inside an open capture",
                     ProportionBasis{totals.lost, totals.lost + totals.captures}});
  figures.push_back(
      {"dead_time." + subject, "", "share of live time with no free capture buffer",
       PlainBasis{live_s > 0 ? static_cast<double>(totals.dead_samples) / (sample_rate_hz * live_s) : 0}});
}

/// The scan's points of one trigger against its level, by rising factor.
std::vector<std::size_t> level_points(const RateScan& scan, std::size_t trigger) {
  std::vector<std::size_t> points;
  for (std::size_t v = 0; v < scan.variants().size(); ++v) {
    const RateVariant& variant = scan.variants()[v];
    if (variant.trigger == trigger && variant.axis == ScanAxis::Level) points.push_back(v);
  }
  return points;
}

}  // namespace

std::vector<MeasuredFigure> background_figures(const BackgroundRun& run, const StationPlan& plan) {
  std::vector<MeasuredFigure> figures;
  for (std::size_t t = 0; t < plan.triggers.size(); ++t) {
    const auto blocks = joined_blocks(run.totals(t).firings_per_block, run.live_time_s(), run.time().block_s());
    figures.push_back({"background_rate." + plan.triggers[t].name, "Hz",
                       fmt::format("{} firings in {:.4g} s", total(blocks.counts), run.live_time_s()),
                       RateBasis{blocks}});
  }
  for (const TriggerSet set : trigger_sets) {
    if (!members_of(set, plan.triggers).empty())
      add_set_figures(run, set, plan.digitizer.sample_rate_mhz * 1e6, figures);
  }
  return figures;
}

std::vector<MeasuredFigure> scan_figures(const RateScan& scan, const StationPlan& plan) {
  std::vector<MeasuredFigure> figures;
  for (std::size_t v = 0; v < scan.variants().size(); ++v) {
    const RateVariant& variant = scan.variants()[v];
    const auto& counts = scan.firings_per_block(v);
    figures.push_back({fmt::format("background_rate.{}.{}", plan.triggers[variant.trigger].name, variant.condition),
                       "Hz", fmt::format("{} firings", total(counts)), RateBasis{{counts, scan.time().block_s()}}});
  }
  for (std::size_t t = 0; t < plan.triggers.size(); ++t) {
    const auto slope = level_slope(scan, t);
    figures.push_back(
        {"rate_slope." + plan.triggers[t].name, "",
         slope ? fmt::format("d ln(rate) / d ln(level) at factor 1; standard error {:.2g}", slope->standard_error)
               : "not enough firings on both sides of the level",
         PlainBasis{slope ? slope->value : std::nan("")}});
  }
  return figures;
}

std::optional<Slope> level_slope(const RateScan& scan, std::size_t trigger) {
  std::optional<std::size_t> below;
  std::optional<std::size_t> above;
  for (const std::size_t v : level_points(scan, trigger)) {
    if (total(scan.firings_per_block(v)) == 0) continue;
    if (scan.variants()[v].x < 1) below = v;
    if (scan.variants()[v].x > 1 && !above) above = v;
  }
  if (!below || !above) return {};
  const auto n_below = static_cast<double>(total(scan.firings_per_block(*below)));
  const auto n_above = static_cast<double>(total(scan.firings_per_block(*above)));
  const double span = std::log(scan.variants()[*above].x / scan.variants()[*below].x);
  // The two counts share live time; taking them as independent makes the error too large, not too small.
  return Slope{std::log(n_above / n_below) / span, std::sqrt(1 / n_above + 1 / n_below) / span};
}

std::optional<double> factor_for_rate(const RateScan& scan, std::size_t trigger, double target_hz) {
  const auto points = level_points(scan, trigger);
  const double live_s = scan.time().block_s() * static_cast<double>(scan.time().blocks());
  const auto rate = [&](std::size_t v) { return static_cast<double>(total(scan.firings_per_block(v))) / live_s; };
  for (std::size_t i = 1; i < points.size(); ++i) {
    const double high = rate(points[i - 1]);
    const double low = rate(points[i]);
    if (high < target_hz || low > target_hz || low <= 0 || high <= low) continue;
    const double share = std::log(high / target_hz) / std::log(high / low);
    const double from = scan.variants()[points[i - 1]].x;
    return from * std::pow(scan.variants()[points[i]].x / from, share);
  }
  return {};
}

}  // namespace cistern
