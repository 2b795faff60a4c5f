#include "tests/cosim/stimuli.hpp"

#include <algorithm>
#include <cmath>
#include <cstdint>
#include <vector>

#include "tests/cosim/random_triggers.hpp"

namespace cistern {
namespace {

/// Paints stretches of one trace from left to right.
class TracePainter {
 public:
  TracePainter(const ConditionSettings& condition, std::size_t samples, RandomStream& stream)
      : condition_(condition),
        stream_(stream),
        codes_(condition.baseline_counts.size(), samples),
        samples_(static_cast<std::int64_t>(samples)),
        noise_counts_(between(stream, 0, 2)),
        largest_code_(one_in(stream, 10) ? 32'767 : 4'095) {
    for (std::size_t c = 0; c < condition.channel_enabled.size(); ++c) {
      if (condition.channel_enabled[c]) enabled_.push_back(c);
      for (std::int64_t s = 0; s < samples_; ++s) set_height(c, s, between(stream, -noise_counts_, noise_counts_));
    }
  }

  Codes paint() {
    std::int64_t at = between(stream_, 0, 3);
    while (at < samples_) {
      at += paint_stretch(at);
      at += one_in(stream_, 3) ? between(stream_, 0, reach()) : reach() + between(stream_, 0, 3);
    }
    return std::move(codes_);
  }

 private:
  [[nodiscard]] std::int64_t reach() const { return reach_samples(condition_); }

  /// Height at which a channel sits on its boundary.
  [[nodiscard]] std::int64_t critical_height(std::size_t c) const {
    if (condition_.kind == TriggerKind::BoxcarSum) return condition_.sum_counts[c] / condition_.length_samples;
    return condition_.level_counts[c];
  }

  [[nodiscard]] std::int64_t height(std::size_t c, std::int64_t s) const {
    return codes_.channel(c)[static_cast<std::size_t>(s)] - condition_.baseline_counts[c];
  }

  void set_height(std::size_t c, std::int64_t s, std::int64_t value) {
    if (s < 0 || s >= samples_) return;
    const std::int64_t code = std::clamp<std::int64_t>(condition_.baseline_counts[c] + value, 0, largest_code_);
    codes_.channel(c)[static_cast<std::size_t>(s)] = static_cast<std::int16_t>(code);
  }

  /// \return samples painted
  std::int64_t paint_stretch(std::int64_t at) {
    const std::int64_t choice = between(stream_, 0, 99);
    if (choice < 12) return paint_walk(at);
    if (choice < 24) return paint_pulse(at);
    if (choice < 26) return paint_rails(at);
    switch (condition_.kind) {
      case TriggerKind::Threshold:
        return paint_threshold_burst(at);
      case TriggerKind::TimeOverThreshold:
        return paint_window_burst(at);
      case TriggerKind::BoxcarSum:
        return paint_sum_burst(at);
    }
    return 1;
  }

  /// A walk of steps -1, 0, +1 that stays within three counts of the critical height.
  std::int64_t paint_walk(std::int64_t at) {
    const std::int64_t length = between(stream_, 10, std::min<std::int64_t>(3 * reach() + 20, 400));
    for (const std::size_t c : enabled_) {
      std::int64_t offset = between(stream_, -3, 3);
      for (std::int64_t s = at; s < at + length; ++s) {
        set_height(c, s, critical_height(c) + offset);
        offset = std::clamp<std::int64_t>(offset + between(stream_, -1, 1), -3, 3);
      }
    }
    return length;
  }

  /// Light in all channels at once, of different size, with one decay time.
  std::int64_t paint_pulse(std::int64_t at) {
    const double decay_samples = stream_.uniform(1.0, 12.0);
    const auto length = static_cast<std::int64_t>(6.0 * decay_samples);
    for (const std::size_t c : enabled_) {
      const auto typical = static_cast<double>(std::clamp<std::int64_t>(critical_height(c), 4, 1'000));
      const double peak = stream_.exponential(3.0 * typical);
      for (std::int64_t k = 0; k < length; ++k) {
        set_height(c, at + k, std::lround(peak * std::exp(-static_cast<double>(k) / decay_samples)));
      }
    }
    return length;
  }

  /// The smallest and the largest code.
  std::int64_t paint_rails(std::int64_t at) {
    const std::int64_t length = between(stream_, 1, 8);
    for (const std::size_t c : enabled_) {
      const bool high = one_in(stream_, 2);
      for (std::int64_t s = at; s < at + length; ++s) set_height(c, s, high ? largest_code_ : -largest_code_);
    }
    return length;
  }

  /// The enabled channels in random order, so that the first ones are a random choice.
  std::vector<std::size_t> shuffled_channels() {
    std::vector<std::size_t> order = enabled_;
    for (std::size_t k = order.size(); k > 1; --k) {
      std::swap(order[k - 1], order[static_cast<std::size_t>(between(stream_, 0, static_cast<std::int64_t>(k) - 1))]);
    }
    return order;
  }

  /// Channels that reach their boundary: one too few, just enough, one more.
  std::size_t channels_that_reach() {
    const std::int64_t wanted = condition_.majority + between(stream_, -1, 1);
    return static_cast<std::size_t>(std::clamp<std::int64_t>(wanted, 0, static_cast<std::int64_t>(enabled_.size())));
  }

  std::int64_t paint_threshold_burst(std::int64_t at) {
    const std::size_t reaching = channels_that_reach();
    const std::int64_t length = between(stream_, 1, 3);
    std::size_t place = 0;
    for (const std::size_t c : shuffled_channels()) {
      const std::int64_t offset = place++ < reaching ? between(stream_, 0, 1) : -1;
      for (std::int64_t s = at; s < at + length; ++s) set_height(c, s, critical_height(c) + offset);
    }
    return length;
  }

  /// min_samples_over - 1, min_samples_over or one more samples at the level, spread over the
  /// window or one sample more or less; the channels that miss do so by one count or one sample.
  std::int64_t paint_window_burst(std::int64_t at) {
    const std::size_t reaching = channels_that_reach();
    const std::int64_t span = std::max<std::int64_t>(1, condition_.window_samples + between(stream_, -1, 1));
    const bool misses_by_count = one_in(stream_, 2);
    std::size_t place = 0;
    for (const std::size_t c : shuffled_channels()) {
      const bool reaches = place++ < reaching;
      std::int64_t over = condition_.min_samples_over + (one_in(stream_, 4) ? 1 : 0);
      if (!reaches && !misses_by_count) over = condition_.min_samples_over - 1;
      const std::int64_t offset = !reaches && misses_by_count ? -1 : 0;
      paint_spread(c, at, span, std::min(over, span), offset);
    }
    return span;
  }

  /// `count` of `span` samples at the level + offset, the others below the level.
  void paint_spread(std::size_t c, std::int64_t at, std::int64_t span, std::int64_t count, std::int64_t offset) {
    const std::int64_t level = condition_.level_counts[c];
    const std::vector<bool> is_over = random_pattern(span, count);
    for (std::int64_t k = 0; k < span; ++k) {
      const bool over = is_over[static_cast<std::size_t>(k)];
      set_height(c, at + k, over ? level + offset : std::min(height_or_zero(c, at + k), level - 1));
    }
  }

  /// `count` of `span` places: the first, then the last, then a random choice of those between
  /// (selection sampling, Knuth, The Art of Computer Programming 2, 3.4.2, algorithm S).
  std::vector<bool> random_pattern(std::int64_t span, std::int64_t count) {
    std::vector<bool> pattern(static_cast<std::size_t>(span), false);
    if (count > 0) pattern.front() = true;
    if (count > 1) pattern.back() = true;
    std::int64_t left = count - 2;
    for (std::int64_t k = 1; k < span - 1 && left > 0; ++k) {
      if (between(stream_, 1, span - 1 - k) > left) continue;
      pattern[static_cast<std::size_t>(k)] = true;
      --left;
    }
    return pattern;
  }

  [[nodiscard]] std::int64_t height_or_zero(std::size_t c, std::int64_t s) const {
    return s < samples_ ? height(c, s) : 0;
  }

  /// Sums over one length that end at their value, one below or one above it, whatever was there.
  std::int64_t paint_sum_burst(std::int64_t at) {
    const std::size_t reaching = channels_that_reach();
    const std::int64_t length = condition_.length_samples;
    const std::int64_t painted = between(stream_, 1, length);
    const std::int64_t last = at + painted - 1;
    if (last >= samples_) return painted;
    std::size_t place = 0;
    for (const std::size_t c : shuffled_channels()) {
      const std::int64_t offset = place++ < reaching ? between(stream_, 0, 1) : -1;
      std::int64_t missing = condition_.sum_counts[c] + offset;
      for (std::int64_t s = std::max<std::int64_t>(0, last - length + 1); s < at; ++s) missing -= height(c, s);
      for (std::int64_t k = 0; k < painted; ++k) {
        const std::int64_t share = missing / (painted - k);
        set_height(c, at + k, share);
        missing -= height(c, at + k);
      }
    }
    return painted;
  }

  const ConditionSettings& condition_;
  RandomStream& stream_;
  Codes codes_;
  std::int64_t samples_;
  std::int64_t noise_counts_;
  std::int64_t largest_code_;
  std::vector<std::size_t> enabled_;
};

}  // namespace

Codes boundary_trace(const ConditionSettings& condition, std::size_t samples, RandomStream& stream) {
  return TracePainter(condition, samples, stream).paint();
}

}  // namespace cistern
