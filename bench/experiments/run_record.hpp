#pragma once
/// \file
/// What every run writes down about itself, and how its campaigns are kept for resumption.
#include <string>
#include <string_view>

#include "bench/campaign/campaign.hpp"
#include "bench/experiments/run_options.hpp"
#include "bench/results/run_directory.hpp"

namespace cistern {

[[nodiscard]] std::uint64_t seed_of(const Scenario& scenario, const RunOptions& options);

/// Command, scenario, seed, version and whatever else changes the figures.
[[nodiscard]] RunIdentity identity_of(std::string_view command, const Scenario& scenario, const RunOptions& options);

/// A summary with everything but its results.
[[nodiscard]] Summary start_summary(std::string_view command, const Scenario& scenario, const RunOptions& options);

/// Campaign options that keep each unit's result in the run directory and recall it from there.
[[nodiscard]] CampaignOptions kept_campaign(RunDirectory& directory, const std::string& stage,
                                            const RunOptions& options);

/// InputError saying that the command needs tables that the scenario does not have.
void require_tank(std::string_view command, const Scenario& scenario);

}  // namespace cistern
