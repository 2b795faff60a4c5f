#pragma once
/// \file
/// Exact limits on a proportion and on a Poisson mean.
/// The two-sided limits are central: each end leaves out (1 - confidence) / 2. The functions ending
/// in `_low` and `_high` are one-sided: the whole of 1 - confidence lies beyond the one end.
#include <cstdint>

namespace cistern {

/// An interval, both ends included. An end that the data do not bound is -inf or +inf, or the end
/// of what is possible (0 for a rate, 0 or 1 for a proportion).
struct Limits {
  double low{0};
  double high{0};
};

/// Clopper and Pearson, Biometrika 26 (1934) 404. Needs 0 <= successes <= trials and
/// 0 < confidence < 1; no trials: [0, 1].
[[nodiscard]] Limits clopper_pearson(std::int64_t successes, std::int64_t trials, double confidence);
[[nodiscard]] double clopper_pearson_low(std::int64_t successes, std::int64_t trials, double confidence);
[[nodiscard]] double clopper_pearson_high(std::int64_t successes, std::int64_t trials, double confidence);

/// Garwood, Biometrika 28 (1936) 437: limits on the mean of a Poisson count. Needs count >= 0.
/// A count may be fractional, as the effective counts of clustered firings are (counting.hpp).
[[nodiscard]] Limits garwood(double count, double confidence);
[[nodiscard]] double garwood_low(double count, double confidence);
[[nodiscard]] double garwood_high(double count, double confidence);

}  // namespace cistern
