#pragma once
/// \file
/// The shortest filters that turn white noise into noise of a wanted correlation of adjacent samples.
#include <vector>

namespace cistern {

inline constexpr double noise_correlation_max = 0.95;
inline constexpr std::size_t noise_taps_max = 9;

/// Taps of unit power whose correlation at lag one is `correlation`; at lags of the number of taps or
/// more it is 0. n taps reach cos(pi / (n + 1)), so two are enough up to 0.5.
/// \param correlation 0 to noise_correlation_max
[[nodiscard]] std::vector<double> noise_taps(double correlation);

/// Correlation of the filter's output at a lag, over that at lag 0.
[[nodiscard]] double tap_correlation(const std::vector<double>& taps, std::size_t lag);

}  // namespace cistern
