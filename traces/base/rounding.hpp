#pragma once
/// \file
/// The one rounding of Cistern where physical values become counts, samples or nanoseconds.
#include <cmath>
#include <cstdint>

namespace cistern {

/// Nearest integer, halves towards plus infinity (2.5 -> 3, -2.5 -> -2). Exact for |x| < 2^52.
[[nodiscard]] inline std::int64_t round_half_up(double x) noexcept {
  const double whole = std::floor(x);
  return static_cast<std::int64_t>(whole) + (x - whole >= 0.5 ? 1 : 0);
}

}  // namespace cistern
