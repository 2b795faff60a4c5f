/// \file
/// Stimuli on both sides of every boundary of the trigger rules, for specification and kernel alike.
#include <gtest/gtest.h>

#include "tests/unit/trigger_runs.hpp"

namespace cistern {
namespace {

using Samples = std::vector<std::int64_t>;

/// One channel of a plain trigger; heights are counts above the baseline.
struct Row {
  const char* name;
  TriggerKind kind;
  std::vector<int> heights;
  Samples fires_at;
};

// Level 10, window 4, 2 over; boxcar of 4 samples, sum 20.
const Row rows[] = {
    {"one count below the level", TriggerKind::Threshold, {0, 9, 0}, {}},
    {"at the level", TriggerKind::Threshold, {0, 10, 0}, {1}},
    {"one count above the level", TriggerKind::Threshold, {0, 11, 0}, {1}},
    {"over in the first sample", TriggerKind::Threshold, {10, 0, 0}, {0}},
    {"over in the last sample", TriggerKind::Threshold, {0, 0, 10}, {2}},
    {"stays over", TriggerKind::Threshold, {0, 10, 10, 10}, {1}},
    {"over again after one sample", TriggerKind::Threshold, {10, 0, 10}, {0, 2}},
    {"one sample too few", TriggerKind::TimeOverThreshold, {0, 10, 0, 0, 0}, {}},
    {"just enough samples", TriggerKind::TimeOverThreshold, {0, 10, 10, 0, 0}, {2}},
    {"one sample more", TriggerKind::TimeOverThreshold, {0, 10, 10, 10, 0}, {2}},
    {"enough samples one count below", TriggerKind::TimeOverThreshold, {0, 9, 9, 9, 9}, {}},
    {"first and last sample of the window", TriggerKind::TimeOverThreshold, {10, 0, 0, 10}, {3}},
    {"one sample further apart than the window", TriggerKind::TimeOverThreshold, {10, 0, 0, 0, 10}, {}},
    {"the window empties and fills again", TriggerKind::TimeOverThreshold, {10, 10, 0, 0, 0, 0, 10, 10}, {1, 7}},
    {"the window never falls short", TriggerKind::TimeOverThreshold, {10, 10, 0, 10, 10, 0, 10}, {1}},
    {"nothing counts before the start", TriggerKind::TimeOverThreshold, {10}, {}},
    {"enough at the end", TriggerKind::TimeOverThreshold, {0, 0, 10, 10}, {3}},
    {"one short at the end", TriggerKind::TimeOverThreshold, {0, 0, 0, 10}, {}},
    {"sum one count short", TriggerKind::BoxcarSum, {5, 5, 5, 4, 0}, {}},
    {"sum just reached", TriggerKind::BoxcarSum, {5, 5, 5, 5, 0}, {3}},
    {"sum in one sample", TriggerKind::BoxcarSum, {20, 0, 0}, {0}},
    {"first and last sample of the boxcar", TriggerKind::BoxcarSum, {10, 0, 0, 10}, {3}},
    {"one sample further apart than the boxcar", TriggerKind::BoxcarSum, {10, 0, 0, 0, 10}, {}},
    {"samples below the baseline count against it", TriggerKind::BoxcarSum, {-1, 10, 10, 0, 0}, {4}},
    {"sum in the last sample", TriggerKind::BoxcarSum, {0, 0, 10, 10}, {3}},
};

TEST(Boundary, of_level_window_and_sum_is_met_exactly) {
  for (const Row& row : rows) {
    const auto firings = by_both(plain_trigger(row.kind), codes_above_baseline({row.heights}));
    EXPECT_EQ(samples_of(firings), row.fires_at) << name_of(row.kind) << ": " << row.name;
  }
}

constexpr TriggerKind kinds[] = {TriggerKind::Threshold, TriggerKind::TimeOverThreshold, TriggerKind::BoxcarSum};

TEST(Boundary, of_the_majority_is_met_exactly) {
  const std::vector<int> on{0, 0, 20, 20, 0};
  const std::vector<int> off{0, 0, 0, 0, 0};
  for (const TriggerKind kind : kinds) {
    TriggerSettings settings = plain_trigger(kind, 4);
    settings.condition.majority = 3;
    EXPECT_TRUE(by_both(settings, codes_above_baseline({on, off, on, off})).empty()) << name_of(kind);
    EXPECT_EQ(by_both(settings, codes_above_baseline({on, off, on, on})).size(), 1U) << name_of(kind);
    EXPECT_EQ(by_both(settings, codes_above_baseline({on, on, on, on})).size(), 1U) << name_of(kind);
  }
}

TEST(Boundary, of_the_majority_needs_the_channels_in_the_same_sample) {
  TriggerSettings settings = plain_trigger(TriggerKind::Threshold, 2);
  settings.condition.majority = 2;
  EXPECT_TRUE(by_both(settings, codes_above_baseline({{0, 10, 0, 0}, {0, 0, 10, 0}})).empty());
  EXPECT_EQ(samples_of(by_both(settings, codes_above_baseline({{0, 10, 10, 0}, {0, 0, 10, 0}}))), (Samples{2}));
}

TEST(Mask, takes_a_channel_out_of_the_majority) {
  const std::vector<int> on{0, 0, 20, 20, 0};
  for (const TriggerKind kind : kinds) {
    TriggerSettings settings = plain_trigger(kind, 3);
    settings.condition.majority = 2;
    settings.condition.channel_enabled = {true, false, true};
    EXPECT_TRUE(by_both(settings, codes_above_baseline({on, on, {0, 0, 0, 0, 0}})).empty()) << name_of(kind);
    EXPECT_EQ(by_both(settings, codes_above_baseline({on, {0, 0, 0, 0, 0}, on})).size(), 1U) << name_of(kind);
  }
}

TEST(Mask, that_leaves_fewer_channels_than_the_majority_never_fires) {
  for (const TriggerKind kind : kinds) {
    TriggerSettings settings = plain_trigger(kind, 2);
    settings.condition.majority = 2;
    settings.condition.channel_enabled = {true, false};
    EXPECT_TRUE(by_both(settings, codes_above_baseline({{0, 90, 90, 90}, {0, 90, 90, 90}})).empty()) << name_of(kind);
  }
}

TEST(Level, beyond_every_code_is_never_reached_and_below_every_code_always) {
  const Codes codes = codes_above_baseline({{0, 32'667, -100, 0}});  // both ends of 15 bits
  for (const TriggerKind kind : {TriggerKind::Threshold, TriggerKind::TimeOverThreshold}) {
    TriggerSettings settings = plain_trigger(kind);
    settings.condition.min_samples_over = 1;
    const auto firings_at_level = [&](std::int32_t level) {
      settings.condition.level_counts = {level};
      return samples_of(by_both(settings, codes));
    };
    EXPECT_EQ(firings_at_level(32'667), (Samples{1})) << name_of(kind);
    EXPECT_EQ(firings_at_level(32'668), (Samples{})) << name_of(kind);
    EXPECT_EQ(firings_at_level(100'000), (Samples{})) << name_of(kind);
    EXPECT_EQ(firings_at_level(-100), (Samples{0})) << name_of(kind);
    EXPECT_EQ(firings_at_level(-100'000), (Samples{0})) << name_of(kind);
  }
}

TEST(Level, below_the_baseline_is_compared_like_any_other) {
  TriggerSettings settings = plain_trigger(TriggerKind::Threshold);
  settings.condition.level_counts = {-5};
  EXPECT_EQ(samples_of(by_both(settings, codes_above_baseline({{-6, -5, -6, -4}}))), (Samples{1, 3}));
}

TEST(Sum, of_zero_or_less_is_true_from_the_first_sample) {
  TriggerSettings settings = plain_trigger(TriggerKind::BoxcarSum);
  settings.condition.sum_counts = {0};
  EXPECT_EQ(samples_of(by_both(settings, codes_above_baseline({{0, 0, -1, 0, 0, 0, 0}}))), (Samples{0, 6}));
}

TEST(Onset, is_the_first_over_sample_in_the_window_of_the_channels_that_made_it_true) {
  TriggerSettings settings = plain_trigger(TriggerKind::TimeOverThreshold, 2);
  // Channel 1 is over first, but not often enough.
  const auto firings = by_both(settings, codes_above_baseline({{0, 0, 10, 0, 10, 0}, {0, 10, 0, 0, 0, 0}}));
  ASSERT_EQ(samples_of(firings), (Samples{4}));
  EXPECT_EQ(firings[0].onset_sample, 2);
}

TEST(Onset, forgets_over_samples_that_left_the_window) {
  const auto firings =
      by_both(plain_trigger(TriggerKind::TimeOverThreshold), codes_above_baseline({{10, 0, 0, 0, 10, 10}}));
  ASSERT_EQ(samples_of(firings), (Samples{5}));
  EXPECT_EQ(firings[0].onset_sample, 4);
}

TEST(Onset, of_a_boxcar_is_its_first_sample_at_least_0) {
  const auto firings =
      by_both(plain_trigger(TriggerKind::BoxcarSum), codes_above_baseline({{0, 20, 0, 0, 0, 0, 0, 20}}));
  ASSERT_EQ(samples_of(firings), (Samples{1, 7}));
  EXPECT_EQ(firings[0].onset_sample, 0);
  EXPECT_EQ(firings[1].onset_sample, 4);
}

TEST(StartUnknown, is_set_while_the_window_reaches_before_the_start) {
  const std::vector<int> twice{0, 0, 20, 20, 0, 0, 0, 0, 20, 20};
  const auto flags = [&](TriggerKind kind, std::vector<int> heights) {
    std::vector<bool> result;
    for (const Firing& firing : by_both(plain_trigger(kind), codes_above_baseline({std::move(heights)}))) {
      result.push_back(firing.start_unknown);
    }
    return result;
  };
  EXPECT_EQ(flags(TriggerKind::Threshold, {20, 0, 20}), (std::vector<bool>{true, false}));
  EXPECT_EQ(flags(TriggerKind::TimeOverThreshold, twice), (std::vector<bool>{true, false}));
  EXPECT_EQ(flags(TriggerKind::BoxcarSum, twice), (std::vector<bool>{true, false}));
  EXPECT_EQ(flags(TriggerKind::BoxcarSum, {0, 0, 0, 20}), (std::vector<bool>{true})) << "s = length - 1";
  EXPECT_EQ(flags(TriggerKind::BoxcarSum, {0, 0, 0, 0, 20}), (std::vector<bool>{false})) << "s = length";
}

}  // namespace
}  // namespace cistern
