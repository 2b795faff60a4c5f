#pragma once
/// \file
/// Figures of the background: rates, busy losses, and the slope of rate against level.
#include <optional>
#include <vector>

#include "bench/experiments/background.hpp"
#include "bench/experiments/measured.hpp"
#include "bench/experiments/rate_scan.hpp"

namespace cistern {

/// background_rate.TRIGGER, dispersion.TRIGGER; tag_rate.SET, busy_loss.SET, dead_time.SET.
[[nodiscard]] std::vector<MeasuredFigure> background_figures(const BackgroundRun& run, const StationPlan& plan);

/// background_rate.TRIGGER.level_1p25 and so on, and rate_slope.TRIGGER.
[[nodiscard]] std::vector<MeasuredFigure> scan_figures(const RateScan& scan, const StationPlan& plan);

/// d ln(rate) / d ln(level) at factor 1, from the nearest points on both sides that fired; nothing
/// when there are none. The error is that of Poisson counts times the clustering.
struct Slope {
  double value{0};
  double standard_error{0};
};
[[nodiscard]] std::optional<Slope> level_slope(const RateScan& scan, std::size_t trigger);

/// The level factor at which the rate is `target_hz`, by straight lines between the points in
/// logarithms; nothing when the scan does not reach it.
[[nodiscard]] std::optional<double> factor_for_rate(const RateScan& scan, std::size_t trigger, double target_hz);

}  // namespace cistern
