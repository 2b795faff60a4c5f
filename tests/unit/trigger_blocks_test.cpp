/// \file
/// What must not show in a firing: the cut into blocks, a copy of the state, the instruction set.
#include <gtest/gtest.h>
#include <hwy/targets.h>

#include <string>

#include "firmware_model/trigger/block_scans.hpp"
#include "firmware_model/trigger/kernel.hpp"
#include "tests/unit/trigger_runs.hpp"

namespace cistern {
namespace {

struct Case {
  TriggerSettings settings;
  Codes codes;
  std::vector<Firing> expected;
};

/// The n-th random case of a kind that fires at least five times in `samples`.
Case firing_case(TriggerKind kind, std::uint64_t number, std::size_t samples) {
  for (int attempt = 0; attempt < 1'000; ++attempt, number += 1'000) {
    RandomStream stream = trigger_case(kind, 2'000'000 + number);
    const TriggerSettings settings = random_settings(stream, kind);
    Codes codes = random_codes(stream, settings.condition, samples);
    std::vector<Firing> expected = by_specification(settings, codes);
    if (expected.size() >= 5) return {settings, std::move(codes), std::move(expected)};
  }
  report_bug("one of a thousand random cases fires five times", __FILE__, __LINE__);
}

constexpr TriggerKind kinds[] = {TriggerKind::Threshold, TriggerKind::TimeOverThreshold, TriggerKind::BoxcarSum};

TEST(Blocks, of_any_length_give_the_same_firings) {
  for (const TriggerKind kind : kinds) {
    const Case one = firing_case(kind, 0, 1'000);
    for (std::size_t length = 1; length <= 200; ++length) {
      TriggerKernel kernel(one.settings);
      std::vector<Firing> firings;
      for (std::size_t at = 0; at < one.codes.samples(); at += length) {
        kernel.process(one.codes.view().part(at, std::min(length, one.codes.samples() - at)), firings);
      }
      EXPECT_EQ(first_difference(firings, one.expected), -1) << name_of(kind) << " in blocks of " << length;
      EXPECT_EQ(kernel.samples_seen(), 1'000);
    }
  }
}

TEST(Blocks, longer_than_a_piece_give_the_same_firings) {
  for (const TriggerKind kind : kinds) {
    const Case one = firing_case(kind, 1, 50'000);
    TriggerKernel kernel(one.settings);
    std::vector<Firing> firings;
    kernel.process(one.codes.view(), firings);
    EXPECT_EQ(first_difference(firings, one.expected), -1) << name_of(kind);
  }
}

TEST(Blocks, that_are_empty_change_nothing) {
  const Case one = firing_case(TriggerKind::TimeOverThreshold, 2, 500);
  TriggerKernel kernel(one.settings);
  std::vector<Firing> firings;
  kernel.process(one.codes.view().part(0, 0), firings);
  kernel.process(one.codes.view(), firings);
  kernel.process(one.codes.view().part(500, 0), firings);
  EXPECT_EQ(first_difference(firings, one.expected), -1);
}

TEST(Kernel, agrees_with_the_specification_for_the_longest_window) {
  for (const TriggerKind kind : {TriggerKind::TimeOverThreshold, TriggerKind::BoxcarSum}) {
    TriggerSettings settings = plain_trigger(kind);
    settings.condition.window_samples = settings.condition.length_samples = 65'536;
    settings.condition.min_samples_over = 30'000;
    settings.condition.sum_counts = {30'000 * std::int64_t{32'000}};
    Codes codes(1, 200'000);
    for (std::size_t s = 0; s < codes.samples(); ++s) codes.channel(0)[s] = (s / 50'000) % 2 == 0 ? 32'767 : 100;
    const std::vector<Firing> expected = by_specification(settings, codes);
    ASSERT_GE(expected.size(), 2U) << name_of(kind);
    RandomStream stream = trigger_case(kind, 3'000'000);
    EXPECT_EQ(first_difference(by_kernel(settings, codes, stream, 3'000), expected), -1) << name_of(kind);
    EXPECT_EQ(first_difference(by_both(settings, codes), expected), -1) << name_of(kind);
  }
}

TEST(Kernel, goes_on_from_a_kept_state_as_if_nothing_had_happened) {
  for (const TriggerKind kind : kinds) {
    const Case one = firing_case(kind, 3, 2'000);
    TriggerKernel kernel(one.settings);
    std::vector<Firing> firings;
    kernel.process(one.codes.view().part(0, 777), firings);
    const TriggerKernel kept = kernel;
    std::vector<Firing> discarded;
    kernel.process(one.codes.view().part(0, 1'500), discarded);
    kernel = kept;
    kernel.process(one.codes.view().part(777, 1'223), firings);
    EXPECT_EQ(first_difference(firings, one.expected), -1) << name_of(kind);
  }
}

TEST(Kernel, forgets_everything_at_a_reset) {
  for (const TriggerKind kind : kinds) {
    const Case one = firing_case(kind, 4, 700);
    TriggerKernel kernel(one.settings);
    for (int time = 0; time < 3; ++time) {
      std::vector<Firing> firings;
      kernel.process(one.codes.view(), firings);
      EXPECT_EQ(first_difference(firings, one.expected), -1) << name_of(kind) << ", time " << time;
      kernel.reset();
    }
  }
}

TEST(Kernel, refuses_blocks_with_another_number_of_channels) {
  TriggerKernel kernel(plain_trigger(TriggerKind::Threshold, 2));
  const Codes codes(3, 10);
  std::vector<Firing> firings;
  EXPECT_DEATH(kernel.process(codes.view(), firings), "channels");
}

class InstructionSet : public ::testing::TestWithParam<std::int64_t> {
 protected:
  void SetUp() override { hwy::SetSupportedTargetsForTest(GetParam()); }
  void TearDown() override { hwy::SetSupportedTargetsForTest(0); }
};

TEST_P(InstructionSet, does_not_show_in_the_firings) {
  ASSERT_STREQ(instruction_set(), hwy::TargetName(GetParam()));
  for (const TriggerKind kind : kinds) {
    for (std::uint64_t number = 5; number < 45; ++number) {
      const Case one = firing_case(kind, number, 2'000);
      RandomStream stream = trigger_case(kind, 4'000'000 + number);
      const std::vector<Firing> firings = by_kernel(one.settings, one.codes, stream, 2'000);
      ASSERT_EQ(first_difference(firings, one.expected), -1) << name_of(kind) << " case " << number;
    }
  }
}

INSTANTIATE_TEST_SUITE_P(Every, InstructionSet, ::testing::ValuesIn(hwy::SupportedAndGeneratedTargets()),
                         [](const auto& target) { return std::string(hwy::TargetName(target.param)); });

}  // namespace
}  // namespace cistern
