#pragma once
/// \file
/// What `replay` and `qualify` count over a file of recorded traces.
#include <cstdint>
#include <string>
#include <vector>

#include "bench/experiments/measured.hpp"
#include "bench/experiments/recorded.hpp"

namespace cistern {

struct TriggerRecordedCounts {
  std::int64_t firings{0};  ///< with any status
  std::int64_t passed{0};
  std::int64_t traces_fired{0};  ///< with at least one that passed
  std::vector<double> margins;   ///< best of each trace
  std::vector<std::int64_t> passed_per_trace;
};

struct RecordedCounts {
  std::int64_t traces{0};
  std::int64_t samples{0};
  std::vector<TriggerRecordedCounts> triggers;
};

/// Fills RecordedCounts trace by trace.
class RecordedTally {
 public:
  /// Borrows `counts`, whose `triggers` has one entry per trigger.
  explicit RecordedTally(RecordedCounts& counts) : counts_(counts), passed_in_trace_(counts.triggers.size(), 0) {}

  void take(std::size_t trigger, FiringStatus status);
  void end_trace(const RecordedTrace& trace);

 private:
  RecordedCounts& counts_;
  std::vector<std::int64_t> passed_in_trace_;
};

/// background_rate.TRIGGER.recorded where the traces are unbiased and their live time is known;
/// fired_share.TRIGGER of the traces (of triggered ones: given that trigger); margin_median.TRIGGER.recorded.
/// What cannot be given is left out and said in `notes`.
[[nodiscard]] std::vector<MeasuredFigure> recorded_figures(const RecordedCounts& counts, const RecordedFacts& facts,
                                                           const StationPlan& plan, std::vector<std::string>& notes);

}  // namespace cistern
