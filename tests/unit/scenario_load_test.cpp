/// \file
/// What a good scenario comes to: values, defaults, overrides, and triggers in counts and samples.
#include <cmath>

#include "tests/unit/scenario_text.hpp"

namespace cistern {
namespace {

Scenario with_override(const std::string& key, const std::string& value) {
  return load_text(smallest_scenario, {{key, value}});
}

TEST(Scenario, needs_only_a_digitizer_and_a_trigger) {
  const Scenario scenario = load_text(smallest_scenario);
  EXPECT_EQ(scenario.digitizer.baseline_counts, (std::vector<std::int32_t>{200, 200, 200, 200}));
  EXPECT_EQ(scenario.triggers.size(), 1U);
  EXPECT_EQ(scenario.triggers[0].role, TriggerRole::Both);
  EXPECT_FALSE(scenario.has_tank);
  EXPECT_FALSE(scenario.has_station);
}

TEST(Scenario, joins_what_the_generator_needs_from_several_tables) {
  const Scenario scenario = load_text(with_line("sample_rate_mhz = 100", "sample_rate_mhz = 40\nrange_mv = 1000") +
                                      "[site]\naltitude_m = 123\n[tank]\nradius_m = 2\n");
  EXPECT_TRUE(scenario.has_tank);
  EXPECT_EQ(scenario.generator.sample_rate_mhz, 40);
  EXPECT_EQ(scenario.generator.tank.tubes, 4);
  EXPECT_EQ(scenario.generator.tank.radius_m, 2);
  EXPECT_EQ(scenario.generator.muons.altitude_m, 123);
  EXPECT_EQ(scenario.generator.frontend.counts_per_mv, 4096.0 / 1000);
}

TEST(Scenario, keeps_triggers_and_requirements_in_the_order_of_the_file) {
  const Scenario scenario =
      load_text(with_lines("[[trigger]]\nname = \"7b\"\nkind = \"threshold\"\nlevel_counts = 1\n"
                           "[requirements.z]\nfigure = \"a.b\"\nat_most = 1\n[requirements.a]\nfigure = "
                           "\"a.b.0p5_vem\"\nat_least = 2\nconfidence = 0.99\n"));
  ASSERT_EQ(scenario.triggers.size(), 2U);
  EXPECT_EQ(scenario.triggers[1].name, "7b");
  ASSERT_EQ(scenario.requirements.size(), 2U);
  EXPECT_EQ(scenario.requirements[0].name, "z");
  EXPECT_EQ(scenario.requirements[0].kind, BoundKind::AtMost);
  EXPECT_EQ(scenario.requirements[0].confidence, 0.95);
  EXPECT_EQ(scenario.requirements[1].kind, BoundKind::AtLeast);
  EXPECT_EQ(scenario.requirements[1].bound, 2);
  EXPECT_EQ(scenario.requirements[1].confidence, 0.99);
}

TEST(Scenario, takes_levels_of_zero_and_below) {
  EXPECT_EQ(load_text(with_line("64", "0")).triggers[0].level_counts, (std::vector<std::int32_t>{0}));
  EXPECT_EQ(load_text(with_line("64", "-5")).triggers[0].level_counts, (std::vector<std::int32_t>{-5}));
}

TEST(Scenario, takes_the_edges_of_ranges) {
  EXPECT_EQ(fault_in(with_line("150", "65536")), "");
  EXPECT_EQ(fault_in(with_line("21", "150")), "");
  EXPECT_EQ(fault_in(with_lines("majority = 4\n")), "");
  EXPECT_EQ(fault_in(with_line("bits = 12", "bits = 15")), "");
  EXPECT_EQ(fault_in(with_lines("[station]\nmax_samples = 600\n")), "");
  EXPECT_EQ(fault_in(with_lines("[tank]\nradius_m = 0.5\ntube_circle_radius_m = 0.5\n")), "");
  EXPECT_EQ(fault_in(with_lines("rearm = \"level\"\nhold_off_samples = 1\n")), "");
}

TEST(Scenario, takes_paths_relative_to_itself) {
  const ScenarioFile file(with_lines("[traces]\nfile = \"data/a.npy\"\nselection = \"triggered_by:tall\"\n"));
  const Scenario scenario = load_scenario(file.path(), {});
  EXPECT_EQ(*scenario.traces.file, file.path().parent_path() / "data/a.npy");
  EXPECT_EQ(*scenario.traces.selection, "triggered_by:tall");
  EXPECT_EQ(*load_text(with_lines("[traces]\nfile = \"/data/a.npy\"\n")).traces.file, "/data/a.npy");
}

TEST(Scenario, reads_the_station_in_samples_or_in_time) {
  const CaptureConfig in_samples =
      load_text(with_lines("[station]\npre_samples = 7\npost_samples = 9\noverlap = \"extend\"\n")).capture;
  EXPECT_EQ(in_samples.pre_samples, 7);
  EXPECT_EQ(in_samples.post_samples, 9);
  EXPECT_EQ(in_samples.max_samples, 64);
  EXPECT_EQ(in_samples.overlap, OverlapPolicy::Extend);
  const CaptureConfig in_time =
      load_text(with_lines("[station]\npre_ns = 75\npost_ns = 94\ncopy_out_us = 1.5\ncapture_buffers = 2\n")).capture;
  EXPECT_EQ(in_time.pre_samples, 8);  // 7.5 goes up
  EXPECT_EQ(in_time.post_samples, 9);
  EXPECT_EQ(in_time.copy_out_samples, 150);
  EXPECT_EQ(in_time.buffers, 2);
}

TEST(ScenarioOverride, finds_entries_by_name) {
  EXPECT_EQ(with_override("trigger.long.majority", "3").triggers[0].majority, 3);
}

TEST(ScenarioOverride, changes_a_key_of_a_table) {
  EXPECT_EQ(with_override("digitizer.bits", "14").digitizer.bits, 14);
}

TEST(ScenarioOverride, makes_a_table_that_is_not_there) {
  EXPECT_EQ(with_override("qualify.live_time_s", "30").qualify.live_time_s, 30);
  const Scenario scenario =
      load_text(smallest_scenario, {{"requirements.quiet.figure", "\"a.b\""}, {"requirements.quiet.at_most", "3"}});
  ASSERT_EQ(scenario.requirements.size(), 1U);
  EXPECT_EQ(scenario.requirements[0].bound, 3);
}

TEST(ScenarioOverride, takes_lists_and_texts_as_toml) {
  EXPECT_EQ(with_override("trigger.long.level_counts", "[1, 2, 3, 4]").triggers[0].level_counts,
            (std::vector<std::int32_t>{1, 2, 3, 4}));
  EXPECT_EQ(with_override("scenario.title", "\"a = b # c\"").identity.title, "a = b # c");
  EXPECT_EQ(with_override("scenario.title", "'plain'").identity.title, "plain");
}

TEST(ScenarioOverride, counts_the_last_of_two) {
  EXPECT_EQ(load_text(smallest_scenario, {{"digitizer.bits", "13"}, {"digitizer.bits", "14"}}).digitizer.bits, 14);
}

TEST(ScenarioDigest, is_the_same_for_the_same_input_wherever_it_lies) {
  EXPECT_EQ(load_text(smallest_scenario).digest, load_text(smallest_scenario).digest);
  EXPECT_EQ(load_text(smallest_scenario).digest.size(), 16U);
}

TEST(ScenarioDigest, differs_for_every_change) {
  const std::string plain = load_text(smallest_scenario).digest;
  EXPECT_NE(plain, load_text(with_lines("# a comment\n")).digest);
  EXPECT_NE(plain, with_override("digitizer.bits", "12").digest);
  EXPECT_NE(with_override("digitizer.bits", "13").digest, with_override("digitizer.bits", "14").digest);
}

// --- Counts and samples -------------------------------------------------------------------------

TriggerSettings resolved(const std::string& text) {
  const Scenario scenario = load_text(text);
  return resolve_triggers(scenario, facts_of(scenario)).front();
}

struct Rounding {
  const char* name;
  const char* value;
  std::int64_t expected;
};

/// All products are exact in binary, so that a half is a half.
TEST(ScenarioRounding, of_levels_in_vem_goes_up_at_halves) {
  const Rounding rows[] = {{"whole", "2", 282},
                           {"half", "0.5", 71},
                           {"below half", "0.25", 35},
                           {"above half", "0.75", 106},
                           {"minus half", "-0.5", -70},
                           {"minus below", "-0.25", -35},
                           {"minus above", "-0.75", -106},
                           {"zero", "0", 0}};
  for (const Rounding& row : rows) {
    const auto settings = resolved(with_line("level_counts = 64", std::string("level_vem = ") + row.value) +
                                   "[calibration]\nheight_counts_per_vem = 141\n");
    EXPECT_EQ(settings.condition.level_counts, std::vector<std::int32_t>(4, static_cast<std::int32_t>(row.expected)))
        << row.name;
  }
}

TEST(ScenarioRounding, of_sums_in_vem_goes_up_at_halves) {
  const Rounding rows[] = {{"half", "1.5", 1532}, {"minus half", "-1.5", -1531}, {"whole", "2", 2042}};
  for (const Rounding& row : rows) {
    const auto settings = resolved(
        "[digitizer]\nchannels = 1\nsample_rate_mhz = 100\nbits = 12\nbaseline_counts = "
        "0\n[calibration]\narea_counts_per_vem = 1021\n"
        "[[trigger]]\nname = \"b\"\nkind = \"boxcar_sum\"\nlength_samples = 3\nsum_vem = " +
        std::string(row.value) + "\n");
    EXPECT_EQ(settings.condition.sum_counts, std::vector<std::int64_t>(1, row.expected)) << row.name;
  }
}

TEST(ScenarioRounding, of_windows_in_ns_goes_up_at_halves) {
  const Rounding rows[] = {
      {"half", "1505", 151}, {"below", "1504.9", 150}, {"above", "1505.1", 151}, {"whole", "1500", 150}};
  for (const Rounding& row : rows) {
    const auto settings = resolved(with_line("window_samples = 150", std::string("window_ns = ") + row.value));
    EXPECT_EQ(settings.condition.window_samples, row.expected) << row.name;
  }
}

TEST(ScenarioResolve, spreads_one_value_and_keeps_one_per_channel) {
  EXPECT_EQ(resolved(std::string(smallest_scenario)).condition.level_counts,
            (std::vector<std::int32_t>{64, 64, 64, 64}));
  EXPECT_EQ(resolved(with_line("64", "[1, 2, 3, 4]")).condition.level_counts, (std::vector<std::int32_t>{1, 2, 3, 4}));
  EXPECT_EQ(resolved(with_line("level_counts = 64", "level_vem = 0.5") +
                     "[calibration]\nheight_counts_per_vem = [100, 200, 300, 400]\n")
                .condition.level_counts,
            (std::vector<std::int32_t>{50, 100, 150, 200}));
}

TEST(ScenarioResolve, makes_the_mask_from_the_list_of_channels) {
  EXPECT_EQ(resolved(std::string(smallest_scenario)).condition.channel_enabled,
            (std::vector<bool>{true, true, true, true}));
  EXPECT_EQ(resolved(with_lines("channels = [1, 3]\n")).condition.channel_enabled,
            (std::vector<bool>{false, true, false, true}));
}

TEST(ScenarioResolve, gives_settings_that_the_triggers_accept) {
  const TriggerSettings settings =
      resolved(with_lines("majority = 2\nhold_off_samples = 5\nrearm = \"level\"\nprescale = 3\nenabled = false\n"));
  assert_valid(settings, 4);
  EXPECT_EQ(settings.firing.hold_off_samples, 5);
  EXPECT_EQ(settings.firing.rearm, Rearm::Level);
  EXPECT_EQ(settings.firing.prescale, 3);
  EXPECT_FALSE(settings.firing.enabled);
}

/// The trace file may bring the calibration or the baseline, so only resolving can miss it.
TEST(ScenarioResolve, refuses_vem_without_a_calibration_at_its_line) {
  const Scenario scenario = load_text(with_line("level_counts = 64", "level_vem = 0.5"));
  try {
    (void)resolve_triggers(scenario, facts_of(scenario));
    FAIL() << "no calibration was needed";
  } catch (const InputError& error) {
    const std::string what = error.what();
    EXPECT_NE(what.find("s.toml:9: trigger.long.level_vem: got 0.5 VEM"), std::string::npos) << what;
    EXPECT_NE(what.find("height_counts_per_vem"), std::string::npos) << what;
  }
  StationFacts facts = facts_of(scenario);
  facts.height_counts_per_vem = {140, 140, 140, 140};
  EXPECT_EQ(resolve_triggers(scenario, facts).front().condition.level_counts.front(), 70);
}

TEST(ScenarioResolve, refuses_facts_without_a_baseline) {
  const Scenario scenario = load_text(with_line("baseline_counts = 200\n", ""));
  EXPECT_THROW((void)facts_of(scenario), InputError);
}

}  // namespace
}  // namespace cistern
