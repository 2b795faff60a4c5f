#include <gtest/gtest.h>

#include <algorithm>
#include <cmath>
#include <numeric>

#include "bench/campaign/packing.hpp"
#include "bench/command_line/progress.hpp"
#include "bench/experiments/background.hpp"
#include "bench/experiments/boundary_stimuli.hpp"
#include "bench/experiments/live_figures.hpp"
#include "bench/experiments/recorded.hpp"
#include "bench/experiments/trigger_sets.hpp"
#include "firmware_model/trigger/kernel.hpp"
#include "traces/base/errors.hpp"

namespace cistern {
namespace {

TriggerSettings settings_of(TriggerKind kind) {
  TriggerSettings settings;
  settings.name = name_of(kind);
  settings.condition.kind = kind;
  settings.condition.baseline_counts = {200, 210, 190};
  settings.condition.channel_enabled = {true, true, true};
  settings.condition.level_counts = {40, 42, 38};
  settings.condition.window_samples = 30;
  settings.condition.min_samples_over = 8;
  settings.condition.length_samples = 20;
  settings.condition.sum_counts = {300, 310, 290};
  settings.condition.majority = 2;
  return settings;
}

StationPlan station_of(std::vector<TriggerSettings> triggers) {
  StationPlan plan;
  plan.digitizer.channels = 3;
  plan.digitizer.baseline_counts = {200, 210, 190};
  plan.digitizer.gain = {1, 1, 1};
  plan.triggers = std::move(triggers);
  plan.longest_reach_samples = 30;
  return plan;
}

TEST(LiveTime, is_cut_into_units_that_cover_every_block_once) {
  const StationPlan plan = station_of({});
  const LiveTimePlan time(1.0, 0.1, plan);
  EXPECT_EQ(time.blocks(), 10);
  std::int64_t next = 0;
  for (std::int64_t unit = 0; unit < time.units(); ++unit) {
    EXPECT_EQ(time.first_block(unit), next);
    EXPECT_GT(time.end_block(unit), next);
    next = time.end_block(unit);
  }
  EXPECT_EQ(next, 10);
  EXPECT_EQ(time.end_sample(time.units() - 1), 100'000'000);
}

TEST(LiveTime, runs_up_over_the_longest_window_and_hold_off_but_not_before_the_start) {
  StationPlan plan = station_of({});
  plan.longest_hold_off_samples = 500;
  const LiveTimePlan time(1.0, 0.1, plan);
  EXPECT_EQ(time.run_up_start(0), 0);
  EXPECT_EQ(time.run_up_start(1), time.first_sample(1) - 530);
}

TEST(TriggerSets, put_a_trigger_without_role_into_both_stations) {
  TriggerSettings shared = settings_of(TriggerKind::Threshold);
  TriggerSettings candidate = settings_of(TriggerKind::BoxcarSum);
  candidate.role = TriggerRole::Candidate;
  const std::vector<TriggerSettings> triggers{shared, candidate};
  EXPECT_EQ(members_of(TriggerSet::InService, triggers), (std::vector<std::size_t>{0}));
  EXPECT_EQ(members_of(TriggerSet::Candidate, triggers), (std::vector<std::size_t>{0, 1}));
  EXPECT_TRUE(are_comparable(triggers));
  EXPECT_FALSE(are_comparable({shared}));
}

/// How many boundary stimuli a trigger with `tested` settings answers otherwise than `settings` demand.
std::int64_t wrong_answers(const TriggerSettings& settings, const TriggerSettings& tested) {
  const StationPlan plan = station_of({settings});
  std::int64_t wrong = 0;
  for (const BoundaryStimulus& stimulus : boundary_stimuli(settings.condition, plan.digitizer)) {
    TriggerKernel kernel(tested);
    std::vector<Firing> firings;
    kernel.process(stimulus.codes.view(), firings);
    wrong += firings.empty() == stimulus.should_fire ? 1 : 0;
  }
  return wrong;
}

TEST(BoundaryStimuli, are_answered_as_the_settings_demand_by_a_right_trigger_of_every_kind) {
  for (const TriggerKind kind : {TriggerKind::Threshold, TriggerKind::TimeOverThreshold, TriggerKind::BoxcarSum}) {
    EXPECT_EQ(wrong_answers(settings_of(kind), settings_of(kind)), 0) << name_of(kind);
  }
}

TEST(BoundaryStimuli, notice_every_setting_that_is_off_by_one) {
  const TriggerSettings right = settings_of(TriggerKind::TimeOverThreshold);
  const auto notices = [&](auto change) {
    TriggerSettings wrong = right;
    change(wrong.condition);
    return wrong_answers(right, wrong) > 0;
  };
  EXPECT_TRUE(notices([](ConditionSettings& c) { ++c.level_counts[0]; }));
  EXPECT_TRUE(notices([](ConditionSettings& c) { --c.level_counts[0], --c.level_counts[1]; }));
  EXPECT_TRUE(notices([](ConditionSettings& c) { ++c.window_samples; }));
  EXPECT_TRUE(notices([](ConditionSettings& c) { --c.window_samples; }));
  EXPECT_TRUE(notices([](ConditionSettings& c) { ++c.min_samples_over; }));
  EXPECT_TRUE(notices([](ConditionSettings& c) { --c.min_samples_over; }));
  EXPECT_TRUE(notices([](ConditionSettings& c) { ++c.majority; }));
  EXPECT_TRUE(notices([](ConditionSettings& c) { --c.majority; }));
}

TEST(BoundaryStimuli, notice_a_sum_that_is_off_by_one) {
  const TriggerSettings right = settings_of(TriggerKind::BoxcarSum);
  TriggerSettings higher = right;
  ++higher.condition.sum_counts[0];
  TriggerSettings lower = right;
  for (auto& sum : lower.condition.sum_counts) --sum;
  EXPECT_GT(wrong_answers(right, higher), 0);
  EXPECT_GT(wrong_answers(right, lower), 0);
}

TEST(WhyNeverTrue, names_a_level_beyond_the_largest_code) {
  TriggerSettings settings = settings_of(TriggerKind::Threshold);
  const DigitizerConfig digitizer = station_of({}).digitizer;
  EXPECT_EQ(why_never_true(settings.condition, digitizer), "");
  settings.condition.level_counts = {3896, 3885, 3905};  // the first one count beyond 4095, the others at it
  EXPECT_EQ(why_never_true(settings.condition, digitizer), "");
  settings.condition.level_counts = {3896, 3886, 3905};
  EXPECT_NE(why_never_true(settings.condition, digitizer), "");
}

/// A scan of one trigger whose total at factor x is `total(x)`, evenly over 10 blocks.
template <typename Total>
RateScan scan_of(const StationPlan& plan, const std::vector<double>& factors, Total total) {
  RateConfig config;
  config.level_factors = factors;
  const LiveTimePlan time(0.25, 0.025, plan);
  RateScan scan(rate_variants(plan, config), time);
  Packer packer;
  for (const double x : factors) {
    packer.put_all(std::vector<std::int64_t>(10, static_cast<std::int64_t>(std::llround(total(x) / 10))));
  }
  scan.merge(packer.take());
  return scan;
}

TEST(LevelSlope, is_the_exponent_of_a_power_law) {
  const StationPlan plan = station_of({settings_of(TriggerKind::Threshold)});
  const RateScan scan = scan_of(plan, {0.8, 1.0, 1.25}, [](double x) { return 1e6 * std::pow(x, -6); });
  const auto slope = level_slope(scan, 0);
  ASSERT_TRUE(slope.has_value());
  EXPECT_NEAR(slope->value, -6, 0.001);
  EXPECT_GT(slope->standard_error, 0);
}

TEST(LevelSlope, is_absent_without_firings_on_both_sides) {
  const StationPlan plan = station_of({settings_of(TriggerKind::Threshold)});
  EXPECT_FALSE(level_slope(scan_of(plan, {0.8, 1.0, 1.25}, [](double x) { return x < 1.1 ? 1e4 : 0; }), 0));
}

TEST(FactorForRate, interpolates_a_power_law_and_does_not_go_beyond_the_scan) {
  const StationPlan plan = station_of({settings_of(TriggerKind::Threshold)});
  const RateScan scan = scan_of(plan, {0.5, 1.0, 2.0}, [](double x) { return 1e5 * std::pow(x, -4); });
  const auto factor = factor_for_rate(scan, 0, 4e5 * std::pow(2, -2));  // 0.25 s of live time: 4e5 Hz at factor 1
  ASSERT_TRUE(factor.has_value());
  EXPECT_NEAR(*factor, std::sqrt(2), 0.001);
  EXPECT_FALSE(factor_for_rate(scan, 0, 1e9));
  EXPECT_FALSE(factor_for_rate(scan, 0, 1));
}

TEST(Background, prescales_over_all_units_as_if_they_were_one) {
  GeneratorConfig config;
  config.tank.tubes = 3;
  const TraceGenerator generator(config, 5);
  TriggerSettings every = settings_of(TriggerKind::Threshold);
  TriggerSettings tenth = every;
  tenth.firing.prescale = 10;
  const StationPlan plan = station_of({every, tenth});
  const LiveTimePlan time(0.6, 0.05, plan);
  ASSERT_GT(time.units(), 1);
  BackgroundRun run(plan, CaptureConfig{}, time);
  for (std::int64_t unit = 0; unit < time.units(); ++unit) {
    std::vector<std::unique_ptr<LiveObserver>> observers;
    observers.push_back(run.observe(unit));
    const auto seen = unpack_observed(observe_live_unit(plan, generator, time, unit, std::move(observers)), 1);
    run.merge(unit, seen.front(), [](std::size_t, const Firing&) {});
  }
  const auto total = [&](std::size_t trigger) {
    const auto& counts = run.totals(trigger).firings_per_block;
    return std::accumulate(counts.begin(), counts.end(), std::int64_t{0});
  };
  EXPECT_GT(total(0), 100);
  EXPECT_EQ(total(1), total(0) / 10);
  EXPECT_EQ(run.totals(1).prescaled, total(0) - total(1));
}

Scenario scenario_with_two_channels() {
  Scenario scenario;
  scenario.digitizer.channels = 2;
  scenario.digitizer.baseline_counts = {200, 210};
  return scenario;
}

TEST(Reconcile, lets_the_scenario_win_and_notes_the_difference) {
  TraceFileInfo info;
  info.channels = 2;
  info.baseline_counts = {{100, 100}};
  const RecordedFacts facts = reconcile(scenario_with_two_channels(), info, "f.csv");
  EXPECT_EQ(facts.station.baseline_counts, (std::vector<std::int32_t>{200, 210}));
  ASSERT_EQ(facts.notes.size(), 1U);
  EXPECT_NE(facts.notes[0].find("baseline_counts"), std::string::npos);
}

TEST(Reconcile, never_takes_triggered_traces_for_unbiased_ones) {
  Scenario scenario = scenario_with_two_channels();
  scenario.traces.selection = "unbiased";
  TraceFileInfo info;
  info.channels = 2;
  info.selection = "triggered_by:old";
  EXPECT_EQ(reconcile(scenario, info, "f.csv").selection, "triggered_by:old");
}

TEST(Reconcile, refuses_other_channels_bits_and_rates) {
  const Scenario scenario = scenario_with_two_channels();
  TraceFileInfo good;
  good.channels = 2;
  EXPECT_NO_THROW(reconcile(scenario, good, "f.csv"));
  TraceFileInfo channels = good;
  channels.channels = 3;
  EXPECT_THROW(reconcile(scenario, channels, "f.csv"), InputError);
  TraceFileInfo bits = good;
  bits.bits = 13;
  EXPECT_THROW(reconcile(scenario, bits, "f.csv"), InputError);
  TraceFileInfo rate = good;
  rate.sample_rate_mhz = 101;
  EXPECT_THROW(reconcile(scenario, rate, "f.csv"), InputError);
}

TEST(Progress, tells_what_is_left_at_the_pace_so_far) {
  EXPECT_EQ(progress_text(25, 100, 0, 10.0), "25 %, 30 s left");
  EXPECT_EQ(progress_text(60, 100, 20, 10.0), "60 %, 10 s left");  // the first 20 were done before
  EXPECT_EQ(progress_text(100, 100, 0, 10.0), "100 %");
  EXPECT_EQ(progress_text(7, 0, 0, 10.0), "7 done");
}

TEST(Progress, writes_durations_for_people) {
  EXPECT_EQ(duration_text(12.4), "12 s");
  EXPECT_EQ(duration_text(200), "3 min 20 s");
  EXPECT_EQ(duration_text(7500), "2 h 05 min");
}

}  // namespace
}  // namespace cistern
