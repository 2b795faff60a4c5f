#include "firmware_model/digitizer/digitizer.hpp"

#include <gtest/gtest.h>

#include <algorithm>
#include <cmath>
#include <limits>
#include <vector>

#include "traces/base/random.hpp"
#include "traces/base/rounding.hpp"

namespace cistern {
namespace {

DigitizerConfig one_channel(std::int32_t bits, std::int32_t baseline_counts, double gain) {
  return {.channels = 1, .bits = bits, .baseline_counts = {baseline_counts}, .gain = {gain}};
}

std::vector<std::int16_t> digitized(const DigitizerConfig& config, const std::vector<float>& values) {
  Waveform waveform(1, values.size());
  std::copy(values.begin(), values.end(), waveform.channel(0).begin());
  Codes codes;
  digitize(config, waveform, codes);
  const auto channel = codes.view().channel(0);
  return {channel.begin(), channel.end()};
}

struct Row {
  const char* name;
  float value;
  std::int16_t code;
};

TEST(Digitizer, rounds_halves_up) {
  const float below_half = std::nextafter(0.5F, 0.0F);
  const Row rows[] = {{"zero", 0.0F, 100},          {"just under a half", 0.499F, 100},
                      {"a half", 0.5F, 101},        {"one and a half", 1.5F, 102},
                      {"minus a half", -0.5F, 100}, {"under minus a half", -0.501F, 99},
                      {"minus one", -1.0F, 99},     {"minus one and a half", -1.5F, 99}};
  for (const Row& row : rows) EXPECT_EQ(digitized(one_channel(12, 100, 1), {row.value})[0], row.code) << row.name;
  EXPECT_EQ(digitized(one_channel(12, 0, 1), {below_half})[0], 0);
  EXPECT_EQ(digitized(one_channel(12, 0, 1), {0.5F})[0], 1);
}

TEST(Digitizer, saturates_at_both_ends) {
  const float infinity = std::numeric_limits<float>::infinity();
  const Row rows[] = {{"smallest code", -100.0F, 0},    {"below it", -100.6F, 0},
                      {"far below it", -1e30F, 0},      {"minus infinity", -infinity, 0},
                      {"largest code", 3995.0F, 4095},  {"one below it", 3994.0F, 4094},
                      {"just above it", 3995.6F, 4095}, {"far above it", 1e30F, 4095},
                      {"infinity", infinity, 4095},     {"not a number", std::nanf(""), 0}};
  for (const Row& row : rows) EXPECT_EQ(digitized(one_channel(12, 100, 1), {row.value})[0], row.code) << row.name;
}

TEST(Digitizer, has_codes_of_4_to_15_bits) {
  EXPECT_EQ(digitized(one_channel(4, 2, 1), {1e6F})[0], 15);
  EXPECT_EQ(digitized(one_channel(15, 2, 1), {1e6F})[0], 32'767);
  EXPECT_EQ(digitized(one_channel(15, 0, 1), {32'766.4F})[0], 32'766);
}

TEST(Digitizer, applies_the_gain_before_the_pedestal) {
  EXPECT_EQ(digitized(one_channel(12, 200, 2.5), {10.0F})[0], 225);
  EXPECT_EQ(digitized(one_channel(12, 200, 0.5), {-9.0F})[0], 196);
}

TEST(Digitizer, without_gains_leaves_the_waveform_as_it_is) {
  const DigitizerConfig config{.channels = 1, .baseline_counts = {200}, .gain = {}};
  EXPECT_EQ(digitized(config, {10.0F})[0], 210);
}

TEST(Digitizer, treats_each_channel_with_its_own_gain_and_pedestal) {
  const DigitizerConfig config{.channels = 2, .baseline_counts = {50, 300}, .gain = {1.0, 3.0}};
  Waveform waveform(2, 3);
  for (std::size_t c = 0; c < 2; ++c) {
    for (float& value : waveform.channel(c)) value = 7.0F;
  }
  Codes codes;
  digitize(config, waveform, codes);
  EXPECT_EQ(codes.samples(), 3U);
  for (const std::int16_t code : codes.view().channel(0)) EXPECT_EQ(code, 57);
  for (const std::int16_t code : codes.view().channel(1)) EXPECT_EQ(code, 321);
}

/// Long runs take the vectorized path with its remainder; single samples the plain one.
TEST(Digitizer, rounds_long_runs_like_single_samples) {
  constexpr std::uint64_t seed = 31;
  RandomStream stream(seed, Purpose::PropertyTest, 0);
  const DigitizerConfig config = one_channel(12, 210, 1);
  std::vector<float> values;
  for (int k = 0; k < 10'007; ++k) values.push_back(static_cast<float>(std::floor(stream.uniform(-2000, 40'000)) / 8));
  const std::vector<std::int16_t> codes = digitized(config, values);
  for (std::size_t k = 0; k < values.size(); ++k) {
    const std::int64_t expected = std::clamp<std::int64_t>(round_half_up(values[k] + 210.0), 0, 4095);
    ASSERT_EQ(codes[k], expected) << "seed " << seed << " value " << values[k];
  }
}

TEST(Digitizer, counts_saturated_samples_at_both_ends) {
  Codes codes(2, 4);
  const std::vector<std::int16_t> values = {0, 1, 4094, 4095};
  for (std::size_t c = 0; c < 2; ++c) std::copy(values.begin(), values.end(), codes.channel(c).begin());
  EXPECT_EQ(count_saturated(codes.view(), 12), 4);
  EXPECT_EQ(count_saturated(codes.view(), 13), 2);
  EXPECT_EQ(count_saturated(codes.view().part(1, 2), 12), 0);
}

TEST(DigitizerDeathTest, refuses_a_waveform_of_another_shape) {
  const DigitizerConfig config{.channels = 2, .baseline_counts = {50, 50}, .gain = {}};
  const Waveform waveform(1, 3);
  Codes codes;
  EXPECT_DEATH(digitize(config, waveform, codes), "channels");
}

}  // namespace
}  // namespace cistern
