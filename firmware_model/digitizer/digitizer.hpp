#pragma once
/// \file
/// The analogue-to-digital converter: gain, pedestal, rounding, saturation.
/// Pure logic; the pipeline's latency is applied by the clocked station.
#include <cstdint>
#include <vector>

#include "traces/waveform/codes.hpp"
#include "traces/waveform/waveform.hpp"

namespace cistern {

struct DigitizerConfig {
  std::int32_t channels{4};  ///< 1 to 16
  double sample_rate_mhz{100};
  std::int32_t bits{12};                      ///< 4 to 15; codes are 0 .. 2^bits - 1
  std::vector<std::int32_t> baseline_counts;  ///< pedestal per channel, the code of no signal
  std::vector<double> gain;                   ///< factor per channel on the waveform, > 0; empty: 1 for all
  std::int32_t latency_samples{0};            ///< pipeline: clocks from sampling instant to code, >= 0
};

[[nodiscard]] inline std::int32_t largest_code(const DigitizerConfig& config) { return (1 << config.bits) - 1; }

/// code = clip(half-up(waveform * gain + baseline), 0, 2^bits - 1), sample by sample.
/// \param codes  resized to the waveform's shape
/// Computed in float; halves go up exactly; a waveform that is not a number gives 0.
void digitize(const DigitizerConfig& config, const Waveform& waveform, Codes& codes);

/// Samples, over all channels, at the smallest or the largest code.
[[nodiscard]] std::int64_t count_saturated(CodesView codes, std::int32_t bits);

}  // namespace cistern
