#include "bench/statistics/quantiles.hpp"

#include <gtest/gtest.h>

#include <algorithm>
#include <cmath>
#include <numeric>
#include <vector>

#include "traces/base/random.hpp"

namespace cistern {
namespace {

std::vector<double> one_to(int last) {
  std::vector<double> values(static_cast<std::size_t>(last));
  std::iota(values.begin(), values.end(), 1.0);
  return values;
}

TEST(Quantile, lies_between_neighbours) {
  EXPECT_EQ(quantile_of(one_to(5), 0.5), 3);
  EXPECT_EQ(quantile_of(one_to(4), 0.5), 2.5);
  EXPECT_NEAR(quantile_of(one_to(101), 0.95), 96, 1e-12);
}

TEST(Quantile, of_one_value_is_that_value) {
  EXPECT_EQ(quantile_of(one_to(1), 0.95), 1);
  EXPECT_EQ(quantile_limits(one_to(1), 0.5, 0.95).low, -HUGE_VAL);
  EXPECT_EQ(quantile_limits(one_to(1), 0.5, 0.95).high, HUGE_VAL);
}

TEST(QuantileLimits, of_a_median_need_six_values) {
  // Two-sided 95 %: 2 * (1/2)^5 = 0.0625 is too much, 2 * (1/2)^6 = 0.03125 will do.
  EXPECT_EQ(quantile_limits(one_to(5), 0.5, 0.95).low, -HUGE_VAL);
  EXPECT_EQ(quantile_limits(one_to(5), 0.5, 0.95).high, HUGE_VAL);
  EXPECT_EQ(quantile_limits(one_to(6), 0.5, 0.95).low, 1);
  EXPECT_EQ(quantile_limits(one_to(6), 0.5, 0.95).high, 6);
}

TEST(QuantileLimits, of_a_95th_percentile_need_59_values_above_for_one_side) {
  // 0.95^58 = 0.0510, 0.95^59 = 0.0485: the largest of 59 is an upper 95 % limit.
  EXPECT_EQ(quantile_high(one_to(58), 0.95, 0.95), HUGE_VAL);
  EXPECT_EQ(quantile_high(one_to(59), 0.95, 0.95), 59);
  EXPECT_EQ(quantile_low(one_to(58), 0.05, 0.95), -HUGE_VAL);
  EXPECT_EQ(quantile_low(one_to(59), 0.05, 0.95), 1);
}

TEST(QuantileLimits, are_the_same_from_either_end) {
  for (int values : {6, 20, 101}) {
    const Limits limits = quantile_limits(one_to(values), 0.5, 0.95);
    EXPECT_EQ(limits.low - 1, values - limits.high) << values;
  }
}

TEST(QuantileLimits, hold_the_truth_as_often_as_they_say) {
  RandomStream random(21, Purpose::PropertyTest, 0);
  constexpr int repetitions = 2000;
  const double truth = -std::log(0.05);  // 95th percentile of an exponential of mean 1
  int held = 0;
  int below_high = 0;
  for (int repetition = 0; repetition < repetitions; ++repetition) {
    std::vector<double> values(200);
    for (double& value : values) value = random.exponential(1);
    std::sort(values.begin(), values.end());
    const Limits limits = quantile_limits(values, 0.95, 0.95);
    held += limits.low <= truth && truth <= limits.high;
    below_high += truth <= quantile_high(values, 0.95, 0.9);
  }
  EXPECT_GE(held, 0.94 * repetitions);
  EXPECT_LE(held, 0.985 * repetitions);  // order statistics are coarse, but not that coarse
  EXPECT_GE(below_high, 0.885 * repetitions);
  EXPECT_LE(below_high, 0.96 * repetitions);
}

}  // namespace
}  // namespace cistern
