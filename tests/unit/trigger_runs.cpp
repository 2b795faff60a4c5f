#include "tests/unit/trigger_runs.hpp"

#include <gtest/gtest.h>

#include <algorithm>

#include "firmware_model/trigger/kernel.hpp"
#include "firmware_model/trigger/specification.hpp"

namespace cistern {
namespace {

bool chance(RandomStream& stream, double probability) { return stream.uniform() < probability; }

std::int32_t random_level(RandomStream& stream) {
  if (chance(stream, 0.02)) return chance(stream, 0.5) ? 40'000 : -40'000;
  return static_cast<std::int32_t>(whole(stream, chance(stream, 0.1) ? -400 : 1, 60));
}

FiringSettings random_firing_settings(RandomStream& stream) {
  FiringSettings firing;
  firing.enabled = chance(stream, 0.95);
  firing.hold_off_samples = chance(stream, 0.5) ? 0 : whole(stream, 1, 300);
  firing.rearm = firing.hold_off_samples > 0 && chance(stream, 0.5) ? Rearm::Level : Rearm::Edge;
  firing.prescale = chance(stream, 0.7) ? 1 : whole(stream, 2, 5);
  return firing;
}

}  // namespace

std::int64_t whole(RandomStream& stream, std::int64_t low, std::int64_t high) {
  return low + static_cast<std::int64_t>(stream.uniform() * static_cast<double>(high - low + 1));
}

RandomStream trigger_case(TriggerKind kind, std::uint64_t number) {
  return {trigger_test_seed, Purpose::PropertyTest, number * 4 + static_cast<std::uint64_t>(kind)};
}

TriggerSettings plain_trigger(TriggerKind kind, std::size_t channels) {
  TriggerSettings settings;
  settings.name = "plain";
  settings.condition.kind = kind;
  settings.condition.baseline_counts.assign(channels, 100);
  settings.condition.channel_enabled.assign(channels, true);
  settings.condition.level_counts.assign(channels, 10);
  settings.condition.window_samples = 4;
  settings.condition.min_samples_over = 2;
  settings.condition.length_samples = 4;
  settings.condition.sum_counts.assign(channels, 20);
  return settings;
}

Codes codes_above_baseline(std::initializer_list<std::vector<int>> channels) {
  Codes codes(channels.size(), channels.begin()->size());
  std::size_t c = 0;
  for (const std::vector<int>& heights : channels) {
    std::transform(heights.begin(), heights.end(), codes.channel(c++).begin(),
                   [](int height) { return static_cast<std::int16_t>(100 + height); });
  }
  return codes;
}

TriggerSettings random_settings(RandomStream& stream, TriggerKind kind) {
  TriggerSettings settings;
  settings.name = "random";
  ConditionSettings& condition = settings.condition;
  condition.kind = kind;
  const auto channels = static_cast<std::size_t>(whole(stream, 1, chance(stream, 0.2) ? 16 : 5));
  const std::int64_t longest = chance(stream, 0.1) ? 5000 : chance(stream, 0.5) ? 30 : 200;
  condition.window_samples = static_cast<std::int32_t>(whole(stream, 1, longest));
  const std::int64_t most_over = chance(stream, 0.7) ? 1 + condition.window_samples / 3 : condition.window_samples;
  condition.min_samples_over = static_cast<std::int32_t>(whole(stream, 1, most_over));
  condition.length_samples = static_cast<std::int32_t>(whole(stream, 1, longest));
  for (std::size_t c = 0; c < channels; ++c) {
    condition.baseline_counts.push_back(static_cast<std::int32_t>(whole(stream, 0, 300)));
    condition.level_counts.push_back(random_level(stream));
    condition.sum_counts.push_back(whole(stream, -50, 80) * condition.length_samples / 8 + whole(stream, 0, 9));
    condition.channel_enabled.push_back(chance(stream, 0.9));
  }
  condition.majority =
      static_cast<std::int32_t>(whole(stream, 1, static_cast<std::int64_t>(std::min<std::size_t>(channels, 4))));
  settings.firing = random_firing_settings(stream);
  return settings;
}

Codes random_codes(RandomStream& stream, const ConditionSettings& condition, std::size_t samples) {
  Codes codes(condition.baseline_counts.size(), samples);
  const double pull = stream.uniform(0.03, 0.5);
  for (std::size_t c = 0; c < codes.channels(); ++c) {
    const double target = std::clamp(condition.level_counts[c], -60, 60);
    double walk = 0;
    bool is_busy = true;
    for (std::int16_t& code : codes.channel(c)) {
      if (chance(stream, 0.002)) is_busy = !is_busy;
      walk = is_busy ? walk + pull * (target - walk) + stream.uniform(-12, 12) : 0.9 * walk;
      const double spike = chance(stream, 0.01) ? stream.uniform(0, 200) : 0;
      const std::int32_t height = static_cast<std::int32_t>(walk + spike);
      code = static_cast<std::int16_t>(std::clamp(condition.baseline_counts[c] + height, 0, 4095));
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

std::vector<Firing> by_kernel(const TriggerSettings& settings, const Codes& codes, RandomStream& stream,
                              std::int64_t longest_block) {
  TriggerKernel kernel(settings);
  std::vector<Firing> firings;
  for (std::size_t at = 0; at < codes.samples();) {
    const auto count = std::min(codes.samples() - at, static_cast<std::size_t>(whole(stream, 1, longest_block)));
    kernel.process(codes.view().part(at, count), firings);
    at += count;
    if (chance(stream, 0.1)) kernel = TriggerKernel(kernel);
  }
  return firings;
}

std::vector<Firing> by_both(const TriggerSettings& settings, const Codes& codes) {
  const std::vector<Firing> expected = by_specification(settings, codes);
  TriggerKernel kernel(settings);
  std::vector<Firing> got;
  kernel.process(codes.view(), got);
  EXPECT_EQ(first_difference(got, expected), -1) << "between kernel and specification";
  return expected;
}

std::vector<std::int64_t> samples_of(const std::vector<Firing>& firings) {
  std::vector<std::int64_t> samples;
  for (const Firing& firing : firings) samples.push_back(firing.sample);
  return samples;
}

std::vector<std::int64_t> samples_of(const std::vector<Firing>& firings, FiringStatus status) {
  std::vector<std::int64_t> samples;
  for (const Firing& firing : firings) {
    if (firing.status == status) samples.push_back(firing.sample);
  }
  return samples;
}

std::int64_t first_difference(const std::vector<Firing>& a, const std::vector<Firing>& b) {
  const auto [at, other] = std::mismatch(a.begin(), a.end(), b.begin(), b.end());
  if (at == a.end() && other == b.end()) return -1;
  return at == a.end() ? other->sample : at->sample;
}

}  // namespace cistern
