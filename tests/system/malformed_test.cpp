/// \file
/// Every malformed input: exit status 2, nothing on standard output, one line on standard error that
/// says where and what, and no run directory left behind.
#include <gtest/gtest.h>

#include <algorithm>
#include <string>
#include <vector>

#include "tests/system/program.hpp"

namespace cistern {
namespace {

/// A call with files made from the good ones by one replacement.
struct Malformed {
  std::string name;
  std::string arguments;
  std::string find;  ///< in the good scenario; empty: nothing is replaced
  std::string replace;
  std::vector<std::string> says;  ///< all in the one line
};

/// The name alone: what ctest shows of a row.
void PrintTo(const Malformed& row, std::ostream* stream) { *stream << row.name; }

constexpr const char* qualify = "qualify s.toml";

std::vector<Malformed> scenario_rows() {
  return {
      {"unknown_key", qualify, "majority = 2", "majorty = 2", {"s.toml:16", "majorty", "nearest: majority"}},
      {"unknown_table", qualify, "[calibration]", "[calibraton]", {"s.toml:7", "calibraton", "calibration"}},
      {"unknown_top_level_key", qualify, "[digitizer]", "speed = 3\n[digitizer]", {"s.toml:1", "speed"}},
      {"text_for_a_number",
       qualify,
       "sample_rate_mhz = 100",
       "sample_rate_mhz = \"fast\"",
       {"s.toml:3", "sample_rate_mhz", "number"}},
      {"number_for_a_text", qualify, "name = \"tall\"", "name = 7", {"s.toml:12", "name"}},
      {"float_for_a_whole_number", qualify, "bits = 12", "bits = 12.5", {"s.toml:4", "bits", "integer"}},
      {"switch_for_a_number", qualify, "bits = 12", "bits = true", {"s.toml:4", "bits"}},
      {"not_a_number", qualify, "sample_rate_mhz = 100", "sample_rate_mhz = nan", {"s.toml:3", "sample_rate_mhz"}},
      {"infinite", qualify, "sample_rate_mhz = 100", "sample_rate_mhz = inf", {"s.toml:3", "sample_rate_mhz"}},
      {"zero_rate",
       qualify,
       "sample_rate_mhz = 100",
       "sample_rate_mhz = 0",
       {"s.toml:3", "sample_rate_mhz", "from 0.001"}},
      {"negative_rate", qualify, "sample_rate_mhz = 100", "sample_rate_mhz = -100", {"s.toml:3", "sample_rate_mhz"}},
      {"no_channels", qualify, "channels = 2\n", "", {"s.toml:1", "digitizer", "channels"}},
      {"zero_channels", qualify, "channels = 2", "channels = 0", {"s.toml:2", "channels", "from 1 to 16"}},
      {"seventeen_channels", qualify, "channels = 2", "channels = 17", {"s.toml:2", "channels", "from 1 to 16"}},
      {"three_bits", qualify, "bits = 12", "bits = 3", {"s.toml:4", "bits", "from 4 to 15"}},
      {"sixteen_bits", qualify, "bits = 12", "bits = 16", {"s.toml:4", "bits", "from 4 to 15"}},
      {"too_many_baselines", qualify, "[200, 210]", "[200, 210, 220]", {"s.toml", "baseline_counts", "3 values"}},
      {"empty_baselines", qualify, "[200, 210]", "[]", {"s.toml:5", "baseline_counts", "empty"}},
      {"mixed_list", qualify, "[200, 210]", "[200, \"x\"]", {"s.toml:5", "baseline_counts[1]"}},
      {"baseline_beyond_the_bits", qualify, "[200, 210]", "[200, 4096]", {"baseline_counts", "4095"}},
      {"no_baseline_anywhere", qualify, "baseline_counts = [200, 210]\n", "", {"s.toml", "baseline_counts"}},
      {"baseline_tracker",
       qualify,
       "baseline_counts = [200, 210]",
       "baseline_counts = [200, 210]\n[digitizer.baseline]\nshift = 4",
       {"baseline", "not in this version"}},
      {"no_digitizer", qualify, "[digitizer]", "[site]", {"s.toml"}},
      {"digitizer_twice", qualify, "[calibration]", "[digitizer]", {"s.toml:7"}},
      {"negative_calibration", qualify, "[140, 138]", "[140, -138]", {"s.toml:8", "height_counts_per_vem"}},
      {"calibration_of_wrong_length", qualify, "[140, 138]", "[140, 138, 139]", {"height_counts_per_vem", "3 values"}},
      {"vem_level_without_calibration",
       qualify,
       "height_counts_per_vem = [140, 138]\n",
       "",
       {"level_vem", "height_counts_per_vem"}},
      {"unknown_kind",
       qualify,
       "kind = \"threshold\"",
       "kind = \"treshold\"",
       {"s.toml:14", "kind", "nearest: \"threshold\""}},
      {"library_kind", qualify, "kind = \"threshold\"", "kind = \"library\"", {"s.toml:14", "not in this version"}},
      {"rtl_kind", qualify, "kind = \"threshold\"", "kind = \"rtl\"", {"s.toml:14", "not in this version"}},
      {"unknown_role", qualify, "role = \"candidate\"", "role = \"future\"", {"s.toml", "role", "candidate"}},
      {"no_name", qualify, "name = \"tall\"\n", "", {"s.toml:11", "name"}},
      {"name_with_a_blank", qualify, "name = \"tall\"", "name = \"so tall\"", {"s.toml:12", "name", "letters"}},
      {"name_twice", qualify, "name = \"broad\"", "name = \"tall\"", {"s.toml:19", "tall", "once"}},
      {"two_levels",
       qualify,
       "level_vem = 1.5",
       "level_vem = 1.5\nlevel_counts = 3",
       {"s.toml:16", "level_counts", "level_vem", "both"}},
      {"no_level", qualify, "level_vem = 1.5\n", "", {"s.toml:11", "level_counts", "level_vem", "neither"}},
      {"key_of_another_kind",
       qualify,
       "level_vem = 1.5",
       "level_vem = 1.5\nwindow_samples = 9",
       {"s.toml:16", "window_samples", "threshold"}},
      {"majority_of_three_of_two", qualify, "majority = 2", "majority = 3", {"majority", "at most 2"}},
      {"majority_zero", qualify, "majority = 2", "majority = 0", {"s.toml:16", "majority", "from 1 to 16"}},
      {"majority_beyond_the_mask", qualify, "majority = 2", "majority = 2\nchannels = [1]", {"majority", "at most 1"}},
      {"mask_of_a_missing_channel", qualify, "majority = 2", "majority = 2\nchannels = [0, 2]", {"channels", "0 to 1"}},
      {"mask_with_a_channel_twice", qualify, "majority = 2", "majority = 2\nchannels = [1, 1]", {"channels", "once"}},
      {"empty_mask", qualify, "majority = 2", "majority = 2\nchannels = []", {"channels", "empty"}},
      {"window_zero", qualify, "window_samples = 150", "window_samples = 0", {"window_samples", "from 1 to 65536"}},
      {"window_too_long",
       qualify,
       "window_samples = 150",
       "window_samples = 65537",
       {"window_samples", "from 1 to 65536"}},
      {"minimum_beyond_the_window",
       qualify,
       "min_samples_over = 21",
       "min_samples_over = 151",
       {"min_samples_over", "151", "150"}},
      {"window_of_no_sample", qualify, "window_samples = 150", "window_ns = 4", {"window", "0 samples"}},
      {"length_zero", qualify, "length_samples = 60", "length_samples = 0", {"length_samples", "from 1 to 65536"}},
      {"prescale_zero", qualify, "majority = 2", "majority = 2\nprescale = 0", {"prescale", "from 1"}},
      {"negative_hold_off", qualify, "majority = 2", "majority = 2\nhold_off_samples = -1", {"hold_off_samples"}},
      {"rearm_at_level_without_hold_off",
       qualify,
       "majority = 2",
       "majority = 2\nrearm = \"level\"",
       {"rearm", "hold_off_samples"}},
      {"unknown_rearm", qualify, "majority = 2", "majority = 2\nrearm = \"never\"", {"rearm", "edge"}},
      {"trigger_as_a_single_table", qualify, "[[trigger]]", "[trigger]", {"s.toml"}},
      {"no_trigger", "qualify digitizer.toml", "", "", {"digitizer.toml", "[[trigger]]"}},
      {"broken_toml", qualify, "bits = 12", "bits = = 12", {"s.toml:4", "TOML"}},
      {"text_without_end", qualify, "name = \"tall\"", "name = \"tall", {"s.toml:12", "TOML"}},
      {"empty_file", "qualify empty.toml", "", "", {"empty.toml", "[digitizer]"}},
      {"binary_file", "qualify binary.toml", "", "", {"binary.toml"}},
  };
}

std::vector<Malformed> table_rows() {
  const auto with = [](const char* name, const std::string& table, std::vector<std::string> says) {
    return Malformed{name, qualify, "[calibration]", table + "\n[calibration]", std::move(says)};
  };
  return {
      with("latitude_beyond_the_pole", "[site]\nlatitude_deg = 91", {"latitude_deg", "-90 to 90"}),
      with("altitude_in_the_stratosphere", "[site]\naltitude_m = 12000", {"altitude_m", "0 to 2500"}),
      with("tank_without_radius", "[tank]\nradius_m = 0", {"radius_m"}),
      with("tubes_outside_the_tank", "[tank]\nradius_m = 0.5\ntube_circle_radius_m = 0.7",
           {"tube_circle_radius_m", "0.5"}),
      with("perfect_mirror", "[tank]\nwall_reflectivity = 1", {"wall_reflectivity"}),
      with("negative_noise", "[frontend]\nnoise_rms_mv = -1", {"noise_rms_mv"}),
      with("noise_fully_correlated", "[frontend]\nnoise_correlation = 1", {"noise_correlation"}),
      with("negative_flux", "[muons]\nflux_scale = -1", {"flux_scale"}),
      with("no_capture_buffers", "[station]\ncapture_buffers = 0", {"capture_buffers", "from 1"}),
      with("unknown_overlap", "[station]\noverlap = \"drop\"", {"overlap", "ignore"}),
      with("capture_longer_than_its_buffer", "[station]\npre_samples = 40\npost_samples = 40\nmax_samples = 50",
           {"station"}),
      with("signal_without_sizes", "[[signal]]\nname = \"m\"\nkind = \"muon\"", {"signal", "sizes_vem"}),
      with("signal_of_unknown_kind", "[[signal]]\nname = \"m\"\nkind = \"proton\"\nsizes_vem = [1]", {"kind", "muon"}),
      with("signal_sizes_that_fall", "[[signal]]\nname = \"m\"\nkind = \"muon\"\nsizes_vem = [2, 1]",
           {"sizes_vem", "rise"}),
      with("signal_of_no_size", "[[signal]]\nname = \"m\"\nkind = \"muon\"\nsizes_vem = [0]", {"sizes_vem"}),
      with("block_longer_than_live_time", "[qualify]\nlive_time_s = 1\nquick_live_time_s = 1\nblock_s = 2",
           {"block_s"}),
      with("no_signals_per_point", "[qualify]\nsignals_per_point = 0", {"signals_per_point"}),
      with("level_factor_zero", "[rate]\nlevel_factors = [0, 1]", {"level_factors"}),
      with("selection_of_nothing", "[traces]\nselection = \"triggered_by:\"", {"selection", "triggered_by:NAME"}),
      with("resampling", "[traces]\nresample = true", {"resample", "not in this version"}),
      with("requirement_without_bound", "[requirements.r]\nfigure = \"background_rate.long\"",
           {"requirements.r", "at_most", "neither"}),
      with("requirement_with_two_bounds",
           "[requirements.r]\nfigure = \"background_rate.long\"\nat_most = 2\nat_least = 1",
           {"requirements.r", "both"}),
      with("requirement_without_figure", "[requirements.r]\nat_most = 2", {"requirements.r", "figure"}),
      with("requirement_on_no_figure", "[requirements.r]\nfigure = \"efficiency.lung.muon.3_vem\"\nat_least = 0.5",
           {"requirements.r", "nearest"}),
      with("requirement_with_certainty", "[requirements.r]\nfigure = \"a.b\"\nat_most = 2\nconfidence = 1",
           {"confidence"}),
      with("requirement_named_with_a_blank", "[requirements.\"a b\"]\nfigure = \"a.b\"\nat_most = 2",
           {"a b", "letters"}),
  };
}

std::vector<Malformed> call_rows() {
  const auto call = [](const char* name, const char* arguments, std::vector<std::string> says) {
    return Malformed{name, arguments, "", "", std::move(says)};
  };
  return {
      call("no_command", "", {"cistern"}),
      call("unknown_command", "qualfy s.toml", {"qualfy", "nearest: qualify"}),
      call("command_to_come", "power s.toml", {"not in this version"}),
      call("another_command_to_come", "vectors export s.toml", {"not in this version"}),
      call("no_scenario", "qualify", {"SCENARIO"}),
      call("missing_scenario", "qualify nowhere.toml", {"nowhere.toml", "no such file"}),
      call("directory_as_scenario", "qualify .", {"not a file"}),
      call("unknown_option", "qualify s.toml --quik", {"--quik", "nearest: --quick"}),
      call("unknown_trace_command", "traces mak s.toml", {"mak", "nearest: make"}),
      call("no_jobs", "qualify s.toml --jobs 0", {"--jobs"}),
      call("jobs_as_text", "qualify s.toml --jobs many", {"--jobs"}),
      call("seed_as_text", "qualify s.toml --seed x", {"--seed"}),
      call("set_without_value", "qualify s.toml --set trigger.long.majority", {"--set", "KEY=VALUE"}),
      call("set_unknown_table", "qualify s.toml --set triger.long.majority=1", {"--set", "nearest: trigger"}),
      call("set_unknown_entry", "qualify s.toml --set trigger.lung.majority=1", {"--set", "nearest: long"}),
      call("set_unknown_key", "qualify s.toml --set trigger.long.majorty=1", {"--set", "nearest: majority"}),
      call("set_value_out_of_range", "qualify s.toml --set trigger.long.majority=9", {"majority", "at most 2"}),
      call("set_value_that_is_no_toml", "qualify s.toml --set trigger.long.kind=threshold", {"--set", "TOML"}),
      call("set_too_deep", "qualify s.toml --set digitizer.bits.x=1", {"--set", "digitizer"}),
      call("out_is_a_file", "qualify s.toml --out s.toml", {"--out", "file"}),
      call("out_holds_something_else", "qualify s.toml --out taken", {"--out", "taken"}),
      call("explain_unknown_key", "explain trigger.windw_samples", {"nearest: trigger.window_samples"}),
      call("rate_without_tank", "rate s.toml", {"[tank]"}),
      call("replay_without_traces", "replay s.toml", {"--traces"}),
      call("replay_of_a_missing_file", "replay s.toml --traces none.csv", {"none.csv"}),
      call("replay_of_an_unknown_format", "replay s.toml --traces s.toml", {"s.toml", ".csv"}),
      call("replay_of_a_short_line", "replay s.toml --traces short.csv", {"short.csv:4"}),
      call("replay_of_a_code_too_large", "replay s.toml --traces large.csv", {"large.csv:3", "4095"}),
      call("replay_of_another_number_of_channels", "replay s.toml --traces one.csv", {"one.csv", "1", "2"}),
      call("replay_at_another_rate", "replay s.toml --traces fast.csv", {"fast.csv", "120", "100"}),
      call("replay_of_a_broken_npy", "replay s.toml --traces broken.npy", {"broken.npy"}),
      call("replay_of_a_broken_hdf5", "replay s.toml --traces broken.h5", {"broken.h5"}),
      call("convert_to_an_unknown_format", "traces convert good.csv out.txt", {"out.txt"}),
      call("convert_onto_itself", "traces convert good.csv good.csv", {"good.csv"}),
      call("convert_against_the_file", "traces convert good.csv out.npy --bits 11", {"--bits"}),
      call("describe_a_missing_file", "traces describe none.npy", {"none.npy"}),
      call("make_of_an_unknown_kind", "traces make t.toml --out x.npy --kind proton", {"proton", "nearest"}),
      call("make_without_traces", "traces make t.toml --out x.npy --traces 0", {"--traces"}),
      call("make_with_the_onset_outside", "traces make t.toml --out x.npy --kind muon --onset-sample 5000",
           {"--onset-sample"}),
      call("make_with_a_start_in_npy", "traces make t.toml --out x.npy --start-ns 5", {"--start-ns", ".h5"}),
      call("calibrate_without_tank", "traces calibrate s.toml", {"[tank]"}),
  };
}

std::vector<Malformed> all_rows() {
  std::vector<Malformed> rows;
  for (auto group : {scenario_rows(), table_rows(), call_rows()}) rows.insert(rows.end(), group.begin(), group.end());
  return rows;
}

void write_files(const ScratchDirectory& directory, const Malformed& row) {
  std::string scenario = small_scenario();
  if (!row.find.empty()) {
    const auto at = scenario.find(row.find);
    ASSERT_NE(at, std::string::npos) << "the good scenario has no " << row.find;
    scenario.replace(at, row.find.size(), row.replace);
  }
  directory.write("s.toml", scenario);
  directory.write("t.toml", tank_scenario());
  directory.write("digitizer.toml", scenario.substr(0, scenario.find("[[trigger]]")));
  directory.write("empty.toml", "");
  directory.write("binary.toml", std::string("\0\1\2\xff\xfe", 5));
  directory.write("good.csv", "# bits=12\ntrace,sample,ch0,ch1\n0,0,200,210\n0,1,200,210\n");
  directory.write("short.csv", "# bits=12\ntrace,sample,ch0,ch1\n0,0,200,210\n0,1,200\n");
  directory.write("large.csv", "# bits=12\ntrace,sample,ch0,ch1\n0,0,200,4096\n");
  directory.write("one.csv", "trace,sample,ch0\n0,0,200\n");
  directory.write("fast.csv", "# sample_rate_mhz=120\ntrace,sample,ch0,ch1\n0,0,200,210\n");
  directory.write("broken.npy", "\x93NUMPY no");
  directory.write("broken.h5", "\x89HDF no");
  std::filesystem::create_directory(directory.path() / "taken");
  directory.write("taken/notes.txt", "mine");
}

class MalformedInput : public ::testing::TestWithParam<Malformed> {};

TEST_P(MalformedInput, gives_exit_2_and_one_useful_line) {
  const Malformed& row = GetParam();
  const ScratchDirectory directory;
  write_files(directory, row);
  const ProgramRun run = run_cistern(directory, row.arguments);
  EXPECT_EQ(run.status, 2) << run.errors;
  EXPECT_EQ(run.output, "");
  EXPECT_EQ(std::count(run.errors.begin(), run.errors.end(), '\n'), 1) << run.errors;
  EXPECT_EQ(run.errors.rfind("cistern: ", 0), 0U) << run.errors;
  for (const std::string& word : row.says)
    EXPECT_NE(run.errors.find(word), std::string::npos) << "no \"" << word << "\" in: " << run.errors;
  EXPECT_FALSE(std::filesystem::exists(directory.path() / "cistern-run" / "qualify"))
      << "a run directory was left behind";
  EXPECT_FALSE(std::filesystem::exists(directory.path() / "out.npy"));
}

INSTANTIATE_TEST_SUITE_P(Table, MalformedInput, ::testing::ValuesIn(all_rows()),
                         [](const auto& row) { return row.param.name; });

}  // namespace
}  // namespace cistern
