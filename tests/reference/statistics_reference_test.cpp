/// Limits and tests against published values. Each row prints its source, what it expects and what
/// we got, so that the log of a run can be read as a table.
#include <gtest/gtest.h>

#include <cmath>
#include <cstdio>
#include <vector>

#include "bench/statistics/counting.hpp"
#include "bench/statistics/intervals.hpp"
#include "bench/statistics/mcnemar.hpp"
#include "tests/unit/statistics/clustered_arrivals.hpp"

namespace cistern {
namespace {

void check(const char* source, const char* what, double expected, double got, double tolerance) {
  std::printf("%-34s %-44s expected %-12.8g got %-12.8g tolerance %.1g\n", source, what, expected, got, tolerance);
  EXPECT_NEAR(got, expected, tolerance) << source << ": " << what;
}

void check_counts(const char* source, const char* what, const std::vector<double>& expected, int first,
                  double (*limit)(double, double), double confidence, double tolerance) {
  for (std::size_t i = 0; i < expected.size(); ++i) {
    const int count = first + static_cast<int>(i);
    char row[80];
    std::snprintf(row, sizeof row, "%s, %.5g %%, n = %d", what, 100 * confidence, count);
    check(source, row, expected[i], limit(count, confidence), tolerance);
  }
}

double central_low(double count, double confidence) { return garwood(count, confidence).low; }
double central_high(double count, double confidence) { return garwood(count, confidence).high; }

TEST(StatisticsReference, clopper_pearson_two_sided) {
  const char* source = "Clopper and Pearson 1934";
  check(source, "0 of 10, low", 0, clopper_pearson(0, 10, 0.95).low, 1e-7);
  check(source, "0 of 10, high", 0.3084971, clopper_pearson(0, 10, 0.95).high, 1e-7);
  check(source, "5 of 10, low", 0.1870860, clopper_pearson(5, 10, 0.95).low, 1e-7);
  check(source, "5 of 10, high", 0.8129140, clopper_pearson(5, 10, 0.95).high, 1e-7);
  check(source, "10 of 10, low", 0.6915029, clopper_pearson(10, 10, 0.95).low, 1e-7);
  check(source, "10 of 10, high", 1, clopper_pearson(10, 10, 0.95).high, 1e-7);
}

TEST(StatisticsReference, no_event_in_n_trials_one_sided) {
  const char* source = "Clopper and Pearson 1934";
  const struct {
    int trials;
    double exact;
  } rows[] = {{10, 0.258866}, {30, 0.0950339}, {100, 0.0295130}, {1000, 0.00299125}};
  for (const auto& row : rows) {
    const double high = clopper_pearson_high(0, row.trials, 0.95);
    check(source, "none, one-sided 95 %", row.exact, high, 1e-6);
    EXPECT_LT(high, 3.0 / row.trials) << "the rule of three lies a little above";
  }
}

TEST(StatisticsReference, poisson_one_sided_limits) {
  const char* source = "Garwood 1936";
  check_counts(source, "upper", {2.303, 3.890, 5.322, 6.681, 7.994, 9.275, 10.532, 11.771, 12.995, 14.206, 15.407}, 0,
               garwood_high, 0.9, 1e-3);
  check_counts(source, "upper", {2.996, 4.744, 6.296, 7.754, 9.154, 10.513, 11.842, 13.148, 14.435, 15.705, 16.962}, 0,
               garwood_high, 0.95, 1e-3);
  check_counts(source, "lower", {0.105, 0.532, 1.102, 1.745, 2.433}, 1, garwood_low, 0.9, 1e-3);
  check_counts(source, "lower", {0.051, 0.355, 0.818, 1.366, 1.970}, 1, garwood_low, 0.95, 1e-3);
}

TEST(StatisticsReference, poisson_central_limits) {
  const char* source = "Garwood 1936";
  check_counts(source, "central lower",
               {0, 0.0253, 0.2422, 0.6187, 1.0899, 1.6235, 2.2019, 2.8144, 3.4538, 4.1154, 4.7954}, 0, central_low,
               0.95, 1e-4);
  check_counts(source, "central upper",
               {3.6889, 5.5716, 7.2247, 8.7673, 10.2416, 11.6683, 13.0595, 14.4227, 15.7632, 17.0848, 18.3904}, 0,
               central_high, 0.95, 1e-4);
  const double one_sigma = std::erf(1 / std::sqrt(2.0));  // 68.27 %
  check_counts(source, "central lower",
               {0, 0.1728, 0.7082, 1.3673, 2.0857, 2.8403, 3.6201, 4.4185, 5.2316, 6.0565, 6.8913}, 0, central_low,
               one_sigma, 1e-4);
  check_counts(source, "central upper",
               {1.8410, 3.2995, 4.6379, 5.9182, 7.1628, 8.3825, 9.5836, 10.7703, 11.9451, 13.1102, 14.2669}, 0,
               central_high, one_sigma, 1e-4);
}

/// With k + 1 = freedom / 2 the upper Poisson limit is half a quantile of chi-squared.
double chi_squared_quantile(int freedom, double probability) {
  return 2 * garwood_high(freedom / 2.0 - 1, probability);
}

TEST(StatisticsReference, chi_squared_quantiles) {
  const char* source = "chi-squared tables, any handbook";
  check(source, "0.95, 10 degrees of freedom", 18.3070, chi_squared_quantile(10, 0.95), 1e-4);
  check(source, "0.95, 50 degrees of freedom", 67.5048, chi_squared_quantile(50, 0.95), 1e-4);
  check(source, "0.99, 10 degrees of freedom", 23.2093, chi_squared_quantile(10, 0.99), 1e-4);
  check(source, "0.95, 1 degree of freedom", 3.8415, 2 * garwood_low(0.5, 1 - 0.95), 1e-4);
}

TEST(StatisticsReference, mcnemar_of_two_surveys) {
  const char* source = "Agresti 1990, p. 350, two surveys";
  check(source, "150 against 86, exact two-sided p", 3.7159e-5, mcnemar_exact(150, 86), 1e-4 * 3.7159e-5);
  // Score limits leave out 0 exactly when the uncorrected chi-squared, 17.355932, p 3.0993e-5, does.
  const double p = 3.0993e-5;
  EXPECT_GT(paired_difference(150, 86, 1600, 1 - 1.01 * p).low, 0);
  EXPECT_LT(paired_difference(150, 86, 1600, 1 - 0.99 * p).low, 0);
  check(source, "level at which score limits touch 0", 0, paired_difference(150, 86, 1600, 1 - p).low, 1e-5);
}

TEST(StatisticsReference, mcnemar_of_few_pairs) {
  const char* source = "binomial, exact";
  check(source, "0 against 6", 0.03125, mcnemar_exact(0, 6), 1e-15);
  check(source, "1 against 9", 0.021484375, mcnemar_exact(1, 9), 1e-15);
  check(source, "3 against 12", 0.03515625, mcnemar_exact(3, 12), 1e-15);
}

/// Counts of `blocks` blocks with this index of dispersion, or as near as counts of about a million allow.
std::vector<std::int64_t> counts_with_index(int blocks, double index) {
  const double mean = 1e6;
  const double step = std::sqrt(index * mean * (blocks - 1) / blocks);
  std::vector<std::int64_t> counts;
  for (int i = 0; i < blocks; ++i) counts.push_back(std::llround(mean + (i % 2 == 0 ? step : -step)));
  return counts;
}

TEST(StatisticsReference, quantiles_of_the_index_of_dispersion) {
  const char* source = "Fisher 1925";
  const struct {
    int blocks;
    double low;
    double high;
  } rows[] = {{10, 0.30004, 2.11364}, {30, 0.55335, 1.57663}, {100, 0.74102, 1.29719}, {1000, 0.91422, 1.08958}};
  for (const auto& row : rows) {
    const auto low = dispersion_of(counts_with_index(row.blocks, row.low)).value();
    const auto high = dispersion_of(counts_with_index(row.blocks, row.high)).value();
    EXPECT_NEAR(low.index, row.low, 2e-3 * row.low);
    EXPECT_NEAR(high.index, row.high, 2e-3 * row.high);
    check(source, "probability below the 2.5 % quantile", 0.025, low.p_low, 1e-3);
    check(source, "probability above the 97.5 % quantile", 0.025, high.p_high, 1e-3);
  }
}

TEST(StatisticsReference, index_of_dispersion_worked_by_hand) {
  const char* source = "Fisher 1925, ten counts of mean 12";
  const auto dispersion = dispersion_of({12, 15, 9, 14, 10, 11, 13, 8, 16, 12}).value();
  check(source, "variance over mean", 0.555556, dispersion.index, 1e-6);
  check(source, "chi-squared", 5.0, 9 * dispersion.index, 1e-6);
  check(source, "lower tail", 0.165692, dispersion.p_low, 1e-6);
}

struct ClusterRow {
  ClusterLaw law;
  double factor;
};

// 200,000 blocks know an index of 2 to about 0.6 %; four standard errors are allowed.
TEST(StatisticsReference, dispersion_of_clusters) {
  const char* source = "compound Poisson, F = E[K^2]/E[K]";
  const ClusterRow rows[] = {
      {{"geometric sizes of mean 1.5", 1.5, [](RandomStream& random) { return geometric_size(random, 1.5); }}, 2},
      {{"1 + Poisson(0.2)", 1.2, [](RandomStream& random) { return 1 + static_cast<int>(random.poisson(0.2)); }},
       1.366667},
      {{"fixed size 3", 3, [](RandomStream&) { return 3; }}, 3},
  };
  for (const ClusterRow& row : rows) {
    RandomStream random(48, Purpose::PropertyTest, 0);
    const BlockCounts counted = clustered_counts(random, row.law, 200'000, 1e6);
    check(source, row.law.name, row.factor, dispersion_of(counted.counts)->index,
          4 * row.factor * std::sqrt(2 / 2e5) * 1.2);
  }
}

TEST(StatisticsReference, dispersion_of_delayed_pairs) {
  const char* source = "factorial cumulant of a block";
  const struct {
    const char* name;
    double x;
    double factor;
  } rows[] = {{"pairs, T = 0.1 tau", 0.1, 1.048374},
              {"pairs, T = tau", 1, 1.367879},
              {"pairs, T = 10 tau", 10, 1.900005},
              {"pairs, T = 100 tau", 100, 1.990000}};
  for (const auto& row : rows) {
    RandomStream random(49, Purpose::PropertyTest, 0);
    const ClusterLaw law{row.name, 2, [](RandomStream&) { return 2; }, 1 / row.x};
    const BlockCounts counted = clustered_counts(random, law, 200'000, 1e6);
    check(source, row.name, row.factor, dispersion_of(counted.counts)->index,
          4 * row.factor * std::sqrt(2 / 2e5) * 1.2);
  }
}

}  // namespace
}  // namespace cistern
