#include <gtest/gtest.h>

#include <algorithm>
#include <cmath>
#include <numeric>
#include <vector>

#include "traces/generator/generator.hpp"
#include "traces/generator/test_signal.hpp"

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

struct KindRow {
  SignalKind kind;
  const char* name;
};
constexpr KindRow kinds[] = {
    {SignalKind::Muon, "muon"}, {SignalKind::Electromagnetic, "electromagnetic"}, {SignalKind::Shower, "shower"}};

TEST(TestSignal, has_a_name) {
  for (const KindRow& row : kinds) EXPECT_EQ(name_of(row.kind), row.name);
}

TEST(TestSignal, has_exactly_its_size_in_mean_photo_electrons) {
  const GeneratorConfig config;  // 4 tubes with 55 per VEM
  const TraceGenerator generator(config, seed);
  Waveform waveform;
  for (const KindRow& row : kinds) {
    for (const double size_vem : {0.02, 0.5, 1.0, 2.7, 40.0}) {
      EXPECT_NEAR(generator.make_signal({row.kind, size_vem, 100}, 1, 1000, 100, waveform), size_vem * 220,
                  1e-9 * size_vem)
          << row.name;
    }
  }
}

TEST(TestSignal, is_dark_before_its_onset_and_bright_soon_after) {
  GeneratorConfig config = quiet_config();
  config.frontend.transit_time_spread_ns = 0;
  const TraceGenerator generator(config, seed);
  Waveform waveform;
  for (const KindRow& row : kinds) {
    for (std::uint64_t number = 0; number < 20; ++number) {
      generator.make_signal({row.kind, 20, 0}, number, 500, 123, waveform);
      const auto samples = waveform.channel(0);
      ASSERT_TRUE(std::all_of(samples.begin(), samples.begin() + 124, [](float x) { return x == 0; })) << row.name;
      ASSERT_GT(samples[126], 0) << row.name;  // the pulse of light at 123 to 124 has begun
    }
  }
}

TEST(TestSignal, has_its_spread_between_the_tenth_and_the_ninetieth_percentile) {
  const GeneratorConfig config;
  for (const double spread_ns : {0.0, 150.0, 800.0}) {
    RandomStream stream(seed, Purpose::PropertyTest, 1);
    std::vector<double> times_ns;
    while (times_ns.size() < 40'000) {
      const auto sources = draw_light_sources({SignalKind::Electromagnetic, 50, spread_ns}, config, stream);
      for (const LightSource& source : sources) times_ns.push_back(source.time * 10);
    }
    std::sort(times_ns.begin(), times_ns.end());
    const double width = times_ns[times_ns.size() * 9 / 10] - times_ns[times_ns.size() / 10];
    // Error of the upper quantile of an exponential: mean sqrt(0.9 / (0.1 n)); the lower one's is small.
    EXPECT_NEAR(width, spread_ns, 4 * spread_ns / std::log(9.0) * std::sqrt(9.0 / 40'000) + 0.01 * spread_ns);
    EXPECT_EQ(times_ns.front(), 0);
  }
}

TEST(TestSignal, of_a_muon_is_one_track_up_to_one_vem_and_several_above) {
  const GeneratorConfig config;
  RandomStream stream(seed, Purpose::PropertyTest, 2);
  const auto count = [&](double size_vem) {
    return draw_light_sources({SignalKind::Muon, size_vem, 0}, config, stream).size();
  };
  EXPECT_EQ(count(0.3), 1U);
  EXPECT_EQ(count(1), 1U);
  EXPECT_EQ(count(1.5), 2U);
  EXPECT_EQ(count(10), 10U);
}

TEST(TestSignal, shares_soft_light_more_evenly_than_one_track) {
  const TraceGenerator generator(
      [] {
        GeneratorConfig config = quiet_config();
        config.tank.direct_light_fraction = 0.5;
        config.tank.photo_electrons_per_vem_and_tube = 2000;  // so that counting noise is small
        return config;
      }(),
      seed);
  const auto unevenness = [&](SignalKind kind) {
    double sum = 0;
    Waveform waveform;
    for (std::uint64_t number = 0; number < 20; ++number) {
      generator.make_signal({kind, 1, 0}, number, 300, 20, waveform);
      double light[2];
      for (std::size_t c = 0; c < 2; ++c)
        light[c] = std::accumulate(waveform.channel(c).begin(), waveform.channel(c).end(), 0.0);
      sum += std::abs(light[0] - light[1]) / (light[0] + light[1]);
    }
    return sum;
  };
  EXPECT_LT(unevenness(SignalKind::Electromagnetic), 0.7 * unevenness(SignalKind::Muon));
}

TEST(TestSignal, is_repeated_by_its_number) {
  const TraceGenerator generator({}, seed);
  Waveform one;
  Waveform other;
  generator.make_signal({SignalKind::Shower, 5, 200}, 7, 600, 300, one);
  generator.make_signal({SignalKind::Shower, 5, 200}, 8, 600, 300, other);
  EXPECT_NE(flat(one), flat(other));
  generator.make_signal({SignalKind::Shower, 5, 200}, 7, 600, 300, other);
  EXPECT_EQ(flat(one), flat(other));
}

TEST(TestSignal, is_cut_but_not_changed_by_a_shorter_trace) {
  const TraceGenerator generator({}, seed);
  Waveform longer;
  Waveform shorter;
  generator.make_signal({SignalKind::Shower, 5, 200}, 7, 600, 300, longer);
  generator.make_signal({SignalKind::Shower, 5, 200}, 7, 350, 300, shorter);
  EXPECT_TRUE(std::equal(shorter.channel(3).begin(), shorter.channel(3).end(), longer.channel(3).begin()));
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
