#pragma once
/// \file
/// Codes for the trigger benchmark: four channels, blocks of 16,384 samples one behind the other as in
/// a trace file.
#include <cstddef>
#include <cstdint>
#include <string_view>
#include <vector>

#include "traces/waveform/codes.hpp"

namespace cistern {

inline constexpr std::size_t benchmark_channels = 4;
inline constexpr std::size_t benchmark_block_samples = 16'384;
inline constexpr std::int32_t benchmark_baseline_counts = 200;
inline constexpr std::int32_t benchmark_level_counts = 60;

/// What the codes do around the level, independently in every channel.
enum class Activity {
  Quiet,        ///< noise of a few counts, never over
  BusyWords,    ///< single over-samples, at least one in every 64 samples of every channel, 1/16 of all on average
  NearMinimum,  ///< 21/150 of all samples over: the count of a window of 150 walks around 21 all the time
  Alternating,  ///< every second sample over: the most changes a word can have
};

/// The same codes every time.
class BenchmarkTraces {
 public:
  BenchmarkTraces(Activity activity, std::size_t blocks);
  [[nodiscard]] std::size_t blocks() const noexcept { return blocks_; }
  [[nodiscard]] CodesView block(std::size_t number) const;
  /// All blocks in turns of `count`, so that what a row reads has left the caches since it was read last.
  [[nodiscard]] std::size_t next_blocks(std::size_t count) const;
  [[nodiscard]] std::int64_t clocks() const noexcept {
    return static_cast<std::int64_t>(blocks_ * benchmark_block_samples);
  }
  [[nodiscard]] const std::vector<std::int16_t>& all() const noexcept { return codes_; }

 private:
  std::size_t blocks_;
  mutable std::size_t next_{0};
  std::vector<std::int16_t> codes_;
};

}  // namespace cistern
