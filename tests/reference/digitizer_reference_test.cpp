/// \file
/// The digitizer against what is published about the ideal quantizer.
#include <fmt/core.h>
#include <gtest/gtest.h>

#include <array>
#include <cmath>
#include <numbers>
#include <vector>

#include "firmware_model/digitizer/digitizer.hpp"
#include "traces/base/random.hpp"

namespace cistern {
namespace {

void expect_near(const char* what, const char* source, double expected, double got, double tolerance) {
  fmt::print("{}: expected {:.7g} ({}), got {:.7g}, tolerance {:.2g}\n", what, expected, source, got, tolerance);
  EXPECT_NEAR(got, expected, tolerance) << what;
}

/// `waveform` is in counts above half scale.
std::vector<double> quantized(std::int32_t bits, const std::vector<double>& waveform) {
  const DigitizerConfig config{.channels = 1, .bits = bits, .baseline_counts = {1 << (bits - 1)}, .gain = {}};
  Waveform analogue(1, waveform.size());
  for (std::size_t n = 0; n < waveform.size(); ++n) analogue.channel(0)[n] = static_cast<float>(waveform[n]);
  Codes codes;
  digitize(config, analogue, codes);
  return {codes.view().channel(0).begin(), codes.view().channel(0).end()};
}

struct SineFit {
  double amplitude;
  double offset;
  double residual_rms;
};

/// Three-parameter fit at a known frequency of `cycles` whole cycles in the record, where the sine,
/// the cosine and the constant are orthogonal, so that each parameter is a plain projection.
SineFit fit_sine(const std::vector<double>& codes, int cycles) {
  const auto size = static_cast<double>(codes.size());
  double in_phase = 0;
  double quadrature = 0;
  double offset = 0;
  const auto angle = [&](std::size_t n) { return 2 * std::numbers::pi * cycles * static_cast<double>(n) / size; };
  for (std::size_t n = 0; n < codes.size(); ++n) {
    in_phase += codes[n] * std::sin(angle(n)) * 2 / size;
    quadrature += codes[n] * std::cos(angle(n)) * 2 / size;
    offset += codes[n] / size;
  }
  double squares = 0;
  for (std::size_t n = 0; n < codes.size(); ++n) {
    const double rest = codes[n] - offset - in_phase * std::sin(angle(n)) - quadrature * std::cos(angle(n));
    squares += rest * rest;
  }
  return {std::hypot(in_phase, quadrature), offset, std::sqrt(squares / size)};
}

/// A full-scale sine of odd `cycles`, so that every sample of the record has a phase of its own.
/// Half a count lower than the pedestal: a quantizer that rounds then acts as one that cuts off.
std::vector<double> full_scale_sine(std::int32_t bits, std::size_t samples, int cycles) {
  std::vector<double> waveform(samples);
  const double amplitude = std::pow(2.0, bits - 1) - 0.5;
  for (std::size_t n = 0; n < samples; ++n) {
    const double turns = cycles * static_cast<double>(n) / static_cast<double>(samples);
    waveform[n] = amplitude * std::sin(2 * std::numbers::pi * turns + 0.1) - 0.5;
  }
  return waveform;
}

TEST(DigitizerReference, reaches_the_signal_to_noise_ratio_of_an_ideal_quantizer) {
  struct Row {
    std::int32_t bits;
    double expected_db;
  };
  const Row rows[] = {{8, 49.926}, {10, 61.967}, {12, 74.008}, {14, 86.049}};
  for (const Row& row : rows) {
    constexpr std::size_t samples = 1U << 20U;
    const SineFit fit = fit_sine(quantized(row.bits, full_scale_sine(row.bits, samples, 261'121)), 261'121);
    const double got_db = 20 * std::log10(fit.amplitude / std::numbers::sqrt2 / fit.residual_rms);
    // The law takes the error as evenly spread, which the flat tops of a sine break in 2^-(bits/2) of its samples:
    // 0.12 dB at 8 bits. The amplitude is half a count below the full scale, 0.03 dB at 8 bits.
    const double tolerance_db = 2 * std::pow(2.0, -row.bits / 2.0);
    expect_near("signal to noise ratio in dB", "Bennett 1948", row.expected_db, got_db, tolerance_db);
  }
}

TEST(DigitizerReference, adds_the_quantisation_noise_of_evenly_spread_errors) {
  constexpr std::uint64_t seed = 4;
  constexpr int samples = 1'000'000;
  RandomStream stream(seed, Purpose::PropertyTest, 0);
  std::vector<double> waveform(samples);
  for (double& value : waveform) value = static_cast<float>(stream.uniform(-500, 500));
  const std::vector<double> codes = quantized(12, waveform);
  double squares = 0;
  for (std::size_t n = 0; n < codes.size(); ++n) squares += std::pow(codes[n] - 2048 - waveform[n], 2);
  // The mean square of an evenly spread error has the variance (1/80 - 1/144)/n = 1/(180 n).
  const double four_sigma = 4 * std::sqrt(1 / (180.0 * samples)) / (2 / std::sqrt(12.0));
  expect_near("quantisation noise in LSB", "Bennett 1948, LSB/sqrt(12)", 0.2886751, std::sqrt(squares / samples),
              four_sigma);
}

TEST(DigitizerReference, gives_the_sine_fit_of_the_worked_full_scale_record) {
  constexpr const char* source = "IEEE 1057/1241 sine fit, computed";
  const SineFit fit = fit_sine(quantized(12, full_scale_sine(12, 4096, 1021)), 1021);
  expect_near("fitted amplitude in LSB", source, 2047.5011, fit.amplitude, 1e-4);
  // A quantizer that cuts off has its thresholds at whole numbers: the fit's middle is half a count lower.
  expect_near("fitted offset in LSB", source, 2047.5000, fit.offset, 1e-4);
  expect_near("residual in LSB", source, 0.289741, fit.residual_rms, 1e-4);
  expect_near("effective bits", source, 11.9947, 12 - std::log2(fit.residual_rms * std::sqrt(12.0)), 1e-4);
}

}  // namespace
}  // namespace cistern
