/// \file
/// From triggers as written to triggers in counts and samples.
#include "bench/scenario/tables.hpp"
#include "traces/base/rounding.hpp"
#include "traces/base/time.hpp"

namespace cistern {
namespace {

[[noreturn]] void refuse(const TriggerPlan& plan, const std::string& what) {
  throw InputError(plan.place, "trigger." + plan.name + what);
}

std::int32_t samples_of(const TriggerPlan& plan, const char* key, const std::optional<std::int32_t>& samples,
                        const std::optional<double>& ns, double rate_mhz) {
  const std::int64_t value = samples ? *samples : samples_in_ns(ns.value_or(0), rate_mhz);
  if (value < 1 || value > 65536)
    refuse(plan, fmt::format(".{}: comes to {} samples, expected 1 to 65536", key, value));
  return static_cast<std::int32_t>(value);
}

const std::vector<double>& vem_of(const TriggerPlan& plan, const char* key, const char* needed,
                                  const std::optional<std::vector<double>>& counts_per_vem) {
  if (!counts_per_vem) refuse(plan, fmt::format(".{}: needs [calibration] {}; expected it, or counts", key, needed));
  return *counts_per_vem;
}

template <typename Count>
std::vector<Count> counts_of(const std::optional<std::vector<Count>>& counts,
                             const std::optional<std::vector<double>>& vem, const std::vector<double>& counts_per_vem,
                             std::int32_t channels) {
  if (counts) return spread_over_channels(*counts, channels);
  std::vector<Count> rounded;
  const auto each = spread_over_channels(*vem, channels);
  for (std::size_t c = 0; c < each.size(); ++c)
    rounded.push_back(static_cast<Count>(round_half_up(each[c] * counts_per_vem[c])));
  return rounded;
}

std::vector<bool> mask_of(const TriggerPlan& plan, std::int32_t channels) {
  std::vector<bool> mask(static_cast<std::size_t>(channels), plan.channels.empty());
  for (const std::int32_t channel : plan.channels) mask[static_cast<std::size_t>(channel)] = true;
  return mask;
}

void fill_condition(const TriggerPlan& plan, const StationFacts& facts, double rate_mhz, std::int32_t channels,
                    ConditionSettings& condition) {
  static const std::vector<double> none;
  condition.level_counts.assign(static_cast<std::size_t>(channels), 0);
  condition.sum_counts.assign(static_cast<std::size_t>(channels), 0);
  if (plan.kind == TriggerKind::BoxcarSum) {
    condition.length_samples = samples_of(plan, "length_ns", plan.length_samples, plan.length_ns, rate_mhz);
    condition.sum_counts = counts_of(
        plan.sum_counts, plan.sum_vem,
        plan.sum_vem ? vem_of(plan, "sum_vem", "area_counts_per_vem", facts.area_counts_per_vem) : none, channels);
    return;
  }
  condition.level_counts =
      counts_of(plan.level_counts, plan.level_vem,
                plan.level_vem ? vem_of(plan, "level_vem", "height_counts_per_vem", facts.height_counts_per_vem) : none,
                channels);
  if (plan.kind == TriggerKind::Threshold) return;
  condition.window_samples = samples_of(plan, "window_ns", plan.window_samples, plan.window_ns, rate_mhz);
  condition.min_samples_over = samples_of(plan, "min_ns_over", plan.min_samples_over, plan.min_ns_over, rate_mhz);
  if (condition.min_samples_over > condition.window_samples) {
    refuse(plan, fmt::format(".min_samples_over: comes to {}, expected at most the window, which is {} samples",
                             condition.min_samples_over, condition.window_samples));
  }
}

}  // namespace

StationFacts facts_of(const Scenario& scenario) {
  if (scenario.digitizer.baseline_counts.empty()) {
    throw InputError(scenario.path.string(),
                     "[digitizer] has no baseline_counts; expected it (only a trace file could say it instead)");
  }
  return {scenario.digitizer.baseline_counts, scenario.calibration.height_counts_per_vem,
          scenario.calibration.area_counts_per_vem};
}

std::vector<TriggerSettings> resolve_triggers(const Scenario& scenario, const StationFacts& facts) {
  std::vector<TriggerSettings> triggers;
  const std::int32_t channels = scenario.digitizer.channels;
  for (const TriggerPlan& plan : scenario.triggers) {
    TriggerSettings settings;
    settings.name = plan.name;
    settings.role = plan.role;
    settings.firing = plan.firing;
    settings.condition.kind = plan.kind;
    settings.condition.baseline_counts = facts.baseline_counts;
    settings.condition.channel_enabled = mask_of(plan, channels);
    settings.condition.majority = plan.majority;
    fill_condition(plan, facts, scenario.digitizer.sample_rate_mhz, channels, settings.condition);
    triggers.push_back(std::move(settings));
  }
  return triggers;
}

}  // namespace cistern
