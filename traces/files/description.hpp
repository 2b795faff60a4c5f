#pragma once
/// \file
/// What is in recorded traces, gathered block by block: shape, baseline, noise, saturation, spectrum.
/// Pure: the blocks may come from anywhere, and how the traces are cut into them changes nothing.
#include <cstdint>
#include <optional>
#include <span>
#include <vector>

#include "traces/files/spectrum.hpp"
#include "traces/files/trace_file.hpp"

namespace cistern {

struct ChannelDescription {
  std::int32_t smallest{0};
  std::int32_t largest{0};
  double mean{0};
  double rms{0};             ///< about the mean, all samples
  std::int32_t baseline{0};  ///< the most frequent code, the smallest of equals
  /// About their mean, of the codes within four times this of it: pulses, which go further, do not
  /// widen it. Contains the rounding to whole codes, 1/sqrt(12).
  double noise_rms{0};
  std::int64_t at_zero{0};
  std::int64_t at_largest_code{0};  ///< saturated, 2^bits - 1
  /// Mean power per bin, counts^2; bin k is k * rate / (2 * (size - 1)). Segments of 1,024 samples, or
  /// of the largest power of two in a shorter trace; empty for traces below 4 samples.
  std::vector<double> spectrum;
};

struct TraceDescription {
  std::int64_t traces{0};
  std::int64_t samples{0};  ///< of all traces together, per channel
  std::vector<ChannelDescription> channels;

  /// Nothing when the rate is not known.
  [[nodiscard]] std::optional<double> duration_s(std::optional<double> sample_rate_mhz) const;
};

/// Takes blocks in the order in which a reader gives them.
class TraceSurvey {
 public:
  /// \param bits  for saturation, 4 to 15; no code may be larger
  TraceSurvey(std::size_t channels, std::int32_t bits);
  void take(const TraceBlock& block);
  [[nodiscard]] TraceDescription description() const;

 private:
  struct Channel {
    std::vector<std::int64_t> histogram;
    std::vector<std::int16_t> segment;  ///< samples that wait for more
    std::vector<double> power;
    std::int64_t segments{0};
  };
  void add_to_spectrum(Channel& channel, std::span<const std::int16_t> codes);
  void shorten_segments(std::size_t trace_samples);
  [[nodiscard]] ChannelDescription describe(const Channel& channel) const;

  std::int32_t bits_;
  std::int64_t traces_{0};
  std::int64_t samples_{0};
  std::optional<Periodogram> periodogram_;  ///< none for traces that are too short
  std::vector<Channel> channels_;
};

}  // namespace cistern
