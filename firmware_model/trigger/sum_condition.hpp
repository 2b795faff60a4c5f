#pragma once
/// \file
/// boxcar_sum: sliding sums of baseline-subtracted samples. Internal to the kernel.
#include <vector>

#include "firmware_model/trigger/condition_kernel.hpp"

namespace cistern {

class SumCondition : public ConditionKernel {
 public:
  explicit SumCondition(const ConditionSettings& settings);
  [[nodiscard]] std::unique_ptr<ConditionKernel> clone() const override {
    return std::make_unique<SumCondition>(*this);
  }
  void reset() override;
  [[nodiscard]] bool process(const CodesView& piece, std::size_t first_place, PieceWords& condition) override;
  [[nodiscard]] std::int64_t onset(std::size_t place) const override;

 private:
  /// One enabled channel.
  struct Channel {
    std::size_t index{0};
    std::int16_t baseline{0};
    std::int64_t needed{0};
    /// At least `length_` codes of the past, up to next_. A sample before the start of a trace holds the
    /// baseline: it adds 0.
    std::vector<std::int16_t> run;
    std::int64_t sum{0};  ///< of the window that ends with the last piece
    PieceWords fulfilled{};
  };

  void make_room(std::size_t samples);
  [[nodiscard]] bool mark(Channel& channel, std::span<const std::int16_t> codes, std::size_t first_place,
                          std::size_t head);

  std::size_t length_;
  std::int32_t majority_;
  std::vector<Channel> channels_;
  std::size_t next_{0};  ///< where the next codes go
};

}  // namespace cistern
