#pragma once
/// \file
/// Electronic noise of one station's channels: Gaussian, stationary, correlated over neighbouring
/// samples. Any stretch can be made alone and has the same samples.
#include <cstddef>
#include <cstdint>
#include <span>
#include <vector>

#include "traces/base/random.hpp"
#include "traces/frontend/frontend_config.hpp"

namespace cistern {

/// Noise is drawn in blocks of so many samples, counted from sample 0.
inline constexpr std::int64_t noise_block = 4096;

/// Immutable once made.
class NoiseSource {
 public:
  NoiseSource(const FrontendConfig& config, std::uint64_t campaign_seed);

  /// Noise in counts for samples [first, first + out.size()) of one channel.
  /// \param index  of the channel's block 0 among the streams of `purpose`; block b has index + b,
  ///               and the caller keeps the channels apart
  void write(Purpose purpose, std::uint64_t index, std::int64_t first, std::span<float> out) const;

 private:
  void write_in_block(Purpose purpose, std::uint64_t index, std::int64_t block, std::size_t first,
                      std::span<float> out) const;
  std::vector<float> taps_;  ///< in counts
  std::uint64_t campaign_seed_;
};

}  // namespace cistern
