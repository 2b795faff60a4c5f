/// What `traces describe` says, against codes whose answer is known.
#include "traces/files/description.hpp"

#include <gtest/gtest.h>

#include <cmath>
#include <numbers>
#include <numeric>

#include "tests/unit/files_support.hpp"

namespace cistern {
namespace {

constexpr std::uint64_t seed = 99;

TraceDescription describe(const std::vector<Codes>& traces, std::int32_t bits, std::size_t cut = SIZE_MAX) {
  TraceSurvey survey(traces.front().channels(), bits);
  for (std::size_t t = 0; t < traces.size(); ++t) {
    const CodesView codes = traces[t].view();
    for (std::size_t s = 0; s < codes.samples();) {
      const std::size_t count = std::min(cut, codes.samples() - s);
      survey.take({static_cast<std::int64_t>(t),
                   static_cast<std::int64_t>(s),
                   s + count == codes.samples(),
                   {},
                   codes.part(s, count)});
      s += count;
    }
  }
  return survey.description();
}

ChannelDescription describe_channel(const std::vector<std::int16_t>& codes, std::int32_t bits = 12) {
  Codes trace(1, codes.size());
  std::copy(codes.begin(), codes.end(), trace.channel(0).begin());
  return describe({trace}, bits).channels.front();
}

std::int16_t rounded(double value) { return static_cast<std::int16_t>(std::floor(value + 0.5)); }

/// Normal noise about a baseline between two codes.
std::vector<std::int16_t> noise(double mean, double sigma, std::size_t samples = 200'000) {
  RandomStream stream(seed, Purpose::PropertyTest, 0);
  std::vector<std::int16_t> codes(samples);
  for (std::int16_t& code : codes) code = rounded(mean + sigma * stream.normal());
  return codes;
}

TEST(TraceSurvey, counts_traces_samples_and_seconds) {
  const TraceDescription d = describe({Codes(2, 50), Codes(2, 50), Codes(2, 50)}, 12);
  EXPECT_EQ(d.traces, 3);
  EXPECT_EQ(d.samples, 150);
  EXPECT_EQ(d.channels.size(), 2U);
  EXPECT_DOUBLE_EQ(d.duration_s(100).value(), 1.5e-6);
  EXPECT_FALSE(d.duration_s({}));
}

TEST(TraceSurvey, gives_extremes_mean_and_rms_of_all_samples) {
  const ChannelDescription d = describe_channel({1, 3, 3, 9});
  EXPECT_EQ(d.smallest, 1);
  EXPECT_EQ(d.largest, 9);
  EXPECT_DOUBLE_EQ(d.mean, 4);
  EXPECT_DOUBLE_EQ(d.rms, 3);  // sqrt((9 + 1 + 1 + 25) / 4)
  EXPECT_EQ(d.baseline, 3);
}

TEST(TraceSurvey, counts_saturated_samples_at_both_ends) {
  const ChannelDescription d = describe_channel({0, 0, 15, 7, 14, 1}, 4);
  EXPECT_EQ(d.at_zero, 2);
  EXPECT_EQ(d.at_largest_code, 1);
}

TEST(TraceSurvey, keeps_channels_apart) {
  Codes trace(2, 4);
  std::fill(trace.channel(0).begin(), trace.channel(0).end(), std::int16_t{5});
  std::fill(trace.channel(1).begin(), trace.channel(1).end(), std::int16_t{7});
  const TraceDescription d = describe({trace}, 12);
  EXPECT_EQ(d.channels[0].baseline, 5);
  EXPECT_EQ(d.channels[1].baseline, 7);
}

TEST(TraceSurvey, a_constant_channel_has_no_noise) {
  EXPECT_EQ(describe_channel(std::vector<std::int16_t>(100, 212)).noise_rms, 0);
}

TEST(TraceSurvey, a_channel_between_two_codes_has_the_noise_of_both) {
  std::vector<std::int16_t> codes(1'000, 212);
  for (std::size_t s = 0; s < 400; ++s) codes[s] = 213;
  EXPECT_DOUBLE_EQ(describe_channel(codes).noise_rms, std::sqrt(0.4 * 0.6));
}

/// Rounding adds 1/12 to the variance (Sheppard's correction); 200,000 samples leave 0.2 % of it.
TEST(TraceSurvey, noise_is_that_of_the_baseline_wherever_it_lies_between_codes) {
  for (const double sigma : {0.7, 1.0, 2.0, 5.5}) {
    for (const double mean : {212.0, 212.25, 212.49, 212.51, 212.75}) {
      const ChannelDescription d = describe_channel(noise(mean, sigma));
      const double expected = std::sqrt(sigma * sigma + 1.0 / 12);
      EXPECT_NEAR(d.noise_rms / expected, 1, 0.01) << "mean " << mean << ", sigma " << sigma << ", seed " << seed;
    }
  }
}

TEST(TraceSurvey, pulses_widen_the_rms_but_not_the_noise) {
  std::vector<std::int16_t> codes = noise(212.3, 2);
  for (std::size_t start = 0; start + 60 < codes.size(); start += 600) {
    for (std::size_t s = 0; s < 60; ++s)
      codes[start + s] = rounded(codes[start + s] + 900 * std::exp(-static_cast<double>(s) / 12));
  }
  const ChannelDescription d = describe_channel(codes);
  EXPECT_EQ(d.baseline, 212);
  EXPECT_GT(d.rms, 20);
  EXPECT_NEAR(d.noise_rms, std::sqrt(4 + 1.0 / 12), 0.1);
}

TEST(TraceSurvey, dips_do_not_widen_the_noise_either) {
  std::vector<std::int16_t> codes = noise(212.3, 2);
  for (std::size_t s = 0; s < codes.size(); s += 20) codes[s] = 100;
  EXPECT_NEAR(describe_channel(codes).noise_rms, std::sqrt(4 + 1.0 / 12), 0.1);
}

TEST(TraceSurvey, how_traces_are_cut_changes_nothing) {
  RandomStream stream(seed, Purpose::PropertyTest, 1);
  for (const std::size_t samples : {3U, 700U, 1'023U, 1'024U, 1'025U, 5'000U}) {
    const WholeFile file = random_file(4, 2, samples, 12, stream);
    const TraceDescription whole = describe(file.traces, 12);
    for (const std::size_t cut : {1U, 7U, 1'000U, 1'024U}) {
      const TraceDescription d = describe(file.traces, 12, cut);
      for (std::size_t c = 0; c < 2; ++c) {
        EXPECT_EQ(d.channels[c].spectrum, whole.channels[c].spectrum) << samples << " in " << cut;
        EXPECT_EQ(d.channels[c].rms, whole.channels[c].rms);
      }
    }
  }
}

TEST(TraceSurvey, segments_are_1024_samples_or_the_power_of_two_in_a_shorter_trace) {
  struct Row {
    std::size_t samples, bins;
  };
  for (const auto [samples, bins] : {Row{1, 0}, {3, 0}, {4, 3}, {700, 257}, {1'023, 257}, {1'024, 513}, {3'000, 513}}) {
    const std::vector<std::int16_t> codes(samples, 5);
    EXPECT_EQ(describe_channel(codes).spectrum.size(), bins) << samples;
  }
}

TEST(TraceSurvey, no_segment_goes_across_the_end_of_a_trace) {
  RandomStream stream(seed, Purpose::PropertyTest, 2);
  const WholeFile file = random_file(2, 1, 1'500, 12, stream);
  std::vector<Codes> heads;
  for (const Codes& trace : file.traces) {
    std::copy_n(trace.channel(0).begin(), 1'024, heads.emplace_back(1, 1'024).channel(0).begin());
  }
  EXPECT_EQ(describe(file.traces, 12).channels[0].spectrum, describe(heads, 12).channels[0].spectrum);
}

TEST(TraceSurvey, power_adds_up_to_the_mean_square_of_noise) {
  for (const std::size_t samples : {512U, 4'096U}) {
    std::vector<Codes> traces;
    const std::vector<std::int16_t> codes = noise(212.3, 6, 200 * samples);
    for (std::size_t t = 0; t < 200; ++t) {
      std::copy_n(codes.begin() + static_cast<std::ptrdiff_t>(t * samples), samples,
                  traces.emplace_back(1, samples).channel(0).begin());
    }
    const auto spectrum = describe(traces, 12).channels.front().spectrum;
    const double power = std::accumulate(spectrum.begin(), spectrum.end(), 0.0);
    EXPECT_NEAR(power / (36 + 1.0 / 12), 1, 0.03) << samples << " samples, seed " << seed;
  }
}

TEST(TraceSurvey, a_tone_stands_in_its_bin) {
  std::vector<std::int16_t> codes(8 * 1'024);
  for (std::size_t s = 0; s < codes.size(); ++s) {
    codes[s] = rounded(2'000 + 500 * std::sin(2 * std::numbers::pi * 100 * static_cast<double>(s) / 1'024));
  }
  const auto spectrum = describe_channel(codes).spectrum;
  const double total = std::accumulate(spectrum.begin(), spectrum.end(), 0.0);
  // Rounding moves no sample by more than half a count, so by the triangle inequality not the rms either.
  EXPECT_NEAR(std::sqrt(total), 500 / std::numbers::sqrt2, 0.5);
  // Hann: amplitude 1, 1/2, 1/2 in the three bins, so powers 2/3, 1/6, 1/6 (Harris 1978).
  EXPECT_NEAR(spectrum[100] / total, 2.0 / 3, 1e-3);
  EXPECT_NEAR(spectrum[99] / total, 1.0 / 6, 1e-3);
  EXPECT_NEAR(spectrum[101] / total, 1.0 / 6, 1e-3);
}

}  // namespace
}  // namespace cistern
