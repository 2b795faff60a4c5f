#pragma once
/// \file
/// How often Gaussian noise crosses a level upwards, predicted without simulation.
/// Exact for sampled noise; Rice's formula is the limit of ever finer sampling.

namespace cistern {

/// P(x[s-1] < u <= x[s]) of standard normal samples whose neighbours are correlated.
/// \param correlation  of adjacent samples, (-1, 1)
[[nodiscard]] double up_crossing_probability(double level_sigmas, double correlation);

/// The same for codes rounded to whole counts: "code - baseline >= level" acts at level - 1/2.
/// \param noise_rms_counts > 0, before rounding
[[nodiscard]] double code_up_crossing_probability(double level_counts, double noise_rms_counts, double correlation);

/// Rice 1944: up-crossings per sample of a smooth process whose correlation of adjacent samples is
/// close to 1. Too high for sampled noise otherwise: usable from about 0.95.
[[nodiscard]] double rice_up_crossings_per_sample(double level_sigmas, double correlation);

/// Rice 1944: up-crossings per second of continuous noise, flat from 0 to the bandwidth.
[[nodiscard]] double rice_up_crossing_rate_hz(double level_sigmas, double bandwidth_hz);

}  // namespace cistern
