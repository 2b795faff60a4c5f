#include "bench/statistics/extra_work.hpp"

#include <cmath>

namespace cistern {
namespace {

/// The smallest factor on the present work at which `decided(factor)` holds, within 0.1 %; the
/// limits shrink as work grows, so `decided` turns true once.
template <typename Decided>
std::optional<double> work_factor(Decided decided) {
  if (decided(1.0)) return 1;
  double low = 1;
  double high = 2;
  while (!decided(high)) {
    low = high;
    high *= 2;
    if (low > extra_work_factor_max) return {};
  }
  while (high / low > 1.001) {
    const double middle = std::sqrt(low * high);
    (decided(middle) ? high : low) = middle;
  }
  return high;
}

}  // namespace

std::optional<double> extra_live_time_s(const BlockCounts& blocks, double bound_hz, double confidence) {
  const double live_s = blocks.live_time_s();
  if (live_s == 0) return {};
  const double per_independent = firings_per_independent_one(blocks, confidence);
  const double effective = static_cast<double>(blocks.total()) / per_independent;
  const double bound = bound_hz * live_s / per_independent;
  const auto factor = work_factor([&](double more) {
    return effective < bound ? garwood_high(effective * more, confidence) <= bound * more
                             : garwood_low(effective * more, confidence) > bound * more;
  });
  if (!factor) return {};
  return (*factor - 1) * live_s;
}

std::optional<std::int64_t> extra_trials(std::int64_t successes, std::int64_t trials, double bound, double confidence) {
  if (trials == 0) return {};
  const double proportion = static_cast<double>(successes) / static_cast<double>(trials);
  const auto scaled = [](double factor, std::int64_t count) {
    return std::llround(factor * static_cast<double>(count));
  };
  const auto factor = work_factor([&](double more) {
    const std::int64_t more_trials = scaled(more, trials);
    const std::int64_t more_successes = std::llround(proportion * static_cast<double>(more_trials));
    return proportion < bound ? clopper_pearson_high(more_successes, more_trials, confidence) <= bound
                              : clopper_pearson_low(more_successes, more_trials, confidence) > bound;
  });
  if (!factor) return {};
  return scaled(*factor, trials) - trials;
}

}  // namespace cistern
