#pragma once
/// \file
/// The logic of each trigger without any physics: boundary stimuli with the answer that the settings
/// demand, and random stimuli on which the fast kernel must equal the specification.
#include <cstdint>
#include <string>
#include <vector>

#include "bench/experiments/station_plan.hpp"

namespace cistern {

/// One boundary stimulus.
struct LogicRow {
  std::string trigger;
  std::string stimulus;  ///< "20 samples over inside the window on 2 channels"
  bool should_fire{false};
  bool fired{false};
};

/// Kernel against specification.
struct LogicAgreement {
  std::string trigger;
  std::int64_t samples{0};
  std::int64_t firings{0};
  std::int64_t differences{0};
};

struct LogicCheck {
  std::vector<LogicRow> rows;
  std::vector<LogicAgreement> agreements;
  std::vector<std::string> warnings;  ///< "short can never fire: ..."
  [[nodiscard]] bool passed() const;
};

/// \param seed  of the random stimuli
[[nodiscard]] LogicCheck check_logic(const StationPlan& plan, std::uint64_t seed);

}  // namespace cistern
