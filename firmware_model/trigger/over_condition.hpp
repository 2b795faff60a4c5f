#pragma once
/// \file
/// threshold and time_over_threshold: bits of over-samples, counted in a sliding window.
/// Internal to the kernel.
#include <vector>

#include "firmware_model/trigger/condition_kernel.hpp"

namespace cistern {

class OverCondition : public ConditionKernel {
 public:
  explicit OverCondition(const ConditionSettings& settings);
  [[nodiscard]] std::unique_ptr<ConditionKernel> clone() const override { return std::make_unique<OverCondition>(*this); }
  void reset() override;
  [[nodiscard]] bool process(const CodesView& piece, PieceWords& condition) override;
  [[nodiscard]] std::int64_t onset(std::int64_t sample) const override;

 private:
  /// One enabled channel. `bits` holds the over-bits of `history_` samples before the piece, then
  /// those of the piece; sample s of the piece is bit history_ + s.
  struct Channel {
    std::size_t index{0};
    std::int16_t limit{0};                    ///< codes above it are over
    std::vector<std::uint64_t> bits;
    std::int32_t count{0};                    ///< over-samples in the window that ends before the word at hand
  };

  [[nodiscard]] bool mark_piece(const CodesView& piece);
  [[nodiscard]] std::uint64_t condition_of_word(std::size_t word, unsigned samples);
  [[nodiscard]] std::uint64_t fulfilled(Channel& channel, std::uint64_t entering, std::uint64_t leaving, unsigned samples) const;
  [[nodiscard]] bool fulfils_at(const Channel& channel, std::int64_t sample) const;
  void forget(std::size_t samples);

  std::int32_t window_;
  std::int32_t needed_;
  std::int32_t majority_;
  std::size_t history_;                       ///< window rounded up to whole words
  std::vector<Channel> channels_;
  bool history_is_empty_{true};
  std::size_t last_samples_{0};              ///< of the last piece, still in `bits` behind the history
};

}  // namespace cistern
