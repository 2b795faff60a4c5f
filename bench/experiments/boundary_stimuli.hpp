#pragma once
/// \file
/// The smallest traces on either side of a trigger's boundaries.
#include <string>
#include <vector>

#include "firmware_model/digitizer/digitizer.hpp"
#include "firmware_model/trigger/settings.hpp"
#include "traces/waveform/codes.hpp"

namespace cistern {

struct BoundaryStimulus {
  std::string description;
  bool should_fire{false};
  Codes codes;
};

/// Only stimuli that the digitizer can produce: a level outside its range has none.
[[nodiscard]] std::vector<BoundaryStimulus> boundary_stimuli(const ConditionSettings& condition,
                                                             const DigitizerConfig& digitizer);

/// Why the condition can never be true with these codes; empty when it can.
[[nodiscard]] std::string why_never_true(const ConditionSettings& condition, const DigitizerConfig& digitizer);

}  // namespace cistern
