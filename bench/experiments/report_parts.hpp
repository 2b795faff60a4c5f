#pragma once
/// \file
/// Pieces of reports that several commands share.
#include <string>
#include <vector>

#include "bench/experiments/measured.hpp"
#include "bench/experiments/rate_scan.hpp"
#include "bench/report/report.hpp"
#include "bench/results/figure.hpp"

namespace cistern {

/// Title, subtitle and the verdict with its requirements.
[[nodiscard]] Report start_report(const Summary& summary);

/// The triggers as they ran, in counts and samples.
[[nodiscard]] ReportTable trigger_table(const StationPlan& plan);

/// Figures whose names start with one of `quantities`, as rows with limits.
[[nodiscard]] ReportTable figure_table(const std::string& heading, const std::string& note,
                                       const std::vector<Figure>& figures, const std::vector<std::string>& quantities);

/// Rate against level (in VEM where calibrated, else in counts), one series per trigger, and its slope.
[[nodiscard]] std::vector<ReportBlock> rate_charts(const RateScan& scan, const StationPlan& plan,
                                                   const StationFacts& facts);

/// Notes and limits of validity.
[[nodiscard]] ReportText notes_block(const Summary& summary);

/// What synthetic background of this version does and does not hold, one sentence.
[[nodiscard]] std::string synthetic_background_limits();

/// Requirements for a terminal, a line each, the verdict first.
[[nodiscard]] std::vector<std::string> verdict_lines(const Summary& summary);

/// "12.3 (11.1 to 13.6) Hz"
[[nodiscard]] std::string value_with_limits(const Figure& figure);

}  // namespace cistern
