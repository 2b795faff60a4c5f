/// \file
/// The book of captures against a model that walks through every sample and keeps lists instead
/// of closed forms.
#include <gtest/gtest.h>

#include <algorithm>
#include <deque>
#include <optional>
#include <vector>

#include "firmware_model/station/capture_book.hpp"
#include "traces/base/random.hpp"

namespace cistern {
namespace {

constexpr std::uint64_t seed = 77;

/// Buffers in the order in which they were taken: at most the newest is open under Ignore and Extend, the front of
/// `waiting_` is on the bus.
class WalkingStation {
 public:
  explicit WalkingStation(CaptureConfig config) : config_(config), free_(config.buffers) {}

  /// One sample: what ended is moved on, then the sample is judged, then the firing is taken.
  std::optional<CaptureOutcome> walk(bool fires) {
    finish();
    const bool joins = !open_.empty() && config_.overlap != OverlapPolicy::NewBuffer;
    busy += free_ == 0;
    dead += free_ == 0 && !joins;
    const auto outcome = fires ? std::optional(take(joins)) : std::nullopt;
    ++now_;
    return outcome;
  }

  std::int64_t busy{0};
  std::int64_t dead{0};

 private:
  struct Open {
    std::int64_t begin;
    std::int64_t end;
  };

  void finish() {
    while (!open_.empty() && open_.front().end == now_) {
      waiting_.push_back(open_.front().end - open_.front().begin);
      open_.pop_front();
    }
    if (on_bus_ && --clocks_left_ == 0) release();
    while (!on_bus_ && !waiting_.empty()) start_copy();
  }

  void start_copy() {
    const std::int64_t usual = config_.pre_samples + config_.post_samples;
    const std::int64_t length = std::max(usual, waiting_.front());
    waiting_.pop_front();
    on_bus_ = true;
    clocks_left_ = 0;
    while (clocks_left_ * usual < config_.copy_out_samples * length) ++clocks_left_;
    if (clocks_left_ == 0) release();
  }

  void release() {
    on_bus_ = false;
    ++free_;
  }

  CaptureOutcome take(bool joins) {
    if (joins) {
      Open& open = open_.back();
      const std::int64_t wanted = std::min(now_ + config_.post_samples, open.begin + config_.max_samples);
      if (config_.overlap == OverlapPolicy::Ignore || wanted <= open.end) return CaptureOutcome::Merged;
      open.end = wanted;
      return CaptureOutcome::Extended;
    }
    if (free_ == 0) return CaptureOutcome::NoFreeBuffer;
    --free_;
    open_.push_back({std::max<std::int64_t>(0, now_ - config_.pre_samples), now_ + config_.post_samples});
    return CaptureOutcome::Captured;
  }

  CaptureConfig config_;
  std::int64_t free_;
  std::deque<Open> open_;
  std::deque<std::int64_t> waiting_;
  bool on_bus_{false};
  std::int64_t clocks_left_{0};
  std::int64_t now_{0};
};

CaptureConfig random_config(RandomStream& stream) {
  const auto up_to = [&](std::uint32_t most) { return static_cast<std::int64_t>(stream.next_word() % (most + 1)); };
  CaptureConfig config;
  config.pre_samples = up_to(6);
  config.post_samples = 1 + up_to(12);
  config.buffers = 1 + static_cast<std::int32_t>(up_to(4));
  config.copy_out_samples = up_to(1) * up_to(30);
  config.overlap = static_cast<OverlapPolicy>(up_to(2));
  config.max_samples = config.pre_samples + config.post_samples + up_to(20);
  return config;
}

TEST(CaptureBookProperty, equals_a_walk_through_every_sample) {
  constexpr int cases = 600;
  constexpr std::int64_t samples = 2'000;
  std::int64_t firings = 0;
  for (int k = 0; k < cases; ++k) {
    RandomStream stream(seed, Purpose::PropertyTest, static_cast<std::uint64_t>(k));
    const CaptureConfig config = random_config(stream);
    const double firing_chance = stream.uniform(0.005, 0.4);
    CaptureBook book(config);
    WalkingStation walking(config);
    for (std::int64_t s = 0; s < samples; ++s) {
      const bool fires = stream.uniform() < firing_chance;
      const auto expected = walking.walk(fires);
      const auto outcome = fires ? std::optional(book.take(s).outcome) : std::nullopt;
      ASSERT_EQ(outcome, expected) << "seed " << seed << " case " << k << " sample " << s;
      ASSERT_EQ(book.busy_samples(s + 1), walking.busy) << "seed " << seed << " case " << k << " sample " << s;
      ASSERT_EQ(book.dead_samples(s + 1), walking.dead) << "seed " << seed << " case " << k << " sample " << s;
      firings += fires;
    }
  }
  EXPECT_GT(firings, 100'000);
}

TEST(CaptureBookProperty, never_holds_two_captures_in_one_buffer) {
  for (int k = 0; k < 300; ++k) {
    RandomStream stream(seed, Purpose::PropertyTest, static_cast<std::uint64_t>(10'000 + k));
    const CaptureConfig config = random_config(stream);
    CaptureBook book(config);
    for (std::int64_t s = 0; s < 2'000; s += 1 + stream.next_word() % 12) book.take(s);
    std::vector<std::int64_t> free_at(static_cast<std::size_t>(config.buffers), 0);
    std::int64_t bus_free_at = 0;
    for (const Capture& capture : book.captures()) {
      std::int64_t& buffer_free_at = free_at.at(static_cast<std::size_t>(capture.buffer));
      ASSERT_LE(buffer_free_at, capture.firing_sample) << "seed " << seed << " case " << k;
      ASSERT_LE(bus_free_at, capture.copied_from) << "seed " << seed << " case " << k;
      ASSERT_LE(capture.end_sample - capture.first_sample, config.max_samples) << "seed " << seed << " case " << k;
      buffer_free_at = capture.free_at;
      bus_free_at = capture.free_at;
    }
  }
}

}  // namespace
}  // namespace cistern
