#pragma once
/// \file
/// What is in recorded traces, gathered block by block: shape, baseline, noise, saturation, spectrum.
#include <cstdint>
#include <vector>

#include "traces/files/trace_file.hpp"

namespace cistern {

struct ChannelDescription {
  std::int32_t smallest{0};
  std::int32_t largest{0};
  double mean{0};
  double rms{0};                        ///< about the mean, all samples
  std::int32_t baseline{0};             ///< the most frequent code
  /// Of the codes at and below the baseline, mirrored: signals, which are positive, do not widen it.
  double noise_rms{0};
  std::int64_t at_zero{0};
  std::int64_t at_largest_code{0};      ///< saturated, 2^bits - 1
  /// Mean power per bin, counts^2; bin k is k * rate / (2 * (size - 1)). Hann window, 1,024 samples.
  std::vector<double> spectrum;
};

struct TraceDescription {
  std::int64_t traces{0};
  std::int64_t samples{0};              ///< of all traces together, per channel
  std::vector<ChannelDescription> channels;
};

/// Takes blocks in the order in which a reader gives them.
class TraceSurvey {
 public:
  /// \param bits  for saturation, 4 to 15
  TraceSurvey(std::size_t channels, std::int32_t bits);
  void take(const TraceBlock& block);
  [[nodiscard]] TraceDescription description() const;

 private:
  struct Channel {
    std::vector<std::int64_t> histogram;
    std::vector<double> pending;        ///< samples of a spectrum that is not full yet
    std::vector<double> power;
    std::int64_t spectra{0};
  };
  void add_to_spectrum(Channel& channel, std::span<const std::int16_t> codes);
  [[nodiscard]] ChannelDescription describe(const Channel& channel) const;

  std::int32_t bits_;
  std::int64_t traces_{0};
  std::int64_t samples_{0};
  std::vector<Channel> channels_;
};

/// Power of a real signal, bins 0 to size/2: |sum x w e^-2 pi i k n / size|^2, both halves joined and
/// divided by (size * sum w^2), so that the bins add up to the mean square of a stationary signal.
/// \param samples  a power of two of them, mean subtracted
[[nodiscard]] std::vector<double> power_spectrum(std::span<const double> samples);

}  // namespace cistern
