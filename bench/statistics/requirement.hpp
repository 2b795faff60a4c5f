#pragma once
/// \file
/// Met, not met or undecided, from one-sided limits at the requirement's confidence.
#include <string_view>

#include "bench/statistics/intervals.hpp"

namespace cistern {

enum class Verdict { Met, Undecided, NotMet };  ///< in order: the later is the worse

[[nodiscard]] std::string_view name_of(Verdict verdict);  ///< "met", "undecided", "not met"

/// "at most bound": met when the upper limit is at or below it, not met when the lower limit is
/// above it. \param one_sided  each end a one-sided limit of its own. A NaN end decides nothing.
[[nodiscard]] Verdict judge_at_most(const Limits& one_sided, double bound);

/// "at least bound": met when the lower limit is at or above it, not met when the upper is below.
[[nodiscard]] Verdict judge_at_least(const Limits& one_sided, double bound);

}  // namespace cistern
