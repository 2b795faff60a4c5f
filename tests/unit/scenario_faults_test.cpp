/// \file
/// Faults of the file, its tables and its words.
#include <filesystem>

#include "tests/unit/scenario_faults.hpp"

namespace cistern {
namespace {

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
       with_tank("radius = 1"),
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
       with_second_trigger("kind = \"threshold\"\nlevel_counts = 1\nrole = \"both\""),
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
       with_second_trigger("kind = \"boxcar_sum\"\nlength_ns = 300"),
       "s.toml:12: ",
       {"trigger.b", "neither of sum_counts and sum_vem"}},
  });
}

}  // namespace
}  // namespace cistern
