#pragma once
/// \file
/// Rates from counts in blocks of live time, with limits that hold for clustered firings too.
/// One particle can fire a trigger more than once (decay electrons, after-pulses), so Poisson
/// limits would be too narrow: docs/decisions/0002-rate-limits-for-clustered-firings.md.
#include <cstdint>
#include <optional>
#include <string_view>
#include <vector>

#include "bench/statistics/intervals.hpp"

namespace cistern {

/// Firings per block of equal live time, in order of time. Blocks should be much longer than a
/// cluster of firings; where they are not, runs of neighbouring blocks are looked at as well.
struct BlockCounts {
  std::vector<std::int64_t> counts;  ///< each >= 0
  double block_s{0};                 ///< > 0 where there are counts

  [[nodiscard]] std::int64_t total() const;
  [[nodiscard]] double live_time_s() const;
};

/// Fisher's index of dispersion against a Poisson law: (n - 1) * index follows chi-squared with
/// n - 1 degrees of freedom (R. A. Fisher, Statistical Methods for Research Workers, 1925).
struct Dispersion {
  double index{1};   ///< variance over mean; 1 for a Poisson law
  double p_low{1};   ///< probability of an index at most this
  double p_high{1};  ///< probability of an index at least this
};

/// Absent with fewer than two counts or when all are 0.
[[nodiscard]] std::optional<Dispersion> dispersion_of(const std::vector<std::int64_t>& counts);

struct RateEstimate {
  double rate_hz{0};
  Limits two_sided;                        ///< no firing: low is 0; no live time: high is +inf
  double dispersion{1};                    ///< variance over mean that the limits allow for, >= 1
  std::optional<double> dispersion_p_low;  ///< of the given blocks; absent where they cannot tell
  std::optional<double> dispersion_p_high;
  bool poisson_applies{false};              ///< enough firings to tell, and they look like a Poisson law
  std::string_view method{"no live time"};  ///< how the limits were found, in words for a report
};

[[nodiscard]] RateEstimate estimate_rate(const BlockCounts& blocks, double confidence = 0.95);

/// One-sided limits of the same kind: the rate is at most (at least) this, in Hz.
[[nodiscard]] double rate_at_most(const BlockCounts& blocks, double confidence);
[[nodiscard]] double rate_at_least(const BlockCounts& blocks, double confidence);

/// What firings are divided by to count as independent ones in those limits: 1 where a Poisson law
/// applies, else their dispersion, enlarged where few blocks leave it uncertain.
[[nodiscard]] double firings_per_independent_one(const BlockCounts& blocks, double one_sided_confidence);

}  // namespace cistern
