#include "firmware_model/station/capture_book.hpp"

#include <gtest/gtest.h>

#include <vector>

namespace cistern {
namespace {

/// Two buffers, captures of 2 + 10 samples, 20 clocks to copy one out.
CaptureConfig small(OverlapPolicy overlap) {
  return {.pre_samples = 2,
          .post_samples = 10,
          .buffers = 2,
          .copy_out_samples = 20,
          .overlap = overlap,
          .max_samples = 24};
}

CaptureConfig one_buffer(OverlapPolicy overlap) {
  CaptureConfig config = small(overlap);
  config.buffers = 1;
  return config;
}

std::vector<CaptureOutcome> outcomes(CaptureBook& book, const std::vector<std::int64_t>& firings) {
  std::vector<CaptureOutcome> result;
  for (const std::int64_t firing : firings) result.push_back(book.take(firing).outcome);
  return result;
}

constexpr auto Captured = CaptureOutcome::Captured;
constexpr auto Merged = CaptureOutcome::Merged;
constexpr auto Extended = CaptureOutcome::Extended;
constexpr auto NoFreeBuffer = CaptureOutcome::NoFreeBuffer;

TEST(CaptureBook, captures_from_pre_samples_before_to_post_samples_after_the_firing) {
  CaptureBook book(small(OverlapPolicy::Ignore));
  EXPECT_EQ(book.take(100), (CaptureDecision{Captured, 0}));
  EXPECT_EQ(book.captures()[0], (Capture{.firing_sample = 100,
                                         .first_sample = 98,
                                         .end_sample = 110,
                                         .copied_from = 110,
                                         .free_at = 130,
                                         .buffer = 0}));
}

TEST(CaptureBook, starts_no_capture_before_sample_0) {
  CaptureBook book(small(OverlapPolicy::Ignore));
  book.take(1);
  EXPECT_EQ(book.captures()[0].first_sample, 0);
  EXPECT_EQ(book.captures()[0].end_sample, 11);
}

TEST(CaptureBook, decides_what_a_firing_inside_or_after_a_capture_does) {
  struct Row {
    const char* name;
    OverlapPolicy overlap;
    std::vector<std::int64_t> firings;
    std::vector<CaptureOutcome> expected;
  };
  const Row rows[] = {
      {"ignore: last sample inside", OverlapPolicy::Ignore, {100, 109}, {Captured, Merged}},
      {"ignore: first sample after", OverlapPolicy::Ignore, {100, 110}, {Captured, Captured}},
      {"extend: last sample inside", OverlapPolicy::Extend, {100, 109}, {Captured, Extended}},
      {"extend: first sample after", OverlapPolicy::Extend, {100, 110}, {Captured, Captured}},
      {"extend: inside what was extended", OverlapPolicy::Extend, {100, 105, 114}, {Captured, Extended, Extended}},
      {"extend: after what was extended", OverlapPolicy::Extend, {100, 105, 115}, {Captured, Extended, Captured}},
      {"new buffer: inside", OverlapPolicy::NewBuffer, {100, 101}, {Captured, Captured}},
      {"new buffer: third inside", OverlapPolicy::NewBuffer, {100, 101, 102}, {Captured, Captured, NoFreeBuffer}},
      {"same sample again", OverlapPolicy::NewBuffer, {100, 100, 100}, {Captured, Merged, Merged}},
      {"same sample as a lost one",
       OverlapPolicy::NewBuffer,
       {1, 2, 3, 3},
       {Captured, Captured, NoFreeBuffer, NoFreeBuffer}},
  };
  for (const Row& row : rows) {
    CaptureBook book(small(row.overlap));
    EXPECT_EQ(outcomes(book, row.firings), row.expected) << row.name;
  }
}

TEST(CaptureBook, frees_a_buffer_at_the_end_of_its_copy_out) {
  CaptureBook early(one_buffer(OverlapPolicy::Ignore));
  EXPECT_EQ(outcomes(early, {100, 129}), (std::vector{Captured, NoFreeBuffer}));
  CaptureBook in_time(one_buffer(OverlapPolicy::Ignore));
  EXPECT_EQ(outcomes(in_time, {100, 130}), (std::vector{Captured, Captured}));
}

TEST(CaptureBook, copies_out_one_capture_after_the_other) {
  CaptureBook book(small(OverlapPolicy::Ignore));
  outcomes(book, {100, 112});
  EXPECT_EQ(book.captures()[1].end_sample, 122);
  EXPECT_EQ(book.captures()[1].copied_from, 130) << "the bus is taken until then";
  EXPECT_EQ(book.captures()[1].free_at, 150);
}

TEST(CaptureBook, uses_the_first_buffer_that_is_free) {
  CaptureBook book(small(OverlapPolicy::Ignore));
  outcomes(book, {100, 112, 131});
  EXPECT_EQ(book.captures()[1].buffer, 1);
  EXPECT_EQ(book.captures()[2].buffer, 0);
}

TEST(CaptureBook, extends_a_capture_to_post_samples_after_the_last_firing) {
  CaptureBook book(one_buffer(OverlapPolicy::Extend));
  outcomes(book, {100, 106});
  EXPECT_EQ(book.captures()[0].end_sample, 116);
  EXPECT_EQ(book.captures()[0].copied_from, 116);
  EXPECT_EQ(book.captures()[0].free_at, 116 + 30) << "18 samples take half as long again as 12";
}

TEST(CaptureBook, extends_a_capture_no_further_than_its_buffer) {
  CaptureBook book(one_buffer(OverlapPolicy::Extend));
  EXPECT_EQ(outcomes(book, {100, 109, 118, 121}), (std::vector{Captured, Extended, Extended, Merged}));
  EXPECT_EQ(book.captures()[0].end_sample, 98 + 24);
  EXPECT_EQ(book.take(122).outcome, NoFreeBuffer);
}

TEST(CaptureBook, rounds_the_copy_out_of_a_longer_capture_up) {
  CaptureBook book(one_buffer(OverlapPolicy::Extend));
  outcomes(book, {100, 101});
  EXPECT_EQ(book.captures()[0].free_at, 111 + 22) << "20 clocks x 13/12 = 21.67";
}

TEST(CaptureBook, copies_out_a_capture_cut_by_the_start_in_the_usual_time) {
  CaptureBook book(one_buffer(OverlapPolicy::Ignore));
  book.take(0);
  EXPECT_EQ(book.captures()[0].free_at, 10 + 20);
}

TEST(CaptureBook, is_busy_after_the_last_buffer_was_taken_until_one_is_free) {
  CaptureBook book(one_buffer(OverlapPolicy::Ignore));
  EXPECT_EQ(book.busy_samples(100), 0);
  book.take(100);
  EXPECT_EQ(book.busy_samples(101), 0) << "the firing's own sample had a buffer";
  EXPECT_EQ(book.busy_samples(102), 1);
  EXPECT_EQ(book.busy_samples(130), 29);
  EXPECT_EQ(book.busy_samples(1000), 29);
  book.take(130);
  EXPECT_EQ(book.busy_samples(1000), 58);
}

TEST(CaptureBook, is_dead_where_a_firing_would_be_lost) {
  CaptureBook ignore(one_buffer(OverlapPolicy::Ignore));
  ignore.take(100);
  EXPECT_EQ(ignore.dead_samples(110), 0) << "a firing inside the open capture is not lost";
  EXPECT_EQ(ignore.dead_samples(111), 1);
  EXPECT_EQ(ignore.dead_samples(1000), 20);
  CaptureBook new_buffer(one_buffer(OverlapPolicy::NewBuffer));
  new_buffer.take(100);
  EXPECT_EQ(new_buffer.dead_samples(1000), 29);
}

TEST(CaptureBook, is_not_busy_while_another_buffer_is_free) {
  CaptureBook book(small(OverlapPolicy::Ignore));
  book.take(100);
  EXPECT_TRUE(book.has_free_buffer(100));
  EXPECT_EQ(book.busy_samples(1000), 0);
  book.take(112);
  EXPECT_FALSE(book.has_free_buffer(112));
  EXPECT_FALSE(book.has_free_buffer(129));
  EXPECT_TRUE(book.has_free_buffer(130));
  EXPECT_EQ(book.busy_samples(1000), 130 - 113);
}

TEST(CaptureBook, without_copy_out_frees_a_buffer_with_its_last_sample) {
  CaptureConfig config = one_buffer(OverlapPolicy::Ignore);
  config.copy_out_samples = 0;
  CaptureBook book(config);
  EXPECT_EQ(outcomes(book, {100, 109, 110}), (std::vector{Captured, Merged, Captured}));
}

TEST(CaptureBook, counts_the_outcomes) {
  CaptureBook book(one_buffer(OverlapPolicy::Extend));
  outcomes(book, {100, 109, 118, 121, 122, 123, 400});
  EXPECT_EQ(book.count(Captured), 2);
  EXPECT_EQ(book.count(Extended), 2);
  EXPECT_EQ(book.count(Merged), 1);
  EXPECT_EQ(book.count(NoFreeBuffer), 2);
}

TEST(CaptureBook, goes_on_from_a_copy_of_its_state) {
  CaptureBook book(one_buffer(OverlapPolicy::Ignore));
  book.take(100);
  CaptureBook kept = book;
  book.take(130);
  EXPECT_EQ(kept.take(129).outcome, NoFreeBuffer);
  EXPECT_EQ(kept.captures().size(), 1U);
}

TEST(CaptureBookDeathTest, refuses_firings_out_of_order) {
  CaptureBook book(small(OverlapPolicy::Ignore));
  book.take(100);
  EXPECT_DEATH(book.take(99), "last_firing_");
  EXPECT_DEATH(static_cast<void>(book.busy_samples(100)), "last_firing_");
}

TEST(CaptureConfig, names_the_key_that_is_wrong) {
  struct Row {
    const char* key;
    void (*spoil)(CaptureConfig&);
    void (*mend)(CaptureConfig&);
  };
  const Row rows[] = {
      {"pre_samples", [](CaptureConfig& c) { c.pre_samples = -1; }, [](CaptureConfig& c) { c.pre_samples = 0; }},
      {"post_samples", [](CaptureConfig& c) { c.post_samples = 0; }, [](CaptureConfig& c) { c.post_samples = 1; }},
      {"buffers", [](CaptureConfig& c) { c.buffers = 0; }, [](CaptureConfig& c) { c.buffers = 1; }},
      {"copy_out_samples", [](CaptureConfig& c) { c.copy_out_samples = -1; },
       [](CaptureConfig& c) { c.copy_out_samples = 0; }},
      {"max_samples", [](CaptureConfig& c) { c.max_samples = 11; }, [](CaptureConfig& c) { c.max_samples = 12; }},
  };
  for (const Row& row : rows) {
    CaptureConfig config = small(OverlapPolicy::Ignore);
    row.spoil(config);
    ASSERT_TRUE(fault_of(config)) << row.key;
    EXPECT_EQ(fault_of(config)->rfind(std::string(row.key) + ": ", 0), 0U) << *fault_of(config);
    row.mend(config);
    EXPECT_FALSE(fault_of(config)) << row.key;
  }
  EXPECT_FALSE(fault_of(CaptureConfig{})) << "the defaults are valid";
}

TEST(OverlapPolicy, has_one_word_each) {
  for (const auto policy : {OverlapPolicy::Ignore, OverlapPolicy::Extend, OverlapPolicy::NewBuffer}) {
    EXPECT_EQ(overlap_policy_named(name_of(policy)), policy);
  }
  EXPECT_EQ(name_of(OverlapPolicy::NewBuffer), "new_buffer");
  EXPECT_EQ(overlap_policy_named("Ignore"), std::nullopt);
}

TEST(CaptureOutcome, has_one_word_each) {
  EXPECT_EQ(name_of(Captured), "captured");
  EXPECT_EQ(name_of(Merged), "merged");
  EXPECT_EQ(name_of(Extended), "extended");
  EXPECT_EQ(name_of(NoFreeBuffer), "no_free_buffer");
}

}  // namespace
}  // namespace cistern
