#pragma once
/// \file
/// The two halves of turning a trigger as written into counts and samples. Internal to bench/scenario.
#include "bench/scenario/scenario.hpp"

namespace cistern {

/// A level above every code; and more than the longest window can sum up (65,536 x 32,767).
inline constexpr std::int64_t largest_level_counts = 32768;
inline constexpr std::int64_t largest_sum_counts = 4'000'000'000;

/// Window, samples over and length, from samples or ns. InputError where one leaves its range.
void resolve_lengths(const TriggerPlan& plan, double rate_mhz, ConditionSettings& condition);

/// Levels and sums, one per channel, from counts or VEM. InputError where a calibration is missing or a
/// value leaves its range.
void resolve_levels(const TriggerPlan& plan, const StationFacts& facts, std::int32_t channels,
                    ConditionSettings& condition);

}  // namespace cistern
