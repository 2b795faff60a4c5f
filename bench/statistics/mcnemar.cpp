#include "bench/statistics/mcnemar.hpp"

#include <algorithm>
#include <boost/math/distributions/normal.hpp>
#include <boost/math/special_functions/beta.hpp>
#include <cmath>

#include "traces/base/errors.hpp"

namespace cistern {
namespace {

/// Tango's score statistic for a true difference `delta`: standard normal where that is the truth.
/// Falls as delta rises.
double score(double only_first, double only_second, double pairs, double delta) {
  const double a = 2 * pairs;
  const double b = -only_first - only_second + (2 * pairs - only_first + only_second) * delta;
  const double c = -only_second * delta * (1 - delta);
  // The most likely probability of "second only" under this delta.
  const double second = (std::sqrt(std::max(0.0, b * b - 4 * a * c)) - b) / (2 * a);
  const double variance = pairs * (2 * second + delta * (1 - delta));
  const double distance = only_first - only_second - pairs * delta;
  if (variance > 0) return distance / std::sqrt(variance);
  return distance == 0 ? 0 : std::copysign(HUGE_VAL, distance);
}

/// The difference whose score is `target`, by bisection to the last bits.
double difference_with_score(double only_first, double only_second, double pairs, double target) {
  double low = -1;
  double high = 1;
  for (int step = 0; step < 60; ++step) {
    const double middle = (low + high) / 2;
    (score(only_first, only_second, pairs, middle) > target ? low : high) = middle;
  }
  return (low + high) / 2;
}

double one_sided_limit(std::int64_t only_first, std::int64_t only_second, std::int64_t pairs, double target) {
  CISTERN_ASSERT(only_first >= 0 && only_second >= 0 && only_first + only_second <= pairs);
  if (pairs == 0) return target > 0 ? -1 : 1;
  return difference_with_score(static_cast<double>(only_first), static_cast<double>(only_second),
                               static_cast<double>(pairs), target);
}

double normal_quantile(double probability) { return boost::math::quantile(boost::math::normal(), probability); }

}  // namespace

double mcnemar_exact(std::int64_t only_first, std::int64_t only_second) {
  CISTERN_ASSERT(only_first >= 0 && only_second >= 0);
  const std::int64_t discordant = only_first + only_second;
  const std::int64_t fewer = std::min(only_first, only_second);
  if (2 * fewer == discordant) return 1;
  // P(Binomial(n, 1/2) <= k) as an incomplete beta function.
  return 2 * boost::math::ibeta(static_cast<double>(discordant - fewer), static_cast<double>(fewer) + 1, 0.5);
}

double paired_difference_low(std::int64_t only_first, std::int64_t only_second, std::int64_t pairs, double confidence) {
  return one_sided_limit(only_first, only_second, pairs, normal_quantile(confidence));
}

double paired_difference_high(std::int64_t only_first, std::int64_t only_second, std::int64_t pairs,
                              double confidence) {
  return one_sided_limit(only_first, only_second, pairs, -normal_quantile(confidence));
}

Limits paired_difference(std::int64_t only_first, std::int64_t only_second, std::int64_t pairs, double confidence) {
  const double one_sided = 0.5 + confidence / 2;
  return {paired_difference_low(only_first, only_second, pairs, one_sided),
          paired_difference_high(only_first, only_second, pairs, one_sided)};
}

}  // namespace cistern
