#include "tests/cosim/random_triggers.hpp"

#include <algorithm>
#include <array>
#include <limits>

namespace cistern {
namespace {

/// Mostly short windows, which give many firings; now and then long ones.
std::int32_t random_reach(RandomStream& stream) {
  const std::int64_t choice = between(stream, 0, 99);
  if (choice < 5) return 1;
  if (choice < 60) return static_cast<std::int32_t>(between(stream, 2, 24));
  if (choice < 90) return static_cast<std::int32_t>(between(stream, 25, 160));
  if (choice < 98) return static_cast<std::int32_t>(between(stream, 161, 700));
  return static_cast<std::int32_t>(between(stream, 701, 5000));
}

std::int32_t random_level(RandomStream& stream) {
  constexpr std::array<std::int32_t, 6> beyond_every_code = {40'000,
                                                             -40'000,
                                                             65'536,
                                                             -65'536,
                                                             std::numeric_limits<std::int32_t>::max(),
                                                             std::numeric_limits<std::int32_t>::min()};
  if (one_in(stream, 100)) return beyond_every_code[static_cast<std::size_t>(between(stream, 0, 5))];
  if (one_in(stream, 20)) return static_cast<std::int32_t>(between(stream, -40, 0));
  return static_cast<std::int32_t>(between(stream, 1, 300));
}

std::vector<bool> random_mask(std::size_t channels, RandomStream& stream) {
  std::vector<bool> mask(channels, true);
  if (!one_in(stream, 3)) return mask;
  for (std::size_t c = 0; c < channels; ++c) mask[c] = !one_in(stream, 3);
  mask[static_cast<std::size_t>(between(stream, 0, static_cast<std::int64_t>(channels) - 1))] = true;
  return mask;
}

void set_reach(ConditionSettings& condition, RandomStream& stream) {
  const std::int32_t reach = random_reach(stream);
  if (condition.kind == TriggerKind::TimeOverThreshold) {
    const std::int32_t most_over = one_in(stream, 2) ? reach : (reach + 7) / 8;
    condition.window_samples = reach;
    condition.min_samples_over = static_cast<std::int32_t>(between(stream, 1, most_over));
  }
  if (condition.kind == TriggerKind::BoxcarSum) condition.length_samples = reach;
}

void add_channel(ConditionSettings& condition, RandomStream& stream) {
  condition.baseline_counts.push_back(static_cast<std::int32_t>(between(stream, 100, 400)));
  condition.level_counts.push_back(random_level(stream));
  const std::int64_t height = one_in(stream, 20) ? between(stream, -20, 0) : between(stream, 1, 80);
  condition.sum_counts.push_back(height * condition.length_samples + between(stream, 0, condition.length_samples));
}

FiringSettings random_firing(RandomStream& stream) {
  FiringSettings firing;
  if (one_in(stream, 2)) firing.hold_off_samples = one_in(stream, 3) ? between(stream, 1, 3) : between(stream, 1, 200);
  if (firing.hold_off_samples > 0 && one_in(stream, 2)) firing.rearm = Rearm::Level;
  if (one_in(stream, 4)) firing.prescale = between(stream, 2, 5);
  return firing;
}

}  // namespace

std::int64_t between(RandomStream& stream, std::int64_t low, std::int64_t high) {
  return low + static_cast<std::int64_t>(stream.next_word()) % (high - low + 1);
}

bool one_in(RandomStream& stream, std::int64_t odds) { return between(stream, 1, odds) == 1; }

RandomStream case_stream(std::uint64_t seed, TriggerKind kind, int number) {
  constexpr std::uint64_t cases_of_a_kind = 1'000'000;
  const std::uint64_t index = static_cast<std::uint64_t>(kind) * cases_of_a_kind + static_cast<std::uint64_t>(number);
  return {seed, Purpose::PropertyTest, index};
}

TriggerSettings random_trigger(TriggerKind kind, std::int64_t most_channels, RandomStream& stream) {
  TriggerSettings settings;
  settings.name = "random";
  ConditionSettings& condition = settings.condition;
  condition.kind = kind;
  const auto channels = static_cast<std::size_t>(between(stream, 1, most_channels));
  condition.channel_enabled = random_mask(channels, stream);
  const std::int64_t enabled = std::count(condition.channel_enabled.begin(), condition.channel_enabled.end(), true);
  condition.majority = static_cast<std::int32_t>(between(stream, 1, enabled));
  set_reach(condition, stream);
  for (std::size_t c = 0; c < channels; ++c) add_channel(condition, stream);
  settings.firing = random_firing(stream);
  return settings;
}

}  // namespace cistern
