#pragma once
/// \file
/// Digitized traces. Codes are unsigned ADC codes of 4 to 15 bits held as int16, one contiguous
/// run of samples per channel (planar).
#include <cstddef>
#include <cstdint>
#include <span>
#include <vector>

#include "traces/base/errors.hpp"

namespace cistern {

/// A borrowed look at planar codes; good for as long as what it looks at.
class CodesView {
 public:
  CodesView() = default;
  /// \param first   sample 0 of channel 0
  /// \param stride  samples from one channel's sample 0 to the next one's, >= samples
  CodesView(const std::int16_t* first, std::size_t channels, std::size_t samples, std::size_t stride)
      : first_(first), channels_(channels), samples_(samples), stride_(stride) {}

  [[nodiscard]] std::size_t channels() const noexcept { return channels_; }
  [[nodiscard]] std::size_t samples() const noexcept { return samples_; }
  [[nodiscard]] std::span<const std::int16_t> channel(std::size_t c) const {
    return {first_ + c * stride_, samples_};
  }
  /// Samples [first, first + count) of every channel.
  [[nodiscard]] CodesView part(std::size_t first, std::size_t count) const {
    CISTERN_ASSERT(first + count <= samples_);
    return {first_ + first, channels_, count, stride_};
  }

 private:
  const std::int16_t* first_{nullptr};
  std::size_t channels_{0};
  std::size_t samples_{0};
  std::size_t stride_{0};
};

/// Owned planar codes.
class Codes {
 public:
  Codes() = default;
  Codes(std::size_t channels, std::size_t samples) { resize(channels, samples); }

  /// Keeps the allocation when it is large enough; the contents are unspecified afterwards.
  void resize(std::size_t channels, std::size_t samples) {
    channels_ = channels;
    samples_ = samples;
    values_.resize(channels * samples);
  }
  [[nodiscard]] std::size_t channels() const noexcept { return channels_; }
  [[nodiscard]] std::size_t samples() const noexcept { return samples_; }
  [[nodiscard]] std::span<std::int16_t> channel(std::size_t c) {
    return {values_.data() + c * samples_, samples_};
  }
  [[nodiscard]] std::span<const std::int16_t> channel(std::size_t c) const { return view().channel(c); }
  [[nodiscard]] CodesView view() const { return {values_.data(), channels_, samples_, samples_}; }

 private:
  std::size_t channels_{0};
  std::size_t samples_{0};
  std::vector<std::int16_t> values_;
};

}  // namespace cistern
