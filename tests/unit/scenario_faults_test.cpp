/// \file
/// Every malformed scenario is refused in one line that names file, line, key and expectation.
#include <filesystem>

#include "tests/unit/scenario_text.hpp"

namespace cistern {
namespace {

struct Row {
  const char* name;
  std::string text;
  std::string begins;                 ///< "s.toml:3: "
  std::vector<std::string> mentions;  ///< key, value, expectation
  std::vector<Override> overrides{};
};

void expect_faults(const std::vector<Row>& rows) {
  for (const Row& row : rows) {
    const std::string fault = fault_in(row.text, row.overrides);
    EXPECT_EQ(fault.rfind(row.begins, 0), 0U) << row.name << ": " << fault;
    EXPECT_EQ(fault.find('\n'), std::string::npos) << row.name << ": " << fault;
    for (const std::string& word : row.mentions)
      EXPECT_NE(fault.find(word), std::string::npos) << row.name << " lacks \"" << word << "\": " << fault;
  }
}

std::string tank(std::string_view key) { return with_lines("[tank]\n" + std::string(key) + "\n"); }
std::string calibrated(std::string_view lines) { return with_lines("[calibration]\n" + std::string(lines) + "\n"); }
std::string trigger(std::string_view lines) {
  return with_lines("[[trigger]]\nname = \"b\"\n" + std::string(lines) + "\n");
}

std::string many_ones(int count) {
  std::string ones;
  for (int i = 0; i < count; ++i) ones += "1,";
  return ones;
}

TEST(ScenarioFaults, start_from_a_scenario_without_any) { EXPECT_EQ(fault_in(smallest_scenario), ""); }

TEST(ScenarioFaults, of_the_file_as_a_whole) {
  expect_faults({
      {"empty", "", "s.toml: ", {"is empty", "expected a scenario"}},
      {"only a comment", "# nothing\n", "s.toml: ", {"[digitizer]", "expected"}},
      {"no trigger",
       "[digitizer]\nchannels = 1\nsample_rate_mhz = 1\nbits = 8\n",
       "s.toml: ",
       {"[[trigger]]", "expected at least one"}},
      {"more than 1 MiB", std::string((1U << 20U) + 1, '#'), "s.toml: ", {"larger than 1 MiB"}},
      {"not UTF-8", "a = \"\xff\"\n", "s.toml:1:", {"not valid TOML", "utf-8"}},
      {"a byte 0", std::string("[digitizer]\na = 1\0\n", 19), "s.toml:2:", {"not valid TOML"}},
      {"syntax", "[digitizer]\nchannels = \n", "s.toml:2:12: ", {"not valid TOML", "expected value"}},
      {"a key twice", "[digitizer]\nbits = 8\nbits = 9\n", "s.toml:3:", {"not valid TOML", "bits"}},
      {"an integer of more than 64 bits", "a = 99999999999999999999\n", "s.toml:1:", {"not valid TOML", "64 bits"}},
  });
}

TEST(ScenarioFaults, of_files_that_cannot_be_read) {
  const ScenarioFile file(smallest_scenario);
  const auto what_of = [](const std::filesystem::path& path) {
    try {
      (void)load_scenario(path, {});
    } catch (const InputError& error) {
      return std::string(error.what());
    }
    return std::string();
  };
  const auto missing = file.path().parent_path() / "missing.toml";
  EXPECT_EQ(what_of(missing), missing.string() + ": no such file; expected a scenario (TOML)");
  const auto folder = file.path().parent_path();
  EXPECT_EQ(what_of(folder), folder.string() + ": is not a file; expected a scenario (TOML)");
}

TEST(ScenarioFaults, of_words_that_are_not_known) {
  expect_faults({
      {"key",
       with_line("level_counts", "levle_counts"),
       "s.toml:9: ",
       {"unknown key `levle_counts` in [[trigger]] long; nearest: level_counts"}},
      {"key of a single table",
       tank("radius = 1"),
       "s.toml:13: ",
       {"unknown key `radius` in [tank]; nearest: radius_m"}},
      {"key of a requirement",
       with_lines("[requirements.quiet]\nfigur = \"a.b\"\n"),
       "s.toml:13: ",
       {"unknown key `figur` in [requirements.quiet]; nearest: figure"}},
      {"table", with_lines("[tanc]\n"), "s.toml:12: ", {"unknown table `tanc`; nearest table: tank"}},
      {"list of tables",
       with_lines("[[triger]]\nname = \"b\"\n"),
       "s.toml:",
       {"unknown table `triger`; nearest table: trigger"}},
      {"key outside of tables", "sed = 1\n" + std::string(smallest_scenario), "s.toml:1: ", {"unknown key `sed`"}},
      {"key that breaks lines",
       with_lines("\"a\\nb\\u0085\" = 1\n"),
       "s.toml:12: ",
       {"unknown key `a\\nb\\u0085` in [[trigger]] long"}},
      {"word",
       with_line("time_over_threshold", "time_over_treshold"),
       "s.toml:8: ",
       {"trigger.long.kind", "\"time_over_treshold\"", "nearest: \"time_over_threshold\""}},
      {"word of another type",
       with_line("\"time_over_threshold\"", "3"),
       "s.toml:8: ",
       {"trigger.long.kind", "got 3", "boxcar_sum"}},
      {"role",
       trigger("kind = \"threshold\"\nlevel_counts = 1\nrole = \"both\""),
       "s.toml:16: ",
       {"trigger.b.role", "\"both\"", "in_service"}},
  });
}

TEST(ScenarioFaults, of_what_is_not_in_this_version) {
  expect_faults({
      {"tracker",
       with_lines("[digitizer.baseline]\nshift = 4\n"),
       "s.toml:12: ",
       {"digitizer.baseline", "not in this version", "expected baseline_counts"}},
      {"library",
       with_line("time_over_threshold", "library"),
       "s.toml:8: ",
       {"trigger.long.kind", "not in this version", "boxcar_sum"}},
      {"rtl", with_line("time_over_threshold", "rtl"), "s.toml:8: ", {"trigger.long.kind", "not in this version"}},
      {"resample",
       with_lines("[traces]\nresample = true\n"),
       "s.toml:13: ",
       {"traces.resample", "not in this version", "sample_rate_mhz"}},
      {"resample, though false", with_lines("[traces]\nresample = false\n"), "s.toml:13: ", {"not in this version"}},
  });
}

TEST(ScenarioFaults, of_tables_in_another_shape) {
  expect_faults({
      {"single table twice", with_lines("[[tank]]\nradius_m = 1\n"), "s.toml:", {"tank", "expected a table"}},
      {"number for a table",
       "tank = 3\n" + std::string(smallest_scenario),
       "s.toml:1: ",
       {"tank", "got 3", "expected a table"}},
      {"one trigger without the double brackets",
       with_line("[[trigger]]", "[trigger]"),
       "s.toml:6: ",
       {"trigger", "[[trigger]]"}},
      {"signals of mixed types",
       "signal = [{name = \"a\"}, 3]\n" + std::string(smallest_scenario),
       "s.toml:1: ",
       {"signal", "[[signal]]"}},
      {"requirement without a name",
       with_lines("[requirements]\nfigure = \"a.b\"\n"),
       "s.toml:13: ",
       {"requirements.figure", "\"a.b\"", "expected a table"}},
      {"table for a value",
       with_line("level_counts = 64", "level_counts = {a = 1}"),
       "s.toml:9: ",
       {"trigger.long.level_counts", "expected an integer"}},
  });
}

TEST(ScenarioFaults, of_missing_keys) {
  expect_faults({
      {"channels",
       with_line("channels = 4\n", ""),
       "s.toml:1: ",
       {"missing key `channels` in [digitizer]", "from 1 to 16"}},
      {"rate", with_line("sample_rate_mhz = 100\n", ""), "s.toml:1: ", {"`sample_rate_mhz`", "(MHz)"}},
      {"kind",
       with_line("kind = \"time_over_threshold\"\n", ""),
       "s.toml:6: ",
       {"missing key `kind` in [[trigger]] long"}},
      {"name", with_line("name = \"long\"\n", ""), "s.toml:6: ", {"missing key `name` in [[trigger]]"}},
      {"sizes", with_lines("[[signal]]\nname = \"m\"\nkind = \"muon\"\n"), "s.toml:12: ", {"`sizes_vem`", "(VEM)"}},
      {"figure",
       with_lines("[requirements.quiet]\nat_most = 3\n"),
       "s.toml:12: ",
       {"missing key `figure` in [requirements.quiet]"}},
      {"level",
       with_line("level_counts = 64\n", ""),
       "s.toml:6: ",
       {"trigger.long", "neither of level_counts and level_vem", "expected one of them"}},
      {"window", with_line("window_samples = 150\n", ""), "s.toml:6: ", {"neither of window_samples and window_ns"}},
      {"sum",
       trigger("kind = \"boxcar_sum\"\nlength_ns = 300"),
       "s.toml:12: ",
       {"trigger.b", "neither of sum_counts and sum_vem"}},
  });
}

TEST(ScenarioFaults, of_numbers) {
  expect_faults({
      {"nan", tank("radius_m = nan"), "s.toml:13: ", {"tank.radius_m", "got nan", "from 0.1 to 20 (m)"}},
      {"infinity", tank("depth_m = inf"), "s.toml:13: ", {"tank.depth_m", "got inf", "(m)"}},
      {"minus infinity", tank("depth_m = -inf"), "s.toml:13: ", {"got -inf"}},
      {"text", tank("radius_m = \"wide\""), "s.toml:13: ", {"got \"wide\"", "expected a number"}},
      {"truth for a number", tank("radius_m = true"), "s.toml:13: ", {"got true", "expected a number"}},
      {"date", tank("radius_m = 2020-01-01"), "s.toml:13: ", {"got 2020-01-01", "expected a number"}},
      {"just below the range", tank("radius_m = 0.0999"), "s.toml:13: ", {"0.0999", "from 0.1"}},
      {"just above the range", tank("radius_m = 20.001"), "s.toml:13: ", {"20.001", "to 20"}},
      {"an open end", tank("direct_light_fraction = 1"), "s.toml:13: ", {"got 1", "less than 1"}},
      {"no flux", with_lines("[muons]\nflux_scale = 0\n"), "s.toml:13: ", {"muons.flux_scale", "more than 0"}},
      {"whole but real",
       with_line("bits = 12", "bits = 12.0"),
       "s.toml:4: ",
       {"digitizer.bits", "got 12.0", "expected an integer from 4 to 15"}},
      {"truth for an integer",
       with_line("bits = 12", "bits = true"),
       "s.toml:4: ",
       {"got true", "expected an integer"}},
      {"one bit too few", with_line("bits = 12", "bits = 3"), "s.toml:4: ", {"got 3", "from 4 to 15"}},
      {"one bit too many", with_line("bits = 12", "bits = 16"), "s.toml:4: ", {"got 16"}},
      {"no channel", with_line("channels = 4", "channels = 0"), "s.toml:2: ", {"digitizer.channels", "from 1 to 16"}},
      {"17 channels", with_line("channels = 4", "channels = 17"), "s.toml:2: ", {"got 17", "from 1 to 16"}},
      {"window of 0",
       with_line("150", "0"),
       "s.toml:10: ",
       {"trigger.long.window_samples", "from 1 to 65536 (samples)"}},
      {"window of 65,537", with_line("150", "65537"), "s.toml:10: ", {"got 65537", "to 65536"}},
      {"a negative seed",
       with_lines("[scenario]\nseed = -1\n"),
       "s.toml:13: ",
       {"scenario.seed", "got -1", "at least 0"}},
      {"prescale of 0", with_lines("prescale = 0\n"), "s.toml:12: ", {"trigger.long.prescale", "from 1 to"}},
      {"number for truth",
       with_lines("enabled = 1\n"),
       "s.toml:12: ",
       {"trigger.long.enabled", "expected true or false"}},
      {"altitude", with_lines("[site]\naltitude_m = 2501\n"), "s.toml:13: ", {"site.altitude_m", "from 0 to 2500 (m)"}},
      {"certainty of 1",
       with_lines("[requirements.q]\nfigure = \"a.b\"\nat_most = 1\nconfidence = 1\n"),
       "s.toml:15: ",
       {"requirements.q.confidence", "less than 1"}},
      {"certainty of one half",
       with_lines("[requirements.q]\nfigure = \"a.b\"\nat_most = 1\nconfidence = 0.5\n"),
       "s.toml:15: ",
       {"got 0.5", "more than 0.5"}},
  });
}

TEST(ScenarioFaults, of_lists) {
  expect_faults({
      {"too short",
       with_line("level_counts = 64", "level_counts = [64, 65]"),
       "s.toml:9: ",
       {"trigger.long.level_counts", "2 values", "4"}},
      {"too long",
       with_line("baseline_counts = 200", "baseline_counts = [1, 2, 3, 4, 5]"),
       "s.toml:5: ",
       {"digitizer.baseline_counts", "5 values", "4"}},
      {"empty",
       with_line("level_counts = 64", "level_counts = []"),
       "s.toml:9: ",
       {"empty list", "expected at least one value"}},
      {"mixed",
       with_line("level_counts = 64", "level_counts = [64, \"a\", 64, 64]"),
       "s.toml:9: ",
       {"level_counts[1]", "got \"a\"", "(counts)"}},
      {"real among whole",
       with_line("level_counts = 64", "level_counts = [64, 6.5, 64, 64]"),
       "s.toml:9: ",
       {"level_counts[1]", "got 6.5", "expected an integer"}},
      {"lists inside",
       with_line("level_counts = 64", "level_counts = [[64]]"),
       "s.toml:9: ",
       {"level_counts[0]", "got [ 64 ]"}},
      {"calibration too short",
       calibrated("height_counts_per_vem = [1, 2, 3]"),
       "s.toml:13: ",
       {"calibration.height_counts_per_vem", "3 values"}},
      {"calibration of 0",
       calibrated("area_counts_per_vem = 0"),
       "s.toml:13: ",
       {"calibration.area_counts_per_vem", "more than 0"}},
      {"gain too short",
       with_line("bits = 12", "bits = 12\ngain = [1, 1]"),
       "s.toml:5: ",
       {"digitizer.gain", "2 values"}},
      {"falling sizes",
       with_lines("[[signal]]\nname = \"m\"\nkind = \"muon\"\nsizes_vem = [2, 1]\n"),
       "s.toml:15: ",
       {"signal.m.sizes_vem", "rise", "(VEM)"}},
      {"a size twice",
       with_lines("[[signal]]\nname = \"m\"\nkind = \"muon\"\nsizes_vem = [1, 1]\n"),
       "s.toml:15: ",
       {"rise", "each one once"}},
      {"a size of 0",
       with_lines("[[signal]]\nname = \"m\"\nkind = \"muon\"\nsizes_vem = [0, 1]\n"),
       "s.toml:15: ",
       {"sizes_vem[0]", "more than 0"}},
      {"mask without brackets",
       with_lines("channels = 2\n"),
       "s.toml:12: ",
       {"trigger.long.channels", "a list of channels"}},
      {"a channel twice", with_lines("channels = [1, 1]\n"), "s.toml:12: ", {"trigger.long.channels", "each one once"}},
      {"a channel that is not there",
       with_lines("channels = [0, 4]\n"),
       "s.toml:12: ",
       {"got channel 4", "expected 0 to 3"}},
      {"a list of 4,097",
       with_line("level_counts = 64", "level_counts = [" + many_ones(4097) + "]"),
       "s.toml:9: ",
       {"4097 values", "at most 4096"}},
  });
}

TEST(ScenarioFaults, of_names) {
  expect_faults({
      {"a point",
       with_line("\"long\"", "\"lo.ng\""),
       "s.toml:7: ",
       {"trigger.name", "\"lo.ng\"", "letters, digits, - and _"}},
      {"a space", with_line("\"long\"", "\"lo ng\""), "s.toml:7: ", {"\"lo ng\""}},
      {"nothing", with_line("\"long\"", "\"\""), "s.toml:7: ", {"trigger.name", "1 to 40"}},
      {"41 letters", with_line("long", std::string(41, 'x')), "s.toml:7: ", {"1 to 40"}},
      {"a number", with_line("\"long\"", "3"), "s.toml:7: ", {"got 3"}},
      {"again",
       trigger("kind = \"threshold\"\nlevel_counts = 1\n[[trigger]]\nname = \"b\"\n"),
       "s.toml:17: ",
       {"trigger.name", "\"b\" again", "once"}},
      {"that of a set",
       with_line("\"long\"", "\"candidate\""),
       "s.toml:7: ",
       {"trigger.candidate.name", "another name"}},
      {"of a requirement",
       with_lines("[requirements.\"a b\"]\nfigure = \"a.b\"\nat_most = 1\n"),
       "s.toml:12: ",
       {"requirements", "\"a b\""}},
  });
}

TEST(ScenarioFaults, of_keys_of_another_kind) {
  expect_faults({
      {"window of a threshold trigger",
       trigger("kind = \"threshold\"\nlevel_counts = 1\nwindow_samples = 3"),
       "s.toml:16: ",
       {"window_samples is not a key of kind threshold; its keys are level_counts or level_vem"}},
      {"level of a sum",
       trigger("kind = \"boxcar_sum\"\nlength_samples = 9\nsum_counts = 9\nlevel_counts = 1"),
       "s.toml:17: ",
       {"level_counts is not a key of kind boxcar_sum", "length_samples"}},
      {"sum of a time over threshold",
       with_lines("sum_vem = 1\n"),
       "s.toml:12: ",
       {"sum_vem is not a key of kind time_over_threshold"}},
      {"level twice",
       with_lines("level_vem = 1\n"),
       "s.toml:9: ",
       {"both of level_counts and level_vem", "expected one of them"}},
      {"window twice", with_lines("window_ns = 100\n"), "s.toml:10: ", {"both of window_samples and window_ns"}},
  });
}

TEST(ScenarioFaults, of_keys_that_contradict_each_other_name_both_values) {
  expect_faults({
      {"more over than in the window",
       with_line("21", "151"),
       "s.toml:11: ",
       {"trigger.long.min_samples_over", "151", "150"}},
      {"the same in time",
       with_line("min_samples_over = 21", "min_ns_over = 1505"),
       "s.toml:11: ",
       {"min_ns_over", "151", "150"}},
      {"majority of too many",
       with_lines("majority = 5\n"),
       "s.toml:12: ",
       {"trigger.long.majority", "got 5", "at most 4"}},
      {"majority of a mask", with_lines("majority = 3\nchannels = [1, 3]\n"), "s.toml:12: ", {"got 3", "at most 2"}},
      {"rearm by level without hold-off",
       with_lines("rearm = \"level\"\n"),
       "s.toml:12: ",
       {"trigger.long.rearm", "hold_off_samples = 0", "at least 1"}},
      {"baseline beyond the codes",
       with_line("bits = 12", "bits = 7"),
       "s.toml:5: ",
       {"digitizer.baseline_counts", "got 200", "at most 127", "7 bits"}},
      {"tubes outside of the water",
       tank("radius_m = 0.5\ntube_circle_radius_m = 0.6"),
       "s.toml:14: ",
       {"tank.tube_circle_radius_m", "0.6", "0.5 (m)"}},
      {"blocks longer than live time",
       with_lines("[qualify]\nblock_s = 200\n"),
       "s.toml:13: ",
       {"qualify.block_s", "200", "120 (s)"}},
      {"blocks longer than quick live time",
       with_lines("[rate]\nblock_s = 7\n"),
       "s.toml:13: ",
       {"rate.block_s", "got 7", "quick_live_time_s", "6 (s)"}},
      {"buffer too short",
       with_lines("[station]\nmax_samples = 599\n"),
       "s.toml:13: ",
       {"station.max_samples", "599", "120", "480"}},
      {"pre twice",
       with_lines("[station]\npre_samples = 1\npre_ns = 10\n"),
       "s.toml:13: ",
       {"both of pre_samples and pre_ns"}},
      {"post of half nothing",
       with_lines("[station]\npost_ns = 4\n"),
       "s.toml:13: ",
       {"station.post_ns", "got 0 samples at 100 MHz", "expected 1"}},
      {"copying for ever",
       with_lines("[station]\ncopy_out_us = 1e9\n"),
       "s.toml:13: ",
       {"station.copy_out_us", "100000000000 samples"}},
      {"window of no sample",
       with_line("window_samples = 150", "window_ns = 4.9"),
       "s.toml:10: ",
       {"trigger.long.window_ns", "0 samples at 100 MHz", "1 to 65536"}},
      {"window of too many samples",
       with_line("window_samples = 150", "window_ns = 655365"),
       "s.toml:10: ",
       {"65537 samples"}},
      {"level beyond all codes",
       with_line("level_counts = 64", "level_vem = 9.1e5") + "[calibration]\nheight_counts_per_vem = 1000\n",
       "s.toml:9: ",
       {"trigger.long.level_vem", "910000 VEM", "910000000 counts"}},
      {"two bounds",
       with_lines("[requirements.q]\nfigure = \"a.b\"\nat_most = 1\nat_least = 1\n"),
       "s.toml:14: ",
       {"requirements.q", "both", "at_most and at_least"}},
      {"no bound",
       with_lines("[requirements.q]\nfigure = \"a.b\"\n"),
       "s.toml:12: ",
       {"requirements.q", "neither", "at_most and at_least"}},
  });
}

TEST(ScenarioFaults, of_texts_with_a_form) {
  const auto requirement = [](const char* figure) {
    return with_lines("[requirements.q]\nat_most = 1\nfigure = \"" + std::string(figure) + "\"\n");
  };
  expect_faults({
      {"one part", requirement("rate"), "s.toml:14: ", {"requirements.q.figure", "\"rate\"", "quantity.subject"}},
      {"no subject", requirement("rate."), "s.toml:14: ", {"\"rate.\""}},
      {"no quantity", requirement(".long"), "s.toml:14: ", {"\".long\""}},
      {"an empty part", requirement("rate..long"), "s.toml:14: ", {"\"rate..long\""}},
      {"a space", requirement("rate.lo ng"), "s.toml:14: ", {"\"rate.lo ng\""}},
      {"selection",
       with_lines("[traces]\nselection = \"all\"\n"),
       "s.toml:13: ",
       {"traces.selection", "\"all\"", "triggered_by:NAME"}},
      {"selection by nobody",
       with_lines("[traces]\nselection = \"triggered_by:\"\n"),
       "s.toml:13: ",
       {"traces.selection", "unbiased"}},
      {"an empty title", with_lines("[scenario]\ntitle = \"\"\n"), "s.toml:13: ", {"scenario.title", "a text of 1 to"}},
      {"an escape in a text", with_line("time_over_threshold", "\\u001b[31m"), "s.toml:8: ", {"trigger.long.kind"}},
  });
}

TEST(ScenarioFaults, of_overrides_name_the_override) {
  const std::string text(smallest_scenario);
  expect_faults({
      {"value",
       text,
       "--set trigger.long.window_samples: ",
       {"trigger.long.window_samples: got 0", "from 1 to 65536 (samples)"},
       {{"trigger.long.window_samples", "0"}}},
      {"inside a list",
       text,
       "--set trigger.long.level_counts: ",
       {"level_counts[0]", "\"a\""},
       {{"trigger.long.level_counts", "[\"a\"]"}}},
      {"length of a list",
       text,
       "--set digitizer.baseline_counts: ",
       {"2 values"},
       {{"digitizer.baseline_counts", "[1, 2]"}}},
      {"unknown key",
       text,
       "--set trigger.long.levle_counts: ",
       {"unknown key `levle_counts` in [[trigger]] long; nearest: level_counts"},
       {{"trigger.long.levle_counts", "3"}}},
      {"unknown name",
       text,
       "--set trigger.lon.majority: ",
       {"no [[trigger]] is named `lon`; nearest: long"},
       {{"trigger.lon.majority", "3"}}},
      {"unknown table",
       text,
       "--set triger.long.majority: ",
       {"unknown table `triger`; nearest: trigger"},
       {{"triger.long.majority", "3"}}},
      {"no entry", text, "--set signal.a.kind: ", {"no [[signal]]"}, {{"signal.a.kind", "\"muon\""}}},
      {"table alone", text, "--set digitizer: ", {"expected digitizer.KEY=VALUE"}, {{"digitizer", "3"}}},
      {"entry alone", text, "--set trigger.long: ", {"expected trigger.NAME.KEY=VALUE"}, {{"trigger.long", "3"}}},
      {"too deep", text, "--set digitizer.bits.a: ", {"expected digitizer.KEY=VALUE"}, {{"digitizer.bits.a", "3"}}},
      {"tracker", text, "--set digitizer.baseline", {"not in this version"}, {{"digitizer.baseline.shift", "3"}}},
      {"its own name", text, "--set trigger.long.name: ", {"cannot change it"}, {{"trigger.long.name", "\"b\""}}},
      {"text without quotes",
       text,
       "--set trigger.long.role: ",
       {"got candidate", "TOML value", "with its quotes"},
       {{"trigger.long.role", "candidate"}}},
      {"nothing", text, "--set trigger.long.majority: ", {"TOML value"}, {{"trigger.long.majority", ""}}},
      {"more than one value",
       text,
       "--set trigger.long.majority: ",
       {"3\\nx = 4", "one TOML value"},
       {{"trigger.long.majority", "3\nx = 4"}}},
      {"the key that made the contradiction",
       text,
       "--set trigger.long.window_samples: ",
       {"21", "20"},
       {{"trigger.long.window_samples", "20"}}},
      {"the other way to say it",
       text,
       "--set trigger.long.level_vem: ",
       {"both of level_counts and level_vem"},
       {{"trigger.long.level_vem", "1"}}},
      {"a requirement that is not whole",
       text,
       "--set requirements.q.at_most: ",
       {"missing key `figure`"},
       {{"requirements.q.at_most", "1"}}},
      {"a key with a line break", text, "--set a\\nb: ", {"unknown table"}, {{"a\nb", "1"}}},
      {"a table that is a number",
       "rate = 3\n" + text,
       "--set rate.block_s: ",
       {"`rate` is 3", "expected a table"},
       {{"rate.block_s", "1"}}},
  });
}

}  // namespace
}  // namespace cistern
