#pragma once
/// \file
/// The fast kernel of every trigger: the same firings as the specification, block-wise and
/// vectorised; the instruction set is chosen at run time and never shows in a result.
#include <cstdint>
#include <memory>
#include <optional>
#include <span>
#include <vector>

#include "firmware_model/trigger/firing.hpp"
#include "firmware_model/trigger/firing_stages.hpp"
#include "firmware_model/trigger/settings.hpp"
#include "traces/waveform/codes.hpp"

namespace cistern {

class ConditionKernel;

/// Copyable: a copy goes on from the same state. How samples are cut into blocks changes nothing.
class TriggerKernel {
 public:
  explicit TriggerKernel(const TriggerSettings& settings);  ///< Bug unless valid.
  TriggerKernel(const TriggerKernel& other);
  TriggerKernel& operator=(const TriggerKernel& other);
  TriggerKernel(TriggerKernel&&) noexcept;
  TriggerKernel& operator=(TriggerKernel&&) noexcept;
  ~TriggerKernel();

  void reset();
  /// Takes the next samples of every channel. \param firings  appended to, whatever their status
  void process(const CodesView& block, std::vector<Firing>& firings);
  /// Since the last reset.
  [[nodiscard]] std::int64_t samples_seen() const noexcept { return seen_; }

 private:
  void take_piece(std::span<const std::uint64_t> condition, std::size_t first_place, std::size_t samples,
                  std::vector<Firing>& firings);
  void take_word(std::uint64_t condition, std::uint64_t was_true, std::size_t first_place,
                 std::vector<Firing>& firings);
  [[nodiscard]] std::optional<unsigned> next_firing(std::uint64_t condition, std::uint64_t edges,
                                                    std::int64_t word_start) const;

  std::size_t channels_;
  std::unique_ptr<ConditionKernel> condition_;
  FiringStages stages_;
  std::int64_t reach_;
  std::int64_t seen_{0};
  bool condition_was_true_{false};
};

}  // namespace cistern
