#pragma once
/// \file
/// A small station with two channels, and codes for it.
#include <cstddef>
#include <cstdint>
#include <vector>

#include "firmware_model/station/station_run.hpp"

namespace cistern {

[[nodiscard]] TriggerSettings threshold_trigger(std::int32_t level_counts, std::int32_t majority);

[[nodiscard]] StationConfig usual_config();

/// Codes at the pedestal with one sample far above it in both channels at each of `places`.
[[nodiscard]] Codes spikes(std::size_t samples, const std::vector<std::size_t>& places);

}  // namespace cistern
