#pragma once
/// \file
/// A replay as lines and as a report.
#include <string>
#include <vector>

#include "bench/experiments/recorded_counts.hpp"
#include "bench/report/report.hpp"

namespace cistern {

[[nodiscard]] std::vector<std::string> replay_lines(const StationPlan& plan, const RecordedCounts& counts,
                                                    const std::string& file, const Summary& summary);

/// Counts per trigger and of both stations, for a terminal; `qualify` shows them too.
[[nodiscard]] std::vector<std::string> recorded_lines(const StationPlan& plan, const RecordedCounts& counts,
                                                      const std::string& file);

/// Firings and margins per trigger; `qualify` shows the same table.
[[nodiscard]] ReportTable recorded_table(const StationPlan& plan, const RecordedCounts& counts,
                                         const std::string& file);

/// How the best margins of the traces are distributed, one chart per unit of margin.
[[nodiscard]] std::vector<ReportChart> margin_charts(const StationPlan& plan, const RecordedCounts& counts);

[[nodiscard]] Report replay_report(const StationPlan& plan, const RecordedCounts& counts, const std::string& file,
                                   const Summary& summary);

}  // namespace cistern
