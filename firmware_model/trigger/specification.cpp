#include "firmware_model/trigger/specification.hpp"

#include <algorithm>
#include <utility>

#include "traces/base/errors.hpp"

namespace cistern {

// All three kinds are one rule: measure each sample, sum what was measured over the reach, compare
// with what is needed. Threshold and time over threshold measure "over" as 1 or 0 and need one
// sample or min_samples_over; the boxcar measures counts above baseline.

TriggerSpecification::TriggerSpecification(TriggerSettings settings)
    : settings_(std::move(settings)), reach_(reach_samples(settings_.condition)), stages_(settings_.firing) {
  assert_valid(settings_, settings_.condition.baseline_counts.size());
  reset();
}

void TriggerSpecification::reset() {
  const std::size_t channels = settings_.condition.baseline_counts.size();
  history_.assign(channels, std::vector<std::int64_t>(static_cast<std::size_t>(reach_), 0));
  sum_.assign(channels, 0);
  fulfilled_.assign(channels, false);
  stages_.reset();
  now_ = -1;
  condition_ = false;
}

std::int64_t TriggerSpecification::measure(std::size_t channel, std::int16_t code) const {
  const ConditionSettings& condition = settings_.condition;
  const std::int64_t above_baseline = code - condition.baseline_counts[channel];
  if (condition.kind == TriggerKind::BoxcarSum) return above_baseline;
  return above_baseline >= condition.level_counts[channel] ? 1 : 0;
}

std::int64_t TriggerSpecification::needed(std::size_t channel) const {
  switch (settings_.condition.kind) {
    case TriggerKind::Threshold: return 1;
    case TriggerKind::TimeOverThreshold: return settings_.condition.min_samples_over;
    case TriggerKind::BoxcarSum: return settings_.condition.sum_counts[channel];
  }
  report_bug("known trigger kind", __FILE__, __LINE__);
}

std::int64_t TriggerSpecification::onset() const {
  const std::int64_t oldest = std::max<std::int64_t>(0, now_ - reach_ + 1);
  if (settings_.condition.kind == TriggerKind::BoxcarSum) return oldest;
  for (std::int64_t sample = oldest; sample <= now_; ++sample) {
    for (std::size_t c = 0; c < fulfilled_.size(); ++c) {
      if (fulfilled_[c] && history_[c][static_cast<std::size_t>(sample % reach_)] == 1) return sample;
    }
  }
  report_bug("a channel that fulfils the condition has a sample over", __FILE__, __LINE__);
}

std::optional<Firing> TriggerSpecification::step(std::span<const std::int16_t> codes) {
  CISTERN_ASSERT(codes.size() == history_.size());
  const auto slot = static_cast<std::size_t>(++now_ % reach_);
  for (std::size_t c = 0; c < codes.size(); ++c) {
    const std::int64_t measured = measure(c, codes[c]);
    sum_[c] += measured - std::exchange(history_[c][slot], measured);
    fulfilled_[c] = settings_.condition.channel_enabled[c] && sum_[c] >= needed(c);
  }
  const auto channels = std::count(fulfilled_.begin(), fulfilled_.end(), true);
  const bool was_true = std::exchange(condition_, channels >= settings_.condition.majority);
  const bool fires = condition_ && (!was_true || stages_.refire_sample() == now_);
  if (!fires) return {};
  return Firing{now_, onset(), stages_.judge(now_), now_ < reach_};
}

}  // namespace cistern
