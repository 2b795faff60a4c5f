#include "bench/statistics/intervals.hpp"

#include <gtest/gtest.h>

#include <cmath>

namespace cistern {
namespace {

TEST(ClopperPearson, has_its_ends_at_what_is_possible) {
  EXPECT_EQ(clopper_pearson(0, 10, 0.95).low, 0);
  EXPECT_LT(clopper_pearson(0, 10, 0.95).high, 1);
  EXPECT_EQ(clopper_pearson(10, 10, 0.95).high, 1);
  EXPECT_GT(clopper_pearson(10, 10, 0.95).low, 0);
}

TEST(ClopperPearson, knows_nothing_without_trials) {
  const Limits limits = clopper_pearson(0, 0, 0.95);
  EXPECT_EQ(limits.low, 0);
  EXPECT_EQ(limits.high, 1);
}

TEST(ClopperPearson, is_the_same_from_either_side) {
  const Limits fired = clopper_pearson(3, 20, 0.9);
  const Limits silent = clopper_pearson(17, 20, 0.9);
  EXPECT_NEAR(fired.low, 1 - silent.high, 1e-14);
  EXPECT_NEAR(fired.high, 1 - silent.low, 1e-14);
}

TEST(ClopperPearson, one_sided_at_97_5_percent_is_an_end_of_two_sided_at_95) {
  const Limits limits = clopper_pearson(7, 30, 0.95);
  EXPECT_DOUBLE_EQ(limits.low, clopper_pearson_low(7, 30, 0.975));
  EXPECT_DOUBLE_EQ(limits.high, clopper_pearson_high(7, 30, 0.975));
}

/// The definition itself, summed term by term: at the upper limit, so few successes have
/// probability 1 - confidence.
double binomial_at_most(int successes, int trials, double p) {
  double sum = 0;
  for (int k = 0; k <= successes; ++k) {
    sum += std::exp(std::lgamma(trials + 1) - std::lgamma(k + 1) - std::lgamma(trials - k + 1)) * std::pow(p, k) *
           std::pow(1 - p, trials - k);
  }
  return sum;
}

TEST(ClopperPearson, leaves_the_stated_probability_beyond_each_end) {
  for (int trials : {1, 2, 9, 40}) {
    for (int successes = 0; successes < trials; ++successes) {
      EXPECT_NEAR(binomial_at_most(successes, trials, clopper_pearson_high(successes, trials, 0.95)), 0.05, 1e-9);
      const double low = clopper_pearson_low(successes + 1, trials, 0.95);
      EXPECT_NEAR(1 - binomial_at_most(successes, trials, low), 0.05, 1e-9) << successes + 1 << " of " << trials;
    }
  }
}

TEST(Garwood, has_no_lower_limit_without_a_count) {
  EXPECT_EQ(garwood(0, 0.95).low, 0);
  EXPECT_EQ(garwood_low(0, 0.95), 0);
}

TEST(Garwood, without_a_count_is_the_logarithm_of_what_is_left_out) {
  EXPECT_NEAR(garwood_high(0, 0.95), -std::log(0.05), 1e-12);
  EXPECT_NEAR(garwood(0, 0.95).high, -std::log(0.025), 1e-12);
}

TEST(Garwood, leaves_the_stated_probability_beyond_each_end) {
  const double high = garwood_high(2, 0.9);
  EXPECT_NEAR(std::exp(-high) * (1 + high + high * high / 2), 0.1, 1e-12);
  const double low = garwood_low(2, 0.9);
  EXPECT_NEAR(std::exp(-low) * (1 + low), 0.9, 1e-12);
}

TEST(Garwood, moves_smoothly_through_fractional_counts) {
  EXPECT_GT(garwood_high(2.5, 0.95), garwood_high(2, 0.95));
  EXPECT_LT(garwood_high(2.5, 0.95), garwood_high(3, 0.95));
  EXPECT_GT(garwood_low(2.5, 0.95), garwood_low(2, 0.95));
  EXPECT_LT(garwood_low(2.5, 0.95), garwood_low(3, 0.95));
}

TEST(Limits, refuse_a_confidence_that_is_none) {
  EXPECT_DEATH(static_cast<void>(garwood(1, 95)), "confidence");
  EXPECT_DEATH(static_cast<void>(clopper_pearson(1, 2, 0)), "confidence");
  EXPECT_DEATH(static_cast<void>(clopper_pearson(3, 2, 0.95)), "successes");
}

}  // namespace
}  // namespace cistern
