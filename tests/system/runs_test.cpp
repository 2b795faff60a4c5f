/// \file
/// Whole runs of the real program: same bytes for any number of jobs, resumption, exit statuses, and the
/// replay of recorded traces against NumPy.
#include <gtest/gtest.h>

#include <algorithm>
#include <cstdlib>
#include <fstream>
#include <iterator>
#include <sstream>
#include <string>
#include <vector>

#include "tests/system/run_files.hpp"

namespace cistern {
namespace {
namespace fs = std::filesystem;

class Runs : public ::testing::Test {
 protected:
  void SetUp() override {
    directory_.write("s.toml", tank_scenario() + requirement("background_rate.long", "at_most = 1e6"));
  }
  ProgramRun run(const std::string& arguments) { return run_cistern(directory_, arguments); }
  ScratchDirectory directory_;
};

TEST_F(Runs, stopped_by_ctrl_c_exit_130_and_go_on_to_the_same_bytes) {
  const std::string slow = "qualify s.toml --jobs 1 --set qualify.live_time_s=6 --set qualify.signals_per_point=600";
  const std::string program =
      "env -C '" + directory_.path().string() + "' timeout --preserve-status -s INT 1.2 '" CISTERN_PROGRAM "' ";
  const int stopped = std::system((program + slow + " --out cut >/dev/null 2>&1").c_str());
  EXPECT_EQ(WEXITSTATUS(stopped), 130);
  EXPECT_FALSE(fs::exists(directory_.path() / "cut" / "summary.json"));
  EXPECT_EQ(run(slow + " --out cut").status, 0);
  EXPECT_EQ(run(slow + " --out whole").status, 0);
  expect_same_run(directory_, "cut", "whole");
}

TEST_F(Runs, exit_1_when_a_requirement_is_not_met_or_undecided) {
  directory_.write("s.toml", tank_scenario() + requirement("background_rate.long", "at_least = 1e6"));
  const ProgramRun not_met = run("qualify s.toml --quick");
  EXPECT_EQ(not_met.status, 1) << not_met.errors;
  EXPECT_NE(not_met.output.find("not met"), std::string::npos) << not_met.output;
  directory_.write("s.toml", tank_scenario() + requirement("efficiency.in_service.muon.3_vem", "at_least = 0.95"));
  const ProgramRun undecided = run("qualify s.toml --quick");
  EXPECT_EQ(undecided.status, 1) << undecided.errors;
  EXPECT_NE(undecided.output.find("more signals"), std::string::npos) << undecided.output;
}

TEST_F(Runs, exit_3_with_one_line_when_the_disk_is_full) {
  const std::string command = "cd '" + directory_.path().string() +
                              "' && (ulimit -f 40; trap '' XFSZ; '" CISTERN_PROGRAM
                              "' qualify s.toml --quick --quiet --out full) >.out 2>.err";
  EXPECT_EQ(WEXITSTATUS(std::system(command.c_str())), 3);
  const std::string errors = directory_.read(".err");
  EXPECT_EQ(std::count(errors.begin(), errors.end(), '\n'), 1) << errors;
  EXPECT_FALSE(fs::exists(directory_.path() / "full" / "summary.json"));
}

TEST_F(Runs, print_only_results_on_standard_output_and_only_progress_on_standard_error) {
  const ProgramRun json = run("qualify s.toml --quick --json --out r");
  EXPECT_EQ(json.output, directory_.read("r/summary.json"));
  EXPECT_NE(json.errors.find("background: 100 %"), std::string::npos) << json.errors;
  EXPECT_EQ(run("qualify s.toml --quick --quiet --out r").errors, "");
}

TEST_F(Runs, of_a_scenario_with_only_digitizer_and_triggers_check_the_logic) {
  directory_.write("logic.toml", small_scenario() + requirement("logic_faults.all", "at_most = 0"));
  const ProgramRun logic = run("qualify logic.toml");
  EXPECT_EQ(logic.status, 0) << logic.output << logic.errors;
}

TEST_F(Runs, give_conditional_figures_only_from_triggered_traces) {
  ASSERT_EQ(run("traces make s.toml --out t.npy --kind muon --size-vem 3 --traces 20 --samples 400").status, 0);
  ASSERT_EQ(run("traces convert t.npy t.h5 --selection triggered_by:old --baseline-counts 200,210 --bits 12").status,
            0);
  directory_.write("r.toml", small_scenario() + "\n[traces]\nselection = \"unbiased\"\nlive_time_s = 1\n");
  ASSERT_EQ(run("replay r.toml --traces t.h5 --out r").status, 0);
  const std::string summary = directory_.read("r/summary.json");
  EXPECT_EQ(summary.find("background_rate"), std::string::npos);
  EXPECT_NE(summary.find("fired_share.long.given_old"), std::string::npos);
  EXPECT_NE(summary.find("triggered_by:old"), std::string::npos);
  ASSERT_EQ(run("replay r.toml --traces t.npy --out u").status, 0);  // this file says nothing: the scenario does
  EXPECT_NE(directory_.read("u/summary.json").find("background_rate.long.recorded"), std::string::npos);
}

TEST_F(Runs, replay_the_same_firings_from_all_three_formats) {
  ASSERT_EQ(
      run("traces make s.toml --out t.h5 --kind shower --size-vem 4 --spread-ns 300 --traces 60 --samples 700").status,
      0);
  ASSERT_EQ(run("traces convert t.h5 t.csv").status, 0);
  ASSERT_EQ(run("traces convert t.csv t.npy").status, 0);
  for (const char* format : {"h5", "csv", "npy"}) {
    ASSERT_EQ(run(std::string("replay s.toml --traces t.") + format + " --out " + format).status, 0);
  }
  EXPECT_GT(directory_.read("h5/firings.csv").size(), 1000U);
  for (const char* table : {"/firings.csv", "/margins.csv"}) {
    EXPECT_EQ(directory_.read(std::string("h5") + table), directory_.read(std::string("csv") + table));
    EXPECT_EQ(directory_.read(std::string("h5") + table), directory_.read(std::string("npy") + table));
  }
}

/// The triggers of small_scenario() in the form of tests/cosim/numpy_reference.py; VEM rounded half up by hand.
constexpr const char* numpy_settings = R"({"sample_rate_mhz": 100, "contiguous": false, "triggers": [
  {"name": "tall", "kind": "threshold", "baseline_counts": [200, 210], "level_counts": [210, 207], "majority": 2},
  {"name": "broad", "kind": "boxcar_sum", "baseline_counts": [200, 210], "length_samples": 60, "sum_counts": 1500,
   "majority": 1},
  {"name": "long", "kind": "time_over_threshold", "baseline_counts": [200, 210], "level_counts": 40,
   "window_samples": 150, "min_samples_over": 21, "majority": 2}]})";

std::vector<std::string> sorted_lines(const std::string& text) {
  std::vector<std::string> lines;
  std::istringstream stream(text);
  for (std::string line; std::getline(stream, line);) lines.push_back(line.substr(0, line.find_last_not_of('\r') + 1));
  std::sort(lines.begin(), lines.end());
  return lines;
}

TEST_F(Runs, replay_the_firings_and_margins_that_numpy_finds) {
  ASSERT_EQ(
      run("traces make s.toml --out t.npy --kind shower --size-vem 5 --spread-ns 400 --traces 80 --samples 900").status,
      0);
  directory_.write("settings.json", numpy_settings);
  directory_.write("s.toml", small_scenario());  // without [station] no firing finds it busy
  const ProgramRun replay = run("replay s.toml --traces t.npy --out r");
  ASSERT_EQ(replay.status, 0) << replay.errors;
  const std::string command = "cd '" + directory_.path().string() +
                              "' && /usr/bin/python3 '" NUMPY_REFERENCE "' settings.json t.npy firings.csv margins.csv";
  ASSERT_EQ(std::system(command.c_str()), 0);
  EXPECT_GT(sorted_lines(directory_.read("firings.csv")).size(), 100U);
  EXPECT_EQ(sorted_lines(directory_.read("r/firings.csv")), sorted_lines(directory_.read("firings.csv")));
  EXPECT_EQ(sorted_lines(directory_.read("r/margins.csv")), sorted_lines(directory_.read("margins.csv")));
}

TEST_F(Runs, hold_the_calibration_that_calibrate_prints) {
  // The demo's own numbers, within 1 % of those of fewer muons (their standard error is 0.3 %).
  const ProgramRun calibrate = run("traces calibrate '" DEMO_SCENARIO "' --muons 4000");
  ASSERT_EQ(calibrate.status, 0) << calibrate.errors;
  const auto first_of = [](const std::string& text, const std::string& key) {
    const auto at = text.find("\n" + key);
    EXPECT_NE(at, std::string::npos) << key;
    return std::stod(text.substr(text.find('[', at) + 1));
  };
  std::ifstream stream(DEMO_SCENARIO);
  const std::string demo((std::istreambuf_iterator<char>(stream)), {});
  for (const char* key : {"height_counts_per_vem", "area_counts_per_vem"}) {
    EXPECT_NEAR(first_of(calibrate.output, key) / first_of(demo, key), 1, 0.01) << key;
  }
}

TEST_F(Runs, describe_what_is_in_a_file) {
  ASSERT_EQ(run("traces make s.toml --out t.h5 --traces 10 --samples 3000").status, 0);
  const ProgramRun describe = run("traces describe t.h5 --json");
  ASSERT_EQ(describe.status, 0) << describe.errors;
  EXPECT_NE(describe.output.find("\"baseline_counts\": 200"), std::string::npos) << describe.output;
  EXPECT_NE(describe.output.find("\"contiguous\": true"), std::string::npos);
  ASSERT_EQ(run("traces make s.toml --out short.csv --traces 2 --samples 40").status, 0);
  EXPECT_EQ(run("traces describe short.csv").status, 0);
}

}  // namespace
}  // namespace cistern
