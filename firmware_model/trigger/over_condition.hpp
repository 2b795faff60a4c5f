#pragma once
/// \file
/// threshold and time_over_threshold: bits of over-samples, counted in a sliding window.
/// Internal to the kernel.
#include <vector>

#include "firmware_model/trigger/block_scans.hpp"
#include "firmware_model/trigger/condition_kernel.hpp"

namespace cistern {

class OverCondition : public ConditionKernel {
 public:
  explicit OverCondition(const ConditionSettings& settings);
  [[nodiscard]] std::unique_ptr<ConditionKernel> clone() const override {
    return std::make_unique<OverCondition>(*this);
  }
  void reset() override;
  [[nodiscard]] bool process(const CodesView& piece, std::size_t first_place, PieceWords& condition) override;
  [[nodiscard]] std::int64_t onset(std::size_t place) const override;

 private:
  /// One enabled channel.
  struct Channel {
    std::size_t index{0};
    std::int16_t limit{0};            ///< codes above it are over
    std::vector<std::uint64_t> bits;  ///< over or not: at least a window of the past, then the piece from word now_ on
    std::int64_t count{0};            ///< over-samples in the window that ends with the last piece
    bool any{false};                  ///< fulfilled somewhere in the last piece; if not, `fulfilled` is older
    PieceWords fulfilled{};
  };

  void make_room();
  [[nodiscard]] bool mark(Channel& channel, std::span<const std::int16_t> codes, std::size_t first_place);
  void count(Channel& channel, bool any_over, Stretch stretch);
  [[nodiscard]] const std::uint64_t* fulfilled(const Channel& channel) const;
  [[nodiscard]] std::int64_t first_over(const Channel& channel, std::size_t place) const;

  std::int32_t window_;
  std::int32_t needed_;
  std::int32_t majority_;
  std::size_t history_words_;  ///< the window rounded up
  std::vector<Channel> channels_;
  std::size_t now_{0};   ///< word of `bits` in which the last piece begins
  std::size_t next_{0};  ///< word of `bits` in which the next piece begins
};

}  // namespace cistern
