#pragma once
/// \file
/// By how much a trace misses or exceeds a condition: the largest over its samples of the
/// majority-th largest channel's code - baseline - level (counts), samples over in the window less
/// min_samples_over (samples), or sum less the needed one (counts).
#include <cstdint>
#include <optional>
#include <string_view>
#include <vector>

#include "firmware_model/trigger/settings.hpp"
#include "traces/waveform/codes.hpp"

namespace cistern {

/// "samples" for time_over_threshold, "counts" otherwise.
[[nodiscard]] std::string_view margin_unit(TriggerKind kind);

/// Copyable. At least 0 exactly when the condition was true somewhere.
class MarginMeter {
 public:
  struct Best {
    std::int64_t sample{0};   ///< counted from the last reset; the first that reached it
    std::int64_t margin{0};
  };

  explicit MarginMeter(const ConditionSettings& condition);
  void reset();
  /// Starts looking for the best again, without emptying the windows.
  void forget_best() { best_.reset(); }
  void process(const CodesView& block);
  /// Nothing before the first sample, or when fewer channels are enabled than majority asks for.
  [[nodiscard]] std::optional<Best> best() const noexcept { return best_; }

 private:
  void measure(std::size_t enabled, std::span<const std::int16_t> codes);
  void rank(std::size_t samples);

  ConditionSettings condition_;
  std::int64_t reach_;
  std::vector<std::size_t> channels_;                ///< the enabled ones
  std::vector<std::vector<std::int32_t>> ring_;      ///< per enabled channel, what was measured
  std::vector<std::int64_t> sum_;                    ///< per enabled channel, over the ring
  std::vector<std::vector<std::int64_t>> margins_;   ///< per enabled channel, of the piece at hand
  std::int64_t seen_{0};
  std::optional<Best> best_;
};

}  // namespace cistern
