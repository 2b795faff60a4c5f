/// \file
/// Enable, hold-off and prescale, for specification and kernel alike.
#include <gtest/gtest.h>

#include "firmware_model/trigger/specification.hpp"
#include "tests/unit/trigger_runs.hpp"

namespace cistern {
namespace {

using Samples = std::vector<std::int64_t>;

/// A threshold trigger of one channel that is over where `over` says 1.
std::vector<Firing> firings_of(const FiringSettings& firing, const std::vector<int>& over) {
  TriggerSettings settings = plain_trigger(TriggerKind::Threshold);
  settings.firing = firing;
  Codes codes(1, over.size());
  for (std::size_t s = 0; s < over.size(); ++s)
    codes.channel(0)[s] = static_cast<std::int16_t>(over[s] == 1 ? 110 : 100);
  return by_both(settings, codes);
}

TEST(HoldOff, suppresses_up_to_its_last_sample_and_not_the_next) {
  const FiringSettings firing{.hold_off_samples = 3};
  const auto at_the_end = firings_of(firing, {1, 0, 0, 1, 0, 0});
  EXPECT_EQ(samples_of(at_the_end, FiringStatus::Passed), (Samples{0}));
  EXPECT_EQ(samples_of(at_the_end, FiringStatus::HeldOff), (Samples{3}));
  EXPECT_EQ(samples_of(firings_of(firing, {1, 0, 0, 0, 1, 0}), FiringStatus::Passed), (Samples{0, 4}));
}

TEST(HoldOff, is_not_prolonged_by_what_it_suppresses) {
  const auto firings = firings_of({.hold_off_samples = 3}, {1, 0, 1, 0, 1});
  EXPECT_EQ(samples_of(firings, FiringStatus::Passed), (Samples{0, 4}));
  EXPECT_EQ(samples_of(firings, FiringStatus::HeldOff), (Samples{2}));
}

TEST(HoldOff, of_zero_suppresses_nothing) {
  EXPECT_EQ(samples_of(firings_of({}, {1, 0, 1, 0, 1}), FiringStatus::Passed), (Samples{0, 2, 4}));
}

TEST(RearmEdge, waits_for_the_condition_to_be_false_again) {
  const FiringSettings firing{.hold_off_samples = 2, .rearm = Rearm::Edge};
  EXPECT_EQ(samples_of(firings_of(firing, {1, 1, 1, 1, 1, 0, 1}), FiringStatus::Passed), (Samples{0, 6}));
}

TEST(RearmLevel, fires_in_the_first_sample_after_hold_off_and_again_after_every_one) {
  const FiringSettings firing{.hold_off_samples = 2, .rearm = Rearm::Level};
  EXPECT_EQ(samples_of(firings_of(firing, {1, 1, 1, 1, 1, 1, 1, 1}), FiringStatus::Passed), (Samples{0, 3, 6}));
}

TEST(RearmLevel, fires_after_hold_off_when_the_edge_was_held_off_and_the_condition_is_still_true) {
  const FiringSettings firing{.hold_off_samples = 3, .rearm = Rearm::Level};
  const auto still_true = firings_of(firing, {1, 0, 1, 1, 1, 0});
  EXPECT_EQ(samples_of(still_true, FiringStatus::Passed), (Samples{0, 4}));
  EXPECT_EQ(samples_of(still_true, FiringStatus::HeldOff), (Samples{2}));
}

TEST(RearmLevel, does_not_fire_when_the_condition_was_only_true_during_hold_off) {
  const FiringSettings firing{.hold_off_samples = 3, .rearm = Rearm::Level};
  EXPECT_EQ(samples_of(firings_of(firing, {1, 0, 1, 1, 0, 0, 0}), FiringStatus::Passed), (Samples{0}));
}

TEST(RearmLevel, fires_once_where_re_firing_and_edge_meet) {
  const FiringSettings firing{.hold_off_samples = 3, .rearm = Rearm::Level};
  EXPECT_EQ(samples_of(firings_of(firing, {1, 0, 0, 0, 1, 0})), (Samples{0, 4}));
}

TEST(RearmLevel, re_fires_on_both_sides_of_a_word_of_64_samples) {
  const FiringSettings firing{.hold_off_samples = 62, .rearm = Rearm::Level};
  EXPECT_EQ(samples_of(firings_of(firing, std::vector<int>(200, 1)), FiringStatus::Passed), (Samples{0, 63, 126, 189}));
}

TEST(Prescale, passes_the_nth_of_what_hold_off_let_through) {
  const FiringSettings firing{.hold_off_samples = 2, .prescale = 2};
  const auto firings = firings_of(firing, {1, 0, 1, 1, 0, 1, 0, 0, 1, 0});
  EXPECT_EQ(samples_of(firings, FiringStatus::Prescaled), (Samples{0, 8}));
  EXPECT_EQ(samples_of(firings, FiringStatus::HeldOff), (Samples{2}));
  EXPECT_EQ(samples_of(firings, FiringStatus::Passed), (Samples{5}));
}

TEST(Prescale, starts_hold_off_even_with_a_firing_that_it_stops) {
  const auto firings = firings_of({.hold_off_samples = 3, .prescale = 2}, {1, 0, 1, 0, 1, 0});
  EXPECT_EQ(samples_of(firings, FiringStatus::HeldOff), (Samples{2}));
  EXPECT_EQ(samples_of(firings, FiringStatus::Passed), (Samples{4}));
}

TEST(Prescale, of_three_passes_the_third_and_the_sixth) {
  const std::vector<int> seven{1, 0, 1, 0, 1, 0, 1, 0, 1, 0, 1, 0, 1};
  EXPECT_EQ(samples_of(firings_of({.prescale = 3}, seven), FiringStatus::Passed), (Samples{4, 10}));
}

TEST(Disabled, reports_edges_only_and_starts_no_hold_off) {
  const FiringSettings firing{.enabled = false, .hold_off_samples = 2, .rearm = Rearm::Level};
  const auto firings = firings_of(firing, {1, 0, 1, 1, 1, 1, 1, 1});
  EXPECT_EQ(samples_of(firings, FiringStatus::Disabled), (Samples{0, 2}));
  EXPECT_EQ(firings.size(), 2U);
}

TEST(Specification, says_whether_the_condition_is_true_in_the_last_sample) {
  TriggerSpecification specification(plain_trigger(TriggerKind::Threshold));
  EXPECT_FALSE(specification.condition());
  const std::vector<std::int16_t> over{110};
  const std::vector<std::int16_t> below{109};
  EXPECT_TRUE(specification.step(over));
  EXPECT_TRUE(specification.condition());
  EXPECT_FALSE(specification.step(over)) << "no edge";
  EXPECT_TRUE(specification.condition());
  EXPECT_FALSE(specification.step(below));
  EXPECT_FALSE(specification.condition());
}

TEST(Specification, starts_afresh_at_a_reset) {
  TriggerSettings settings = plain_trigger(TriggerKind::TimeOverThreshold);
  settings.firing = {.hold_off_samples = 100, .prescale = 2};
  TriggerSpecification specification(settings);
  const std::vector<std::int16_t> over{110};
  for (int time = 0; time < 2; ++time) {
    EXPECT_FALSE(specification.step(over));
    const auto firing = specification.step(over);
    ASSERT_TRUE(firing);
    EXPECT_EQ(firing->sample, 1);
    EXPECT_EQ(firing->status, FiringStatus::Prescaled) << "the first that hold-off let through";
    specification.reset();
  }
}

TEST(Names, of_kinds_and_statuses_are_those_of_tables_and_scenarios) {
  EXPECT_STREQ(name_of(TriggerKind::Threshold), "threshold");
  EXPECT_STREQ(name_of(TriggerKind::TimeOverThreshold), "time_over_threshold");
  EXPECT_STREQ(name_of(TriggerKind::BoxcarSum), "boxcar_sum");
  EXPECT_EQ(name_of(FiringStatus::Passed), "passed");
  EXPECT_EQ(name_of(FiringStatus::Disabled), "disabled");
  EXPECT_EQ(name_of(FiringStatus::HeldOff), "held_off");
  EXPECT_EQ(name_of(FiringStatus::Prescaled), "prescaled");
  EXPECT_EQ(name_of(FiringStatus::Busy), "busy");
}

TEST(Settings, out_of_range_are_a_bug) {
  const auto broken = [](auto change) {
    TriggerSettings settings = plain_trigger(TriggerKind::TimeOverThreshold, 2);
    change(settings);
    assert_valid(settings, 2);
  };
  broken([](TriggerSettings&) {});
  EXPECT_DEATH(broken([](auto& s) { s.condition.majority = 3; }), "majority");
  EXPECT_DEATH(broken([](auto& s) { s.condition.min_samples_over = 5; }), "min_samples_over");
  EXPECT_DEATH(broken([](auto& s) { s.condition.window_samples = 65'537; }), "window_samples");
  EXPECT_DEATH(broken([](auto& s) { s.condition.level_counts.pop_back(); }), "level_counts");
  EXPECT_DEATH(broken([](auto& s) { s.condition.baseline_counts[1] = 32'768; }), "baseline");
  EXPECT_DEATH(broken([](auto& s) { s.firing.prescale = 0; }), "prescale");
  EXPECT_DEATH(broken([](auto& s) { s.firing.rearm = Rearm::Level; }), "rearm");
}

}  // namespace
}  // namespace cistern
