#pragma once
/// \file
/// Two triggers on the same signals: do they differ, and by how much? Only the discordant pairs
/// (one fired, the other did not) tell.
#include <cstdint>

#include "bench/statistics/intervals.hpp"

namespace cistern {

/// Exact two-sided McNemar test (Psychometrika 12 (1947) 153): 2 P(Binomial(a + b, 1/2) <= min),
/// at most 1. With fewer than six discordant pairs it cannot reach 0.05.
[[nodiscard]] double mcnemar_exact(std::int64_t only_first, std::int64_t only_second);

/// Proportion of the first less that of the second, in `pairs` pairs: score limits of Tango,
/// Statistics in Medicine 17 (1998) 891. They leave out 0 just where McNemar's uncorrected
/// chi-squared does at the same level. No pairs: [-1, 1].
[[nodiscard]] Limits paired_difference(std::int64_t only_first, std::int64_t only_second, std::int64_t pairs,
                                       double confidence);
[[nodiscard]] double paired_difference_low(std::int64_t only_first, std::int64_t only_second, std::int64_t pairs,
                                           double confidence);
[[nodiscard]] double paired_difference_high(std::int64_t only_first, std::int64_t only_second, std::int64_t pairs,
                                            double confidence);

}  // namespace cistern
