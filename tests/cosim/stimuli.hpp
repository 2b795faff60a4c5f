#pragma once
/// \file
/// Traces made to sit on the boundaries of a given trigger: bursts with exactly one count, one
/// sample or one channel too few, just enough, or one more; random walks along the level; pulses
/// with exponential tails.
#include <cstddef>

#include "firmware_model/trigger/settings.hpp"
#include "traces/base/random.hpp"
#include "traces/waveform/codes.hpp"

namespace cistern {

/// 12-bit codes (rarely 15 bits with both rails) for the channels of `condition`.
[[nodiscard]] Codes boundary_trace(const ConditionSettings& condition, std::size_t samples, RandomStream& stream);

}  // namespace cistern
