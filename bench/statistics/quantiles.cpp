#include "bench/statistics/quantiles.hpp"

#include <algorithm>
#include <boost/math/special_functions/beta.hpp>
#include <cmath>
#include <limits>

#include "traces/base/errors.hpp"

namespace cistern {
namespace {

constexpr double infinity = std::numeric_limits<double>::infinity();

void check(std::span<const double> sorted, double fraction) {
  CISTERN_ASSERT(!sorted.empty() && fraction > 0 && fraction < 1);
  CISTERN_ASSERT(std::is_sorted(sorted.begin(), sorted.end()));
}

/// P(Binomial(trials, probability) < count), 0 <= count <= trials.
double probability_below(std::size_t count, std::size_t trials, double probability) {
  if (count == 0) return 0;
  return boost::math::ibetac(static_cast<double>(count), static_cast<double>(trials - count) + 1, probability);
}

/// The first of the ranks 1 to `ranks` at which `holds` is true, `ranks` + 1 if none; `holds` turns true once.
template <typename Holds>
std::size_t first_rank(std::size_t ranks, Holds holds) {
  std::size_t first = 1;
  std::size_t after = ranks + 1;
  while (first < after) {
    const std::size_t middle = first + (after - first) / 2;
    if (holds(middle)) {
      after = middle;
    } else {
      first = middle + 1;
    }
  }
  return first;
}

}  // namespace

double quantile_of(std::span<const double> sorted, double fraction) {
  check(sorted, fraction);
  const double position = fraction * static_cast<double>(sorted.size() - 1);
  const auto below = static_cast<std::size_t>(position);
  if (below + 1 == sorted.size()) return sorted[below];
  return std::lerp(sorted[below], sorted[below + 1], position - static_cast<double>(below));
}

double quantile_low(std::span<const double> sorted, double fraction, double confidence) {
  check(sorted, fraction);
  // The r-th smallest lies above the true quantile when fewer than r values lie below it.
  const std::size_t past = first_rank(sorted.size(), [&](std::size_t rank) {
    return probability_below(rank, sorted.size(), fraction) > 1 - confidence;
  });
  return past == 1 ? -infinity : sorted[past - 2];
}

double quantile_high(std::span<const double> sorted, double fraction, double confidence) {
  check(sorted, fraction);
  // The r-th smallest lies below the true quantile when at least r values lie below it.
  const std::size_t rank = first_rank(
      sorted.size(), [&](std::size_t r) { return probability_below(r, sorted.size(), fraction) >= confidence; });
  return rank > sorted.size() ? infinity : sorted[rank - 1];
}

Limits quantile_limits(std::span<const double> sorted, double fraction, double confidence) {
  const double one_sided = 0.5 + confidence / 2;
  return {quantile_low(sorted, fraction, one_sided), quantile_high(sorted, fraction, one_sided)};
}

}  // namespace cistern
