#include "bench/statistics/counting.hpp"

#include <algorithm>
#include <boost/math/distributions/chi_squared.hpp>
#include <cmath>
#include <numeric>

#include "traces/base/errors.hpp"

namespace cistern {
namespace {

Limits per_second(Limits limits, double factor, double live_time_s) {
  return {limits.low * factor / live_time_s, limits.high * factor / live_time_s};
}

/// The smallest growth (>= 1) of the sample at which `bound` leaves the limits; doubling, then halving.
template <typename LimitsAt>
std::optional<double> growth_needed(LimitsAt limits_at, double bound) {
  constexpr double largest_growth = 1e6;
  const auto decided = [&](double growth) {
    const Limits limits = limits_at(growth);
    return bound < limits.low || bound >= limits.high;
  };
  double high = 1;
  while (!decided(high)) {
    high *= 2;
    if (high > largest_growth) return {};
  }
  double low = std::max(1.0, high / 2);
  while (high / low > 1.01) {
    const double middle = std::sqrt(low * high);
    (decided(middle) ? high : low) = middle;
  }
  return high;
}

}  // namespace

std::int64_t BlockCounts::total() const { return std::accumulate(counts.begin(), counts.end(), std::int64_t{0}); }

Dispersion dispersion_of(const BlockCounts& blocks) {
  Dispersion dispersion;
  const auto n = static_cast<double>(blocks.counts.size());
  const auto total = static_cast<double>(blocks.total());
  if (n < 2 || total == 0) return dispersion;
  const double mean = total / n;
  double squares = 0;
  for (const std::int64_t count : blocks.counts) squares += (static_cast<double>(count) - mean) * (static_cast<double>(count) - mean);
  dispersion.index = squares / (n - 1) / mean;
  const boost::math::chi_squared statistic(n - 1);
  dispersion.is_clustered = dispersion.index * (n - 1) > boost::math::quantile(statistic, 0.975);
  if (dispersion.is_clustered) dispersion.cluster_factor = dispersion.index;
  return dispersion;
}

Limits rate_limits(const BlockCounts& blocks, double confidence) {
  CISTERN_ASSERT(!blocks.counts.empty());
  const double factor = dispersion_of(blocks).cluster_factor;
  return per_second(garwood(static_cast<double>(blocks.total()) / factor, confidence), factor, blocks.live_time_s());
}

Limits rate_limits_one_sided(const BlockCounts& blocks, double confidence) {
  CISTERN_ASSERT(!blocks.counts.empty());
  const double factor = dispersion_of(blocks).cluster_factor;
  return per_second(garwood_one_sided(static_cast<double>(blocks.total()) / factor, confidence), factor, blocks.live_time_s());
}

std::optional<double> more_live_time_s(const BlockCounts& blocks, double bound_hz, double confidence) {
  const double factor = dispersion_of(blocks).cluster_factor;
  const double clusters = static_cast<double>(blocks.total()) / factor;
  const auto growth = growth_needed(
      [&](double times) {
        return per_second(garwood_one_sided(clusters * times, confidence), factor, blocks.live_time_s() * times);
      },
      bound_hz);
  if (!growth) return {};
  return (*growth - 1) * blocks.live_time_s();
}

std::optional<std::int64_t> more_trials(std::int64_t successes, std::int64_t trials, double bound, double confidence) {
  const auto growth = growth_needed(
      [&](double times) {
        const auto n = std::llround(static_cast<double>(trials) * times);
        const auto k = std::min(n, std::llround(static_cast<double>(successes) * times));
        return clopper_pearson_one_sided(k, n, confidence);
      },
      bound);
  if (!growth) return {};
  return std::llround(static_cast<double>(trials) * (*growth - 1));
}

}  // namespace cistern
