#include "bench/experiments/measured.hpp"

#include <gtest/gtest.h>

#include "traces/base/errors.hpp"

namespace cistern {
namespace {

Requirement at_most(double bound) {
  return {"rate", "s.toml:9", "background_rate.long", BoundKind::AtMost, bound, 0.95};
}
Requirement at_least(double bound) {
  return {"found", "s.toml:9", "efficiency.long.muon.3_vem", BoundKind::AtLeast, bound, 0.95};
}

/// 100 firings spread evenly over 10 s: one-sided 95 % limits 8.41 to 11.8 Hz (Garwood 1936).
MeasuredFigure rate_of_ten() {
  return {"background_rate.long", "Hz", "", RateBasis{{std::vector<std::int64_t>(100, 1), 0.1}}};
}

struct VerdictRow {
  const char* name;
  double bound;
  const char* verdict;
};

TEST(Judging, calls_a_rate_met_not_met_or_undecided_by_its_one_sided_limits) {
  const VerdictRow rows[] = {{"bound above the limits", 12.0, "met"},
                             {"bound inside the limits", 10.5, "undecided"},
                             {"bound at the value", 10.0, "undecided"},
                             {"bound below the limits", 8.0, "not met"}};
  for (const VerdictRow& row : rows)
    EXPECT_EQ(judge(at_most(row.bound), rate_of_ten()).verdict, row.verdict) << row.name;
}

TEST(Judging, calls_a_share_met_not_met_or_undecided_by_its_one_sided_limits) {
  const MeasuredFigure share{"efficiency.long.muon.3_vem", "", "", ProportionBasis{950, 1000}};
  EXPECT_EQ(judge(at_least(0.93), share).verdict, "met");
  EXPECT_EQ(judge(at_least(0.95), share).verdict, "undecided");
  EXPECT_EQ(judge(at_least(0.97), share).verdict, "not met");
}

TEST(Judging, says_how_much_more_live_time_an_undecided_rate_needs) {
  const std::string reason = judge(at_most(10.5), rate_of_ten()).reason;
  EXPECT_NE(reason.find("more live time"), std::string::npos) << reason;
}

TEST(Judging, says_that_no_live_time_decides_a_rate_at_its_bound) {
  const std::string reason = judge(at_most(10.0), rate_of_ten()).reason;
  EXPECT_NE(reason.find("no realistic live time"), std::string::npos) << reason;
}

TEST(Judging, leaves_a_figure_undecided_that_was_not_measured) {
  const MeasuredFigure empty{"efficiency.long.muon.3_vem", "", "", ProportionBasis{0, 0}};
  EXPECT_EQ(judge(at_least(0.5), empty).verdict, "undecided");
}

TEST(Judging, compares_a_plain_number_itself_with_the_bound) {
  const MeasuredFigure plain{"dead_time.candidate", "", "", PlainBasis{0.01}};
  EXPECT_EQ(judge(at_most(0.01), plain).verdict, "met");
  EXPECT_EQ(judge(at_most(0.009), plain).verdict, "not met");
}

TEST(Judging, names_the_nearest_figure_for_one_that_the_run_has_not) {
  try {
    check_figures_exist({at_most(1)}, {"background_rate.lung", "efficiency.long"});
    FAIL() << "nothing was thrown";
  } catch (const InputError& error) {
    EXPECT_EQ(error.place(), "s.toml:9");
    EXPECT_NE(error.expectation().find("nearest: background_rate.lung"), std::string::npos) << error.what();
  }
}

TEST(Judging, lets_the_worst_verdict_stand_for_all) {
  const auto with = [](const char* verdict) {
    RequirementOutcome outcome;
    outcome.verdict = verdict;
    return outcome;
  };
  EXPECT_EQ(overall_verdict({}), "no requirements");
  EXPECT_EQ(overall_verdict({with("met"), with("met")}), "met");
  EXPECT_EQ(overall_verdict({with("met"), with("undecided")}), "undecided");
  EXPECT_EQ(overall_verdict({with("undecided"), with("not met"), with("met")}), "not met");
}

TEST(NumberText, keeps_three_digits_and_groups_thousands) {
  EXPECT_EQ(number_text(0), "0");
  EXPECT_EQ(number_text(0.012345), "0.0123");
  EXPECT_EQ(number_text(12.345), "12.3");
  EXPECT_EQ(number_text(1234567), "1,234,567");
}

TEST(Figures, of_clustered_blocks_say_so_and_have_wider_limits) {
  std::vector<std::int64_t> counts(100, 0);
  for (std::size_t i = 0; i < 20; ++i) counts[i * 5] = 5;
  const Figure clustered = figure_of({"background_rate.long", "Hz", "", RateBasis{{counts, 0.1}}});
  const Figure even = figure_of(rate_of_ten());
  EXPECT_EQ(*clustered.value, *even.value);
  EXPECT_GT(*clustered.high - *clustered.low, 1.5 * (*even.high - *even.low));
  EXPECT_NE(clustered.note.find("variance over mean allowed for: 4"), std::string::npos) << clustered.note;
}

}  // namespace
}  // namespace cistern
