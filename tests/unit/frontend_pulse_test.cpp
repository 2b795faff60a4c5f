#include <gtest/gtest.h>

#include <algorithm>
#include <cmath>
#include <numbers>
#include <numeric>
#include <vector>

#include "traces/frontend/pulse_shape.hpp"

namespace cistern {
namespace {

std::vector<float> pulse_at(const FrontendConfig& config, double time, std::size_t samples, float charge = 1) {
  std::vector<float> out(samples, 0.0F);
  PulseShape(config, 100).add(time, charge, out);
  return out;
}

TEST(PulseShape, starts_after_its_time) {
  const auto out = pulse_at({}, 20, 100);
  EXPECT_EQ(out[20], 0);
  EXPECT_GT(out[21], 0);
}

TEST(PulseShape, peaks_at_the_configured_height) {
  // Peak at twice the shaping time: 20 ns are 2 samples after the start.
  const FrontendConfig config{.counts_per_mv = 2, .pulse_height_mv = 3, .shaping_time_ns = 10};
  const auto out = pulse_at(config, 20, 100);
  EXPECT_NEAR(*std::max_element(out.begin(), out.end()), 6, 1e-5);
  EXPECT_NEAR(out[22], 6, 1e-5);
}

TEST(PulseShape, has_the_area_of_its_formula) {
  // Integral of (t/tau)^2 e^(-t/tau) over its peak: 2 tau / (4 e^-2).
  const FrontendConfig config{.counts_per_mv = 2, .pulse_height_mv = 3, .shaping_time_ns = 12};
  const double expected = 6 * 2 * 1.2 / (4 * std::exp(-2.0));
  EXPECT_NEAR(PulseShape(config, 100).area_counts(), expected, 1e-4 * expected);
  // One pulse alone is sampled coarsely: by Poisson's summation formula its sum ripples with the
  // arrival time by the spectrum at multiples of the sampling rate, 2 (1 + (2 pi k tau / T)^2)^(-3/2).
  double ripple = 0;
  for (int k = 1; k <= 10; ++k) ripple += 2 * std::pow(1 + std::pow(2 * std::numbers::pi * k * 1.2, 2), -1.5);
  for (const double time : {20.0, 20.3, 20.7}) {
    const auto out = pulse_at(config, time, 200);
    EXPECT_NEAR(std::accumulate(out.begin(), out.end(), 0.0), expected, ripple * expected) << time;
  }
}

TEST(PulseShape, moves_with_its_time_in_steps_of_a_sixteenth) {
  const auto early = pulse_at({}, 20, 100);
  EXPECT_EQ(pulse_at({}, 20.03, 100), early);
  EXPECT_NE(pulse_at({}, 20.04, 100), early);
  const auto next = pulse_at({}, 21, 100);
  EXPECT_TRUE(std::equal(next.begin() + 1, next.end(), early.begin()));
}

TEST(PulseShape, is_cut_at_both_ends_of_the_trace) {
  const auto whole = pulse_at({}, 40, 100);
  const auto before = pulse_at({}, -5, 100);
  EXPECT_TRUE(std::equal(before.begin(), before.begin() + 50, whole.begin() + 45));
  const auto after = pulse_at({}, 90, 100);
  EXPECT_TRUE(std::equal(after.begin() + 90, after.end(), whole.begin() + 40));
  for (const double outside : {-1000.0, 100.0, 1e6})
    EXPECT_EQ(pulse_at({}, outside, 100), std::vector<float>(100, 0.0F));
}

TEST(PulseShape, grows_with_the_charge) {
  const auto one = pulse_at({}, 20, 100);
  const auto two = pulse_at({}, 20, 100, 2);
  for (std::size_t i = 0; i < one.size(); ++i) EXPECT_EQ(two[i], 2 * one[i]);
}

TEST(ChargeSpread, has_mean_one_and_the_configured_width) {
  for (const double relative_rms : {0.1, 0.35, 1.0}) {
    const ChargeSpread charge(relative_rms);
    RandomStream stream(6, Purpose::PropertyTest, 0);
    constexpr int draws = 100'000;
    double sum = 0;
    double squares = 0;
    for (int i = 0; i < draws; ++i) {
      const double q = charge.draw(stream);
      ASSERT_GT(q, 0);
      sum += q;
      squares += q * q;
    }
    const double mean = sum / draws;
    const double rms = std::sqrt(squares / draws - mean * mean);
    EXPECT_NEAR(mean, 1, 4 * relative_rms / std::sqrt(draws));
    // Kurtosis of a gamma distribution: 3 + 6 times the squared relative width.
    const double rms_error = rms * std::sqrt((2 + 6 * relative_rms * relative_rms) / (4.0 * draws));
    EXPECT_NEAR(rms, relative_rms, 4 * rms_error);
  }
}

TEST(ChargeSpread, may_be_absent) {
  RandomStream stream(7, Purpose::PropertyTest, 0);
  EXPECT_EQ(ChargeSpread(0).draw(stream), 1.0F);
}

}  // namespace
}  // namespace cistern
