#pragma once
/// \file
/// What `replay` and `qualify` count over a file of recorded traces.
#include <cstdint>
#include <string>
#include <vector>

#include "bench/experiments/measured.hpp"
#include "bench/experiments/recorded.hpp"
#include "bench/experiments/trigger_sets.hpp"

namespace cistern {

struct TriggerRecordedCounts {
  std::int64_t firings{0};  ///< with any status
  std::int64_t passed{0};
  std::int64_t traces_fired{0};  ///< with at least one that passed
  std::vector<double> margins;   ///< best of each trace
  std::vector<std::int64_t> passed_per_trace;
};

/// Both stations on the same traces; all 0 when there is nothing to compare.
struct RecordedPairs {
  std::int64_t both{0};
  std::int64_t only_in_service{0};
  std::int64_t only_candidate{0};
  std::int64_t neither{0};
};

struct RecordedCounts {
  std::int64_t traces{0};
  std::int64_t samples{0};
  std::vector<TriggerRecordedCounts> triggers;
  RecordedPairs pairs;
};

/// Fills RecordedCounts trace by trace.
class RecordedTally {
 public:
  /// Borrows both; `counts` starts with one entry per trigger.
  RecordedTally(RecordedCounts& counts, const std::vector<TriggerSettings>& triggers);

  void take(std::size_t trigger, FiringStatus status);
  void end_trace(const RecordedTrace& trace);

 private:
  void compare_stations();
  [[nodiscard]] bool fired(TriggerSet set) const;

  RecordedCounts& counts_;
  const std::vector<TriggerSettings>& triggers_;
  std::vector<std::int64_t> passed_in_trace_;
};

/// background_rate.TRIGGER.recorded where the traces are unbiased and their live time is known;
/// gain.candidate.recorded where there are two stations to compare;
/// fired_share.TRIGGER of the traces (of triggered ones: given that trigger); margin_median.TRIGGER.recorded.
/// What cannot be given is left out and said in `notes`.
[[nodiscard]] std::vector<MeasuredFigure> recorded_figures(const RecordedCounts& counts, const RecordedFacts& facts,
                                                           const StationPlan& plan, std::vector<std::string>& notes);

}  // namespace cistern
