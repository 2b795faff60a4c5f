#include "bench/results/run_directory.hpp"

#include <gtest/gtest.h>
#include <stdlib.h>

#include <fstream>
#include <sstream>
#include <string>

#include "bench/results/database.hpp"
#include "traces/base/errors.hpp"

namespace cistern {
namespace {
namespace fs = std::filesystem;

/// A directory of its own for one test, gone afterwards.
class RunDirectoryTest : public ::testing::Test {
 protected:
  void SetUp() override {
    std::string name = (fs::temp_directory_path() / "cistern-test-XXXXXX").string();
    ASSERT_NE(::mkdtemp(name.data()), nullptr);
    root_ = name;
  }
  void TearDown() override { fs::remove_all(root_); }

  static std::string text_of(const fs::path& path) {
    std::ifstream stream(path);
    std::ostringstream text;
    text << stream.rdbuf();
    return text.str();
  }
  static Summary summary() {
    Summary summary;
    summary.command = "qualify";
    summary.figures = {{"background_rate.long", 12.5, 11.0, 14.0, {}, {}, "Hz", ""}};
    summary.requirements = {{"rate", "background_rate.long at most 20 Hz", 12.5, 11.2, 13.8, "met", ""},
                            {"fast", "delay.long at most <2 us", {}, {}, {}, "undecided", "nothing fired"}};
    return summary;
  }
  fs::path root_;
  const RunIdentity identity_{"qualify", "abcd", 7, "1.0", ""};
};

TEST_F(RunDirectoryTest, holds_everything_after_finish) {
  const fs::path out = root_ / "run";
  {
    RunDirectory directory(out, identity_);
    directory.make_table(RowTable::Firings);
    directory.add_firing({3, "long", 250, 1'000'000'002'500, 101, "passed", true});
    directory.add_firing({4, "long", 7, {}, {}, "held_off", false});
    directory.finish(summary());
  }
  EXPECT_EQ(text_of(out / "firings.csv"),
            "trace,trigger,sample,time_ns,onset_sample,status,start_unknown\n"
            "3,long,250,1000000002500,101,passed,1\n4,long,7,,,held_off,0\n");
  EXPECT_NE(text_of(out / "summary.json").find("\"complete\": true"), std::string::npos);
  EXPECT_NE(text_of(out / "junit.xml").find("tests=\"2\" failures=\"1\""), std::string::npos);
  EXPECT_NE(text_of(out / "junit.xml").find("delay.long at most &lt;2 us"), std::string::npos);
  Database database(out / "run.sqlite");
  EXPECT_EQ(database.first_text("SELECT count(*) FROM firings").value_or(""), "2");
  EXPECT_EQ(database.first_text("SELECT value FROM figures").value_or(""), "12.5");
}

TEST_F(RunDirectoryTest, leaves_nothing_behind_when_the_run_fails) {
  { RunDirectory directory(root_ / "run", identity_); }
  EXPECT_FALSE(fs::exists(root_ / "run"));
}

TEST_F(RunDirectoryTest, puts_an_earlier_run_back_when_the_new_one_fails) {
  const fs::path out = root_ / "run";
  { RunDirectory(out, identity_).finish(summary()); }
  const std::string before = text_of(out / "summary.json");
  {
    RunDirectory directory(out, identity_);
    directory.write_file("report.html", "half");
  }
  EXPECT_EQ(text_of(out / "summary.json"), before);
  EXPECT_FALSE(fs::exists(out / "report.html"));
}

TEST_F(RunDirectoryTest, resumes_an_unfinished_run_of_the_same_identity) {
  const fs::path out = root_ / "run";
  {
    RunDirectory directory(out, identity_);
    directory.keep_unit("background", 4, std::string_view("a\0b", 3));
    directory.keep_unfinished();
  }
  RunDirectory again(out, identity_);
  EXPECT_TRUE(again.is_resumed());
  EXPECT_EQ(again.recall_unit("background", 4), std::string("a\0b", 3));
  EXPECT_EQ(again.recall_unit("background", 5), std::nullopt);
  EXPECT_EQ(again.recall_unit("signals", 4), std::nullopt);
}

TEST_F(RunDirectoryTest, keeps_an_unfinished_run_when_its_resumption_fails) {
  const fs::path out = root_ / "run";
  {
    RunDirectory directory(out, identity_);
    directory.keep_unit("background", 0, "kept");
    directory.keep_unfinished();
  }
  { RunDirectory fails(out, identity_); }
  RunDirectory again(out, identity_);
  EXPECT_EQ(again.recall_unit("background", 0), std::string("kept"));
}

TEST_F(RunDirectoryTest, does_not_recall_units_of_a_finished_run) {
  const fs::path out = root_ / "run";
  {
    RunDirectory directory(out, identity_);
    directory.keep_unit("background", 4, "old");
    directory.finish(summary());
  }
  RunDirectory again(out, identity_);
  EXPECT_FALSE(again.is_resumed());
  EXPECT_EQ(again.recall_unit("background", 4), std::nullopt);
}

struct Refusal {
  const char* name;
  RunIdentity other;
  const char* word;
};
const Refusal refusals[] = {{"command", {"rate", "abcd", 7, "1.0", ""}, "command"},
                            {"scenario", {"qualify", "ffff", 7, "1.0", ""}, "scenario"},
                            {"seed", {"qualify", "abcd", 8, "1.0", ""}, "seed"},
                            {"version", {"qualify", "abcd", 7, "1.1", ""}, "version"},
                            {"options", {"qualify", "abcd", 7, "1.0", "quick"}, "options"}};

TEST_F(RunDirectoryTest, refuses_a_directory_with_another_run_and_says_what_differs) {
  const fs::path out = root_ / "run";
  { RunDirectory(out, identity_).finish(summary()); }
  for (const Refusal& row : refusals) {
    try {
      RunDirectory directory(out, row.other);
      FAIL() << row.name << " was accepted";
    } catch (const InputError& error) {
      EXPECT_NE(std::string(error.what()).find(row.word), std::string::npos) << error.what();
    }
  }
}

TEST_F(RunDirectoryTest, refuses_a_directory_with_foreign_files_and_leaves_them) {
  std::ofstream(root_ / "thesis.txt") << "mine";
  EXPECT_THROW(RunDirectory(root_, identity_), InputError);
  EXPECT_EQ(text_of(root_ / "thesis.txt"), "mine");
}

TEST_F(RunDirectoryTest, refuses_a_file_as_directory) {
  std::ofstream(root_ / "file") << "mine";
  EXPECT_THROW(RunDirectory(root_ / "file", identity_), InputError);
}

TEST(FigureNumber, writes_the_decimal_point_as_p) {
  EXPECT_EQ(figure_number(3), "3");
  EXPECT_EQ(figure_number(0.5), "0p5");
  EXPECT_EQ(figure_number(1.25), "1p25");
  EXPECT_EQ(figure_number(-2), "minus_2");
}

}  // namespace
}  // namespace cistern
