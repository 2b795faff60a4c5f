#include "bench/experiments/station_plan.hpp"

#include <algorithm>

namespace cistern {

StationPlan plan_station(const Scenario& scenario, const StationFacts& facts) {
  StationPlan plan;
  plan.digitizer = scenario.digitizer;
  plan.digitizer.baseline_counts = facts.baseline_counts;
  const auto channels = static_cast<std::size_t>(plan.digitizer.channels);
  if (plan.digitizer.gain.size() != channels) {
    plan.digitizer.gain.assign(channels, plan.digitizer.gain.empty() ? 1.0 : plan.digitizer.gain.front());
  }
  plan.triggers = resolve_triggers(scenario, facts);
  for (const TriggerSettings& trigger : plan.triggers) {
    plan.longest_reach_samples = std::max<std::int64_t>(plan.longest_reach_samples, reach_samples(trigger.condition));
    plan.longest_hold_off_samples = std::max(plan.longest_hold_off_samples, trigger.firing.hold_off_samples);
  }
  return plan;
}

std::vector<TriggerSettings> without_prescale(std::vector<TriggerSettings> triggers) {
  for (TriggerSettings& trigger : triggers) trigger.firing.prescale = 1;
  return triggers;
}

}  // namespace cistern
