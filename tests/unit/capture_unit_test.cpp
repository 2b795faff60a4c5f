#include "firmware_model/station/capture_unit.hpp"

#include <gtest/gtest.h>

#include <algorithm>
#include <array>
#include <vector>

#include "firmware_model/station/sample_ring.hpp"
#include "traces/base/random.hpp"

namespace cistern {
namespace {

/// Two channels whose codes tell their sample: s and 1000 + s.
std::array<std::int16_t, 2> telling(std::int64_t s) {
  return {static_cast<std::int16_t>(s), static_cast<std::int16_t>(1000 + s)};
}

TEST(SampleRing, gives_back_the_newest_samples) {
  SampleRing ring(2, 5);
  for (std::int64_t s = 0; s < 13; ++s) ring.store(telling(s));
  Codes codes(2, 5);
  ring.copy_from(9, codes);
  for (std::size_t k = 0; k < 4; ++k) {
    EXPECT_EQ(codes.channel(0)[k], 9 + static_cast<std::int16_t>(k));
    EXPECT_EQ(codes.channel(1)[k], 1009 + static_cast<std::int16_t>(k));
  }
}

TEST(SampleRing, knows_its_oldest_sample) {
  SampleRing ring(2, 5);
  EXPECT_EQ(ring.oldest(), 0);
  for (std::int64_t s = 0; s < 5; ++s) ring.store(telling(s));
  EXPECT_EQ(ring.oldest(), 0);
  ring.store(telling(5));
  EXPECT_EQ(ring.oldest(), 1);
}

TEST(SampleRingDeathTest, refuses_samples_it_no_longer_has) {
  SampleRing ring(2, 5);
  for (std::int64_t s = 0; s < 6; ++s) ring.store(telling(s));
  Codes codes(2, 6);
  EXPECT_DEATH(ring.copy_from(0, codes), "oldest");
}

CaptureConfig small() {
  return {.pre_samples = 3, .post_samples = 5, .buffers = 2, .copy_out_samples = 4, .max_samples = 16};
}

std::vector<StationCapture> captures_of(CaptureUnit& unit, const std::vector<std::int64_t>& firings,
                                        std::int64_t samples) {
  for (std::int64_t s = 0; s < samples; ++s) {
    unit.store(telling(s));
    for (const std::int64_t firing : firings) {
      if (firing == s) unit.fire();
    }
  }
  return unit.finish();
}

void expect_samples(const StationCapture& capture, std::int64_t first, std::int64_t end) {
  ASSERT_EQ(capture.codes.samples(), static_cast<std::size_t>(end - first));
  for (std::int64_t s = first; s < end; ++s) {
    ASSERT_EQ(capture.codes.view().channel(0)[static_cast<std::size_t>(s - first)], s);
    ASSERT_EQ(capture.codes.view().channel(1)[static_cast<std::size_t>(s - first)], 1000 + s);
  }
}

TEST(CaptureUnit, holds_the_samples_around_the_firing) {
  CaptureUnit unit(small(), 2, 4);
  const auto captures = captures_of(unit, {20}, 100);
  ASSERT_EQ(captures.size(), 1U);
  EXPECT_TRUE(captures[0].complete);
  expect_samples(captures[0], 17, 25);
}

TEST(CaptureUnit, holds_fewer_samples_at_the_start) {
  CaptureUnit unit(small(), 2, 4);
  const auto captures = captures_of(unit, {1}, 100);
  EXPECT_TRUE(captures[0].complete);
  expect_samples(captures[0], 0, 6);
}

TEST(CaptureUnit, marks_a_capture_that_the_end_cut) {
  CaptureUnit whole(small(), 2, 4);
  EXPECT_TRUE(captures_of(whole, {20}, 25)[0].complete);
  CaptureUnit cut(small(), 2, 4);
  const auto captures = captures_of(cut, {20}, 24);
  EXPECT_FALSE(captures[0].complete);
  expect_samples(captures[0], 17, 24);
}

TEST(CaptureUnit, fills_overlapping_captures_each_in_its_buffer) {
  CaptureConfig config = small();
  config.overlap = OverlapPolicy::NewBuffer;
  CaptureUnit unit(config, 2, 4);
  const auto captures = captures_of(unit, {20, 22}, 100);
  ASSERT_EQ(captures.size(), 2U);
  expect_samples(captures[0], 17, 25);
  expect_samples(captures[1], 19, 27);
}

TEST(CaptureUnit, fills_an_extended_capture_to_its_new_end) {
  CaptureConfig config = small();
  config.overlap = OverlapPolicy::Extend;
  CaptureUnit unit(config, 2, 4);
  const auto captures = captures_of(unit, {20, 24}, 100);
  ASSERT_EQ(captures.size(), 1U);
  expect_samples(captures[0], 17, 29);
}

/// Random firings; what the buffers really held, against what the book said and against a plain count.
TEST(CaptureUnit, keeps_what_the_book_says_in_every_policy) {
  constexpr std::uint64_t seed = 5;
  for (std::uint64_t k = 0; k < 300; ++k) {
    RandomStream stream(seed, Purpose::PropertyTest, k);
    CaptureConfig config = small();
    config.overlap = static_cast<OverlapPolicy>(k % 3);
    config.buffers = 1 + static_cast<std::int32_t>(stream.next_word() % 3);
    config.copy_out_samples = stream.next_word() % 12;
    CaptureUnit unit(config, 2, 4 + stream.next_word() % 3);
    CaptureBook book(config);
    for (std::int64_t s = 0; s < 1'000; ++s) {
      unit.store(telling(s));
      ASSERT_EQ(unit.is_busy(), !book.has_free_buffer(s)) << "seed " << seed << " case " << k << " sample " << s;
      if (stream.uniform() > 0.1) continue;
      ASSERT_EQ(unit.fire(), book.take(s)) << "seed " << seed << " case " << k << " sample " << s;
    }
    ASSERT_EQ(unit.busy_samples(), book.busy_samples(1'000)) << "seed " << seed << " case " << k;
    const auto captures = unit.finish();
    ASSERT_EQ(captures.size(), book.captures().size());
    for (std::size_t n = 0; n < captures.size(); ++n) {
      const Capture& span = book.captures()[n];
      ASSERT_EQ(captures[n].span, span);
      expect_samples(captures[n], span.first_sample, std::min<std::int64_t>(span.end_sample, 1'000));
    }
  }
}

TEST(CaptureUnit, needs_a_ring_for_the_pre_samples_and_the_firing) {
  EXPECT_FALSE(fault_of_ring(4, small()));
  EXPECT_EQ(fault_of_ring(3, small()), "ring_samples: at least pre_samples + 1 = 4 expected");
}

}  // namespace
}  // namespace cistern
