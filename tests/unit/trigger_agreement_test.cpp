/// \file
/// The fast kernel against the specification: the same firings, whatever the settings, the codes and
/// the cut into blocks.
#include <gtest/gtest.h>

#include <algorithm>
#include <vector>

#include "firmware_model/trigger/kernel.hpp"
#include "firmware_model/trigger/margin.hpp"
#include "firmware_model/trigger/specification.hpp"
#include "traces/base/random.hpp"

namespace cistern {
namespace {

constexpr std::uint64_t seed = 20260301;

std::int64_t whole(RandomStream& stream, std::int64_t low, std::int64_t high) {
  return low + static_cast<std::int64_t>(stream.uniform() * static_cast<double>(high - low + 1));
}

/// Settings of every size, hold-off and mask; levels around which `random_codes` lingers.
TriggerSettings random_settings(RandomStream& stream, TriggerKind kind) {
  TriggerSettings settings;
  settings.name = "random";
  ConditionSettings& condition = settings.condition;
  condition.kind = kind;
  const auto channels = static_cast<std::size_t>(whole(stream, 1, stream.uniform() < 0.2 ? 16 : 5));
  const std::int64_t longest = stream.uniform() < 0.1 ? 5000 : 200;
  condition.window_samples = static_cast<std::int32_t>(whole(stream, 1, longest));
  condition.min_samples_over = static_cast<std::int32_t>(whole(stream, 1, condition.window_samples));
  if (stream.uniform() < 0.7) condition.min_samples_over = std::min(condition.min_samples_over, 1 + condition.window_samples / 3);
  condition.length_samples = static_cast<std::int32_t>(whole(stream, 1, longest));
  for (std::size_t c = 0; c < channels; ++c) {
    condition.baseline_counts.push_back(static_cast<std::int32_t>(whole(stream, 0, 300)));
    condition.level_counts.push_back(static_cast<std::int32_t>(whole(stream, stream.uniform() < 0.1 ? -400 : 1, 60)));
    condition.sum_counts.push_back(whole(stream, -50, 12) * condition.length_samples / 8 + whole(stream, 0, 9));
    condition.channel_enabled.push_back(stream.uniform() < 0.9);
  }
  condition.majority = static_cast<std::int32_t>(whole(stream, 1, static_cast<std::int64_t>(std::min<std::size_t>(channels, 4))));
  settings.firing.enabled = stream.uniform() < 0.95;
  settings.firing.hold_off_samples = stream.uniform() < 0.5 ? 0 : whole(stream, 1, 300);
  settings.firing.rearm = settings.firing.hold_off_samples > 0 && stream.uniform() < 0.5 ? Rearm::Level : Rearm::Edge;
  settings.firing.prescale = stream.uniform() < 0.7 ? 1 : whole(stream, 2, 5);
  return settings;
}

/// Quiet stretches, slow walks around the level, and single spikes.
Codes random_codes(RandomStream& stream, const ConditionSettings& condition, std::size_t samples) {
  Codes codes(condition.baseline_counts.size(), samples);
  for (std::size_t c = 0; c < codes.channels(); ++c) {
    double walk = 0;
    bool is_busy = true;
    for (std::int16_t& code : codes.channel(c)) {
      if (stream.uniform() < 0.002) is_busy = !is_busy;
      walk = is_busy ? walk + 0.05 * (condition.level_counts[c] - walk) + stream.uniform(-6, 6) : 0.9 * walk;
      const double spike = stream.uniform() < 0.01 ? stream.uniform(0, 200) : 0;
      code = static_cast<std::int16_t>(std::clamp(condition.baseline_counts[c] + static_cast<std::int32_t>(walk + spike), 0, 4095));
    }
  }
  return codes;
}

std::vector<Firing> by_specification(const TriggerSettings& settings, const Codes& codes) {
  TriggerSpecification specification(settings);
  std::vector<Firing> firings;
  std::vector<std::int16_t> sample(codes.channels());
  for (std::size_t s = 0; s < codes.samples(); ++s) {
    for (std::size_t c = 0; c < codes.channels(); ++c) sample[c] = codes.channel(c)[s];
    if (const auto firing = specification.step(sample)) firings.push_back(*firing);
  }
  return firings;
}

/// \param longest_block  blocks of random length up to it
std::vector<Firing> by_kernel(const TriggerSettings& settings, const Codes& codes, RandomStream& stream, std::int64_t longest_block) {
  TriggerKernel kernel(settings);
  std::vector<Firing> firings;
  for (std::size_t at = 0; at < codes.samples();) {
    const auto count = std::min(codes.samples() - at, static_cast<std::size_t>(whole(stream, 1, longest_block)));
    kernel.process(codes.view().part(at, count), firings);
    at += count;
    if (stream.uniform() < 0.1) kernel = TriggerKernel(kernel);  // a copy goes on from the same state
  }
  return firings;
}

class Agreement : public ::testing::TestWithParam<TriggerKind> {};

TEST_P(Agreement, kernel_and_specification_fire_in_the_same_samples_for_random_settings_codes_and_cuts) {
  std::int64_t compared = 0;
  for (std::uint64_t round = 0; compared < 100'000; ++round) {
    ASSERT_LT(round, 3000U);
    RandomStream stream(seed, Purpose::PropertyTest, round * 4 + static_cast<std::uint64_t>(GetParam()));
    const TriggerSettings settings = random_settings(stream, GetParam());
    const Codes codes = random_codes(stream, settings.condition, 20'000);
    const auto expected = by_specification(settings, codes);
    const auto got = by_kernel(settings, codes, stream, round % 3 == 0 ? 90 : 20'000);
    ASSERT_EQ(got.size(), expected.size()) << "seed " << seed << " round " << round;
    for (std::size_t i = 0; i < got.size(); ++i) {
      ASSERT_TRUE(got[i] == expected[i]) << "seed " << seed << " round " << round << " firing " << i << ": sample " << got[i].sample << " for "
                                         << expected[i].sample << ", onset " << got[i].onset_sample << " for " << expected[i].onset_sample;
    }
    compared += static_cast<std::int64_t>(got.size());
    MarginMeter meter(settings.condition);
    meter.process(codes.view());
    ASSERT_EQ(meter.best() && meter.best()->margin >= 0, !expected.empty()) << "seed " << seed << " round " << round;
  }
  RecordProperty("firings", static_cast<int>(compared));
  std::printf("%s: %lld firings compared, 0 differences (seed %llu)\n", name_of(GetParam()), static_cast<long long>(compared),
              static_cast<unsigned long long>(seed));
}

INSTANTIATE_TEST_SUITE_P(Kinds, Agreement,
                         ::testing::Values(TriggerKind::Threshold, TriggerKind::TimeOverThreshold, TriggerKind::BoxcarSum),
                         [](const auto& kind) { return std::string(name_of(kind.param)); });

}  // namespace
}  // namespace cistern
