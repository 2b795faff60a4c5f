/// \file
/// From triggers as written to triggers in counts and samples.
#include "bench/scenario/resolve.hpp"

#include <cmath>

#include "bench/scenario/tables.hpp"
#include "traces/base/rounding.hpp"
#include "traces/base/time.hpp"

namespace cistern {
namespace {

[[noreturn]] void refuse(const TriggerPlan& plan, const std::string& key, const std::string& what) {
  const auto place = plan.places.find(key);
  complain({place == plan.places.end() ? plan.place : place->second, "trigger." + plan.name + "." + key}, what);
}

std::int32_t samples_of(const TriggerPlan& plan, const char* key, const std::optional<std::int32_t>& samples,
                        const std::optional<double>& ns, double rate_mhz) {
  if (!ns) return samples.value_or(1);
  const std::int64_t value = samples_in_ns(*ns, rate_mhz);
  if (value < 1 || value > 65536) {
    refuse(plan, key,
           fmt::format("got {} ns, which is {} samples at {} MHz, expected 1 to 65536", *ns, value, rate_mhz));
  }
  return static_cast<std::int32_t>(value);
}

/// Of two keys that contradict each other, the one that --set changed, else the first that is written.
std::string key_to_blame(const TriggerPlan& plan, std::initializer_list<const char*> keys) {
  std::string blamed;
  for (const char* key : keys) {
    const auto place = plan.places.find(key);
    if (place == plan.places.end()) continue;
    if (place->second.rfind("--set ", 0) == 0) return key;
    if (blamed.empty()) blamed = key;
  }
  return blamed.empty() ? *keys.begin() : blamed;
}

/// A key in VEM, what it needs, and the largest count that may come of it.
struct VemKey {
  const char* name;
  const char* needs;
  std::int64_t largest_counts;
};

template <typename Count>
std::vector<Count> counts_of(const TriggerPlan& plan, const VemKey& key, const std::vector<double>& vem,
                             const std::optional<std::vector<double>>& counts_per_vem, std::int32_t channels) {
  if (!counts_per_vem) {
    refuse(plan, key.name,
           fmt::format("got {} VEM and no calibration, expected [calibration] {}, or counts instead", vem.front(),
                       key.needs));
  }
  const auto each = spread_over_channels(vem, channels);
  const auto factors = spread_over_channels(*counts_per_vem, channels);
  std::vector<Count> rounded;
  for (std::size_t c = 0; c < each.size(); ++c) {
    const double counts = each[c] * factors[c];
    if (!(std::abs(counts) <= static_cast<double>(key.largest_counts))) {
      refuse(plan, key.name,
             fmt::format("got {} VEM, which is {} counts on channel {}, expected from -{} to {}", each[c], counts, c,
                         key.largest_counts, key.largest_counts));
    }
    rounded.push_back(static_cast<Count>(round_half_up(counts)));
  }
  return rounded;
}

std::vector<bool> mask_of(const TriggerPlan& plan, std::int32_t channels) {
  std::vector<bool> mask(static_cast<std::size_t>(channels), plan.channels.empty());
  for (const std::int32_t channel : plan.channels) mask[static_cast<std::size_t>(channel)] = true;
  return mask;
}

}  // namespace

void resolve_lengths(const TriggerPlan& plan, double rate_mhz, ConditionSettings& condition) {
  condition.length_samples = samples_of(plan, "length_ns", plan.length_samples, plan.length_ns, rate_mhz);
  condition.window_samples = samples_of(plan, "window_ns", plan.window_samples, plan.window_ns, rate_mhz);
  condition.min_samples_over = samples_of(plan, "min_ns_over", plan.min_samples_over, plan.min_ns_over, rate_mhz);
  if (condition.min_samples_over <= condition.window_samples) return;
  refuse(plan, key_to_blame(plan, {"min_samples_over", "min_ns_over", "window_samples", "window_ns"}),
         fmt::format("got {} samples over in a window of {}, expected at most the window (samples)",
                     condition.min_samples_over, condition.window_samples));
}

void resolve_levels(const TriggerPlan& plan, const StationFacts& facts, std::int32_t channels,
                    ConditionSettings& condition) {
  condition.level_counts.assign(static_cast<std::size_t>(channels), 0);
  condition.sum_counts.assign(static_cast<std::size_t>(channels), 0);
  if (plan.level_counts) condition.level_counts = spread_over_channels(*plan.level_counts, channels);
  if (plan.sum_counts) condition.sum_counts = spread_over_channels(*plan.sum_counts, channels);
  if (plan.level_vem) {
    condition.level_counts = counts_of<std::int32_t>(plan, {"level_vem", "height_counts_per_vem", largest_level_counts},
                                                     *plan.level_vem, facts.height_counts_per_vem, channels);
  }
  if (plan.sum_vem) {
    condition.sum_counts = counts_of<std::int64_t>(plan, {"sum_vem", "area_counts_per_vem", largest_sum_counts},
                                                   *plan.sum_vem, facts.area_counts_per_vem, channels);
  }
}

StationFacts facts_of(const Scenario& scenario) {
  if (scenario.digitizer.baseline_counts.empty()) {
    complain({scenario.path.string(), ""},
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
    settings.condition.baseline_counts = spread_over_channels(facts.baseline_counts, channels);
    settings.condition.channel_enabled = mask_of(plan, channels);
    settings.condition.majority = plan.majority;
    resolve_lengths(plan, scenario.digitizer.sample_rate_mhz, settings.condition);
    resolve_levels(plan, facts, channels, settings.condition);
    triggers.push_back(std::move(settings));
  }
  return triggers;
}

}  // namespace cistern
