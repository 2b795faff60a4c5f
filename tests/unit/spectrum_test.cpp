/// The transform against its definition, and Parseval's theorem.
#include "traces/files/spectrum.hpp"

#include <gtest/gtest.h>

#include <cmath>
#include <complex>
#include <numbers>
#include <numeric>

#include "traces/base/random.hpp"

namespace cistern {
namespace {

constexpr std::uint64_t seed = 1'965;

std::vector<double> random_segment(std::size_t size) {
  RandomStream stream(seed, Purpose::PropertyTest, size);
  std::vector<double> values(size);
  for (double& value : values) value = stream.normal();
  return values;
}

double hann(std::size_t n, std::size_t size) {
  return 0.5 - 0.5 * std::cos(2 * std::numbers::pi * static_cast<double>(n) / static_cast<double>(size));
}

/// Sum by sum, as the header states it.
std::vector<double> power_by_definition(const std::vector<double>& values) {
  const std::size_t size = values.size();
  double window_power = 0;
  for (std::size_t n = 0; n < size; ++n) window_power += hann(n, size) * hann(n, size);
  std::vector<double> power;
  for (std::size_t k = 0; k <= size / 2; ++k) {
    std::complex<double> sum = 0;
    for (std::size_t n = 0; n < size; ++n) {
      const double angle = -2 * std::numbers::pi * static_cast<double>(k * n % size) / static_cast<double>(size);
      sum += std::polar(values[n] * hann(n, size), angle);
    }
    const double halves = k == 0 || k == size / 2 ? 1 : 2;
    power.push_back(halves * std::norm(sum) / (static_cast<double>(size) * window_power));
  }
  return power;
}

TEST(Periodogram, equals_its_definition_for_every_size) {
  for (std::size_t size = 4; size <= 1'024; size *= 2) {
    const std::vector<double> values = random_segment(size);
    const std::vector<double> expected = power_by_definition(values);
    const std::vector<double> power = Periodogram(size).power_of(values);
    ASSERT_EQ(power.size(), size / 2 + 1);
    for (std::size_t k = 0; k < power.size(); ++k) {
      EXPECT_NEAR(power[k], expected[k], 1e-12) << size << " bin " << k << " seed " << seed;  // rounding of 1,024 terms
    }
  }
}

TEST(Periodogram, obeys_parseval) {
  for (std::size_t size = 4; size <= 4'096; size *= 2) {
    const std::vector<double> values = random_segment(size);
    double windowed = 0;
    double window_power = 0;
    for (std::size_t n = 0; n < size; ++n) {
      windowed += std::pow(values[n] * hann(n, size), 2);
      window_power += std::pow(hann(n, size), 2);
    }
    const std::vector<double> power = Periodogram(size).power_of(values);
    EXPECT_NEAR(std::accumulate(power.begin(), power.end(), 0.0), windowed / window_power, 1e-12) << size;
  }
}

TEST(Periodogram, a_segment_loses_its_mean) {
  std::vector<double> power(9);
  Periodogram(16).add(std::vector<std::int16_t>(16, 1'234), power);
  for (const double bin : power) EXPECT_EQ(bin, 0);
}

TEST(Periodogram, adds_segments) {
  const std::vector<std::int16_t> segment{1, 5, 2, 8, 1, 5, 2, 9};
  Periodogram periodogram(8);
  std::vector<double> once(5);
  std::vector<double> twice(5);
  periodogram.add(segment, once);
  periodogram.add(segment, twice);
  periodogram.add(segment, twice);
  EXPECT_GT(once[2], 0);
  for (std::size_t k = 0; k < 5; ++k) EXPECT_DOUBLE_EQ(twice[k], 2 * once[k]);
}

using PeriodogramDeathTest = testing::Test;

TEST(PeriodogramDeathTest, only_powers_of_two_from_four_on) {
  for (const std::size_t size : {0U, 2U, 3U, 6U, 1'000U}) EXPECT_DEATH(Periodogram{size}, "internal fault") << size;
}

}  // namespace
}  // namespace cistern
