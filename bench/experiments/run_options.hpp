#pragma once
/// \file
/// What the command line asks of an experiment, and what the experiment gives back to it.
#include <csignal>
#include <cstdint>
#include <filesystem>
#include <functional>
#include <optional>
#include <string>
#include <string_view>
#include <vector>

#include "bench/experiments/station_plan.hpp"
#include "bench/results/figure.hpp"
#include "bench/scenario/scenario.hpp"

namespace cistern {

struct RunOptions {
  std::optional<std::filesystem::path> out;     ///< --out
  std::optional<std::filesystem::path> traces;  ///< --traces
  std::optional<std::uint64_t> seed;            ///< --seed; the scenario's otherwise
  int jobs{1};                                  ///< --jobs
  Effort effort{Effort::Full};                  ///< --quick
  /// Progress of one stage: its name, how much is done, of how much (0: not known).
  std::function<void(std::string_view stage, std::int64_t done, std::int64_t total)> advance;
  const volatile std::sig_atomic_t* stop{nullptr};
};

/// What a run came to. Everything is on disk when it is returned.
struct RunOutcome {
  bool interrupted{false};
  std::filesystem::path directory;
  Summary summary;
  std::vector<std::string> lines;  ///< the result for people, a line each
};

[[nodiscard]] inline bool wants_stop(const RunOptions& options) {
  return options.stop != nullptr && *options.stop != 0;
}

/// The program's version, "0.1.0".
[[nodiscard]] std::string_view version();

RunOutcome run_qualify(const Scenario& scenario, const RunOptions& options);
RunOutcome run_rate(const Scenario& scenario, const RunOptions& options);
RunOutcome run_replay(const Scenario& scenario, const RunOptions& options);

}  // namespace cistern
