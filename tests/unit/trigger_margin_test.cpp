/// \file
/// By how much a trace missed or exceeded a condition.
#include <gtest/gtest.h>

#include "firmware_model/trigger/margin.hpp"
#include "tests/unit/trigger_runs.hpp"

namespace cistern {
namespace {

/// Sample and margin of the best; {-1, 0} when there is none.
std::pair<std::int64_t, std::int64_t> best_of(const TriggerSettings& settings, const Codes& codes) {
  MarginMeter meter(settings.condition);
  meter.process(codes.view());
  const auto best = meter.best();
  return best ? std::pair(best->sample, best->margin) : std::pair<std::int64_t, std::int64_t>(-1, 0);
}

using Best = std::pair<std::int64_t, std::int64_t>;

TEST(Margin, of_a_threshold_is_counts_above_the_level) {
  const TriggerSettings settings = plain_trigger(TriggerKind::Threshold);
  EXPECT_EQ(best_of(settings, codes_above_baseline({{0, 9, 3}})), Best(1, -1));
  EXPECT_EQ(best_of(settings, codes_above_baseline({{0, 10, 3}})), Best(1, 0));
  EXPECT_EQ(best_of(settings, codes_above_baseline({{0, 17, 3}})), Best(1, 7));
}

TEST(Margin, of_time_over_threshold_is_samples_above_the_minimum) {
  const TriggerSettings settings = plain_trigger(TriggerKind::TimeOverThreshold);
  EXPECT_EQ(best_of(settings, codes_above_baseline({{9, 9, 9, 9}})), Best(0, -2));
  EXPECT_EQ(best_of(settings, codes_above_baseline({{0, 10, 0, 0}})), Best(1, -1));
  EXPECT_EQ(best_of(settings, codes_above_baseline({{0, 10, 10, 0}})), Best(2, 0));
  EXPECT_EQ(best_of(settings, codes_above_baseline({{10, 10, 10, 10, 10, 10}})), Best(3, 2));
}

TEST(Margin, of_a_boxcar_is_counts_above_the_sum) {
  const TriggerSettings settings = plain_trigger(TriggerKind::BoxcarSum);
  EXPECT_EQ(best_of(settings, codes_above_baseline({{5, 5, 5, 4, 0}})), Best(3, -1));
  EXPECT_EQ(best_of(settings, codes_above_baseline({{5, 5, 5, 6, 0}})), Best(3, 1));
  EXPECT_EQ(best_of(settings, codes_above_baseline({{-3, -4}})), Best(0, -23));
}

TEST(Margin, is_that_of_the_channel_that_completes_the_majority) {
  TriggerSettings settings = plain_trigger(TriggerKind::Threshold, 3);
  const Codes codes = codes_above_baseline({{0, 50, 0}, {0, 7, 0}, {0, 12, 0}});
  const std::int64_t expected[] = {40, 2, -3};
  for (std::int32_t majority = 1; majority <= 3; ++majority) {
    settings.condition.majority = majority;
    EXPECT_EQ(best_of(settings, codes), Best(1, expected[majority - 1])) << "majority " << majority;
  }
}

TEST(Margin, ignores_channels_that_are_masked) {
  TriggerSettings settings = plain_trigger(TriggerKind::Threshold, 2);
  settings.condition.channel_enabled = {false, true};
  EXPECT_EQ(best_of(settings, codes_above_baseline({{0, 50}, {3, 0}})), Best(0, -7));
}

TEST(Margin, does_not_exist_with_fewer_channels_than_the_majority) {
  TriggerSettings settings = plain_trigger(TriggerKind::Threshold, 2);
  settings.condition.majority = 2;
  settings.condition.channel_enabled = {false, true};
  EXPECT_EQ(best_of(settings, codes_above_baseline({{0, 50}, {50, 0}})), Best(-1, 0));
}

TEST(Margin, does_not_exist_before_the_first_sample) {
  EXPECT_FALSE(MarginMeter(plain_trigger(TriggerKind::Threshold).condition).best());
}

TEST(Margin, reports_the_first_of_equal_samples) {
  EXPECT_EQ(best_of(plain_trigger(TriggerKind::Threshold), codes_above_baseline({{0, 8, 0, 8}})), Best(1, -2));
}

TEST(Margin, is_that_of_the_trace_since_the_reset) {
  MarginMeter meter(plain_trigger(TriggerKind::TimeOverThreshold).condition);
  meter.process(codes_above_baseline({{0, 10, 10}}).view());
  meter.reset();
  EXPECT_FALSE(meter.best());
  meter.process(codes_above_baseline({{0, 10, 0}}).view());
  ASSERT_TRUE(meter.best());
  EXPECT_EQ(meter.best()->margin, -1);
  EXPECT_EQ(meter.best()->sample, 1);
}

TEST(Margin, looks_for_a_new_best_with_full_windows_when_told_to_forget_the_old_one) {
  MarginMeter meter(plain_trigger(TriggerKind::TimeOverThreshold).condition);
  meter.process(codes_above_baseline({{0, 10, 10}}).view());
  meter.forget_best();
  meter.process(codes_above_baseline({{10, 0, 0}}).view());
  ASSERT_TRUE(meter.best());
  EXPECT_EQ(meter.best()->margin, 1) << "three over in samples 0 to 3";
  EXPECT_EQ(meter.best()->sample, 3);
}

TEST(Margin, does_not_depend_on_the_cut_into_blocks) {
  for (const TriggerKind kind : {TriggerKind::Threshold, TriggerKind::TimeOverThreshold, TriggerKind::BoxcarSum}) {
    for (std::uint64_t number = 0; number < 30; ++number) {
      RandomStream stream = trigger_case(kind, 5'000'000 + number);
      const TriggerSettings settings = random_settings(stream, kind);
      const Codes codes = random_codes(stream, settings.condition, 9'000);
      MarginMeter meter(settings.condition);
      for (std::size_t at = 0; at < codes.samples();) {
        const auto count = std::min(codes.samples() - at, static_cast<std::size_t>(whole(stream, 1, 700)));
        meter.process(codes.view().part(at, count));
        at += count;
      }
      const auto best = meter.best();
      const Best expected = best_of(settings, codes);
      EXPECT_EQ(best ? Best(best->sample, best->margin) : Best(-1, 0), expected) << name_of(kind) << " case " << number;
    }
  }
}

TEST(Margin, holds_a_level_far_beyond_every_code) {
  TriggerSettings settings = plain_trigger(TriggerKind::Threshold);
  settings.condition.level_counts = {2'147'483'647};
  EXPECT_EQ(best_of(settings, codes_above_baseline({{0, 5}})), Best(1, 5 - std::int64_t{2'147'483'647}));
}

TEST(MarginUnit, is_samples_for_time_over_threshold_and_counts_otherwise) {
  EXPECT_EQ(margin_unit(TriggerKind::Threshold), "counts");
  EXPECT_EQ(margin_unit(TriggerKind::TimeOverThreshold), "samples");
  EXPECT_EQ(margin_unit(TriggerKind::BoxcarSum), "counts");
}

}  // namespace
}  // namespace cistern
