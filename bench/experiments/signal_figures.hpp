#pragma once
/// \file
/// Figures of a finished (or still empty: then the names alone count) efficiency run.
#include <string>
#include <vector>

#include "bench/experiments/efficiency.hpp"
#include "bench/experiments/measured.hpp"

namespace cistern {

/// efficiency.*, delay_median.*, delay_p95.* of every subject and margin_median.* of every trigger,
/// for every point.
[[nodiscard]] std::vector<MeasuredFigure> signal_figures(const EfficiencyRun& run, const StationPlan& plan);

/// Both stations on the same signals of one point.
struct PairedPoint {
  const SignalPoint* point{nullptr};
  std::int64_t both{0};
  std::int64_t only_in_service{0};
  std::int64_t only_candidate{0};
  std::int64_t neither{0};
  double p_value{1};  ///< exact McNemar, two-sided
};

/// Empty when there is nothing to compare.
[[nodiscard]] std::vector<PairedPoint> paired_points(const EfficiencyRun& run, const StationPlan& plan);

/// For people: "0.012", "< 1e-300".
[[nodiscard]] std::string p_value_text(double p_value);

/// gain.candidate.* (difference of the two efficiencies) and p_value.candidate.*.
[[nodiscard]] std::vector<MeasuredFigure> paired_figures(const std::vector<PairedPoint>& points);

}  // namespace cistern
