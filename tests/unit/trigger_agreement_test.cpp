/// \file
/// The fast kernel against the specification: the same firings, whatever the settings, the codes and
/// the cut into blocks; the margin against both.
#include <gtest/gtest.h>

#include <cstdio>
#include <string>

#include "firmware_model/trigger/kernel.hpp"
#include "firmware_model/trigger/margin.hpp"
#include "tests/unit/trigger_runs.hpp"

namespace cistern {
namespace {

std::optional<MarginMeter::Best> best_margin(const ConditionSettings& condition, const Codes& codes) {
  MarginMeter meter(condition);
  meter.process(codes.view());
  return meter.best();
}

class Agreement : public ::testing::TestWithParam<TriggerKind> {};

TEST_P(Agreement, kernel_and_specification_fire_alike_for_random_settings_codes_and_cuts) {
  std::int64_t compared = 0;
  std::uint64_t round = 0;
  for (; compared < 100'000; ++round) {
    ASSERT_LT(round, 5'000U) << "too few firings to compare";
    RandomStream stream = trigger_case(GetParam(), round);
    const TriggerSettings settings = random_settings(stream, GetParam());
    const Codes codes = random_codes(stream, settings.condition, 5'000);
    const std::vector<Firing> expected = by_specification(settings, codes);
    const std::vector<Firing> got = by_kernel(settings, codes, stream, round % 3 == 0 ? 90 : 5'000);
    ASSERT_EQ(first_difference(got, expected), -1) << "seed " << trigger_test_seed << " round " << round;
    const auto best = best_margin(settings.condition, codes);
    ASSERT_EQ(best && best->margin >= 0, !expected.empty()) << "seed " << trigger_test_seed << " round " << round;
    compared += static_cast<std::int64_t>(got.size());
  }
  std::printf("%s: %lld firings of %llu triggers compared, 0 differences (seed %llu)\n", name_of(GetParam()),
              static_cast<long long>(compared), static_cast<unsigned long long>(round),
              static_cast<unsigned long long>(trigger_test_seed));
}

/// Asks for `more` counts or samples more on every channel.
ConditionSettings harder_by(std::int64_t more, ConditionSettings condition) {
  if (condition.kind == TriggerKind::TimeOverThreshold) {
    condition.min_samples_over += static_cast<std::int32_t>(more);
  } else if (condition.kind == TriggerKind::BoxcarSum) {
    for (auto& sum : condition.sum_counts) sum += more;
  } else {
    for (auto& level : condition.level_counts) level += static_cast<std::int32_t>(more);
  }
  return condition;
}

bool is_possible(const ConditionSettings& condition) {
  return condition.min_samples_over >= 1 && condition.min_samples_over <= condition.window_samples;
}

/// The same trace twice: the condition is made so hard that the best sample just fulfils it, then one
/// count or sample harder.
TEST_P(Agreement, a_trace_that_misses_by_one_does_not_fire_and_one_less_fires_at_its_best_sample) {
  std::int64_t misses = 0;
  for (std::uint64_t round = 0; misses < 10'000; ++round) {
    ASSERT_LT(round, 60'000U) << "too few near misses";
    RandomStream stream = trigger_case(GetParam(), 1'000'000 + round);
    TriggerSettings settings = random_settings(stream, GetParam());
    settings.firing = {};
    settings.condition.window_samples = std::min(settings.condition.window_samples, 60);
    settings.condition.length_samples = std::min(settings.condition.length_samples, 60);
    settings.condition.min_samples_over = 1;
    const Codes codes = random_codes(stream, settings.condition, 150);
    const auto best = best_margin(settings.condition, codes);
    if (!best) continue;
    TriggerSettings just = settings;
    just.condition = harder_by(best->margin, settings.condition);
    TriggerSettings missed = settings;
    missed.condition = harder_by(best->margin + 1, settings.condition);
    if (!is_possible(just.condition) || !is_possible(missed.condition)) continue;
    ++misses;
    ASSERT_EQ(best_margin(missed.condition, codes)->margin, -1) << "round " << round;
    ASSERT_TRUE(by_both(missed, codes).empty()) << "round " << round;
    const std::vector<Firing> firings = by_both(just, codes);
    ASSERT_FALSE(firings.empty()) << "round " << round;
    ASSERT_EQ(firings.front().sample, best->sample) << "round " << round;
  }
  std::printf("%s: %lld near misses compared, 0 differences (seed %llu)\n", name_of(GetParam()),
              static_cast<long long>(misses), static_cast<unsigned long long>(trigger_test_seed));
}

INSTANTIATE_TEST_SUITE_P(Kinds, Agreement,
                         ::testing::Values(TriggerKind::Threshold, TriggerKind::TimeOverThreshold,
                                           TriggerKind::BoxcarSum),
                         [](const auto& kind) { return std::string(name_of(kind.param)); });

}  // namespace
}  // namespace cistern
