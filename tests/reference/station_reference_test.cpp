/// \file
/// Losses of a station without free buffers, with firings at random times, against the laws of dead time and of
/// telephone traffic. Fixed seeds; every tolerance is 4 standard errors (two-sided confidence 99.994 %).
#include <fmt/core.h>
#include <gtest/gtest.h>

#include <cmath>
#include <vector>

#include "firmware_model/station/capture_book.hpp"
#include "traces/base/random.hpp"

namespace cistern {
namespace {

constexpr std::uint64_t seed = 1917;

void expect_within_four_errors(const std::string& what, const char* source, double expected, double got, double error) {
  fmt::print("{}: expected {:.7g} ({}), got {:.7g}, tolerance {:.2g}\n", what, expected, source, got, 4 * error);
  EXPECT_NEAR(got, expected, 4 * error) << what << ", seed " << seed;
}

/// Firings at random times between `begin` and `end`.
void take_poisson(CaptureBook& book, double mean_gap_samples, std::int64_t begin, std::int64_t end,
                  std::uint64_t index) {
  RandomStream stream(seed, Purpose::PropertyTest, index);
  double at = static_cast<double>(begin) + stream.exponential(mean_gap_samples);
  for (; at < static_cast<double>(end); at += stream.exponential(mean_gap_samples)) {
    book.take(static_cast<std::int64_t>(at));
  }
}

struct LossMeasurement {
  double lost;        ///< part of the firings
  double lost_error;  ///< standard error, from the spread of independent blocks
  double busy;        ///< part of the time
  double busy_error;
};

struct Moments {
  double sum{0};
  double squares{0};
  int count{0};
  void add(double value) { sum += value, squares += value * value, ++count; }
  [[nodiscard]] double mean() const { return sum / count; }
  [[nodiscard]] double error() const { return std::sqrt((squares / count - mean() * mean()) / (count - 1)); }
};

/// Losses come in bursts, so their error is taken from the spread of blocks. Each block starts empty and runs for
/// `warm_up` before it counts.
LossMeasurement measure_loss(const CaptureConfig& config, double mean_gap_samples, std::int64_t warm_up,
                             std::uint64_t case_number) {
  constexpr int blocks = 200;
  constexpr double firings_per_block = 3'000;
  const auto counted = static_cast<std::int64_t>(firings_per_block * mean_gap_samples);
  Moments lost;
  Moments busy;
  for (int block = 0; block < blocks; ++block) {
    CaptureBook book(config);
    const std::uint64_t index = 2 * (case_number * blocks + static_cast<std::uint64_t>(block));
    take_poisson(book, mean_gap_samples, 0, warm_up, index);
    const std::int64_t lost_before = book.count(CaptureOutcome::NoFreeBuffer);
    const std::int64_t busy_before = book.busy_samples(warm_up);
    take_poisson(book, mean_gap_samples, warm_up, warm_up + counted, index + 1);
    lost.add(static_cast<double>(book.count(CaptureOutcome::NoFreeBuffer) - lost_before) / firings_per_block);
    busy.add(static_cast<double>(book.busy_samples(warm_up + counted) - busy_before) / static_cast<double>(counted));
  }
  return {lost.mean(), lost.error(), busy.mean(), busy.error()};
}

TEST(StationReference, with_one_buffer_has_the_non_paralysable_dead_time) {
  struct Row {
    double rate_hz;
    double dead_time_us;
    double expected_hz;
  };
  const Row rows[] = {{1e5, 5, 66'666.67}, {1e6, 1, 500'000}};
  std::uint64_t index = 1'000'000;
  for (const Row& row : rows) {
    // Samples so short that two firings in one are rarer than one in a million.
    const double sample_rate_hz = 1e6 * row.rate_hz;
    const auto dead_samples = static_cast<std::int64_t>(std::llround(row.dead_time_us * 1e-6 * sample_rate_hz));
    const CaptureConfig config{.pre_samples = 0,
                               .post_samples = dead_samples / 4,
                               .buffers = 1,
                               .copy_out_samples = dead_samples - dead_samples / 4,
                               .max_samples = dead_samples};
    constexpr double live_firings = 1e6;
    const auto end = static_cast<std::int64_t>(live_firings / row.rate_hz * sample_rate_hz);
    CaptureBook book(config);
    take_poisson(book, sample_rate_hz / row.rate_hz, 0, end, index++);
    const double time_s = live_firings / row.rate_hz;
    const double got_hz = static_cast<double>(book.count(CaptureOutcome::Captured)) / time_s;
    // Renewal theory: the count has the variance rate x time / (1 + rate x dead time)^3.
    const double slowing = 1 + row.rate_hz * row.dead_time_us * 1e-6;
    const double error_hz = std::sqrt(row.rate_hz / std::pow(slowing, 3) / time_s);
    expect_within_four_errors("captures per second", "n/(1 + n tau), Knoll", row.expected_hz, got_hz, error_hz);
    const double busy = static_cast<double>(book.busy_samples(end)) / static_cast<double>(end);
    expect_within_four_errors("busy part of the time", "n tau/(1 + n tau), Knoll", 1 - 1 / slowing, busy,
                              error_hz * row.dead_time_us * 1e-6);
  }
}

TEST(StationReference, with_many_buffers_loses_what_Erlang_says) {
  struct Row {
    std::int32_t buffers;
    double offered_erlang;
  };
  // Offered traffic for a loss of 1 %.
  const Row rows[] = {{1, 0.010101}, {2, 0.152593},   {5, 1.360787},   {10, 4.461177},
                      {15, 8.108},   {20, 12.030615}, {50, 37.901398}, {100, 84.064159}};
  std::uint64_t case_number = 1;
  for (const Row& row : rows) {
    constexpr std::int64_t hold_samples = 1'000'000'000;
    const CaptureConfig config{.pre_samples = 0,
                               .post_samples = hold_samples,
                               .buffers = row.buffers,
                               .copy_out_samples = 0,
                               .overlap = OverlapPolicy::NewBuffer,
                               .max_samples = hold_samples};
    const double mean_gap_samples = static_cast<double>(hold_samples) / row.offered_erlang;
    const LossMeasurement got = measure_loss(config, mean_gap_samples, 4 * hold_samples, case_number++);
    const std::string name = fmt::format("{} buffers, {} erlang: ", row.buffers, row.offered_erlang);
    expect_within_four_errors(name + "lost", "Erlang 1917", 0.01, got.lost, got.lost_error);
    expect_within_four_errors(name + "busy", "Erlang 1917", 0.01, got.busy, got.busy_error);
  }
}

TEST(StationReference, with_one_bus_loses_like_a_queue_of_constant_service) {
  struct Row {
    double load;
    std::int32_t buffers;
    double expected;
  };
  const Row rows[] = {{0.5, 1, 0.333333},  {0.5, 2, 0.0962745},  {0.8, 5, 0.0352904},
                      {0.9, 5, 0.0643619}, {0.9, 10, 0.0166317}, {1, 5, 0.1034489}};
  std::uint64_t case_number = 100;
  for (const Row& row : rows) {
    constexpr std::int64_t copy_out_samples = 100'000'000;
    const CaptureConfig config{.pre_samples = 0,
                               .post_samples = 1,
                               .buffers = row.buffers,
                               .copy_out_samples = copy_out_samples,
                               .overlap = OverlapPolicy::NewBuffer,
                               .max_samples = 1};
    const double mean_gap_samples = static_cast<double>(copy_out_samples) / row.load;
    const LossMeasurement got = measure_loss(config, mean_gap_samples, 200 * copy_out_samples, case_number++);
    const std::string name = fmt::format("{} buffers, load {} of the bus: ", row.buffers, row.load);
    expect_within_four_errors(name + "lost", "M/D/1/K, Brun and Garcia 2000", row.expected, got.lost, got.lost_error);
    expect_within_four_errors(name + "busy", "M/D/1/K, Brun and Garcia 2000", row.expected, got.busy, got.busy_error);
  }
}

}  // namespace
}  // namespace cistern
