#include "bench/experiments/run_record.hpp"

#include <fmt/format.h>

namespace cistern {

std::string_view version() { return CISTERN_VERSION; }

std::uint64_t seed_of(const Scenario& scenario, const RunOptions& options) {
  return options.seed.value_or(scenario.identity.seed);
}

RunIdentity identity_of(std::string_view command, const Scenario& scenario, const RunOptions& options) {
  RunIdentity identity;
  identity.command = command;
  identity.scenario = scenario.digest;
  identity.seed = seed_of(scenario, options);
  identity.version = version();
  if (options.effort == Effort::Quick) identity.options += "quick ";
  if (options.traces) identity.options += "traces=" + options.traces->string();
  return identity;
}

Summary start_summary(std::string_view command, const Scenario& scenario, const RunOptions& options) {
  Summary summary;
  summary.command = command;
  summary.scenario = scenario.path.filename().string();
  summary.scenario_digest = scenario.digest;
  summary.title = scenario.identity.title;
  summary.seed = seed_of(scenario, options);
  summary.version = version();
  return summary;
}

CampaignOptions kept_campaign(RunDirectory& directory, const std::string& stage, const RunOptions& options) {
  CampaignOptions campaign;
  campaign.jobs = options.jobs;
  campaign.stop = options.stop;
  campaign.recall = [&directory, stage](std::int64_t unit, std::string& result) {
    auto kept = directory.recall_unit(stage, unit);
    if (kept) result = std::move(*kept);
    return kept.has_value();
  };
  campaign.keep = [&directory, stage](std::int64_t unit, std::string_view result) {
    directory.keep_unit(stage, unit, result);
  };
  if (options.advance) {
    campaign.advance = [stage, advance = options.advance](std::int64_t done, std::int64_t total) {
      advance(stage, done, total);
    };
  }
  return campaign;
}

void require_tank(std::string_view command, const Scenario& scenario) {
  if (scenario.has_tank) return;
  throw InputError(scenario.path.string(), fmt::format("has no [tank], so `{}` cannot make traces; expected [tank] "
                                                       "(see `cistern explain tank`)",
                                                       command));
}

}  // namespace cistern
