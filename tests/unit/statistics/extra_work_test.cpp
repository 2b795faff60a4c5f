#include "bench/statistics/extra_work.hpp"

#include <gtest/gtest.h>

#include <cmath>

#include "bench/statistics/requirement.hpp"

namespace cistern {
namespace {

/// Alternating counts around a mean of 4.5: 45 Hz in blocks of 0.1 s, index below 1.
BlockCounts blocks_of(std::size_t count) {
  BlockCounts blocks{{}, 0.1};
  for (std::size_t i = 0; i < count; ++i) blocks.counts.push_back(i % 2 == 0 ? 3 : 6);
  return blocks;
}

Verdict verdict_at_most(const BlockCounts& blocks, double bound) {
  return judge_at_most({rate_at_least(blocks, 0.95), rate_at_most(blocks, 0.95)}, bound);
}

TEST(ExtraLiveTime, is_nothing_when_it_is_decided) {
  EXPECT_EQ(extra_live_time_s(blocks_of(400), 60, 0.95), 0);
  EXPECT_EQ(extra_live_time_s(blocks_of(400), 30, 0.95), 0);
}

TEST(ExtraLiveTime, decides_and_less_would_not) {
  for (const double bound : {44.0, 46.0}) {
    const BlockCounts now = blocks_of(400);
    ASSERT_EQ(verdict_at_most(now, bound), Verdict::Undecided);
    const auto extra = extra_live_time_s(now, bound, 0.95);
    ASSERT_TRUE(extra);
    const auto blocks_needed = [&](double share) {
      return 2 * static_cast<std::size_t>(std::ceil((40 + share * *extra) / 0.2));  // even: the mean stays where it is
    };
    EXPECT_NE(verdict_at_most(blocks_of(blocks_needed(1)), bound), Verdict::Undecided) << bound;
    EXPECT_EQ(verdict_at_most(blocks_of(blocks_needed(0.95)), bound), Verdict::Undecided) << bound;
  }
}

TEST(ExtraLiveTime, is_absent_when_no_work_helps) {
  EXPECT_FALSE(extra_live_time_s(blocks_of(400), 45, 0.95));
  EXPECT_FALSE(extra_live_time_s({}, 45, 0.95));
}

TEST(ExtraLiveTime, without_firings_is_what_the_rule_of_three_says) {
  const BlockCounts silent{std::vector<std::int64_t>(10), 0.1};
  EXPECT_NEAR(extra_live_time_s(silent, 0.5, 0.95).value(), 2.9957 / 0.5 - 1, 0.01);
}

TEST(ExtraTrials, is_nothing_when_it_is_decided) {
  EXPECT_EQ(extra_trials(99, 100, 0.9, 0.95), 0);
  EXPECT_EQ(extra_trials(50, 100, 0.9, 0.95), 0);
}

TEST(ExtraTrials, decides_and_far_fewer_would_not) {
  const auto extra = extra_trials(96, 100, 0.95, 0.95);
  ASSERT_TRUE(extra);
  const auto low = [&](double more) {
    const auto trials = static_cast<std::int64_t>(100 + more * static_cast<double>(*extra));
    return clopper_pearson_low(static_cast<std::int64_t>(0.96 * static_cast<double>(trials) + 0.5), trials, 0.95);
  };
  EXPECT_GE(low(1.02), 0.95);
  EXPECT_LT(low(0.9), 0.95);
}

TEST(ExtraTrials, is_absent_when_no_work_helps) {
  EXPECT_FALSE(extra_trials(95, 100, 0.95, 0.95));
  EXPECT_FALSE(extra_trials(0, 0, 0.95, 0.95));
}

TEST(ExtraTrials, of_nothing_but_successes_is_known_exactly) {
  // 0.95^59 = 0.0485: 59 successes in a row show at least 0.95.
  EXPECT_NEAR(static_cast<double>(extra_trials(10, 10, 0.95, 0.95).value()), 49, 1);
}

}  // namespace
}  // namespace cistern
