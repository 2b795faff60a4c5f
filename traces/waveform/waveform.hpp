#pragma once
/// \file
/// The analogue signal at the digitizer's input, sampled at its rate.
#include <cstddef>
#include <span>
#include <vector>

namespace cistern {

/// Planar float samples, in ADC counts above the pedestal before rounding (positive pulses).
class Waveform {
 public:
  Waveform() = default;
  Waveform(std::size_t channels, std::size_t samples) { reset(channels, samples); }

  /// Takes the given shape and sets every sample to zero; keeps the allocation when large enough.
  void reset(std::size_t channels, std::size_t samples) {
    channels_ = channels;
    samples_ = samples;
    values_.assign(channels * samples, 0.0F);
  }
  [[nodiscard]] std::size_t channels() const noexcept { return channels_; }
  [[nodiscard]] std::size_t samples() const noexcept { return samples_; }
  [[nodiscard]] std::span<float> channel(std::size_t c) { return {values_.data() + c * samples_, samples_}; }
  [[nodiscard]] std::span<const float> channel(std::size_t c) const {
    return {values_.data() + c * samples_, samples_};
  }

 private:
  std::size_t channels_{0};
  std::size_t samples_{0};
  std::vector<float> values_;
};

}  // namespace cistern
