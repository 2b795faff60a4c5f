#pragma once
/// \file
/// One station as every experiment sees it: its digitizer, its triggers in counts and samples, and
/// (where the scenario describes a tank) what makes its traces.
#include <cstdint>
#include <vector>

#include "bench/scenario/scenario.hpp"

namespace cistern {

/// How much of the scenario's statistics to collect.
enum class Effort { Full, Quick };

struct StationPlan {
  DigitizerConfig digitizer;  ///< baselines and gains filled in, one per channel
  std::vector<TriggerSettings> triggers;
  std::int64_t longest_reach_samples{1};
  std::int64_t longest_hold_off_samples{0};
};

[[nodiscard]] StationPlan plan_station(const Scenario& scenario, const StationFacts& facts);

/// The same triggers with prescale 1: for efficiencies on separate test traces, and for stretches
/// of live time that are prescaled when they are joined in order.
[[nodiscard]] std::vector<TriggerSettings> without_prescale(std::vector<TriggerSettings> triggers);

}  // namespace cistern
