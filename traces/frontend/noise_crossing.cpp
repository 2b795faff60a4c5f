/// \file
/// Method: for standard normal x, y of correlation r, Plackett (1954) gives the derivative of
/// P(x >= u, y >= u) by r as the density at (u, u), e^(-u^2 / (1 + r)) / (2 pi sqrt(1 - r^2)). At
/// r = 1 the probability is P(x >= u), so P(x < u <= y) is the integral of that density from r to 1.
/// With r = sin(a) the root disappears and a smooth integral without cancellation is left.
#include "traces/frontend/noise_crossing.hpp"

#include <boost/math/quadrature/gauss_kronrod.hpp>
#include <cmath>
#include <numbers>

#include "traces/base/errors.hpp"

namespace cistern {

using std::numbers::pi;

double up_crossing_probability(double level_sigmas, double correlation) {
  CISTERN_ASSERT(correlation > -1 && correlation < 1);
  const auto density = [u2 = level_sigmas * level_sigmas](double a) { return std::exp(-u2 / (1 + std::sin(a))); };
  using Quadrature = boost::math::quadrature::gauss_kronrod<double, 31>;
  return Quadrature::integrate(density, std::asin(correlation), pi / 2, 10, 1e-12) / (2 * pi);
}

double code_up_crossing_probability(double level_counts, double noise_rms_counts, double correlation) {
  CISTERN_ASSERT(noise_rms_counts > 0);
  return up_crossing_probability((level_counts - 0.5) / noise_rms_counts, correlation);
}

double rice_up_crossings_per_sample(double level_sigmas, double correlation) {
  return std::sqrt(2 * (1 - correlation)) / (2 * pi) * std::exp(-0.5 * level_sigmas * level_sigmas);
}

double rice_up_crossing_rate_hz(double level_sigmas, double bandwidth_hz) {
  return bandwidth_hz / std::numbers::sqrt3 * std::exp(-0.5 * level_sigmas * level_sigmas);
}

}  // namespace cistern
