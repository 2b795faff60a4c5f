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

}  // namespace
}  // namespace cistern
