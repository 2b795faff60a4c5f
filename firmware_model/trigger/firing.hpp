#pragma once
/// \file
/// What a trigger reports.
#include <cstdint>
#include <string_view>

namespace cistern {

/// Passed, or the first stage that stopped the firing.
enum class FiringStatus { Passed, Disabled, HeldOff, Prescaled, Busy };

/// "passed", "disabled", "held_off", "prescaled", "busy".
[[nodiscard]] std::string_view name_of(FiringStatus status);

/// A sample where the condition is true and was false before (or a re-firing by Rearm::Level).
struct Firing {
  std::int64_t sample{0};           ///< counted from the last reset of the trigger
  /// Earliest over-sample in the window among the channels that made the condition true; for
  /// boxcar_sum: sample - length + 1, at least 0.
  std::int64_t onset_sample{0};
  FiringStatus status{FiringStatus::Passed};
  bool start_unknown{false};        ///< the window reaches before the first sample since the reset
  bool operator==(const Firing&) const = default;
};

}  // namespace cistern
