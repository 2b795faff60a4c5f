/// \file
/// Method: among n taps of unit power, half a sine wave has the largest correlation at lag one,
/// cos(pi / (n + 1)): it is the leading eigenvector of the tridiagonal matrix that gives the
/// correlation. The shortest filter that reaches the wanted value is blended with the best one
/// tap shorter until the value is met.
#include "traces/frontend/noise_filter.hpp"

#include <cmath>
#include <numbers>

#include "traces/base/errors.hpp"

namespace cistern {
namespace {

/// The best `count` taps, followed by zeros.
std::vector<double> half_sine(std::size_t count, std::size_t size) {
  std::vector<double> taps(size, 0.0);
  for (std::size_t k = 0; k < count; ++k) {
    taps[k] = std::sin(std::numbers::pi * static_cast<double>(k + 1) / static_cast<double>(count + 1));
  }
  return taps;
}

double product(const std::vector<double>& taps, std::size_t lag) {
  double sum = 0;
  for (std::size_t k = lag; k < taps.size(); ++k) sum += taps[k] * taps[k - lag];
  return sum;
}

std::vector<double> at_unit_power(std::vector<double> taps) {
  const double scale = 1 / std::sqrt(product(taps, 0));
  for (double& tap : taps) tap *= scale;
  return taps;
}

std::vector<double> blend(std::vector<double> shorter, const std::vector<double>& longer, double part) {
  for (std::size_t k = 0; k < shorter.size(); ++k) shorter[k] += part * (longer[k] - shorter[k]);
  return at_unit_power(std::move(shorter));
}

}  // namespace

double tap_correlation(const std::vector<double>& taps, std::size_t lag) {
  return product(taps, lag) / product(taps, 0);
}

std::vector<double> noise_taps(double correlation) {
  CISTERN_ASSERT(correlation >= 0 && correlation <= noise_correlation_max);
  std::size_t count = 1;
  while (std::cos(std::numbers::pi / static_cast<double>(count + 1)) < correlation - 1e-12) ++count;
  const std::vector<double> shorter = at_unit_power(half_sine(count == 1 ? 1 : count - 1, count));
  const std::vector<double> longer = at_unit_power(half_sine(count, count));
  double low = 0;
  double high = 1;
  for (int i = 0; i < 60; ++i) {
    const double middle = 0.5 * (low + high);
    (tap_correlation(blend(shorter, longer, middle), 1) < correlation ? low : high) = middle;
  }
  return blend(shorter, longer, high);
}

}  // namespace cistern
