#include "bench/statistics/intervals.hpp"

#include <boost/math/special_functions/beta.hpp>
#include <boost/math/special_functions/gamma.hpp>

#include "traces/base/errors.hpp"

namespace cistern {
namespace {

/// Probability left out at each end of a central interval, as a one-sided confidence.
double one_sided_of(double confidence) { return 0.5 + confidence / 2; }

void check_confidence(double confidence) { CISTERN_ASSERT(confidence > 0 && confidence < 1); }

void check_proportion(std::int64_t successes, std::int64_t trials, double confidence) {
  check_confidence(confidence);
  CISTERN_ASSERT(successes >= 0 && successes <= trials);
}

}  // namespace

// The binomial tail is an incomplete beta function and the Poisson tail an incomplete gamma
// function, so the limits are their inverses; there is nothing to iterate here.

double clopper_pearson_low(std::int64_t successes, std::int64_t trials, double confidence) {
  check_proportion(successes, trials, confidence);
  if (successes == 0) return 0;
  const auto k = static_cast<double>(successes);
  return boost::math::ibeta_inv(k, static_cast<double>(trials - successes) + 1, 1 - confidence);
}

double clopper_pearson_high(std::int64_t successes, std::int64_t trials, double confidence) {
  check_proportion(successes, trials, confidence);
  if (successes == trials) return 1;
  const auto k = static_cast<double>(successes);
  return boost::math::ibetac_inv(k + 1, static_cast<double>(trials - successes), 1 - confidence);
}

Limits clopper_pearson(std::int64_t successes, std::int64_t trials, double confidence) {
  check_confidence(confidence);
  const double one_sided = one_sided_of(confidence);
  return {clopper_pearson_low(successes, trials, one_sided), clopper_pearson_high(successes, trials, one_sided)};
}

double garwood_low(double count, double confidence) {
  check_confidence(confidence);
  CISTERN_ASSERT(count >= 0);
  return count == 0 ? 0 : boost::math::gamma_p_inv(count, 1 - confidence);
}

double garwood_high(double count, double confidence) {
  check_confidence(confidence);
  CISTERN_ASSERT(count >= 0);
  return boost::math::gamma_q_inv(count + 1, 1 - confidence);
}

Limits garwood(double count, double confidence) {
  check_confidence(confidence);
  const double one_sided = one_sided_of(confidence);
  return {garwood_low(count, one_sided), garwood_high(count, one_sided)};
}

}  // namespace cistern
