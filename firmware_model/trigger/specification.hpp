#pragma once
/// \file
/// The specification of every trigger: the shortest readable code, sample by sample. The fast kernel
/// and the clocked process must fire in the same samples. Rules in words: docs/triggers.md.
#include <cstdint>
#include <optional>
#include <span>
#include <vector>

#include "firmware_model/trigger/firing.hpp"
#include "firmware_model/trigger/firing_stages.hpp"
#include "firmware_model/trigger/settings.hpp"

namespace cistern {

/// Copyable: a copy goes on from the same state. Not thread-safe.
class TriggerSpecification {
 public:
  explicit TriggerSpecification(TriggerSettings settings);  ///< Bug unless valid.
  void reset();

  /// Takes the next sample: one code per channel.
  /// \return a firing in this sample, whatever its status
  std::optional<Firing> step(std::span<const std::int16_t> codes);

  /// Whether the condition was true in the last sample.
  [[nodiscard]] bool condition() const noexcept { return condition_; }

 private:
  [[nodiscard]] std::int64_t measure(std::size_t channel, std::int16_t code) const;
  [[nodiscard]] std::int64_t needed(std::size_t channel) const;
  [[nodiscard]] std::int64_t onset() const;

  TriggerSettings settings_;
  std::int64_t reach_;
  std::vector<std::vector<std::int64_t>> history_;  ///< per channel, what was measured, a ring of `reach_`
  std::vector<std::int64_t> sum_;                   ///< per channel, over the ring
  std::vector<bool> fulfilled_;                     ///< per channel, in the last sample
  FiringStages stages_;
  std::int64_t now_{-1};                            ///< the last sample
  bool condition_{false};
};

}  // namespace cistern
