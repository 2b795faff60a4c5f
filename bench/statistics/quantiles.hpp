#pragma once
/// \file
/// Quantiles of measured values, with limits that assume no distribution.
#include <span>

#include "bench/statistics/intervals.hpp"

namespace cistern {

/// Value below which `fraction` of the values lie: linear between order statistics (definition 7
/// of Hyndman and Fan, The American Statistician 50 (1996) 361). Needs at least one value, in
/// rising order, and 0 < fraction < 1.
[[nodiscard]] double quantile_of(std::span<const double> sorted, double fraction);

/// Limits from order statistics: the number of values below the true quantile is binomial
/// (Thompson, Annals of Mathematical Statistics 7 (1936) 122). Exact for continuous values, more
/// than enough where values tie. An end that so few values cannot bound is -inf or +inf.
[[nodiscard]] Limits quantile_limits(std::span<const double> sorted, double fraction, double confidence);
[[nodiscard]] double quantile_low(std::span<const double> sorted, double fraction, double confidence);   ///< one-sided
[[nodiscard]] double quantile_high(std::span<const double> sorted, double fraction, double confidence);  ///< one-sided

}  // namespace cistern
