#include "firmware_model/trigger/settings.hpp"

#include <algorithm>

#include "traces/base/errors.hpp"

namespace cistern {
namespace {

constexpr std::int32_t longest_reach = 65'536;
constexpr std::int32_t highest_code = 32'767;  // 15 bits

bool in_range(std::int64_t value, std::int64_t low, std::int64_t high) { return value >= low && value <= high; }

void assert_valid_condition(const ConditionSettings& condition, std::size_t channels) {
  CISTERN_ASSERT(in_range(static_cast<std::int64_t>(channels), 1, 16));
  CISTERN_ASSERT(condition.baseline_counts.size() == channels && condition.channel_enabled.size() == channels);
  for (const std::int32_t baseline : condition.baseline_counts) CISTERN_ASSERT(in_range(baseline, 0, highest_code));
  CISTERN_ASSERT(in_range(condition.majority, 1, static_cast<std::int64_t>(channels)));
  if (condition.kind == TriggerKind::BoxcarSum) {
    CISTERN_ASSERT(condition.sum_counts.size() == channels);
    CISTERN_ASSERT(in_range(condition.length_samples, 1, longest_reach));
    return;
  }
  CISTERN_ASSERT(condition.level_counts.size() == channels);
  CISTERN_ASSERT(in_range(condition.window_samples, 1, longest_reach));
  CISTERN_ASSERT(in_range(condition.min_samples_over, 1, condition.window_samples));
}

}  // namespace

const char* name_of(TriggerKind kind) {
  switch (kind) {
    case TriggerKind::Threshold: return "threshold";
    case TriggerKind::TimeOverThreshold: return "time_over_threshold";
    case TriggerKind::BoxcarSum: return "boxcar_sum";
  }
  report_bug("known trigger kind", __FILE__, __LINE__);
}

std::int32_t reach_samples(const ConditionSettings& condition) {
  switch (condition.kind) {
    case TriggerKind::Threshold: return 1;
    case TriggerKind::TimeOverThreshold: return condition.window_samples;
    case TriggerKind::BoxcarSum: return condition.length_samples;
  }
  report_bug("known trigger kind", __FILE__, __LINE__);
}

void assert_valid(const TriggerSettings& settings, std::size_t channels) {
  assert_valid_condition(settings.condition, channels);
  CISTERN_ASSERT(settings.firing.hold_off_samples >= 0 && settings.firing.prescale >= 1);
  CISTERN_ASSERT(settings.firing.rearm == Rearm::Edge || settings.firing.hold_off_samples >= 1);
}

}  // namespace cistern
