#include <gtest/gtest.h>

#include <algorithm>
#include <array>
#include <cmath>
#include <numeric>
#include <vector>

#include "traces/frontend/pulse_shape.hpp"
#include "traces/generator/generator.hpp"

namespace cistern {
namespace {

constexpr std::uint64_t seed = 20260101;

/// Many muons, so that a short stretch has several, and light that reaches far.
GeneratorConfig busy_config() {
  GeneratorConfig config;
  config.muons.flux_scale = 30;
  config.tank.wall_reflectivity = 0.98;
  return config;
}

GeneratorConfig quiet_config() {
  GeneratorConfig config;
  config.frontend.noise_rms_mv = 0;
  return config;
}

std::vector<float> flat(const Waveform& waveform) {
  std::vector<float> samples;
  for (std::size_t c = 0; c < waveform.channels(); ++c) {
    samples.insert(samples.end(), waveform.channel(c).begin(), waveform.channel(c).end());
  }
  return samples;
}

std::vector<float> background(const TraceGenerator& generator, std::uint32_t station, std::int64_t first,
                              std::size_t samples) {
  Waveform waveform;
  generator.make_background(station, first, samples, waveform);
  return flat(waveform);
}

TEST(Background, is_the_same_however_the_live_time_is_cut) {
  const TraceGenerator generator(busy_config(), seed);
  constexpr std::size_t whole_size = 50'000;
  Waveform whole;
  Waveform part;
  generator.make_background(3, 0, whole_size, whole);
  std::size_t at = 0;
  for (const std::size_t size : {1U, 4095U, 4096U, 3U, 777U, 16384U, 64U, 24580U}) {
    generator.make_background(3, static_cast<std::int64_t>(at), size, part);
    for (std::size_t c = 0; c < part.channels(); ++c) {
      ASSERT_TRUE(std::equal(part.channel(c).begin(), part.channel(c).end(),
                             whole.channel(c).begin() + static_cast<std::ptrdiff_t>(at)))
          << "channel " << c << ", " << size << " samples from " << at;
    }
    at += size;
  }
  EXPECT_EQ(at, whole_size);
}

TEST(Background, is_the_same_when_cut_between_blocks) {
  // So many muons and such slow tubes that light crosses every border both ways.
  GeneratorConfig config = busy_config();
  config.muons.flux_scale = 1000;
  config.frontend.transit_time_spread_ns = 200;
  const TraceGenerator generator(config, seed);
  constexpr std::size_t block = 4096;
  Waveform whole;
  Waveform part;
  generator.make_background(0, 0, 12 * block, whole);
  for (std::size_t at = 0; at < 12 * block; at += block) {
    generator.make_background(0, static_cast<std::int64_t>(at), block, part);
    ASSERT_TRUE(std::equal(part.channel(0).begin(), part.channel(0).end(),
                           whole.channel(0).begin() + static_cast<std::ptrdiff_t>(at)))
        << at;
  }
}

TEST(Background, spreads_muons_evenly_over_a_block) {
  GeneratorConfig config = quiet_config();
  config.muons.flux_scale = 100;
  const TraceGenerator generator(config, seed);
  Waveform waveform;
  std::array<double, 4> light{};  // by quarter of a block
  for (std::int64_t block = 0; block < 100; ++block) {
    generator.make_background(0, block * 4096, 4096, waveform);
    for (std::size_t s = 0; s < 4096; ++s) light.at(s / 1024) += waveform.channel(0)[s];
  }
  const double all = std::accumulate(light.begin(), light.end(), 0.0);
  // About 140 muons a quarter, of sizes that differ by half: 10 % each.
  for (const double quarter : light) EXPECT_NEAR(quarter / all, 0.25, 4 * 0.10 * 0.25);
}

TEST(Background, holds_the_light_of_muons_that_came_before_its_first_sample) {
  GeneratorConfig config = quiet_config();
  config.muons.flux_scale = 30;
  const TraceGenerator generator(config, seed);
  Waveform whole;
  generator.make_background(0, 0, 100'000, whole);
  const auto samples = whole.channel(0);
  const auto peak = std::max_element(samples.begin(), samples.end()) - samples.begin();
  Waveform rest;
  generator.make_background(0, peak + 2, 100, rest);
  EXPECT_GT(rest.channel(0)[0], 0);
  EXPECT_EQ(rest.channel(0)[0], samples[static_cast<std::size_t>(peak) + 2]);
}

TEST(Background, is_repeated_by_the_same_seed_and_station_only) {
  const GeneratorConfig config = busy_config();
  const auto one = background(TraceGenerator(config, seed), 1, 10'000, 5000);
  EXPECT_EQ(one, background(TraceGenerator(config, seed), 1, 10'000, 5000));
  EXPECT_NE(one, background(TraceGenerator(config, seed), 2, 10'000, 5000));
  EXPECT_NE(one, background(TraceGenerator(config, seed + 1), 1, 10'000, 5000));
}

TEST(Background, may_start_after_a_hundred_days) {
  const TraceGenerator generator(busy_config(), seed);
  constexpr std::int64_t hundred_days = 864'000'000'000'000;
  EXPECT_NE(background(generator, 0, hundred_days, 100), background(generator, 0, 0, 100));
}

TEST(Background, without_flux_is_noise_alone_and_differs_between_channels) {
  GeneratorConfig config;
  config.muons.flux_scale = 0;
  const TraceGenerator generator(config, seed);
  Waveform waveform;
  generator.make_background(0, 0, 20'000, waveform);
  EXPECT_EQ(generator.muon_rate_hz(), 0);
  const double rms_counts = config.frontend.noise_rms_mv * config.frontend.counts_per_mv;
  for (std::size_t c = 0; c < 4; ++c) {
    const auto samples = waveform.channel(c);
    EXPECT_LT(*std::max_element(samples.begin(), samples.end()), 6.4 * rms_counts);
  }
  EXPECT_FALSE(std::equal(waveform.channel(0).begin(), waveform.channel(0).end(), waveform.channel(1).begin()));
}

TEST(Background, of_no_samples_is_empty) {
  Waveform waveform;
  TraceGenerator(busy_config(), seed).make_background(0, 5, 0, waveform);
  EXPECT_EQ(waveform.samples(), 0U);
}

TEST(Calibration, gives_the_area_of_one_vem_on_every_channel) {
  const GeneratorConfig config;
  const VemCalibration vem = calibrate(TraceGenerator(config, seed), 4, 400);
  const double area = config.tank.photo_electrons_per_vem_and_tube * PulseShape(config.frontend, 100).area_counts();
  for (std::size_t c = 0; c < 4; ++c) {
    EXPECT_NEAR(vem.area_counts[c], area, 4 * vem.area_error[c]);
    // Counting 55 photo-electrons of relative charge spread 0.35, 400 times.
    EXPECT_NEAR(vem.area_error[c], area * std::sqrt((1 + 0.35 * 0.35) / 55 / 400), 0.2 * vem.area_error[c]);
    EXPECT_LT(vem.height_counts[c], area / 5);
    EXPECT_GT(vem.height_counts[c], area / 20);
  }
}

}  // namespace
}  // namespace cistern
