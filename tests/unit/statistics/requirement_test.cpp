#include "bench/statistics/requirement.hpp"

#include <gtest/gtest.h>

#include <limits>

namespace cistern {
namespace {

struct Row {
  const char* name;
  Limits limits;
  Verdict at_most;
  Verdict at_least;
};

constexpr double bound = 40;
constexpr double infinity = std::numeric_limits<double>::infinity();
constexpr double unknown = std::numeric_limits<double>::quiet_NaN();

const Row rows[] = {
    {"all below", {30, 39}, Verdict::Met, Verdict::NotMet},
    {"up to the bound", {30, 40}, Verdict::Met, Verdict::Undecided},
    {"astride", {39, 41}, Verdict::Undecided, Verdict::Undecided},
    {"from the bound on", {40, 41}, Verdict::Undecided, Verdict::Met},
    {"all above", {41, 50}, Verdict::NotMet, Verdict::Met},
    {"exactly the bound", {40, 40}, Verdict::Met, Verdict::Met},
    {"no limits", {-infinity, infinity}, Verdict::Undecided, Verdict::Undecided},
    {"not a number", {unknown, unknown}, Verdict::Undecided, Verdict::Undecided},
};

TEST(Requirement, at_most_is_met_by_the_upper_limit_and_missed_by_the_lower) {
  for (const Row& row : rows) EXPECT_EQ(judge_at_most(row.limits, bound), row.at_most) << row.name;
}

TEST(Requirement, at_least_is_met_by_the_lower_limit_and_missed_by_the_upper) {
  for (const Row& row : rows) EXPECT_EQ(judge_at_least(row.limits, bound), row.at_least) << row.name;
}

TEST(Requirement, has_a_word_for_each_verdict) {
  EXPECT_EQ(name_of(Verdict::Met), "met");
  EXPECT_EQ(name_of(Verdict::Undecided), "undecided");
  EXPECT_EQ(name_of(Verdict::NotMet), "not met");
}

}  // namespace
}  // namespace cistern
