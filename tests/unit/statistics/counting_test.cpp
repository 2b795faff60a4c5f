#include "bench/statistics/counting.hpp"

#include <gtest/gtest.h>

#include <cmath>

#include "tests/unit/statistics/clustered_arrivals.hpp"

namespace cistern {
namespace {

BlockCounts same_in_all(std::size_t blocks, std::int64_t count) {
  return {std::vector<std::int64_t>(blocks, count), 0.5};
}

ClusterLaw singles() {
  return {"single", 1, [](RandomStream&) { return 1; }};
}

ClusterLaw pairs() {
  return {"pairs", 2, [](RandomStream&) { return 2; }};
}

TEST(BlockCounts, add_up) {
  const BlockCounts blocks{{3, 0, 4}, 0.5};
  EXPECT_EQ(blocks.total(), 7);
  EXPECT_EQ(blocks.live_time_s(), 1.5);
  EXPECT_DOUBLE_EQ(estimate_rate(blocks).rate_hz, 7 / 1.5);
}

TEST(Dispersion, is_absent_where_there_is_nothing_to_compare) {
  EXPECT_FALSE(dispersion_of({}));
  EXPECT_FALSE(dispersion_of({12}));
  EXPECT_FALSE(dispersion_of({0, 0, 0}));
  EXPECT_TRUE(dispersion_of({1, 0}));
}

TEST(Dispersion, splits_the_probability_at_the_index) {
  const auto dispersion = dispersion_of({5, 9, 2, 7, 7, 4}).value();
  EXPECT_NEAR(dispersion.p_low + dispersion.p_high, 1, 1e-12);
}

TEST(Rate, without_live_time_is_not_limited) {
  const RateEstimate estimate = estimate_rate({});
  EXPECT_EQ(estimate.rate_hz, 0);
  EXPECT_EQ(estimate.two_sided.low, 0);
  EXPECT_EQ(estimate.two_sided.high, HUGE_VAL);
  EXPECT_EQ(rate_at_least({}, 0.95), 0);
  EXPECT_EQ(rate_at_most({}, 0.95), HUGE_VAL);
  EXPECT_EQ(estimate.method, "no live time");
}

TEST(Rate, without_firings_has_an_upper_limit_only) {
  const BlockCounts silent = same_in_all(100, 0);
  EXPECT_EQ(rate_at_least(silent, 0.95), 0);
  EXPECT_NEAR(rate_at_most(silent, 0.95), -std::log(0.05) / 50, 1e-12);
  EXPECT_FALSE(estimate_rate(silent).dispersion_p_low);
  EXPECT_FALSE(estimate_rate(silent).poisson_applies);
}

TEST(Rate, is_poisson_when_many_blocks_look_so) {
  RandomStream random(30, Purpose::PropertyTest, 0);
  const BlockCounts blocks = clustered_counts(random, singles(), 1000, 8000);
  const RateEstimate estimate = estimate_rate(blocks);
  ASSERT_TRUE(estimate.poisson_applies);
  EXPECT_EQ(firings_per_independent_one(blocks, 0.95), 1);
  const auto total = static_cast<double>(blocks.total());
  EXPECT_NEAR(estimate.two_sided.high, garwood(total, 0.95).high / blocks.live_time_s(), 1e-9);
  EXPECT_NEAR(estimate.two_sided.low, garwood(total, 0.95).low / blocks.live_time_s(), 1e-9);
}

TEST(Rate, of_pairs_has_limits_wider_by_the_root_of_two) {
  RandomStream random(31, Purpose::PropertyTest, 0);
  constexpr int runs = 50;
  double widening_squared = 0;
  for (int run = 0; run < runs; ++run) {
    const BlockCounts blocks = clustered_counts(random, pairs(), 1000, 20000);
    const RateEstimate estimate = estimate_rate(blocks);
    EXPECT_FALSE(estimate.poisson_applies);
    const Limits poisson = garwood(static_cast<double>(blocks.total()), 0.95);
    const double widening =
        (estimate.two_sided.high - estimate.two_sided.low) * blocks.live_time_s() / (poisson.high - poisson.low);
    widening_squared += widening * widening / runs;
  }
  EXPECT_GT(widening_squared, 2.0);
  EXPECT_LT(widening_squared, 2.6);  // the largest index of several groupings lies above 2
}

TEST(Rate, of_few_single_firings_is_not_trusted_to_be_poisson) {
  BlockCounts few = same_in_all(120, 0);
  for (const std::size_t block : {3U, 33U, 63U, 93U}) few.counts[block] = 1;
  // Squares over firings with a pair added, (4 + 4) / (4 + 2); Student's t with 119 degrees of freedom is 1.6578.
  EXPECT_NEAR(firings_per_independent_one(few, 0.95), 8.0 / 6 * std::pow(1.6578 / 1.6449, 2), 1e-3);
  EXPECT_GT(rate_at_most(few, 0.95) * few.live_time_s(), 1.1 * garwood_high(4, 0.95));
}

TEST(Rate, is_not_called_poisson_on_too_few_blocks_or_firings) {
  RandomStream random(32, Purpose::PropertyTest, 0);
  EXPECT_FALSE(estimate_rate(clustered_counts(random, singles(), 199, 8000)).poisson_applies);
  EXPECT_FALSE(estimate_rate(clustered_counts(random, singles(), 1000, 500)).poisson_applies);
}

TEST(Rate, sees_clusters_longer_than_a_block) {
  RandomStream random(33, Purpose::PropertyTest, 0);
  ClusterLaw slow = pairs();
  slow.delay_blocks = 2;  // within a block the index is 1.21 only; of runs of 16 blocks 1.88
  const BlockCounts blocks = clustered_counts(random, slow, 1200, 12000);
  EXPECT_LT(dispersion_of(blocks.counts)->index, 1.4);
  EXPECT_GT(estimate_rate(blocks).dispersion, 1.5);
}

TEST(Rate, is_never_given_narrower_limits_than_poisson) {
  const BlockCounts regular = same_in_all(1000, 10);  // a dead time makes firings too regular
  const RateEstimate estimate = estimate_rate(regular);
  EXPECT_FALSE(estimate.poisson_applies);
  EXPECT_EQ(estimate.dispersion, 1);
  EXPECT_LE(estimate.two_sided.low, garwood(10000, 0.95).low / regular.live_time_s());
  EXPECT_GE(estimate.two_sided.high, garwood(10000, 0.95).high / regular.live_time_s());
}

TEST(Rate, allows_for_an_index_that_few_blocks_leave_uncertain) {
  // Student's t tables: 1.8331 with 9 degrees of freedom, 1.6449 for a normal law; both at 95 %.
  EXPECT_NEAR(firings_per_independent_one(same_in_all(10, 1000), 0.95), std::pow(1.8331 / 1.6449, 2), 1e-3);
  EXPECT_NEAR(firings_per_independent_one(same_in_all(1000, 10), 0.95), 1, 5e-3);
}

TEST(Rate, one_sided_limits_are_nearer_than_two_sided) {
  RandomStream random(34, Purpose::PropertyTest, 0);
  const BlockCounts blocks = clustered_counts(random, pairs(), 120, 300);
  const RateEstimate estimate = estimate_rate(blocks, 0.95);
  EXPECT_GT(rate_at_least(blocks, 0.95), estimate.two_sided.low);
  EXPECT_LT(rate_at_most(blocks, 0.95), estimate.two_sided.high);
  EXPECT_DOUBLE_EQ(rate_at_most(blocks, 0.975), estimate.two_sided.high);
}

}  // namespace
}  // namespace cistern
