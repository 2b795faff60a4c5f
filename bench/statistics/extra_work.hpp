#pragma once
/// \file
/// What it would take to decide: how much more live time, or how many more trials, until the
/// one-sided limit clears a bound, if the value stays where it is now.
#include <cstdint>
#include <optional>

#include "bench/statistics/counting.hpp"

namespace cistern {

/// Asked for more than this many times the present work, the answer is "none that helps".
inline constexpr double extra_work_factor_max = 1e4;

/// 0 when it is decided already; absent when the rate lies on the bound, or so near that more than
/// extra_work_factor_max times the present live time would be needed, or when there is none yet.
[[nodiscard]] std::optional<double> extra_live_time_s(const BlockCounts& blocks, double bound_hz, double confidence);

/// The same for a proportion, in trials.
[[nodiscard]] std::optional<std::int64_t> extra_trials(std::int64_t successes, std::int64_t trials, double bound,
                                                       double confidence);

}  // namespace cistern
