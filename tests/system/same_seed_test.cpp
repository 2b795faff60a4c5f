/// \file
/// Same seed, same bytes: for any number of jobs, and another time.
#include <gtest/gtest.h>

#include <string>
#include <vector>

#include "tests/system/run_files.hpp"

namespace cistern {
namespace {
using Names = std::vector<std::string>;

class SameSeed : public ::testing::Test {
 protected:
  void SetUp() override {
    directory_.write("s.toml", tank_scenario() + requirement("background_rate.long", "at_most = 1e6"));
  }
  void run(const std::string& arguments) {
    const ProgramRun run = run_cistern(directory_, arguments);
    ASSERT_EQ(run.status, 0) << arguments << "\n" << run.errors;
  }
  ScratchDirectory directory_;
};

TEST_F(SameSeed, gives_the_same_bytes_of_qualify_with_one_job_and_with_two) {
  run("qualify s.toml --out one --jobs 1");
  run("qualify s.toml --out two --jobs 2");
  expect_same_run(directory_, "one", "two");
  EXPECT_EQ(files_of(directory_, "one"),
            (Names{"firings.csv", "junit.xml", "report.html", "run.sqlite", "summary.json", "timing.json"}));
}

TEST_F(SameSeed, gives_the_same_bytes_of_rate_with_one_job_and_with_two) {
  run("rate s.toml --out one --jobs 1");
  run("rate s.toml --out two --jobs 2");
  expect_same_run(directory_, "one", "two");
}

TEST_F(SameSeed, gives_the_same_bytes_of_replay_with_one_job_and_with_two) {
  run("traces make s.toml --out t.npy --kind shower --size-vem 5 --traces 60 --samples 700");
  directory_.write("s.toml", tank_scenario() + requirement("fired_share.tall", "at_least = 0"));
  run("replay s.toml --traces t.npy --out one --jobs 1");
  run("replay s.toml --traces t.npy --out two --jobs 2");
  expect_same_run(directory_, "one", "two");
  EXPECT_EQ(files_of(directory_, "one"), (Names{"firings.csv", "junit.xml", "margins.csv", "report.html", "run.sqlite",
                                                "summary.json", "timing.json"}));
}

TEST_F(SameSeed, gives_the_same_bytes_of_all_trace_formats) {
  for (const char* name : {"t.csv", "t.npy", "t.h5"}) {
    const auto make = [&](const std::string& folder) {
      return run_shell(directory_, "mkdir -p " + folder + " && cistern traces make s.toml --out " + folder + "/" +
                                       name + " --kind muon --traces 5 --samples 200")
          .status;
    };
    ASSERT_EQ(make("a"), 0);
    ASSERT_EQ(make("b"), 0);
    EXPECT_EQ(run_shell(directory_, std::string("cmp a/") + name + " b/" + name).status, 0) << name;
  }
}

TEST_F(SameSeed, taken_from_the_scenario_or_from_the_call_is_the_same) {
  directory_.write("seed.toml", tank_scenario() + "\n[scenario]\nseed = 77\n");
  run("rate seed.toml --out one --quick");
  directory_.write("seed.toml", tank_scenario() + "\n[scenario]\nseed = 5\n");
  run("rate seed.toml --out two --quick --seed 77");
  const auto figures = [&](const char* folder) {
    return run_shell(directory_, std::string("sqlite3 ") + folder + "/run.sqlite 'select * from figures'").output;
  };
  EXPECT_FALSE(figures("one").empty());
  EXPECT_EQ(figures("one"), figures("two"));
}

TEST_F(SameSeed, not_given_another_summary_follows) {
  for (const std::string command : {"qualify", "rate"}) {
    run(command + " s.toml --quick --out " + command + "1");
    run(command + " s.toml --quick --seed 99 --out " + command + "2");
    const auto figures = [&](const std::string& folder) {
      return run_shell(directory_, "sqlite3 " + folder + "/run.sqlite 'select * from figures'").output;
    };
    EXPECT_NE(figures(command + "1"), figures(command + "2"));
    EXPECT_NE(directory_.read(command + "2/summary.json").find("\"seed\": 99"), std::string::npos);
  }
}

}  // namespace
}  // namespace cistern
