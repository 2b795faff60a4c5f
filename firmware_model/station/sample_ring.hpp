#pragma once
/// \file
/// The ring buffer that always holds the newest samples of all channels.
#include <cstddef>
#include <cstdint>
#include <span>

#include "traces/waveform/codes.hpp"

namespace cistern {

class SampleRing {
 public:
  /// \param length  samples kept, >= 1
  SampleRing(std::size_t channels, std::int64_t length);

  /// Stores the next sample, one code per channel; the first one is sample 0.
  void store(std::span<const std::int16_t> codes);

  [[nodiscard]] std::int64_t stored() const noexcept { return stored_; }  ///< since the start
  [[nodiscard]] std::int64_t oldest() const noexcept { return stored_ > length_ ? stored_ - length_ : 0; }

  /// Writes the samples [first, stored()) to the beginning of every channel of `into`, which has room for them.
  /// Bug if first < oldest().
  void copy_from(std::int64_t first, Codes& into) const;

 private:
  Codes codes_;
  std::int64_t length_;
  std::int64_t stored_{0};
};

}  // namespace cistern
