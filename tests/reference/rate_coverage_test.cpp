/// Do 95 % limits on the rate of clustered firings hold the true rate in at least 93 % of runs?
/// Arrivals of clusters are drawn as compound Poisson processes, whose dispersion is known:
/// F = E[K^2] / E[K] for clusters of K firings; of pairs with an exponential delay of mean tau in
/// blocks of length T = x tau, F = 2 - (1 - e^-x) / x (factorial cumulant of a block).
#include <gtest/gtest.h>

#include <cstdio>

#include "tests/unit/statistics/clustered_arrivals.hpp"

namespace cistern {
namespace {

int one(RandomStream&) { return 1; }
int two(RandomStream&) { return 2; }
int three(RandomStream&) { return 3; }
int geometric(RandomStream& random) { return geometric_size(random, 1.5); }
int one_and_some(RandomStream& random) { return 1 + static_cast<int>(random.poisson(0.2)); }

const ClusterLaw laws[] = {
    {"single", 1, one},
    {"geometric_of_mean_1p5", 1.5, geometric},
    {"one_and_poisson_of_0p2", 1.2, one_and_some},
    {"pairs", 2, two},
    {"triples", 3, three},
    {"pairs_within_tenth_of_a_block", 2, two, 0.1},
    {"pairs_a_block_apart", 2, two, 1},
};

constexpr std::uint64_t seed = 47;
constexpr int runs = 1000;

struct Coverage {
  double share{0};
  double low_misses{0};  ///< one-sided 95 % lower limit above the truth
  double high_misses{0};
};

Coverage coverage_of(const ClusterLaw& law, int blocks, double expected_total) {
  RandomStream random(seed, Purpose::PropertyTest,
                      static_cast<std::uint64_t>(blocks * 100000) + static_cast<std::uint64_t>(expected_total));
  Coverage coverage;
  for (int run = 0; run < runs; ++run) {
    const BlockCounts counted = clustered_counts(random, law, blocks, expected_total);
    const double truth_hz = expected_total / counted.live_time_s();
    const Limits limits = estimate_rate(counted).two_sided;
    coverage.share += (limits.low <= truth_hz && truth_hz <= limits.high) / double{runs};
    coverage.low_misses += (rate_at_least(counted, 0.95) > truth_hz) / double{runs};
    coverage.high_misses += (rate_at_most(counted, 0.95) < truth_hz) / double{runs};
  }
  return coverage;
}

class RateCoverage : public testing::TestWithParam<ClusterLaw> {};

// 1,000 runs know a coverage to 0.7 %. From 12 firings on; with fewer the clusters are hardly seen.
TEST_P(RateCoverage, holds_the_true_rate) {
  for (const int blocks : {12, 120, 1200}) {
    for (const double expected_total : {12.0, 100.0, 1200.0, 12000.0}) {
      const Coverage coverage = coverage_of(GetParam(), blocks, expected_total);
      std::printf("seed %llu, %s, %d blocks, %.0f firings: two-sided %.1f %%, one-sided misses %.1f %% and %.1f %%\n",
                  static_cast<unsigned long long>(seed), GetParam().name, blocks, expected_total, 100 * coverage.share,
                  100 * coverage.low_misses, 100 * coverage.high_misses);
      EXPECT_GE(coverage.share, 0.93);
      EXPECT_LE(coverage.low_misses, 0.07);
      EXPECT_LE(coverage.high_misses, 0.07);
    }
  }
}

TEST_P(RateCoverage, is_not_bought_with_limits_far_too_wide) {
  const Coverage coverage = coverage_of(GetParam(), 1200, 12000);
  EXPECT_LE(coverage.share, 0.985);
}

INSTANTIATE_TEST_SUITE_P(Laws, RateCoverage, testing::ValuesIn(laws),
                         [](const auto& law) { return std::string(law.param.name); });

TEST(PoissonLimits, would_fail_if_pairs_were_taken_for_single_firings) {
  RandomStream random(seed, Purpose::PropertyTest, 1);
  int held = 0;
  for (int run = 0; run < runs; ++run) {
    const BlockCounts counted = clustered_counts(random, laws[3], 1200, 12000);
    const Limits poisson = garwood(static_cast<double>(counted.total()), 0.95);
    held += poisson.low <= 12000 && 12000 <= poisson.high;
  }
  EXPECT_LT(held, 0.87 * runs);  // erf(1.96 / sqrt(2) / sqrt(2)) = 0.834
}

}  // namespace
}  // namespace cistern
