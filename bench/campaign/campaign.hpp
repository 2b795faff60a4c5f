#pragma once
/// \file
/// Runs a numbered list of units in worker processes and merges their results in number order, so
/// that the outcome does not depend on how many workers there are. The parent has one thread and
/// never runs a unit itself. A unit's result is a string of bytes (see packing.hpp).
#include <csignal>
#include <cstdint>
#include <functional>
#include <string>
#include <string_view>

namespace cistern {

struct CampaignPlan {
  std::int64_t units{0};
  /// Runs in a worker process: a function of the unit's number (and of what was known at the fork).
  std::function<std::string(std::int64_t unit)> work;
  /// Runs in the parent, unit 0 first, none left out.
  std::function<void(std::int64_t unit, std::string_view result)> merge;
};

struct CampaignOptions {
  int jobs{1};
  /// Called after each merged unit. May be empty.
  std::function<void(std::int64_t done, std::int64_t total)> advance;
  /// Becomes non-zero when the user wants to stop: units under way are finished and merged as far as
  /// they are in order. May be null.
  const volatile std::sig_atomic_t* stop{nullptr};
  /// Results kept from an earlier, unfinished run: given for a unit, it is not worked again.
  std::function<bool(std::int64_t unit, std::string& result)> recall;
  /// Told of each new result as it arrives (any order), so that it can be kept. May be empty.
  std::function<void(std::int64_t unit, std::string_view result)> keep;
};

enum class CampaignEnd { Complete, Interrupted };

/// \throws InputError or SystemFault that a unit threw; SystemFault when a worker died.
[[nodiscard]] CampaignEnd run_campaign(const CampaignPlan& plan, const CampaignOptions& options);

}  // namespace cistern
