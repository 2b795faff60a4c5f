#include "bench/experiments/boundary_stimuli.hpp"

#include <fmt/format.h>

#include <algorithm>
#include <functional>

namespace cistern {
namespace {

/// Channels that may count, first ones first.
std::vector<std::size_t> enabled_channels(const ConditionSettings& condition) {
  std::vector<std::size_t> channels;
  for (std::size_t c = 0; c < condition.channel_enabled.size(); ++c) {
    if (condition.channel_enabled[c]) channels.push_back(c);
  }
  return channels;
}

/// Makes traces for one condition; idle samples hold the largest code that is not over, or the baseline.
class Bench {
 public:
  Bench(const ConditionSettings& condition, const DigitizerConfig& digitizer)
      : condition_(condition), largest_(largest_code(digitizer)), channels_(enabled_channels(condition)) {}

  [[nodiscard]] std::int32_t level_code(std::size_t c) const {
    return condition_.baseline_counts[c] + condition_.level_counts[c];
  }

  /// Room for an idle sample below the level and an over one at it, on every channel.
  [[nodiscard]] bool has_room_around_level() const {
    return std::all_of(channels_.begin(), channels_.end(),
                       [&](std::size_t c) { return level_code(c) >= 1 && level_code(c) <= largest_; });
  }

  [[nodiscard]] std::int32_t idle(std::size_t c) const {
    if (condition_.kind == TriggerKind::BoxcarSum) return condition_.baseline_counts[c];
    return std::clamp(std::min(condition_.baseline_counts[c], level_code(c) - 1), 0, largest_);
  }

  /// `count` channels with `value(channel)` at the samples in `at`, all else idle.
  [[nodiscard]] Codes trace(std::size_t count, std::size_t samples, const std::vector<std::size_t>& at,
                            const std::function<std::int32_t(std::size_t)>& value) const {
    Codes codes(condition_.baseline_counts.size(), samples);
    for (std::size_t c = 0; c < codes.channels(); ++c) {
      std::fill(codes.channel(c).begin(), codes.channel(c).end(), static_cast<std::int16_t>(idle(c)));
    }
    for (std::size_t i = 0; i < count && i < channels_.size(); ++i) {
      for (const std::size_t s : at) codes.channel(channels_[i])[s] = static_cast<std::int16_t>(value(channels_[i]));
    }
    return codes;
  }

  [[nodiscard]] const std::vector<std::size_t>& channels() const noexcept { return channels_; }
  [[nodiscard]] std::size_t majority() const { return static_cast<std::size_t>(condition_.majority); }

 private:
  const ConditionSettings& condition_;
  std::int32_t largest_;
  std::vector<std::size_t> channels_;
};

std::vector<std::size_t> run_of(std::size_t first, std::size_t count) {
  std::vector<std::size_t> at(count);
  for (std::size_t i = 0; i < count; ++i) at[i] = first + i;
  return at;
}

std::vector<BoundaryStimulus> level_stimuli(const ConditionSettings& condition, const Bench& bench) {
  const auto enough =
      static_cast<std::size_t>(condition.kind == TriggerKind::Threshold ? 1 : condition.min_samples_over);
  const std::size_t lead = static_cast<std::size_t>(reach_samples(condition)) + 2;
  const std::size_t samples = 2 * lead + enough;
  const auto at_level = [&](std::size_t c) { return bench.level_code(c); };
  const auto below_level = [&](std::size_t c) { return bench.level_code(c) - 1; };
  const std::size_t majority = bench.majority();
  std::vector<BoundaryStimulus> stimuli;
  stimuli.push_back({fmt::format("{} samples at the level on {} channels", enough, majority), true,
                     bench.trace(majority, samples, run_of(lead, enough), at_level)});
  stimuli.push_back({fmt::format("{} samples one count below the level on {} channels", enough, majority), false,
                     bench.trace(majority, samples, run_of(lead, enough), below_level)});
  stimuli.push_back({fmt::format("{} samples at the level on {} channels", enough, majority - 1), false,
                     bench.trace(majority - 1, samples, run_of(lead, enough), at_level)});
  return stimuli;
}

std::vector<BoundaryStimulus> window_stimuli(const ConditionSettings& condition, const Bench& bench) {
  const auto enough = static_cast<std::size_t>(condition.min_samples_over);
  const auto window = static_cast<std::size_t>(condition.window_samples);
  const std::size_t lead = window + 2;
  const std::size_t samples = 3 * window + enough + 4;
  const auto at_level = [&](std::size_t c) { return bench.level_code(c); };
  std::vector<BoundaryStimulus> stimuli;
  stimuli.push_back({fmt::format("{} samples over on {} channels", enough - 1, bench.majority()), false,
                     bench.trace(bench.majority(), samples, run_of(lead, enough - 1), at_level)});
  if (enough < 2) return stimuli;
  auto just_inside = run_of(lead, enough - 1);
  just_inside.push_back(lead + window - 1);
  auto just_outside = run_of(lead, enough - 1);
  just_outside.push_back(lead + window);
  stimuli.push_back({fmt::format("{} samples over, the last at the window's far edge", enough), true,
                     bench.trace(bench.majority(), samples, just_inside, at_level)});
  stimuli.push_back({fmt::format("{} samples over, the last one sample past the window", enough), false,
                     bench.trace(bench.majority(), samples, just_outside, at_level)});
  return stimuli;
}

/// A trace whose largest sum on the chosen channels is exactly `sum`, spread evenly over the length.
Codes sum_trace(const ConditionSettings& condition, const Bench& bench, std::size_t count, std::int64_t short_by) {
  const auto length = static_cast<std::size_t>(condition.length_samples);
  Codes codes = bench.trace(0, 3 * length + 2, {}, {});
  for (std::size_t i = 0; i < count; ++i) {
    const std::size_t c = bench.channels()[i];
    std::int64_t left = condition.sum_counts[c] - short_by;
    for (std::size_t s = 0; s < length; ++s) {
      const auto samples_left = static_cast<std::int64_t>(length - s);
      const std::int64_t share = (left + samples_left - 1) / samples_left;
      codes.channel(c)[length + s] = static_cast<std::int16_t>(condition.baseline_counts[c] + share);
      left -= share;
    }
  }
  return codes;
}

std::vector<BoundaryStimulus> sum_stimuli(const ConditionSettings& condition, const Bench& bench) {
  const std::size_t majority = bench.majority();
  std::vector<BoundaryStimulus> stimuli;
  stimuli.push_back(
      {fmt::format("the sum exactly, on {} channels", majority), true, sum_trace(condition, bench, majority, 0)});
  stimuli.push_back({fmt::format("the sum less one count, on {} channels", majority), false,
                     sum_trace(condition, bench, majority, 1)});
  stimuli.push_back({fmt::format("the sum exactly, on {} channels", majority - 1), false,
                     sum_trace(condition, bench, majority - 1, 0)});
  return stimuli;
}

bool sums_have_room(const ConditionSettings& condition, const DigitizerConfig& digitizer, const Bench& bench) {
  return std::all_of(bench.channels().begin(), bench.channels().end(), [&](std::size_t c) {
    const std::int64_t most = largest_code(digitizer) - condition.baseline_counts[c];
    return condition.sum_counts[c] >= 2 && condition.sum_counts[c] <= most * condition.length_samples;
  });
}

}  // namespace

std::vector<BoundaryStimulus> boundary_stimuli(const ConditionSettings& condition, const DigitizerConfig& digitizer) {
  const Bench bench(condition, digitizer);
  if (bench.channels().size() < bench.majority()) return {};
  if (condition.kind == TriggerKind::BoxcarSum) {
    return sums_have_room(condition, digitizer, bench) ? sum_stimuli(condition, bench)
                                                       : std::vector<BoundaryStimulus>{};
  }
  if (!bench.has_room_around_level()) return {};
  auto stimuli = level_stimuli(condition, bench);
  if (condition.kind == TriggerKind::TimeOverThreshold) {
    for (auto& stimulus : window_stimuli(condition, bench)) stimuli.push_back(std::move(stimulus));
  }
  return stimuli;
}

std::string why_never_true(const ConditionSettings& condition, const DigitizerConfig& digitizer) {
  const auto channels = enabled_channels(condition);
  const auto can_count = std::count_if(channels.begin(), channels.end(), [&](std::size_t c) {
    const std::int64_t most = largest_code(digitizer) - condition.baseline_counts[c];
    if (condition.kind == TriggerKind::BoxcarSum) return condition.sum_counts[c] <= most * condition.length_samples;
    return condition.level_counts[c] <= most;
  });
  if (can_count >= condition.majority) return {};
  return fmt::format("only {} of its channels can reach their level within {} bits, and majority asks for {}",
                     can_count, digitizer.bits, condition.majority);
}

}  // namespace cistern
