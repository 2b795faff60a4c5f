/// \file
/// Random numbers, noise and its crossings against published values.
#include <array>
#include <boost/math/distributions/normal.hpp>
#include <cmath>
#include <span>
#include <vector>

#include "tests/reference/printed_check.hpp"
#include "traces/base/random.hpp"
#include "traces/frontend/noise_crossing.hpp"
#include "traces/frontend/noise_kernel.hpp"
#include "traces/frontend/noise_source.hpp"
#include "traces/frontend/normal_table.hpp"
#include "traces/frontend/pulse_shape.hpp"

namespace cistern {
namespace {

constexpr std::uint64_t seed = 13;

double upper_tail(double u) { return boost::math::cdf(boost::math::complement(boost::math::normal(), u)); }

TEST(PhiloxReference, vectorized_generator_gives_the_known_answers) {
  struct Row {
    const char* id;
    std::array<std::uint32_t, 4> counter;
    std::array<std::uint32_t, 2> key;
    std::array<std::uint32_t, 4> expected;
  };
  const std::uint32_t ones = 0xffffffff;
  const Row rows[] = {{"N1", {0, 0, 0, 0}, {0, 0}, {0x6627e8d5, 0xe169c58d, 0xbc57ac4c, 0x9b00dbd8}},
                      {"N2", {ones, ones, ones, ones}, {ones, ones}, {0x408f276d, 0x41c83b0e, 0xa20bc7c6, 0x6d5451fd}},
                      {"N3",
                       {0x243f6a88, 0x85a308d3, 0x13198a2e, 0x03707344},
                       {0xa4093822, 0x299f31d0},
                       {0xd16cfe09, 0x94fdcceb, 0x5001e420, 0x24126ea1}}};
  for (const Row& row : rows) {
    std::vector<std::uint32_t> words(noise_group);
    const std::uint32_t draw = row.counter[0];
    philox_words({{row.counter[1], row.counter[2], row.counter[3]}, row.key}, draw / 16, words);
    EXPECT_EQ(philox4x32_10(row.counter, row.key), row.expected);
    for (std::size_t j = 0; j < 4; ++j) {
      const std::uint32_t got = words[16 * j + draw % 16];
      fmt::print("Random123 known answers, SC11: {} word {} expected {:08x} got {:08x}\n", row.id, j, row.expected[j],
                 got);
      EXPECT_EQ(got, row.expected[j]) << row.id;
    }
  }
}

/// Adds up value(size) over the table's cells, both signs apart: the exact expectation over all words.
template <typename Value>
double over_table(Value value) {
  const NormalTable& table = normal_table();
  double sum = 0;
  for (std::size_t cell = 0; cell < NormalTable::cells; ++cell) {
    const auto start = [](std::size_t c) {
      const auto bits = (static_cast<std::uint32_t>(c) + NormalTable::first_cell) << NormalTable::mantissa_shift;
      return std::min(0x1p31, static_cast<double>(std::bit_cast<float>(bits)));
    };
    const double from = cell == 0 ? 0 : start(cell);
    sum += value(table.size[cell]) * (start(cell + 1) - from) * 0x1p-32;
  }
  return sum;
}

TEST(NormalTableReference, tails_hold_to_five_sigma) {
  for (const double u : {0.5, 1.0, 2.0, 3.0, 3.5, 4.0, 4.5, 5.0}) {
    check_relative("normal distribution", fmt::format("P(x > {} sigma) of the table", u), upper_tail(u),
                   over_table([u](double x) { return x > u ? 1.0 : 0.0; }), 2e-3);
  }
}

TEST(NormalTableReference, moments_are_those_of_the_normal_distribution) {
  check_near("normal distribution", "variance of the table", 1, 2 * over_table([](double x) { return x * x; }), 2e-5);
  check_near("normal distribution", "fourth moment of the table", 3,
             2 * over_table([](double x) { return x * x * x * x; }), 2e-4);
}

TEST(TransformReference, poisson_and_normal_have_their_moments) {
  constexpr int draws = 400'000;
  for (const double mean : {0.3, 3.0, 29.0, 31.0, 300.0}) {  // inversion up to 30, rejection above
    RandomStream stream(seed, Purpose::PropertyTest, static_cast<std::uint64_t>(mean * 10));
    double sum = 0;
    double squares = 0;
    for (int i = 0; i < draws; ++i) {
      const double n = static_cast<double>(stream.poisson(mean)) - mean;
      sum += n;
      squares += n * n;
    }
    check_near("Poisson distribution", fmt::format("mean of {}", mean), mean, mean + sum / draws,
               4 * std::sqrt(mean / draws));
    check_near("Poisson distribution", fmt::format("variance of {}", mean), mean, squares / draws,
               4 * std::sqrt((mean + 2 * mean * mean) / draws));
  }
  RandomStream stream(seed, Purpose::PropertyTest, 1);
  double sum = 0;
  double squares = 0;
  double fourths = 0;
  for (int i = 0; i < draws; ++i) {
    const double x = stream.normal();
    sum += x;
    squares += x * x;
    fourths += x * x * x * x;
  }
  check_near("normal distribution", "mean", 0, sum / draws, 4 / std::sqrt(draws));
  check_near("normal distribution", "variance", 1, squares / draws, 4 * std::sqrt(2.0 / draws));
  check_near("normal distribution", "fourth moment", 3, fourths / draws, 4 * std::sqrt(96.0 / draws));
}

TEST(PulseReference, shaped_pulse_peaks_where_and_as_high_as_published) {
  const std::pair<int, double> rows[] = {{1, 0.367879}, {2, 0.541341}, {4, 4.688804}};
  for (const auto& [n, expected] : rows) {
    const double tau = 12;
    const double printed_rounding = 5e-7;
    check_near("Knoll, pulse shaping", fmt::format("D12 peak of CR-(RC)^{}", n), expected,
               shaped_pulse(n * tau, tau, n), printed_rounding);
    EXPECT_GT(shaped_pulse(n * tau, tau, n), shaped_pulse(n * tau - 0.1, tau, n));
    EXPECT_GT(shaped_pulse(n * tau, tau, n), shaped_pulse(n * tau + 0.1, tau, n));
  }
}

TEST(CrossingReference, sampled_noise_crosses_as_the_bivariate_normal_says) {
  struct Row {
    const char* id;
    double level, correlation, expected;
  };
  const Row rows[] = {{"Q36", 3, 0, 1.348076e-3},    {"Q36", 3, 0.5, 1.268008e-3}, {"Q36", 3, 0.9, 7.394936e-4},
                      {"Q36", 3, 0.99, 2.483780e-4}, {"Q37", 4, 0, 3.167024e-5},   {"Q37", 4, 0.5, 3.118419e-5},
                      {"Q37", 4, 0.9, 2.112698e-5},  {"Q37", 4, 0.99, 7.456946e-6}};
  for (const Row& row : rows) {
    check_relative(
        "bivariate normal",
        fmt::format("{} up-crossings per sample, {} sigma, correlation {}", row.id, row.level, row.correlation),
        row.expected, up_crossing_probability(row.level, row.correlation), 1e-5);
  }
  check_relative("bivariate normal, D21", "Q38 code >= 8, 2 LSB, correlation 0.5", 8.644625e-5,
                 code_up_crossing_probability(8, 2, 0.5), 1e-5);
}

TEST(CrossingReference, rices_formula_is_the_limit_of_fine_sampling) {
  check_relative("Rice 1944", "Q1 flat 20 MHz, 3 sigma, /s", 128275.6, rice_up_crossing_rate_hz(3, 20e6), 1e-6);
  check_relative("Rice 1944", "Q1 flat 20 MHz, 5 sigma, /s", 43.0317, rice_up_crossing_rate_hz(5, 20e6), 1e-5);
  const std::pair<double, double> rows[] = {{0, 2.500e-3}, {0.5, 1.768e-3}, {0.9, 7.907e-4}, {0.99, 2.5004e-4}};
  for (const auto& [correlation, expected] : rows) {
    check_relative("Rice 1944", fmt::format("Q37 Rice per sample, 3 sigma, correlation {}", correlation), expected,
                   rice_up_crossings_per_sample(3, correlation), 3e-4);
  }
  check_relative("Rice 1944", "limit at correlation 1 - 1e-7, 3 sigma", rice_up_crossings_per_sample(3, 1 - 1e-7),
                 up_crossing_probability(3, 1 - 1e-7), 1e-4);
}

/// Up-crossings of `code >= level` (baseline 0) counted in many stretches of noise.
struct Counted {
  double per_sample;
  double error;  ///< from the scatter of the stretches, so that clustering is in it
};

struct Setting {
  double rms_counts, correlation;
  int level_counts;
};

Counted count_crossings(const Setting& setting, int stretches) {
  constexpr std::int64_t stretch = 1 << 20;
  const NoiseSource noise(
      {.counts_per_mv = 1, .noise_rms_mv = setting.rms_counts, .noise_correlation = setting.correlation}, seed);
  std::vector<float> samples(stretch);
  double sum = 0;
  double squares = 0;
  bool was_over = true;  // a start above the level is no crossing
  for (int i = 0; i < stretches; ++i) {
    noise.write(Purpose::PropertyTest, 0, i * stretch, samples);
    int crossings = 0;
    for (const float x : samples) {
      const bool is_over = static_cast<int>(std::floor(x + 0.5F)) >= setting.level_counts;
      crossings += is_over && !was_over;
      was_over = is_over;
    }
    sum += crossings;
    squares += static_cast<double>(crossings) * crossings;
  }
  const double mean = sum / stretches;
  const double variance = squares / stretches - mean * mean;
  return {mean / stretch, std::sqrt(variance / stretches) / stretch};
}

TEST(CrossingReference, generated_and_rounded_noise_crosses_at_the_predicted_rate) {
  // About 3, 4 and 5 sigma above (level - 1/2), where no more than a few hundred are seen.
  const Setting settings[] = {{2, 0, 6},    {2, 0, 8},    {2, 0, 10},   {2, 0.5, 6},   {2, 0.5, 8},   {2, 0.5, 10},
                              {4, 0.8, 12}, {4, 0.8, 16}, {4, 0.8, 20}, {1.4, 0.3, 6}, {1.4, 0.95, 5}};
  for (const Setting& setting : settings) {
    const double expected = code_up_crossing_probability(setting.level_counts, setting.rms_counts, setting.correlation);
    const Counted counted = count_crossings(setting, 200);
    const double table_error = 2e-3 * expected;
    check_near("bivariate normal, half a count",
               fmt::format("code >= {}, rms {}, correlation {}, {:.2f} sigma", setting.level_counts, setting.rms_counts,
                           setting.correlation, (setting.level_counts - 0.5) / setting.rms_counts),
               expected, counted.per_sample, 4 * counted.error + table_error);
  }
}

TEST(NoiseReference, has_its_rms_and_its_correlation_of_adjacent_samples) {
  constexpr int samples = 2'000'000;
  for (const double correlation : {0.0, 0.3, 0.5, 0.8, 0.95}) {
    std::vector<float> noise(samples);
    NoiseSource({.counts_per_mv = 2, .noise_rms_mv = 3, .noise_correlation = correlation}, seed)
        .write(Purpose::PropertyTest, 0, 0, noise);
    double power = 0;
    double product = 0;
    for (std::size_t i = 1; i < noise.size(); ++i) {
      power += static_cast<double>(noise[i]) * noise[i];
      product += static_cast<double>(noise[i]) * noise[i - 1];
    }
    // Bartlett 1946: neighbours that belong together count once; no more than the 17 taps' lags.
    const double error = std::sqrt(2 * (1 + 2 * 8 * correlation * correlation) / samples);
    check_near("configured", fmt::format("rms in counts, correlation {}", correlation), 6, std::sqrt(power / samples),
               4 * 6 * error / 2);
    check_near("configured", fmt::format("correlation {}", correlation), correlation, product / power, 4 * error);
  }
}

TEST(NoiseReference, is_as_correlated_from_block_to_block_as_inside) {
  constexpr int blocks = 40'000;
  const NoiseSource noise({.counts_per_mv = 1, .noise_rms_mv = 1, .noise_correlation = 0.5}, seed);
  double product = 0;
  for (std::int64_t block = 1; block <= blocks; ++block) {
    std::array<float, 2> pair{};
    noise.write(Purpose::PropertyTest, 0, block * noise_block - 1, pair);
    product += static_cast<double>(pair[0]) * pair[1];
  }
  // Variance of the product of two unit normals of correlation r: 1 + r^2.
  check_near("configured", "correlation across borders of blocks", 0.5, product / blocks, 4 * std::sqrt(1.25 / blocks));
}

}  // namespace
}  // namespace cistern
