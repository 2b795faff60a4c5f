#pragma once
/// \file
/// Tables of a report about test signals: a row per signal, a column per station and trigger.
#include <string>
#include <vector>

#include "bench/experiments/efficiency.hpp"
#include "bench/report/report.hpp"
#include "bench/results/figure.hpp"

namespace cistern {

/// The delays of `quantity` ("delay_median", "delay_p95") with their limits; without signals on which nobody fired.
[[nodiscard]] ReportTable delay_table(const std::string& heading, const std::string& quantity, const StationPlan& plan,
                                      const std::vector<SignalPoint>& points, const std::vector<Figure>& figures);

/// The median margins of every trigger with their limits.
[[nodiscard]] ReportTable margin_table(const StationPlan& plan, const std::vector<SignalPoint>& points,
                                       const std::vector<Figure>& figures);

}  // namespace cistern
