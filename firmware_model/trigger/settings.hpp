#pragma once
/// \file
/// What a trigger is told: integers only, in counts and samples, already rounded. Rules: docs/triggers.md.
#include <cstdint>
#include <string>
#include <vector>

namespace cistern {

enum class TriggerKind { Threshold, TimeOverThreshold, BoxcarSum };
enum class TriggerRole { Both, InService, Candidate };

/// What a condition that is still true does when hold-off ends.
enum class Rearm {
  Edge,   ///< it must have been false again before it fires
  Level,  ///< it fires in the first sample after hold-off
};

/// The condition: which samples make a trigger true.
/// All per-channel vectors have one entry per digitizer channel (1 to 16).
struct ConditionSettings {
  TriggerKind kind{TriggerKind::Threshold};
  std::vector<std::int32_t> baseline_counts;  ///< the code of no signal, 0 to 32,767
  std::vector<bool> channel_enabled;          ///< the mask; a disabled channel never counts
  std::vector<std::int32_t> level_counts;     ///< above baseline, equal is over (not boxcar_sum)
  std::int32_t window_samples{1};             ///< time_over_threshold, 1 to 65,536
  std::int32_t min_samples_over{1};           ///< time_over_threshold, 1 to window_samples
  std::int32_t length_samples{1};             ///< boxcar_sum, 1 to 65,536
  std::vector<std::int64_t> sum_counts;       ///< boxcar_sum, counts x samples
  std::int32_t majority{1};                   ///< channels needed, 1 to the number of channels
};

/// What happens to an edge of the condition, in this order: enable, hold-off, prescale.
struct FiringSettings {
  bool enabled{true};
  std::int64_t hold_off_samples{0};
  Rearm rearm{Rearm::Edge};                   ///< Level needs hold_off_samples >= 1
  std::int64_t prescale{1};                   ///< passes the n-th, 2n-th, 3n-th...
};

struct TriggerSettings {
  std::string name;
  TriggerRole role{TriggerRole::Both};
  ConditionSettings condition;
  FiringSettings firing;
};

/// "threshold", "time_over_threshold", "boxcar_sum".
[[nodiscard]] const char* name_of(TriggerKind kind);

/// Samples of the past that the condition looks at, this one included: window, length or 1.
[[nodiscard]] std::int32_t reach_samples(const ConditionSettings& condition);

/// Bug if the settings break a range above or the vectors do not have `channels` entries.
void assert_valid(const TriggerSettings& settings, std::size_t channels);

}  // namespace cistern
