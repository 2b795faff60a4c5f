#include "bench/statistics/mcnemar.hpp"

#include <gtest/gtest.h>

#include <cmath>

#include "traces/base/random.hpp"

namespace cistern {
namespace {

TEST(McNemar, sees_no_difference_in_equal_counts) {
  EXPECT_EQ(mcnemar_exact(0, 0), 1);
  EXPECT_EQ(mcnemar_exact(7, 7), 1);
}

TEST(McNemar, does_not_mind_which_comes_first) { EXPECT_EQ(mcnemar_exact(3, 12), mcnemar_exact(12, 3)); }

TEST(McNemar, needs_six_discordant_pairs_for_5_percent) {
  EXPECT_GT(mcnemar_exact(0, 5), 0.05);
  EXPECT_LT(mcnemar_exact(0, 6), 0.05);
}

TEST(McNemar, never_exceeds_one) {
  for (int few = 0; few <= 20; ++few) EXPECT_LE(mcnemar_exact(few, few + 1), 1) << few;
}

TEST(PairedDifference, knows_nothing_without_pairs) {
  const Limits limits = paired_difference(0, 0, 0, 0.95);
  EXPECT_NEAR(limits.low, -1, 1e-12);
  EXPECT_NEAR(limits.high, 1, 1e-12);
}

TEST(PairedDifference, contains_the_difference_seen) {
  for (int first : {0, 1, 8, 50}) {
    const Limits limits = paired_difference(first, 10, 100, 0.95);
    EXPECT_LT(limits.low, (first - 10) / 100.0);
    EXPECT_GT(limits.high, (first - 10) / 100.0);
  }
}

TEST(PairedDifference, turns_its_sign_with_the_order) {
  const Limits forward = paired_difference(12, 3, 80, 0.95);
  const Limits backward = paired_difference(3, 12, 80, 0.95);
  EXPECT_NEAR(forward.low, -backward.high, 1e-12);
  EXPECT_NEAR(forward.high, -backward.low, 1e-12);
}

TEST(PairedDifference, has_limits_even_when_no_pair_is_discordant) {
  const Limits limits = paired_difference(0, 0, 50, 0.95);
  EXPECT_NEAR(limits.low, -limits.high, 1e-12);
  EXPECT_GT(limits.high, 0.05);  // 3/n, the rule of three for one side, is 0.06
  EXPECT_LT(limits.high, 0.09);
}

TEST(PairedDifference, one_sided_is_an_end_of_a_wider_two_sided) {
  const Limits limits = paired_difference(12, 3, 80, 0.9);
  EXPECT_NEAR(limits.low, paired_difference_low(12, 3, 80, 0.95), 1e-12);
  EXPECT_NEAR(limits.high, paired_difference_high(12, 3, 80, 0.95), 1e-12);
}

/// Share of 95 % limits that hold the true difference.
double coverage(double first_only, double second_only, int pairs) {
  RandomStream random(20, Purpose::PropertyTest, static_cast<std::uint64_t>(pairs));
  constexpr int repetitions = 2000;
  int held = 0;
  for (int repetition = 0; repetition < repetitions; ++repetition) {
    int first = 0;
    int second = 0;
    for (int pair = 0; pair < pairs; ++pair) {
      const double draw = random.uniform();
      first += draw < first_only;
      second += draw >= first_only && draw < first_only + second_only;
    }
    const Limits limits = paired_difference(first, second, pairs, 0.95);
    held += limits.low <= first_only - second_only && first_only - second_only <= limits.high;
  }
  return static_cast<double>(held) / repetitions;
}

TEST(PairedDifference, holds_the_truth_as_often_as_it_says) {
  EXPECT_GE(coverage(0.10, 0.05, 100), 0.93);
  EXPECT_GE(coverage(0.02, 0.02, 100), 0.93);
  EXPECT_GE(coverage(0.30, 0.00, 40), 0.93);
}

}  // namespace
}  // namespace cistern
