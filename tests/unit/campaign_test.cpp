#include "bench/campaign/campaign.hpp"

#include <gtest/gtest.h>
#include <unistd.h>

#include <csignal>
#include <string>
#include <vector>

#include "traces/base/errors.hpp"

namespace cistern {
namespace {

std::vector<std::string> merged_with_jobs(int jobs, std::int64_t units) {
  std::vector<std::string> merged;
  CampaignPlan plan{units, [](std::int64_t unit) { return "result " + std::to_string(unit * unit); },
                    [&](std::int64_t unit, std::string_view result) {
                      EXPECT_EQ(unit, static_cast<std::int64_t>(merged.size()));
                      merged.emplace_back(result);
                    }};
  CampaignOptions options;
  options.jobs = jobs;
  EXPECT_EQ(run_campaign(plan, options), CampaignEnd::Complete);
  return merged;
}

TEST(Campaign, merges_the_same_results_in_number_order_for_any_number_of_jobs) {
  const auto with_one = merged_with_jobs(1, 40);
  EXPECT_EQ(with_one.size(), 40U);
  EXPECT_EQ(with_one[39], "result 1521");
  EXPECT_EQ(merged_with_jobs(2, 40), with_one);
  EXPECT_EQ(merged_with_jobs(7, 40), with_one);
}

TEST(Campaign, without_units_is_complete_at_once) { EXPECT_TRUE(merged_with_jobs(2, 0).empty()); }

TEST(Campaign, carries_results_larger_than_a_pipe) {
  std::size_t size = 0;
  CampaignPlan plan{1, [](std::int64_t) { return std::string(3'000'000, 'x'); },
                    [&](std::int64_t, std::string_view result) { size = result.size(); }};
  EXPECT_EQ(run_campaign(plan, {}), CampaignEnd::Complete);
  EXPECT_EQ(size, 3'000'000U);
}

TEST(Campaign, throws_the_input_error_of_a_unit_with_its_place) {
  CampaignPlan plan{3,
                    [](std::int64_t unit) -> std::string {
                      if (unit == 1) throw InputError("file.csv:7", "expected a number");
                      return {};
                    },
                    [](std::int64_t, std::string_view) {}};
  try {
    (void)run_campaign(plan, {});
    FAIL() << "nothing was thrown";
  } catch (const InputError& error) {
    EXPECT_EQ(error.place(), "file.csv:7");
    EXPECT_EQ(error.expectation(), "expected a number");
  }
}

TEST(Campaign, names_the_unit_in_which_a_worker_died) {
  CampaignPlan plan{3,
                    [](std::int64_t unit) -> std::string {
                      if (unit == 2) ::kill(::getpid(), SIGKILL);
                      return {};
                    },
                    [](std::int64_t, std::string_view) {}};
  try {
    (void)run_campaign(plan, {});
    FAIL() << "nothing was thrown";
  } catch (const SystemFault& fault) {
    EXPECT_NE(std::string(fault.what()).find("unit 2"), std::string::npos) << fault.what();
  }
}

TEST(Campaign, does_not_work_units_that_it_can_recall) {
  std::vector<std::string> merged;
  CampaignPlan plan{3, [](std::int64_t) { return std::string("worked"); },
                    [&](std::int64_t, std::string_view result) { merged.emplace_back(result); }};
  CampaignOptions options;
  options.recall = [](std::int64_t unit, std::string& result) {
    result = "recalled";
    return unit != 1;
  };
  std::vector<std::int64_t> kept;
  options.keep = [&](std::int64_t unit, std::string_view) { kept.push_back(unit); };
  EXPECT_EQ(run_campaign(plan, options), CampaignEnd::Complete);
  EXPECT_EQ(merged, (std::vector<std::string>{"recalled", "worked", "recalled"}));
  EXPECT_EQ(kept, (std::vector<std::int64_t>{1}));
}

TEST(Campaign, stops_after_the_units_under_way) {
  volatile std::sig_atomic_t stop = 0;
  std::int64_t merged = 0;
  CampaignPlan plan{100, [](std::int64_t) { return std::string(); },
                    [&](std::int64_t, std::string_view) {
                      if (++merged == 5) stop = 1;
                    }};
  CampaignOptions options;
  options.stop = &stop;
  EXPECT_EQ(run_campaign(plan, options), CampaignEnd::Interrupted);
  EXPECT_GE(merged, 5);
  EXPECT_LE(merged, 7);
}

}  // namespace
}  // namespace cistern
