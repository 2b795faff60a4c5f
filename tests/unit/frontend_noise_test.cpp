#include <gtest/gtest.h>
#include <hwy/targets.h>

#include <algorithm>
#include <cmath>
#include <numbers>
#include <utility>
#include <vector>

#include "traces/base/random.hpp"
#include "traces/frontend/noise_crossing.hpp"
#include "traces/frontend/noise_filter.hpp"
#include "traces/frontend/noise_kernel.hpp"
#include "traces/frontend/noise_source.hpp"
#include "traces/frontend/normal_table.hpp"

namespace cistern {
namespace {

constexpr std::uint64_t seed = 0x1234'5678'9abc'def0;

/// Runs `check` once with every instruction set of this CPU.
template <typename Check>
void for_every_target(Check check) {
  for (const std::int64_t target : hwy::SupportedAndGeneratedTargets()) {
    SCOPED_TRACE(hwy::TargetName(target));
    hwy::SetSupportedTargetsForTest(target);
    check();
  }
  hwy::SetSupportedTargetsForTest(0);
}

/// Word by word, from the plain bijection.
std::vector<std::uint32_t> plain_words(const PhiloxStream& stream, std::uint32_t first_group, std::size_t size) {
  std::vector<std::uint32_t> words(size);
  for (std::size_t i = 0; i < size; ++i) {
    const std::uint32_t group = first_group + static_cast<std::uint32_t>(i / noise_group);
    const std::uint32_t draw = 16 * group + static_cast<std::uint32_t>(i % 16);
    words[i] = philox4x32_10({draw, stream.counter[0], stream.counter[1], stream.counter[2]},
                             stream.key)[i % noise_group / 16];
  }
  return words;
}

TEST(NoiseKernel, makes_the_words_of_the_plain_generator_on_every_target) {
  const PhiloxStream stream{{7, 8, 9}, {10, 0xffffffff}};
  const auto expected = plain_words(stream, 5, 3 * noise_group);
  for_every_target([&] {
    std::vector<std::uint32_t> words(3 * noise_group);
    philox_words(stream, 5, words);
    EXPECT_EQ(words, expected);
  });
}

TEST(NoiseKernel, makes_the_deviates_of_the_plain_table_on_every_target) {
  const PhiloxStream stream{{1, 2, 3}, {4, 5}};
  std::vector<float> expected;
  for (const std::uint32_t word : plain_words(stream, 0, 64 * noise_group))
    expected.push_back(normal_of(normal_table(), word));
  for_every_target([&] {
    std::vector<float> white(64 * noise_group);
    white_noise(stream, 0, white);
    EXPECT_EQ(white, expected);
  });
}

TEST(NoiseKernel, filters_to_the_same_bits_on_every_target) {
  std::vector<float> white(64 * noise_group);
  white_noise({{1, 2, 3}, {4, 5}}, 0, white);
  const std::vector<float> taps{0.3F, 0.7F, 0.61F};
  std::vector<float> expected(1003);  // not a whole number of vectors
  for (std::size_t i = 0; i < expected.size(); ++i) {
    float sum = taps[0] * white[i + 2];
    sum += taps[1] * white[i + 1];
    sum += taps[2] * white[i];
    expected[i] = sum;
  }
  for_every_target([&] {
    std::vector<float> out(expected.size());
    filter_noise(taps, white.data() + 2, out);
    EXPECT_EQ(out, expected);
  });
}

TEST(NormalTable, covers_every_word) {
  const NormalTable& table = normal_table();
  EXPECT_GT(normal_of(table, 0), 6);  // smallest tail
  EXPECT_LT(normal_of(table, 1), -6);
  EXPECT_NEAR(normal_of(table, 0xffffffff), 0, 0.006);  // largest tail
  EXPECT_NEAR(normal_of(table, 0xfffffffe), 0, 0.006);
  EXPECT_NEAR(normal_of(table, 0x80000000), 0.67449, 0.006);  // quartile
}

TEST(NormalTable, falls_with_rising_tail_probability) {
  const NormalTable& table = normal_table();
  float before = 10;
  for (std::uint64_t word = 0; word < 0x1'0000'0000; word += 2 + word / 300) {
    const float size = normal_of(table, static_cast<std::uint32_t>(word & ~1ULL));
    ASSERT_LE(size, before) << word;
    before = size;
  }
}

TEST(NoiseFilter, has_unit_power_and_the_wanted_correlation) {
  for (const double correlation : {0.0, 1e-6, 0.1, 0.3, 0.4999, 0.5, 0.5001, 0.6, 0.75, 0.9, 0.95}) {
    const std::vector<double> taps = noise_taps(correlation);
    double power = 0;
    for (const double tap : taps) power += tap * tap;
    EXPECT_NEAR(power, 1, 1e-12) << correlation;
    EXPECT_NEAR(tap_correlation(taps, 1), correlation, 1e-9) << correlation;
    EXPECT_LE(taps.size(), noise_taps_max);
  }
}

TEST(NoiseFilter, is_as_short_as_can_be) {
  EXPECT_EQ(noise_taps(0).size(), 1U);
  EXPECT_EQ(noise_taps(0.5).size(), 2U);
  EXPECT_EQ(noise_taps(0.51).size(), 3U);
}

std::vector<float> noise_of(const FrontendConfig& config, std::uint64_t index, std::int64_t first,
                            std::size_t samples) {
  std::vector<float> out(samples);
  NoiseSource(config, seed).write(Purpose::ElectronicNoise, index, first, out);
  return out;
}

TEST(NoiseSource, is_the_same_however_it_is_cut) {
  for (const double correlation : {0.0, 0.5, 0.95}) {
    const FrontendConfig config{.noise_correlation = correlation};
    const auto whole = noise_of(config, 100, 0, 3 * noise_block);
    for (const auto& [first, samples] : {std::pair{0, 1},
                                         {1, 15},
                                         {7, 9},
                                         {16, 64},
                                         {4000, 200},
                                         {4095, 1},
                                         {4096, 1},
                                         {4097, 4096},
                                         {4104, 3},
                                         {4112, 80},
                                         {8191, 4097}}) {
      const auto part = noise_of(config, 100, first, static_cast<std::size_t>(samples));
      EXPECT_TRUE(std::equal(part.begin(), part.end(), whole.begin() + first)) << first << " + " << samples;
    }
  }
}

TEST(NoiseSource, differs_between_streams_and_blocks) {
  const auto one = noise_of({}, 100, 0, noise_block);
  EXPECT_NE(one, noise_of({}, 300, 0, noise_block));
  EXPECT_NE(one, noise_of({}, 100, noise_block, noise_block));
}

TEST(NoiseSource, is_silent_without_noise) {
  for (const float sample : noise_of({.noise_rms_mv = 0}, 1, 0, 100)) EXPECT_EQ(sample, 0);
}

TEST(NoiseCrossing, of_independent_samples_is_below_then_above) {
  for (const double u : {-1.0, 0.0, 1.0, 3.0}) {
    const double above = 0.5 * std::erfc(u / std::sqrt(2.0));
    EXPECT_NEAR(up_crossing_probability(u, 0), above * (1 - above), 1e-12) << u;
  }
}

TEST(NoiseCrossing, at_the_mean_follows_the_arc_sine_law) {
  // Sheppard 1899: both above 0 with probability 1/4 + asin(r) / (2 pi).
  EXPECT_NEAR(up_crossing_probability(0, 0.5), 0.5 - (0.25 + std::asin(0.5) / (2 * std::numbers::pi)), 1e-14);
}

TEST(NoiseCrossing, of_codes_acts_half_a_count_lower) {
  EXPECT_DOUBLE_EQ(code_up_crossing_probability(8, 2, 0.5), up_crossing_probability(3.75, 0.5));
}

}  // namespace
}  // namespace cistern
